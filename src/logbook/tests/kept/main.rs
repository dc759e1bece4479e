//! What is kept: case files and journals, read back as they were written.

#![allow(clippy::unwrap_used, reason = "a test fails by it")]

mod generate;
mod journal;
mod journal_damage;
mod round_trip;
