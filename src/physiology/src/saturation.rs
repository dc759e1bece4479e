//! Oxygen saturation of haemoglobin.

use libm::pow;
use sources as s;

/// Saturation, 0–1, at a PO2 in mmHg, pH 7.40 and 37 °C (Severinghaus 1979, ±.0055 of his table).
#[must_use]
pub fn oxygen_saturation(po2_mmhg: f64) -> f64 {
    if po2_mmhg <= 0.0 {
        return 0.0;
    }
    let p = po2_mmhg;
    1.0 / (s::SEVERINGHAUS_A.value / (p * p * p + s::SEVERINGHAUS_B.value * p) + 1.0)
}

/// Saturation, 0–1, of blood at a PO2 in mmHg and its own pH: the pressure is first moved to pH 7.40 (Bohr).
#[must_use]
pub fn saturation_in_blood(po2_mmhg: f64, ph: f64) -> f64 {
    oxygen_saturation(po2_mmhg * pow(10.0, s::BOHR.value * (s::PH_REFERENCE.value - ph)))
}
