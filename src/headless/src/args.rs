//! What the command line asks for.

use std::ffi::OsString;
use std::ops::RangeInclusive;
use std::path::PathBuf;
use std::str::FromStr;

use bedside::{HORIZON_MIN, Options};
use case::Moment;
use lexopt::prelude::*;

/// Printed for `--help`, on standard error: standard output carries answers only.
pub const HELP: &str = "\
The forecast for a case file, as JSON on standard output.

  headless forecast CASE.json [--minutes LIST] [--at TIME] [--members N] [--seed N]

  --minutes LIST   minutes after --at, as 0,10,30; -1440 to 240, with a point for fractions;
                   before --at it is the course so far (default 0,1,2,5,10,20,30,60,90,120)
  --at TIME        the moment counted from, as 2026-03-02T21:20:00Z; entries after it are left out
                   (default: the last entry)
  --members N      bodies drawn, 64 to 65536 (default 256, as in the app)
  --seed N         of the draws, 0 to 4294967295 (default 1, as in the app)

What may not be answered is null, with the reason under \"withheld\", and exit 0. A file or an argument that
can't be used is one line on standard error, and exit 2.
For trained clinicians. It estimates, you decide. Not a registered medical device.";

const AS_IN: &str = "Type headless --help for how.";

/// How far back the course so far is shown, min: a day.
const EARLIEST_MIN: f64 = -1440.0;
const MOST_MINUTES: usize = 2000;
const MEMBERS: RangeInclusive<usize> = 64..=65_536;
const USUAL_MINUTES: [f64; 10] = [0.0, 1.0, 2.0, 5.0, 10.0, 20.0, 30.0, 60.0, 90.0, 120.0];

/// What is asked for.
#[derive(Debug, PartialEq)]
pub enum Command {
    /// How to use it.
    Help,
    /// A forecast.
    Forecast(Asked),
}

/// A forecast asked for.
#[derive(Debug, PartialEq)]
pub struct Asked {
    /// The case file.
    pub path: PathBuf,
    /// Minutes after `at`.
    pub minutes: Vec<f64>,
    /// The moment counted from; the last entry when not given.
    pub at: Option<Moment>,
    /// Members and seed.
    pub options: Options,
}

/// Reads the command line.
///
/// # Errors
/// One line: what is wrong and what to type.
pub fn read(mut parser: lexopt::Parser) -> Result<Command, String> {
    let plain = |error: lexopt::Error| format!("{error}. {AS_IN}");
    let mut words: Vec<OsString> = Vec::new();
    let mut asked = Asked {
        path: PathBuf::new(),
        minutes: USUAL_MINUTES.to_vec(),
        at: None,
        options: Options::default(),
    };
    while let Some(arg) = parser.next().map_err(plain)? {
        match arg {
            Short('h') | Long("help") => return Ok(Command::Help),
            Long("minutes") => asked.minutes = minutes(&text(&mut parser, "--minutes")?)?,
            Long("at") => asked.at = Some(moment(&text(&mut parser, "--at")?)?),
            Long("members") => asked.options.members = members(&text(&mut parser, "--members")?)?,
            Long("seed") => {
                asked.options.seed = whole("--seed", &text(&mut parser, "--seed")?, "0 to 4294967295")?
            }
            Value(word) => words.push(word),
            other => return Err(plain(other.unexpected())),
        }
    }
    let mut words = words.into_iter();
    match words.next() {
        Some(command) if command == "forecast" => {}
        Some(command) => {
            let command = command.to_string_lossy();
            return Err(format!("{command:?} is no command; forecast is. {AS_IN}"));
        }
        None => return Err(format!("nothing asked for. {AS_IN}")),
    }
    asked.path = words.next().ok_or_else(|| format!("forecast needs a case file. {AS_IN}"))?.into();
    match words.next() {
        Some(more) => Err(format!("one case file at a time; {more:?} is a second. {AS_IN}")),
        None => Ok(Command::Forecast(asked)),
    }
}

fn text(parser: &mut lexopt::Parser, option: &str) -> Result<String, String> {
    let value = parser.value().map_err(|error| format!("{error}. {AS_IN}"))?;
    value.into_string().map_err(|value| format!("{option} {value:?} is no text. {AS_IN}"))
}

fn minutes(list: &str) -> Result<Vec<f64>, String> {
    let minutes: Vec<f64> = list.split(',').map(minute).collect::<Result<_, _>>()?;
    if minutes.len() > MOST_MINUTES {
        return Err(format!("--minutes has {} of them; at most {MOST_MINUTES}.", minutes.len()));
    }
    Ok(minutes)
}

fn minute(text: &str) -> Result<f64, String> {
    let minute = units::read_number(text).map_err(|why| format!("--minutes {text:?}: {why} {AS_IN}"))?;
    if (EARLIEST_MIN..=HORIZON_MIN).contains(&minute) {
        Ok(minute)
    } else {
        Err(format!(
            "--minutes {minute} is outside {EARLIEST_MIN} to {HORIZON_MIN}. Ask within a day back and four hours ahead."
        ))
    }
}

fn moment(text: &str) -> Result<Moment, String> {
    logbook::read_time(text)
        .ok_or_else(|| format!("--at {text:?} is not a time. Type it as 2026-03-02T21:20:00Z."))
}

fn members(text: &str) -> Result<usize, String> {
    let range = format!("{} to {}", MEMBERS.start(), MEMBERS.end());
    let members = whole("--members", text, &range)?;
    if MEMBERS.contains(&members) {
        Ok(members)
    } else {
        Err(format!("--members {members} is outside {range}."))
    }
}

fn whole<T: FromStr>(option: &str, text: &str, range: &str) -> Result<T, String> {
    text.parse().map_err(|_| format!("{option} {text:?} is not a whole number, {range}."))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read_words(words: &[&str]) -> Result<Command, String> {
        read(lexopt::Parser::from_args(words))
    }

    #[test]
    fn everything_asked_for_is_read() {
        let words =
            ["forecast", "--minutes", "-30,0,2.5", "a.json", "--at=2026-03-02T22:20:00+01:00", "--seed", "7"];
        let asked = Asked {
            path: "a.json".into(),
            minutes: vec![-30.0, 0.0, 2.5],
            at: logbook::read_time("2026-03-02T21:20:00Z"),
            options: Options { seed: 7, ..Options::default() },
        };
        assert_eq!(read_words(&words), Ok(Command::Forecast(asked)));
        assert_eq!(read_words(&["forecast", "-h"]), Ok(Command::Help));
    }

    #[test]
    fn what_is_wrong_is_one_line_with_what_to_do() {
        for (words, begins) in [
            (&[][..], "nothing asked for."),
            (&["predict", "a.json"], "\"predict\" is no command; forecast is."),
            (&["forecast"], "forecast needs a case file."),
            (&["forecast", "a.json", "b.json"], "one case file at a time; \"b.json\" is a second."),
            (&["forecast", "a.json", "--speed", "1"], "invalid option '--speed'."),
            (&["forecast", "a.json", "--at"], "missing argument for option '--at'."),
            (&["forecast", "a.json", "--at", "21:10"], "--at \"21:10\" is not a time."),
            (&["forecast", "a.json", "--minutes", "1,,2"], "--minutes \"\": Nothing typed."),
            (&["forecast", "a.json", "--minutes", "inf"], "--minutes \"inf\": inf is not a number."),
            (&["forecast", "a.json", "--minutes", "241"], "--minutes 241 is outside -1440 to 240."),
            (&["forecast", "a.json", "--members", "63"], "--members 63 is outside 64 to 65536."),
            (
                &["forecast", "a.json", "--members", "many"],
                "--members \"many\" is not a whole number, 64 to 65536.",
            ),
            (
                &["forecast", "a.json", "--seed", "-1"],
                "--seed \"-1\" is not a whole number, 0 to 4294967295.",
            ),
        ] {
            let why = read_words(words).unwrap_err();
            assert!(why.starts_with(begins) && !why.contains('\n'), "{words:?}: {why}");
        }
    }
}
