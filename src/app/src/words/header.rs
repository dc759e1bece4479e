//! Words of the header.

/// Goes back; what was typed stays.
pub const BACK: &str = "Back";
/// The case, spoken.
pub fn case(label: &str) -> String {
    format!("Case sheet of {label}")
}
