//! Keeping a case: the case file (JSON, version 1) and the journal on a shelf of text.
//!
//! Nothing that was written is ever erased or guessed at. Kinds and fields that this version does not
//! know are kept as they came and written back unchanged; text that can't be read is moved aside and
//! shown. No engine, no clock, no browser: a [`Shelf`] is handed in, and so is every moment.

mod book;
mod format;
mod journal;
mod shelf;

pub use book::{Book, BookError, CaseId};
pub use format::{
    CaseFile, FileError, LARGEST_FILE_BYTES, MOST_ENTRIES, Place, Problem, read_case_file, read_time,
    write_time,
};
pub use journal::SetAside;
pub use shelf::{Shelf, ShelfError};
