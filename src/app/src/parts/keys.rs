//! The rules of the keypad, without a screen.

use crate::state::field::KeyStyle;
use crate::words::form as words;

/// A key that changes the text.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Key {
    /// 0 to 9.
    Digit(u8),
    /// Point or comma: the same key.
    Point,
    /// Takes the last one away.
    Delete,
}

/// Longest text that keys make; no bedside number is longer.
const LONGEST: usize = 8;
/// The same key within this many milliseconds is one press: gloves and vibration bounce.
const BOUNCE_MS: f64 = 120.0;
/// A finger may slide this many pixels between press and release.
const SLOP_PX: f64 = 12.0;

/// The text after a key.
///
/// # Errors
/// A sentence when the key is refused; the text stays.
pub fn press(text: &str, key: Key, style: KeyStyle) -> Result<String, &'static str> {
    match (key, style) {
        (Key::Delete, _) => Ok(deleted(text, style)),
        (Key::Point, KeyStyle::Clock) => Ok(text.to_owned()),
        // A first 6 or 7 has printed its point already.
        (Key::Point, KeyStyle::Ph) if text == "6." || text == "7." => Ok(text.to_owned()),
        (Key::Point, _) if text.contains(['.', ',']) => Err(words::ONE_POINT),
        (Key::Point, _) if text.is_empty() => Ok("0.".to_owned()),
        (Key::Point, _) => fitting(format!("{text}.")),
        (Key::Digit(digit), KeyStyle::Ph) if text.is_empty() && (digit == 6 || digit == 7) => {
            Ok(format!("{digit}."))
        }
        (Key::Digit(digit), KeyStyle::Clock) => clock(text, digit),
        (Key::Digit(digit), _) => fitting(format!("{text}{digit}")),
    }
}

fn deleted(text: &str, style: KeyStyle) -> String {
    let mut left = text.to_owned();
    left.pop();
    // A point or colon that printed itself goes with its digit.
    if style == KeyStyle::Ph && (left == "6" || left == "7") && text.ends_with('.') {
        left.clear();
    }
    if style == KeyStyle::Clock && text.ends_with(':') {
        left.pop();
    }
    left
}

fn fitting(text: String) -> Result<String, &'static str> {
    if text.chars().count() <= LONGEST { Ok(text) } else { Err(words::LONG_ENOUGH) }
}

/// The colon prints itself after the second digit.
fn clock(text: &str, digit: u8) -> Result<String, &'static str> {
    let digits = text.chars().filter(char::is_ascii_digit).count();
    match digits {
        0 => Ok(format!("{text}{digit}")),
        1 if !text.contains(':') => Ok(format!("{text}{digit}:")),
        1..=3 => Ok(format!("{text}{digit}")),
        _ => Err(words::LONG_ENOUGH),
    }
}

/// Tells a bounce from a press.
#[derive(Debug, Clone, Copy, Default)]
pub struct Bounce {
    last: Option<(Key, f64)>,
}

impl Bounce {
    /// Whether `key` at `ms` counts; a bounce does not.
    pub fn counts(&mut self, key: Key, ms: f64) -> bool {
        let bounced = self.last.is_some_and(|(last, at)| last == key && ms - at < BOUNCE_MS);
        if !bounced {
            self.last = Some((key, ms));
        }
        !bounced
    }
}

/// Whether a release at (`x`, `y`) still belongs to a press at (`x0`, `y0`).
pub fn within_slop(x0: f64, y0: f64, x: f64, y: f64) -> bool {
    let (dx, dy) = (x - x0, y - y0);
    dx * dx + dy * dy <= SLOP_PX * SLOP_PX
}

/// One step from `value`, and whether a held key stops there: at the old value and at the limits.
pub fn step(value: f64, by: f64, old: f64, least: f64, most: f64) -> (f64, bool) {
    let next = value + by;
    let crosses = (value - old) * (next - old) <= 0.0 && value != old;
    if crosses {
        (old, true)
    } else if next > most || next < least {
        (value, true)
    } else {
        (next, false)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn typed(keys: &str, style: KeyStyle) -> String {
        keys.chars().fold(String::new(), |text, c| {
            let key = match c {
                '.' | ',' => Key::Point,
                '<' => Key::Delete,
                digit => Key::Digit(u8::try_from(digit.to_digit(10).unwrap()).unwrap()),
            };
            press(&text, key, style).unwrap_or(text)
        })
    }

    #[test]
    fn three_digits_make_a_ph() {
        assert_eq!(typed("721", KeyStyle::Ph), "7.21");
        assert_eq!(typed("698", KeyStyle::Ph), "6.98");
        assert_eq!(typed("7.21", KeyStyle::Ph), "7.21");
        assert_eq!(typed("7,21", KeyStyle::Ph), "7.21");
        assert_eq!(typed("801", KeyStyle::Ph), "801");
    }

    #[test]
    fn deleting_the_first_ph_digit_takes_its_point() {
        assert_eq!(typed("7<", KeyStyle::Ph), "");
        assert_eq!(typed("7<698", KeyStyle::Ph), "6.98");
        assert_eq!(typed("72<<7", KeyStyle::Ph), "7.");
    }

    #[test]
    fn comma_is_point_and_a_second_one_is_refused_with_words() {
        assert_eq!(typed("5,3", KeyStyle::Plain), "5.3");
        assert_eq!(press("5.3", Key::Point, KeyStyle::Plain), Err(words::ONE_POINT));
        assert_eq!(press("7.2", Key::Point, KeyStyle::Ph), Err(words::ONE_POINT));
        assert_eq!(typed(".6", KeyStyle::Plain), "0.6");
        assert_eq!(typed("340", KeyStyle::Plain), "340");
    }

    #[test]
    fn a_clock_time_prints_its_colon() {
        assert_eq!(typed("2110", KeyStyle::Clock), "21:10");
        assert_eq!(typed("21105", KeyStyle::Clock), "21:10");
        assert_eq!(typed("21<", KeyStyle::Clock), "2");
        assert_eq!(typed("2.1", KeyStyle::Clock), "21:");
    }

    #[test]
    fn nothing_longer_than_fits() {
        assert_eq!(typed("123456789", KeyStyle::Plain), "12345678");
    }

    #[test]
    fn the_same_key_at_once_is_one_and_another_key_is_not() {
        let mut bounce = Bounce::default();
        assert!(bounce.counts(Key::Digit(7), 1000.0));
        assert!(!bounce.counts(Key::Digit(7), 1100.0));
        assert!(bounce.counts(Key::Digit(7), 1121.0));
        assert!(bounce.counts(Key::Digit(2), 1122.0));
    }

    #[test]
    fn a_finger_may_slide_twelve_pixels() {
        assert!(within_slop(0.0, 0.0, 0.0, 12.0));
        assert!(!within_slop(0.0, 0.0, 9.0, 9.0));
    }

    #[test]
    fn a_held_key_stops_at_the_old_value_and_at_the_limits() {
        assert_eq!(step(18.0, 1.0, 18.0, 2.0, 80.0), (19.0, false));
        assert_eq!(step(19.0, -1.0, 18.0, 2.0, 80.0), (18.0, true));
        assert_eq!(step(345.0, -10.0, 340.0, 50.0, 2000.0), (340.0, true));
        assert_eq!(step(80.0, 1.0, 18.0, 2.0, 80.0), (80.0, true));
        assert_eq!(step(2.0, -1.0, 18.0, 2.0, 80.0), (2.0, true));
        assert_eq!(step(18.0, -1.0, 18.0, 2.0, 80.0), (17.0, false));
    }
}
