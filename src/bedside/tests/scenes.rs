//! The scenes the tool is made for, and what it must be silent about. Every figure in the cases is invented.

#![allow(clippy::unwrap_used)] // in a test an unwrap is an assertion
use bedside::{Freshness, Options, Status, Study};
use case::*;

mod common;
use common::*;

#[test]
fn night_ferry_gets_three_rates_with_where_they_lead() {
    let study = Study::new(&night_ferry(), Options::default());
    let answer = study.offers(&now(5.0));
    assert_eq!(answer.standing.status, Status::Forecast);
    let offers = answer.value.unwrap();
    let rates: Vec<f64> = offers.offers.iter().map(|o| o.price.rate_per_min).collect();
    assert_eq!(rates, [22.0, 26.0, 30.0]);
    // Nobody has said whether she has airflow obstruction.
    assert!(offers.fewer_because.iter().any(|c| c.id == "obstruction_unasked"));
    for offer in &offers.offers {
        let (p, ph) = (offer.forecast.settled.paco2_mmhg, offer.forecast.settled.ph);
        println!(
            "{:.0}: {:.1} ({:.1} to {:.1}) mmHg, pH {:.2} ({:.2} to {:.2}), within 2 mmHg in {:.0} to {:.0} min, {:.1} mL/kg",
            offer.price.rate_per_min,
            p.p50,
            p.p10,
            p.p90,
            ph.p50,
            ph.p10,
            ph.p90,
            offer.forecast.minutes_to_within_2_mmhg.p10,
            offer.forecast.minutes_to_within_2_mmhg.p90,
            offer.price.ml_per_kg.unwrap(),
        );
        // At one tidal volume settled PaCO2 goes as 1/rate, if VCO2/(1 − VD/VT) stays.
        let expected = 71.0 * 18.0 / offer.price.rate_per_min;
        assert!((p.p50 - expected).abs() < 2.5, "{} {expected}", p.p50);
        assert!(p.p10 < p.p50 && p.p50 < p.p90 && ph.p10 < ph.p50);
        assert_eq!(offer.price.plateau_cmh2o, Some(27.0));
    }
}

#[test]
fn the_gas_of_the_night_ferry_is_met_at_its_time() {
    let study = Study::new(&night_ferry(), Options::default());
    let forecast = study.forecast(&now(0.0), None, &[0.0]).value.unwrap();
    let paco2 = forecast.paco2_mmhg.at(0).unwrap();
    println!("PaCO2 at the gas {paco2:?}, pH {:?}", forecast.ph.at(0));
    assert!((paco2.p50 - 71.0).abs() < 1.0);
    assert!((forecast.ph.at(0).unwrap().p50 - 7.21).abs() < 0.01);
}

#[test]
fn a_person_nobody_knows_widens_it_and_is_listed() {
    let mut unknown = night_ferry();
    unknown.person = Person::default();
    let narrow = Study::new(&night_ferry(), Options::default()).offers(&now(5.0));
    let wide = Study::new(&unknown, Options::default()).offers(&now(5.0));
    assert_eq!(wide.standing.status, Status::Forecast);
    let width = |a: &bedside::Answer<bedside::Offers>| {
        let p = a.value.as_ref().unwrap().offers[1].forecast.settled.paco2_mmhg;
        p.p90 - p.p10
    };
    println!("width with the person {:.2}, without {:.2} mmHg", width(&narrow), width(&wide));
    assert!(width(&wide) > width(&narrow));
    assert!(wide.assumed.iter().any(|a| a.name == "Size" && !a.narrows.is_empty()));
    assert!(wide.value.unwrap().offers[0].price.ml_per_kg.is_none());
    assert!(wide.assumed.iter().all(|a| sources::find(a.source).is_some()));
}

#[test]
fn a_start_not_known_to_be_settled_is_wider() {
    let mut unsettled = Case::new("Bed 3");
    unsettled.person = night_ferry().person;
    add(&mut unsettled, "s1", 0.0, EntryKind::Settings(passive(18.0, 340.0)));
    add(&mut unsettled, "g1", 0.0, gas(7.21, 71.0, None));
    let width = |case: &Case| {
        let p = Study::new(case, Options::default())
            .forecast(&now(0.0), None, &[])
            .value
            .unwrap()
            .settled
            .paco2_mmhg;
        p.p90 - p.p10
    };
    assert!(
        width(&unsettled) > 1.5 * width(&night_ferry()),
        "{} {}",
        width(&unsettled),
        width(&night_ferry())
    );
}

#[test]
fn a_mask_with_a_large_leak_gets_no_curve() {
    let mut case = Case::new("Bed 1");
    let mask = Settings { airway: Some(Airway::Mask), leak: Some(Leak::Large), ..passive(18.0, 340.0) };
    add(&mut case, "s1", -30.0, EntryKind::Settings(mask));
    add(&mut case, "g1", 0.0, gas(7.24, 88.0, Some(30.0)));
    let study = Study::new(&case, Options::default());
    let answer = study.forecast(&now(5.0), None, &[0.0, 30.0]);
    assert_eq!(answer.standing.status, Status::Withheld);
    assert!(answer.value.is_none());
    assert!(answer.standing.withheld[0].words.contains("No forecast"));
    assert!(answer.standing.withheld[0].would_help.contains("30 to 60 min"));
    assert!(study.offers(&now(5.0)).value.is_none());
    assert!(
        study.cautions(&now(5.0)).iter().any(|c| c.id == "call"),
        "pH 7.24 needs help with or without a curve"
    );
}

#[test]
fn the_number_is_questioned_at_30_and_taken_away_at_60_minutes() {
    let study = Study::new(&night_ferry(), Options::default());
    assert_eq!(study.freshness(&now(29.0)), Freshness::Fresh);
    assert_eq!(study.freshness(&now(30.0)), Freshness::StillSo { since: at(0.0) });
    assert!(study.forecast(&now(59.0), None, &[0.0]).value.is_some());
    let expired = study.forecast(&now(60.0), None, &[0.0]);
    assert_eq!((expired.standing.status, expired.value), (Status::Withheld, None));
    assert_eq!(expired.standing.withheld[0].words, "Not known since 21:10.");
    let mut confirmed = night_ferry();
    add(&mut confirmed, "u", 50.0, EntryKind::Unchanged);
    assert!(Study::new(&confirmed, Options::default()).forecast(&now(60.0), None, &[0.0]).value.is_some());
}

#[test]
fn a_gas_outside_the_band_waits_for_a_choice() {
    let mut case = night_ferry();
    add(
        &mut case,
        "s2",
        10.0,
        EntryKind::Settings(Settings { rate_per_min: Some(26.0), ..Settings::default() }),
    );
    add(&mut case, "g2", 60.0, gas(7.12, 92.0, Some(50.0)));
    let study = Study::new(&case, Options::default());
    let doubt = study.doubt().expect("92 where about 50 was expected");
    println!("expected {:?}", doubt.expected_mmhg);
    assert!(doubt.expected_mmhg.0 > 40.0 && doubt.expected_mmhg.1 < 65.0);
    assert!(study.forecast(&now(65.0), None, &[0.0]).value.is_none());
    let chosen = |choice| {
        let mut case = case.clone();
        add(&mut case, "v", 61.0, EntryKind::GasVerdict(GasVerdict { of: EntryId("g2".into()), choice }));
        let study = Study::new(&case, Options::default());
        assert!(study.doubt().is_none());
        let answer = study.forecast(&now(65.0), None, &[0.0]);
        answer.value.unwrap_or_else(|| panic!("{choice:?}: {:?}", answer.standing)).paco2_mmhg.at(0).unwrap()
    };
    let (left_out, restarted) = (chosen(GasChoice::Sample), chosen(GasChoice::Patient));
    assert!(left_out.p50 < 60.0, "{left_out:?}");
    assert!((restarted.p50 - 92.0).abs() < 3.0, "{restarted:?}");
    assert!(restarted.p90 - restarted.p10 > 1.0);
}

#[test]
fn a_gas_that_fits_narrows_the_band() {
    let mut case = night_ferry();
    add(
        &mut case,
        "s2",
        10.0,
        EntryKind::Settings(Settings { rate_per_min: Some(26.0), ..Settings::default() }),
    );
    let settled = |case: &Case| {
        Study::new(case, Options::default()).forecast(&now(70.0), None, &[]).value.unwrap().settled.paco2_mmhg
    };
    add(&mut case, "u", 55.0, EntryKind::Unchanged);
    let before = settled(&case);
    add(&mut case, "g2", 60.0, gas(7.33, 50.0, Some(50.0)));
    let after = settled(&case);
    println!("before {before:?} after {after:?}");
    assert!(after.p90 - after.p10 < 0.6 * (before.p90 - before.p10));
}

#[test]
fn airflow_obstruction_gets_no_faster_rate() {
    let mut case = night_ferry();
    add(&mut case, "c", -40.0, EntryKind::Condition { name: Condition::AirflowObstruction, present: true });
    let study = Study::new(&case, Options::default());
    let offers = study.offers(&now(5.0)).value.unwrap();
    assert!(offers.offers.is_empty());
    assert_eq!(offers.fewer_because[0].id, "obstruction");
    let change = Settings { rate_per_min: Some(22.0), ..Settings::default() };
    assert_eq!(study.forecast(&now(5.0), Some(&change), &[]).cautions[0].id, "obstruction_rate");
}

#[test]
fn conflicting_conditions_get_no_list() {
    let mut case = night_ferry();
    add(
        &mut case,
        "c",
        -40.0,
        EntryKind::Condition { name: Condition::RaisedIntracranialPressure, present: true },
    );
    add(&mut case, "d", -40.0, EntryKind::Condition { name: Condition::LungInjury, present: true });
    let offers = Study::new(&case, Options::default()).offers(&now(5.0)).value.unwrap();
    assert!(offers.offers.is_empty() && offers.fewer_because[0].words.ends_with("Call for advice."));
}

#[test]
fn an_unticked_retainer_is_asked_about_and_not_blown_past_his_ph() {
    let mut case = night_ferry();
    let mut high = Case::new("Bed 2");
    high.person = case.person;
    add(&mut high, "s1", -30.0, EntryKind::Settings(passive(14.0, 400.0)));
    add(&mut high, "g1", 0.0, gas(7.27, 85.0, Some(30.0)));
    let answer = Study::new(&high, Options::default()).offers(&now(5.0));
    assert!(answer.cautions.iter().any(|c| c.id == "retainer_question"));
    let offers = answer.value.unwrap();
    assert!(offers.offers.iter().all(|o| o.forecast.settled.ph.p90 <= 7.45));
    assert!(offers.fewer_because.iter().any(|c| c.id == "retainer_question"));
    case = night_ferry();
    assert!(
        Study::new(&case, Options::default())
            .offers(&now(5.0))
            .cautions
            .iter()
            .all(|c| c.id != "retainer_question")
    );
}

#[test]
fn no_gas_and_a_venous_gas_are_silent_with_their_reason() {
    let mut case = Case::new("Bed 1");
    add(&mut case, "s1", -30.0, EntryKind::Settings(passive(18.0, 340.0)));
    let answer = Study::new(&case, Options::default()).forecast(&now(0.0), None, &[0.0]);
    assert_eq!(answer.standing.withheld[0].id, "no_gas");
    let EntryKind::Gas(arterial) = gas(7.2, 70.0, None) else { unreachable!() };
    add(&mut case, "g1", 0.0, EntryKind::Gas(Gas { site: Site::PeripheralVenous, ..arterial }));
    let answer = Study::new(&case, Options::default()).forecast(&now(0.0), None, &[0.0]);
    assert_eq!(answer.standing.withheld[0].id, "not_arterial");
}

#[test]
fn pressure_control_is_silent_after_a_new_pressure_until_the_volume_is_read() {
    let mut case = Case::new("Bed 1");
    let pressure = Settings {
        control: Some(Control::Pressure),
        tidal_volume_ml: None,
        tidal_volume_expired_ml: Some(340.0),
        inspiratory_pressure_cmh2o: Some(15.0),
        ..passive(18.0, 340.0)
    };
    add(&mut case, "s1", -30.0, EntryKind::Settings(pressure));
    add(&mut case, "g1", 0.0, gas(7.21, 71.0, Some(30.0)));
    let study = Study::new(&case, Options::default());
    let answer = study.forecast(&now(1.0), None, &[0.0]);
    assert_eq!(answer.standing.status, Status::Conditional);
    assert!(answer.standing.conditions[0].words.contains("340 mL"));
    let change = Settings { inspiratory_pressure_cmh2o: Some(20.0), ..Settings::default() };
    assert_eq!(study.forecast(&now(1.0), Some(&change), &[0.0]).standing.status, Status::Withheld);
    add(&mut case, "s2", 10.0, EntryKind::Settings(change));
    assert!(Study::new(&case, Options::default()).forecast(&now(12.0), None, &[0.0]).value.is_none());
    let read = Settings { tidal_volume_expired_ml: Some(430.0), ..Settings::default() };
    add(&mut case, "s3", 12.0, EntryKind::Settings(read));
    let later = Study::new(&case, Options::default()).forecast(&now(13.0), None, &[0.0, 60.0]);
    let band = later.value.unwrap().paco2_mmhg;
    assert!(band.p50[1] < 60.0 && band.p50[0] < 71.0, "{band:?}");
}

#[test]
fn own_breaths_must_be_counted() {
    let mut case = Case::new("Bed 1");
    let own = Settings { effort: Some(Effort::Present), ..passive(14.0, 400.0) };
    add(&mut case, "s1", -30.0, EntryKind::Settings(own));
    add(&mut case, "g1", 0.0, gas(7.30, 55.0, Some(30.0)));
    let silent = Study::new(&case, Options::default()).forecast(&now(1.0), None, &[0.0]);
    assert_eq!(silent.standing.status, Status::Withheld);
    let counted = Settings { rate_total_per_min: Some(26.0), ..own };
    let mut case = Case::new("Bed 1");
    add(&mut case, "s1", -30.0, EntryKind::Settings(counted));
    add(&mut case, "g1", 0.0, gas(7.30, 55.0, Some(30.0)));
    let answer = Study::new(&case, Options::default()).forecast(&now(1.0), None, &[0.0]);
    assert_eq!(answer.standing.status, Status::Conditional);
    assert!(answer.standing.conditions[0].words.contains("keeps breathing 26"));
}

#[test]
fn shock_bicarbonate_and_hand_ventilation_silence_it() {
    for (kind, id) in [
        (EntryKind::Circulation(Circulation::Shock), "circulation"),
        (EntryKind::BicarbonateGiven { mmol: 100.0, over_min: None }, "bicarbonate"),
        (EntryKind::Seizure, "seizure"),
        (EntryKind::BreathingStopped(AirwayState::OpenOxygen), "no_breaths"),
        (EntryKind::Settings(Settings { control: Some(Control::ByHand), ..Settings::default() }), "by_hand"),
    ] {
        let mut case = night_ferry();
        add(&mut case, "x", 10.0, kind);
        let answer = Study::new(&case, Options::default()).forecast(&now(11.0), None, &[0.0]);
        assert!(answer.value.is_none());
        assert_eq!(answer.standing.withheld[0].id, id);
    }
}

#[test]
fn the_same_settings_typed_again_do_not_move_the_band() {
    let study = Study::new(&night_ferry(), Options::default());
    let same = Settings { rate_per_min: Some(18.0), ..Settings::default() };
    let plain = study.forecast(&now(5.0), None, &[0.0, 60.0]).value.unwrap();
    let again = study.forecast(&now(5.0), Some(&same), &[0.0, 60.0]).value.unwrap();
    assert_eq!(plain, again);
    let one_more = Settings { rate_per_min: Some(19.0), ..Settings::default() };
    let moved = study.forecast(&now(5.0), Some(&one_more), &[0.0, 60.0]).value.unwrap();
    let width = |f: &bedside::Forecast| f.settled.paco2_mmhg.p90 - f.settled.paco2_mmhg.p10;
    assert!(width(&moved) < 2.0 * width(&plain), "{} {}", width(&moved), width(&plain));
}

#[test]
fn a_breath_in_the_dead_space_is_withheld_not_nonsense() {
    let mut case = night_ferry();
    case = {
        let mut small = Case::new("Bed 3");
        small.person = case.person;
        add(&mut small, "s1", -30.0, EntryKind::Settings(passive(18.0, 60.0)));
        add(&mut small, "g1", 0.0, gas(7.21, 71.0, Some(30.0)));
        small
    };
    let answer = Study::new(&case, Options::default()).forecast(&now(5.0), None, &[0.0]);
    assert_eq!(answer.standing.status, Status::Withheld);
    assert_eq!(answer.standing.withheld[0].id, "breath_in_dead_space");
}

#[test]
fn an_entry_that_could_hide_a_change_silences_it() {
    for (kind, silent) in [("circulation", true), ("gas", true), ("horoscope", false)] {
        let mut case = night_ferry();
        add(&mut case, "x", 5.0, EntryKind::NotUnderstood(NotUnderstood { kind: kind.into() }));
        let answer = Study::new(&case, Options::default()).forecast(&now(6.0), None, &[0.0]);
        assert_eq!(answer.value.is_none(), silent, "{kind}");
        assert!(answer.cautions.iter().any(|c| c.id == "not_understood"));
    }
}

#[test]
fn a_change_that_leads_to_a_dangerous_ph_says_so_first() {
    let study = Study::new(&night_ferry(), Options::default());
    let slow = Settings { rate_per_min: Some(9.0), ..Settings::default() };
    let answer = study.forecast(&now(5.0), Some(&slow), &[]);
    assert_eq!(answer.cautions[0].id, "ph_low", "{:?}", answer.cautions);
    assert!(answer.cautions[0].comes_first());
    let fast = Settings { rate_per_min: Some(35.0), tidal_volume_ml: Some(400.0), ..Settings::default() };
    assert!(study.forecast(&now(5.0), Some(&fast), &[]).cautions.iter().any(|c| c.id == "ph_high"));
    assert!(
        study.forecast(&now(5.0), None, &[]).cautions.iter().all(|c| c.id != "ph_low" && c.id != "ph_high")
    );
}
