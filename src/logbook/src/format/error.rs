//! Why a case file can't be read: each a sentence with the entry, the field, the value, the limit and what
//! to do.

use units::OutOfLimits;

/// Why a case file was refused. Nothing was taken from it.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum FileError {
    /// Over [`LARGEST_FILE_BYTES`](super::LARGEST_FILE_BYTES); not parsed.
    #[error("The file has {:.1} MB; a case file has at most {:.0} MB. Check that it is the right file.", mb(*.bytes), mb(super::LARGEST_FILE_BYTES as u64))]
    TooLarge {
        /// Its length.
        bytes: u64,
    },
    /// Nothing in it.
    #[error("The file is empty. Export the case again.")]
    Empty,
    /// It ends before its last bracket is closed.
    #[error(
        "The file stops in the middle, on line {line}: it seems to have been cut off. Copy or export it again."
    )]
    CutOff {
        /// The last line, counted from 1.
        line: usize,
    },
    /// Something else than JSON, or JSON that says two things at once.
    #[error("The file can't be read as JSON: {reason}. Check that it is a case file, or export it again.")]
    NotJson {
        /// What the parser says, with line and column.
        reason: String,
    },
    /// JSON, but no case file.
    #[error("This is no case file: {found}, not \"slackwater-case\". Check that it is the right file.")]
    NotACase {
        /// What it is, or what stands in `format`.
        found: String,
    },
    /// Written by a newer version.
    #[error(
        "The file is of version {version}, made by a newer version of Slackwater; this one reads version 1. Open it there, or update this one. Nothing was changed."
    )]
    NewerVersion {
        /// Its version.
        version: u64,
    },
    /// `version` is missing or no version that ever was.
    #[error("The file's version is {found}; this one reads version 1. Export the case again.")]
    NoVersion {
        /// What stands there.
        found: String,
    },
    /// More entries than a case may have.
    #[error(
        "The file has {count} entries; a case has at most {}. Split it into several cases.",
        super::MOST_ENTRIES
    )]
    TooManyEntries {
        /// How many.
        count: usize,
    },
    /// One field of one entry.
    #[error("{}: {problem}", head(.place, .field))]
    Field {
        /// Where.
        place: Place,
        /// The field; empty when the whole place is meant.
        field: String,
        /// What is wrong and what to do.
        problem: Problem,
    },
}

/// Where in the file.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Place {
    /// The outermost object.
    File,
    /// `person`.
    Person,
    /// An entry by its id.
    Entry(String),
    /// An entry without an id, by its number counted from 1.
    EntryNumber(usize),
}

impl std::fmt::Display for Place {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        match self {
            Place::File => f.write_str("file"),
            Place::Person => f.write_str("person"),
            Place::Entry(id) => write!(f, "entry {}", shown(id)),
            Place::EntryNumber(number) => write!(f, "entry number {number}"),
        }
    }
}

/// What is wrong with a field, and what to do.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum Problem {
    /// Not there, and nothing can be said without it.
    #[error("missing. {advice}")]
    Missing {
        /// What to write.
        advice: &'static str,
    },
    /// A text where a number belongs, and so on.
    #[error("{found} is not {wanted}.")]
    WrongType {
        /// What stands there.
        found: String,
        /// What belongs there, with how to write it.
        wanted: &'static str,
    },
    /// Outside its limits.
    #[error("{0}")]
    OutOfLimits(Box<OutOfLimits>),
    /// No moment in time.
    #[error("{found} is not a time. Write it as 2026-03-02T21:10:00Z.")]
    NotATime {
        /// What stands there.
        found: String,
    },
    /// Two entries with one id say different things.
    #[error("two entries share this id and differ. Give one of them another id.")]
    SameIdDiffers,
    /// A correction or a decision about an entry that is not there.
    #[error("there is no entry {of} here. Write the id of the entry that is meant.")]
    NoSuchEntry {
        /// The id it names.
        of: String,
    },
    /// A correction of a correction.
    #[error("entry {of} is itself a correction. Correct the first entry again instead.")]
    CorrectsACorrection {
        /// The id it names.
        of: String,
    },
    /// What a correction can't change.
    #[error("can't be corrected. Write a new entry instead.")]
    NotCorrectable,
    /// Two fields where one belongs.
    #[error("stands beside {other}. Write one of the two.")]
    BesideAnother {
        /// The other field.
        other: &'static str,
    },
}

impl FileError {
    pub(super) fn field(place: &Place, field: impl Into<String>, problem: Problem) -> Self {
        FileError::Field { place: place.clone(), field: field.into(), problem }
    }

    /// Whether the entry is sound and only doesn't go with the others that are there.
    pub(crate) fn is_about_another(&self) -> bool {
        let FileError::Field { problem, .. } = self else { return false };
        matches!(
            problem,
            Problem::SameIdDiffers | Problem::NoSuchEntry { .. } | Problem::CorrectsACorrection { .. }
        )
    }

    /// The same error with the limits of `group` in its words.
    pub(super) fn in_words_for(mut self, group: units::AgeGroup) -> Self {
        if let FileError::Field { problem: Problem::OutOfLimits(refusal), .. } = &mut self
            && let Err(narrower) = units::check(refusal.quantity, group, refusal.value)
        {
            **refusal = narrower;
        }
        self
    }
}

/// Megabytes, rounded up to a tenth, so that a file just over the limit doesn't read as the limit.
fn mb(bytes: u64) -> f64 {
    (bytes as f64 / 1e5).ceil() / 10.0
}

fn head(place: &Place, field: &str) -> String {
    if field.is_empty() { place.to_string() } else { format!("{place}, {}", shown(field)) }
}

/// Longest piece of foreign text in a message.
const SHOWN: usize = 40;

/// Text from a file as it may stand in a one-line message: no control characters, not endless.
pub(crate) fn shown(text: &str) -> String {
    let mut short: String = text.chars().take(SHOWN).flat_map(printable).collect();
    if text.chars().nth(SHOWN).is_some() {
        short.push('…');
    }
    short
}

fn printable(c: char) -> Vec<char> {
    if c.is_control() { c.escape_default().collect() } else { vec![c] }
}
