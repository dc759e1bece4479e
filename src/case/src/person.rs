//! The person, each part of it optional: what is unknown makes every answer wider.

/// Sex, as the formulas for energy and predicted weight need it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Sex {
    /// Female.
    Female,
    /// Male.
    Male,
}

/// How a height is known.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum HeightHow {
    /// With a tape or a board.
    Measured,
    /// Told by the patient, kin or papers.
    Stated,
    /// By eye.
    Guessed,
}

/// Who the patient is, as far as it is known. No name, no number.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Person {
    /// Sex.
    pub sex: Option<Sex>,
    /// Age in years, 0–110.
    pub age_years: Option<f64>,
    /// Height in cm, 50–230.
    pub height_cm: Option<f64>,
    /// How the height is known.
    pub height_how: Option<HeightHow>,
    /// Weight in kg, 5–300.
    pub weight_kg: Option<f64>,
}

/// Age from which the adult formulas hold, years.
const ADULT_FROM_YEARS: f64 = 18.0;

impl Person {
    /// Whose limits apply: a child when the age says so, else an adult.
    #[must_use]
    pub fn age_group(&self) -> units::AgeGroup {
        match self.age_years {
            Some(age) if age < ADULT_FROM_YEARS => units::AgeGroup::Child,
            _ => units::AgeGroup::Adult,
        }
    }
}
