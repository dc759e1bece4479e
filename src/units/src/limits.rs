//! One table: each quantity's name, unit, limits, decimals and advice. Limits are those of typed values
//! (assumed by us, wide enough for any living patient): outside them a value is refused, never changed.

use crate::Quantity;

/// Whose limits apply. Tidal volume is the only quantity that differs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum AgeGroup {
    /// 18 years or more, or age not known.
    #[default]
    Adult,
    /// Under 18 years.
    Child,
}

/// One row of the table.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limit {
    /// The name that screens and messages use.
    pub label: &'static str,
    /// The unit as it is printed; empty for pH and fractions.
    pub unit: &'static str,
    /// Least value taken.
    pub least: f64,
    /// Greatest value taken.
    pub most: f64,
    /// Decimals that are printed.
    pub decimals: usize,
    /// What to do when the value is refused.
    pub advice: &'static str,
}

/// A value that was refused: which, what it was, what the limits are and what to do.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
#[error("{} {} is outside {} to {}. {}", .limit.label, with_unit(*.value, .limit), plain(.limit.least, .limit.decimals), with_unit(.limit.most, .limit), .limit.advice)]
pub struct OutOfLimits {
    /// The quantity.
    pub quantity: Quantity,
    /// What was given.
    pub value: f64,
    /// Its row of the table.
    pub limit: Limit,
}

/// The row for `quantity`.
#[must_use]
pub const fn limit(quantity: Quantity, group: AgeGroup) -> Limit {
    use Quantity as Q;
    const fn row(
        label: &'static str,
        unit: &'static str,
        least: f64,
        most: f64,
        decimals: usize,
        advice: &'static str,
    ) -> Limit {
        Limit { label, unit, least, most, decimals, advice }
    }
    const AGAIN: &str = "Check it and type it again.";
    match (quantity, group) {
        (Q::Ph, _) => row("pH", "", 6.5, 8.0, 2, "Type it with its point, as in 7.21."),
        (Q::Paco2Mmhg, _) => row("PaCO₂", "mmHg", 5.0, 190.0, 0, AGAIN),
        (Q::Pco2Mmhg, _) => row("PCO₂", "mmHg", 5.0, 190.0, 0, AGAIN),
        (Q::Po2Mmhg, _) => row("PaO₂", "mmHg", 10.0, 650.0, 0, AGAIN),
        (Q::Hco3MmolL, _) => row("HCO₃", "mmol/L", 2.0, 80.0, 1, AGAIN),
        (Q::RatePerMin, _) => row("Rate", "/min", 2.0, 80.0, 0, AGAIN),
        (Q::TidalVolumeMl, AgeGroup::Adult) => {
            row("Tidal volume", "mL", 50.0, 2000.0, 0, "Check the digits. For a child give the age first.")
        }
        (Q::TidalVolumeMl, AgeGroup::Child) => row("Tidal volume", "mL", 15.0, 2000.0, 0, AGAIN),
        (Q::MinuteVolumeLMin, _) => {
            row("Minute volume", "L/min", 0.3, 60.0, 1, "Type litres a minute, as in 6.1.")
        }
        (Q::PeepCmh2o, _) => row("PEEP", "cmH₂O", 0.0, 30.0, 0, AGAIN),
        (Q::PlateauCmh2o, _) => row("Plateau", "cmH₂O", 5.0, 70.0, 0, AGAIN),
        (Q::PeakCmh2o, _) => row("Peak pressure", "cmH₂O", 5.0, 100.0, 0, AGAIN),
        (Q::InspiratoryPressureCmh2o, _) => row("Inspiratory pressure", "cmH₂O", 0.0, 60.0, 0, AGAIN),
        (Q::InspiratoryTimeS, _) => row("Inspiratory time", "s", 0.2, 5.0, 2, "Type seconds, as in 0.90."),
        (Q::Fio2, _) => row("FiO₂", "", 0.21, 1.0, 2, "Type a fraction, as in 0.60."),
        (Q::ApparatusDeadSpaceMl, _) => row("Apparatus dead space", "mL", 0.0, 300.0, 0, AGAIN),
        (Q::Etco2Mmhg, _) => row("EtCO₂", "mmHg", 0.0, 150.0, 0, AGAIN),
        (Q::HbGDl, _) => row("Haemoglobin", "g/dL", 3.0, 25.0, 1, "Type g/dL, as in 11.8."),
        (Q::WeightKg, _) => {
            row("Weight", "kg", 5.0, 300.0, 0, "Under 5 kg this is not for. Otherwise check the unit.")
        }
        (Q::HeightCm, _) => row("Height", "cm", 50.0, 230.0, 0, "Type centimetres, as in 163."),
        (Q::AgeYears, _) => row("Age", "years", 0.0, 110.0, 0, AGAIN),
        (Q::TemperatureC, _) => row("Temperature", "°C", 25.0, 43.0, 1, AGAIN),
        (Q::AltitudeM, _) => row("Altitude", "m", -400.0, 6000.0, 0, "Type metres."),
        (Q::SettingsHeldMin, _) => row("Settings held", "min", 0.0, 1440.0, 0, AGAIN),
        (Q::Spo2Percent, _) => row("SpO₂", "%", 30.0, 100.0, 0, AGAIN),
        (Q::Vco2MlMin, _) => row("CO₂ production", "mL/min", 10.0, 1500.0, 0, AGAIN),
        (Q::DeadSpaceFraction, _) => row("VD/VT", "", 0.0, 0.95, 2, "Type a fraction, as in 0.55."),
        (Q::CardiacOutputLMin, _) => row("Cardiac output", "L/min", 0.3, 20.0, 1, "Type litres a minute."),
        (Q::FrcMl, _) => row("FRC", "mL", 50.0, 6000.0, 0, AGAIN),
        (Q::BicarbonateMmol, _) => row("Bicarbonate given", "mmol", 1.0, 1000.0, 0, "Type mmol."),
        (Q::GivenOverMin, _) => row("Given over", "min", 0.0, 1440.0, 0, AGAIN),
        (Q::PressureHpa, _) => row("Barometric pressure", "hPa", 450.0, 1100.0, 0, "Type hPa, as in 1013."),
        (Q::UtcOffsetMin, _) => row("UTC offset", "min", -840.0, 840.0, 0, "Write minutes, east positive."),
    }
}

/// Passes `value` when it is finite and inside its limits, both ends taken.
///
/// # Errors
/// [`OutOfLimits`], whose words name the field, the value, the limit and what to do.
pub fn check(quantity: Quantity, group: AgeGroup, value: f64) -> Result<f64, OutOfLimits> {
    let limit = limit(quantity, group);
    if value.is_finite() && value >= limit.least && value <= limit.most {
        Ok(value)
    } else {
        Err(OutOfLimits { quantity, value, limit })
    }
}

fn with_unit(value: f64, limit: &Limit) -> String {
    let number = plain(value, limit.decimals);
    if limit.unit.is_empty() { number } else { format!("{number} {}", limit.unit) }
}

/// The value as typed where it has few digits, else with the row's decimals.
fn plain(value: f64, decimals: usize) -> String {
    let short = format!("{value}");
    if short.len() <= 7 { short } else { format!("{value:.decimals$}") }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_refusal_names_field_value_limit_and_what_to_do() {
        let refusal = check(Quantity::Ph, AgeGroup::Adult, 71.0).unwrap_err();
        assert_eq!(refusal.to_string(), "pH 71 is outside 6.5 to 8. Type it with its point, as in 7.21.");
        let refusal = check(Quantity::TidalVolumeMl, AgeGroup::Adult, 34.0).unwrap_err();
        assert_eq!(
            refusal.to_string(),
            "Tidal volume 34 mL is outside 50 to 2000 mL. Check the digits. For a child give the age first."
        );
    }

    #[test]
    fn a_child_may_breathe_34_ml() {
        assert_eq!(check(Quantity::TidalVolumeMl, AgeGroup::Child, 34.0), Ok(34.0));
    }

    #[test]
    fn both_ends_are_taken_and_nothing_that_is_no_number() {
        assert!(check(Quantity::Ph, AgeGroup::Adult, 6.5).is_ok());
        assert!(check(Quantity::Ph, AgeGroup::Adult, 8.0).is_ok());
        for value in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY, 6.499, 8.001] {
            assert!(check(Quantity::Ph, AgeGroup::Adult, value).is_err(), "{value}");
        }
    }
}
