//! Douglas, Jones, Reed. Calculation of whole blood CO2 content. J Appl Physiol 1988;65:473. The point is
//! another implementation's own test of it: Hb 10 g/dL, saturation .9, PCO2 5 kPa (37.5031 mmHg), pH 7.4.

use physiology::{Chemistry, ChemistryInput, blood_to_plasma_ratio, plasma_content_ml_dl};

/// The rows carry six digits.
const PLASMA_ML_DL: f64 = 1e-4;
const RATIO: f64 = 1e-6;

#[test]
fn the_worked_point() {
    let plasma = plasma_content_ml_dl(5.0 * units::KPA_IN_MMHG, 7.4);
    let ratio = blood_to_plasma_ratio(7.4, 10.0, 0.9);
    println!("plasma {plasma:.5} mL/dL (54.8038), ratio {ratio:.7} (.867593)");
    assert!((plasma - 54.8038).abs() < PLASMA_ML_DL);
    assert!((ratio - 0.867_593).abs() < RATIO);
}

#[test]
fn the_slope_of_blood_at_40_is_that_of_the_fast_models() {
    // Spencer, Firouztale, Mellins. Ann Biomed Eng 1979;7:59: their curve's slope at PCO2 40, PO2 95 is 5.0
    // mL/L/mmHg (computed from it); ours, at normal base excess and Hb 14, agrees to the digits of theirs.
    let input = ChemistryInput { standard_be: -0.58, hb_g_dl: 14.0, saturation: 0.97 };
    let slope = Chemistry::new(input).expect("normal blood has a curve").closed_slope_ml_l_mmhg(40.0);
    println!("slope at 40 mmHg {slope:.2} mL/L/mmHg");
    assert!((slope - 5.0).abs() < 0.15);
}
