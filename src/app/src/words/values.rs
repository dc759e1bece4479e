//! Numbers in words: estimates carry ≈, a band says "to", units stand beside.

use bedside::Quantiles;
use case::{Moment, Now};

/// The band's frequency, before its edges.
pub const EIGHT_IN_TEN: &str = "8 times in 10, ";

/// A number with its decimals, a real minus before negative ones.
pub fn number(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    match text.strip_prefix('-') {
        Some(rest) if rest.bytes().all(|b| b == b'0' || b == b'.') => rest.to_owned(),
        Some(rest) => format!("\u{2212}{rest}"),
        None => text,
    }
}

/// A typed number as it was typed: no decimals it did not have, nor those of a conversion.
pub fn as_typed(value: f64) -> String {
    let text = number(value, 3);
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

/// "≈57".
pub fn about(value: f64, decimals: usize) -> String {
    format!("≈{}", number(value, decimals))
}

/// "53 to 61"; one number where both edges print alike.
pub fn range(low: f64, high: f64, decimals: usize) -> String {
    let (low, high) = (number(low, decimals), number(high, decimals));
    if low == high { low } else { format!("{low} to {high}") }
}

/// The band of a PaCO2, "53 to 61".
pub fn paco2_range(q: &Quantiles) -> String {
    range(q.p10, q.p90, 0)
}

/// The band of a pH, "7.27 to 7.32".
pub fn ph_range(q: &Quantiles) -> String {
    range(q.p10, q.p90, 2)
}

/// "8 times in 10, 53 to 61".
pub fn in_words(range: &str) -> String {
    format!("{EIGHT_IN_TEN}{range}")
}

/// The wall clock of a moment.
pub fn clock(moment: Moment, now: &Now) -> String {
    moment.clock(now.utc_offset_min)
}

/// The wall clock, with the day where it is another one than today: reads well after "at", "of" and "since".
pub fn day_and_clock(moment: Moment, now: &Now) -> String {
    let days = day(now.wall, now) - day(moment, now);
    let clock = clock(moment, now);
    match days {
        0 => clock,
        1 => format!("{clock} yesterday"),
        -1 => format!("{clock} tomorrow"),
        2.. => format!("{clock}, {days} days ago"),
        _ => format!("{clock} in {} days", -days),
    }
}

fn day(moment: Moment, now: &Now) -> i64 {
    (moment.0 + i64::from(now.utc_offset_min) * 60_000).div_euclid(24 * 60 * 60_000)
}

/// A list with commas and "and".
pub fn list(parts: &[String]) -> String {
    match parts {
        [] => String::new(),
        [only] => only.clone(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn band(p10: f64, p50: f64, p90: f64) -> Quantiles {
        Quantiles { p10, p50, p90 }
    }

    #[test]
    fn a_band_is_said_in_words() {
        assert_eq!(in_words(&paco2_range(&band(52.6, 57.1, 61.4))), "8 times in 10, 53 to 61");
        assert_eq!(ph_range(&band(7.268, 7.301, 7.316)), "7.27 to 7.32");
        assert_eq!(paco2_range(&band(56.9, 57.0, 57.2)), "57");
        assert_eq!(about(57.1, 0), "≈57");
    }

    #[test]
    fn minus_is_a_minus_and_zero_has_none() {
        assert_eq!(number(-4.2, 1), "\u{2212}4.2");
        assert_eq!(number(-0.04, 1), "0.0");
    }

    #[test]
    fn a_typed_number_gains_no_decimals() {
        assert_eq!(as_typed(14.026_159_400_000_001), "14.026");
        assert_eq!(as_typed(340.0), "340");
        assert_eq!(as_typed(7.21), "7.21");
        assert_eq!(as_typed(-4.5), "\u{2212}4.5");
    }

    #[test]
    fn another_day_is_named() {
        // 2026-03-02T00:20Z, where the local clock says 01:20.
        let now = Now { utc_offset_min: 60, ..Now::at(Moment(1_772_410_800_000)) };
        assert_eq!(day_and_clock(now.wall.plus_minutes(-30.0), &now), "00:50");
        assert_eq!(day_and_clock(now.wall.plus_minutes(-90.0), &now), "23:50 yesterday");
        assert_eq!(day_and_clock(now.wall.plus_minutes(-90.0 - 1440.0), &now), "23:50, 2 days ago");
        assert_eq!(day_and_clock(now.wall.plus_minutes(1439.0), &now), "01:19 tomorrow");
    }

    #[test]
    fn lists_read_as_sentences() {
        let parts = ["rate 26".to_owned(), "PEEP 10".to_owned(), "FiO₂ 0.6".to_owned()];
        assert_eq!(list(&parts), "rate 26, PEEP 10 and FiO₂ 0.6");
        assert_eq!(list(&parts[..1]), "rate 26");
    }
}
