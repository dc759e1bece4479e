//! Words of the forms: a gas, settings, their fields and keys.

use case::{Moment, Now};
use units::OutOfLimits;

use super::values::{as_typed, clock, day_and_clock, number};

/// kPa.
pub const KPA: &str = "kPa";
/// The unit button, spoken.
pub const OTHER_UNIT: &str = "Change the unit";
/// PO2 of a sample that is not arterial.
pub const PO2: &str = "PO₂";
/// Heading over what may be left out.
pub const OPTIONAL: &str = "If you have it: each narrows the forecast";
/// A chip is needed.
pub const CHOOSE_ONE: &str = "Choose one.";
/// What the first two chips mean.
pub const TUBE_PASSIVE: &str = "This means: a tube, no breaths of the patient's own, no leak.";
/// What the third chip means.
pub const TUBE_OWN: &str = "This means: a tube, own breaths, no leak.";
/// Mask.
pub const MASK: &str = "By mask there is no forecast: nobody knows what leaks. The gas is kept.";
/// No machine.
pub const UNAIDED: &str = "Without a machine there is no forecast. The gas is kept.";
/// An update.
pub const ONLY_CHANGED: &str = "Type only what has changed or was newly measured.";
/// Why a person is asked.
pub const PERSON_WHY: &str =
    "Nothing here tells who it is. Each narrows the forecast; height and sex give mL/kg.";

/// Something needed is missing.
pub fn needed(label: &str) -> String {
    format!("Needed: {label}.")
}

/// Not a time.
pub fn no_clock(text: &str) -> String {
    let text: String = text.chars().take(16).collect();
    format!("{text} is no time. Type hours and minutes, as in 21:10.")
}

/// A kPa value outside the limits.
pub fn in_mmhg(typed: f64, refused: &OutOfLimits) -> String {
    format!("{} kPa is {} mmHg. {refused}", as_typed(typed), number(refused.value, 0))
}

/// A value outside the limits that may have been read in kPa.
pub fn perhaps_kpa(refused: &OutOfLimits) -> String {
    if refused.value < refused.limit.least {
        format!("{refused} If it is kPa, touch the unit.")
    } else {
        refused.to_string()
    }
}

/// The Gas room.
pub const GAS_TITLE: &str = "Type a gas";
/// The Settings room.
pub const SETTINGS_TITLE: &str = "Settings";
/// Goes on to the settings.
pub const TO_SETTINGS: &str = "SETTINGS";
/// Gives the first answer.
pub const ANSWER: &str = "ANSWER";
/// Writes to a case that has a label.
pub fn answer_for(label: &str) -> String {
    format!("{label}: ANSWER")
}
/// Writes settings to a case that has a label.
pub fn write_settings(label: &str) -> String {
    format!("{label}: WRITE SETTINGS")
}
/// Under the button of a later gas.
pub fn settings_same(since: Moment, now: &Now) -> String {
    format!("Settings unchanged since {}", clock(since, now))
}
/// Beside it.
pub const SETTINGS_OTHER: &str = "Settings have changed";
/// After half an hour away.
pub fn still(label: &str) -> String {
    format!("Still {label}?")
}
/// The moment that a chip or a clock time stands for.
pub fn time_meant(at: Moment, now: &Now) -> String {
    format!("That is {}.", day_and_clock(at, now))
}
/// A moment more than half a day back.
pub fn far_back(label: &str, at: Moment, now: &Now) -> String {
    format!("{label} {}, more than 12 h ago: is that right?", day_and_clock(at, now))
}
/// PO2 stands in another unit than PCO2.
pub fn po2_unit(typed: f64, as_kpa_mmhg: f64) -> String {
    format!("PO₂ {}: did you read mmHg, or kPa ({} mmHg)?", as_typed(typed), number(as_kpa_mmhg, 0))
}
/// The old value as a hint.
pub fn was(value: f64) -> String {
    format!("was {}", as_typed(value))
}
/// Nothing has been typed.
pub const NOTHING_TYPED: &str = "Nothing new is typed. Type what has changed, or go back.";
/// A gas was begun and isn't whole.
pub const GAS_UNFINISHED: &str =
    "The gas isn't finished: something in it is missing, wrong or asked. See to it, or empty its fields.";

/// As typed.
pub const AS_TYPED: &str = "It is as typed";
/// Goes to the field.
pub const MEND_IT: &str = "Mend it";
/// Reads a number as mmHg.
pub fn is_mmhg(typed: f64) -> String {
    format!("{} mmHg", as_typed(typed))
}
/// Reads a number as kPa.
pub fn is_kpa(typed: f64, mmhg: f64) -> String {
    format!("{} kPa ({} mmHg)", as_typed(typed), number(mmhg, 0))
}

/// The keypad, spoken.
pub const KEYPAD: &str = "Keypad";
/// Goes to the next field.
pub const NEXT: &str = "Next";
/// Deletes one.
pub const DELETE: &str = "Delete";
/// Pastes.
pub const PASTE: &str = "Paste";
/// Uses the phone's keypad.
pub const PHONE_KEYS: &str = "Phone keys";
/// Uses our keypad.
pub const OUR_KEYS: &str = "Large keys";
/// Closes the keypad.
pub const CLOSE_KEYS: &str = "Close";
/// Two separators.
pub const ONE_POINT: &str = "One point or comma is enough.";
/// Long enough.
pub const LONG_ENOUGH: &str = "No more digits fit.";
/// The browser refuses to paste.
pub const NO_PASTE: &str = "Nothing to paste, or this browser doesn't allow it.";
