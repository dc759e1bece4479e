//! pH, bicarbonate and base excess: the CLSI set, end to end, at 37 °C.

use libm::{log10, pow};
use sources as s;

/// Natural logarithm of ten, to turn slopes per pH unit into slopes per ln.
pub(crate) const LN_10: f64 = core::f64::consts::LN_10;

/// pH is looked for between these; no blood inside the limits of typed values lies outside.
const PH_SEARCH: (f64, f64) = (5.5, 9.5);

/// Newton stops after a step smaller than this: what is left is its square.
const PH_STEP_DONE: f64 = 1e-6;

/// Newton from the middle needs 4–6 steps; the count bounds the loop.
const PH_STEPS: usize = 40;

/// HCO3 in mmol/L from pH and PCO2 in mmHg (CLSI C46-A).
#[must_use]
pub fn hco3_mmol_l(ph: f64, pco2_mmhg: f64) -> f64 {
    s::CO2_SOLUBILITY.value * pco2_mmhg * pow(10.0, ph - s::PK_CLSI.value)
}

/// Standard (extracellular) base excess in mmol/L (CLSI C46-A).
#[must_use]
pub fn standard_base_excess(ph: f64, pco2_mmhg: f64) -> f64 {
    hco3_mmol_l(ph, pco2_mmhg) - s::HCO3_REFERENCE.value
        + s::BUFFER_EXTRACELLULAR.value * (ph - s::PH_REFERENCE.value)
}

/// Base excess of blood in mmol/L, haemoglobin in g/dL (CLSI C46-A).
#[must_use]
pub fn be_blood(ph: f64, pco2_mmhg: f64, hb_g_dl: f64) -> f64 {
    (1.0 - s::BE_BLOOD_HB_FACTOR.value * hb_g_dl)
        * (hco3_mmol_l(ph, pco2_mmhg) - s::HCO3_REFERENCE.value
            + blood_buffer(hb_g_dl) * (ph - s::PH_REFERENCE.value))
}

/// pH at `pco2_mmhg` for a patient whose standard base excess stays.
#[must_use]
pub fn ph_at(pco2_mmhg: f64, standard_be: f64) -> f64 {
    solve_ph(pco2_mmhg, s::BUFFER_EXTRACELLULAR.value, standard_be)
}

/// pH at `pco2_mmhg` of blood in a syringe, whose own base excess stays.
#[must_use]
pub fn ph_of_blood(pco2_mmhg: f64, be_of_blood: f64, hb_g_dl: f64) -> f64 {
    let effective = be_of_blood / (1.0 - s::BE_BLOOD_HB_FACTOR.value * hb_g_dl);
    solve_ph(pco2_mmhg, blood_buffer(hb_g_dl), effective)
}

/// Buffering of whole blood, mmol/L per pH unit.
pub(crate) fn blood_buffer(hb_g_dl: f64) -> f64 {
    s::BUFFER_HAEMOGLOBIN.value * hb_g_dl + s::BUFFER_PLASMA.value
}

/// Finds the pH at which HCO3 − 24.8 + buffer·(pH − 7.40) equals `excess`: both terms rise with pH, so there
/// is one. Newton with a bracket that it may not leave.
fn solve_ph(pco2_mmhg: f64, buffer: f64, excess: f64) -> f64 {
    let (mut low, mut high) = PH_SEARCH;
    // Start where HCO3 alone would explain it, or at 7.40.
    let hco3_wanted = s::HCO3_REFERENCE.value + excess;
    let mut ph = if hco3_wanted > 1.0 {
        0.5 * (s::PK_CLSI.value
            + log10(hco3_wanted / (s::CO2_SOLUBILITY.value * pco2_mmhg))
            + s::PH_REFERENCE.value)
    } else {
        s::PH_REFERENCE.value
    };
    for _ in 0..PH_STEPS {
        let hco3 = hco3_mmol_l(ph, pco2_mmhg);
        let miss = hco3 - s::HCO3_REFERENCE.value + buffer * (ph - s::PH_REFERENCE.value) - excess;
        if miss > 0.0 {
            high = ph;
        } else {
            low = ph;
        }
        let mut next = ph - miss / (LN_10 * hco3 + buffer);
        if !(next >= low && next <= high) {
            next = 0.5 * (low + high);
        }
        let step = (next - ph).abs();
        ph = next;
        if step < PH_STEP_DONE {
            break;
        }
    }
    ph
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn the_set_at_its_middle() {
        // CLSI C46-A at 7.40/40: HCO3 24.22, standard base excess −0.58 (never zero).
        assert_abs_diff_eq!(hco3_mmol_l(7.40, 40.0), 24.22, epsilon = 0.005);
        assert_abs_diff_eq!(standard_base_excess(7.40, 40.0), -0.58, epsilon = 0.005);
    }

    #[test]
    fn ph_is_the_inverse_of_the_base_excess() {
        for pco2 in [4.0, 14.0, 40.0, 71.0, 196.0] {
            for be in [-30.0, -22.0, 0.0, 8.0, 30.0] {
                let ph = ph_at(pco2, be);
                assert_abs_diff_eq!(standard_base_excess(ph, pco2), be, epsilon = 1e-9);
                let ph = ph_of_blood(pco2, be, 14.0);
                assert_abs_diff_eq!(be_blood(ph, pco2, 14.0), be, epsilon = 1e-9);
            }
        }
    }
}
