//! The app in a real browser: Chromium at phone size, driven through WebDriver, against a server that can be stopped.
//!
//! `cargo xtask test` builds the site and runs these. By hand: `cargo xtask build`, then
//! `cargo test -p checks --features browser --test browser`. Pictures land in `target/shots`.

mod harness;

mod blocked;
mod expiry;
mod first_visit;
mod journey;
mod narrow;
mod no_signal;
mod served;
mod slips;
mod steps;
mod update;
