//! Weighs the built site against its budgets.

use crate::build::{self, Part, Site};
use crate::workspace::nothing_else;
use anyhow::{Result, ensure};
use pico_args::Arguments;

/// What a phone on a poor line fetches before the first answer, in bytes of brotli.
const FIRST_ANSWER_MOST: usize = 200_000;
/// Where the first answer should stay, so that there is room.
const FIRST_ANSWER_AIM: usize = 180_000;
/// All that is kept for when there is no signal.
const KEPT_MOST: usize = 300_000;

/// `cargo xtask sizes`: builds, prints every file, and fails when a budget is broken.
pub fn command(arguments: Arguments) -> Result<()> {
    nothing_else(arguments)?;
    let site = build::site()?;
    print(&site);
    within_budget(&site)
}

/// Fails when a budget is broken.
pub fn within_budget(site: &Site) -> Result<()> {
    let (first, kept) = sums(site);
    ensure!(first <= FIRST_ANSWER_MOST, "the first answer takes {first} bytes, over {FIRST_ANSWER_MOST}");
    ensure!(kept <= KEPT_MOST, "what is kept takes {kept} bytes, over {KEPT_MOST}");
    Ok(())
}

/// Prints every file's weight and the sums.
pub fn print(site: &Site) {
    println!("{:>10} {:>10} {:>10}  file", "raw", "gzip", "brotli");
    for file in site.files() {
        let size = |copy: &Option<Vec<u8>>| copy.as_ref().map_or("-".into(), |bytes| bytes.len().to_string());
        println!(
            "{:>10} {:>10} {:>10}  {}",
            file.bytes.len(),
            size(&file.gzip),
            size(&file.brotli),
            file.name
        );
    }
    println!("{}", summary(site));
}

/// The two sums that matter, beside their budgets.
pub fn summary(site: &Site) -> String {
    let (first, kept) = sums(site);
    let kb = |bytes: usize| format!("{:.0} kB", bytes as f64 / 1000.0);
    format!(
        "first answer {} of at most {} (aim {}), kept for no signal {} of at most {}, compressed",
        kb(first),
        kb(FIRST_ANSWER_MOST),
        kb(FIRST_ANSWER_AIM),
        kb(kept),
        kb(KEPT_MOST)
    )
}

fn sums(site: &Site) -> (usize, usize) {
    let sum = |counts: fn(Part) -> bool| -> usize {
        site.files().iter().filter(|file| counts(file.part)).map(|file| file.on_the_line()).sum()
    };
    (sum(|part| part == Part::FirstAnswer), sum(|part| part != Part::Aside))
}
