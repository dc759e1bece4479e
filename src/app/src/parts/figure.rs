//! The answer: a big number, its unit, and its band in words right under it.

use super::html::{element, said, tag};
use crate::words::spoken::spoken;

/// A big number with its label, unit (empty for pH) and band.
pub fn figure(label: &str, value: &str, unit: &str, band: &str) -> String {
    let unit_said = if unit.is_empty() { String::new() } else { format!(" {unit}") };
    let name = spoken(&format!("{label}: {value}{unit_said}, {band}"));
    let number = said("b", "", value) + " " + &said("span", "unit", unit);
    let inner = said("p", "figure-label", label)
        + &element("p", "figure-value", &number)
        + &said("p", "figure-band", band);
    // Read as one sentence; the parts would be read as three scraps.
    let parts = tag("div", &[("aria-hidden", "true")], &inner);
    tag("div", &[("class", "figure")], &(said("p", "unseen", &name) + &parts))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn it_is_read_as_one_sentence() {
        let html = figure("PaCO₂ now", "≈57", "mmHg", "8 times in 10, 53 to 61");
        assert!(html.contains("<p class=\"unseen\">PaCO2 now: about 57 mmHg, 8 times in 10, 53 to 61</p>"));
        assert!(html.contains("<b>≈57</b>"));
    }
}
