//! Slackwater without a screen: a case file in, the same answers as the app out, as JSON on standard output
//! and nothing else there. What can't be done is one line on standard error, and exit 2.

mod args;
mod forecast;
mod input;

use std::io::{ErrorKind, Write};
use std::process::ExitCode;

use args::Command;

const REFUSED: u8 = 2;

fn main() -> ExitCode {
    let answer = match args::read(lexopt::Parser::from_env()) {
        Ok(Command::Help) => {
            eprintln!("{}", args::HELP);
            return ExitCode::SUCCESS;
        }
        Ok(Command::Forecast(asked)) => forecast::answer(&asked),
        Err(why) => Err(why),
    };
    match answer.and_then(|json| print(&json)) {
        Ok(()) => ExitCode::SUCCESS,
        Err(why) => {
            eprintln!("headless: {why}");
            ExitCode::from(REFUSED)
        }
    }
}

/// Prints the answer. A reader that has seen enough and closed the pipe is no error.
fn print(json: &str) -> Result<(), String> {
    match writeln!(std::io::stdout().lock(), "{json}") {
        Err(error) if error.kind() != ErrorKind::BrokenPipe => {
            Err(format!("the answer can't be written: {error}."))
        }
        _ => Ok(()),
    }
}
