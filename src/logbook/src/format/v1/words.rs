//! The words of the format and what they mean: each list serves reading and writing.

use case::{
    Airway, AirwayState, Circulation, Control, Effort, Gas, GasChoice, HeightHow, Leak, Measured, Person,
    SedationLevel, Settings, Sex, Site, Trace,
};
use units::Quantity as Q;

use super::fields::NumberField;

/// A list of words with their meaning.
pub(super) type Words<T> = &'static [(&'static str, T)];

/// The word for `value`; every value has one.
pub(super) fn word_for<T: PartialEq>(words: Words<T>, value: &T) -> Option<&'static str> {
    words.iter().find(|(_, meaning)| meaning == value).map(|(word, _)| *word)
}

pub(super) const SEX: Words<Sex> = &[("female", Sex::Female), ("male", Sex::Male)];

pub(super) const HEIGHT_HOW: Words<HeightHow> =
    &[("measured", HeightHow::Measured), ("stated", HeightHow::Stated), ("guessed", HeightHow::Guessed)];

pub(super) const AIRWAY: Words<Airway> = &[
    ("tube", Airway::Tube),
    ("supraglottic", Airway::Supraglottic),
    ("mask", Airway::Mask),
    ("none", Airway::None),
];

pub(super) const CONTROL: Words<Control> = &[
    ("volume", Control::Volume),
    ("pressure", Control::Pressure),
    ("pressure_support", Control::PressureSupport),
    ("by_hand", Control::ByHand),
    ("none", Control::None),
];

pub(super) const EFFORT: Words<Effort> =
    &[("none", Effort::None), ("present", Effort::Present), ("unknown", Effort::Unknown)];

pub(super) const LEAK: Words<Leak> =
    &[("none", Leak::None), ("small", Leak::Small), ("large", Leak::Large), ("unknown", Leak::Unknown)];

pub(super) const SITE: Words<Site> = &[
    ("arterial", Site::Arterial),
    ("capillary", Site::Capillary),
    ("central_venous", Site::CentralVenous),
    ("peripheral_venous", Site::PeripheralVenous),
];

pub(super) const TRACE: Words<Trace> =
    &[("plateau", Trace::Plateau), ("sloping", Trace::Sloping), ("flat", Trace::Flat)];

pub(super) const AIRWAY_STATE: Words<AirwayState> = &[
    ("open_oxygen", AirwayState::OpenOxygen),
    ("open_air", AirwayState::OpenAir),
    ("closed", AirwayState::Closed),
];

pub(super) const SEDATION_LEVEL: Words<SedationLevel> = &[
    ("none", SedationLevel::None),
    ("light", SedationLevel::Light),
    ("moderate", SedationLevel::Moderate),
    ("heavy", SedationLevel::Heavy),
];

pub(super) const CIRCULATION: Words<Circulation> = &[
    ("steady", Circulation::Steady),
    ("shock", Circulation::Shock),
    ("arrest", Circulation::Arrest),
    ("restored", Circulation::Restored),
];

pub(super) const GAS_CHOICE: Words<GasChoice> =
    &[("sample", GasChoice::Sample), ("patient", GasChoice::Patient), ("machine", GasChoice::Machine)];

pub(super) const PERSON_NUMBERS: [NumberField<Person>; 3] = [
    ("age_years", Q::AgeYears, |p| &mut p.age_years),
    ("height_cm", Q::HeightCm, |p| &mut p.height_cm),
    ("weight_kg", Q::WeightKg, |p| &mut p.weight_kg),
];

pub(super) const SETTINGS_NUMBERS: [NumberField<Settings>; 13] = [
    ("rate_per_min", Q::RatePerMin, |s| &mut s.rate_per_min),
    ("rate_total_per_min", Q::RatePerMin, |s| &mut s.rate_total_per_min),
    ("tidal_volume_ml", Q::TidalVolumeMl, |s| &mut s.tidal_volume_ml),
    ("tidal_volume_expired_ml", Q::TidalVolumeMl, |s| &mut s.tidal_volume_expired_ml),
    ("minute_volume_l_min", Q::MinuteVolumeLMin, |s| &mut s.minute_volume_l_min),
    ("inspiratory_pressure_cmh2o", Q::InspiratoryPressureCmh2o, |s| &mut s.inspiratory_pressure_cmh2o),
    ("peep_cmh2o", Q::PeepCmh2o, |s| &mut s.peep_cmh2o),
    ("total_peep_cmh2o", Q::PeepCmh2o, |s| &mut s.total_peep_cmh2o),
    ("plateau_cmh2o", Q::PlateauCmh2o, |s| &mut s.plateau_cmh2o),
    ("peak_cmh2o", Q::PeakCmh2o, |s| &mut s.peak_cmh2o),
    ("inspiratory_time_s", Q::InspiratoryTimeS, |s| &mut s.inspiratory_time_s),
    ("fio2", Q::Fio2, |s| &mut s.fio2),
    ("apparatus_dead_space_ml", Q::ApparatusDeadSpaceMl, |s| &mut s.apparatus_dead_space_ml),
];

pub(super) const GAS_NUMBERS: [NumberField<Gas>; 6] = [
    ("po2_mmhg", Q::Po2Mmhg, |g| &mut g.po2_mmhg),
    ("hco3_printed_mmol_l", Q::Hco3MmolL, |g| &mut g.hco3_printed_mmol_l),
    ("hb_g_dl", Q::HbGDl, |g| &mut g.hb_g_dl),
    ("temperature_c", Q::TemperatureC, |g| &mut g.temperature_c),
    ("reported_at_c", Q::TemperatureC, |g| &mut g.reported_at_c),
    ("settings_held_min", Q::SettingsHeldMin, |g| &mut g.settings_held_min),
];

pub(super) const MEASURED_NUMBERS: [NumberField<Measured>; 4] = [
    ("vco2_ml_min", Q::Vco2MlMin, |m| &mut m.vco2_ml_min),
    ("dead_space_fraction", Q::DeadSpaceFraction, |m| &mut m.dead_space_fraction),
    ("cardiac_output_l_min", Q::CardiacOutputLMin, |m| &mut m.cardiac_output_l_min),
    ("frc_ml", Q::FrcMl, |m| &mut m.frc_ml),
];

/// Names of kinds of entries.
pub(super) mod kind {
    pub(in crate::format::v1) const SETTINGS: &str = "settings";
    pub(in crate::format::v1) const GAS: &str = "gas";
    pub(in crate::format::v1) const END_TIDAL: &str = "end_tidal";
    pub(in crate::format::v1) const MEASURED: &str = "measured";
    pub(in crate::format::v1) const BREATHING_STOPPED: &str = "breathing_stopped";
    pub(in crate::format::v1) const BREATHING_RESTORED: &str = "breathing_restored";
    pub(in crate::format::v1) const SEDATION: &str = "sedation";
    pub(in crate::format::v1) const CIRCULATION: &str = "circulation";
    pub(in crate::format::v1) const GIVEN: &str = "given";
    pub(in crate::format::v1) const TEMPERATURE: &str = "temperature";
    pub(in crate::format::v1) const SEIZURE: &str = "seizure";
    pub(in crate::format::v1) const AMBIENT: &str = "ambient";
    pub(in crate::format::v1) const SATURATION: &str = "saturation";
    pub(in crate::format::v1) const UNCHANGED: &str = "unchanged";
    pub(in crate::format::v1) const CONDITION: &str = "condition";
    pub(in crate::format::v1) const GAS_VERDICT: &str = "gas_verdict";
    pub(in crate::format::v1) const CORRECTION: &str = "correction";
    pub(in crate::format::v1) const CHECKED: &str = "checked";
    pub(in crate::format::v1) const NOTE: &str = "note";
}

/// Names of conditions.
pub(super) mod condition {
    pub(in crate::format::v1) const LUNG_INJURY: &str = "lung_injury";
    pub(in crate::format::v1) const AIRFLOW_OBSTRUCTION: &str = "airflow_obstruction";
    pub(in crate::format::v1) const CHRONIC_RETAINER: &str = "chronic_retainer";
    pub(in crate::format::v1) const RAISED_INTRACRANIAL_PRESSURE: &str = "raised_intracranial_pressure";
    pub(in crate::format::v1) const PREGNANCY: &str = "pregnancy";
    pub(in crate::format::v1) const METABOLIC_ACIDOSIS: &str = "metabolic_acidosis";
}
