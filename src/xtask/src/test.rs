//! `cargo xtask test`: everything that has to hold before a change is kept, in the order that fails fastest.

use crate::build;
use crate::calibrate;
use crate::install;
use crate::sizes;
use crate::workspace::{cargo, nothing_else, on_path, root, run};
use anyhow::{Context, Result};
use pico_args::Arguments;
use std::env;
use std::process::Command;
use std::time::Instant;

/// The browser tests are behind a feature, so that a plain `cargo test` needs neither a browser nor a built site.
const BROWSER: &str = "checks/browser";

/// Runs it all; the first failure ends it.
pub fn command(arguments: Arguments) -> Result<()> {
    nothing_else(arguments)?;
    let began = Instant::now();
    // Asked now: the tests may build this very program again and put another file in its place.
    let xtask = env::current_exe().context("can't tell where xtask itself is")?;
    install::components()?;
    install::wasm_target()?;
    install::chromium()?;

    run("format", cargo().args(["fmt", "--all", "--check"]))?;
    run(
        "lints",
        lint().args(["--workspace", "--all-targets", "--features", BROWSER, "--", "--deny", "warnings"]),
    )?;
    run(
        "lints of the app as the browser gets it",
        lint()
            .args(["--package", "app", "--target", install::WASM, "--", "--deny", "warnings"])
            .env("CARGO_ENCODED_RUSTFLAGS", build::rustflags()),
    )?;
    tests()?;
    let site = build::into(&root().join("dist"))?;
    run("browser tests", browser_tests().env("SLACKWATER_XTASK", xtask))?;
    calibrate::run(calibrate::PATIENTS)?;
    sizes::print(&site);
    // Said, and not yet a failure: the app is over its aim for the first answer (DEVELOPERS.md, "Size").
    if let Err(over) = sizes::within_budget(&site) {
        eprintln!("over the budget: {over}");
    }
    eprintln!("\neverything holds ({:.0} s)", began.elapsed().as_secs_f64());
    Ok(())
}

/// The browser's own timing now and then loses an event (a worker's update on a busy machine): with a runner that
/// can, a test that failed is tried twice more, and one that then passed is named flaky.
fn browser_tests() -> Command {
    const WHICH: [&str; 7] =
        ["--locked", "--package", "checks", "--features", "browser", "--test", "browser"];
    let mut command = cargo();
    if on_path("cargo-nextest") {
        command.args(["nextest", "run"]).args(WHICH);
        command.args(["--retries=2", "--test-threads=2", "--no-fail-fast", "--success-output=immediate"]);
    } else {
        command.arg("test").args(WHICH).args(["--", "--test-threads=2", "--nocapture"]);
    }
    command
}

fn lint() -> Command {
    let mut command = cargo();
    command.args(["clippy", "--locked"]);
    command
}

/// Unit, property, reference and invariant tests, then the examples in the documentation.
fn tests() -> Result<()> {
    if on_path("cargo-nextest") {
        run(
            "tests",
            cargo().args([
                "nextest",
                "run",
                "--locked",
                "--workspace",
                "--no-fail-fast",
                "--status-level=slow",
            ]),
        )?;
        run("examples in the documentation", cargo().args(["test", "--locked", "--workspace", "--doc"]))
    } else {
        run("tests", cargo().args(["test", "--locked", "--workspace"]))
    }
}
