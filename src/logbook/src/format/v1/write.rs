//! What an entry or a person says, to JSON.

use case::{Condition, Entry, EntryKind, Measured, Moment, Person, Settings};
use serde_json::{Map, Number, Value};

use super::fields::NumberField;
use super::words::{self, Words, condition, kind, word_for};
use crate::format::write_time;

/// An entry as an object.
pub(crate) fn write_entry(entry: &Entry) -> Value {
    let (name, says) = write_kind(&entry.kind);
    let mut map = Map::new();
    put(&mut map, "id", Value::from(entry.id.0.as_str()));
    put(&mut map, "at", time_value(entry.at));
    put(&mut map, "written_at", entry.written_at.map_or(Value::Null, time_value));
    put(&mut map, "utc_offset_min", entry.utc_offset_min.map_or(Value::Null, Value::from));
    put(&mut map, "kind", Value::from(name));
    map.extend(says);
    Value::Object(without_nulls(map))
}

/// A person as an object; empty when nothing is known.
pub(crate) fn write_person(person: &Person) -> Map<String, Value> {
    let mut map = Map::new();
    put_word(&mut map, "sex", words::SEX, person.sex);
    put_word(&mut map, "height_how", words::HEIGHT_HOW, person.height_how);
    put_numbers(&mut map, &words::PERSON_NUMBERS, *person);
    without_nulls(map)
}

/// The name of the kind and its fields; those not given are `null`, so that a correction can take
/// values away.
pub(super) fn write_kind(says: &EntryKind) -> (&str, Map<String, Value>) {
    let mut map = Map::new();
    let name = match says {
        EntryKind::Settings(settings) => {
            put_settings(&mut map, settings);
            kind::SETTINGS
        }
        EntryKind::Gas(gas) => {
            put_word(&mut map, "site", words::SITE, Some(gas.site));
            put(&mut map, "ph", number_value(gas.ph));
            put(&mut map, "pco2_mmhg", number_value(gas.pco2_mmhg));
            put_numbers(&mut map, &words::GAS_NUMBERS, *gas);
            put(&mut map, "analysed_at", gas.analysed_at.map_or(Value::Null, time_value));
            kind::GAS
        }
        EntryKind::EndTidal(reading) => {
            put(&mut map, "etco2_mmhg", number_value(reading.etco2_mmhg));
            put_word(&mut map, "trace", words::TRACE, reading.trace);
            kind::END_TIDAL
        }
        EntryKind::Measured(measured) => {
            put_measured(&mut map, measured);
            kind::MEASURED
        }
        EntryKind::BreathingStopped(state) => {
            put_word(&mut map, "airway_state", words::AIRWAY_STATE, Some(*state));
            kind::BREATHING_STOPPED
        }
        EntryKind::BreathingRestored => kind::BREATHING_RESTORED,
        EntryKind::Sedation(sedation) => {
            put_word(&mut map, "level", words::SEDATION_LEVEL, sedation.level);
            put(&mut map, "relaxant", sedation.relaxant.map_or(Value::Null, Value::from));
            kind::SEDATION
        }
        EntryKind::Circulation(state) => {
            put_word(&mut map, "state", words::CIRCULATION, Some(*state));
            kind::CIRCULATION
        }
        EntryKind::BicarbonateGiven { mmol, over_min } => {
            put(&mut map, "bicarbonate_mmol", number_value(*mmol));
            put(&mut map, "over_min", over_min.map_or(Value::Null, number_value));
            kind::GIVEN
        }
        EntryKind::Temperature(celsius) => {
            put(&mut map, "temperature_c", number_value(*celsius));
            kind::TEMPERATURE
        }
        EntryKind::Seizure => kind::SEIZURE,
        EntryKind::AltitudeM(metres) => {
            put(&mut map, "altitude_m", number_value(*metres));
            put(&mut map, "pressure_hpa", Value::Null);
            kind::AMBIENT
        }
        EntryKind::PressureHpa(pressure) => {
            put(&mut map, "altitude_m", Value::Null);
            put(&mut map, "pressure_hpa", number_value(*pressure));
            kind::AMBIENT
        }
        EntryKind::Saturation(percent) => {
            put(&mut map, "spo2_percent", number_value(*percent));
            kind::SATURATION
        }
        EntryKind::Unchanged => kind::UNCHANGED,
        EntryKind::Condition { name, present } => {
            put_condition(&mut map, name, *present);
            kind::CONDITION
        }
        EntryKind::GasVerdict(verdict) => {
            put(&mut map, "of", Value::from(verdict.of.0.as_str()));
            put_word(&mut map, "choice", words::GAS_CHOICE, Some(verdict.choice));
            kind::GAS_VERDICT
        }
        EntryKind::Correction(correction) => {
            let (_, mut values) = write_kind(&correction.kind);
            if let Some(at) = correction.at {
                put(&mut values, "at", time_value(at));
            }
            put(&mut map, "of", Value::from(correction.of.0.as_str()));
            put(&mut map, "values", Value::Object(values));
            kind::CORRECTION
        }
        EntryKind::Checked(items) => {
            put(&mut map, "items", Value::from(items.as_slice()));
            kind::CHECKED
        }
        EntryKind::Note(text) => {
            put(&mut map, "text", Value::from(text.as_str()));
            kind::NOTE
        }
        EntryKind::NotUnderstood(unknown) => unknown.kind.as_str(),
    };
    (name, map)
}

fn put_settings(map: &mut Map<String, Value>, settings: &Settings) {
    put_word(map, "airway", words::AIRWAY, settings.airway);
    put_word(map, "control", words::CONTROL, settings.control);
    put_word(map, "effort", words::EFFORT, settings.effort);
    put_word(map, "leak", words::LEAK, settings.leak);
    put_numbers(map, &words::SETTINGS_NUMBERS, *settings);
    put(map, "flow_returns_to_zero", settings.flow_returns_to_zero.map_or(Value::Null, Value::from));
}

fn put_measured(map: &mut Map<String, Value>, measured: &Measured) {
    put_numbers(map, &words::MEASURED_NUMBERS, *measured);
    put(map, "exact", if measured.exact { Value::Bool(true) } else { Value::Null });
}

fn put_condition(map: &mut Map<String, Value>, name: &Condition, present: bool) {
    let word = match name {
        Condition::LungInjury => condition::LUNG_INJURY,
        Condition::AirflowObstruction => condition::AIRFLOW_OBSTRUCTION,
        Condition::ChronicRetainer { .. } => condition::CHRONIC_RETAINER,
        Condition::RaisedIntracranialPressure => condition::RAISED_INTRACRANIAL_PRESSURE,
        Condition::Pregnancy => condition::PREGNANCY,
        Condition::MetabolicAcidosis => condition::METABOLIC_ACIDOSIS,
        Condition::Other(other) => other,
    };
    put(map, "name", Value::from(word));
    put(map, "present", Value::Bool(present));
    if let Condition::ChronicRetainer { usual_paco2_mmhg } = name {
        put(map, "usual_paco2_mmhg", usual_paco2_mmhg.map_or(Value::Null, number_value));
    }
}

fn put(map: &mut Map<String, Value>, name: &str, value: Value) {
    map.insert(name.to_owned(), value);
}

fn put_word<T: PartialEq>(map: &mut Map<String, Value>, name: &str, words: Words<T>, value: Option<T>) {
    let word = value.and_then(|value| word_for(words, &value));
    put(map, name, word.map_or(Value::Null, Value::from));
}

fn put_numbers<T>(map: &mut Map<String, Value>, table: &[NumberField<T>], mut from: T) {
    for (name, _, slot) in table {
        put(map, name, slot(&mut from).map_or(Value::Null, number_value));
    }
}

fn without_nulls(map: Map<String, Value>) -> Map<String, Value> {
    map.into_iter().filter(|(_, value)| !value.is_null()).collect()
}

/// Largest whole number that is written without a point; far inside what is exact.
const WHOLE_BELOW: f64 = 1e15;

/// 18 and not 18.0. What is no number becomes `null`, which the reader refuses where one is needed.
fn number_value(value: f64) -> Value {
    if value.fract() == 0.0 && value.abs() < WHOLE_BELOW {
        Value::from(value as i64)
    } else {
        Number::from_f64(value).map_or(Value::Null, Value::Number)
    }
}

/// RFC 3339; a moment outside the years 0 to 9999 as its number, which the reader refuses with words.
fn time_value(moment: Moment) -> Value {
    write_time(moment).map_or_else(|| Value::from(moment.0), Value::from)
}
