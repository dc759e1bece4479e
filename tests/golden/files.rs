//! Case files that must stay readable.

use case::{Airway, Effort, EntryId, EntryKind, GasChoice, GasVerdict, HeightHow, Leak, Sex};
use logbook::{CaseFile, read_case_file};

const NIGHT_FERRY: &str = include_str!("cases/night-ferry.json");
const EVERY_KIND: &str = include_str!("cases/every-kind.json");
const UNKNOWN_KIND: &str = include_str!("cases/unknown-kind.json");

fn read(text: &str) -> CaseFile {
    read_case_file(text).unwrap()
}

#[test]
fn the_night_ferry_says_what_it_said() {
    let case = read(NIGHT_FERRY).case;
    let person = case.person;
    assert_eq!((person.sex, person.height_how), (Some(Sex::Female), Some(HeightHow::Stated)));
    assert_eq!((person.age_years, person.height_cm, person.weight_kg), (Some(58.0), Some(163.0), Some(74.0)));
    let (_, at, gas) = case.gases()[0].clone();
    assert_eq!(at.clock(0), "21:10");
    assert_eq!((gas.ph, gas.pco2_mmhg, gas.hco3_printed_mmol_l), (7.21, 71.0, Some(27.8)));
    assert_eq!(gas.settings_held_min, Some(30.0));
    let settings = case.settings_at(case.last_at().unwrap());
    assert_eq!(
        (settings.airway, settings.effort, settings.leak),
        (Some(Airway::Tube), Some(Effort::None), Some(Leak::None))
    );
    assert_eq!((settings.rate_per_min, settings.tidal_volume_ml), (Some(24.0), Some(340.0)));
}

#[test]
fn exported_files_are_written_back_byte_for_byte() {
    for text in [NIGHT_FERRY, EVERY_KIND, UNKNOWN_KIND] {
        let file = read(text);
        assert_eq!(read(&file.to_json()), file);
        if text != UNKNOWN_KIND {
            assert_eq!(file.to_json(), text);
        }
    }
}

#[test]
fn every_kind_of_version_1_is_understood() {
    let file = read(EVERY_KIND);
    assert_eq!(file.not_understood(), Vec::<String>::new());
    assert_eq!(file.case.entries().len(), 20);
    assert_eq!(file.case.entries()[0].utc_offset_min, Some(60));
    let (id, at, gas) = file.case.gases()[0].clone();
    assert_eq!((gas.ph, gas.po2_mmhg, at.0 % 60_000), (7.12, None, 30_000));
    let verdict = GasVerdict { of: id, choice: GasChoice::Machine };
    assert!(file.case.resolved().iter().any(|entry| entry.kind == EntryKind::GasVerdict(verdict.clone())));
    let written = serde_kinds(EVERY_KIND);
    assert_eq!(written.len(), 19, "every kind but those that are not understood: {written:?}");
}

/// The kinds that a file names, each once.
fn serde_kinds(text: &str) -> std::collections::BTreeSet<String> {
    let value: serde_json::Value = serde_json::from_str(text).unwrap();
    let entries = value["entries"].as_array().unwrap();
    entries.iter().map(|entry| entry["kind"].as_str().unwrap().to_owned()).collect()
}

#[test]
fn an_unknown_kind_is_kept_shown_and_written_back() {
    let file = read(UNKNOWN_KIND);
    assert_eq!(
        file.not_understood(),
        [
            "file, tide",
            "person, sex",
            "person, shoe_size",
            "entry later, kind limits",
            "entry field, pressure_rise_s",
            "entry word, airway"
        ]
    );
    let later = file.case.entries().iter().find(|entry| entry.id == EntryId("later".into())).unwrap();
    assert!(matches!(&later.kind, EntryKind::NotUnderstood(unknown) if unknown.kind == "limits"));
    let written: serde_json::Value = serde_json::from_str(&file.to_json()).unwrap();
    assert_eq!(written, serde_json::from_str::<serde_json::Value>(UNKNOWN_KIND).unwrap());
}

#[test]
fn nobody_known_is_a_case_too() {
    let file = read(include_str!("cases/no-person.json"));
    assert_eq!(file.case.person, case::Person::default());
    assert_eq!(file.case.gases().len(), 1);
}

#[test]
fn a_child_may_have_a_breath_of_34_ml() {
    let case = read(include_str!("cases/breath-34-ml-child.json")).case;
    assert_eq!(case.settings_at(case.last_at().unwrap()).tidal_volume_ml, Some(34.0));
}

#[test]
fn what_looks_like_kpa_is_not_guessed_at() {
    let case = read(include_str!("cases/looks-like-kpa.json")).case;
    assert_eq!(case.gases()[0].2.pco2_mmhg, 9.5);
}
