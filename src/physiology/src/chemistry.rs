//! One patient's CO2 curve, tabled once and read in the hot loop with + − × ÷ only.
//!
//! Two buffers, two time scales. In one pass through lung or tissue blood is a closed buffer at its own base
//! excess; over minutes it shares its buffers with the fluid around it, and the patient's pH follows his
//! standard base excess. One table serves both and keeps CO2: F(P) is the integral of the closed-blood
//! slope, its base excess at each P taken on the line of the standard base excess. Exchange is Q·[F(Pv) − F(Pa)].

use libm::sqrt;
use sources as s;

use crate::acid_base::{LN_10, be_blood, blood_buffer, hco3_mmol_l, ph_at, ph_of_blood};
use crate::content::{blood_content_ml_l, inside_douglas};

/// Intervals of the table, equal steps of √P: 0.1 mmHg^½ keeps the interpolation under 1e-4 mL/L.
const INTERVALS: usize = 120;

/// Step of the difference that gives the slope, relative to P: truncation and rounding both under 1e-8.
const SLOPE_STEP: f64 = 1e-4;

/// Saturation at which the Haldane offset is measured against the arterial one: typical of mixed venous blood.
const VENOUS_SATURATION: f64 = 0.70;

/// PCO2 at which it is measured, mmHg: it moves by a tenth between 30 and 80.
const HALDANE_AT_MMHG: f64 = 45.0;

/// What a patient's curve is made from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ChemistryInput {
    /// Standard base excess, mmol/L.
    pub standard_be: f64,
    /// Haemoglobin, g/dL.
    pub hb_g_dl: f64,
    /// Arterial oxygen saturation, 0–1.
    pub saturation: f64,
}

/// Why no curve can be made.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum Unsound {
    /// The blood's slope is not positive and finite somewhere in 4–196 mmHg.
    #[error(
        "the CO₂ curve can't be computed for this gas: base excess {standard_be:.0} mmol/L with haemoglobin {hb_g_dl:.1} g/dL. Check pH, PaCO₂ and haemoglobin."
    )]
    Curve {
        /// Standard base excess given.
        standard_be: f64,
        /// Haemoglobin given.
        hb_g_dl: f64,
    },
}

/// The tabled curve: F in mL STPD/L and its slope against x = √P.
#[derive(Debug, Clone, PartialEq)]
pub struct Chemistry {
    input: ChemistryInput,
    first_x: f64,
    step_x: f64,
    /// Cubic coefficients of F in the place inside each interval, which runs from 0 to 1.
    cubics: Vec<[f64; 4]>,
    /// F and its slope against x at the end of the table.
    end: (f64, f64),
    haldane_ml_l: f64,
}

impl Chemistry {
    /// Tables the curve from 4 to 196 mmHg.
    ///
    /// # Errors
    /// [`Unsound::Curve`] when a slope is not positive and finite.
    pub fn new(input: ChemistryInput) -> Result<Self, Unsound> {
        let first_x = sqrt(s::PRESSURE_LEAST.value);
        let step_x = (sqrt(s::PRESSURE_MOST.value) - first_x) / INTERVALS as f64;
        let mut content = Vec::with_capacity(INTERVALS + 1);
        let mut slope = Vec::with_capacity(INTERVALS + 1);
        let (mut total, mut previous) = (0.0, 0.0);
        for i in 0..=INTERVALS {
            let x = first_x + step_x * i as f64;
            let here = slope_against_root(x, &input);
            if i > 0 {
                let middle = slope_against_root(x - 0.5 * step_x, &input);
                total += step_x / 6.0 * (previous + 4.0 * middle + here);
            }
            if !(here.is_finite() && here > 0.0 && total.is_finite()) {
                return Err(Unsound::Curve { standard_be: input.standard_be, hb_g_dl: input.hb_g_dl });
            }
            content.push(total);
            slope.push(here);
            previous = here;
        }
        let cubics = content
            .windows(2)
            .zip(slope.windows(2))
            .map(|(y, d)| {
                let (d0, d1, rise) = (d[0] * step_x, d[1] * step_x, y[1] - y[0]);
                [y[0], d0, 3.0 * rise - 2.0 * d0 - d1, d0 + d1 - 2.0 * rise]
            })
            .collect();
        Ok(Self { haldane_ml_l: haldane(&input), input, first_x, step_x, cubics, end: (total, previous) })
    }

    /// What the curve was made from.
    #[must_use]
    pub fn input(&self) -> ChemistryInput {
        self.input
    }

    /// Whether the blood-to-plasma ratio is Douglas' own at this PCO2 (pH 6.7–7.7) and not drawn on beyond it.
    #[must_use]
    pub fn inside_douglas(&self, pco2_mmhg: f64) -> bool {
        inside_douglas(ph_at(pco2_mmhg, self.input.standard_be))
    }

    /// CO2 that a litre of blood gains when its saturation falls by 1 at the same PCO2, mL STPD (Haldane).
    #[must_use]
    pub fn haldane_ml_l(&self) -> f64 {
        self.haldane_ml_l
    }

    /// F and its slope against x at x = √P: cubic Hermite inside the table, a straight line beyond it.
    #[inline]
    pub(crate) fn at(&self, x: f64) -> (f64, f64) {
        let place = (x - self.first_x) / self.step_x;
        if place.is_nan() || place <= 0.0 {
            let [_, d, _, _] = self.cubics[0];
            return (d * place, d / self.step_x);
        }
        let i = place as usize;
        let Some([y, d, c2, c3]) = self.cubics.get(i) else {
            let beyond = (place - self.cubics.len() as f64) * self.step_x;
            return (self.end.0 + self.end.1 * beyond, self.end.1);
        };
        let t = place - i as f64;
        (y + t * (d + t * (c2 + t * c3)), (d + t * (2.0 * c2 + 3.0 * t * c3)) / self.step_x)
    }

    /// F in mL STPD/L against 4 mmHg, at a PCO2 in mmHg.
    #[must_use]
    pub fn transport_content_ml_l(&self, pco2_mmhg: f64) -> f64 {
        self.at(sqrt(pco2_mmhg)).0
    }

    /// Slope of the closed blood, mL STPD/L/mmHg, at a PCO2 in mmHg.
    #[must_use]
    pub fn closed_slope_ml_l_mmhg(&self, pco2_mmhg: f64) -> f64 {
        let x = sqrt(pco2_mmhg);
        self.at(x).1 / (2.0 * x)
    }

    /// The root pressure at which F reaches `content`: Newton from `guess_x`; F rises, so it converges.
    pub(crate) fn root_at_content(&self, content: f64, guess_x: f64) -> f64 {
        const STEPS: usize = 30;
        const DONE: f64 = 1e-12;
        let mut x = guess_x;
        for _ in 0..STEPS {
            let (f, slope) = self.at(x);
            let next = x - (f - content) / slope;
            let moved = (next - x).abs();
            x = if next > 0.0 { next } else { 0.5 * x };
            if moved < DONE {
                break;
            }
        }
        x
    }
}

/// dF/dx at x = √P.
fn slope_against_root(x: f64, input: &ChemistryInput) -> f64 {
    2.0 * x * closed_slope(x * x, input)
}

/// Slope of closed blood at P, through the point on the line of the standard base excess.
fn closed_slope(p: f64, input: &ChemistryInput) -> f64 {
    slope_through(p, ph_at(p, input.standard_be), input)
}

/// Slope of the content of blood in a closed vessel, through (`p`, `ph`): along the pH of constant base excess.
fn slope_through(p: f64, ph: f64, input: &ChemistryInput) -> f64 {
    let hco3 = hco3_mmol_l(ph, p);
    let dph_dp = -(hco3 / p) / (LN_10 * hco3 + blood_buffer(input.hb_g_dl));
    let h = SLOPE_STEP * p;
    let content =
        |sign: f64| blood_content_ml_l(p + sign * h, ph + sign * h * dph_dp, input.hb_g_dl, input.saturation);
    (content(1.0) - content(-1.0)) / (2.0 * h)
}

/// Gain of content per unit of saturation lost, at one PCO2, base excess moving with oxygenation.
fn haldane(input: &ChemistryInput) -> f64 {
    let hb = input.hb_g_dl;
    let ph = ph_at(HALDANE_AT_MMHG, input.standard_be);
    let lost = input.saturation - VENOUS_SATURATION * input.saturation;
    if lost <= 0.0 {
        return 0.0;
    }
    let arterial_be = be_blood(ph, HALDANE_AT_MMHG, hb);
    let venous_ph = ph_of_blood(HALDANE_AT_MMHG, arterial_be + s::BE_OXYGENATION.value * hb * lost, hb);
    let venous = blood_content_ml_l(HALDANE_AT_MMHG, venous_ph, hb, VENOUS_SATURATION * input.saturation);
    (venous - blood_content_ml_l(HALDANE_AT_MMHG, ph, hb, input.saturation)) / lost
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    fn curve(standard_be: f64, hb_g_dl: f64) -> Chemistry {
        Chemistry::new(ChemistryInput { standard_be, hb_g_dl, saturation: 0.97 }).unwrap()
    }

    /// Half of the last printed digit of the rows below, and a little for their rounding of base excess.
    const ROW_ROUNDING: f64 = 0.06;

    #[test]
    fn the_slopes_computed_before() {
        // Computed before this program: slope of blood CO2 content at PCO2 20/40/60/100, SO2 .97, at constant
        // base excess of the blood (Douglas 1988 with whole-blood Van Slyke). BE +8 at 20 mmHg lies above
        // pH 7.7, where the row (13.8) runs towards the pole and ours does not: not compared.
        let rows: [(f64, f64, [f64; 4]); 5] = [
            (-22.0, 14.0, [4.5, 3.2, 2.5, 1.9]),
            (-10.0, 14.0, [6.8, 4.2, 3.1, 2.2]),
            (0.0, 14.0, [9.5, 5.1, 3.6, 2.4]),
            (8.0, 14.0, [f64::NAN, 6.2, 4.1, 2.6]),
            (0.0, 8.0, [8.1, 4.1, 2.9, 2.0]),
        ];
        for (be, hb, slopes) in rows {
            let input = ChemistryInput { standard_be: be, hb_g_dl: hb, saturation: 0.97 };
            for (p, slope) in [20.0, 40.0, 60.0, 100.0].into_iter().zip(slopes) {
                let ph = ph_of_blood(p, be, hb);
                if !inside_douglas(ph) {
                    assert!(slope.is_nan(), "only the row marked so lies outside");
                    continue;
                }
                let ours = slope_through(p, ph, &input);
                println!("BE {be} Hb {hb} PCO2 {p}: {ours:.2} (row {slope})");
                assert_abs_diff_eq!(ours, slope, epsilon = ROW_ROUNDING);
            }
        }
    }

    #[test]
    fn the_table_is_its_own_integral() {
        let chemistry = curve(-0.58, 14.0);
        for p in [4.5, 14.0, 40.0, 71.0, 150.0, 195.0] {
            let (h, f) = (0.01, |p: f64| chemistry.transport_content_ml_l(p));
            let slope = (f(p + h) - f(p - h)) / (2.0 * h);
            let direct = closed_slope(p, &chemistry.input);
            assert_abs_diff_eq!(slope, direct, epsilon = 1e-3 * direct);
        }
    }

    #[test]
    fn beyond_the_table_it_goes_on_straight_and_rising() {
        let chemistry = curve(0.0, 14.0);
        assert!(chemistry.at(1.0).0 < chemistry.at(2.0).0);
        assert!(chemistry.at(15.0).0 > chemistry.at(14.0).0);
        let x = chemistry.root_at_content(chemistry.at(15.0).0, 6.0);
        assert_abs_diff_eq!(x, 15.0, epsilon = 1e-9);
    }
}
