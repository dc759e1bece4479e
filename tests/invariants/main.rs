//! The rules of the house, each one a test: who may depend on whom, what lies below the app touches no clock and no
//! browser, numbers are never clamped, one library does the maths. Every checker is itself tried on a planted offence.

mod figures;
mod imports;
mod repository;
mod source;
mod tokens;

use std::path::{Path, PathBuf};

/// The top of the repository.
fn root() -> PathBuf {
    let here = Path::new(env!("CARGO_MANIFEST_DIR"));
    here.parent().unwrap_or(here).to_path_buf()
}
