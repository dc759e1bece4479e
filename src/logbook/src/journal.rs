//! The journal: one record a key, each put once and never written over. The version stands outside the
//! body, so that "too new" can be said before anything is decoded.

use case::Moment;
use serde_json::Value;

use crate::format::json::{describe, parse};
use crate::format::shown;
use crate::{CaseId, Shelf, ShelfError};

/// Every key of the journal starts so.
const JOURNAL: &str = "slackwater.journal.";
/// Text that could not be read is kept under a key that starts so.
const SET_ASIDE: &str = "slackwater.set-aside.";
/// The one key that is written over: the id of the case that is open.
pub(crate) const OPEN_CASE: &str = "slackwater.open-case";

const VERSION: u64 = 1;

/// A text that could not be read or not be used: moved aside or left where it was, and shown.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SetAside {
    /// The key it is kept under now.
    pub key: String,
    /// Why, as a sentence.
    pub why: String,
    /// The text as it was found.
    pub text: String,
}

/// What a record holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum What {
    /// A case file: the start of a case, with all its entries when it was imported.
    Case,
    /// One entry.
    Entry,
    /// The whole person; the last one written holds.
    Person,
    /// The label; the last one written holds.
    Label,
}

const NAMES: [(&str, What); 4] =
    [("case", What::Case), ("entry", What::Entry), ("person", What::Person), ("label", What::Label)];

impl What {
    fn name(self) -> &'static str {
        NAMES.iter().find(|(_, what)| *what == self).map_or("", |(name, _)| name)
    }
}

/// One record.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Record {
    pub(crate) case: CaseId,
    pub(crate) what: What,
    pub(crate) written_at: Moment,
    pub(crate) body: Value,
}

/// Why a record was not read.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) enum Unread {
    /// From a newer version: left in place, untouched.
    TooNew(String),
    /// Not readable: moved aside.
    Damaged(String),
}

impl Record {
    /// Reads a record's text.
    pub(crate) fn read(text: &str) -> Result<Record, Unread> {
        let damaged = |why: &str| Unread::Damaged(format!("A record of the journal {why}."));
        let value = parse(text).map_err(|_| damaged("is not whole: it can't be read as JSON"))?;
        let found = |name: &str| value.get(name).map_or_else(|| "missing".to_owned(), describe);
        match value.get("v").and_then(Value::as_u64) {
            Some(VERSION) => {}
            Some(version) if version > VERSION => {
                return Err(Unread::TooNew(format!(
                    "A record was written by a newer version of Slackwater (its version is {version}, this one \
                     reads {VERSION}). It is left as it is; update to read it."
                )));
            }
            _ => return Err(damaged(&format!("has no version that is known: v is {}", found("v")))),
        }
        let text = |name: &str| value.get(name).and_then(Value::as_str);
        let case = text("case").ok_or_else(|| damaged("does not say which case it belongs to"))?;
        let name = text("record").ok_or_else(|| damaged("does not say what it is"))?;
        let Some((_, what)) = NAMES.iter().find(|(known, _)| *known == name) else {
            return Err(Unread::TooNew(format!(
                "A record is a {}, which this version does not know. It is left as it is.",
                shown(name)
            )));
        };
        let written_at = value.get("written_at_ms").and_then(Value::as_i64);
        let written_at = written_at.ok_or_else(|| damaged("does not say when it was written"))?;
        let body = value.get("body").cloned().ok_or_else(|| damaged("has no body"))?;
        Ok(Record { case: CaseId(case.to_owned()), what: *what, written_at: Moment(written_at), body })
    }
}

/// A record on its way to the shelf.
#[derive(Debug, Clone)]
pub(crate) struct Outgoing {
    key: String,
    text: String,
    /// How many things are lost with it.
    pub(crate) weight: usize,
}

impl Outgoing {
    /// A record of `case`. `name` makes its key its own beside others of the same moment.
    pub(crate) fn new(case: &CaseId, what: What, written_at: Moment, name: &str, body: &str) -> Self {
        let (id, kind, ms) = (&case.0, what.name(), written_at.0);
        let quoted = Value::from(id.as_str());
        Self {
            key: format!("{JOURNAL}{id}.{ms}.{kind}.{name}"),
            text: format!(
                "{{\"v\":{VERSION},\"case\":{quoted},\"record\":\"{kind}\",\"written_at_ms\":{ms},\"body\":{body}}}"
            ),
            weight: 1,
        }
    }

    /// Puts it under a key that is free.
    pub(crate) fn put<S: Shelf>(&self, shelf: &mut S) -> Result<(), ShelfError> {
        put_fresh(shelf, &self.key, &self.text).map(drop)
    }
}

/// The keys of the journal in one order, whatever the shelf's.
pub(crate) fn journal_keys<S: Shelf>(shelf: &S) -> Result<Vec<String>, ShelfError> {
    keys_with(shelf, JOURNAL)
}

/// What earlier sessions moved aside.
pub(crate) fn earlier_set_aside<S: Shelf>(
    shelf: &S,
    why: impl Fn(&str) -> String,
) -> Result<Vec<SetAside>, ShelfError> {
    let mut list = Vec::new();
    for key in keys_with(shelf, SET_ASIDE)? {
        if let Some(text) = shelf.get(&key)? {
            list.push(SetAside { why: why(&text), key, text });
        }
    }
    Ok(list)
}

/// Copies a text that can't be read under a set-aside key and then takes it out of the journal. Where
/// the shelf refuses, it stays where it is and is tried again at the next opening.
pub(crate) fn move_aside<S: Shelf>(shelf: &mut S, key: String, why: String, text: String) -> SetAside {
    let tail = key.strip_prefix(JOURNAL).unwrap_or(&key);
    let moved = put_fresh(shelf, &format!("{SET_ASIDE}{tail}"), &text)
        .and_then(|aside| shelf.remove(&key).map(|()| aside));
    match moved {
        Ok(aside) => SetAside { key: aside, why, text },
        Err(refusal) => SetAside { key, why: format!("{why} It is still in its place: {refusal}"), text },
    }
}

fn keys_with<S: Shelf>(shelf: &S, prefix: &str) -> Result<Vec<String>, ShelfError> {
    let mut keys = shelf.keys()?;
    keys.retain(|key| key.starts_with(prefix));
    keys.sort_unstable();
    Ok(keys)
}

/// Puts `text` under `key`, or under `key` with a number when another text is there. Nothing is written
/// over; the same text already there is enough. Returns the key.
fn put_fresh<S: Shelf>(shelf: &mut S, key: &str, text: &str) -> Result<String, ShelfError> {
    let mut number = 1_u32;
    loop {
        let tried = if number == 1 { key.to_owned() } else { format!("{key}.{number}") };
        match shelf.get(&tried)? {
            Some(present) if present == text => return Ok(tried),
            Some(_) => number += 1,
            None => return shelf.put(&tried, text).map(|()| tried),
        }
    }
}
