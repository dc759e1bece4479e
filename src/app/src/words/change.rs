//! Words of the Change room.

use case::{Moment, Now, Settings};

use super::values::{about, as_typed, clock, list, paco2_range, ph_range};
use bedside::Forecast;

/// The room.
pub const TITLE: &str = "Change a setting";
/// Its short name in the bar.
pub const BAR: &str = "Change";
/// Over the answer while a change is tried.
pub const SETTLES: &str = "PaCO₂ would settle at";
/// Over the answer while nothing is changed.
pub const UNCHANGED: &str = "Unchanged, PaCO₂ settles at";
/// Over the second number.
pub const PH: &str = "pH";
/// Where there is nothing to change yet.
pub const NOTHING_YET: &str = "There are no settings yet. Type a gas and the settings first.";
/// No rate, no volume to step.
pub const NO_STEPS: &str = "Neither a set rate nor a set volume is known. Type what was set under Settings.";
/// Under pressure control.
pub const READ_AGAIN: &str =
    "After the change read the expired volume again and type it: the forecast waits for it.";
/// Nothing is changed.
pub const STEP_FIRST: &str = "Change the rate or the volume first.";
/// The old value beside a stepper.
pub fn was(value: f64) -> String {
    format!("now {}", as_typed(value))
}
/// What is set, in short: the steppers are drawn anew when it is something else.
pub fn known(rate: Option<f64>, volume: Option<f64>) -> String {
    let words = |value: Option<f64>| value.map_or_else(|| "not set".to_owned(), as_typed);
    format!("{}, {}", words(rate), words(volume))
}
/// One less.
pub fn less(label: &str) -> String {
    format!("{label} down")
}
/// One more.
pub fn more(label: &str) -> String {
    format!("{label} up")
}
/// The button that writes.
pub fn made(label: &str, now: &Now) -> String {
    format!("{label}: I MADE THIS CHANGE, {}", clock(now.wall, now))
}
/// Goes back to the settings in force.
pub const UNDO: &str = "Back to what is set";
/// The compared curve's name on the chart.
pub fn compared(settings: &Settings, change: &Settings) -> String {
    let mut parts = vec![];
    if let (Some(old), Some(_)) = (settings.rate_per_min, change.rate_per_min) {
        parts.push(as_typed(old));
    }
    if let (Some(old), Some(_)) = (settings.tidal_volume_ml, change.tidal_volume_ml) {
        parts.push(format!("{} mL", as_typed(old)));
    }
    format!("if {}", parts.join(", "))
}
/// Price headings.
pub const PRICE: [&str; 3] = ["per kg", "plateau", "minute volume"];
/// Units under the prices.
pub const PRICE_UNITS: [&str; 3] = ["mL/kg", "cmH₂O", "L/min"];
/// What stands there while a price isn't known.
pub const PRICE_MISSING: [&str; 3] = ["height not known", "not typed", ""];

/// The answer in one sentence, said 700 ms after the last step.
pub fn said(change: &Settings, forecast: &Forecast) -> String {
    let settled = &forecast.settled;
    format!(
        "With {}: settles at {} ({}) mmHg, pH {} ({}).",
        changes(change),
        about(settled.paco2_mmhg.p50, 0),
        paco2_range(&settled.paco2_mmhg),
        about(settled.ph.p50, 2),
        ph_range(&settled.ph)
    )
}

/// What a change changes, in words.
pub fn changes(change: &Settings) -> String {
    let mut parts = vec![];
    if let Some(rate) = change.rate_per_min {
        parts.push(format!("rate {}/min", as_typed(rate)));
    }
    if let Some(volume) = change.tidal_volume_ml {
        parts.push(format!("tidal volume {} mL", as_typed(volume)));
    }
    if parts.is_empty() { "nothing changed".to_owned() } else { list(&parts) }
}

/// Said after a change was written.
pub fn written(change: &Settings, at: Moment, now: &Now) -> String {
    format!("Written: {} at {}.", changes(change), clock(at, now))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_button_names_the_case_and_the_time() {
        let now = Now::at(Moment(1_772_486_400_000)); // 21:20Z
        assert_eq!(made("Bed 3", &now), "Bed 3: I MADE THIS CHANGE, 21:20");
    }

    #[test]
    fn the_compared_curve_is_named_by_what_it_keeps() {
        let old = Settings { rate_per_min: Some(18.0), tidal_volume_ml: Some(340.0), ..Settings::default() };
        let rate = Settings { rate_per_min: Some(26.0), ..Settings::default() };
        assert_eq!(compared(&old, &rate), "if 18");
        let both = Settings { tidal_volume_ml: Some(360.0), ..rate };
        assert_eq!(compared(&old, &both), "if 18, 340 mL");
        assert_eq!(changes(&both), "rate 26/min and tidal volume 360 mL");
    }
}
