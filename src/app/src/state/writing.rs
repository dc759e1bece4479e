//! From what was typed to entries: pure, so that a test can type.

use case::{
    Airway, Control, Correction, Effort, EntryId, EntryKind, Gas, Leak, Moment, Person, Settings, Site,
};
use units::{AgeGroup, Quantity};

use super::choice::{self, Breathes, Choice};
use super::field::Field;
use super::room::Room;
use super::rows;
use super::sheet::Sheet;

/// The gas as typed; `None` while something needed is missing or wrong.
pub fn gas(sheet: &Sheet, group: AgeGroup, settings_held_min: Option<f64>) -> Option<Gas> {
    let value = |field| sheet.read(field, group).value();
    Some(Gas {
        site: choice::site(sheet.pick(Choice::Site)?)?,
        ph: value(Field::Ph)?,
        pco2_mmhg: value(Field::Pco2)?,
        po2_mmhg: value(Field::Po2),
        hco3_printed_mmol_l: value(Field::Hco3),
        hb_g_dl: value(Field::Hb),
        temperature_c: None,
        reported_at_c: None,
        analysed_at: None,
        settings_held_min,
    })
}

/// Minutes that the settings of `since` had been held when a gas was drawn, for the gas's entry. Not known for a gas
/// from before them, nor beyond what an entry can say: the record's own times tell it then. Whole minutes, the last
/// one finished.
pub fn held_min(since: Moment, drawn: Moment) -> Option<f64> {
    units::check(Quantity::SettingsHeldMin, AgeGroup::Adult, drawn.minutes_since(since).floor()).ok()
}

/// The settings as typed: only what differs from those in force.
pub fn settings(sheet: &Sheet, in_force: &Settings, group: AgeGroup) -> Settings {
    let value = |field| sheet.read(field, group).value();
    let mut typed =
        sheet.pick(Choice::Breathes).and_then(choice::breathes).map_or_else(Settings::default, |way| {
            way_settings(way, sheet.pick(Choice::OwnControl).and_then(choice::own_control))
        });
    let asked = rows::settings_rows(sheet, in_force);
    let shown = |field: Field| {
        asked
            .iter()
            .any(|row| row.place() == Some(rows::Place::Number(field)))
            .then(|| value(field))
            .flatten()
    };
    typed.tidal_volume_ml = shown(Field::TidalVolume);
    typed.tidal_volume_expired_ml = shown(Field::ExpiredVolume);
    typed.rate_per_min = shown(Field::Rate);
    typed.rate_total_per_min = shown(Field::TotalRate);
    typed.peep_cmh2o = shown(Field::Peep);
    typed.plateau_cmh2o = shown(Field::Plateau);
    typed.fio2 = shown(Field::Fio2);
    typed.inspiratory_time_s = shown(Field::InspiratoryTime);
    typed.minute_volume_l_min = shown(Field::MinuteVolume);
    typed.inspiratory_pressure_cmh2o = shown(Field::InspiratoryPressure);
    typed.apparatus_dead_space_ml = shown(Field::ApparatusDeadSpace);
    if let Some(leak) = sheet.pick(Choice::Leak).and_then(choice::leak) {
        typed.leak = Some(leak);
    }
    only_new(in_force, typed)
}

/// What a chip of "how he breathes" says.
fn way_settings(way: Breathes, own_control: Option<Control>) -> Settings {
    let tube = |control, effort| Settings {
        airway: Some(Airway::Tube),
        control,
        effort: Some(effort),
        leak: Some(Leak::None),
        ..Settings::default()
    };
    match way {
        Breathes::VolumeSet => tube(Some(Control::Volume), Effort::None),
        Breathes::PressureSet => tube(Some(Control::Pressure), Effort::None),
        Breathes::OwnToo => tube(own_control, Effort::Present),
        Breathes::Mask => Settings {
            airway: Some(Airway::Mask),
            effort: Some(Effort::Present),
            leak: Some(Leak::Unknown),
            ..Settings::default()
        },
        Breathes::Unaided => Settings {
            airway: Some(Airway::None),
            control: Some(Control::None),
            effort: Some(Effort::Present),
            ..Settings::default()
        },
    }
}

/// `typed` without the set values that are in force already. Measured values (expired and minute volume,
/// plateau, total rate) stay: measured anew they confirm.
fn only_new(in_force: &Settings, typed: Settings) -> Settings {
    fn new<T: PartialEq>(old: Option<T>, typed: Option<T>) -> Option<T> {
        if typed == old { None } else { typed }
    }
    Settings {
        airway: new(in_force.airway, typed.airway),
        control: new(in_force.control, typed.control),
        effort: new(in_force.effort, typed.effort),
        leak: new(in_force.leak, typed.leak),
        rate_per_min: new(in_force.rate_per_min, typed.rate_per_min),
        tidal_volume_ml: new(in_force.tidal_volume_ml, typed.tidal_volume_ml),
        inspiratory_pressure_cmh2o: new(
            in_force.inspiratory_pressure_cmh2o,
            typed.inspiratory_pressure_cmh2o,
        ),
        peep_cmh2o: new(in_force.peep_cmh2o, typed.peep_cmh2o),
        inspiratory_time_s: new(in_force.inspiratory_time_s, typed.inspiratory_time_s),
        fio2: new(in_force.fio2, typed.fio2),
        ..typed
    }
}

/// The change tried in Change: only what differs from the settings in force.
pub fn change(sheet: &Sheet, in_force: &Settings, group: AgeGroup) -> Settings {
    let new = |field, old: Option<f64>| {
        old.and_then(|old| sheet.read(field, group).value().filter(|value| *value != old))
    };
    Settings {
        rate_per_min: new(Field::NewRate, in_force.rate_per_min),
        tidal_volume_ml: new(Field::NewVolume, in_force.tidal_volume_ml),
        ..Settings::default()
    }
}

/// Puts the settings of an address ("rate=22&vt=340") into the steppers; what it does not know is left out.
pub fn try_settings(sheet: &mut Sheet, tried: &str) {
    sheet.set_text(Field::NewRate, "");
    sheet.set_text(Field::NewVolume, "");
    for (name, value) in tried.split('&').filter_map(|part| part.split_once('=')) {
        match name {
            "rate" => sheet.set_text(Field::NewRate, value),
            "vt" => sheet.set_text(Field::NewVolume, value),
            _ => {}
        }
    }
}

/// The address at which `change` is tried.
pub fn address_of(change: &Settings) -> String {
    let part = |name: &str, value: Option<f64>| value.map(|value| format!("{name}={value}"));
    let parts: Vec<String> = [part("rate", change.rate_per_min), part("vt", change.tidal_volume_ml)]
        .into_iter()
        .flatten()
        .collect();
    format!("{}?{}", Room::Change.hash(), parts.join("&"))
}

/// The person as typed.
pub fn person(sheet: &Sheet) -> Person {
    let value = |field| sheet.read(field, AgeGroup::Adult).value();
    Person {
        sex: sheet.pick(Choice::Sex).and_then(choice::sex),
        age_years: value(Field::Age),
        height_cm: value(Field::Height),
        height_how: sheet.pick(Choice::HeightHow).and_then(choice::height_how),
        weight_kg: value(Field::Weight),
    }
}

/// Puts what is known of the case into the sheet's fields, unless somebody has begun to change them.
pub fn offer_person(sheet: &mut Sheet, case: &case::Case) {
    let begun = sheet.any_text(&[Field::Label, Field::Age, Field::Height, Field::Weight])
        || [Choice::Sex, Choice::HeightHow].into_iter().any(|choice| sheet.pick(choice).is_some());
    if begun {
        return;
    }
    let person = &case.person;
    sheet.set_text(Field::Label, case.label.as_str());
    let numbers = [
        (Field::Age, person.age_years),
        (Field::Height, person.height_cm),
        (Field::Weight, person.weight_kg),
    ];
    for (field, value) in numbers {
        sheet.set_text(field, value.map(|value| format!("{value}")).unwrap_or_default());
    }
    for pick in 0..3 {
        if person.sex.is_some() && choice::sex(pick) == person.sex {
            sheet.restore_pick(Choice::Sex, pick);
        }
        if person.height_how.is_some() && choice::height_how(pick) == person.height_how {
            sheet.restore_pick(Choice::HeightHow, pick);
        }
    }
}

/// The value in force that a field would change.
pub const fn value_in_force(settings: &Settings, field: Field) -> Option<f64> {
    match field {
        Field::TidalVolume => settings.tidal_volume_ml,
        Field::ExpiredVolume => settings.tidal_volume_expired_ml,
        Field::Rate => settings.rate_per_min,
        Field::TotalRate => settings.rate_total_per_min,
        Field::Peep => settings.peep_cmh2o,
        Field::Plateau => settings.plateau_cmh2o,
        Field::Fio2 => settings.fio2,
        Field::InspiratoryTime => settings.inspiratory_time_s,
        Field::MinuteVolume => settings.minute_volume_l_min,
        Field::InspiratoryPressure => settings.inspiratory_pressure_cmh2o,
        Field::ApparatusDeadSpace => settings.apparatus_dead_space_ml,
        _ => None,
    }
}

/// How long the settings had been held before a gas.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Held {
    /// Half an hour at least.
    HalfHour,
    /// Changed just before.
    JustChanged,
    /// Not known.
    NotKnown,
}

impl Held {
    /// In the order of the chips.
    pub const ALL: [Held; 3] = [Held::HalfHour, Held::JustChanged, Held::NotKnown];

    /// Minutes for the gas's entry.
    pub const fn minutes(self) -> Option<f64> {
        match self {
            Held::HalfHour => Some(30.0),
            Held::JustChanged => Some(0.0),
            Held::NotKnown => None,
        }
    }
}

/// The corrections that record how long the settings had been held before the first gas: the gas says it,
/// and settings that were written for the gas's own minute move back by as much.
pub fn held_corrections(case: &case::Case, held: Held) -> Vec<EntryKind> {
    let Some((gas_id, drawn, gas)) = case.gases().into_iter().next() else { return vec![] };
    let kind = EntryKind::Gas(Gas { settings_held_min: held.minutes(), ..gas });
    let mut corrections =
        vec![EntryKind::Correction(Correction { of: gas_id, at: None, kind: Box::new(kind) })];
    let moved = drawn.plus_minutes(-held.minutes().unwrap_or(0.0));
    if let Some(entry) = first_settings(case, drawn).filter(|entry| entry.at != moved) {
        let correction = Correction { of: entry.id, at: Some(moved), kind: Box::new(entry.kind) };
        corrections.push(EntryKind::Correction(correction));
    }
    corrections
}

/// The only settings up to the gas's minute; `None` when there are more, whose times were typed.
fn first_settings(case: &case::Case, drawn: Moment) -> Option<case::Entry> {
    let mut up_to: Vec<case::Entry> = case
        .resolved()
        .into_iter()
        .filter(|entry| entry.at <= drawn && matches!(entry.kind, EntryKind::Settings(_)))
        .collect();
    if up_to.len() == 1 { up_to.pop() } else { None }
}

/// Whether it is still to be asked how long the settings were held before the first gas.
pub fn held_is_open(case: &case::Case) -> bool {
    let Some((id, _, gas)) = case.gases().into_iter().next() else { return false };
    gas.settings_held_min.is_none() && gas.site == Site::Arterial && !corrected(case, &id)
}

fn corrected(case: &case::Case, id: &EntryId) -> bool {
    case.entries().iter().any(|entry| matches!(&entry.kind, EntryKind::Correction(c) if c.of == *id))
}

#[cfg(test)]
mod tests {
    use super::*;
    use case::{Case, Entry, Now};

    fn now() -> Now {
        Now::at(Moment(1_772_486_400_000))
    }

    fn ferry() -> Sheet {
        let mut sheet = Sheet::default();
        sheet.choose(Choice::Site, Some(0), &now());
        sheet.choose(Choice::Drawn, Some(2), &now());
        sheet.choose(Choice::Breathes, Some(0), &now());
        for (field, text) in
            [(Field::Ph, "7,21"), (Field::Pco2, "71"), (Field::TidalVolume, "340"), (Field::Rate, "18")]
        {
            sheet.set_text(field, text);
        }
        sheet
    }

    fn entry(id: &str, at: Moment, kind: EntryKind) -> Entry {
        Entry {
            id: EntryId(id.into()),
            at,
            written_at: Some(now().wall),
            utc_offset_min: Some(0),
            kind,
            not_understood: vec![],
        }
    }

    fn ferry_case() -> (Case, Moment) {
        let sheet = ferry();
        let drawn = sheet.moment(Choice::Drawn).unwrap();
        let mut case = Case::new("Bed 3");
        let typed = settings(&sheet, &Settings::default(), AgeGroup::Adult);
        let gas = gas(&sheet, AgeGroup::Adult, None).unwrap();
        case.add(entry("s", drawn, EntryKind::Settings(typed))).unwrap();
        case.add(entry("g", drawn, EntryKind::Gas(gas))).unwrap();
        (case, drawn)
    }

    #[test]
    fn the_first_chip_means_a_tube_no_effort_no_leak() {
        let typed = settings(&ferry(), &Settings::default(), AgeGroup::Adult);
        assert_eq!(typed.airway, Some(Airway::Tube));
        assert_eq!(typed.effort, Some(Effort::None));
        assert_eq!(typed.leak, Some(Leak::None));
        assert_eq!((typed.rate_per_min, typed.tidal_volume_ml), (Some(18.0), Some(340.0)));
    }

    #[test]
    fn settings_held_for_longer_than_an_entry_can_say_are_left_to_the_record() {
        let held = |minutes: f64| held_min(now().wall.plus_minutes(-minutes), now().wall);
        assert_eq!((held(90.0), held(0.0)), (Some(90.0), Some(0.0)));
        assert_eq!((held(1530.0), held(-5.0)), (None, None));
    }

    #[test]
    fn a_volume_of_another_way_of_breathing_is_not_written() {
        let mut sheet = ferry();
        sheet.choose(Choice::Breathes, Some(1), &now());
        let typed = settings(&sheet, &Settings::default(), AgeGroup::Adult);
        assert_eq!((typed.tidal_volume_ml, typed.tidal_volume_expired_ml), (None, None));
    }

    #[test]
    fn only_what_changed_is_written() {
        let in_force = settings(&ferry(), &Settings::default(), AgeGroup::Adult);
        let mut sheet = Sheet::default();
        sheet.set_text(Field::NewRate, "26");
        sheet.set_text(Field::NewVolume, "340");
        let change = change(&sheet, &in_force, AgeGroup::Adult);
        assert_eq!(change, Settings { rate_per_min: Some(26.0), ..Settings::default() });
        assert!(settings(&ferry(), &in_force, AgeGroup::Adult).is_empty());
    }

    #[test]
    fn settings_held_half_an_hour_moves_them_before_the_gas() {
        let (mut case, drawn) = ferry_case();
        assert!(held_is_open(&case));
        for (n, kind) in held_corrections(&case, Held::HalfHour).into_iter().enumerate() {
            case.add(entry(&format!("c{n}"), now().wall, kind)).unwrap();
        }
        assert!(!held_is_open(&case));
        assert_eq!(case.gases()[0].2.settings_held_min, Some(30.0));
        assert_eq!(case.settings_steps()[0].0, drawn.plus_minutes(-30.0));
    }

    #[test]
    fn not_known_is_an_answer_too() {
        let (mut case, drawn) = ferry_case();
        for (n, kind) in held_corrections(&case, Held::NotKnown).into_iter().enumerate() {
            case.add(entry(&format!("c{n}"), now().wall, kind)).unwrap();
        }
        assert!(!held_is_open(&case));
        assert_eq!(case.gases()[0].2.settings_held_min, None);
        assert_eq!(case.settings_steps()[0].0, drawn);
    }

    #[test]
    fn a_person_known_is_offered_and_comes_back_the_same() {
        let mut case = Case::new("Bed 3");
        case.person = crate::state::demo::PERSON;
        let mut sheet = Sheet::default();
        offer_person(&mut sheet, &case);
        assert_eq!(person(&sheet), case.person);
        sheet.set_text(Field::Height, "170");
        offer_person(&mut sheet, &case);
        assert_eq!(sheet.text(Field::Height), "170", "what was begun stays");
        sheet.set_text(Field::Label, "");
        offer_person(&mut sheet, &case);
        assert_eq!(sheet.text(Field::Height), "170", "and without a label too");
    }

    #[test]
    fn an_address_sets_the_steppers() {
        let change = Settings { rate_per_min: Some(22.0), ..Settings::default() };
        assert_eq!(address_of(&change), "#/change?rate=22");
        let mut sheet = Sheet::default();
        sheet.set_text(Field::NewVolume, "400");
        try_settings(&mut sheet, "rate=22&x=1&=&vt");
        assert_eq!((sheet.text(Field::NewRate), sheet.text(Field::NewVolume)), ("22", ""));
    }

    #[test]
    fn a_mask_has_an_unknown_leak_until_it_is_said() {
        let mut sheet = Sheet::default();
        sheet.choose(Choice::Breathes, Some(3), &now());
        let typed = settings(&sheet, &Settings::default(), AgeGroup::Adult);
        assert_eq!((typed.airway, typed.leak), (Some(Airway::Mask), Some(Leak::Unknown)));
        sheet.choose(Choice::Leak, Some(2), &now());
        let typed = settings(&sheet, &Settings::default(), AgeGroup::Adult);
        assert_eq!(typed.leak, Some(Leak::Large));
    }
}
