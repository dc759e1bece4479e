//! What the rooms do to the book: write entries, start, open, import and export cases.

use case::{Entry, EntryId, EntryKind, Moment};
use leptos::prelude::*;
use logbook::{Book, BookError, CaseId};

use super::app::App;
use super::{choice::Choice, demo, field::Field, room::Room, sheet::Sheet};
use crate::device::{clock, ids, page, shelf::LocalShelf};
use crate::words::{person, start as words};

impl App {
    /// Entries that are only in memory.
    pub fn unsaved(self) -> usize {
        self.revision.track();
        self.book.with_value(Book::unsaved)
    }

    /// Texts that were moved aside: key, why, text.
    pub fn set_aside(self) -> Vec<logbook::SetAside> {
        self.revision.track();
        self.book.with_value(|book| book.set_aside().to_vec())
    }

    /// Every case but the open one: id and label.
    pub fn other_cases(self) -> Vec<(CaseId, String)> {
        let open = self.open.with(|open| open.as_ref().map(|open| open.id.clone()));
        self.book.with_value(|book| {
            let all = book.cases().into_iter();
            all.filter(|(id, _)| Some(*id) != open.as_ref())
                .map(|(id, case)| (id.clone(), case.label.clone()))
                .collect()
        })
    }

    /// Does something to the book; says what went wrong. True when it happened, kept or not.
    fn change(self, act: impl FnOnce(&mut Book<LocalShelf>) -> Result<(), BookError>) -> bool {
        let mut result = Ok(());
        self.book.update_value(|book| result = act(book));
        self.revision.update(|revision| *revision += 1);
        self.tick();
        let done = matches!(result, Ok(()) | Err(BookError::NotStored(_)));
        // Entries that could not be stored are counted on every screen: that says it once.
        let said_already = done && self.book.with_value(Book::unsaved) > 0;
        let trouble = result.err().filter(|_| !said_already);
        self.trouble.set(trouble.map(|error| error.to_string()).unwrap_or_default());
        done
    }

    fn fresh_id(self) -> Option<String> {
        let id = ids::fresh();
        if id.is_none() {
            self.trouble.set(words::NO_IDS.to_owned());
        }
        id
    }

    /// Writes entries into the open case, in order. False when one was refused.
    pub fn write(self, entries: Vec<(Moment, EntryKind)>) -> bool {
        let Some(id) = self.open.with_untracked(|open| open.as_ref().map(|open| open.id.clone())) else {
            return false;
        };
        let done = entries.into_iter().all(|(at, kind)| self.write_one(&id, at, kind));
        // With this one, earlier entries may have found room too: then the draft is kept again.
        self.keep_draft();
        done
    }

    fn write_one(self, case: &CaseId, at: Moment, kind: EntryKind) -> bool {
        let Some(id) = self.fresh_id() else { return false };
        let now = clock::now();
        let entry = Entry {
            id: EntryId(id),
            at,
            written_at: Some(now.wall),
            utc_offset_min: Some(now.utc_offset_min),
            kind,
            not_understood: vec![],
        };
        self.change(|book| book.append(case, entry))
    }

    /// Starts a case, empty.
    fn begin(self, label: Option<&str>) -> bool {
        let Some(id) = self.fresh_id() else { return false };
        let number = self.book.with_value(|book| book.cases().len()) + 1;
        let label = label.map_or_else(|| person::default_label(number), str::to_owned);
        let now = clock::now();
        self.change_to(&CaseId(id), |book, id| book.new_case(id.clone(), &label, &now))
    }

    /// Does something to the book that opens the case `id` in it.
    fn change_to(
        self,
        id: &CaseId,
        act: impl FnOnce(&mut Book<LocalShelf>, &CaseId) -> Result<(), BookError>,
    ) -> bool {
        let before = self.chosen.get_value();
        self.chosen.set_value(Some(id.clone()));
        let done = self.change(|book| act(book, id));
        if !done {
            self.chosen.set_value(before);
            self.revision.update(|revision| *revision += 1);
        }
        done
    }

    /// Starts the case that the sheet was typed for.
    pub fn start_case(self) -> bool {
        let done = self.begin(None);
        if done {
            self.adopt_first_draft();
        }
        done
    }

    /// Goes on to the next patient: a new case where one is open, with what was typed before there was any.
    pub fn start_another(self) -> bool {
        if self.open.with_untracked(Option::is_none) {
            return true;
        }
        let done = self.begin(None);
        if done {
            self.sheet.set(self.first_draft());
            self.adopt_first_draft();
        }
        done
    }

    /// Opens another case with its own draft.
    pub fn select(self, id: &CaseId) {
        if self.change_to(id, Book::select) {
            self.sheet.set(self.kept_draft());
        }
    }

    /// Imports a case file as a new case and opens it.
    pub fn import(self, text: &str) -> bool {
        let Some(id) = self.fresh_id() else { return false };
        let now = clock::now();
        let done = self.change_to(&CaseId(id), |book, id| book.import(id.clone(), text, &now));
        if done {
            self.sheet.set(self.kept_draft());
        }
        done
    }

    /// The open case as a case file.
    pub fn export(self) -> Option<String> {
        let id = self.open.with_untracked(|open| open.as_ref().map(|open| open.id.clone()))?;
        match self.book.with_value(|book| book.export(&id)) {
            Ok(text) => Some(text),
            Err(error) => {
                self.trouble.set(error.to_string());
                None
            }
        }
    }

    /// Writes person and label of the open case.
    pub fn write_person(self, person: case::Person, label: &str) -> bool {
        let Some(id) = self.open.with_untracked(|open| open.as_ref().map(|open| open.id.clone())) else {
            return false;
        };
        let now = clock::now();
        self.change(|book| book.set_label(&id, label, &now))
            && self.change(|book| book.set_person(&id, person, &now))
    }

    /// Opens the invented case, its times counted back from now.
    pub fn open_demo(self) {
        if !self.begin(Some(words::DEMO_LABEL)) {
            return;
        }
        self.sheet.set(Sheet::default());
        let now = clock::now();
        let entries = demo::entries().map(|(ago, kind)| (now.wall.plus_minutes(-ago), kind));
        if self.write(entries.into()) && self.write_person(demo::PERSON, words::DEMO_LABEL) {
            page::go(Room::Now.hash());
        }
    }

    /// Empties what was written; what was typed beside it and not written stays.
    pub fn clear_typed(self, fields: &[Field], choices: &[Choice]) {
        self.sheet.update(|sheet| sheet.clear(fields, choices));
        self.left.set(0);
        self.asked.set(false);
    }
}
