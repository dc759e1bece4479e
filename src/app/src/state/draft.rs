//! The draft kept on the device, so that a reload loses nothing typed. It is no record: only the last
//! state of the form, written over as it changes.

use case::Moment;
use serde_json::{Map, Value};

use super::choice::Choice;
use super::field::Field;
use super::sheet::Sheet;

/// The key of a case's draft; of the next case's while none is open.
pub fn key(case: Option<&str>) -> String {
    format!("slackwater.draft.{}", case.unwrap_or("new"))
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
    kept.insert("kpa".to_owned(), Value::from(sheet.kpa));
    kept.insert("answered".to_owned(), Value::from(sheet.answered.clone()));
    Some(Value::from(kept).to_string())
}

/// The sheet from kept text. What it does not know is left out: a draft is no record.
pub fn from_text(text: &str) -> Sheet {
    let mut sheet = Sheet::default();
    let Ok(Value::Object(kept)) = serde_json::from_str::<Value>(text) else { return sheet };
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
    sheet.kpa = kept.get("kpa").and_then(Value::as_bool).unwrap_or(false);
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
        sheet.kpa = true;
        sheet.set_text(Field::Ph, "7,2.1");
        sheet.choose(Choice::Site, Some(1), &now);
        sheet.choose(Choice::Drawn, Some(3), &now);
        sheet.answered.push("14: mmHg or kPa?".to_owned());
        assert_eq!(from_text(&to_text(&sheet).unwrap()), sheet);
        assert_eq!(to_text(&Sheet::default()), None);
    }

    #[test]
    fn a_damaged_draft_is_an_empty_one() {
        for text in ["", "{", "[]", "{\"site\":99,\"ph\":7}"] {
            assert_eq!(from_text(text), Sheet::default(), "{text}");
        }
    }
}
