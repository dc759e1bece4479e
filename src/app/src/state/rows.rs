//! Which rows a form asks, as data, and what is still wrong in them.

use case::Settings;
use units::AgeGroup;

use super::choice::{self, Breathes, CLOCK, Choice};
use super::field::Field;
use super::sheet::{Reading, Sheet};
use crate::words::form as words;

/// One row of a form.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Row {
    /// A heading.
    Heading(&'static str),
    /// A sentence.
    Note(&'static str),
    /// Chips; the flag says whether one is needed.
    Chips(Choice, bool),
    /// A number; the flag says whether it is needed.
    Number(Field, bool),
}

/// Where something is wrong.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Place {
    /// In a row of chips.
    Chips(Choice),
    /// In a field.
    Number(Field),
}

impl Place {
    /// The id that is focused to mend it.
    pub const fn id(self) -> &'static str {
        match self {
            Place::Chips(choice) => choice.spec().id,
            Place::Number(field) => field.spec().id,
        }
    }
}

impl Row {
    /// Its place, where it can be focused.
    pub const fn place(self) -> Option<Place> {
        match self {
            Row::Chips(choice, _) => Some(Place::Chips(choice)),
            Row::Number(field, _) => Some(Place::Number(field)),
            Row::Heading(_) | Row::Note(_) => None,
        }
    }
}

/// The fields and chips that a gas is typed in.
pub const GAS_FIELDS: [Field; 6] =
    [Field::DrawnClock, Field::Ph, Field::Pco2, Field::Po2, Field::Hco3, Field::Hb];
/// The chips that a gas is typed in.
pub const GAS_CHOICES: [Choice; 2] = [Choice::Site, Choice::Drawn];
/// The fields that settings are typed in.
pub const SETTINGS_FIELDS: [Field; 12] = [
    Field::ChangedClock,
    Field::TidalVolume,
    Field::ExpiredVolume,
    Field::Rate,
    Field::TotalRate,
    Field::Peep,
    Field::Plateau,
    Field::Fio2,
    Field::InspiratoryTime,
    Field::MinuteVolume,
    Field::InspiratoryPressure,
    Field::ApparatusDeadSpace,
];
/// The chips that settings are typed in.
pub const SETTINGS_CHOICES: [Choice; 4] =
    [Choice::Breathes, Choice::OwnControl, Choice::Leak, Choice::Changed];

/// The rows of a gas.
pub fn gas_rows(sheet: &Sheet) -> Vec<Row> {
    let mut rows = vec![Row::Chips(Choice::Site, true), Row::Chips(Choice::Drawn, true)];
    if sheet.pick(Choice::Drawn) == Some(CLOCK) {
        rows.push(Row::Number(Field::DrawnClock, true));
    }
    rows.extend([
        Row::Number(Field::Ph, true),
        Row::Number(Field::Pco2, true),
        Row::Heading(words::OPTIONAL),
        Row::Number(Field::Po2, false),
        Row::Number(Field::Hco3, false),
        Row::Number(Field::Hb, false),
    ]);
    rows
}

/// How the patient breathes by what is typed, else by the settings in force.
pub fn way(sheet: &Sheet, in_force: &Settings) -> Option<Breathes> {
    sheet.pick(Choice::Breathes).and_then(choice::breathes).or_else(|| Breathes::of(in_force))
}

/// The rows of settings. Where a breath is in force already, nothing of it is needed again: only what
/// has changed, and when.
pub fn settings_rows(sheet: &Sheet, in_force: &Settings) -> Vec<Row> {
    let update = in_force.airway.is_some();
    let mut rows = vec![];
    if update {
        rows.extend([Row::Note(words::ONLY_CHANGED), Row::Chips(Choice::Changed, true)]);
        if sheet.pick(Choice::Changed) == Some(CLOCK) {
            rows.push(Row::Number(Field::ChangedClock, true));
        }
    }
    rows.push(Row::Chips(Choice::Breathes, !update));
    let Some(way) = way(sheet, in_force) else { return rows };
    let typed_way = sheet.pick(Choice::Breathes).is_some();
    let needed = !update;
    match way {
        Breathes::VolumeSet | Breathes::PressureSet => {
            if typed_way {
                rows.push(Row::Note(words::TUBE_PASSIVE));
            }
            let volume = if way == Breathes::VolumeSet { Field::TidalVolume } else { Field::ExpiredVolume };
            rows.extend([Row::Number(volume, needed), Row::Number(Field::Rate, needed)]);
        }
        Breathes::OwnToo => {
            if typed_way {
                rows.extend([Row::Note(words::TUBE_OWN), Row::Chips(Choice::OwnControl, true)]);
            }
            rows.extend(own_rows(sheet, in_force, needed));
        }
        Breathes::Mask => rows.push(Row::Note(words::MASK)),
        Breathes::Unaided => rows.push(Row::Note(words::UNAIDED)),
    }
    rows.push(Row::Heading(words::OPTIONAL));
    rows.extend(optional_rows(way));
    rows
}

fn own_rows(sheet: &Sheet, in_force: &Settings, needed: bool) -> Vec<Row> {
    let control = sheet.pick(Choice::OwnControl).and_then(choice::own_control).or(in_force.control);
    match control {
        None => vec![],
        Some(case::Control::Volume) => {
            vec![Row::Number(Field::TidalVolume, needed), Row::Number(Field::TotalRate, needed)]
        }
        Some(_) => vec![Row::Number(Field::ExpiredVolume, needed), Row::Number(Field::TotalRate, needed)],
    }
}

fn optional_rows(way: Breathes) -> Vec<Row> {
    let number = |field| Row::Number(field, false);
    let mut rows = match way {
        Breathes::VolumeSet => vec![],
        Breathes::PressureSet => vec![number(Field::InspiratoryPressure)],
        Breathes::OwnToo => vec![number(Field::Rate)],
        Breathes::Mask => return vec![Row::Chips(Choice::Leak, false), number(Field::Fio2)],
        Breathes::Unaided => return vec![number(Field::Fio2)],
    };
    rows.extend([
        number(Field::Peep),
        number(Field::Plateau),
        number(Field::Fio2),
        number(Field::InspiratoryTime),
        number(Field::MinuteVolume),
        number(Field::ApparatusDeadSpace),
        Row::Chips(Choice::Leak, false),
    ]);
    rows
}

/// The rows of a person.
pub const PERSON_ROWS: [Row; 6] = [
    Row::Note(words::PERSON_WHY),
    Row::Chips(Choice::Sex, false),
    Row::Number(Field::Age, false),
    Row::Number(Field::Height, false),
    Row::Chips(Choice::HeightHow, false),
    Row::Number(Field::Weight, false),
];

/// What is wrong or missing, in the order of the rows.
pub fn faults(sheet: &Sheet, rows: &[Row], group: AgeGroup) -> Vec<(Place, String)> {
    rows.iter()
        .filter_map(|row| fault(sheet, *row, group).map(|words| (row.place(), words)))
        .filter_map(|(place, words)| Some((place?, words)))
        .collect()
}

/// What is wrong or missing in one row.
pub fn fault(sheet: &Sheet, row: Row, group: AgeGroup) -> Option<String> {
    match row {
        Row::Heading(_) | Row::Note(_) => None,
        Row::Chips(choice, needed) => {
            (needed && sheet.pick(choice).is_none()).then(|| words::CHOOSE_ONE.to_owned())
        }
        Row::Number(field, needed) => match sheet.read(field, group) {
            Reading::Wrong(words) => Some(words),
            Reading::Empty if needed => Some(words::needed(sheet.label(field, group))),
            Reading::Empty | Reading::Value(_) => None,
        },
    }
}

/// The place after `place`, where a chip leads on to or the Next key goes.
pub fn after(rows: &[Row], place: Place) -> Option<Place> {
    let here = rows.iter().position(|row| row.place() == Some(place))?;
    rows.iter().skip(here + 1).find_map(|row| row.place())
}

#[cfg(test)]
mod tests {
    use super::*;
    use case::{Moment, Now};

    fn now() -> Now {
        Now::at(Moment(1_772_486_400_000))
    }

    #[test]
    fn an_empty_gas_names_each_thing_that_is_needed_and_no_more() {
        let sheet = Sheet::default();
        let faults = faults(&sheet, &gas_rows(&sheet), AgeGroup::Adult);
        let places: Vec<Place> = faults.iter().map(|(place, _)| *place).collect();
        assert_eq!(
            places,
            [
                Place::Chips(Choice::Site),
                Place::Chips(Choice::Drawn),
                Place::Number(Field::Ph),
                Place::Number(Field::Pco2)
            ]
        );
    }

    #[test]
    fn chips_lead_from_site_to_time_to_ph() {
        let mut sheet = Sheet::default();
        let rows = gas_rows(&sheet);
        assert_eq!(after(&rows, Place::Chips(Choice::Site)), Some(Place::Chips(Choice::Drawn)));
        assert_eq!(after(&rows, Place::Chips(Choice::Drawn)), Some(Place::Number(Field::Ph)));
        sheet.choose(Choice::Drawn, Some(CLOCK), &now());
        let rows = gas_rows(&sheet);
        assert_eq!(after(&rows, Place::Chips(Choice::Drawn)), Some(Place::Number(Field::DrawnClock)));
        assert_eq!(after(&rows, Place::Number(Field::Hb)), None);
    }

    #[test]
    fn volume_set_needs_volume_and_rate_and_a_mask_needs_neither() {
        let needed = |pick: u8| {
            let mut sheet = Sheet::default();
            sheet.choose(Choice::Breathes, Some(pick), &now());
            let rows = settings_rows(&sheet, &Settings::default());
            faults(&sheet, &rows, AgeGroup::Adult).into_iter().map(|(place, _)| place).collect::<Vec<_>>()
        };
        assert_eq!(needed(0), [Place::Number(Field::TidalVolume), Place::Number(Field::Rate)]);
        assert_eq!(needed(1), [Place::Number(Field::ExpiredVolume), Place::Number(Field::Rate)]);
        assert_eq!(needed(2), [Place::Chips(Choice::OwnControl)]);
        assert_eq!(needed(3), []);
        assert_eq!(needed(4), []);
    }

    #[test]
    fn with_settings_in_force_only_the_time_is_needed() {
        let mut in_force = Settings { airway: Some(case::Airway::Tube), ..Settings::default() };
        in_force.control = Some(case::Control::Volume);
        let sheet = Sheet::default();
        let rows = settings_rows(&sheet, &in_force);
        let faults = faults(&sheet, &rows, AgeGroup::Adult);
        assert_eq!(faults.len(), 1);
        assert_eq!(faults[0].0, Place::Chips(Choice::Changed));
        assert!(rows.contains(&Row::Number(Field::TidalVolume, false)));
    }
}
