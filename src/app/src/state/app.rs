//! The state that belongs to the root and lives as long as the page.

use std::rc::Rc;
use std::sync::Arc;

use bedside::{Options, Study};
use case::{Case, Entry, EntryId, EntryKind, Moment, Now};
use leptos::prelude::*;
use logbook::{Book, BookError, CaseId, Shelf};
use send_wrapper::SendWrapper;
use units::AgeGroup;

use super::present::{Present, Trial};
use super::{demo, draft, field::Field, room::Room, rows, sheet::Reading, sheet::Sheet, writing};
use crate::device::{clock, ids, page, ready, shelf::LocalShelf};
use crate::words::{person, start as words};

/// The open case.
#[derive(Clone, PartialEq)]
pub struct Open {
    /// Its id on this device.
    pub id: CaseId,
    /// The case.
    pub case: Arc<Case>,
}

/// Handles to everything the rooms share; copied freely.
#[derive(Clone, Copy)]
pub struct App {
    book: StoredValue<Book<LocalShelf>, LocalStorage>,
    shelf: StoredValue<LocalShelf, LocalStorage>,
    revision: RwSignal<u32>,
    /// The open case; the same until something is written.
    pub open: Memo<Option<Open>>,
    /// Its study, made once an entry.
    pub study: Memo<Option<Studied>>,
    /// What the study says at this minute.
    pub present: Memo<Option<Present>>,
    /// The change that is tried.
    pub trial: Memo<Option<Trial>>,
    /// The clock, moved each minute.
    pub now: RwSignal<Now>,
    /// The room that is open.
    pub room: RwSignal<Room>,
    /// What is being typed.
    pub sheet: RwSignal<Sheet>,
    /// The field that the keys write to.
    pub active: RwSignal<Option<Field>>,
    /// Fields that were left, whose errors are said.
    pub left: RwSignal<Vec<Field>>,
    /// Whether the gas, the settings or the sheet were asked to be written, so that what is missing is said.
    pub asked: RwSignal<bool>,
    /// What a screen reader is told, politely.
    pub told: RwSignal<String>,
    /// What went wrong with the device, until it is put right.
    pub trouble: RwSignal<Option<String>>,
    /// Whether the phone's own keypad is used.
    pub phone_keys: RwSignal<bool>,
    /// What is said about working without signal.
    pub offline: RwSignal<String>,
    /// What is said about a new version.
    pub update: RwSignal<String>,
}

/// After so many minutes without an entry a button that writes asks whether it is still this case.
const AWAY_MIN: f64 = 30.0;
const PHONE_KEYS: &str = "slackwater.phone-keys";

impl App {
    /// Opens the book and the room of the address.
    pub fn new() -> Self {
        let mut trouble = None;
        let shelf = LocalShelf::new();
        let book = Book::open(shelf).or_else(|error: BookError| {
            trouble = Some(words::nothing_kept(&error.to_string()));
            Book::open(LocalShelf::refusing())
        });
        let book = book.unwrap_or_else(|error| unreachable!("an empty shelf opens: {error}"));
        let phone_keys = matches!(shelf.get(PHONE_KEYS), Ok(Some(text)) if text == "yes");
        let book = StoredValue::new_local(book);
        let revision = RwSignal::new(0);
        let open = Memo::new(move |_| {
            revision.track();
            book.with_value(|book| {
                let (id, case) = book.open_case()?;
                Some(Open { id: id.clone(), case: Arc::new(case.clone()) })
            })
        });
        let study = Memo::new_with_compare(
            move |_| open.with(|open| open.as_ref().map(studied)),
            |old, new| !same(old, new),
        );
        let now = RwSignal::new(clock::now());
        let sheet = RwSignal::new(Sheet::default());
        let present = Memo::new(move |_| {
            let now = now.get();
            study.with(|study| open.with(|o| Some(Present::of(study.as_ref()?, &o.as_ref()?.case, &now))))
        });
        let trial = Memo::new(move |_| {
            let now = now.get();
            study.with(|study| open.with(|open| sheet.with(|sheet| {
                let case = &open.as_ref()?.case;
                let in_force = case.settings_at(now.wall);
                in_force.airway?;
                let change = writing::change(sheet, &in_force, case.person.age_group());
                Some(Trial::of(study.as_ref()?, case, &now, &in_force, change))
            })))
        });
        let app = Self {
            book,
            shelf: StoredValue::new_local(shelf),
            revision,
            open,
            study,
            present,
            trial,
            now,
            room: RwSignal::new(Room::Start),
            sheet,
            active: RwSignal::new(None),
            left: RwSignal::new(vec![]),
            asked: RwSignal::new(false),
            told: RwSignal::new(String::new()),
            trouble: RwSignal::new(trouble),
            phone_keys: RwSignal::new(phone_keys),
            offline: ready::offline(),
            update: ready::update(),
        };
        app.sheet.set(app.kept_draft());
        app.room.set(app.room_at(&page::hash()));
        app.enter(&page::hash());
        app
    }

    /// Follows the address, the clock, and keeps the draft.
    pub fn follow(self) {
        page::on_hash(move |hash| self.enter(&hash));
        clock::each_minute(move |now| {
            self.now.try_set(now);
        });
        Effect::new(move |before: Option<()>| {
            let text = self.sheet.with(draft::to_text);
            if before.is_some() {
                self.keep_draft(text);
            }
        });
    }

    fn room_at(self, hash: &str) -> Room {
        let open = self.open.with_untracked(Option::is_some);
        Room::at(hash).unwrap_or(if open { Room::Now } else { Room::Start })
    }

    /// Goes to the room of an address. One that names settings to try ("#/change?rate=22") sets them once and
    /// gives way to the plain address, so that Back does not undo what was stepped since.
    fn enter(self, hash: &str) {
        if let Some(tried) = hash.strip_prefix(Room::Change.hash()).and_then(|rest| rest.strip_prefix('?')) {
            self.sheet.update(|sheet| writing::try_settings(sheet, tried));
            page::go_instead(Room::Change.hash());
            return;
        }
        let room = self.room_at(hash);
        if self.room.get_untracked() != room {
            self.active.set(None);
            self.left.set(vec![]);
            self.asked.set(false);
            self.now.set(clock::now());
            self.room.set(room);
        }
    }

    fn draft_key(self) -> String {
        self.open.with_untracked(|open| draft::key(open.as_ref().map(|open| open.id.0.as_str())))
    }

    fn kept_draft(self) -> Sheet {
        let text = self.shelf.with_value(|shelf| shelf.get(&self.draft_key()));
        text.ok().flatten().map_or_else(Sheet::default, |text| draft::from_text(&text))
    }

    /// A draft that can't be kept is still on the screen; the book says when storing fails.
    fn keep_draft(self, text: Option<String>) {
        let key = self.draft_key();
        self.shelf.update_value(|shelf| {
            let _ = match text {
                Some(text) => shelf.put(&key, &text),
                None => shelf.remove(&key),
            };
        });
    }

    /// Chooses between our keys and the phone's.
    pub fn use_phone_keys(self, yes: bool) {
        self.phone_keys.set(yes);
        self.shelf.update_value(|shelf| {
            let _ = shelf.put(PHONE_KEYS, if yes { "yes" } else { "no" });
        });
    }

    /// The limits that apply to the open case.
    pub fn group(self) -> AgeGroup {
        self.open.with(|open| open.as_ref().map_or(AgeGroup::Adult, |open| open.case.person.age_group()))
    }

    /// The open case, or an empty one.
    pub fn case(self) -> Arc<Case> {
        self.open.with(|open| open.as_ref().map_or_else(|| Arc::new(Case::new("")), |o| o.case.clone()))
    }

    /// The open case's label.
    pub fn label(self) -> Option<String> {
        self.open.with(|open| open.as_ref().map(|open| open.case.label.clone()))
    }

    /// The settings in force.
    pub fn in_force(self) -> case::Settings {
        let now = self.now.get();
        self.open.with(|open| open.as_ref().map(|o| o.case.settings_at(now.wall))).unwrap_or_default()
    }

    /// Asked on the buttons that write, after half an hour without an entry.
    pub fn still(self) -> Option<String> {
        let now = self.now.get();
        let (label, last) = self.open.with(|open| {
            let open = open.as_ref()?;
            Some((open.case.label.clone(), open.case.last_at()?))
        })?;
        (now.wall.minutes_since(last) >= AWAY_MIN).then(|| crate::words::form::still(&label))
    }

    /// Reads the clock anew.
    pub fn tick(self) -> Now {
        let now = clock::now();
        self.now.set(now);
        now
    }

    /// Tells a screen reader.
    pub fn tell(self, words: &str) {
        self.told.set(crate::words::spoken::spoken(words));
    }

    /// The questions that were not answered yet, by their words: another figure asks anew.
    pub fn unanswered(self, questions: Vec<bedside::Question>) -> Vec<bedside::Question> {
        self.sheet.with(|sheet| questions.into_iter().filter(|q| !sheet.answered.contains(&q.words)).collect())
    }

    /// A field was left: from now on it says what is wrong in it.
    pub fn leave(self, field: Field) {
        self.left.update(|left| {
            if !left.contains(&field) {
                left.push(field);
            }
        });
    }

    /// Whether what stands in `field` is wrong; then it is said.
    pub fn says_wrong(self, field: Field) -> bool {
        let reading = untrack(|| self.sheet.with(|sheet| sheet.read(field, self.group())));
        let Reading::Wrong(words) = reading else { return false };
        self.leave(field);
        self.tell(&words);
        true
    }

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
        self.trouble.set(result.err().map(|error| error.to_string()));
        done
    }

    fn fresh_id(self) -> Option<String> {
        let id = ids::fresh();
        if id.is_none() {
            self.trouble.set(Some(words::NO_IDS.to_owned()));
        }
        id
    }

    /// Writes entries into the open case, in order. False when one was refused.
    pub fn write(self, entries: Vec<(Moment, EntryKind)>) -> bool {
        let Some(id) = self.open.with_untracked(|open| open.as_ref().map(|open| open.id.clone())) else {
            return false;
        };
        entries.into_iter().all(|(at, kind)| self.write_one(&id, at, kind))
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

    /// Starts a case, taking along what was typed for it.
    pub fn new_case(self, label: Option<&str>) -> bool {
        let Some(id) = self.fresh_id() else { return false };
        let number = self.book.with_value(|book| book.cases().len()) + 1;
        let label = label.map_or_else(|| person::default_label(number), str::to_owned);
        let now = clock::now();
        let first = self.open.with_untracked(Option::is_none);
        if first {
            self.keep_draft(None);
        }
        let done = self.change(|book| book.new_case(CaseId(id), &label, &now));
        if first {
            // What was typed before there was a case belongs to it now.
            self.keep_draft(self.sheet.with_untracked(draft::to_text));
        }
        done
    }

    /// Goes on to the next patient: a new case where one is open, else the draft of the first.
    pub fn start_another(self) -> bool {
        if self.open.with_untracked(Option::is_none) {
            return true;
        }
        let done = self.new_case(None);
        if done {
            self.sheet.set(Sheet::default());
        }
        done
    }

    /// Opens another case with its own draft.
    pub fn select(self, id: &CaseId) {
        if self.change(|book| book.select(id)) {
            self.sheet.set(self.kept_draft());
        }
    }

    /// Imports a case file as a new case and opens it.
    pub fn import(self, text: &str) -> bool {
        let Some(id) = self.fresh_id() else { return false };
        let now = clock::now();
        let done = self.change(|book| book.import(CaseId(id), text, &now));
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
                self.trouble.set(Some(error.to_string()));
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
        if !self.new_case(Some(words::DEMO_LABEL)) {
            return;
        }
        self.sheet.set(Sheet::default());
        let now = clock::now();
        let entries = demo::entries().map(|(ago, kind)| (now.wall.plus_minutes(-ago), kind));
        if self.write(entries.into()) && self.write_person(demo::PERSON, words::DEMO_LABEL) {
            page::go(Room::Now.hash());
        }
    }

    /// Empties what was typed for a gas and for settings, after both were written.
    pub fn clear_typed(self) {
        self.sheet.update(|sheet| {
            sheet.clear(&rows::GAS_FIELDS, &rows::GAS_CHOICES);
            sheet.clear(&rows::SETTINGS_FIELDS, &rows::SETTINGS_CHOICES);
            sheet.clear(&[Field::NewRate, Field::NewVolume], &[]);
        });
        self.left.set(vec![]);
        self.asked.set(false);
    }
}

/// A study, kept on the one thread a page has.
pub type Studied = SendWrapper<Rc<Study>>;

fn studied(open: &Open) -> Studied {
    SendWrapper::new(Rc::new(Study::new(&open.case, Options::default())))
}

fn same(old: Option<&Option<Studied>>, new: Option<&Option<Studied>>) -> bool {
    match (old, new) {
        (Some(Some(old)), Some(Some(new))) => Rc::ptr_eq(old, new),
        (Some(None), Some(None)) => true,
        _ => false,
    }
}
