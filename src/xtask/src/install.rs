//! What a fresh machine lacks: the compile target, rustup's components, a browser with its driver.

use crate::workspace::{on_path, run};
use anyhow::{Context, Result, bail};
use std::fs;
use std::path::Path;
use std::process::Command;

/// The target the app is compiled for.
pub const WASM: &str = "wasm32-unknown-unknown";

/// Adds the wasm target when it is missing. A toolchain file can't be relied on: rustup may have been told not to install.
pub fn wasm_target() -> Result<()> {
    let output = Command::new("rustc").args(["--print", "target-libdir", "--target", WASM]).output();
    let folder = output.context("can't run rustc: install Rust with rustup")?.stdout;
    if Path::new(String::from_utf8_lossy(&folder).trim()).is_dir() {
        return Ok(());
    }
    if !on_path("rustup") {
        bail!(
            "the target {WASM} is missing and there is no rustup to add it: install it as you installed Rust"
        );
    }
    run("adding the wasm target", Command::new("rustup").args(["target", "add", WASM]))
}

/// Adds the formatter and the linter when they are missing.
pub fn components() -> Result<()> {
    for (component, program) in [("rustfmt", "fmt"), ("clippy", "clippy")] {
        let present = crate::workspace::cargo().args([program, "--version"]).output();
        if present.is_ok_and(|output| output.status.success()) {
            continue;
        }
        run(&format!("adding {component}"), Command::new("rustup").args(["component", "add", component]))?;
    }
    Ok(())
}

/// Makes sure that Chromium and its driver are there: installs them on Debian as root, elsewhere says what to install.
pub fn chromium() -> Result<()> {
    let has_browser = ["chromium", "google-chrome", "chromium-browser"].into_iter().any(on_path);
    if has_browser && on_path("chromedriver") {
        return Ok(());
    }
    if !is_debian() || !is_root() {
        bail!(
            "the browser tests need `chromium` (or `google-chrome`) and a `chromedriver` of the same version on the path. \
             On Debian: sudo apt-get update && sudo apt-get install --no-install-recommends chromium chromium-driver"
        );
    }
    run("updating Debian's package lists", Command::new("apt-get").arg("update"))?;
    run(
        "installing Chromium and its driver",
        Command::new("apt-get")
            .args(["install", "--yes", "--no-install-recommends", "chromium", "chromium-driver"])
            .env("DEBIAN_FRONTEND", "noninteractive"),
    )
}

fn is_debian() -> bool {
    fs::read_to_string("/etc/os-release").is_ok_and(|text| text.lines().any(|line| line == "ID=debian"))
}

fn is_root() -> bool {
    Command::new("id").arg("-u").output().is_ok_and(|output| output.stdout.starts_with(b"0\n"))
}
