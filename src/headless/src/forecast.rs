//! The command `forecast`.

use bedside::Study;
use case::{Case, Moment, Now};
use logbook::write_time;
use serde_json::Value;

use crate::args::Asked;
use crate::input;

/// The forecast asked for, as JSON.
///
/// # Errors
/// One line when the file can't be used, or the moment lies before everything in it.
pub fn answer(asked: &Asked) -> Result<String, String> {
    let file = input::read(&asked.path)?;
    let at = moment(asked, &file.case)?;
    let (case, left_out) = known_at(&file.case, at)?;
    let answer = Study::new(&case, asked.options).forecast(&Now::at(at), None, &asked.minutes);
    let mut map = handover::forecast_value(&answer);
    map.insert("at".to_owned(), write_time(at).map_or(Value::Null, Value::from));
    map.insert("entries_after_at".to_owned(), Value::from(left_out));
    map.insert("not_understood".to_owned(), Value::from(file.not_understood()));
    Ok(Value::Object(map).to_string())
}

/// The moment counted from: the one asked for, else the last entry's.
fn moment(asked: &Asked, case: &Case) -> Result<Moment, String> {
    let path = asked.path.display();
    let first = case.resolved().first().map(|entry| entry.at);
    let last = case.last_at();
    match (asked.at, first) {
        (Some(at), Some(first)) if at < first => {
            let said = |moment| write_time(moment).unwrap_or_default();
            Err(format!(
                "--at {} lies before the first entry of {path}, {}. Ask for that moment or a later one.",
                said(at),
                said(first)
            ))
        }
        (Some(at), _) => Ok(at),
        (None, _) => last.ok_or_else(|| {
            format!("{path}: has no entries to count from. Add a gas and settings, or give --at.")
        }),
    }
}

/// The case as far as it had come at `at`, and how many entries lie after it: an answer for an earlier moment
/// must not know what came later.
fn known_at(case: &Case, at: Moment) -> Result<(Case, usize), String> {
    let mut known = Case::new(case.label.as_str());
    known.person = case.person;
    let (before, after): (Vec<_>, Vec<_>) = case.entries().iter().partition(|entry| entry.at <= at);
    before.into_iter().try_for_each(|entry| known.add(entry.clone())).map_err(|error| error.to_string())?;
    Ok((known, after.len()))
}
