//! CO2 content of plasma and blood (Douglas, Jones, Reed 1988, with Kelman's pK').

use libm::pow;
use sources as s;

/// Which edge of the range pH 6.7–7.7 the blood-to-plasma ratio is held at.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ContentEdge {
    /// Inside: not held.
    Inside,
    /// Below pH 6.7.
    Below,
    /// Above pH 7.7.
    Above,
}

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

/// Where `ph` lies against the range in which the ratio may be used.
#[must_use]
pub fn edge(ph: f64) -> ContentEdge {
    if ph < s::DOUGLAS_PH_LEAST.value {
        ContentEdge::Below
    } else if ph > s::DOUGLAS_PH_MOST.value {
        ContentEdge::Above
    } else {
        ContentEdge::Inside
    }
}

/// CO2 content of blood over that of its plasma. Its pole at pH 8.142 makes it useless above 7.7: outside
/// pH 6.7–7.7 the value at the edge is held, and whoever asks says so.
#[must_use]
pub fn blood_to_plasma_ratio(ph: f64, hb_g_dl: f64, saturation: f64) -> f64 {
    let held = match edge(ph) {
        ContentEdge::Inside => ph,
        ContentEdge::Below => s::DOUGLAS_PH_LEAST.value,
        ContentEdge::Above => s::DOUGLAS_PH_MOST.value,
    };
    1.0 - s::DOUGLAS_HB.value * hb_g_dl
        / ((s::DOUGLAS_OXY.value - s::DOUGLAS_OXY_SLOPE.value * saturation) * (s::DOUGLAS_PH.value - held))
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
}
