//! Reading the case file from the disk.

use std::fs::File;
use std::io::Read;
use std::path::Path;

use logbook::{CaseFile, FileError, LARGEST_FILE_BYTES, read_case_file};

/// Reads a case file. One that is too large is refused by its length, before anything of it is read.
///
/// # Errors
/// One line with the path and what is wrong.
pub fn read(path: &Path) -> Result<CaseFile, String> {
    let named = |why: &dyn std::fmt::Display| format!("{}: {why}", path.display());
    let file = File::open(path).map_err(|error| named(&format_args!("can't be opened: {error}.")))?;
    let metadata = file.metadata().map_err(|error| named(&format_args!("can't be read: {error}.")))?;
    if metadata.is_dir() {
        return Err(named(&"is a folder. Name a case file."));
    }
    let too_large = |bytes: u64| named(&FileError::TooLarge { bytes });
    let largest = LARGEST_FILE_BYTES as u64;
    if metadata.len() > largest {
        return Err(too_large(metadata.len()));
    }
    // A pipe has no length: one byte over the limit is enough to know.
    let mut bytes = Vec::new();
    let read = file.take(largest + 1).read_to_end(&mut bytes);
    read.map_err(|error| named(&format_args!("can't be read: {error}.")))?;
    if bytes.len() > LARGEST_FILE_BYTES {
        return Err(too_large(bytes.len() as u64));
    }
    let text = String::from_utf8(bytes)
        .map_err(|_| named(&"is not text in UTF-8. Check that it is a case file, or export it again."))?;
    read_case_file(&text).map_err(|error| named(&error))
}
