//! Files that must be refused, each with a sentence that names the entry, the field and what to do.

use logbook::read_case_file;
use serde_json::{Value, json};

#[track_caller]
fn refused(text: &str, words: &str) {
    let said = read_case_file(text).unwrap_err().to_string();
    assert_eq!(said, words);
    assert!(!said.contains('\n'));
}

#[test]
fn ph_71() {
    refused(
        include_str!("cases/ph-71.json"),
        "entry g1, ph: pH 71 is outside 6.5 to 8. Type it with its point, as in 7.21.",
    );
}

#[test]
fn paco2_out_of_limits() {
    refused(
        include_str!("cases/paco2-too-low.json"),
        "entry g1, pco2_mmhg: PaCO₂ 4.9 mmHg is outside 5 to 190 mmHg. Check it and type it again.",
    );
}

#[test]
fn a_breath_of_34_ml_in_an_adult() {
    refused(
        include_str!("cases/breath-34-ml-adult.json"),
        "entry s1, tidal_volume_ml: Tidal volume 34 mL is outside 50 to 2000 mL. Check the digits. For a child \
         give the age first.",
    );
}

#[test]
fn version_2() {
    refused(
        include_str!("cases/version-2.json"),
        "The file is of version 2, made by a newer version of Slackwater; this one reads version 1. Open it \
         there, or update this one. Nothing was changed.",
    );
}

#[test]
fn cut_off_in_the_middle() {
    refused(
        include_str!("cases/cut-off.json"),
        "The file stops in the middle, on line 5: it seems to have been cut off. Copy or export it again.",
    );
}

#[test]
fn an_empty_file() {
    refused(include_str!("cases/empty.json"), "The file is empty. Export the case again.");
    refused(" \n\t", "The file is empty. Export the case again.");
}

#[test]
fn a_number_in_quotes() {
    refused(
        include_str!("cases/ph-as-text.json"),
        "entry g1, ph: the text \"7,21\" is not a number. Write it without quotes and with a point, as in 7.21.",
    );
}

#[test]
fn five_megabytes_are_refused_before_they_are_parsed() {
    // No JSON at all: a parser would say so first.
    let text = "x".repeat(5_000_000);
    refused(&text, "The file has 5.0 MB; a case file has at most 4 MB. Check that it is the right file.");
    assert!(!read_case_file(&"x".repeat(4_000_000)).unwrap_err().to_string().contains("MB"));
}

#[test]
fn too_many_entries() {
    let mut file = json!({ "format": "slackwater-case", "version": 1 });
    file["entries"] = vec![json!({}); 10_001].into();
    refused(
        &file.to_string(),
        "The file has 10001 entries; a case has at most 10000. Split it into several cases.",
    );
}

#[test]
fn nesting_without_end() {
    for (open, close) in [("[", "]"), ("{\"a\":", "}")] {
        let deep = format!("{}1{}", open.repeat(100_000), close.repeat(100_000));
        let file = format!("{{\"format\":\"slackwater-case\",\"version\":1,\"entries\":[{deep}]}}");
        let said = read_case_file(&file).unwrap_err().to_string();
        assert!(
            said.starts_with("The file can't be read as JSON: recursion limit exceeded at line 1"),
            "{said}"
        );
    }
}

#[test]
fn what_is_no_case_file() {
    let said = |found: &str| {
        format!("This is no case file: {found}, not \"slackwater-case\". Check that it is the right file.")
    };
    refused("[]", &said("it is a list"));
    refused("{}", &said("its format is missing"));
    refused(r#"{"format":"tide-table"}"#, &said("its format is the text \"tide-table\""));
    refused("{\"format\":\"a\\nb\"}", &said("its format is the text \"a\\nb\""));
    for (version, found) in
        [("", "missing"), (",\"version\":\"1\"", "the text \"1\""), (",\"version\":0", "the number 0")]
    {
        refused(
            &format!("{{\"format\":\"slackwater-case\"{version}}}"),
            &format!("The file's version is {found}; this one reads version 1. Export the case again."),
        );
    }
    let said = read_case_file("<!doctype html>").unwrap_err().to_string();
    assert!(said.starts_with("The file can't be read as JSON: expected value at line 1 column 1."), "{said}");
}

/// Night ferry with one value replaced, `entry` counted from 0.
fn night_ferry_with(entry: usize, name: &str, value: Value) -> String {
    let mut file: Value = serde_json::from_str(include_str!("cases/night-ferry.json")).unwrap();
    file["entries"][entry][name] = value;
    file.to_string()
}

#[test]
fn wrong_types_field_by_field() {
    let number = "is not a number. Write it without quotes and with a point, as in 7.21.";
    for (entry, name, value, words) in [
        (1, "ph", json!([7.21]), format!("entry gas-1, ph: a list {number}")),
        (1, "ph", json!(true), format!("entry gas-1, ph: true {number}")),
        (0, "rate_per_min", json!("18"), format!("entry settings-1, rate_per_min: the text \"18\" {number}")),
        (0, "airway", json!(7), "entry settings-1, airway: the number 7 is not a word. Write it in quotes.".into()),
        (
            0,
            "flow_returns_to_zero",
            json!("yes"),
            "entry settings-1, flow_returns_to_zero: the text \"yes\" is not true or false. Write one of them \
             without quotes."
                .into(),
        ),
        (
            1,
            "at",
            json!("21:10"),
            "entry gas-1, at: the text \"21:10\" is not a time. Write it as 2026-03-02T21:10:00Z.".into(),
        ),
        (
            1,
            "analysed_at",
            json!(1_772_485_800),
            "entry gas-1, analysed_at: the number 1772485800 is not a time. Write it as 2026-03-02T21:10:00Z."
                .into(),
        ),
        (1, "id", json!(5), "entry number 2, id: the number 5 is not a text. Write it in quotes.".into()),
        (1, "id", Value::Null, "entry number 2, id: missing. Give every entry an id of its own.".into()),
        (1, "kind", Value::Null, "entry gas-1, kind: missing. Write what it is, as settings or gas.".into()),
        (
            1,
            "pco2_mmhg",
            Value::Null,
            "entry gas-1, pco2_mmhg: missing. A gas needs site, ph and pco2_mmhg; files carry mmHg.".into(),
        ),
        (
            1,
            "utc_offset_min",
            json!(0.5),
            "entry gas-1, utc_offset_min: the number 0.5 is not a whole number.".into(),
        ),
        (
            1,
            "utc_offset_min",
            json!(5000),
            "entry gas-1, utc_offset_min: UTC offset 5000 min is outside -840 to 840 min. Write minutes, east \
             positive."
                .into(),
        ),
        (
            3,
            "id",
            json!("gas-1"),
            "entry gas-1, id: two entries share this id and differ. Give one of them another id.".into(),
        ),
    ] {
        refused(&night_ferry_with(entry, name, value), &words);
    }
}

#[test]
fn wrong_types_beside_the_entries() {
    for (name, value, words) in [
        ("person", json!([]), "file, person: a list is not an object. Write it in braces."),
        ("label", json!(3), "file, label: the number 3 is not a text. Write it in quotes."),
        ("entries", json!({}), "file, entries: an object is not a list. Write it in square brackets."),
        ("entries", Value::Null, "file, entries: missing. Write an empty list when there are none."),
        ("entries", json!([7]), "entry number 1: the number 7 is not an object. Write it in braces."),
        (
            "person",
            json!({ "weight_kg": 3 }),
            "person, weight_kg: Weight 3 kg is outside 5 to 300 kg. Under 5 kg this is not for. Otherwise check the \
             unit.",
        ),
    ] {
        let mut file: Value = serde_json::from_str(include_str!("cases/night-ferry.json")).unwrap();
        file[name] = value;
        refused(&file.to_string(), words);
    }
}
