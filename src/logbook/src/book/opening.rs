//! Opening a book: every record read, what can't be read moved aside and named.

use std::collections::BTreeMap;

use case::{Case, Moment};
use serde_json::Value;

use super::{Book, BookError, CaseId, Kept};
use crate::format::{of_version_1, v1};
use crate::journal::{
    OPEN_CASE, Record, SetAside, Unread, What, earlier_set_aside, journal_keys, move_aside,
};
use crate::{CaseFile, FileError, Shelf};

/// The label of a case of which only entries could be read.
const LABEL_LOST: &str = "Recovered case";

/// A record with the key it came from.
struct Found {
    key: String,
    text: String,
    record: Record,
}

/// What reading found that is not in a case.
#[derive(Default)]
struct Aside {
    /// To be moved.
    damaged: Vec<(String, String, String)>,
    /// Sound, but of no use here and now: left in place.
    left: Vec<SetAside>,
}

impl Aside {
    fn damaged(&mut self, found: Found, why: String) {
        self.damaged.push((found.key, why, found.text));
    }

    fn leave(&mut self, key: &str, text: &str, why: String) {
        self.left.push(SetAside { key: key.to_owned(), why, text: text.to_owned() });
    }
}

impl<S: Shelf> Book<S> {
    /// Reads every record on the shelf. What can't be read is moved aside and listed in
    /// [`Book::set_aside`]; what a newer version wrote is left in place and listed too.
    ///
    /// # Errors
    /// [`BookError::Unreadable`] when the shelf gives nothing at all.
    pub fn open(mut shelf: S) -> Result<Self, BookError> {
        let mut set_aside = earlier_set_aside(&shelf, why_aside).map_err(BookError::Unreadable)?;
        let mut aside = Aside::default();
        let mut by_case: BTreeMap<CaseId, Vec<Found>> = BTreeMap::new();
        for key in journal_keys(&shelf).map_err(BookError::Unreadable)? {
            let Some(text) = shelf.get(&key).map_err(BookError::Unreadable)? else { continue };
            match Record::read(&text) {
                Ok(record) => {
                    by_case.entry(record.case.clone()).or_default().push(Found { key, text, record });
                }
                Err(Unread::TooNew(why)) => aside.leave(&key, &text, why),
                Err(Unread::Damaged(why)) => aside.damaged.push((key, why, text)),
            }
        }
        let read = by_case.into_iter().map(|(id, found)| (id, read_case(found, &mut aside)));
        let cases: BTreeMap<CaseId, Kept> =
            read.filter_map(|(id, kept)| kept.map(|kept| (id, kept))).collect();
        for (key, why, text) in aside.damaged {
            set_aside.push(move_aside(&mut shelf, key, why, text));
        }
        set_aside.extend(aside.left);
        let open = shelf.get(OPEN_CASE).map_err(BookError::Unreadable)?.map(CaseId);
        Ok(Self { shelf, cases, open, set_aside, refused: vec![] })
    }
}

/// Puts the records of one case together; `None` when none of them could be used.
fn read_case(mut found: Vec<Found>, aside: &mut Aside) -> Option<Kept> {
    // Keys are in order already, so that of two written at the same moment the later key holds.
    found.sort_by_key(|f| f.record.written_at);
    let mut kept = Kept { last_written: Moment(i64::MIN), ..Kept::default() };
    kept.file.case = Case::new(LABEL_LOST);
    let mut raws = Vec::new();
    let mut origins = Vec::new();
    let mut used = false;
    for one in found {
        let written_at = one.record.written_at;
        match take(&one.record, &mut kept.file) {
            Ok(entries) => {
                used = true;
                kept.last_written = kept.last_written.max(written_at);
                if one.record.what != What::Entry {
                    kept.head_written = kept.head_written.max(written_at);
                }
                if !entries.is_empty() {
                    origins.push((raws.len(), one));
                    raws.extend(entries);
                }
            }
            Err(error @ FileError::NewerVersion { .. }) => {
                aside.leave(&one.key, &one.text, error.to_string())
            }
            Err(error) => aside.damaged(one, error.to_string()),
        }
    }
    let (file, faults) = v1::assemble(std::mem::take(&mut kept.file), raws);
    kept.file = file;
    name_faults(faults, origins, aside);
    used.then_some(kept)
}

/// Takes what a record says beside entries into `file`, and returns the entries it holds.
fn take(record: &Record, file: &mut CaseFile) -> Result<Vec<Value>, FileError> {
    match record.what {
        What::Entry => return Ok(vec![record.body.clone()]),
        What::Case => {
            let (head, entries) = v1::read_head(of_version_1(record.body.clone())?)?;
            *file = head;
            return Ok(entries);
        }
        What::Person => file.replace_person(v1::read_person(Some(&record.body))?),
        What::Label => file.case.label = v1::read_label(&record.body)?,
    }
    Ok(vec![])
}

/// Says which records hold entries that could not be used. A record that is one damaged entry is moved;
/// one that is sound but goes with no other entry here, or holds more than the one, stays in place.
fn name_faults(faults: Vec<(usize, FileError)>, origins: Vec<(usize, Found)>, aside: &mut Aside) {
    let mut faults: BTreeMap<usize, FileError> = faults.into_iter().collect();
    for (first, found) in origins.into_iter().rev() {
        let own = faults.split_off(&first);
        let moves = found.record.what == What::Entry && own.values().all(|fault| !fault.is_about_another());
        if moves && let Some(fault) = own.values().next() {
            aside.damaged(found, fault.to_string());
        } else {
            own.values().for_each(|fault| aside.leave(&found.key, &found.text, fault.to_string()));
        }
    }
}

/// Why a text was set aside by an earlier session, found out anew.
fn why_aside(text: &str) -> String {
    let fault = match Record::read(text) {
        Err(Unread::TooNew(why) | Unread::Damaged(why)) => return why,
        Ok(Record { what: What::Entry, body, .. }) => v1::read_entry(&body, 1).err(),
        Ok(record) => take(&record, &mut CaseFile::default()).err(),
    };
    fault.map_or_else(|| "It was set aside earlier and can be read now.".to_owned(), |f| f.to_string())
}
