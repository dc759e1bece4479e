//! ARDS Network. N Engl J Med 2000;342:1301: predicted body weight, and the tidal volume it leads to.

use physiology::{Sex, predicted_body_weight_kg};

/// The protocol card counts 2.3 kg an inch, the paper .91 kg a cm, which is 2.311: .11 kg at 10 inches, and the
/// card's one decimal.
const KG: f64 = 0.17;

#[test]
fn a_man_of_70_inches() {
    // Card: 70 inches (177.8 cm), 73.0 kg; 6 mL/kg is 438 mL.
    let kg = predicted_body_weight_kg(Sex::Male, 177.8);
    assert!((kg - 73.0).abs() < KG, "{kg}");
    assert!((6.0 * kg - 438.0).abs() < 6.0 * KG);
}

#[test]
fn a_woman_is_four_and_a_half_kg_lighter_at_every_height() {
    for height in [150.0, 163.0, 180.0] {
        let apart =
            predicted_body_weight_kg(Sex::Male, height) - predicted_body_weight_kg(Sex::Female, height);
        assert!((apart - 4.5).abs() < 1e-9);
    }
}
