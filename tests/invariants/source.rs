//! What may not be written where.

use crate::root;
use crate::tokens::{behind, contains, of};
use std::fs;
use std::path::{Path, PathBuf};

/// Everything below the app and the headless program: no clock, no storage, no network, no browser, no printing.
const PURE: [&str; 7] = ["units", "case", "sources", "physiology", "bedside", "logbook", "handover"];

/// Where numbers are worked out: the same bits on every platform.
const NUMERIC: [&str; 5] = ["units", "sources", "case", "physiology", "bedside"];

/// Parts of the standard library that reach outside, or tell the time.
const OUTSIDE: [&str; 7] = ["env", "fs", "io", "net", "process", "thread", "time"];

/// Names of clocks, random sources, browsers and printers, wherever they come from.
const REACHES_OUT: [&str; 19] = [
    "web_sys",
    "js_sys",
    "wasm_bindgen",
    "wasm_bindgen_futures",
    "gloo_storage",
    "gloo_timers",
    "leptos",
    "SystemTime",
    "Instant",
    "UtcDateTime",
    "now_utc",
    "now_local",
    "rand",
    "fastrand",
    "getrandom",
    "println",
    "eprintln",
    "print",
    "eprint",
];

/// Functions whose last bit differs between platforms in the standard library; the crate `libm` has them all.
const INEXACT: [&str; 25] = [
    "exp", "exp2", "exp_m1", "ln", "ln_1p", "log", "log10", "log2", "powf", "powi", "mul_add", "sin", "cos",
    "tan", "sin_cos", "sinh", "cosh", "tanh", "asin", "acos", "atan", "atan2", "cbrt", "hypot", "asinh",
];

/// In the app, what belongs into `device`.
const BROWSER: [&str; 9] = [
    "js_sys",
    "gloo_storage",
    "wasm_bindgen",
    "wasm_bindgen_futures",
    "window",
    "document",
    "Date",
    "SystemTime",
    "Instant",
];

type Check = fn(&[String]) -> Vec<String>;

fn reaches_out(row: &[String]) -> Vec<String> {
    let mut found: Vec<String> = behind(row, "std")
        .into_iter()
        .filter(|name| OUTSIDE.contains(name))
        .map(|name| format!("std::{name}"))
        .collect();
    found.extend(row.iter().filter(|token| REACHES_OUT.contains(&token.as_str())).cloned());
    found
}

fn clamps(row: &[String]) -> Vec<String> {
    let method = contains(row, &[".", "clamp", "("]);
    let function = contains(row, &[":", ":", "clamp"]);
    if method || function { vec!["clamp".into()] } else { Vec::new() }
}

fn inexact(row: &[String]) -> Vec<String> {
    let mut found: Vec<String> = row
        .windows(3)
        .filter(|three| three[0] == "." && three[2] == "(" && INEXACT.contains(&three[1].as_str()))
        .map(|three| format!(".{}()", three[1]))
        .collect();
    for kind in ["f64", "f32"] {
        let named = behind(row, kind).into_iter().filter(|name| INEXACT.contains(name));
        found.extend(named.map(|name| format!("{kind}::{name}")));
    }
    if contains(row, &["clippy", ":", ":", "disallowed_methods"]) {
        found.push("an exception from the lint that says so".into());
    }
    found
}

fn browser(row: &[String]) -> Vec<String> {
    let mut found: Vec<String> =
        row.iter().filter(|token| BROWSER.contains(&token.as_str())).map(|token| token.to_owned()).collect();
    // The type of an event is no reach into the browser: it is what a handler is handed.
    let types = behind(row, "web_sys").into_iter().filter(|name| !name.ends_with("Event"));
    found.extend(types.map(|name| format!("web_sys::{name}")));
    found.extend(
        behind(row, "std").into_iter().filter(|name| ["fs", "net", "env"].contains(name)).map(str::to_owned),
    );
    found
}

/// Runs a check over every source file under a folder, but for those under `except`.
fn offences(folder: &Path, except: Option<&Path>, check: Check) -> Vec<String> {
    let mut found = Vec::new();
    let files = rust_files(folder);
    assert!(!files.is_empty(), "no source under {}", folder.display());
    for file in files {
        if except.is_some_and(|except| file.starts_with(except) || file == except.with_extension("rs")) {
            continue;
        }
        let text = fs::read_to_string(&file).expect("a source file can be read");
        let name = file.strip_prefix(root()).unwrap_or(&file).display().to_string();
        match of(&text) {
            Ok(row) => found.extend(check(&row).into_iter().map(|what| format!("{name}: {what}"))),
            Err(error) => found.push(format!("{name}: not understood: {error}")),
        }
    }
    found
}

pub(crate) fn rust_files(folder: &Path) -> Vec<PathBuf> {
    let mut files = Vec::new();
    let mut folders = vec![folder.to_path_buf()];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(&folder).expect("a source folder can be listed") {
            let path = entry.expect("an entry can be read").path();
            let for_tests = path.file_stem().is_some_and(|stem| stem == "tests");
            if path.is_dir() && !for_tests {
                folders.push(path);
            } else if path.extension().is_some_and(|end| end == "rs") && !for_tests {
                files.push(path);
            }
        }
    }
    files
}

fn over_crates(crates: &[&str], check: Check) -> Vec<String> {
    let source = |name: &&str| root().join("src").join(name).join("src");
    crates.iter().map(source).flat_map(|folder| offences(&folder, None, check)).collect()
}

#[test]
fn nothing_below_the_app_reaches_outside() {
    let found = over_crates(&PURE, reaches_out);
    assert!(found.is_empty(), "{found:#?}");
}

#[test]
fn only_the_apps_device_folder_knows_the_browser_and_the_clock() {
    let app = root().join("src/app/src");
    let found = offences(&app, Some(&app.join("device")), browser);
    assert!(found.is_empty(), "{found:#?}");
}

#[test]
fn only_the_clock_reads_the_time() {
    let device = root().join("src/app/src/device");
    let tells_time: Check = |row| {
        let names = ["Date", "Performance", "performance", "SystemTime", "Instant", "now_utc"];
        row.iter().filter(|token| names.contains(&token.as_str())).cloned().collect()
    };
    let found = offences(&device, Some(&device.join("clock")), tells_time);
    assert!(found.is_empty(), "{found:#?}");
}

#[test]
fn numbers_are_never_clamped() {
    let mut found = over_crates(&PURE, clamps);
    for part in ["rooms", "state"] {
        found.extend(offences(&root().join("src/app/src").join(part), None, clamps));
    }
    assert!(found.is_empty(), "{found:#?}");
}

#[test]
fn one_library_does_the_maths() {
    let found = over_crates(&NUMERIC, inexact);
    assert!(found.is_empty(), "{found:#?}");
}

#[test]
fn planted_offences_are_found() {
    let cases: [(Check, &str, usize); 14] = [
        (reaches_out, "use std::time::SystemTime;", 2),
        (reaches_out, "fn a() { let _ = std::fs::read(\"x\"); }", 1),
        (reaches_out, "use std::{collections::BTreeMap, net::TcpStream};", 1),
        (reaches_out, "fn a() { time::OffsetDateTime::now_utc(); }", 1),
        (reaches_out, "fn a() { println!(\"{}\", rand::random::<f64>()); }", 2),
        (reaches_out, "use std::fmt; fn time(env: &str) -> Option<&str> { Some(env) }", 0),
        (clamps, "fn a(x: f64) -> f64 { x.clamp(0.0, 1.0) }", 1),
        (clamps, "fn a(x: f64) -> f64 { f64::clamp(x, 0.0, 1.0) }", 1),
        (clamps, "/// never .clamp( a number\nfn clamp_free() {}", 0),
        (inexact, "fn a(x: f64) -> f64 { x.exp() + f64::ln(x) }", 2),
        (inexact, "fn a(x: f64) -> f64 { libm::exp(x) + x.sqrt() }", 0),
        (inexact, "#[allow(clippy::disallowed_methods)] fn a() {}", 1),
        (browser, "fn a() { web_sys::window(); }", 2),
        (browser, "fn a(event: web_sys::PointerEvent) { event.prevent_default(); }", 0),
    ];
    for (check, source, count) in cases {
        let row = of(source).expect("is Rust");
        assert_eq!(check(&row).len(), count, "{source}");
    }
}
