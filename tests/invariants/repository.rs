//! The top of the repository holds what a reader expects, and nothing more.

use crate::root;
use std::fs;

const TOP: [&str; 9] =
    ["Cargo.toml", "Cargo.lock", "README.md", "DEVELOPERS.md", "LICENSE", "src", "public", "style", "tests"];

/// Of the names at the top, those that don't belong there. Hidden files may; so may what `.gitignore` names.
fn strangers<'a>(names: impl Iterator<Item = &'a str>, ignored: &str) -> Vec<&'a str> {
    let is_ignored = |name: &str| ignored.lines().any(|line| line.trim().trim_matches('/') == name);
    names.filter(|name| !TOP.contains(name) && !name.starts_with('.') && !is_ignored(name)).collect()
}

#[test]
fn the_top_holds_what_it_should() {
    let ignored = fs::read_to_string(root().join(".gitignore")).expect(".gitignore can be read");
    let mut names = Vec::new();
    for entry in fs::read_dir(root()).expect("the top can be listed") {
        names.push(entry.expect("an entry can be read").file_name().to_string_lossy().into_owned());
    }
    let found = strangers(names.iter().map(String::as_str), &ignored);
    assert!(found.is_empty(), "these don't belong at the top: {found:?}");
    let missing: Vec<_> = TOP.iter().filter(|name| !names.iter().any(|other| other == *name)).collect();
    assert!(missing.is_empty(), "these are missing at the top: {missing:?}");
}

#[test]
fn planted_strangers_are_found() {
    let names = ["Cargo.toml", ".ci", "target", "notes.txt", "scripts"];
    assert_eq!(strangers(names.into_iter(), "/target\n/dist\n"), ["notes.txt", "scripts"]);
}
