//! Words of the header and the bar.

/// Goes back; what was typed stays.
pub const BACK: &str = "Back";
/// The bar, spoken.
pub const ROOMS: &str = "Rooms";
/// The case, spoken: its label first, so that it can be called by what is seen.
pub fn case(label: &str) -> String {
    format!("{label}, case sheet")
}
