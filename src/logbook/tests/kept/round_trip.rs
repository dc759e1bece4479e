//! Case files: written and read again, nothing lost.

use case::{Condition, EntryKind, Leak};
use logbook::{CaseFile, read_case_file};
use proptest::prelude::*;
use serde_json::{Value, json};

use crate::generate;

proptest! {
    #[test]
    fn any_case_reads_back_as_it_was_written(case in generate::case()) {
        let text = CaseFile::new(case.clone()).to_json();
        let read = read_case_file(&text).unwrap();
        prop_assert_eq!(&read.case, &case);
        prop_assert!(read.not_understood().is_empty());
        prop_assert_eq!(&read_case_file(&read.to_json()).unwrap(), &read);
        prop_assert_eq!(&read.to_json(), &text);
    }

    #[test]
    fn no_text_brings_the_reader_down(text in "\\PC{0,200}") {
        let _ = read_case_file(&text);
    }

    #[test]
    fn a_file_cut_anywhere_is_refused(case in generate::case(), share in 0.0..1.0_f64) {
        let text = CaseFile::new(case).to_json();
        let body = text.trim_end();
        let cut = (body.len() as f64 * share) as usize;
        let cut = (0..=cut).rev().find(|at| body.is_char_boundary(*at)).unwrap();
        prop_assert!(read_case_file(&body[..cut]).is_err());
    }

    #[test]
    fn a_field_of_any_type_is_read_or_refused(
        case in generate::case(),
        entry in any::<prop::sample::Index>(),
        field in any::<prop::sample::Index>(),
        other in prop::sample::select(vec![
            json!(null), json!(true), json!(-1), json!(1e300), json!("x"), json!([[]]), json!({"a": {}}),
        ]),
    ) {
        let mut value: Value = serde_json::from_str(&CaseFile::new(case).to_json()).unwrap();
        let entries = value["entries"].as_array_mut().unwrap();
        if !entries.is_empty() {
            let count = entries.len();
            let map = entries[entry.index(count)].as_object_mut().unwrap();
            let name = map.keys().nth(field.index(map.len())).unwrap().clone();
            map.insert(name, other);
            if let Ok(read) = read_case_file(&value.to_string()) {
                let again: Value = serde_json::from_str(&read.to_json()).unwrap();
                prop_assert_eq!(sorted(&again), sorted(&value));
            }
        }
    }
}

fn sorted(file: &Value) -> Vec<String> {
    let mut entries: Vec<String> = file["entries"].as_array().unwrap().iter().map(Value::to_string).collect();
    entries.sort();
    entries
}

fn file_with(entries: Value) -> Value {
    json!({ "format": "slackwater-case", "version": 1, "label": "Bed 3", "entries": entries })
}

fn read(entries: Value) -> CaseFile {
    read_case_file(&file_with(entries).to_string()).unwrap()
}

fn refusal(entries: Value) -> String {
    read_case_file(&file_with(entries).to_string()).unwrap_err().to_string()
}

#[test]
fn what_is_not_understood_survives_in_its_place() {
    let file = json!({
        "format": "slackwater-case", "version": 1, "label": "Bed 3", "colour": [1, {"deep": 0.1}],
        "person": { "age_years": 58, "sex": "not said", "shoe": 43 },
        "entries": [
            { "id": "x", "at": "2026-03-02T20:00:00+01:00", "kind": "tide", "height_m": 1.25 },
            { "id": "y", "at": "2026-03-02T21:00:00Z", "kind": "note", "text": "ebb", "by": null },
        ]
    });
    let read = read_case_file(&file.to_string()).unwrap();
    assert_eq!(
        read.not_understood(),
        ["file, colour", "person, sex", "person, shoe", "entry x, kind tide", "entry y, by"]
    );
    assert_eq!(read.case.entries()[0].kind, generate::unknown_kind());
    let written: Value = serde_json::from_str(&read.to_json()).unwrap();
    assert_eq!(written, file);
}

#[test]
fn a_strange_airway_leaves_no_ground_for_a_forecast() {
    let file = read(json!([
        { "id": "a", "at": "2026-03-02T20:00:00Z", "kind": "settings", "airway": "tube", "leak": "none" },
        { "id": "b", "at": "2026-03-02T21:00:00Z", "kind": "settings", "airway": "helmet", "leak": "none" },
    ]));
    assert_eq!(file.not_understood(), ["entry b, airway"]);
    let state = file.case.settings_at(file.case.last_at().unwrap());
    assert_eq!(state.leak, Some(Leak::Unknown));
}

#[test]
fn a_strange_control_leaves_effort_unknown_and_strange_words_are_unknown() {
    let file = read(json!([
        { "id": "a", "at": "2026-03-02T20:00:00Z", "kind": "settings", "control": "dual", "leak": "tiny" },
    ]));
    assert_eq!(file.not_understood(), ["entry a, control", "entry a, leak"]);
    let state = file.case.settings_at(file.case.last_at().unwrap());
    assert_eq!(
        (state.control, state.effort, state.leak),
        (None, Some(case::Effort::Unknown), Some(Leak::Unknown))
    );
}

#[test]
fn a_gas_from_a_strange_site_is_no_gas() {
    let file = read(json!([
        { "id": "g", "at": "2026-03-02T20:00:00Z", "kind": "gas", "site": "cord", "ph": 7.2, "pco2_mmhg": 50 },
    ]));
    assert!(file.case.gases().is_empty());
    assert_eq!(file.not_understood(), ["entry g, kind gas", "entry g, site"]);
}

#[test]
fn missing_effort_control_and_leak_stay_missing() {
    let file =
        read(json!([{ "id": "a", "at": "2026-03-02T20:00:00Z", "kind": "settings", "rate_per_min": 18 }]));
    let state = file.case.settings_at(file.case.last_at().unwrap());
    assert_eq!((state.effort, state.control, state.leak), (None, None, None));
}

#[test]
fn a_condition_with_a_new_name_is_kept_by_its_name() {
    let file = read(json!([
        { "id": "c", "at": "2026-03-02T20:00:00Z", "kind": "condition", "name": "smoke", "present": true },
        { "id": "d", "at": "2026-03-02T20:00:00Z", "kind": "condition", "name": "chronic_retainer",
          "present": true, "usual_paco2_mmhg": 55 },
    ]));
    let name = Condition::Other("smoke".into());
    assert_eq!(file.case.entries()[0].kind, EntryKind::Condition { name, present: true });
    let name = Condition::ChronicRetainer { usual_paco2_mmhg: Some(55.0) };
    assert_eq!(file.case.entries()[1].kind, EntryKind::Condition { name, present: true });
}

fn gas_and(corrections: &[Value]) -> Value {
    let gas = json!({ "id": "g", "at": "2026-03-02T20:00:00Z", "kind": "gas", "site": "arterial", "ph": 7.12,
                      "pco2_mmhg": 61, "po2_mmhg": 68 });
    Value::Array([gas].into_iter().chain(corrections.iter().cloned()).collect())
}

fn correction(id: &str, minute: u32, values: Value) -> Value {
    json!({ "id": id, "at": format!("2026-03-02T21:{minute:02}:00Z"), "kind": "correction", "of": "g",
            "values": values })
}

#[test]
fn corrections_give_only_what_is_new_and_add_up() {
    let file = read(gas_and(&[
        correction("k2", 2, json!({ "pco2_mmhg": 71, "po2_mmhg": null })),
        correction("k1", 1, json!({ "ph": 7.21, "at": "2026-03-02T19:55:00Z", "mood": "calm" })),
    ]));
    let (_, at, gas) = file.case.gases()[0].clone();
    assert_eq!((gas.ph, gas.pco2_mmhg, gas.po2_mmhg), (7.21, 71.0, None));
    assert_eq!(logbook::write_time(at).unwrap(), "2026-03-02T19:55:00Z");
    assert_eq!(file.not_understood(), ["entry k1, values.mood"]);
    assert_eq!(file.case.entries().len(), 3);
}

#[test]
fn corrections_that_hit_nothing_are_refused_with_words() {
    let mut stray = correction("k1", 1, json!({ "ph": 7.21 }));
    stray["of"] = json!("h");
    assert_eq!(
        refusal(gas_and(&[stray])),
        "entry k1, of: there is no entry h here. Write the id of the entry that is meant."
    );
    let mut second = correction("k2", 2, json!({ "values": { "ph": 7.21 } }));
    second["of"] = json!("k1");
    assert_eq!(
        refusal(gas_and(&[correction("k1", 1, json!({ "ph": 7.21 })), second])),
        "entry k2, of: entry k1 is itself a correction. Correct the first entry again instead."
    );
    assert_eq!(
        refusal(gas_and(&[correction("k1", 1, json!({ "kind": "note" }))])),
        "entry k1, values.kind: can't be corrected. Write a new entry instead."
    );
    assert_eq!(
        refusal(gas_and(&[correction("k1", 1, json!({ "ph": 71 }))])),
        "entry k1, ph: pH 71 is outside 6.5 to 8. Type it with its point, as in 7.21."
    );
}

#[test]
fn a_value_that_a_correction_replaced_is_history_whatever_the_age() {
    let entries = json!([
        { "id": "s", "at": "2026-03-02T20:00:00Z", "kind": "settings", "tidal_volume_ml": 34 },
        { "id": "k", "at": "2026-03-02T20:10:00Z", "kind": "correction", "of": "s",
          "values": { "tidal_volume_ml": 340 } },
    ]);
    let file = read(entries.clone());
    assert_eq!(file.case.settings_at(file.case.last_at().unwrap()).tidal_volume_ml, Some(340.0));
    let words = refusal(json!([entries[0]]));
    assert_eq!(
        words,
        "entry s, tidal_volume_ml: Tidal volume 34 mL is outside 50 to 2000 mL. Check the digits. For a child \
         give the age first."
    );
}

#[test]
fn the_same_entry_twice_is_one_and_two_that_differ_are_refused() {
    let note = json!({ "id": "n", "at": "2026-03-02T20:00:00Z", "kind": "note", "text": "ebb" });
    assert_eq!(read(json!([note, note])).case.entries().len(), 1);
    let mut other = note.clone();
    other["text"] = json!("flood");
    let words = "entry n, id: two entries share this id and differ. Give one of them another id.";
    assert_eq!(refusal(json!([note, other])), words);
    // They may differ in what this version can't see.
    let tide = json!({ "id": "n", "at": "2026-03-02T20:00:00Z", "kind": "tide", "height_m": 1 });
    let mut higher = tide.clone();
    higher["height_m"] = json!(2);
    assert_eq!(refusal(json!([tide, higher])), words);
}

#[test]
fn a_verdict_about_no_gas_is_refused() {
    let verdict = json!({ "id": "v", "at": "2026-03-02T20:00:00Z", "kind": "gas_verdict", "of": "h",
                          "choice": "sample" });
    assert_eq!(
        refusal(json!([verdict])),
        "entry v, of: there is no entry h here. Write the id of the entry that is meant."
    );
}

#[test]
fn what_is_given_or_around_under_a_new_name_is_kept_and_nothing_at_all_is_refused() {
    let file = read(json!([
        { "id": "a", "at": "2026-03-02T20:00:00Z", "kind": "given", "salbutamol_mg": 5 },
        { "id": "b", "at": "2026-03-02T20:00:00Z", "kind": "ambient", "wind_kn": 30 },
    ]));
    assert_eq!(file.not_understood(), ["entry a, kind given", "entry b, kind ambient"]);
    let given = json!({ "id": "a", "at": "2026-03-02T20:00:00Z", "kind": "given" });
    assert_eq!(refusal(json!([given])), "entry a, bicarbonate_mmol: missing. Write how much was given.");
    let ambient = json!({ "id": "b", "at": "2026-03-02T20:00:00Z", "kind": "ambient" });
    assert_eq!(refusal(json!([ambient])), "entry b, altitude_m: missing. Write it, or pressure_hpa.");
    let both = json!({ "id": "b", "at": "2026-03-02T20:00:00Z", "kind": "ambient", "altitude_m": 0,
                       "pressure_hpa": 1013 });
    assert_eq!(
        refusal(json!([both])),
        "entry b, altitude_m: stands beside pressure_hpa. Write one of the two."
    );
}

#[test]
fn a_correction_of_what_is_not_understood_is_not_understood_either() {
    let tide = json!({ "id": "g", "at": "2026-03-02T20:00:00Z", "kind": "tide", "height_m": 1 });
    let file = read(json!([tide, correction("k1", 1, json!({ "height_m": 2 }))]));
    assert_eq!(file.not_understood(), ["entry g, kind tide", "entry k1, kind correction"]);
    // A new value that is not understood leaves the gas as it was.
    let file = read(gas_and(&[correction("k1", 1, json!({ "site": "cord" }))]));
    assert_eq!(file.case.gases()[0].2.ph, 7.12);
    assert_eq!(file.not_understood(), ["entry k1, kind correction", "entry k1, values.site"]);
}

#[test]
fn a_refusal_has_the_limits_of_the_age() {
    let breath =
        json!([{ "id": "s", "at": "2026-03-02T20:00:00Z", "kind": "settings", "tidal_volume_ml": 5 }]);
    assert!(refusal(breath.clone()).contains("Tidal volume 5 mL is outside 50 to 2000 mL."));
    let mut file = file_with(breath);
    file["person"] = json!({ "age_years": 3 });
    let words = read_case_file(&file.to_string()).unwrap_err().to_string();
    assert!(words.contains("Tidal volume 5 mL is outside 15 to 2000 mL."), "{words}");
}

#[test]
fn a_blank_id_is_no_id() {
    let note = json!({ "id": " ", "at": "2026-03-02T20:00:00Z", "kind": "note", "text": "ebb" });
    assert_eq!(refusal(json!([note])), "entry number 1, id: missing. Give every entry an id of its own.");
}
