//! What is being typed: raw text of every field, chips chosen, and the parsed numbers beside them.

use case::{Moment, Now};
use units::{AgeGroup, Kpa, Mmhg, Quantity};

use super::choice::{CLOCK, Choice, MINUTES_AGO};
use super::field::{Field, KeyStyle};
use crate::words::form as words;

/// The rows of time chips, each with its clock field.
const TIMES: [(Choice, Field); 2] =
    [(Choice::Drawn, Field::DrawnClock), (Choice::Changed, Field::ChangedClock)];
/// A chip such as "now" is true for so many minutes after it was tapped.
const CHIP_HOLDS_MIN: f64 = 5.0;

/// Everything typed and not yet written.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Sheet {
    texts: [String; Field::ALL.len()],
    picks: [Option<u8>; Choice::ALL.len()],
    /// When the gas was drawn, fixed when its chip was tapped.
    pub drawn_at: Option<Moment>,
    /// When the settings were changed, fixed when its chip was tapped.
    pub changed_at: Option<Moment>,
    /// Whether PCO2 and PO2 are typed in kPa.
    pub kpa: [bool; 2],
    /// Questions answered "as typed", by their words.
    pub answered: Vec<String>,
}

/// What a field's text amounts to.
#[derive(Debug, Clone, PartialEq)]
pub enum Reading {
    /// Nothing typed.
    Empty,
    /// A number inside its limits, in the unit of its quantity (clock times: minutes after midnight).
    Value(f64),
    /// What is wrong, as a sentence.
    Wrong(String),
}

impl Reading {
    /// The number, where there is one.
    pub fn value(&self) -> Option<f64> {
        if let Reading::Value(value) = self { Some(*value) } else { None }
    }
}

impl Sheet {
    /// The raw text of `field`.
    pub fn text(&self, field: Field) -> &str {
        &self.texts[field.index()]
    }

    /// Sets the raw text of `field`.
    pub fn set_text(&mut self, field: Field, text: impl Into<String>) {
        self.texts[field.index()] = text.into();
    }

    /// Sets the raw text of `field` as it is typed: a clock time is fixed to its day at once, so that it does not
    /// become another day's while it waits.
    pub fn type_text(&mut self, field: Field, text: impl Into<String>, now: &Now) {
        self.set_text(field, text);
        for (choice, clock) in TIMES {
            if field == clock && self.pick(choice) == Some(CLOCK) {
                *self.fixed_at(choice) = self.clock_moment(clock, now);
            }
        }
    }

    fn clock_moment(&self, clock: Field, now: &Now) -> Option<Moment> {
        self.read(clock, AgeGroup::Adult).value().map(|minutes| last_time_of_day(minutes, now))
    }

    const fn fixed_at(&mut self, choice: Choice) -> &mut Option<Moment> {
        if matches!(choice, Choice::Changed) { &mut self.changed_at } else { &mut self.drawn_at }
    }

    /// A clock time is nothing without its day.
    pub fn empty_unfixed_clocks(&mut self) {
        for (choice, clock) in TIMES {
            if self.pick(choice) == Some(CLOCK) && self.fixed_at(choice).is_none() {
                self.set_text(clock, "");
            }
        }
    }

    /// Puts the clock time in place of a chip such as "now" that has become untrue; says whether it did.
    pub fn age_chips(&mut self, now: &Now) -> bool {
        let mut aged = false;
        for (choice, clock) in TIMES {
            let ago = self.pick(choice).and_then(|pick| MINUTES_AGO.get(usize::from(pick)));
            let Some((at, ago)) = (*self.fixed_at(choice)).zip(ago) else { continue };
            if now.wall.minutes_since(at) - ago >= CHIP_HOLDS_MIN {
                self.picks[choice.index()] = Some(CLOCK);
                self.set_text(clock, at.clock(now.utc_offset_min));
                aged = true;
            }
        }
        aged
    }

    /// Whether `field` is typed in kPa.
    pub const fn in_kpa(&self, field: Field) -> bool {
        match field {
            Field::Pco2 => self.kpa[0],
            Field::Po2 => self.kpa[1],
            _ => false,
        }
    }

    /// Sets the unit of a gas pressure. An empty one beside it follows: a printout has one unit.
    pub fn set_unit(&mut self, field: Field, kpa: bool) {
        for (place, other) in [Field::Pco2, Field::Po2].into_iter().enumerate() {
            if other == field || self.text(other).trim().is_empty() {
                self.kpa[place] = kpa;
            }
        }
    }

    /// The chip chosen, by its place.
    pub fn pick(&self, choice: Choice) -> Option<u8> {
        self.picks[choice.index()]
    }

    /// Chooses a chip; a time's moment is fixed with it, counted back from `now`.
    pub fn choose(&mut self, choice: Choice, pick: Option<u8>, now: &Now) {
        self.picks[choice.index()] = pick;
        let Some((_, clock)) = TIMES.into_iter().find(|(time, _)| *time == choice) else { return };
        let ago = pick.and_then(|pick| MINUTES_AGO.get(usize::from(pick)));
        *self.fixed_at(choice) = match ago {
            Some(minutes) => Some(now.wall.plus_minutes(-minutes)),
            None if pick == Some(CLOCK) => self.clock_moment(clock, now),
            None => None,
        };
    }

    /// Puts back a kept chip without touching times.
    pub fn restore_pick(&mut self, choice: Choice, pick: u8) {
        if usize::from(pick) < choice.spec().options.len() {
            self.picks[choice.index()] = Some(pick);
        }
    }

    /// What `field` amounts to.
    pub fn read(&self, field: Field, group: AgeGroup) -> Reading {
        let text = self.text(field).trim();
        if text.is_empty() {
            return Reading::Empty;
        }
        let spec = field.spec();
        if spec.keys == KeyStyle::Clock {
            return match clock_minutes(text) {
                Some(minutes) => Reading::Value(minutes),
                None => Reading::Wrong(words::no_clock(text)),
            };
        }
        let Some(quantity) = spec.quantity else { return Reading::Empty };
        let in_kpa = self.in_kpa(field);
        match units::read_number(text) {
            Err(error) => Reading::Wrong(error.to_string()),
            Ok(typed) => {
                let value = if in_kpa { Mmhg::from(Kpa(typed)).0 } else { typed };
                match units::check(self.named(field, quantity), group, value) {
                    Ok(value) => Reading::Value(value),
                    Err(refused) if in_kpa => Reading::Wrong(words::in_mmhg(typed, &refused)),
                    Err(refused) if field.takes_kpa() && typed > 0.0 => {
                        Reading::Wrong(words::perhaps_kpa(&refused))
                    }
                    Err(refused) => Reading::Wrong(refused.to_string()),
                }
            }
        }
    }

    /// PCO2 is called PaCO2 only when the sample is arterial.
    fn named(&self, field: Field, quantity: Quantity) -> Quantity {
        let other_site = self.pick(Choice::Site).is_some_and(|pick| pick != 0);
        if field == Field::Pco2 && other_site { Quantity::Pco2Mmhg } else { quantity }
    }

    /// The label a field carries on the page.
    pub fn label(&self, field: Field, group: AgeGroup) -> &'static str {
        let spec = field.spec();
        match (spec.label, spec.quantity) {
            (Some(label), _) => label,
            (None, Some(quantity)) => {
                let other_site = self.pick(Choice::Site).is_some_and(|pick| pick != 0);
                if field == Field::Po2 && other_site {
                    words::PO2
                } else {
                    units::limit(self.named(field, quantity), group).label
                }
            }
            (None, None) => "",
        }
    }

    /// The unit printed beside a field.
    pub fn unit(&self, field: Field, group: AgeGroup) -> &'static str {
        if self.in_kpa(field) {
            return words::KPA;
        }
        field.spec().quantity.map_or("", |quantity| units::limit(quantity, group).unit)
    }

    /// The moment that a row of time chips stands for: fixed when the chip was tapped or the clock time typed.
    pub const fn moment(&self, choice: Choice) -> Option<Moment> {
        match choice {
            Choice::Drawn => self.drawn_at,
            Choice::Changed => self.changed_at,
            _ => None,
        }
    }

    /// Empties the fields and chips given, as after they were written.
    pub fn clear(&mut self, fields: &[Field], choices: &[Choice]) {
        fields.iter().for_each(|field| self.texts[field.index()].clear());
        choices.iter().for_each(|choice| self.picks[choice.index()] = None);
        if choices.contains(&Choice::Drawn) {
            self.drawn_at = None;
        }
        if choices.contains(&Choice::Changed) {
            self.changed_at = None;
        }
        self.answered.clear();
    }

    /// Whether any of the fields has text.
    pub fn any_text(&self, fields: &[Field]) -> bool {
        fields.iter().any(|field| !self.text(*field).trim().is_empty())
    }
}

/// Minutes after midnight of "21:10", "21.10" or "2110"; `None` for anything else.
fn clock_minutes(text: &str) -> Option<f64> {
    let (hours, minutes) = match text.split_once([':', '.', ',']) {
        Some((hours, minutes)) if minutes.len() == 2 => (hours, minutes),
        Some(_) => return None,
        None if (3..=4).contains(&text.len()) && text.is_ascii() => text.split_at(text.len() - 2),
        None => return None,
    };
    let number = |part: &str| -> Option<u32> {
        let digits = (1..=2).contains(&part.len()) && part.bytes().all(|b| b.is_ascii_digit());
        if digits { part.parse().ok() } else { None }
    };
    let (hours, minutes) = (number(hours)?, number(minutes)?);
    if hours < 24 && minutes < 60 { Some(f64::from(hours * 60 + minutes)) } else { None }
}

/// The last moment, not after now, at which the wall clock stood at `minutes` after midnight.
fn last_time_of_day(minutes: f64, now: &Now) -> Moment {
    const DAY: f64 = 24.0 * 60.0;
    let local = Moment(now.wall.0).plus_minutes(f64::from(now.utc_offset_min));
    let since_midnight = local.0.rem_euclid(24 * 60 * 60_000) as f64 / 60_000.0;
    let back = since_midnight - minutes;
    now.wall.plus_minutes(-(if back < 0.0 { back + DAY } else { back }))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn typed(field: Field, text: &str) -> Reading {
        let mut sheet = Sheet::default();
        sheet.set_text(field, text);
        sheet.read(field, AgeGroup::Adult)
    }

    #[test]
    fn a_ph_of_71_is_refused_with_the_sentence() {
        let Reading::Wrong(words) = typed(Field::Ph, "71") else { panic!("71 passed") };
        assert_eq!(words, "pH 71 is outside 6.5 to 8. Type it with its point, as in 7.21.");
    }

    #[test]
    fn comma_and_point_are_one_and_two_separators_are_refused() {
        assert_eq!(typed(Field::Ph, "7,21"), Reading::Value(7.21));
        assert!(matches!(typed(Field::Ph, "7.2.1"), Reading::Wrong(_)));
        assert_eq!(typed(Field::Ph, "  "), Reading::Empty);
    }

    #[test]
    fn kpa_is_read_as_kpa_and_a_value_too_low_for_mmhg_says_that_it_may_be() {
        let mut sheet = Sheet::default();
        sheet.set_unit(Field::Pco2, true);
        sheet.set_text(Field::Pco2, "5.3");
        let value = sheet.read(Field::Pco2, AgeGroup::Adult).value().unwrap();
        assert!((value - 39.75).abs() < 0.01, "{value}");
        sheet.set_text(Field::Pco2, "71");
        let Reading::Wrong(words) = sheet.read(Field::Pco2, AgeGroup::Adult) else { panic!() };
        assert!(words.starts_with("71 kPa is 533 mmHg."), "{words}");
        let Reading::Wrong(words) = typed(Field::Pco2, "4.8") else { panic!() };
        assert!(words.contains("kPa"), "{words}");
    }

    #[test]
    fn vt_34_is_refused_for_an_adult_and_taken_for_a_child() {
        let mut sheet = Sheet::default();
        sheet.set_text(Field::TidalVolume, "34");
        assert!(matches!(sheet.read(Field::TidalVolume, AgeGroup::Adult), Reading::Wrong(_)));
        assert_eq!(sheet.read(Field::TidalVolume, AgeGroup::Child), Reading::Value(34.0));
    }

    #[test]
    fn clock_times_are_read_in_four_ways_and_nothing_else() {
        for text in ["21:10", "21.10", "21,10", "2110"] {
            assert_eq!(typed(Field::DrawnClock, text), Reading::Value(1270.0), "{text}");
        }
        assert_eq!(typed(Field::DrawnClock, "910"), Reading::Value(550.0));
        for text in ["24:00", "21:60", "21:1", "21", "21:10:00", "21:+5", "٢١١٠"] {
            assert!(matches!(typed(Field::DrawnClock, text), Reading::Wrong(_)), "{text}");
        }
    }

    #[test]
    fn a_clock_time_is_the_last_such_time() {
        // 2026-03-02T21:20Z, where the local clock says 22:20.
        let now = Now { utc_offset_min: 60, ..Now::at(Moment(1_772_486_400_000)) };
        let mut sheet = Sheet::default();
        sheet.choose(Choice::Drawn, Some(CLOCK), &now);
        assert_eq!(sheet.moment(Choice::Drawn), None);
        sheet.type_text(Field::DrawnClock, "22:10", &now);
        assert_eq!(sheet.moment(Choice::Drawn), Some(now.wall.plus_minutes(-10.0)));
        sheet.type_text(Field::DrawnClock, "23:00", &now);
        assert_eq!(sheet.moment(Choice::Drawn), Some(now.wall.plus_minutes(-1400.0)));
        sheet.type_text(Field::DrawnClock, "23:0", &now);
        assert_eq!(sheet.moment(Choice::Drawn), None);
    }

    #[test]
    fn a_time_chip_fixes_its_moment_when_it_is_tapped() {
        let now = Now::at(Moment(1_772_486_400_000));
        let mut sheet = Sheet::default();
        sheet.choose(Choice::Drawn, Some(2), &now);
        assert_eq!(sheet.moment(Choice::Drawn), Some(now.wall.plus_minutes(-10.0)));
    }

    #[test]
    fn a_chip_gives_way_to_its_clock_time_after_five_minutes() {
        let now = Now::at(Moment(1_772_486_400_000)); // 21:20Z
        let mut sheet = Sheet::default();
        sheet.choose(Choice::Drawn, Some(2), &now);
        assert!(!sheet.age_chips(&Now::at(now.wall.plus_minutes(4.9))));
        assert!(sheet.age_chips(&Now::at(now.wall.plus_minutes(26.0 * 60.0))));
        assert_eq!((sheet.pick(Choice::Drawn), sheet.text(Field::DrawnClock)), (Some(CLOCK), "21:10"));
        assert_eq!(sheet.moment(Choice::Drawn), Some(now.wall.plus_minutes(-10.0)), "the day stays");
    }
}
