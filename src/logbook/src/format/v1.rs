//! Version 1 of the case file: JSON values mapped by hand, so that what is not known is kept as it came.

mod fields;
mod read;
mod words;
mod write;

use std::collections::{BTreeMap, BTreeSet};

use case::{Case, Entry, EntryId, EntryKind, Moment, NotUnderstood, Person};
use serde_json::{Map, Value};
use units::AgeGroup;

use self::fields::object;
use self::read::{Opened, only_kind, open_entry, read_kind, target};
use self::words::kind;
use super::json::describe;
use super::{CaseFile, FileError, MOST_ENTRIES, Place, Problem};

pub(crate) use self::read::{ReadPerson, read_person};
pub(crate) use self::write::write_entry;
use self::write::write_person;

/// What a correction may not change.
const NOT_CORRECTABLE: [&str; 4] = ["id", "kind", "written_at", "utc_offset_min"];

/// Reads a file whose format and version were found right.
pub(super) fn read_file(map: Map<String, Value>) -> Result<CaseFile, FileError> {
    let (head, raws) = read_head(map)?;
    let (file, faults) = assemble(head, raws);
    if let Some((_, first)) = faults.into_iter().min_by_key(|(index, _)| *index) {
        return Err(first.in_words_for(file.case.person.age_group()));
    }
    check_limits(&file.case, |_| true)?;
    check_verdicts(&file.case)?;
    Ok(file)
}

/// Takes the file apart: all but its entries, and its entries unread.
///
/// # Errors
/// When a field beside the entries is wrong.
pub(crate) fn read_head(mut map: Map<String, Value>) -> Result<(CaseFile, Vec<Value>), FileError> {
    let mut take = |name: &str| map.shift_remove(name).filter(|value| !value.is_null());
    take("format");
    take("version");
    let label = read_label(&take("label").unwrap_or_default())?;
    let person = read_person(take("person").as_ref())?;
    let entries = match take("entries") {
        Some(Value::Array(entries)) => entries,
        Some(other) => return Err(wrong_type("entries", &other, "a list. Write it in square brackets")),
        None => {
            let advice = "Write an empty list when there are none.";
            return Err(FileError::field(&Place::File, "entries", Problem::Missing { advice }));
        }
    };
    if entries.len() > MOST_ENTRIES {
        return Err(FileError::TooManyEntries { count: entries.len() });
    }
    let mut case = Case::new(label);
    case.person = person.person;
    Ok((CaseFile { case, raws: BTreeMap::new(), person_extra: person.extra, extra: map }, entries))
}

/// Reads the label; empty where none is given.
pub(crate) fn read_label(value: &Value) -> Result<String, FileError> {
    match value {
        Value::Null => Ok(String::new()),
        Value::String(label) => Ok(label.clone()),
        other => Err(wrong_type("label", other, "a text. Write it in quotes")),
    }
}

fn wrong_type(name: &str, found: &Value, wanted: &'static str) -> FileError {
    FileError::field(&Place::File, name, Problem::WrongType { found: describe(found), wanted })
}

/// Reads `raws` into `file`, corrections last and in the order in which they were written: each gives
/// only what is new, over its entry as corrected before. What can't be read is returned with its place
/// in the list; the rest is in the case.
pub(crate) fn assemble(mut file: CaseFile, raws: Vec<Value>) -> (CaseFile, Vec<(usize, FileError)>) {
    let mut faults = Vec::new();
    let mut drafts = Vec::new();
    for (index, raw) in raws.into_iter().enumerate() {
        let result = match read_entry(&raw, index + 1) {
            Ok(Read::Entry(entry)) => file.keep(entry, raw),
            Ok(Read::Correction(draft)) => {
                drafts.push((index, draft, raw));
                Ok(())
            }
            Err(error) => Err(error),
        };
        faults.extend(result.err().map(|error| (index, error)));
    }
    drafts.sort_by(|(_, a, _), (_, b, _)| a.order().cmp(&b.order()));
    let ids: BTreeSet<EntryId> = drafts.iter().map(|(_, draft, _)| draft.entry.id.clone()).collect();
    let mut corrected = BTreeMap::new();
    for (index, draft, raw) in drafts {
        let result = draft.resolve(&file, &ids, &mut corrected).and_then(|entry| file.keep(entry, raw));
        faults.extend(result.err().map(|error| (index, error)));
    }
    (file, faults)
}

/// An entry read on its own.
pub(crate) enum Read {
    /// Whole.
    Entry(Entry),
    /// A correction, whose meaning needs the entry it corrects.
    Correction(Draft),
}

/// Reads one entry; `number` names it, counted from 1, when it has no id.
pub(crate) fn read_entry(raw: &Value, number: usize) -> Result<Read, FileError> {
    let Opened { mut entry, kind, mut fields, map } = open_entry(raw, number)?;
    if kind == kind::CORRECTION {
        let of = target(&mut fields)?;
        let values = fields.value("values");
        let values = fields.needed("values", values, "Write the new values in braces.")?;
        let values = object(values, fields.place(), "values")?.clone();
        for name in NOT_CORRECTABLE {
            if values.contains_key(name) {
                return Err(fields.error(&format!("values.{name}"), Problem::NotCorrectable));
            }
        }
        entry.not_understood = fields.left_over();
        return Ok(Read::Correction(Draft { entry, of, values }));
    }
    let mut fields = only_kind(map, fields.place().clone());
    entry.kind = read_kind(kind, &mut fields)?;
    let kind_known = !matches!(entry.kind, EntryKind::NotUnderstood(_)) || fields.has_strange();
    if kind_known {
        entry.not_understood = fields.left_over();
    }
    Ok(Read::Entry(entry))
}

/// A correction before its entry is known.
pub(crate) struct Draft {
    entry: Entry,
    of: EntryId,
    values: Map<String, Value>,
}

impl Draft {
    /// The order in which corrections apply: that of `Case::resolved`.
    fn order(&self) -> (Moment, &EntryId) {
        (self.entry.written_at.unwrap_or(self.entry.at), &self.entry.id)
    }

    fn resolve(
        self,
        file: &CaseFile,
        corrections: &BTreeSet<EntryId>,
        corrected: &mut BTreeMap<EntryId, Map<String, Value>>,
    ) -> Result<Entry, FileError> {
        let Draft { mut entry, of, values } = self;
        let place = Place::Entry(entry.id.0.clone());
        let wrong = |problem| Err(FileError::field(&place, "of", problem));
        if corrections.contains(&of) {
            return wrong(Problem::CorrectsACorrection { of: super::error::shown(&of.0) });
        }
        let Some(original) = file.raws.get(&of).and_then(Value::as_object) else {
            return wrong(Problem::NoSuchEntry { of: super::error::shown(&of.0) });
        };
        let unread = EntryKind::NotUnderstood(NotUnderstood { kind: kind::CORRECTION.to_owned() });
        let unreadable = |e: &&Entry| e.id == of && matches!(e.kind, EntryKind::NotUnderstood(_));
        if file.case.entries().iter().any(|e| unreadable(&e)) {
            return Ok(Entry { kind: unread, ..entry });
        }
        let mut whole = corrected.get(&of).unwrap_or(original).clone();
        whole.extend(values.iter().map(|(name, value)| (name.clone(), value.clone())));
        let name = whole.get("kind").and_then(Value::as_str).unwrap_or_default().to_owned();
        let at = only_kind(&values, place.clone()).moment("at")?;
        let mut fields = only_kind(&whole, place.clone());
        let says = read_kind(&name, &mut fields)?;
        let strange = fields.left_over().into_iter().filter(|name| values.contains_key(name));
        entry.not_understood.extend(strange.map(|name| format!("values.{name}")));
        entry.kind = if matches!(says, EntryKind::NotUnderstood(_)) {
            unread
        } else {
            corrected.insert(of.clone(), whole);
            EntryKind::Correction(case::Correction { of, at, kind: Box::new(says) })
        };
        Ok(entry)
    }
}

/// Checks what stands after corrections against the limits of the person's age. What a correction has
/// replaced is history and stays readable whatever the age is now.
///
/// # Errors
/// The first value outside, among the entries that `which` picks.
pub(crate) fn check_limits(case: &Case, which: impl Fn(&EntryId) -> bool) -> Result<(), FileError> {
    let group = case.person.age_group();
    case.resolved().iter().filter(|entry| which(&entry.id)).try_for_each(|entry| within(entry, group))
}

fn within(entry: &Entry, group: AgeGroup) -> Result<(), FileError> {
    let (name, says) = write::write_kind(&entry.kind);
    let mut fields = only_kind(&says, Place::Entry(entry.id.0.clone())).within(group);
    match entry.kind {
        EntryKind::NotUnderstood(_) => Ok(()),
        _ => read_kind(name, &mut fields).map(drop),
    }
}

fn check_verdicts(case: &Case) -> Result<(), FileError> {
    for entry in case.entries() {
        if let EntryKind::GasVerdict(verdict) = &entry.kind
            && !case.entries().iter().any(|e| e.id == verdict.of)
        {
            let of = super::error::shown(&verdict.of.0);
            let place = Place::Entry(entry.id.0.clone());
            return Err(FileError::field(&place, "of", Problem::NoSuchEntry { of }));
        }
    }
    Ok(())
}

/// A person typed in the app, over what an earlier version of the file carried beside it.
pub(crate) fn person_object(person: &Person, extra: &Map<String, Value>) -> Map<String, Value> {
    let mut map = extra.clone();
    map.extend(write_person(person));
    map
}
