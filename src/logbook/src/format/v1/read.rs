//! JSON to what an entry or a person says.

use case::{
    Condition, Control, Effort, EndTidal, Entry, EntryId, EntryKind, Gas, GasVerdict, Leak, Measured,
    NotUnderstood, Person, Sedation, Settings, Site,
};
use serde_json::{Map, Value};
use units::Quantity as Q;

use super::fields::{Fields, Word, object};
use super::words::{self, condition, kind};
use crate::format::{FileError, Place, Problem};

/// Fields that every entry has beside those of its kind.
const OF_EVERY_ENTRY: [&str; 5] = ["id", "at", "written_at", "utc_offset_min", "kind"];

/// The fields that every entry has, read; the rest still to be read.
pub(super) struct Opened<'a> {
    pub(super) entry: Entry,
    pub(super) kind: &'a str,
    pub(super) fields: Fields<'a>,
    pub(super) map: &'a Map<String, Value>,
}

/// Reads the fields that every entry has. `number` names an entry that has no id, counted from 1.
pub(super) fn open_entry(raw: &Value, number: usize) -> Result<Opened<'_>, FileError> {
    let place = Place::EntryNumber(number);
    let map = object(raw, &place, "")?;
    let mut fields = Fields::new(map, place);
    let id = fields.text("id")?.filter(|id| !id.trim().is_empty());
    let id = fields.needed("id", id, "Give every entry an id of its own.")?.to_owned();
    fields.set_place(Place::Entry(id.clone()));
    let at = fields.moment("at")?;
    let at = fields.needed("at", at, "Write when it was so, as 2026-03-02T21:10:00Z.")?;
    let written_at = fields.moment("written_at")?;
    let utc_offset_min = fields.whole("utc_offset_min", Q::UtcOffsetMin)?;
    let kind = fields.text("kind")?;
    let kind = fields.needed("kind", kind, "Write what it is, as settings or gas.")?;
    let unread = EntryKind::NotUnderstood(NotUnderstood { kind: kind.to_owned() });
    let entry =
        Entry { id: EntryId(id), at, written_at, utc_offset_min, kind: unread, not_understood: vec![] };
    Ok(Opened { entry, kind, fields, map })
}

/// The fields of an entry's kind alone, those of every entry taken as read.
pub(super) fn only_kind<'a>(map: &'a Map<String, Value>, place: Place) -> Fields<'a> {
    let mut fields = Fields::new(map, place);
    fields.expect(&OF_EVERY_ENTRY);
    fields
}

/// What an entry of `name` says. A kind not known, or a word without which nothing can be said and that
/// is not known, comes out as [`EntryKind::NotUnderstood`].
pub(super) fn read_kind(name: &str, fields: &mut Fields) -> Result<EntryKind, FileError> {
    Ok(match name {
        kind::SETTINGS => EntryKind::Settings(settings(fields)?),
        kind::GAS => return gas(fields),
        kind::END_TIDAL => {
            let value = fields.number("etco2_mmhg", Q::Etco2Mmhg)?;
            let etco2_mmhg = fields.needed("etco2_mmhg", value, "Files carry mmHg.")?;
            EntryKind::EndTidal(EndTidal { etco2_mmhg, trace: fields.word("trace", words::TRACE)?.known() })
        }
        kind::MEASURED => {
            let mut measured = Measured::default();
            fields.numbers(&words::MEASURED_NUMBERS, &mut measured)?;
            measured.exact = fields.flag("exact")?.unwrap_or(false);
            EntryKind::Measured(measured)
        }
        kind::BREATHING_STOPPED => {
            let state = fields.word("airway_state", words::AIRWAY_STATE)?;
            let advice = "Write open_oxygen, open_air or closed.";
            return needed_word(fields, name, "airway_state", state, advice, EntryKind::BreathingStopped);
        }
        kind::BREATHING_RESTORED => EntryKind::BreathingRestored,
        kind::SEDATION => EntryKind::Sedation(Sedation {
            level: fields.word("level", words::SEDATION_LEVEL)?.known(),
            relaxant: fields.flag("relaxant")?,
        }),
        kind::CIRCULATION => {
            let state = fields.word("state", words::CIRCULATION)?;
            let advice = "Write steady, shock, arrest or restored.";
            return needed_word(fields, name, "state", state, advice, EntryKind::Circulation);
        }
        kind::GIVEN => return given(fields),
        kind::TEMPERATURE => {
            let value = fields.number("temperature_c", Q::TemperatureC)?;
            EntryKind::Temperature(fields.needed("temperature_c", value, "Write it in °C.")?)
        }
        kind::SEIZURE => EntryKind::Seizure,
        kind::AMBIENT => return ambient(fields),
        kind::SATURATION => {
            let value = fields.number("spo2_percent", Q::Spo2Percent)?;
            EntryKind::Saturation(fields.needed("spo2_percent", value, "Write per cent, as 93.")?)
        }
        kind::UNCHANGED => EntryKind::Unchanged,
        kind::CONDITION => condition(fields)?,
        kind::GAS_VERDICT => {
            let of = target(fields)?;
            let choice = fields.word("choice", words::GAS_CHOICE)?;
            let advice = "Write sample, patient or machine.";
            return needed_word(fields, name, "choice", choice, advice, |choice| {
                EntryKind::GasVerdict(GasVerdict { of, choice })
            });
        }
        kind::CHECKED => {
            let items = fields.texts("items")?;
            EntryKind::Checked(fields.needed("items", items, "Write the list of what was ticked.")?)
        }
        kind::NOTE => {
            let text = fields.text("text")?;
            EntryKind::Note(fields.needed("text", text, "Write the note's words.")?.to_owned())
        }
        _ => not_understood(name),
    })
}

/// The id in `of`.
pub(super) fn target(fields: &mut Fields) -> Result<EntryId, FileError> {
    let of = fields.text("of")?;
    let of = fields.needed("of", of, "Write the id of the entry that is meant.")?;
    Ok(EntryId(of.to_owned()))
}

fn not_understood(name: &str) -> EntryKind {
    EntryKind::NotUnderstood(NotUnderstood { kind: name.to_owned() })
}

fn needed_word<T>(
    fields: &Fields,
    kind: &str,
    name: &str,
    word: Word<T>,
    advice: &'static str,
    say: impl FnOnce(T) -> EntryKind,
) -> Result<EntryKind, FileError> {
    match word {
        Word::Known(value) => Ok(say(value)),
        Word::Strange => Ok(not_understood(kind)),
        Word::Absent => Err(fields.error(name, Problem::Missing { advice })),
    }
}

fn settings(fields: &mut Fields) -> Result<Settings, FileError> {
    let airway = fields.word("airway", words::AIRWAY)?;
    let control = fields.word("control", words::CONTROL)?;
    let effort = fields.word("effort", words::EFFORT)?;
    let leak = fields.word("leak", words::LEAK)?;
    // A word that is not known leaves the state before it in force, and a forecast for a tube would go
    // on over a strange airway. So what rests on that word becomes unknown: with a leak not known there
    // is no forecast, with effort not known none without a measured minute volume.
    let leak = if matches!((&airway, &leak), (Word::Strange, _) | (_, Word::Strange)) {
        Some(Leak::Unknown)
    } else {
        leak.known()
    };
    let effort = if matches!((&control, &effort), (Word::Strange, _) | (_, Word::Strange)) {
        Some(Effort::Unknown)
    } else {
        effort.known()
    };
    let control: Option<Control> = control.known();
    let mut settings = Settings { airway: airway.known(), control, effort, leak, ..Settings::default() };
    fields.numbers(&words::SETTINGS_NUMBERS, &mut settings)?;
    settings.flow_returns_to_zero = fields.flag("flow_returns_to_zero")?;
    Ok(settings)
}

fn gas(fields: &mut Fields) -> Result<EntryKind, FileError> {
    const NEEDS: &str = "A gas needs site, ph and pco2_mmhg; files carry mmHg.";
    let site = fields.word("site", words::SITE)?;
    let pressure = if matches!(site, Word::Known(Site::Arterial)) { Q::Paco2Mmhg } else { Q::Pco2Mmhg };
    let ph = fields.number("ph", Q::Ph)?;
    let ph = fields.needed("ph", ph, NEEDS)?;
    let pco2_mmhg = fields.number("pco2_mmhg", pressure)?;
    let pco2_mmhg = fields.needed("pco2_mmhg", pco2_mmhg, NEEDS)?;
    let mut gas = Gas {
        site: Site::Arterial,
        ph,
        pco2_mmhg,
        po2_mmhg: None,
        hco3_printed_mmol_l: None,
        hb_g_dl: None,
        temperature_c: None,
        reported_at_c: None,
        analysed_at: fields.moment("analysed_at")?,
        settings_held_min: None,
    };
    fields.numbers(&words::GAS_NUMBERS, &mut gas)?;
    needed_word(fields, kind::GAS, "site", site, NEEDS, |site| EntryKind::Gas(Gas { site, ..gas }))
}

fn given(fields: &mut Fields) -> Result<EntryKind, FileError> {
    let mmol = fields.number("bicarbonate_mmol", Q::BicarbonateMmol)?;
    let over_min = fields.number("over_min", Q::GivenOverMin)?;
    match mmol {
        Some(mmol) => Ok(EntryKind::BicarbonateGiven { mmol, over_min }),
        // Something else was given, by a name from a newer version.
        None if fields.has_more() => Ok(not_understood(kind::GIVEN)),
        None => {
            Err(fields.error("bicarbonate_mmol", Problem::Missing { advice: "Write how much was given." }))
        }
    }
}

fn ambient(fields: &mut Fields) -> Result<EntryKind, FileError> {
    let altitude_m = fields.number("altitude_m", Q::AltitudeM)?;
    let pressure_hpa = fields.number("pressure_hpa", Q::PressureHpa)?;
    match (altitude_m, pressure_hpa) {
        (Some(_), Some(_)) => {
            Err(fields.error("altitude_m", Problem::BesideAnother { other: "pressure_hpa" }))
        }
        (Some(altitude), None) => Ok(EntryKind::AltitudeM(altitude)),
        (None, Some(pressure)) => Ok(EntryKind::PressureHpa(pressure)),
        (None, None) if fields.has_more() => Ok(not_understood(kind::AMBIENT)),
        (None, None) => {
            Err(fields.error("altitude_m", Problem::Missing { advice: "Write it, or pressure_hpa." }))
        }
    }
}

fn condition(fields: &mut Fields) -> Result<EntryKind, FileError> {
    let name = fields.text("name")?;
    let name = fields.needed("name", name, "Write the condition's name.")?;
    let present = fields.flag("present")?;
    let present = fields.needed("present", present, "Write true or false.")?;
    let name = match name {
        condition::LUNG_INJURY => Condition::LungInjury,
        condition::AIRFLOW_OBSTRUCTION => Condition::AirflowObstruction,
        condition::CHRONIC_RETAINER => {
            Condition::ChronicRetainer { usual_paco2_mmhg: fields.number("usual_paco2_mmhg", Q::Paco2Mmhg)? }
        }
        condition::RAISED_INTRACRANIAL_PRESSURE => Condition::RaisedIntracranialPressure,
        condition::PREGNANCY => Condition::Pregnancy,
        condition::METABOLIC_ACIDOSIS => Condition::MetabolicAcidosis,
        other => Condition::Other(other.to_owned()),
    };
    Ok(EntryKind::Condition { name, present })
}

/// A person, with what was not understood kept apart.
pub(crate) struct ReadPerson {
    pub(crate) person: Person,
    /// Fields and words not known to this version, as they came.
    pub(crate) extra: Map<String, Value>,
}

/// Reads `person`; every field may be missing.
pub(crate) fn read_person(value: Option<&Value>) -> Result<ReadPerson, FileError> {
    let Some(value) = value.filter(|value| !value.is_null()) else {
        return Ok(ReadPerson { person: Person::default(), extra: Map::new() });
    };
    let map = object(value, &Place::File, "person")?;
    let mut fields = Fields::new(map, Place::Person);
    let mut person = Person {
        sex: fields.word("sex", words::SEX)?.known(),
        height_how: fields.word("height_how", words::HEIGHT_HOW)?.known(),
        ..Person::default()
    };
    fields.numbers(&words::PERSON_NUMBERS, &mut person)?;
    let strange = fields.left_over();
    let extra =
        strange.into_iter().filter_map(|name| map.get(&name).map(|v| (name.clone(), v.clone()))).collect();
    Ok(ReadPerson { person, extra })
}
