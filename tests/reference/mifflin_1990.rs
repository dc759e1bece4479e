//! Mifflin et al. Am J Clin Nutr 1990;51:241 with Weir. J Physiol 1949;109:1: CO2 production at rest.

use physiology::{Patient, Sex, resting_production};

/// By hand to the second decimal.
const ML_MIN: f64 = 0.01;

#[test]
fn a_man_of_70_kg() {
    // 10·70 + 6.25·175 − 5·40 + 5 = 1598.75 kcal/d; × .1175 (Weir at a respiratory quotient of .82) = 187.85.
    let patient = Patient {
        sex: Some(Sex::Male),
        age_years: Some(40.0),
        height_cm: Some(175.0),
        height_guessed: false,
        weight_kg: Some(70.0),
    };
    assert!((resting_production(&patient).0 - 187.853).abs() < ML_MIN);
}

#[test]
fn the_factor_is_weirs_own() {
    // EE = 1440·(3.941·VO2 + 1.106·VCO2), VO2 = VCO2/.82: one kcal/d is 1000/(1440·(3.941/.82 + 1.106)) mL/min.
    let factor = 1000.0 / (1440.0 * (3.941 / 0.82 + 1.106));
    assert!((factor - sources::VCO2_PER_KCAL.value).abs() < 1e-4, "{factor}");
}
