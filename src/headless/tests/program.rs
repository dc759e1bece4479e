//! The program as its users run it.

#![allow(clippy::unwrap_used, reason = "a test fails by it")]

use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

use serde_json::Value;

fn fixture(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../../tests/golden/cases").join(name)
}

fn program() -> Command {
    Command::new(env!("CARGO_BIN_EXE_headless"))
}

fn run(path: &Path, options: &[&str]) -> Output {
    program().arg("forecast").arg(path).args(options).output().unwrap()
}

/// The answer, when there is nothing but JSON on standard output.
#[track_caller]
fn answer(path: &Path, options: &[&str]) -> Value {
    let output = run(path, options);
    assert_eq!(String::from_utf8_lossy(&output.stderr), "");
    assert!(output.status.success());
    serde_json::from_slice(&output.stdout).unwrap()
}

/// The one line on standard error, when there is nothing on standard output and the exit is 2.
#[track_caller]
fn refusal(output: &Output) -> String {
    assert_eq!(output.status.code(), Some(2));
    assert!(output.stdout.is_empty());
    let text = String::from_utf8(output.stderr.clone()).unwrap();
    assert_eq!(text.lines().count(), 1, "{text}");
    text.trim_end().to_owned()
}

fn file_with(bytes: &[u8]) -> tempfile::NamedTempFile {
    let mut file = tempfile::NamedTempFile::new().unwrap();
    file.write_all(bytes).unwrap();
    file
}

#[test]
fn the_night_ferry_is_answered_under_every_stable_name() {
    let answer = answer(&fixture("night-ferry.json"), &["--minutes", "0,10,60"]);
    assert_eq!(answer["status"], "forecast");
    assert_eq!(answer["at"], "2026-03-02T21:20:00Z");
    assert_eq!(answer["valid_until"], "2026-03-02T22:20:00Z");
    assert_eq!(answer["minutes"], serde_json::json!([0.0, 10.0, 60.0]));
    assert_eq!(answer["entries_after_at"], 0);
    for name in ["conditions", "withheld", "assumed", "cautions", "not_understood"] {
        assert!(answer[name].is_array(), "{name}");
    }
    let bands = [
        &answer["paco2_mmhg"],
        &answer["ph"],
        &answer["hco3_mmol_l"],
        &answer["gas_would_read"]["paco2_mmhg"],
        &answer["gas_would_read"]["ph"],
    ];
    for band in bands {
        for minute in 0..3 {
            let at = |edge: &str| band[edge][minute].as_f64().unwrap();
            assert!(at("p10") <= at("p50") && at("p50") <= at("p90"), "{band}");
        }
    }
    let settled = [&answer["settled"]["paco2_mmhg"], &answer["settled"]["ph"]];
    for edges in
        settled.into_iter().chain([&answer["minutes_to_within_2_mmhg"], &answer["minutes_to_90_percent"]])
    {
        let at = |edge: &str| edges[edge].as_f64().unwrap();
        assert!(at("p10") <= at("p50") && at("p50") <= at("p90"), "{edges}");
    }
    // Rate 18 to 24: PaCO2 falls from 71 and is still falling at an hour.
    let paco2 = |minute: usize| answer["paco2_mmhg"]["p50"][minute].as_f64().unwrap();
    assert!(paco2(0) > paco2(1) && paco2(1) > paco2(2));
    assert!(paco2(2) > answer["settled"]["paco2_mmhg"]["p50"].as_f64().unwrap());
}

#[test]
fn the_same_question_has_the_same_answer_to_the_last_bit() {
    let ferry = fixture("night-ferry.json");
    let options = ["--members", "128", "--seed", "7"];
    assert_eq!(run(&ferry, &options).stdout, run(&ferry, &options).stdout);
    assert_ne!(run(&ferry, &options).stdout, run(&ferry, &["--members", "128", "--seed", "8"]).stdout);
}

#[test]
fn an_earlier_moment_does_not_know_what_came_later() {
    let earlier = answer(&fixture("night-ferry.json"), &["--at", "2026-03-02T22:15:00+01:00"]);
    assert_eq!((&earlier["at"], &earlier["entries_after_at"]), (&"2026-03-02T21:15:00Z".into(), &1.into()));
    // Settings unchanged since the gas: it stays where it was, as far as the band goes.
    let last = |edge: &str| earlier["paco2_mmhg"][edge][9].as_f64().unwrap();
    assert!(last("p10") < 71.0 && last("p90") > 71.0);
}

#[test]
fn what_is_withheld_is_null_with_its_reason_and_exit_0() {
    let answer = answer(&fixture("unknown-kind.json"), &[]);
    assert_eq!(answer["status"], "withheld");
    assert!(answer["paco2_mmhg"].is_null() && answer["minutes"].is_null());
    assert!(!answer["withheld"].as_array().unwrap().is_empty());
    assert!(answer["not_understood"].as_array().unwrap().contains(&"entry later, kind limits".into()));
}

#[test]
fn fifty_megabytes_are_refused_by_their_length() {
    let file = tempfile::NamedTempFile::new().unwrap();
    file.as_file().set_len(50_000_000).unwrap();
    let said = refusal(&run(file.path(), &[]));
    assert!(
        said.ends_with(
            ": The file has 50.0 MB; a case file has at most 4 MB. Check that it is the right file."
        ),
        "{said}"
    );
}

#[cfg(target_os = "linux")]
#[test]
fn a_pipe_without_a_length_is_read_no_further_than_the_limit() {
    let mut child = program()
        .args(["forecast", "/dev/stdin"])
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut stdin = child.stdin.take().unwrap();
    // The program stops reading, so that the pipe breaks before everything is written.
    let writer =
        std::thread::spawn(move || (0..50).map(|_| stdin.write_all(&[b' '; 1_000_000])).any(|r| r.is_err()));
    let said = refusal(&child.wait_with_output().unwrap());
    assert!(said.contains("The file has 4.1 MB; a case file has at most 4 MB."), "{said}");
    assert!(writer.join().unwrap());
}

#[test]
fn bad_files_are_one_line_with_entry_and_field() {
    let said = refusal(&run(&fixture("ph-71.json"), &[]));
    assert!(said.ends_with(
        "ph-71.json: entry g1, ph: pH 71 is outside 6.5 to 8. Type it with its point, as in 7.21."
    ));
    let said = refusal(&run(&fixture("cut-off.json"), &[]));
    assert!(said.contains("it seems to have been cut off"));
    let said = refusal(&run(&fixture("no-such-file.json"), &[]));
    assert!(said.contains("no-such-file.json: can't be opened:"));
    let said = refusal(&run(&fixture(""), &[]));
    assert!(said.ends_with("is a folder. Name a case file."));
    let said = refusal(&run(file_with(&[0xff, 0xfe, 0x00]).path(), &[]));
    assert!(said.contains("is not text in UTF-8."));
    let id = r#"{"format":"slackwater-case","version":1,"entries":[{"id":"a\nb","at":1}]}"#;
    let said = refusal(&run(file_with(id.as_bytes()).path(), &[]));
    assert!(said.contains("entry a\\nb, at: the number 1 is not a time."), "{said}");
}

#[test]
fn moments_that_give_no_answer_are_said() {
    let said = refusal(&run(&fixture("night-ferry.json"), &["--at", "2026-03-02T20:00:00Z"]));
    assert!(said.contains("--at 2026-03-02T20:00:00Z lies before the first entry"), "{said}");
    assert!(said.ends_with("2026-03-02T20:40:00Z. Ask for that moment or a later one."), "{said}");
    let empty = file_with(br#"{"format":"slackwater-case","version":1,"entries":[]}"#);
    let said = refusal(&run(empty.path(), &[]));
    assert!(said.contains("has no entries to count from."), "{said}");
    let withheld = answer(empty.path(), &["--at", "2026-03-02T20:00:00Z"]);
    assert_eq!(withheld["status"], "withheld");
}

#[test]
fn arguments_are_said_on_one_line_and_help_keeps_standard_output_clean() {
    let said = refusal(&program().arg("predict").output().unwrap());
    assert_eq!(said, "headless: \"predict\" is no command; forecast is. Type headless --help for how.");
    let help = program().arg("--help").output().unwrap();
    assert!(help.status.success() && help.stdout.is_empty());
    assert!(String::from_utf8(help.stderr).unwrap().contains("--minutes LIST"));
}

#[test]
fn a_correction_written_after_the_last_entry_counts_without_being_asked_for() {
    let text = std::fs::read_to_string(fixture("night-ferry.json")).unwrap();
    let mut case: Value = serde_json::from_str(&text).unwrap();
    let entries = case["entries"].as_array_mut().unwrap();
    entries.retain(|entry| entry["kind"] != "end_tidal");
    let gas = entries.iter().find(|entry| entry["kind"] == "gas").unwrap()["id"].clone();
    entries.push(serde_json::json!({
        "id": "fix", "at": "2026-03-02T21:25:00Z", "kind": "correction", "of": gas,
        "values": { "ph": 7.30, "pco2_mmhg": 51, "hco3_printed_mmol_l": 24.4 },
    }));
    let file = file_with(case.to_string().as_bytes());
    let answer = answer(file.path(), &["--minutes", "0"]);
    assert_eq!(answer["at"], "2026-03-02T21:25:00Z");
    assert!(answer["paco2_mmhg"]["p50"][0].as_f64().unwrap() < 55.0, "{}", answer["paco2_mmhg"]);
}
