//! Records that can't be read: moved aside with every byte, shown then and later, never written over.

use case::{Correction, Entry, EntryId, EntryKind};
use logbook::{Book, Shelf};

use crate::journal::{Shared, book_of_one, case_of, id, note};

/// A shelf with one case and the notes a and b, and the key of note b.
fn shelf_with_two_notes() -> (Shared, String) {
    let shelf = Shared::default();
    let mut book = book_of_one(&shelf);
    book.append(&id("one"), note("a", 1)).unwrap();
    book.append(&id("one"), note("b", 2)).unwrap();
    let key = shelf.keys().unwrap().into_iter().find(|key| key.ends_with(".entry.b")).unwrap();
    (shelf, key)
}

/// Overwrites note b and opens the book twice: both times the text must be shown, whole.
fn open_with(text: &str, key_after: impl Fn(&str) -> String, why: &str) {
    let (mut shelf, key) = shelf_with_two_notes();
    shelf.put(&key, text).unwrap();
    for _ in 0..2 {
        let book = Book::open(shelf.clone()).unwrap();
        let aside = book.set_aside();
        assert_eq!(aside.len(), 1, "{text}");
        assert_eq!((aside[0].text.as_str(), aside[0].key.as_str()), (text, key_after(&key).as_str()));
        assert_eq!(aside[0].why, why);
        let names: Vec<&str> =
            book.open_case().unwrap().1.entries().iter().map(|e| e.id.0.as_str()).collect();
        assert_eq!(names, ["a"]);
        assert_eq!(shelf.get(&key_after(&key)).unwrap().as_deref(), Some(text));
    }
    let copies = shelf.keys().unwrap().len();
    assert_eq!(copies, 4, "case, note a, note b and the pointer, none of them twice");
}

fn moved(key: &str) -> String {
    key.replace("slackwater.journal.", "slackwater.set-aside.")
}

#[test]
fn a_truncated_record_is_moved_aside_whole() {
    let (shelf, key) = shelf_with_two_notes();
    let whole = shelf.get(&key).unwrap().unwrap();
    for length in [1, 10, whole.len() / 2, whole.len() - 1] {
        let why = "A record of the journal is not whole: it can't be read as JSON.";
        open_with(&whole[..length], moved, why);
    }
}

#[test]
fn damage_of_every_kind_is_said() {
    let record = |v: &str, rest: &str| format!("{{\"v\":{v},\"case\":\"one\",{rest}}}");
    let entry = "\"record\":\"entry\",\"written_at_ms\":1,\"body\":";
    for (text, why) in [
        (String::new(), "A record of the journal is not whole: it can't be read as JSON."),
        ("[]".into(), "A record of the journal has no version that is known: v is missing."),
        (record("\"1\"", ""), "A record of the journal is not whole: it can't be read as JSON."),
        (record("0", "\"x\":1"), "A record of the journal has no version that is known: v is the number 0."),
        (record("1", "\"x\":1"), "A record of the journal does not say what it is."),
        (record("1", "\"record\":\"entry\""), "A record of the journal does not say when it was written."),
        (record("1", "\"record\":\"entry\",\"written_at_ms\":1"), "A record of the journal has no body."),
        (
            record("1", &format!("{entry}7")),
            "entry number 1: the number 7 is not an object. Write it in braces.",
        ),
    ] {
        let (mut shelf, key) = shelf_with_two_notes();
        shelf.put(&key, &text).unwrap();
        let book = Book::open(shelf.clone()).unwrap();
        assert_eq!(book.set_aside()[0].why.split(". Give").next(), why.split(". Give").next(), "{text}");
        assert_eq!(shelf.get(&moved(&key)).unwrap(), Some(text));
        assert_eq!(shelf.get(&key).unwrap(), None);
    }
}

#[test]
fn a_newer_record_stays_where_it_is() {
    let text = r#"{"v":2,"case":"one","packed":"…"}"#;
    let why = "A record was written by a newer version of Slackwater (its version is 2, this one reads 1). It is \
               left as it is; update to read it.";
    open_with(text, str::to_owned, why);
    let text = r#"{"v":1,"case":"one","record":"deletion","written_at_ms":1,"body":"a"}"#;
    let why = "A record is a deletion, which this version does not know. It is left as it is.";
    open_with(text, str::to_owned, why);
}

#[test]
fn a_case_file_of_a_newer_version_in_a_record_stays_too() {
    let (mut shelf, _) = shelf_with_two_notes();
    let key = "slackwater.journal.in.1.case.";
    let text = r#"{"v":1,"case":"in","record":"case","written_at_ms":1,"body":{"format":"slackwater-case","version":2}}"#;
    shelf.put(key, text).unwrap();
    let book = Book::open(shelf.clone()).unwrap();
    assert_eq!((book.set_aside()[0].key.as_str(), book.cases().len()), (key, 1));
    assert!(book.set_aside()[0].why.contains("made by a newer version of Slackwater"));
    assert_eq!(shelf.get(key).unwrap().as_deref(), Some(text));
}

#[test]
fn nothing_set_aside_is_written_over() {
    let (mut shelf, key) = shelf_with_two_notes();
    for text in ["first", "second", "second", "third"] {
        shelf.put(&key, text).unwrap();
        Book::open(shelf.clone()).unwrap();
    }
    let book = Book::open(shelf).unwrap();
    let texts: Vec<&str> = book.set_aside().iter().map(|aside| aside.text.as_str()).collect();
    assert_eq!(texts, ["first", "second", "third"]);
}

#[test]
fn a_full_shelf_leaves_the_damaged_text_in_its_place() {
    let (mut shelf, key) = shelf_with_two_notes();
    shelf.put(&key, "damaged").unwrap();
    *shelf.full.borrow_mut() = true;
    let book = Book::open(shelf.clone()).unwrap();
    assert!(book.set_aside()[0].why.ends_with("It is still in its place: The storage is full."));
    assert_eq!(shelf.get(&key).unwrap().as_deref(), Some("damaged"));
}

#[test]
fn a_correction_waits_for_its_entry() {
    let (mut shelf, key) = shelf_with_two_notes();
    let mut book = Book::open(shelf.clone()).unwrap();
    let kind = Box::new(EntryKind::Note("right".into()));
    let fix = EntryKind::Correction(Correction { of: EntryId("b".into()), at: None, kind });
    book.append(&id("one"), Entry { kind: fix, ..note("k", 3) }).unwrap();
    let whole = case_of(&shelf, "one");
    let text = shelf.get(&key).unwrap().unwrap();
    shelf.put(&key, r#"{"v":2}"#).unwrap();
    let book = Book::open(shelf.clone()).unwrap();
    assert_eq!(book.set_aside().len(), 2);
    assert_eq!(book.open_case().unwrap().1.entries().len(), 1);
    // The newer version is gone again, or was installed: nothing was lost meanwhile.
    shelf.put(&key, &text).unwrap();
    assert_eq!(case_of(&shelf, "one"), whole);
}

#[test]
fn entries_outlive_the_start_of_their_case() {
    let (mut shelf, key) = shelf_with_two_notes();
    let start = shelf.keys().unwrap().into_iter().find(|k| k.contains(".case.")).unwrap();
    shelf.put(&start, "damaged").unwrap();
    let case = case_of(&shelf, "one");
    assert_eq!((case.label.as_str(), case.entries().len()), ("Recovered case", 2));
    assert!(shelf.get(&key).unwrap().is_some());
}

#[test]
fn one_bad_entry_does_not_take_its_imported_case_along() {
    let (mut shelf, _) = shelf_with_two_notes();
    let key = "slackwater.journal.in.1.case.";
    let text = r#"{"v":1,"case":"in","record":"case","written_at_ms":1,"body":{"format":"slackwater-case",
        "version":1,"label":"Bed 9","entries":[{"id":"x","at":"never","kind":"note","text":"x"},
        {"id":"y","at":"2026-03-02T21:10:00Z","kind":"note","text":"y"}]}}"#;
    shelf.put(key, text).unwrap();
    for _ in 0..2 {
        let book = Book::open(shelf.clone()).unwrap();
        assert_eq!(book.file(&id("in")).unwrap().case.entries().len(), 1);
        assert_eq!(book.set_aside()[0].key, key);
        assert!(book.set_aside()[0].why.starts_with("entry x, at: the text \"never\" is not a time."));
    }
}
