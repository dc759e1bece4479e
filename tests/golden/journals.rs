//! Journals that must stay readable.

use std::collections::BTreeMap;

use logbook::{Book, Shelf, ShelfError};

const VERSION_1: &str = include_str!("journals/version-1.json");

#[derive(Clone)]
struct Stored(BTreeMap<String, String>);

impl Shelf for &mut Stored {
    fn keys(&self) -> Result<Vec<String>, ShelfError> {
        Ok(self.0.keys().cloned().collect())
    }

    fn get(&self, key: &str) -> Result<Option<String>, ShelfError> {
        Ok(self.0.get(key).cloned())
    }

    fn put(&mut self, key: &str, value: &str) -> Result<(), ShelfError> {
        self.0.insert(key.to_owned(), value.to_owned());
        Ok(())
    }

    fn remove(&mut self, key: &str) -> Result<(), ShelfError> {
        self.0.remove(key);
        Ok(())
    }
}

#[test]
fn a_journal_of_version_1_reads_as_it_was_meant() {
    let mut stored = Stored(serde_json::from_str(VERSION_1).unwrap());
    let before = stored.clone();
    let book = Book::open(&mut stored).unwrap();
    let (id, case) = book.open_case().unwrap();
    assert_eq!((id.0.as_str(), case.label.as_str()), ("c-7f", "Bed 4 (invented)"));
    assert_eq!((case.person.age_years, case.person.height_cm), (Some(58.0), Some(163.0)));
    assert_eq!(case.gases()[0].2.ph, 7.21);
    assert_eq!(case.entries().len(), 2);
    let aside: Vec<&str> = book.set_aside().iter().map(|aside| aside.key.as_str()).collect();
    assert_eq!(
        aside,
        [
            "slackwater.set-aside.c-7f.1772485190000.entry.e-0",
            "slackwater.set-aside.c-7f.1772485260000.entry.e-3"
        ]
    );
    drop(book);

    // Opening moved the damaged record and changed nothing else, other programs' keys included.
    let (from, to) = ("slackwater.journal.c-7f.1772485260000.entry.e-3", aside_key());
    let mut expected = before.0;
    let text = expected.remove(from).unwrap();
    expected.insert(to, text);
    assert_eq!(stored.0, expected);
}

fn aside_key() -> String {
    "slackwater.set-aside.c-7f.1772485260000.entry.e-3".to_owned()
}
