//! The draft kept on the device, so that a reload loses nothing typed. It is no record: only the last
//! state of the form, written over as it changes.

use case::Moment;
use serde_json::{Map, Value};

use super::choice::Choice;
use super::field::Field;
use super::sheet::Sheet;

/// Every key of a draft starts so.
pub const DRAFTS: &str = "slackwater.draft.";
/// Text that could not be read is kept under a key that starts so; the logbook lists it.
pub const SET_ASIDE: &str = "slackwater.set-aside.";

/// The key of a case's draft; of the next case's while none is open.
pub fn key(case: Option<&str>) -> String {
    format!("{DRAFTS}{}", case.unwrap_or("new"))
}

/// The sheet as text to keep; `None` when there is nothing in it.
pub fn to_text(sheet: &Sheet) -> Option<String> {
    if *sheet == Sheet::default() {
        return None;
    }
    let mut kept = Map::new();
    for field in Field::ALL {
        if !sheet.text(field).is_empty() {
            kept.insert(field.spec().name.to_owned(), Value::from(sheet.text(field)));
        }
    }
    for choice in Choice::ALL {
        if let Some(pick) = sheet.pick(choice) {
            kept.insert(choice.spec().name.to_owned(), Value::from(pick));
        }
    }
    for (name, at) in [("drawn_at_ms", sheet.drawn_at), ("changed_at_ms", sheet.changed_at)] {
        if let Some(at) = at {
            kept.insert(name.to_owned(), Value::from(at.0));
        }
    }
    kept.insert("pco2_in_kpa".to_owned(), Value::from(sheet.in_kpa(Field::Pco2)));
    kept.insert("po2_in_kpa".to_owned(), Value::from(sheet.in_kpa(Field::Po2)));
    kept.insert("answered".to_owned(), Value::from(sheet.answered.clone()));
    Some(Value::from(kept).to_string())
}

/// The sheet from kept text, and whether all of the text is in it.
pub fn from_text(text: &str) -> (Sheet, bool) {
    let Ok(Value::Object(kept)) = serde_json::from_str::<Value>(text) else {
        return (Sheet::default(), false);
    };
    let sheet = understood(&kept);
    let again = to_text(&sheet).and_then(|text| serde_json::from_str::<Value>(&text).ok());
    (sheet, again == Some(Value::from(kept)))
}

fn understood(kept: &Map<String, Value>) -> Sheet {
    let mut sheet = Sheet::default();
    for field in Field::ALL {
        if let Some(text) = kept.get(field.spec().name).and_then(Value::as_str) {
            sheet.set_text(field, text);
        }
    }
    for choice in Choice::ALL {
        let pick = kept.get(choice.spec().name).and_then(Value::as_u64);
        if let Some(pick) = pick.and_then(|pick| u8::try_from(pick).ok()) {
            sheet.restore_pick(choice, pick);
        }
    }
    let moment = |name: &str| kept.get(name).and_then(Value::as_i64).map(Moment);
    sheet.drawn_at = moment("drawn_at_ms");
    sheet.changed_at = moment("changed_at_ms");
    let flag = |name: &str| kept.get(name).and_then(Value::as_bool).unwrap_or(false);
    sheet.kpa = [flag("pco2_in_kpa"), flag("po2_in_kpa")];
    sheet.empty_unfixed_clocks();
    if let Some(answered) = kept.get("answered").and_then(Value::as_array) {
        sheet.answered = answered.iter().filter_map(Value::as_str).map(str::to_owned).collect();
    }
    sheet
}

#[cfg(test)]
mod tests {
    use super::*;
    use case::Now;

    #[test]
    fn what_was_typed_comes_back_raw() {
        let now = Now::at(Moment(1_772_486_400_000));
        let mut sheet = Sheet::default();
        sheet.set_unit(Field::Pco2, true);
        sheet.set_text(Field::Ph, "7,2.1");
        sheet.choose(Choice::Site, Some(1), &now);
        sheet.choose(Choice::Drawn, Some(3), &now);
        sheet.answered.push("14: mmHg or kPa?".to_owned());
        assert_eq!(from_text(&to_text(&sheet).unwrap()), (sheet, true));
        assert_eq!(to_text(&Sheet::default()), None);
    }

    #[test]
    fn a_damaged_draft_is_not_whole_and_what_is_readable_in_it_comes_back() {
        for text in ["", "{", "[]", "{\"site\":99,\"ph\":7}", "{\"drawn\":5,\"drawn_clock\":\"21:\"}"] {
            let (sheet, whole) = from_text(text);
            assert!(!whole && !sheet.any_text(&Field::ALL), "{text}");
        }
        let (sheet, whole) = from_text("{\"ph\":\"7.21\",\"from a newer version\":1}");
        assert!(!whole && sheet.text(Field::Ph) == "7.21");
    }
}
