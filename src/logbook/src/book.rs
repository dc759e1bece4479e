//! The book: every case on the shelf, read once and written record by record.

mod opening;

use std::collections::BTreeMap;

use case::{Case, Entry, Moment, Now, Person};
use serde_json::Value;

use crate::format::NotTaken;
use crate::journal::{OPEN_CASE, Outgoing, What};
use crate::{CaseFile, FileError, SetAside, Shelf, ShelfError, read_case_file};

/// A case's own name on this device; never shown.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct CaseId(pub String);

/// Why the book could not do what was asked.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum BookError {
    /// The shelf can't be read at all.
    #[error("What is stored on this device can't be read: {0}")]
    Unreadable(ShelfError),
    /// The shelf refused. What was written is in the case as long as the page stays open; see
    /// [`Book::unsaved`].
    #[error("Not stored on this device: {0} It is kept while this page stays open. Export the case now.")]
    NotStored(ShelfError),
    /// No case has this id.
    #[error("This case is not in the book. Open another one.")]
    NoSuchCase,
    /// A case has this id already.
    #[error("A case with this id is in the book already.")]
    CaseExists,
    /// The file, or what was to be written, is refused; nothing has changed.
    #[error("{0}")]
    Refused(#[from] FileError),
    /// It would say something else when read back; nothing has changed.
    #[error("This can't be stored as it is: read back, it would say something else. Nothing was written.")]
    ReadsOtherwise,
}

impl From<NotTaken> for BookError {
    fn from(reason: NotTaken) -> Self {
        match reason {
            NotTaken::Fault(fault) => BookError::Refused(fault),
            NotTaken::ReadsOtherwise => BookError::ReadsOtherwise,
        }
    }
}

/// One case in memory.
#[derive(Debug, Default)]
struct Kept {
    file: CaseFile,
    /// The last record of person or label, so that the next one counts as later though the clock was set back.
    head_written: Moment,
    /// The last record of any kind.
    last_written: Moment,
}

/// Every case on a shelf.
#[derive(Debug)]
pub struct Book<S: Shelf> {
    shelf: S,
    cases: BTreeMap<CaseId, Kept>,
    open: Option<CaseId>,
    set_aside: Vec<SetAside>,
    /// Records the shelf refused, in the order in which they were written.
    refused: Vec<Outgoing>,
}

impl<S: Shelf> Book<S> {
    /// Texts that could not be read or used, of this session and of earlier ones.
    #[must_use]
    pub fn set_aside(&self) -> &[SetAside] {
        &self.set_aside
    }

    /// The cases, the one last written in first.
    #[must_use]
    pub fn cases(&self) -> Vec<(&CaseId, &Case)> {
        let mut list: Vec<_> = self.cases.iter().collect();
        list.sort_by_key(|(id, kept)| (std::cmp::Reverse(kept.last_written), *id));
        list.into_iter().map(|(id, kept)| (id, &kept.file.case)).collect()
    }

    /// The open case: the one selected last, or the one last written in when that is not known.
    #[must_use]
    pub fn open_case(&self) -> Option<(&CaseId, &Case)> {
        let selected = self.open.as_ref().and_then(|id| self.cases.get_key_value(id));
        selected.map(|(id, kept)| (id, &kept.file.case)).or_else(|| self.cases().into_iter().next())
    }

    /// A case with what this version did not understand in it.
    #[must_use]
    pub fn file(&self, id: &CaseId) -> Option<&CaseFile> {
        self.cases.get(id).map(|kept| &kept.file)
    }

    /// Opens a case.
    ///
    /// # Errors
    /// [`BookError::NoSuchCase`]; [`BookError::NotStored`] when the choice will not outlive the page.
    pub fn select(&mut self, id: &CaseId) -> Result<(), BookError> {
        if !self.cases.contains_key(id) {
            return Err(BookError::NoSuchCase);
        }
        self.open = Some(id.clone());
        self.shelf.put(OPEN_CASE, &id.0).map_err(BookError::NotStored)
    }

    /// Starts a case and opens it.
    ///
    /// # Errors
    /// [`BookError::CaseExists`]; [`BookError::NotStored`] with the case in memory.
    pub fn new_case(&mut self, id: CaseId, label: &str, now: &Now) -> Result<(), BookError> {
        self.start(id, CaseFile::new(Case::new(label)), now)
    }

    /// Reads a case file as a new case and opens it; what is not understood in it is kept.
    ///
    /// # Errors
    /// [`BookError::Refused`] when the file can't be read, [`BookError::CaseExists`];
    /// [`BookError::NotStored`] with the case in memory.
    pub fn import(&mut self, id: CaseId, text: &str, now: &Now) -> Result<(), BookError> {
        self.start(id, read_case_file(text)?, now)
    }

    /// The case as a case file.
    ///
    /// # Errors
    /// [`BookError::NoSuchCase`].
    pub fn export(&self, id: &CaseId) -> Result<String, BookError> {
        self.file(id).map(CaseFile::to_json).ok_or(BookError::NoSuchCase)
    }

    /// Writes an entry: stored first, then in the case. The very same entry again changes nothing.
    ///
    /// # Errors
    /// [`BookError::NoSuchCase`]; [`BookError::Refused`] and [`BookError::ReadsOtherwise`] with nothing
    /// changed; [`BookError::NotStored`] with the entry in the case and counted in [`Book::unsaved`].
    pub fn append(&mut self, id: &CaseId, entry: Entry) -> Result<(), BookError> {
        let kept = self.cases.get_mut(id).ok_or(BookError::NoSuchCase)?;
        if kept.file.case.entries().contains(&entry) {
            return self.retry();
        }
        let raw = kept.file.add(&entry)?;
        let written_at = entry.written_at.unwrap_or(entry.at);
        kept.last_written = kept.last_written.max(written_at);
        self.store(Outgoing::new(id, What::Entry, written_at, &entry.id.0, &raw.to_string()))
    }

    /// Writes who the patient is, whole.
    ///
    /// # Errors
    /// As [`Book::append`].
    pub fn set_person(&mut self, id: &CaseId, person: Person, now: &Now) -> Result<(), BookError> {
        let kept = self.cases.get_mut(id).ok_or(BookError::NoSuchCase)?;
        if kept.file.case.person == person {
            return self.retry();
        }
        let body = kept.file.set_person(person)?;
        self.store_head(id, What::Person, &body, now)
    }

    /// Writes the label.
    ///
    /// # Errors
    /// [`BookError::NoSuchCase`]; [`BookError::NotStored`] with the label in memory.
    pub fn set_label(&mut self, id: &CaseId, label: &str, now: &Now) -> Result<(), BookError> {
        let kept = self.cases.get_mut(id).ok_or(BookError::NoSuchCase)?;
        if kept.file.case.label == label {
            return self.retry();
        }
        label.clone_into(&mut kept.file.case.label);
        self.store_head(id, What::Label, &Value::from(label), now)
    }

    /// How many entries (and persons, labels, starts of cases) are only in memory because the shelf refused.
    #[must_use]
    pub fn unsaved(&self) -> usize {
        self.refused.iter().map(|record| record.weight).sum()
    }

    /// Tries again to store what the shelf refused; every write does so first.
    ///
    /// # Errors
    /// [`BookError::NotStored`] when something is still refused.
    pub fn retry(&mut self) -> Result<(), BookError> {
        let mut last = Ok(());
        let shelf = &mut self.shelf;
        self.refused.retain(|record| match record.put(shelf) {
            Ok(()) => false,
            Err(refusal) => {
                last = Err(BookError::NotStored(refusal));
                true
            }
        });
        last
    }

    fn start(&mut self, id: CaseId, file: CaseFile, now: &Now) -> Result<(), BookError> {
        if self.cases.contains_key(&id) {
            return Err(BookError::CaseExists);
        }
        let mut record = Outgoing::new(&id, What::Case, now.wall, "", &file.to_json());
        record.weight += file.case.entries().len();
        let (head_written, last_written) = (now.wall, now.wall);
        self.cases.insert(id.clone(), Kept { file, head_written, last_written });
        let stored = self.store(record);
        let selected = self.select(&id);
        stored.and(selected)
    }

    fn store_head(&mut self, id: &CaseId, what: What, body: &Value, now: &Now) -> Result<(), BookError> {
        let kept = self.cases.get_mut(id).ok_or(BookError::NoSuchCase)?;
        kept.head_written = now.wall.max(Moment(kept.head_written.0.saturating_add(1)));
        kept.last_written = kept.last_written.max(kept.head_written);
        let record = Outgoing::new(id, what, kept.head_written, "", &body.to_string());
        self.store(record)
    }

    /// Stores a record after those that were refused before it; each stands on its own, so that one that
    /// is still refused holds up no other.
    fn store(&mut self, record: Outgoing) -> Result<(), BookError> {
        // What is refused again stays counted in `unsaved`.
        let _ = self.retry();
        record.put(&mut self.shelf).map_err(|refusal| {
            self.refused.push(record);
            BookError::NotStored(refusal)
        })
    }
}
