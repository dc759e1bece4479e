//! Cases to start from. Every figure is invented.

#![allow(clippy::unwrap_used, dead_code)] // in a test an unwrap is an assertion; no file uses every helper

use case::*;

const T0: i64 = 1_772_485_800_000; // 2026-03-02T21:10:00Z

pub fn at(minutes: f64) -> Moment {
    Moment(T0).plus_minutes(minutes)
}

pub fn entry(id: &str, minutes: f64, kind: EntryKind) -> Entry {
    Entry {
        id: EntryId(id.into()),
        at: at(minutes),
        written_at: None,
        utc_offset_min: None,
        kind,
        not_understood: vec![],
    }
}

pub fn gas(ph: f64, pco2_mmhg: f64, held: Option<f64>) -> EntryKind {
    EntryKind::Gas(Gas {
        site: Site::Arterial,
        ph,
        pco2_mmhg,
        po2_mmhg: Some(68.0),
        hco3_printed_mmol_l: None,
        hb_g_dl: Some(11.8),
        temperature_c: None,
        reported_at_c: None,
        analysed_at: None,
        settings_held_min: held,
    })
}

pub fn passive(rate: f64, volume: f64) -> Settings {
    Settings {
        airway: Some(Airway::Tube),
        control: Some(Control::Volume),
        effort: Some(Effort::None),
        leak: Some(Leak::None),
        rate_per_min: Some(rate),
        tidal_volume_ml: Some(volume),
        peep_cmh2o: Some(10.0),
        plateau_cmh2o: Some(27.0),
        ..Settings::default()
    }
}

pub fn night_ferry() -> Case {
    let mut case = Case::new("Bed 3");
    case.person = Person {
        sex: Some(Sex::Female),
        age_years: Some(58.0),
        height_cm: Some(163.0),
        height_how: Some(HeightHow::Stated),
        weight_kg: Some(74.0),
    };
    case.add(entry("s1", -30.0, EntryKind::Settings(passive(18.0, 340.0)))).unwrap();
    case.add(entry("g1", 0.0, gas(7.21, 71.0, Some(30.0)))).unwrap();
    case
}

pub fn add(case: &mut Case, id: &str, minutes: f64, kind: EntryKind) {
    case.add(entry(id, minutes, kind)).unwrap();
}

pub fn now(minutes: f64) -> Now {
    Now::at(at(minutes))
}
