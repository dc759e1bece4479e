//! The state that belongs to the root and lives as long as the page.

use std::rc::Rc;
use std::sync::Arc;

use bedside::{Options, Study};
use case::{Case, Now};
use leptos::prelude::*;
use logbook::{Book, BookError, CaseId, Shelf};
use send_wrapper::SendWrapper;
use units::AgeGroup;

use super::present::{Present, Trial};
use super::{field::Field, room::Room, sheet::Reading, sheet::Sheet, writing};
use crate::device::{clock, page, ready, shelf::LocalShelf};
use crate::words::start as words;

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
    pub(super) book: StoredValue<Book<LocalShelf>, LocalStorage>,
    pub(super) shelf: StoredValue<LocalShelf, LocalStorage>,
    pub(super) revision: RwSignal<usize>,
    /// The case this tab has open: another tab may open another.
    pub(super) chosen: StoredValue<Option<CaseId>>,
    /// The open case; the same until something is written.
    pub open: Memo<Option<Open>>,
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
    /// Fields that were left, whose errors are said: a bit for each, by its index.
    pub left: RwSignal<usize>,
    /// Whether the gas, the settings or the sheet were asked to be written, so that what is missing is said.
    pub asked: RwSignal<bool>,
    /// What a screen reader is told, politely; empty again soon after.
    pub told: RwSignal<String>,
    tellings: StoredValue<usize>,
    /// Whether the room has stood long enough for its main button to be meant by a press.
    pub settled: RwSignal<bool>,
    entrances: StoredValue<usize>,
    /// Whether the draft could not be kept.
    pub draft_lost: RwSignal<bool>,
    /// What went wrong, until it is put right; empty when nothing did.
    pub trouble: RwSignal<String>,
    /// Whether the phone's own keypad is used.
    pub phone_keys: RwSignal<bool>,
    /// What is said about working without signal.
    pub offline: RwSignal<String>,
    /// What is said about a new version.
    pub update: RwSignal<String>,
}

/// After so many minutes without an entry a button that writes asks whether it is still this case.
const AWAY_MIN: f64 = 30.0;
/// A press this soon after a room was entered belongs to the room before: the second tap of two.
const MEANT_AFTER_MS: u64 = 600;
/// What was said stands as long as a screen reader needs to take it up; later it would be read as if it were news.
const TOLD_FOR_MS: u64 = 5_000;
const PHONE_KEYS: &str = "slackwater.phone-keys";

impl App {
    /// Opens the book and the room of the address.
    pub fn new() -> Self {
        let mut trouble = String::new();
        let shelf = LocalShelf::new();
        let book = Book::open(shelf).or_else(|error: BookError| {
            trouble = words::nothing_kept(&error.to_string());
            Book::open(LocalShelf::refusing())
        });
        let book = book.unwrap_or_else(|error| unreachable!("an empty shelf opens: {error}"));
        let phone_keys = matches!(shelf.get(PHONE_KEYS), Ok(Some(text)) if text == "yes");
        let chosen = StoredValue::new(book.open_case().map(|(id, _)| id.clone()));
        let book = StoredValue::new_local(book);
        let revision = RwSignal::new(0);
        let open = Memo::new(move |_| {
            revision.track();
            book.with_value(|book| {
                let id = chosen.get_value()?;
                let case = Arc::new(book.file(&id)?.case.clone());
                Some(Open { id, case })
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
            study.with(|study| Some(Present::of(study.as_ref()?, &now)))
        });
        let trial = Memo::new(move |_| {
            let now = now.get();
            study.with(|study| {
                open.with(|open| {
                    sheet.with(|sheet| {
                        let case = &open.as_ref()?.case;
                        let in_force = case.settings_at(now.wall);
                        in_force.airway?;
                        let change = writing::change(sheet, &in_force, case.person.age_group());
                        Some(Trial::of(study.as_ref()?, &now, &in_force, change))
                    })
                })
            })
        });
        let app = Self {
            book,
            shelf: StoredValue::new_local(shelf),
            revision,
            chosen,
            open,
            present,
            trial,
            now,
            room: RwSignal::new(Room::Start),
            sheet,
            active: RwSignal::new(None),
            left: RwSignal::new(0),
            asked: RwSignal::new(false),
            told: RwSignal::new(String::new()),
            tellings: StoredValue::new(0),
            settled: RwSignal::new(true),
            entrances: StoredValue::new(0),
            draft_lost: RwSignal::new(false),
            trouble: RwSignal::new(trouble),
            phone_keys: RwSignal::new(phone_keys),
            offline: ready::offline(),
            update: ready::update(),
        };
        app.sheet.set(app.kept_draft());
        app.room.set(app.room_at(&page::hash()));
        app.enter(&page::hash());
        if app.room.get_untracked() != Room::Change {
            app.forget_trial();
        }
        app
    }

    /// Follows the address, the clock, and keeps the draft.
    pub fn follow(self) {
        page::on_hash(move |hash| self.enter(&hash));
        clock::each_minute(move |now| {
            self.now.try_set(now);
        });
        self.keep();
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
        let before = self.room.get_untracked();
        if before != room {
            if before == Room::Change {
                self.forget_trial();
            }
            self.take_no_press_yet();
            self.active.set(None);
            self.left.set(0);
            self.asked.set(false);
            let now = self.tick();
            self.sheet.maybe_update(|sheet| sheet.age_chips(&now));
            self.room.set(room);
        }
    }

    /// A change that was tried and not made is gone with the room: nobody remembers it at the next visit.
    fn forget_trial(self) {
        let tried = [Field::NewRate, Field::NewVolume];
        if self.sheet.with_untracked(|sheet| sheet.any_text(&tried)) {
            self.sheet.update(|sheet| sheet.clear(&tried, &[]));
        }
    }

    fn take_no_press_yet(self) {
        self.settled.set(false);
        self.entrances.update_value(|count| *count += 1);
        let entrance = self.entrances.get_value();
        let _ = clock::after(MEANT_AFTER_MS, move || {
            if self.entrances.get_value() == entrance {
                self.settled.set(true);
            }
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

    /// What was typed or pasted goes into the sheet as it is; a clock time is fixed to its day.
    pub fn type_text(self, field: Field, text: String) {
        self.sheet.update(|sheet| sheet.type_text(field, text, &clock::now()));
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
        self.tellings.update_value(|count| *count += 1);
        let telling = self.tellings.get_value();
        let _ = clock::after(TOLD_FOR_MS, move || {
            if self.tellings.get_value() == telling {
                self.told.set(String::new());
            }
        });
    }

    /// The questions that were not answered yet, by their words: another figure asks anew.
    pub fn unanswered(self, questions: Vec<bedside::Question>) -> Vec<bedside::Question> {
        self.sheet
            .with(|sheet| questions.into_iter().filter(|q| !sheet.answered.contains(&q.words)).collect())
    }

    /// A field was left: from now on it says what is wrong in it.
    pub fn leave(self, field: Field) {
        self.left.update(|left| *left |= 1 << field.index());
    }

    /// Whether a field was left.
    pub fn was_left(self, field: Field) -> bool {
        self.left.get() & (1 << field.index()) != 0
    }

    /// Whether what stands in `field` is wrong; then it is said.
    pub fn says_wrong(self, field: Field) -> bool {
        let reading = untrack(|| self.sheet.with(|sheet| sheet.read(field, self.group())));
        let Reading::Wrong(words) = reading else { return false };
        self.leave(field);
        self.tell(&words);
        page::into_sight(field.spec().fault_id);
        true
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
