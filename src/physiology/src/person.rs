//! From the person to sizes and production. Every part may be unknown: then the middle is assumed and the
//! spread grows.

use libm::{log, pow, sqrt};
use sources as s;
use units::FlowStpd;

/// Sex, as the formulas need it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Sex {
    /// Female.
    Female,
    /// Male.
    Male,
}

/// Depth of sedation, as production depends on it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SedationDepth {
    /// Light, or none.
    Light,
    /// Moderate, or not known.
    Moderate,
    /// Heavy.
    Heavy,
}

/// The patient as far as known.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Patient {
    /// Sex.
    pub sex: Option<Sex>,
    /// Age, years.
    pub age_years: Option<f64>,
    /// Height, cm.
    pub height_cm: Option<f64>,
    /// Whether the height is by eye.
    pub height_guessed: bool,
    /// Weight, kg.
    pub weight_kg: Option<f64>,
}

/// A size with its spread.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Size {
    /// Lean size that flows, volumes and dead space scale with, kg.
    pub lean_kg: f64,
    /// Tissue-bearing size, kg: a quarter of the excess counts.
    pub tissue_kg: f64,
    /// Spread of ln, common to all of them.
    pub ln_sd: f64,
}

/// Production at rest with its spread.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Production {
    /// Before the factors of sedation and temperature.
    pub resting: FlowStpd,
    /// Spread of ln at a known size.
    pub ln_sd: f64,
}

/// Predicted body weight in kg. Adults only: for a child it gives far too little.
#[must_use]
pub fn predicted_body_weight_kg(sex: Sex, height_cm: f64) -> f64 {
    let base = match sex {
        Sex::Male => s::PBW_MALE.value,
        Sex::Female => s::PBW_FEMALE.value,
    };
    base + s::PBW_PER_CM.value * (height_cm - s::PBW_REFERENCE_CM.value)
}

/// CO2 made at rest: Mifflin's energy through Weir's factor in adults, Smallwood's figures in children.
/// What is unknown is taken at its assumed middle.
#[must_use]
pub fn resting_production(patient: &Patient) -> FlowStpd {
    patient.production().resting
}

/// Factor on the resting production for sedation (adults only: the children's figures were measured under
/// it) and for a temperature in °C.
#[must_use]
pub fn production_factor(patient: &Patient, depth: SedationDepth, temperature_c: Option<f64>) -> f64 {
    let energy = match depth {
        _ if patient.is_child() => 1.0,
        SedationDepth::Light => s::ENERGY_LIGHT.value,
        SedationDepth::Moderate => s::ENERGY_MODERATE.value,
        SedationDepth::Heavy => s::ENERGY_HEAVY.value,
    };
    let above = temperature_c.map_or(0.0, |t| t - s::NORMAL_TEMPERATURE.value);
    let per_degree = if above > 0.0 { s::FEVER_FACTOR.value } else { s::COOLING_FACTOR.value };
    energy * pow(per_degree, above)
}

impl Patient {
    /// Under 18, as far as the age is known.
    #[must_use]
    pub fn is_child(&self) -> bool {
        self.age_years.is_some_and(|age| age < s::ADULT_FROM.value)
    }

    /// Predicted body weight; `None` for children and without sex and height.
    #[must_use]
    pub fn predicted_body_weight_kg(&self) -> Option<f64> {
        match (self.is_child(), self.sex, self.height_cm) {
            (false, Some(sex), Some(height)) => {
                Some(predicted_body_weight_kg(sex, height)).filter(|kg| *kg > s::PBW_LEAST.value)
            }
            _ => None,
        }
    }

    pub(crate) fn size(&self) -> Size {
        if self.is_child() {
            // No agreed predicted weight for children: the weight itself, or a wide guess from the height.
            return match self.weight_kg {
                Some(kg) => Size { lean_kg: kg, tissue_kg: kg, ln_sd: 0.0 },
                None => {
                    let kg = self.height_cm.map_or_else(|| child_weight(self.age_years), weight_for_height);
                    Size { lean_kg: kg, tissue_kg: kg, ln_sd: s::SIZE_UNKNOWN.spread }
                }
            };
        }
        let predicted = |height: f64| match self.sex {
            Some(sex) => predicted_body_weight_kg(sex, height),
            None => between_sexes(
                predicted_body_weight_kg(Sex::Female, height),
                predicted_body_weight_kg(Sex::Male, height),
            ),
        };
        let (lean_kg, ln_sd) = match (self.height_cm, self.weight_kg) {
            (Some(height), _) if predicted(height) > s::PBW_LEAST.value => {
                let guessed = if self.height_guessed { s::HEIGHT_GUESSED.spread } else { 0.0 };
                let sexless = if self.sex.is_none() { s::SEX_UNKNOWN.spread } else { 0.0 };
                (predicted(height), root_of_squares(&[guessed, sexless]))
            }
            // A very short adult: the formula runs to nothing, so the weight stands in.
            (Some(_), Some(kg)) => (kg, s::HEIGHT_UNKNOWN.spread),
            (None, Some(kg)) => {
                let predicted = predicted(s::HEIGHT_UNKNOWN.value);
                (if kg < predicted { kg } else { predicted }, s::HEIGHT_UNKNOWN.spread)
            }
            _ => (s::SIZE_UNKNOWN.value, s::SIZE_UNKNOWN.spread),
        };
        let excess = self.weight_kg.map_or(0.0, |kg| if kg > lean_kg { kg - lean_kg } else { 0.0 });
        Size { lean_kg, tissue_kg: lean_kg + s::EXCESS_WEIGHT_SHARE.value * excess, ln_sd }
    }

    pub(crate) fn production(&self) -> Production {
        if self.is_child() {
            let age = self.age_years.unwrap_or(s::SMALLWOOD_OLDER_FROM.value);
            let per_kg = if age < s::SMALLWOOD_INFANT_UNDER.value {
                s::SMALLWOOD_INFANT.value
            } else if age < s::SMALLWOOD_OLDER_FROM.value {
                s::SMALLWOOD_CHILD.value
            } else {
                s::SMALLWOOD_OLDER.value
            };
            return Production {
                resting: FlowStpd(per_kg * self.size().lean_kg),
                ln_sd: s::VCO2_CHILD.spread,
            };
        }
        let size = self.size();
        let unknown = |missing: bool, spread: f64| if missing { spread } else { 0.0 };
        let height = self.height_cm.unwrap_or(s::HEIGHT_UNKNOWN.value);
        let weight = self.weight_kg.unwrap_or(size.lean_kg * s::WEIGHT_UNKNOWN.value);
        let sex_term = match self.sex {
            Some(Sex::Male) => s::MIFFLIN_MALE.value,
            Some(Sex::Female) => s::MIFFLIN_FEMALE.value,
            None => between_sexes(s::MIFFLIN_FEMALE.value, s::MIFFLIN_MALE.value),
        };
        let age = self.age_years.unwrap_or(s::AGE_UNKNOWN.value);
        let kcal_day = s::MIFFLIN_KG.value * weight + s::MIFFLIN_CM.value * height
            - s::MIFFLIN_YEAR.value * age
            + sex_term;
        let spreads = [
            s::VCO2_ADULT.spread,
            unknown(self.age_years.is_none(), s::AGE_UNKNOWN.spread),
            unknown(self.sex.is_none(), s::SEX_UNKNOWN.spread),
            unknown(self.weight_kg.is_none() && self.height_cm.is_some(), s::WEIGHT_UNKNOWN.spread),
        ];
        Production { resting: FlowStpd(kcal_day * s::VCO2_PER_KCAL.value), ln_sd: root_of_squares(&spreads) }
    }

    /// Series dead space without the apparatus, mL, and the spread of ln. A small child's figure with a tube holds
    /// the circuit too, so it is used only where the apparatus was not typed.
    pub(crate) fn series_dead_space_ml(&self, tube: bool, apparatus_typed: bool) -> (f64, f64) {
        let kg = self.size().lean_kg;
        if self.circuit_in_series(tube, apparatus_typed) {
            return (s::SERIES_TUBE_CHILD.value * kg, s::SERIES_TUBE_CHILD.spread);
        }
        let without_tube = if self.is_child() {
            let age = self.age_years.unwrap_or(0.0);
            s::SERIES_CHILD.value - s::SERIES_CHILD_AGE.value * log(1.0 + age)
        } else {
            s::SERIES_NO_TUBE.value
        };
        let halved = s::SERIES_TUBE.value / s::SERIES_NO_TUBE.value;
        (without_tube * kg * if tube { halved } else { 1.0 }, s::SERIES_NO_TUBE.spread)
    }

    /// Whether the series figure holds the circuit: a small child with a tube, apparatus not typed.
    pub(crate) fn circuit_in_series(&self, tube: bool, apparatus_typed: bool) -> bool {
        let small = self.age_years.is_some_and(|age| age < s::SMALLWOOD_OLDER_FROM.value);
        tube && small && !apparatus_typed
    }

    /// Functional residual capacity, mL BTPS, and the spread of ln.
    pub(crate) fn frc_ml(&self) -> (f64, f64) {
        let infant = self.age_years.is_some_and(|age| age < 1.0);
        let row = if infant { s::FRC_INFANT } else { s::FRC };
        (row.value * self.size().lean_kg, row.spread)
    }
}

fn between_sexes(female: f64, male: f64) -> f64 {
    female + s::SEX_UNKNOWN.value * (male - female)
}

pub(crate) fn root_of_squares(spreads: &[f64]) -> f64 {
    sqrt(spreads.iter().map(|sd| sd * sd).sum())
}

/// Weight of a child of `height_cm` at the body-mass index of the middle of childhood.
fn weight_for_height(height_cm: f64) -> f64 {
    let metres = height_cm / 100.0;
    s::CHILD_BODY_MASS_INDEX.value * metres * metres
}

/// Weight of a child by age alone; taken with the spread of an unknown size.
fn child_weight(age_years: Option<f64>) -> f64 {
    s::CHILD_KG_PER_YEAR.value * (age_years.unwrap_or(0.0) + s::CHILD_YEARS_AHEAD.value)
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn predicted_weight_of_a_70_inch_man() {
        // ARDS Network 2000: 73.0 kg.
        assert_abs_diff_eq!(predicted_body_weight_kg(Sex::Male, 177.8), 73.0, epsilon = 0.2);
    }

    #[test]
    fn production_of_the_night_ferry() {
        let nurse_case = Patient {
            sex: Some(Sex::Female),
            age_years: Some(58.0),
            height_cm: Some(163.0),
            weight_kg: Some(74.0),
            height_guessed: false,
        };
        // Mifflin by hand: 740 + 1018.75 − 290 − 161 = 1307.75 kcal/d; × .1175 = 153.7 mL/min.
        assert_abs_diff_eq!(resting_production(&nurse_case).0, 153.66, epsilon = 0.01);
        assert_abs_diff_eq!(
            production_factor(&nurse_case, SedationDepth::Moderate, None),
            1.20,
            epsilon = 1e-12
        );
        assert_abs_diff_eq!(
            production_factor(&nurse_case, SedationDepth::Moderate, Some(39.0)),
            1.2 * 1.085 * 1.085,
            epsilon = 1e-12
        );
        assert!(production_factor(&nurse_case, SedationDepth::Moderate, Some(35.0)) < 1.2);
    }

    #[test]
    fn nothing_known_is_wider_and_finite() {
        let unknown = Patient::default();
        assert_eq!(unknown.size().ln_sd, 0.25);
        assert!(unknown.production().ln_sd > 0.2);
        assert_eq!(unknown.predicted_body_weight_kg(), None);
        for kg in [5.0, 20.0, 160.0] {
            for age in [None, Some(0.0), Some(3.0), Some(12.0), Some(90.0)] {
                let p = Patient { weight_kg: Some(kg), age_years: age, ..Patient::default() };
                assert!(p.production().resting.0 > 0.0 && p.size().lean_kg > 0.0, "{kg} {age:?}");
            }
        }
    }
}
