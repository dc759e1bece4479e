//! The project's own commands: what builds, serves, measures and tests it. `cargo xtask help` lists them.

mod build;
mod calibrate;
mod install;
mod policy;
mod serve;
mod sizes;
mod test;
mod workspace;

use anyhow::{Result, bail};
use pico_args::Arguments;
use std::process::ExitCode;

const HELP: &str = "\
cargo xtask COMMAND

  serve [--port N] [--no-build] [--dist DIR]   build the app and serve it on 127.0.0.1
  build [--dist DIR]                           build the app into dist/ for any static host
  test                                         everything: format, lints, tests, build, sizes, browser
  sizes                                        build, and weigh every file against the budgets
  calibrate [--patients N]                     coverage of the bands on simulated patients
  help                                         this text";

fn main() -> ExitCode {
    match run(Arguments::from_env()) {
        Ok(()) => ExitCode::SUCCESS,
        Err(error) => {
            eprintln!("xtask: {error:#}");
            ExitCode::FAILURE
        }
    }
}

fn run(mut arguments: Arguments) -> Result<()> {
    if arguments.contains(["-h", "--help"]) {
        println!("{HELP}");
        return Ok(());
    }
    match arguments.subcommand()?.as_deref() {
        Some("build") => build::command(arguments),
        Some("serve") => serve::command(arguments),
        Some("sizes") => sizes::command(arguments),
        Some("calibrate") => calibrate::command(arguments),
        Some("test") => test::command(arguments),
        None | Some("help") => {
            println!("{HELP}");
            Ok(())
        }
        Some(other) => bail!("there is no command `{other}`.\n\n{HELP}"),
    }
}
