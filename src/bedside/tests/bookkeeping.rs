//! What the record amounts to: telling is not changing, what was read holds from the change on, and what nobody
//! read is a gap.

#![allow(clippy::unwrap_used)] // in a test an unwrap is an assertion

use bedside::{Options, Status, Study};
use case::*;

mod common;
use common::*;

/// Settled values of one case told in two ways may differ by this, mmHg: the draws are the same, the sums not.
const SAME_MMHG: f64 = 0.5;

fn settled(case: &Case, minute: f64) -> f64 {
    let answer = Study::new(case, Options::default()).forecast(&now(minute), None, &[]);
    answer.value.unwrap_or_else(|| panic!("{:?}", answer.standing)).settled.paco2_mmhg.p50
}

fn change(change: Settings) -> EntryKind {
    EntryKind::Settings(change)
}

#[test]
fn telling_a_temperature_a_sedation_or_an_apparatus_changes_nothing() {
    let plain = settled(&night_ferry(), 5.0);
    let apparatus = Settings { apparatus_dead_space_ml: Some(60.0), ..Settings::default() };
    for told in [
        EntryKind::Temperature(39.0),
        EntryKind::Sedation(Sedation { level: Some(SedationLevel::Light), relaxant: None }),
        change(apparatus),
    ] {
        let mut case = night_ferry();
        add(&mut case, "t", 2.0, told.clone());
        let told_settled = settled(&case, 5.0);
        assert!((told_settled - plain).abs() < 3.0 * SAME_MMHG, "{told:?}: {told_settled} {plain}");
    }
    let mut warmer = night_ferry();
    add(&mut warmer, "t1", -20.0, EntryKind::Temperature(37.0));
    add(&mut warmer, "t2", 2.0, EntryKind::Temperature(39.0));
    assert!(settled(&warmer, 5.0) > plain + 8.0, "a second temperature is a change");
}

#[test]
fn a_volume_measured_against_a_set_one_is_not_forgotten_with_the_next_change() {
    let mut case = night_ferry();
    add(&mut case, "m", -20.0, change(Settings { minute_volume_l_min: Some(5.0), ..Settings::default() }));
    let before = settled(&case, 1.0);
    add(&mut case, "p", 2.0, change(Settings { peep_cmh2o: Some(12.0), ..Settings::default() }));
    assert!((settled(&case, 3.0) - before).abs() < SAME_MMHG, "PEEP alone moves no ventilation");
    add(&mut case, "r", 4.0, change(Settings { rate_per_min: Some(22.0), ..Settings::default() }));
    let after = settled(&case, 5.0);
    assert!((after - before * 18.0 / 22.0).abs() < 3.0, "{before} {after}");
}

#[test]
fn a_volume_read_two_minutes_after_the_first_settings_holds_from_them_on() {
    let pressure = Settings {
        control: Some(Control::Pressure),
        tidal_volume_ml: None,
        inspiratory_pressure_cmh2o: Some(15.0),
        ..passive(18.0, 340.0)
    };
    let mut case = Case::new("Bed 1");
    add(&mut case, "s", -30.0, change(pressure));
    add(&mut case, "g", 0.0, gas(7.21, 71.0, Some(30.0)));
    add(
        &mut case,
        "v",
        2.0,
        change(Settings { tidal_volume_expired_ml: Some(340.0), ..Settings::default() }),
    );
    assert!((settled(&case, 3.0) - 71.0).abs() < 2.0);
}

#[test]
fn a_breath_nobody_read_is_a_gap_and_needs_a_new_gas() {
    let mut case = night_ferry();
    add(&mut case, "e", 5.0, change(Settings { effort: Some(Effort::Present), ..Settings::default() }));
    add(&mut case, "n", 50.0, change(Settings { effort: Some(Effort::None), ..Settings::default() }));
    let answer = Study::new(&case, Options::default()).forecast(&now(51.0), None, &[0.0]);
    assert_eq!(answer.standing.status, Status::Withheld);
    assert_eq!(answer.standing.withheld[0].id, "no_gas_since");
}

#[test]
fn a_gas_right_after_hand_ventilation_tells_nothing_settled() {
    let mut case = Case::new("Bed 1");
    add(&mut case, "s", -60.0, change(passive(14.0, 450.0)));
    add(&mut case, "h", -10.0, change(Settings { control: Some(Control::ByHand), ..Settings::default() }));
    add(&mut case, "m", -5.0, change(Settings { control: Some(Control::Volume), ..Settings::default() }));
    add(&mut case, "g", 0.0, gas(7.5, 30.0, None));
    let early = Study::new(&case, Options::default()).forecast(&now(1.0), None, &[0.0]);
    assert_eq!(early.standing.withheld[0].id, "after_hand");
}

#[test]
fn a_relaxant_takes_his_own_breaths() {
    let own =
        Settings { effort: Some(Effort::Present), rate_total_per_min: Some(26.0), ..passive(14.0, 400.0) };
    let mut case = Case::new("Bed 1");
    add(&mut case, "s", -30.0, change(own));
    add(&mut case, "g", 0.0, gas(7.30, 55.0, Some(30.0)));
    let relax = EntryKind::Sedation(Sedation { level: None, relaxant: Some(true) });
    let asked = bedside::ask_about_entry(&case, &relax);
    assert_eq!(asked[0].words, "He takes 12 breaths of his own. Relaxed, they stop. Raise the rate first.");
    let study = Study::new(&case, Options::default());
    let still = Settings { effort: Some(Effort::None), ..Settings::default() };
    assert_eq!(study.forecast(&now(1.0), Some(&still), &[]).cautions[0].id, "relaxant");
    add(&mut case, "r", 1.0, relax);
    let silent = Study::new(&case, Options::default()).forecast(&now(2.0), None, &[0.0]);
    assert!(silent.value.is_none() && silent.standing.withheld[0].id == "relaxant");
}

#[test]
fn more_breaths_than_are_set_are_his_own() {
    let contradiction = Settings { rate_total_per_min: Some(30.0), ..passive(18.0, 340.0) };
    let mut case = Case::new("Bed 1");
    add(&mut case, "s", -30.0, change(contradiction));
    add(&mut case, "g", 0.0, gas(7.30, 55.0, Some(30.0)));
    let answer = Study::new(&case, Options::default()).forecast(&now(1.0), None, &[0.0]);
    assert_eq!(answer.standing.status, Status::Conditional);
}

#[test]
fn with_raised_pressure_in_the_skull_no_rate_goes_under_35() {
    let mut case = night_ferry();
    case = {
        let mut skull = Case::new("Bed 4");
        skull.person = case.person;
        add(&mut skull, "s", -30.0, change(passive(18.0, 400.0)));
        add(&mut skull, "g", 0.0, gas(7.25, 50.0, Some(30.0)));
        add(
            &mut skull,
            "c",
            0.0,
            EntryKind::Condition { name: Condition::RaisedIntracranialPressure, present: true },
        );
        skull
    };
    let offers = Study::new(&case, Options::default()).offers(&now(1.0)).value.unwrap();
    assert!(!offers.offers.is_empty());
    assert!(offers.offers.iter().all(|o| o.forecast.settled.paco2_mmhg.p50 >= 35.0));
}

#[test]
fn a_first_gas_that_hardly_fits_its_settings_is_said() {
    let mut case = Case::new("Bed 1");
    case.person = night_ferry().person;
    add(&mut case, "s", -30.0, change(passive(18.0, 340.0)));
    add(&mut case, "g", 0.0, gas(7.5, 12.0, Some(30.0)));
    let cautions = Study::new(&case, Options::default()).cautions(&now(1.0));
    assert!(cautions.iter().any(|c| c.id == "surprise"), "{cautions:?}");
    assert!(cautions.iter().any(|c| c.id == "unit"));
    let usual = Study::new(&night_ferry(), Options::default()).cautions(&now(1.0));
    assert!(usual.iter().all(|c| c.id != "surprise" && c.id != "unit"));
}

#[test]
fn a_clock_behind_the_record_silences_it() {
    let mut case = night_ferry();
    add(&mut case, "u", 600.0, EntryKind::Unchanged);
    for minute in [-60.0, 10.0, 90.0] {
        let answer = Study::new(&case, Options::default()).forecast(&now(minute), None, &[0.0]);
        assert_eq!(answer.standing.status, Status::Withheld);
        assert!(answer.standing.withheld.iter().any(|why| why.id == "clock"));
    }
    assert!(
        Study::new(&night_ferry(), Options::default()).forecast(&now(-1.0), None, &[0.0]).value.is_some()
    );
}

#[test]
fn an_old_gas_typed_now_confirms_nothing_about_now() {
    let mut case = night_ferry();
    let mut late = entry("n", -20.0, EntryKind::Note("typed an hour later".into()));
    late.written_at = Some(at(61.0));
    case.add(late).unwrap();
    let answer = Study::new(&case, Options::default()).forecast(&now(61.0), None, &[0.0]);
    assert!(answer.standing.withheld.iter().any(|why| why.id == "expired"));
}

#[test]
fn a_small_childs_typed_apparatus_counts() {
    let child = |apparatus| {
        let mut case = Case::new("Cot 2");
        case.person = Person { age_years: Some(1.0), weight_kg: Some(10.0), ..Person::default() };
        let settings = Settings { apparatus_dead_space_ml: apparatus, ..passive(25.0, 80.0) };
        add(&mut case, "s", -30.0, change(settings));
        add(&mut case, "g", 0.0, gas(7.30, 50.0, Some(30.0)));
        let bigger = Settings { tidal_volume_ml: Some(100.0), ..Settings::default() };
        let answer = Study::new(&case, Options::default()).forecast(&now(1.0), Some(&bigger), &[]);
        answer.value.unwrap().settled.paco2_mmhg.p50
    };
    // The larger the part that every breath must fill first, the more a larger breath gains.
    assert!(child(Some(40.0)) < child(Some(5.0)) - 1.0, "{} {}", child(Some(40.0)), child(Some(5.0)));
}

#[test]
fn a_jump_is_expected_across_an_apnoea_too() {
    let mut case = night_ferry();
    add(&mut case, "a", 10.0, EntryKind::BreathingStopped(AirwayState::OpenOxygen));
    add(&mut case, "r", 10.2, change(Settings { rate_per_min: Some(26.0), ..Settings::default() }));
    add(&mut case, "b", 10.5, EntryKind::BreathingRestored);
    let mut plain = night_ferry();
    add(&mut plain, "r", 10.2, change(Settings { rate_per_min: Some(26.0), ..Settings::default() }));
    let width = |case: &Case| {
        let p = Study::new(case, Options::default())
            .forecast(&now(11.0), None, &[])
            .value
            .unwrap()
            .settled
            .paco2_mmhg;
        p.p90 - p.p10
    };
    assert!(width(&case) > 0.9 * width(&plain), "{} {}", width(&case), width(&plain));
}
