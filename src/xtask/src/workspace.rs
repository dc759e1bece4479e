//! Where things are in the repository, and how other programs are called from it.

use anyhow::{Context, Result, bail};
use pico_args::Arguments;
use std::env;
use std::path::{Path, PathBuf};
use std::process::Command;

/// The repository's top folder.
pub fn root() -> PathBuf {
    let here = Path::new(env!("CARGO_MANIFEST_DIR"));
    here.ancestors().nth(2).unwrap_or(here).to_path_buf()
}

/// Cargo, to be run at the top of the repository: the one that runs us, or the one on the path.
pub fn cargo() -> Command {
    let mut command = Command::new(env::var_os("CARGO").unwrap_or_else(|| "cargo".into()));
    command.current_dir(root());
    command
}

/// Runs a program to its end; a failure names what was being done.
pub fn run(purpose: &str, command: &mut Command) -> Result<()> {
    eprintln!("\n── {purpose}");
    let status = command.status().with_context(|| format!("{purpose}: can't run {command:?}"))?;
    if !status.success() {
        bail!("{purpose}: failed ({status})");
    }
    Ok(())
}

/// The folder the site is built into: `--dist`, or `dist` at the top.
pub fn dist(arguments: &mut Arguments) -> Result<PathBuf> {
    let given: Option<PathBuf> = arguments.opt_value_from_str("--dist")?;
    Ok(given.unwrap_or_else(|| root().join("dist")))
}

/// Refuses what no command has asked for, so that a slip isn't silently ignored.
pub fn nothing_else(arguments: Arguments) -> Result<()> {
    let left = arguments.finish();
    if !left.is_empty() {
        bail!("not understood: {left:?}. `cargo xtask help` lists the commands.");
    }
    Ok(())
}

/// Whether a program of this name is on the path.
pub fn on_path(name: &str) -> bool {
    env::var_os("PATH").is_some_and(|path| env::split_paths(&path).any(|folder| folder.join(name).is_file()))
}
