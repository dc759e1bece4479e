//! CO2 content of plasma and blood (Douglas, Jones, Reed 1988, with Kelman's pK').

use libm::{exp, pow};
use sources as s;

/// Millilitres per litre in a millilitre per decilitre.
const ML_L_PER_ML_DL: f64 = 10.0;

/// CO2 of plasma in mL STPD/dL at 37 °C.
#[must_use]
pub fn plasma_content_ml_dl(pco2_mmhg: f64, ph: f64) -> f64 {
    let pk = {
        let below_74 = s::PH_REFERENCE.value - ph;
        // Kelman gives pK' at 38 °C and its change per degree under it; at 37 °C that is one degree.
        s::KELMAN_PK.value
            + s::KELMAN_PK_PH.value * below_74
            + s::KELMAN_PK_T.value
            + s::KELMAN_PK_T_PH.value * below_74
    };
    s::DOUGLAS_MOLAR.value * s::CO2_SOLUBILITY.value * pco2_mmhg * (1.0 + pow(10.0, ph - pk))
}

/// Whether the blood-to-plasma ratio is Douglas' own at `ph`: inside 6.7–7.7.
pub(crate) fn inside_douglas(ph: f64) -> bool {
    (s::DOUGLAS_PH_LEAST.value..=s::DOUGLAS_PH_MOST.value).contains(&ph)
}

/// CO2 content of blood over that of its plasma. Its pole at pH 8.142 makes the formula useless above 7.7:
/// outside pH 6.7–7.7 the ratio goes on from the edge along its relative slope there, so that it stays positive
/// and the content keeps a slope without a step; whoever asks says that it is less sure.
#[must_use]
pub fn blood_to_plasma_ratio(ph: f64, hb_g_dl: f64, saturation: f64) -> f64 {
    let lost =
        s::DOUGLAS_HB.value * hb_g_dl / (s::DOUGLAS_OXY.value - s::DOUGLAS_OXY_SLOPE.value * saturation);
    if inside_douglas(ph) {
        return 1.0 - lost / (s::DOUGLAS_PH.value - ph);
    }
    let edge =
        if ph < s::DOUGLAS_PH_LEAST.value { s::DOUGLAS_PH_LEAST.value } else { s::DOUGLAS_PH_MOST.value };
    let from_pole = s::DOUGLAS_PH.value - edge;
    let ratio = 1.0 - lost / from_pole;
    ratio * exp(-lost / (from_pole * from_pole) / ratio * (ph - edge))
}

/// CO2 of blood in mL STPD/L at 37 °C; haemoglobin in g/dL, saturation 0–1.
#[must_use]
pub fn blood_content_ml_l(pco2_mmhg: f64, ph: f64, hb_g_dl: f64, saturation: f64) -> f64 {
    plasma_content_ml_dl(pco2_mmhg, ph) * blood_to_plasma_ratio(ph, hb_g_dl, saturation) * ML_L_PER_ML_DL
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn the_published_point() {
        // Another implementation's own test of Douglas 1988: Hb 10, SO2 .9, PCO2 5 kPa, pH 7.4.
        assert_abs_diff_eq!(plasma_content_ml_dl(37.503, 7.4), 54.8038, epsilon = 1e-3);
        assert_abs_diff_eq!(blood_to_plasma_ratio(7.4, 10.0, 0.9), 0.867_593, epsilon = 1e-5);
    }

    #[test]
    fn the_ratio_and_its_slope_go_over_the_edges_without_a_step() {
        for edge in [6.7, 7.7] {
            let ratio = |by: f64| blood_to_plasma_ratio(edge + by, 14.0, 0.97);
            let h = 1e-6;
            assert_abs_diff_eq!(ratio(-h), ratio(h), epsilon = 1e-5);
            let (below, above) = ((ratio(-h) - ratio(-2.0 * h)) / h, (ratio(2.0 * h) - ratio(h)) / h);
            assert_abs_diff_eq!(below, above, epsilon = 1e-4);
        }
        // Positive and falling up to a pH that no blood reaches.
        for hb in [3.0, 25.0] {
            assert!(blood_to_plasma_ratio(9.0, hb, 0.97) > 0.0);
            assert!(blood_to_plasma_ratio(8.0, hb, 0.97) < blood_to_plasma_ratio(7.8, hb, 0.97));
        }
    }
}
