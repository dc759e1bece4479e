//! Every figure is used.

use crate::source::rust_files;
use crate::tokens::of;
use std::collections::BTreeSet;
use std::fs;

/// Crates that may use a figure.
const USERS: [&str; 4] = ["physiology", "bedside", "app", "xtask"];

fn words_used() -> BTreeSet<String> {
    let mut words = BTreeSet::new();
    for name in USERS {
        for file in rust_files(&crate::root().join("src").join(name).join("src")) {
            let text = fs::read_to_string(&file).expect("a source file can be read");
            words.extend(of(&text).unwrap_or_default());
        }
    }
    words
}

fn unused<'a>(figures: impl Iterator<Item = &'a str>, words: &BTreeSet<String>) -> Vec<&'a str> {
    figures.filter(|id| !words.contains(*id)).collect()
}

#[test]
fn every_figure_is_used() {
    let ids = sources::ALL.iter().flat_map(|list| list.iter()).map(|figure| figure.id);
    let idle = unused(ids, &words_used());
    assert!(idle.is_empty(), "no code uses {idle:?}: use them or take them out of `sources`");
}

#[test]
fn an_idle_figure_is_found() {
    let words = BTreeSet::from(["PBW_PER_CM".to_owned()]);
    assert_eq!(unused(["PBW_PER_CM", "IDLE"].into_iter(), &words), ["IDLE"]);
}
