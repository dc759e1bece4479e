//! The journal on a shelf: reopened, shared by two pages, refused by a full shelf.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::rc::Rc;

use case::{Case, Correction, Entry, EntryId, EntryKind, Moment, Now, Person, Sex};
use logbook::{Book, BookError, CaseId, Shelf, ShelfError};
use proptest::prelude::*;

use crate::generate;

/// A shelf that two books can hold, and that refuses to put anything when told so.
#[derive(Debug, Clone, Default)]
pub struct Shared {
    pub store: Rc<RefCell<BTreeMap<String, String>>>,
    pub full: Rc<RefCell<bool>>,
}

impl Shelf for Shared {
    fn keys(&self) -> Result<Vec<String>, ShelfError> {
        Ok(self.store.borrow().keys().cloned().collect())
    }

    fn get(&self, key: &str) -> Result<Option<String>, ShelfError> {
        Ok(self.store.borrow().get(key).cloned())
    }

    fn put(&mut self, key: &str, value: &str) -> Result<(), ShelfError> {
        if *self.full.borrow() {
            return Err(ShelfError("The storage is full.".into()));
        }
        self.store.borrow_mut().insert(key.to_owned(), value.to_owned());
        Ok(())
    }

    fn remove(&mut self, key: &str) -> Result<(), ShelfError> {
        self.store.borrow_mut().remove(key);
        Ok(())
    }
}

pub fn id(name: &str) -> CaseId {
    CaseId(name.into())
}

pub fn now(minute: i64) -> Now {
    Now::at(Moment(1_772_485_800_000 + minute * 60_000))
}

pub fn note(name: &str, minute: i64) -> Entry {
    Entry {
        id: EntryId(name.into()),
        at: now(minute).wall,
        written_at: Some(now(minute).wall),
        utc_offset_min: Some(0),
        kind: EntryKind::Note(format!("note {name}")),
        not_understood: vec![],
    }
}

pub fn book_of_one(shelf: &Shared) -> Book<Shared> {
    let mut book = Book::open(shelf.clone()).unwrap();
    book.new_case(id("one"), "Bed 3", &now(0)).unwrap();
    book
}

pub fn case_of(shelf: &Shared, name: &str) -> Case {
    Book::open(shelf.clone()).unwrap().file(&id(name)).unwrap().case.clone()
}

#[test]
fn reopened_it_is_the_same_case() {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    book.append(&id("one"), note("a", 1)).unwrap();
    let person = Person { sex: Some(Sex::Female), age_years: Some(58.0), ..Person::default() };
    book.set_person(&id("one"), person, &now(2)).unwrap();
    book.set_label(&id("one"), "Bed 4", &now(3)).unwrap();
    let case = case_of(&shelf, "one");
    assert_eq!(&case, book.open_case().unwrap().1);
    assert_eq!((case.label.as_str(), case.person, case.entries().len()), ("Bed 4", person, 1));
    assert!(Book::open(shelf).unwrap().set_aside().is_empty());
}

#[test]
fn the_last_label_holds_though_the_clock_was_set_back() {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    book.set_label(&id("one"), "Bed 4", &now(50)).unwrap();
    book.set_label(&id("one"), "Bed 5", &now(-500)).unwrap();
    assert_eq!(case_of(&shelf, "one").label, "Bed 5");
    let mut book = Book::open(shelf.clone()).unwrap();
    book.set_label(&id("one"), "Bed 6", &now(-600)).unwrap();
    assert_eq!(case_of(&shelf, "one").label, "Bed 6");
}

#[test]
fn the_open_case_is_remembered_and_cases_come_newest_first() {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    book.new_case(id("two"), "Bed 8", &now(5)).unwrap();
    book.append(&id("one"), note("a", 9)).unwrap();
    book.select(&id("two")).unwrap();
    let book = Book::open(shelf).unwrap();
    assert_eq!(book.open_case().unwrap().1.label, "Bed 8");
    let labels: Vec<&str> = book.cases().iter().map(|(_, case)| case.label.as_str()).collect();
    assert_eq!(labels, ["Bed 3", "Bed 8"]);
}

#[test]
fn a_full_shelf_is_said_and_what_was_written_is_kept_and_stored_later() {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    *shelf.full.borrow_mut() = true;
    let error = book.append(&id("one"), note("a", 1)).unwrap_err();
    assert_eq!(
        error.to_string(),
        "Not stored on this device: The storage is full. It is kept while this page stays open. Export the case now."
    );
    // Asking again with the very same entry does not pass as stored.
    assert!(matches!(book.append(&id("one"), note("a", 1)), Err(BookError::NotStored(_))));
    assert!(matches!(book.retry(), Err(BookError::NotStored(_))));
    assert_eq!((book.unsaved(), book.open_case().unwrap().1.entries().len()), (1, 1));
    assert!(case_of(&shelf, "one").entries().is_empty());

    *shelf.full.borrow_mut() = false;
    book.append(&id("one"), note("b", 2)).unwrap();
    assert_eq!(book.unsaved(), 0);
    assert_eq!(&case_of(&shelf, "one"), book.open_case().unwrap().1);
}

#[test]
fn two_pages_on_one_shelf_lose_nothing() {
    let shelf = Shared::default();
    let mut first = book_of_one(&shelf);
    let mut second = Book::open(shelf.clone()).unwrap();
    first.append(&id("one"), note("a", 1)).unwrap();
    second.append(&id("one"), note("b", 1)).unwrap();
    first.append(&id("one"), note("c", 2)).unwrap();
    second.set_label(&id("one"), "Bed 4", &now(3)).unwrap();
    first.set_label(&id("one"), "Bed 5", &now(3)).unwrap();
    let case = case_of(&shelf, "one");
    let names: Vec<&str> = case.entries().iter().map(|e| e.id.0.as_str()).collect();
    assert_eq!((names, case.label.as_str()), (vec!["a", "b", "c"], "Bed 5"));
}

#[test]
fn two_pages_that_use_one_id_keep_both_texts() {
    let shelf = Shared::default();
    let mut first = book_of_one(&shelf);
    let mut second = Book::open(shelf.clone()).unwrap();
    first.append(&id("one"), note("a", 1)).unwrap();
    let other = Entry { kind: EntryKind::Note("other".into()), ..note("a", 1) };
    second.append(&id("one"), other).unwrap();
    for _ in 0..2 {
        let book = Book::open(shelf.clone()).unwrap();
        assert_eq!(book.open_case().unwrap().1.entries().len(), 1);
        assert_eq!(book.set_aside().len(), 1);
        assert!(book.set_aside()[0].text.contains("other"));
        assert!(book.set_aside()[0].why.starts_with("entry a, id: two entries share this id"));
    }
}

#[test]
fn an_imported_case_keeps_what_is_not_understood() {
    let text = r#"{"format":"slackwater-case","version":1,"label":"Bed 3","tide":"ebb",
        "person":{"age_years":58,"shoe":43},"entries":[
        {"id":"x","at":"2026-03-02T21:10:00Z","kind":"tide","height_m":1.25},
        {"id":"n","at":"2026-03-02T21:11:00Z","kind":"note","text":"t","by":"me"}]}"#;
    let shelf = Shared::default();
    let mut book = Book::open(shelf.clone()).unwrap();
    book.import(id("in"), text, &now(0)).unwrap();
    book.append(&id("in"), note("a", 1)).unwrap();
    book.set_person(&id("in"), Person { weight_kg: Some(74.0), ..Person::default() }, &now(2)).unwrap();
    let again = Book::open(shelf).unwrap();
    let exported: serde_json::Value = serde_json::from_str(&again.export(&id("in")).unwrap()).unwrap();
    assert_eq!(again.export(&id("in")), book.export(&id("in")));
    assert_eq!(exported["tide"], "ebb");
    assert_eq!(exported["person"], serde_json::json!({ "shoe": 43, "weight_kg": 74 }));
    assert_eq!(exported["entries"][0]["height_m"], 1.25);
    assert_eq!(exported["entries"][1]["by"], "me");
    assert_eq!(exported["entries"][2]["text"], "note a");
    assert_eq!(again.file(&id("in")).unwrap().not_understood().len(), 4);
}

#[test]
fn what_is_refused_changes_nothing() {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    let before = (shelf.store.borrow().clone(), book.open_case().unwrap().1.clone());
    let kinds =
        [EntryKind::Temperature(f64::NAN), EntryKind::Temperature(71.0), EntryKind::Settings(breath(34.0))];
    for kind in kinds {
        assert!(matches!(
            book.append(&id("one"), Entry { kind, ..note("a", 1) }),
            Err(BookError::Refused(_))
        ));
    }
    let stray = Correction { of: EntryId("z".into()), at: None, kind: Box::new(EntryKind::Seizure) };
    let stray = Entry { kind: EntryKind::Correction(stray), ..note("k", 1) };
    assert!(matches!(book.append(&id("one"), stray), Err(BookError::Refused(_))));
    let unread = Entry { not_understood: vec!["colour".into()], ..note("a", 1) };
    assert_eq!(book.append(&id("one"), unread), Err(BookError::ReadsOtherwise));
    let never = Entry { at: Moment(i64::MAX), ..note("a", 1) };
    assert!(matches!(book.append(&id("one"), never), Err(BookError::Refused(_))));
    let light = Person { weight_kg: Some(3.0), ..Person::default() };
    assert!(matches!(book.set_person(&id("one"), light, &now(1)), Err(BookError::Refused(_))));
    let nobody = Person { weight_kg: Some(f64::NAN), ..Person::default() };
    assert_eq!(book.set_person(&id("one"), nobody, &now(1)), Err(BookError::ReadsOtherwise));
    assert!(matches!(book.import(id("two"), "{", &now(1)), Err(BookError::Refused(_))));
    assert_eq!(book.append(&id("none"), note("a", 1)), Err(BookError::NoSuchCase));
    assert_eq!(book.new_case(id("one"), "Bed 9", &now(1)), Err(BookError::CaseExists));
    assert_eq!((shelf.store.borrow().clone(), book.open_case().unwrap().1.clone()), before);
}

fn breath(tidal_volume_ml: f64) -> case::Settings {
    case::Settings { tidal_volume_ml: Some(tidal_volume_ml), ..case::Settings::default() }
}

#[test]
fn a_child_breath_stays_readable_when_the_age_is_corrected() {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    book.set_person(&id("one"), Person { age_years: Some(8.0), ..Person::default() }, &now(1)).unwrap();
    let small = Entry { kind: EntryKind::Settings(breath(34.0)), ..note("s", 2) };
    book.append(&id("one"), small).unwrap();
    book.set_person(&id("one"), Person { age_years: Some(80.0), ..Person::default() }, &now(3)).unwrap();
    assert_eq!(&case_of(&shelf, "one"), book.open_case().unwrap().1);
    let right = EntryKind::Settings(breath(340.0));
    let fix = Correction { of: EntryId("s".into()), at: None, kind: Box::new(right) };
    book.append(&id("one"), Entry { kind: EntryKind::Correction(fix), ..note("k", 4) }).unwrap();
    let exported = book.export(&id("one")).unwrap();
    assert_eq!(&logbook::read_case_file(&exported).unwrap().case, book.open_case().unwrap().1);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]
    #[test]
    fn any_row_of_writes_reopens_equal(
        entries in generate::entries(),
        persons in prop::collection::vec((generate::person(), -600..600_i64), 0..3),
        labels in prop::collection::vec(("\\PC{1,8}", -600..600_i64), 0..3),
        full in prop::collection::vec(any::<bool>(), 16),
        imported in generate::case(),
    ) {
        let shelf = Shared::default();
        let mut book = book_of_one(&shelf);
        book.import(id("in"), &logbook::CaseFile::new(imported.clone()).to_json(), &now(0)).unwrap();
        let mut full = full.into_iter().cycle();
        for entry in entries {
            *shelf.full.borrow_mut() = full.next().unwrap();
            let _ = book.append(&id("one"), entry.clone());
            prop_assert!(book.file(&id("one")).unwrap().case.entries().contains(&entry));
        }
        for (person, minute) in persons {
            *shelf.full.borrow_mut() = full.next().unwrap();
            let _ = book.set_person(&id("one"), person, &now(minute));
        }
        for (label, minute) in labels {
            *shelf.full.borrow_mut() = full.next().unwrap();
            let _ = book.set_label(&id("one"), &label, &now(minute));
        }
        *shelf.full.borrow_mut() = false;
        book.retry().unwrap();
        let again = Book::open(shelf).unwrap();
        prop_assert!(again.set_aside().is_empty());
        for name in ["one", "in"] {
            prop_assert_eq!(again.file(&id(name)), book.file(&id(name)));
        }
        prop_assert_eq!(&again.file(&id("in")).unwrap().case, &imported);
    }
}
