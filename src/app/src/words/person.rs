//! Words of the case sheet.

/// The room.
pub const TITLE: &str = "Case";
/// What a label is.
pub const LABEL_HINT: &str = "A bed or a number of your own. No name, nothing that tells who it is.";
/// The label's label.
pub const LABEL: &str = "Label";
/// What is wrong with a label.
pub fn label_fault(text: &str) -> Option<String> {
    let letters = text.trim().chars().count();
    if letters == 0 {
        Some(LABEL_NEEDED.to_owned())
    } else if letters > LABEL_MOST {
        Some(LABEL_LONG.to_owned())
    } else {
        None
    }
}
/// No label.
const LABEL_NEEDED: &str = "Type a label: the buttons that write name the case by it.";
/// The label is too long.
const LABEL_LONG: &str = "At most 24 letters, so that it fits on the buttons.";
/// Most letters of a label.
const LABEL_MOST: usize = 24;
/// Writes the sheet.
pub fn save(label: &str) -> String {
    format!("{label}: SAVE")
}
/// Nothing open.
pub const NO_CASE: &str = "No case is open yet. It starts with the first gas.";
/// Starts another.
pub const NEW_CASE: &str = "New case: type a gas";
/// Heads the list.
pub const OTHERS: &str = "Other cases";
/// Opens another.
pub fn open(label: &str) -> String {
    format!("Open {label}")
}
/// A case's default label.
pub fn default_label(number: usize) -> String {
    format!("Case {number}")
}
/// It was written.
pub const SAVED: &str = "Saved.";
/// Goes to the first screen.
pub const CAUTIONS: &str = "Cautions, import, invented case";
