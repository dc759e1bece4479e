//! Compiles the app to wasm and makes the JavaScript that goes with it.

use crate::install::{self, WASM};
use crate::workspace::{cargo, root};
use anyhow::{Context, Result, bail, ensure};
use serde_json::Value;
use std::env;
use std::ffi::OsString;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Stdio;
use wasm_bindgen_cli_support::Bindgen;

/// The app as a browser loads it.
pub struct Program {
    /// The JavaScript between page and wasm: an ES module whose default export starts the program.
    pub glue: String,
    /// The program.
    pub wasm: Vec<u8>,
}

/// Compiles the app for the web, adding the target when it is missing.
pub fn compile() -> Result<Program> {
    install::wasm_target()?;
    let artefact = cargo_build()?;
    let program = bind(&artefact)?;
    refuse_home_paths(&program.wasm)?;
    Ok(program)
}

/// The flags of the wasm build, also used to lint it: boxed components (a third smaller than one type a view), and no
/// path of the building machine in the panics, so that two machines build the same bytes.
pub fn rustflags() -> OsString {
    let mut flags: Vec<OsString> = vec!["--cfg=erase_components".into()];
    let mut remap = |from: &Path, to: &str| {
        let mut flag = OsString::from("--remap-path-prefix=");
        flag.push(from);
        flag.push("=");
        flag.push(to);
        flags.push(flag);
    };
    // Of several that fit, the compiler takes the last.
    remap(&root(), "slackwater");
    if let Some(home) = cargo_home() {
        remap(&home, "cargo");
        for registry in fs::read_dir(home.join("registry/src")).into_iter().flatten().flatten() {
            remap(&registry.path(), "crates");
        }
    }
    flags.join(&OsString::from("\u{1f}"))
}

fn cargo_home() -> Option<PathBuf> {
    let set = env::var_os("CARGO_HOME").map(PathBuf::from);
    set.or_else(|| env::home_dir().map(|home| home.join(".cargo")))
}

/// Builds and returns where cargo put the module; cargo itself says so, whatever its target folder is.
fn cargo_build() -> Result<PathBuf> {
    eprintln!("── compiling the app (a first time takes a few minutes)");
    let output = cargo()
        .args(["build", "--locked", "--package", "app", "--profile", "web", "--target", WASM])
        .arg("--message-format=json-render-diagnostics")
        .env("CARGO_ENCODED_RUSTFLAGS", rustflags())
        .stderr(Stdio::inherit())
        .output()
        .context("can't run cargo")?;
    ensure!(output.status.success(), "the app did not compile ({})", output.status);
    let messages = String::from_utf8(output.stdout).context("cargo's messages are not UTF-8")?;
    messages.lines().find_map(artefact_path).context("cargo named no module for the app")
}

fn artefact_path(message: &str) -> Option<PathBuf> {
    let message: Value = serde_json::from_str(message).ok()?;
    let is_app = message["reason"] == "compiler-artifact"
        && message["target"]["name"] == "app"
        && message["target"]["kind"][0] == "bin";
    let files = message["filenames"].as_array().filter(|_| is_app)?;
    files.iter().filter_map(Value::as_str).find(|name| name.ends_with(".wasm")).map(PathBuf::from)
}

fn bind(artefact: &Path) -> Result<Program> {
    let mut output = Bindgen::new()
        .input_path(artefact)
        .out_name("app")
        .web(true)?
        .typescript(false)
        .omit_default_module_path(true)
        .remove_name_section(true)
        .remove_producers_section(true)
        .generate_output()?;
    // A snippet would be one more file that the page imports under a name nobody hashed.
    for (folder, snippets) in output.snippets() {
        ensure!(
            snippets.is_empty(),
            "the crate {folder} brings inline JavaScript, which this build can't name"
        );
    }
    let mut wasm = output.wasm_mut().emit_wasm();
    without_machine_marks(&mut wasm);
    Ok(Program { glue: output.js().to_owned(), wasm })
}

/// Leptos marks its split points by a digest of where its own source lies on the building machine, the one thing in the
/// module that differs between two machines. The marks are numbered instead, which keeps them apart and of one length.
fn without_machine_marks(wasm: &mut [u8]) {
    const MARK: &[u8] = b"_WASM_SPLIT_MARKER_";
    const DIGEST: usize = 16;
    let mut seen: Vec<Vec<u8>> = Vec::new();
    let last = wasm.len().saturating_sub(MARK.len() + DIGEST);
    for at in 0..=last {
        let digest = at + MARK.len()..at + MARK.len() + DIGEST;
        if !wasm[at..].starts_with(MARK) || !wasm[digest.clone()].iter().all(u8::is_ascii_hexdigit) {
            continue;
        }
        let found = wasm[digest.clone()].to_vec();
        let number = seen.iter().position(|other| *other == found).unwrap_or_else(|| {
            seen.push(found);
            seen.len() - 1
        });
        wasm[digest].copy_from_slice(format!("{number:0DIGEST$}").as_bytes());
    }
}

fn refuse_home_paths(wasm: &[u8]) -> Result<()> {
    for folder in [Some(root()), cargo_home()].into_iter().flatten() {
        let path = folder.to_string_lossy().into_owned();
        if wasm.windows(path.len()).any(|window| window == path.as_bytes()) {
            bail!("the built module names {path}: a path of this machine slipped past the remapping");
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_module_is_found_among_cargos_messages() {
        let library = r#"{"reason":"compiler-artifact","target":{"name":"app","kind":["lib"]},"filenames":["/t/libapp.rlib"]}"#;
        let binary = r#"{"reason":"compiler-artifact","target":{"name":"app","kind":["bin"]},"filenames":["/t/app.js","/t/app.wasm"]}"#;
        assert_eq!(artefact_path(library), None);
        assert_eq!(artefact_path(binary), Some(PathBuf::from("/t/app.wasm")));
        assert_eq!(artefact_path("not a message"), None);
    }

    #[test]
    fn marks_of_the_machine_are_numbered() {
        let mut wasm = *b"a_WASM_SPLIT_MARKER_648d98631ae179d3b_WASM_SPLIT_MARKER_732e786d2a082da8c_WASM_SPLIT_MARKER_648d98631ae179d3";
        without_machine_marks(&mut wasm);
        assert_eq!(
            std::str::from_utf8(&wasm),
            Ok(
                "a_WASM_SPLIT_MARKER_0000000000000000b_WASM_SPLIT_MARKER_0000000000000001c_WASM_SPLIT_MARKER_0000000000000000"
            )
        );
        without_machine_marks(&mut [0; 3]);
    }

    #[test]
    fn a_path_of_this_machine_is_refused() {
        let mut wasm = b"\0asm panicked at ".to_vec();
        assert!(refuse_home_paths(&wasm).is_ok());
        wasm.extend(root().to_string_lossy().bytes());
        assert!(refuse_home_paths(&wasm).is_err());
    }
}
