//! Words of the Now room, and of a forecast wherever one is shown.

use bedside::{Forecast, Quantiles};
use case::{Gas, Moment, Now, Site};

use super::values::{about, as_typed, clock, day_and_clock, in_words, number, paco2_range, ph_range};

/// The room.
pub const TITLE: &str = "Now";
/// Over the big number.
pub const PACO2_NOW: &str = "PaCO₂ now";
/// Over the second number.
pub const PH_NOW: &str = "pH now";
/// Never a measurement.
pub const CALCULATED: &str = "calculated, not measured";
/// The unit.
pub const MMHG: &str = "mmHg";
/// The first gas is asked for.
pub const NO_CASE: &str = "No case is open. Type a gas to start one.";
/// Asks for a gas.
pub const TYPE_A_GAS: &str = "TYPE A GAS";
/// Asks for a gas, as the second button.
pub const NEXT_GAS: &str = "Type a gas";
/// Types settings.
pub const TYPE_SETTINGS: &str = "TYPE SETTINGS";
/// Types settings that changed.
pub const SETTINGS_CHANGED: &str = "Settings changed or measured";
/// Goes to Change.
pub const TRY_A_RATE: &str = "TRY A RATE";
/// Heads the offers.
pub const OFFERS: &str = "Three settings and where each leads";
/// Heads fewer offers.
pub const FEWER: &str = "Settings and where each leads";
/// Under the offers.
pub const NONE_CHOSEN: &str = "None is chosen. Touch one to try it.";
/// Heads the numbers behind the chart.
pub const NUMBERS: &str = "The same in numbers";
/// Heads what would narrow the band.
pub const NARROW: &str = "Narrow it";
/// Heads what is assumed and can't be narrowed.
pub const ASSUMED: &str = "What it assumes";
/// What the band leaves out.
pub const BAND_MEANS: &str =
    "The band is the patient's, from simulated bodies. It can't allow for a body that the model has wrong.";
/// Asks how long the settings were held.
pub const HELD: &str = "Before the first gas the settings had been";
/// The chips of it.
pub const HELD_CHIPS: [&str; 3] = ["held 30 min", "changed just now", "not known"];
/// What would let it know.
pub const WOULD_HELP: &str = "What would help:";

/// Which way it goes and where it ends.
pub fn heading(now_p50: f64, forecast: &Forecast) -> String {
    let settled = &forecast.settled;
    let way = settled.paco2_mmhg.p50 - now_p50;
    let direction = if way.abs() < 1.0 {
        "Steady"
    } else if way < 0.0 {
        "Falling"
    } else {
        "Rising"
    };
    format!(
        "{direction}. Settles at {} ({}) mmHg, pH {} ({}), if nothing else changes.",
        about(settled.paco2_mmhg.p50, 0),
        paco2_range(&settled.paco2_mmhg),
        about(settled.ph.p50, 2),
        ph_range(&settled.ph),
    )
}

/// Within so many minutes it counts as settled: nobody draws a gas in less.
pub const SOON_MIN: f64 = 5.0;
/// Minutes beyond which a time is not worth naming.
const FAR_MIN: f64 = 240.0;

/// When it has settled, as clock times.
pub fn when_settled(within: &Quantiles, now: &Now) -> String {
    let at = |minutes: f64| clock(now.wall.plus_minutes(minutes), now);
    let known = |minutes: f64| minutes.is_finite() && minutes <= FAR_MIN;
    match (within.p10, within.p90) {
        (_, late) if late < SOON_MIN => "It is within 2 mmHg of settled.".to_owned(),
        (early, late) if early < 1.0 && known(late) => {
            format!("Within 2 mmHg of settled by {}, perhaps now.", at(late))
        }
        (early, late) if known(late) && at(early) == at(late) => {
            format!("Within 2 mmHg of settled at {}.", at(late))
        }
        (early, late) if known(late) => {
            format!("Within 2 mmHg of settled between {} and {}.", at(early), at(late))
        }
        (early, _) if known(early) => {
            format!("Within 2 mmHg of settled from {} at the earliest, perhaps much later.", at(early))
        }
        _ => "It takes more than 4 hours to settle.".to_owned(),
    }
}

/// The picture in one sentence, for those who can't see it.
pub fn picture(paco2: &Quantiles, forecast: &Forecast, now: &Now) -> String {
    format!(
        "At {} PaCO₂ {}, {} mmHg. {} {}",
        clock(now.wall, now),
        about(paco2.p50, 0),
        in_words(&paco2_range(paco2)),
        heading(paco2.p50, forecast),
        when_settled(&forecast.minutes_to_within_2_mmhg, now),
    )
}

/// Half an hour without an entry.
pub fn still_so(since: Moment, now: &Now) -> String {
    format!("Assumes nothing has changed since {}. Still so?", day_and_clock(since, now))
}
/// The button that says so.
pub fn still_so_button(label: &str) -> String {
    format!("{label}: STILL SO")
}
/// An hour unconfirmed.
pub fn expired(gas: Option<(&Gas, Moment)>, since: Moment, now: &Now) -> String {
    let since = day_and_clock(since, now);
    match gas {
        Some((gas, drawn)) => format!(
            "Last measured: {} {} mmHg at {}. Not known since {since}. Type a gas, or what has changed.",
            name(gas),
            number(gas.pco2_mmhg, 0),
            day_and_clock(drawn, now),
        ),
        None => format!("Not known since {since}. Type a gas, or what has changed."),
    }
}
/// Somebody looked.
pub fn nothing_changed(label: &str) -> String {
    format!("{label}: I looked, nothing has changed")
}

/// The last gas in a line.
pub fn last_gas(gas: &Gas, drawn: Moment, now: &Now) -> String {
    format!(
        "Last measured at {}: {} {} mmHg, pH {}{}.",
        day_and_clock(drawn, now),
        name(gas),
        number(gas.pco2_mmhg, 0),
        number(gas.ph, 2),
        site(gas.site),
    )
}

/// How long ago a gas was drawn.
pub fn age(drawn: Moment, now: &Now) -> String {
    let minutes = now.wall.minutes_since(drawn);
    match minutes {
        _ if minutes < 1.0 => "That was just now.".to_owned(),
        _ if minutes < 120.0 => format!("That was {} min ago.", number(minutes.floor(), 0)),
        _ => format!("That was {} h ago.", number((minutes / 60.0).floor(), 0)),
    }
}

/// What the carbon dioxide of a gas is called.
const fn name(gas: &Gas) -> &'static str {
    match gas.site {
        Site::Arterial => "PaCO₂",
        Site::Capillary | Site::CentralVenous | Site::PeripheralVenous => "PCO₂",
    }
}

/// Where a gas is from, unless it is arterial.
pub fn site(site: Site) -> &'static str {
    match site {
        Site::Arterial => "",
        Site::Capillary => ", capillary",
        Site::CentralVenous => ", central line",
        Site::PeripheralVenous => ", arm vein",
    }
}

/// A gas outside its band.
pub fn doubt(measured: f64, expected: (f64, f64), at: Moment, now: &Now) -> String {
    format!(
        "The gas of {} reads {} mmHg. 95 times in 100 it would have read {} to {} mmHg. Check the patient, then the sample.",
        day_and_clock(at, now),
        number(measured, 0),
        number(expected.0, 0),
        number(expected.1, 0),
    )
}
/// What is asked then.
pub const DOUBT_ASK: &str = "Which is it? Until you say, there is no forecast.";
/// The three ways.
pub const DOUBT_WAYS: [&str; 3] =
    ["The sample: leave it out", "The patient has changed", "The machine or circuit has changed"];

/// Under pressure support.
pub fn ratio(factor: f64, paco2: &Quantiles) -> String {
    format!(
        "With {} % more minute volume PaCO₂ would settle near {} ({}) mmHg.",
        number((factor - 1.0) * 100.0, 0),
        about(paco2.p50, 0),
        paco2_range(paco2),
    )
}

/// One thing assumed.
pub fn assumed(item: &bedside::Assumed) -> String {
    let size = if item.spread > 0.0 { item.spread } else { item.value / 10.0 };
    let decimals = if size < 0.3 { 2 } else { usize::from(size < 3.0) };
    let unit = if item.unit.is_empty() { String::new() } else { format!(" {}", item.unit) };
    let spread =
        if item.spread > 0.0 { format!(" ± {}", number(item.spread, decimals)) } else { String::new() };
    format!("{}: {}{spread}{unit} assumed", item.name, number(item.value, decimals))
}

/// An offer's first column.
pub fn offer(change: &case::Settings) -> String {
    let mut parts = vec![];
    if let Some(rate) = change.rate_per_min {
        parts.push(format!("rate {}/min", as_typed(rate)));
    }
    if let Some(volume) = change.tidal_volume_ml {
        parts.push(format!("VT {} mL", as_typed(volume)));
    }
    parts.join(", ")
}

/// A price in a line.
pub fn price(price: &bedside::Price) -> String {
    let mut parts = vec![];
    if let Some(per_kg) = price.ml_per_kg {
        parts.push(format!("{} mL/kg", number(per_kg, 1)));
    }
    if let Some(plateau) = price.plateau_cmh2o {
        parts.push(format!("plateau {} cmH₂O", number(plateau, 0)));
    }
    parts.push(format!("{} L/min", number(price.minute_volume_l_min, 1)));
    parts.join(" · ")
}

/// The chart's words.
pub mod chart {
    /// Its right scale.
    pub const PH_AXIS: &str = "pH, lower is higher up";
    /// Its left scale.
    pub const MMHG_AXIS: &str = "mmHg";
    /// The line of now.
    pub const NOW: &str = "now";
    /// The bracket.
    pub const WITHIN: &str = "within 2 mmHg";
    /// Reads the chart by a slider.
    pub const READ: &str = "Read the chart at";
    /// Table headings.
    pub const HEADS: [&str; 4] = ["Time", "PaCO₂ mmHg", "pH", "A gas would read, mmHg"];

    use super::{Quantiles, about, in_words, number, paco2_range};

    /// A gas in the table.
    pub fn measured(mmhg: f64) -> String {
        format!("a gas read {} mmHg", number(mmhg, 0))
    }

    /// One point of the chart, said.
    pub fn point(clock: &str, paco2: &Quantiles) -> String {
        format!("{clock}: {} mmHg, {}", about(paco2.p50, 0), in_words(&paco2_range(paco2)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const NOW: Now = Now { wall: Moment(1_772_486_280_000), utc_offset_min: 0, since_load_ms: 0.0 }; // 21:18Z

    fn q(p10: f64, p50: f64, p90: f64) -> Quantiles {
        Quantiles { p10, p50, p90 }
    }

    fn forecast() -> Forecast {
        let flat = bedside::Band::default();
        Forecast {
            minutes: vec![],
            paco2_mmhg: flat.clone(),
            ph: flat.clone(),
            hco3_mmol_l: flat.clone(),
            gas_would_read_paco2_mmhg: flat.clone(),
            gas_would_read_ph: flat,
            settled: bedside::Settled { paco2_mmhg: q(45.0, 50.0, 55.0), ph: q(7.31, 7.34, 7.37) },
            minutes_to_within_2_mmhg: q(37.0, 50.0, 77.0),
            minutes_to_90_percent: q(40.0, 50.0, 80.0),
        }
    }

    #[test]
    fn the_way_and_its_end_in_one_sentence() {
        assert_eq!(
            heading(57.0, &forecast()),
            "Falling. Settles at ≈50 (45 to 55) mmHg, pH ≈7.34 (7.31 to 7.37), if nothing else changes."
        );
        assert!(heading(44.0, &forecast()).starts_with("Rising."));
        assert!(heading(50.4, &forecast()).starts_with("Steady."));
    }

    #[test]
    fn the_time_is_a_range_and_an_unknown_end_is_said() {
        let said = |p10, p90| when_settled(&q(p10, p10, p90), &NOW);
        assert_eq!(said(37.0, 77.0), "Within 2 mmHg of settled between 21:55 and 22:35.");
        assert_eq!(said(0.0, 0.0), "It is within 2 mmHg of settled.");
        assert_eq!(said(0.0, 17.0), "Within 2 mmHg of settled by 21:35, perhaps now.");
        assert!(said(37.0, f64::INFINITY).contains("21:55 at the earliest"));
        assert!(said(f64::NAN, f64::NAN).contains("more than 4 hours"));
    }

    #[test]
    fn an_assumption_has_no_more_decimals_than_its_spread() {
        let item = |value, spread, unit| bedside::Assumed {
            name: "It",
            value,
            spread,
            unit,
            source: "",
            narrows: "",
        };
        assert_eq!(assumed(&item(0.0, 10.0, "%")), "It: 0 ± 10 % assumed");
        assert_eq!(assumed(&item(0.25, 0.12, "")), "It: 0.25 ± 0.12 assumed");
        assert_eq!(assumed(&item(0.95, 0.0, "")), "It: 0.95 assumed");
    }

    #[test]
    fn an_expired_estimate_keeps_only_what_was_measured() {
        let gas = Gas {
            site: Site::Arterial,
            ph: 7.21,
            pco2_mmhg: 71.0,
            po2_mmhg: None,
            hco3_printed_mmol_l: None,
            hb_g_dl: None,
            temperature_c: None,
            reported_at_c: None,
            analysed_at: None,
            settings_held_min: None,
        };
        let drawn = NOW.wall.plus_minutes(-70.0);
        let words = expired(Some((&gas, drawn)), drawn, &NOW);
        assert_eq!(
            words,
            "Last measured: PaCO₂ 71 mmHg at 20:08. Not known since 20:08. Type a gas, or what has changed."
        );
    }
}
