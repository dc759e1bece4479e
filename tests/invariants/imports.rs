//! One direction of imports, and no dependency that nobody argued for.

use crate::root;
use std::collections::BTreeSet;
use std::fs;
use toml::Table;

/// What a crate may depend on: our own crates, then other people's.
struct Row {
    name: &'static str,
    ours: &'static [&'static str],
    others: &'static [&'static str],
}

/// From the bottom up. Why each dependency is there stands in DEVELOPERS.md.
const HOUSE: [Row; 9] = [
    Row { name: "units", ours: &[], others: &["thiserror"] },
    Row { name: "case", ours: &["units"], others: &["thiserror"] },
    Row { name: "sources", ours: &["units"], others: &[] },
    Row { name: "physiology", ours: &["units", "sources"], others: &["libm", "sobol_burley", "thiserror"] },
    Row {
        name: "bedside",
        ours: &["units", "sources", "case", "physiology"],
        others: &["libm", "thiserror"],
    },
    Row { name: "logbook", ours: &["units", "case"], others: &["serde", "serde_json", "time", "thiserror"] },
    Row {
        name: "handover",
        ours: &["units", "sources", "case", "bedside", "logbook"],
        others: &["serde", "serde_json", "time", "thiserror"],
    },
    Row {
        name: "headless",
        ours: &["units", "sources", "case", "bedside", "logbook", "handover"],
        others: &["lexopt", "serde_json"],
    },
    Row {
        name: "app",
        ours: &["units", "sources", "case", "bedside", "logbook", "handover"],
        others: &[
            "leptos",
            "gloo-storage",
            "libm",
            "send_wrapper",
            "serde_json",
            "wasm-bindgen",
            "wasm-bindgen-futures",
            "web-sys",
        ],
    },
];

/// These see everything.
const FREE: [&str; 1] = ["xtask"];

/// What is wrong with a crate's manifest.
fn offences(folder: &str, manifest: &str) -> Vec<String> {
    if FREE.contains(&folder) {
        return Vec::new();
    }
    let Some(row) = HOUSE.iter().find(|row| row.name == folder) else {
        return vec![format!(
            "src/{folder} has no row in the table of the house (tests/invariants/imports.rs)"
        )];
    };
    let table: Table = match manifest.parse() {
        Ok(table) => table,
        Err(error) => return vec![format!("src/{folder}/Cargo.toml: {error}")],
    };
    let ours: BTreeSet<&str> = HOUSE.iter().map(|row| row.name).chain(FREE).collect();
    let mut found = Vec::new();
    for (kind, name) in dependencies(&table) {
        let allowed = if ours.contains(name.as_str()) {
            row.ours.contains(&name.as_str())
        } else {
            // What only tests use reaches nobody.
            kind == "dev-dependencies" || row.others.contains(&name.as_str())
        };
        if !allowed {
            found.push(format!("src/{folder} may not depend on {name} ({kind})"));
        }
    }
    found
}

/// Every dependency with its kind, those for one platform among them, under its real name.
fn dependencies(table: &Table) -> Vec<(&'static str, String)> {
    let mut tables = vec![table];
    let targets = table.get("target").and_then(|targets| targets.as_table());
    tables.extend(
        targets.into_iter().flat_map(|targets| targets.values()).filter_map(|target| target.as_table()),
    );
    let mut all = Vec::new();
    for table in tables {
        for kind in ["dependencies", "dev-dependencies", "build-dependencies"] {
            let Some(list) = table.get(kind).and_then(|list| list.as_table()) else { continue };
            for (name, value) in list {
                let renamed = value.get("package").and_then(|package| package.as_str());
                all.push((kind, renamed.unwrap_or(name).to_owned()));
            }
        }
    }
    all
}

#[test]
fn every_crate_depends_only_on_what_lies_below_it() {
    let mut found = Vec::new();
    let mut seen = BTreeSet::new();
    for entry in fs::read_dir(root().join("src")).expect("src can be listed") {
        let path = entry.expect("an entry can be read").path();
        let folder = path.file_name().expect("it has a name").to_string_lossy().into_owned();
        let manifest = fs::read_to_string(path.join("Cargo.toml")).expect("every folder in src is a crate");
        found.extend(offences(&folder, &manifest));
        seen.insert(folder);
    }
    assert!(found.is_empty(), "{found:#?}");
    for row in &HOUSE {
        assert!(seen.contains(row.name), "the table names {}, which is not there", row.name);
    }
}

#[test]
fn the_table_itself_points_one_way() {
    for (at, row) in HOUSE.iter().enumerate() {
        for below in row.ours {
            let place = HOUSE.iter().position(|other| other.name == *below);
            assert!(place.is_some_and(|place| place < at), "{} before {below}", row.name);
        }
    }
}

#[test]
fn planted_offences_are_found() {
    let cases = [
        ("case", "[dependencies]\nbedside.workspace = true", "bedside"),
        ("physiology", "[dependencies]\ncase = { path = \"../case\" }", "case"),
        ("bedside", "[dev-dependencies]\nlogbook.workspace = true", "logbook"),
        ("units", "[dependencies]\nrand = \"0.9\"", "rand"),
        ("logbook", "[target.'cfg(unix)'.dependencies]\nweb-sys = \"0.3\"", "web-sys"),
        ("units", "[dependencies]\nthiserror = { package = \"rand\", version = \"1\" }", "rand"),
        ("sources", "[build-dependencies]\ncc = \"1\"", "cc"),
        ("attic", "", "attic"),
    ];
    for (folder, manifest, named) in cases {
        let found = offences(folder, manifest);
        assert!(found.len() == 1 && found[0].contains(named), "{folder} with {manifest:?}: {found:?}");
    }
    assert_eq!(
        offences("case", "[dependencies]\nunits.workspace = true\n[dev-dependencies]\nrand = \"1\""),
        [""; 0]
    );
}
