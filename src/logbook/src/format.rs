//! The case file: one JSON text with a version, read whole or refused with a sentence.

mod error;
pub(crate) mod json;
mod times;
pub(crate) mod v1;

use std::collections::BTreeMap;

use case::{Case, CaseError, Entry, EntryId, EntryKind};
use serde_json::{Map, Value};

pub(crate) use self::error::shown;
pub use self::error::{FileError, Place, Problem};
pub use self::times::{read_time, write_time};

/// Largest file that is parsed, bytes.
pub const LARGEST_FILE_BYTES: usize = 4_000_000;

/// Most entries of one case: one every four minutes for four weeks.
pub const MOST_ENTRIES: usize = 10_000;

const FORMAT: &str = "slackwater-case";
const VERSION: u64 = 1;

/// A case with everything of its file that this version does not understand.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct CaseFile {
    /// The case.
    pub case: Case,
    /// Entries as they were written, by id.
    raws: BTreeMap<EntryId, Value>,
    /// Fields and words of `person` that are not known.
    person_extra: Map<String, Value>,
    /// Outermost fields that are not known.
    extra: Map<String, Value>,
}

/// Reads a case file.
///
/// # Errors
/// [`FileError`]: one sentence with the entry, the field, the value, the limit and what to do. A file of more
/// than [`LARGEST_FILE_BYTES`] is refused before it is parsed.
pub fn read_case_file(text: &str) -> Result<CaseFile, FileError> {
    if text.len() > LARGEST_FILE_BYTES {
        return Err(FileError::TooLarge { bytes: text.len() as u64 });
    }
    v1::read_file(of_version_1(json::parse(text)?)?)
}

/// The outermost object when it is a case of version 1.
pub(crate) fn of_version_1(value: Value) -> Result<Map<String, Value>, FileError> {
    let Value::Object(map) = value else {
        return Err(FileError::NotACase { found: format!("it is {}", json::describe(&value)) });
    };
    let found = |name: &str| map.get(name).map_or_else(|| "missing".to_owned(), json::describe);
    if map.get("format").and_then(Value::as_str) != Some(FORMAT) {
        return Err(FileError::NotACase { found: format!("its format is {}", found("format")) });
    }
    match map.get("version").and_then(Value::as_u64) {
        Some(VERSION) => Ok(map),
        Some(version) if version > VERSION => Err(FileError::NewerVersion { version }),
        _ => Err(FileError::NoVersion { found: found("version") }),
    }
}

impl CaseFile {
    /// A file of `case`, written anew.
    #[must_use]
    pub fn new(case: Case) -> Self {
        Self { case, ..Self::default() }
    }

    /// The file's text, an entry a line. Entries that were read are written as they came.
    #[must_use]
    pub fn to_json(&self) -> String {
        let label = Value::from(self.case.label.as_str());
        let mut text = format!("{{\"format\":\"{FORMAT}\",\"version\":{VERSION},\"label\":{label}");
        let person = v1::person_object(&self.case.person, &self.person_extra);
        if !person.is_empty() {
            text.push_str(&format!(",\n\"person\":{}", Value::Object(person)));
        }
        for (name, value) in &self.extra {
            text.push_str(&format!(",\n{}:{value}", Value::from(name.as_str())));
        }
        let entries: Vec<String> = self.case.entries().iter().map(|entry| self.entry_json(entry)).collect();
        text.push_str(&format!(",\n\"entries\":[\n{}\n]}}\n", entries.join(",\n")));
        text
    }

    fn entry_json(&self, entry: &Entry) -> String {
        self.raws.get(&entry.id).map_or_else(|| v1::write_entry(entry).to_string(), Value::to_string)
    }

    /// What this version did not understand, each with its place: shown to the user, kept in the file.
    #[must_use]
    pub fn not_understood(&self) -> Vec<String> {
        let mut list: Vec<String> = Vec::new();
        list.extend(self.extra.keys().map(|name| at_place(&Place::File, name)));
        list.extend(self.person_extra.keys().map(|name| at_place(&Place::Person, name)));
        for entry in self.case.entries() {
            let place = Place::Entry(entry.id.0.clone());
            if let EntryKind::NotUnderstood(unknown) = &entry.kind {
                list.push(at_place(&place, &format!("kind {}", unknown.kind)));
            }
            list.extend(entry.not_understood.iter().map(|name| at_place(&place, name)));
        }
        list
    }

    /// Puts an entry in its place, with the text it came from.
    fn keep(&mut self, entry: Entry, raw: Value) -> Result<(), FileError> {
        let id = entry.id.clone();
        let differs =
            |_: CaseError| FileError::field(&Place::Entry(id.0.clone()), "id", Problem::SameIdDiffers);
        // Two copies may differ in what this version can't see.
        let unseen = !entry.not_understood.is_empty() || matches!(entry.kind, EntryKind::NotUnderstood(_));
        if unseen && self.raws.get(&id).is_some_and(|present| *present != raw) {
            return Err(differs(CaseError::SameIdDiffers(id.clone())));
        }
        self.case.add(entry).map_err(differs)?;
        self.raws.entry(id).or_insert(raw);
        Ok(())
    }

    /// Adds an entry made by an app, and returns it as it is to be stored.
    ///
    /// # Errors
    /// [`NotTaken`] when it would not be read back as it is, is outside its limits, or does not go with
    /// the others; the file is as it was.
    pub(crate) fn add(&mut self, entry: &Entry) -> Result<Value, NotTaken> {
        let raw = v1::write_entry(entry);
        let mut next = CaseFile { raws: BTreeMap::new(), ..self.clone() };
        next.case = Case::new(self.case.label.as_str());
        next.case.person = self.case.person;
        let raws = self.raws.values().cloned().chain([raw.clone()]).collect();
        let (next, faults) = v1::assemble(next, raws);
        if let Some((_, fault)) = faults.into_iter().next() {
            return Err(NotTaken::Fault(fault.in_words_for(self.case.person.age_group())));
        }
        if !next.case.entries().contains(entry) {
            return Err(NotTaken::ReadsOtherwise);
        }
        let meant =
            if let EntryKind::Correction(correction) = &entry.kind { &correction.of } else { &entry.id };
        v1::check_limits(&next.case, |id| id == meant).map_err(NotTaken::Fault)?;
        *self = next;
        Ok(raw)
    }

    /// Takes a person as it was read.
    pub(crate) fn replace_person(&mut self, read: v1::ReadPerson) {
        self.case.person = read.person;
        self.person_extra = read.extra;
    }

    /// Replaces the person and returns it as it is to be stored, with what was not understood in the old.
    ///
    /// # Errors
    /// [`NotTaken`] as [`CaseFile::add`].
    pub(crate) fn set_person(&mut self, person: case::Person) -> Result<Value, NotTaken> {
        let object = Value::Object(v1::person_object(&person, &self.person_extra));
        let read = v1::read_person(Some(&object)).map_err(NotTaken::Fault)?;
        if read.person != person {
            return Err(NotTaken::ReadsOtherwise);
        }
        self.replace_person(read);
        Ok(object)
    }
}

/// Why an entry of the app was not taken.
#[derive(Debug, Clone, PartialEq)]
pub(crate) enum NotTaken {
    /// It would be refused when read back.
    Fault(FileError),
    /// It would say something else when read back.
    ReadsOtherwise,
}

fn at_place(place: &Place, name: &str) -> String {
    format!("{place}, {}", shown(name))
}
