//! Words of the Record: every kind of entry as a sentence.

use case::{
    Airway, AirwayState, Case, Circulation, Condition, Control, Effort, Entry, EntryId, EntryKind, Gas,
    GasChoice, Leak, Measured, Moment, Now, SedationLevel, Settings, Trace,
};

use super::now::site;
use super::values::{as_typed, clock, list};

/// The room.
pub const TITLE: &str = "Record";
/// Nothing yet.
pub const EMPTY: &str = "Nothing is written yet.";
/// Downloads the case file.
pub const EXPORT: &str = "EXPORT THIS CASE";
/// The browser can't.
pub const NO_EXPORT: &str = "This browser could not make a file. Try another browser on this device.";
/// Reads a case file.
pub const IMPORT: &str = "Import a case";
/// The file can't be read at all.
pub const UNREADABLE: &str = "The file could not be read. Choose it again.";
/// It worked.
pub fn imported(label: &str) -> String {
    format!("{label} is imported and open.")
}
/// Heads values moved aside.
pub const SET_ASIDE: &str = "Set aside: could not be read, kept as found";
/// What was not understood.
pub fn not_understood(fields: &[String]) -> String {
    format!("not understood and kept: {}", fields.join(", "))
}
/// A file's name from the label and the moment: letters, digits and lines only.
pub fn file_name(label: &str, now: &Now) -> String {
    let plain: String =
        label.chars().map(|c| if c.is_ascii_alphanumeric() { c.to_ascii_lowercase() } else { '-' }).collect();
    let parts: Vec<&str> = plain.split('-').filter(|part| !part.is_empty()).collect();
    let name = if parts.is_empty() { "case".to_owned() } else { parts.join("-") };
    format!("{name}-{}.json", clock(now.wall, now).replace(':', ""))
}

/// An entry in words.
pub fn entry(entry: &Entry, case: &Case, now: &Now) -> String {
    kind(&entry.kind, case, now)
}

fn kind(kind: &EntryKind, case: &Case, now: &Now) -> String {
    match kind {
        EntryKind::Settings(change) => format!("Settings: {}", settings(change)),
        EntryKind::Gas(reading) => format!("Gas{}: {}", site(reading.site), gas(reading)),
        EntryKind::EndTidal(reading) => format!(
            "EtCO₂ {} mmHg{}. Kept; the forecast does not use it yet",
            as_typed(reading.etco2_mmhg),
            match reading.trace {
                Some(Trace::Plateau) => ", trace with a plateau",
                Some(Trace::Sloping) => ", trace sloping",
                Some(Trace::Flat) => ", trace flat",
                None => "",
            }
        ),
        EntryKind::Measured(values) => format!("Measured: {}", measured(values)),
        EntryKind::BreathingStopped(airway) => format!(
            "No breaths from here, airway {}",
            match airway {
                AirwayState::OpenOxygen => "open with oxygen",
                AirwayState::OpenAir => "open to air",
                AirwayState::Closed => "closed",
            }
        ),
        EntryKind::BreathingRestored => "Breathing again".to_owned(),
        EntryKind::Sedation(sedation) => sedation_words(sedation),
        EntryKind::Circulation(state) => format!(
            "Circulation: {}",
            match state {
                Circulation::Steady => "steady",
                Circulation::Shock => "shock",
                Circulation::Arrest => "arrest",
                Circulation::Restored => "restored after arrest",
            }
        ),
        EntryKind::BicarbonateGiven { mmol, over_min } => format!(
            "Bicarbonate {} mmol{}",
            as_typed(*mmol),
            over_min.map(|min| format!(" over {} min", as_typed(min))).unwrap_or_default()
        ),
        EntryKind::Temperature(value) => format!("Temperature {} °C", as_typed(*value)),
        EntryKind::Seizure => "Seizure".to_owned(),
        EntryKind::AltitudeM(value) => format!("Altitude {} m", as_typed(*value)),
        EntryKind::PressureHpa(value) => format!("Air pressure {} hPa", as_typed(*value)),
        EntryKind::Saturation(value) => format!("SpO₂ {} %", as_typed(*value)),
        EntryKind::Unchanged => "Looked: nothing has changed".to_owned(),
        EntryKind::Condition { name, present } => {
            format!("{}{}", condition(name), if *present { "" } else { ": ruled out" })
        }
        EntryKind::GasVerdict(verdict) => format!(
            "The gas of {} that did not fit: {}",
            when(case, &verdict.of, now),
            match verdict.choice {
                GasChoice::Sample => "the sample, left out",
                GasChoice::Patient => "the patient has changed",
                GasChoice::Machine => "the machine or circuit has changed",
            }
        ),
        EntryKind::Correction(correction) => format!(
            "Correction of the entry of {}{}: {}",
            when(case, &correction.of, now),
            correction.at.map(|at| format!(", now at {}", clock(at, now))).unwrap_or_default(),
            kind_of_correction(&correction.kind, case, now)
        ),
        EntryKind::Checked(words) => format!("Checked: {}", list(words)),
        EntryKind::Note(words) => words.clone(),
        EntryKind::NotUnderstood(unknown) => {
            format!("“{}”: an entry this version does not understand. It is kept and not used", unknown.kind)
        }
    }
}

fn kind_of_correction(corrected: &EntryKind, case: &Case, now: &Now) -> String {
    match corrected {
        EntryKind::Correction(_) => "a correction".to_owned(),
        other => kind(other, case, now),
    }
}

/// When an entry was, by its id.
fn when(case: &Case, id: &EntryId, now: &Now) -> String {
    let at: Option<Moment> = case.entries().iter().find(|e| e.id == *id).map(|e| e.at);
    at.map_or_else(|| "a time not known".to_owned(), |at| clock(at, now))
}

fn gas(gas: &Gas) -> String {
    let mut parts =
        vec![format!("pH {}", as_typed(gas.ph)), format!("PCO₂ {} mmHg", as_typed(rounded(gas.pco2_mmhg)))];
    let optional = [
        ("PO₂", gas.po2_mmhg.map(rounded), " mmHg"),
        ("HCO₃", gas.hco3_printed_mmol_l, " mmol/L"),
        ("Hb", gas.hb_g_dl, " g/dL"),
        ("at", gas.temperature_c, " °C"),
    ];
    parts.extend(some(&optional));
    if let Some(held) = gas.settings_held_min {
        parts.push(if held > 0.0 {
            format!("settings held {} min before", as_typed(held))
        } else {
            "settings changed just before".to_owned()
        });
    }
    parts.join(", ")
}

/// kPa typed becomes mmHg with many decimals: one is shown.
fn rounded(value: f64) -> f64 {
    (value * 10.0).round() / 10.0
}

fn some(values: &[(&str, Option<f64>, &str)]) -> Vec<String> {
    values
        .iter()
        .filter_map(|(name, value, unit)| value.map(|value| format!("{name} {}{unit}", as_typed(value))))
        .collect()
}

/// Settings in words.
pub fn settings(settings: &Settings) -> String {
    let mut parts: Vec<String> = vec![];
    parts.extend(settings.airway.map(airway).map(str::to_owned));
    parts.extend(settings.control.map(control).map(str::to_owned));
    parts.extend(settings.effort.map(effort).map(str::to_owned));
    parts.extend(settings.leak.map(leak).map(str::to_owned));
    parts.extend(some(&[
        ("rate", settings.rate_per_min, "/min"),
        ("rate in all", settings.rate_total_per_min, "/min"),
        ("tidal volume", settings.tidal_volume_ml, " mL"),
        ("expired volume", settings.tidal_volume_expired_ml, " mL"),
        ("minute volume", settings.minute_volume_l_min, " L/min"),
        ("pressure above PEEP", settings.inspiratory_pressure_cmh2o, " cmH₂O"),
        ("PEEP", settings.peep_cmh2o, " cmH₂O"),
        ("total PEEP", settings.total_peep_cmh2o, " cmH₂O"),
        ("plateau", settings.plateau_cmh2o, " cmH₂O"),
        ("peak", settings.peak_cmh2o, " cmH₂O"),
        ("inspiratory time", settings.inspiratory_time_s, " s"),
        ("FiO₂", settings.fio2, ""),
        ("apparatus dead space", settings.apparatus_dead_space_ml, " mL"),
    ]));
    match settings.flow_returns_to_zero {
        Some(true) => parts.push("flow back to zero".to_owned()),
        Some(false) => parts.push("flow not back to zero".to_owned()),
        None => {}
    }
    if parts.is_empty() { "nothing given".to_owned() } else { parts.join(", ") }
}

const fn airway(airway: Airway) -> &'static str {
    match airway {
        Airway::Tube => "tube",
        Airway::Supraglottic => "supraglottic airway",
        Airway::Mask => "mask",
        Airway::None => "no airway device",
    }
}

const fn control(control: Control) -> &'static str {
    match control {
        Control::Volume => "volume set",
        Control::Pressure => "pressure set",
        Control::PressureSupport => "pressure support",
        Control::ByHand => "by hand",
        Control::None => "no machine",
    }
}

const fn effort(effort: Effort) -> &'static str {
    match effort {
        Effort::None => "no own breaths",
        Effort::Present => "own breaths",
        Effort::Unknown => "own breaths not known",
    }
}

const fn leak(leak: Leak) -> &'static str {
    match leak {
        Leak::None => "no leak",
        Leak::Small => "small leak",
        Leak::Large => "large leak",
        Leak::Unknown => "leak not known",
    }
}

fn measured(values: &Measured) -> String {
    let mut parts = some(&[
        ("CO₂ production", values.vco2_ml_min, " mL/min"),
        ("VD/VT", values.dead_space_fraction, ""),
        ("cardiac output", values.cardiac_output_l_min, " L/min"),
        ("FRC", values.frc_ml, " mL"),
    ]);
    if values.exact {
        parts.push("taken as exact".to_owned());
    }
    parts.join(", ")
}

fn sedation_words(sedation: &case::Sedation) -> String {
    let level = match sedation.level {
        Some(SedationLevel::None) => "none",
        Some(SedationLevel::Light) => "light",
        Some(SedationLevel::Moderate) => "moderate",
        Some(SedationLevel::Heavy) => "heavy",
        None => "depth not given",
    };
    let relaxant = match sedation.relaxant {
        Some(true) => ", relaxant on board",
        Some(false) => ", no relaxant",
        None => "",
    };
    format!("Sedation: {level}{relaxant}")
}

fn condition(name: &Condition) -> String {
    match name {
        Condition::LungInjury => "Lung injury".to_owned(),
        Condition::AirflowObstruction => "Airflow obstruction".to_owned(),
        Condition::ChronicRetainer { usual_paco2_mmhg } => match usual_paco2_mmhg {
            Some(usual) => format!("Chronic CO₂ retainer, usual PaCO₂ {} mmHg", as_typed(*usual)),
            None => "Chronic CO₂ retainer".to_owned(),
        },
        Condition::RaisedIntracranialPressure => "Raised pressure in the skull".to_owned(),
        Condition::Pregnancy => "Pregnancy".to_owned(),
        Condition::MetabolicAcidosis => "Metabolic acidosis".to_owned(),
        Condition::Other(name) => format!("“{name}”: a condition this version does not know"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_file_is_named_from_label_and_time() {
        let now = Now::at(Moment(1_772_486_400_000)); // 21:20Z
        assert_eq!(file_name("Bed 3", &now), "bed-3-2120.json");
        assert_eq!(file_name("Größe/../x", &now), "gr-e-x-2120.json");
        assert_eq!(file_name("…", &now), "case-2120.json");
    }

    #[test]
    fn settings_read_as_words() {
        let change = Settings { rate_per_min: Some(26.0), fio2: Some(0.6), ..Settings::default() };
        assert_eq!(settings(&change), "rate 26/min, FiO₂ 0.6");
        assert_eq!(settings(&Settings::default()), "nothing given");
    }

    #[test]
    fn what_is_not_understood_is_said() {
        let unknown = EntryKind::NotUnderstood(case::NotUnderstood { kind: "weather".into() });
        let now = Now::at(Moment(0));
        assert!(kind(&unknown, &Case::new("x"), &now).contains("weather"));
    }
}
