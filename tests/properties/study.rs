//! A study of any case inside the limits: an answer that is finite and in order, or silence with words.

use bedside::{Band, Options, Quantiles, Status, Study};
use case::{
    Airway, Case, Control, Effort, Entry, EntryId, EntryKind, Gas, Leak, Moment, Now, Person, Settings, Sex,
    Site,
};
use proptest::prelude::*;

/// Cases a run: each learns from a gas with 256 members.
const CASES: u32 = 150;

const NOW: Moment = Moment(1_772_485_800_000);

fn entry(id: &str, minutes: f64, kind: EntryKind) -> Entry {
    Entry {
        id: EntryId(id.into()),
        at: NOW.plus_minutes(minutes),
        written_at: None,
        utc_offset_min: None,
        kind,
        not_understood: vec![],
    }
}

/// Values over the whole range of the one table.
fn within(quantity: units::Quantity) -> impl Strategy<Value = f64> {
    let limit = units::limit(quantity, units::AgeGroup::Child);
    limit.least..=limit.most
}

prop_compose! {
    fn person()(
        sex in proptest::option::of(prop_oneof![Just(Sex::Female), Just(Sex::Male)]),
        age_years in proptest::option::of(within(units::Quantity::AgeYears)),
        height_cm in proptest::option::of(within(units::Quantity::HeightCm)),
        weight_kg in proptest::option::of(within(units::Quantity::WeightKg)),
    ) -> Person {
        Person { sex, age_years, height_cm, height_how: None, weight_kg }
    }
}

prop_compose! {
    fn passive()(
        rate in within(units::Quantity::RatePerMin),
        volume in within(units::Quantity::TidalVolumeMl),
        apparatus in proptest::option::of(within(units::Quantity::ApparatusDeadSpaceMl)),
    ) -> Settings {
        Settings {
            airway: Some(Airway::Tube),
            control: Some(Control::Volume),
            effort: Some(Effort::None),
            leak: Some(Leak::None),
            rate_per_min: Some(rate),
            tidal_volume_ml: Some(volume),
            apparatus_dead_space_ml: apparatus,
            ..Settings::default()
        }
    }
}

prop_compose! {
    fn gas()(
        ph in within(units::Quantity::Ph),
        pco2_mmhg in within(units::Quantity::Paco2Mmhg),
        hb_g_dl in proptest::option::of(within(units::Quantity::HbGDl)),
        po2_mmhg in proptest::option::of(within(units::Quantity::Po2Mmhg)),
        settings_held_min in proptest::option::of(0.0..200.0),
    ) -> Gas {
        Gas {
            site: Site::Arterial, ph, pco2_mmhg, po2_mmhg, hco3_printed_mmol_l: None, hb_g_dl, temperature_c: None,
            reported_at_c: None, analysed_at: None, settings_held_min,
        }
    }
}

fn sound(quantiles: Option<Quantiles>) -> bool {
    quantiles.is_some_and(|q| q.p10.is_finite() && q.p90.is_finite() && q.p10 <= q.p50 && q.p50 <= q.p90)
}

fn all_sound(band: &Band, count: usize) -> bool {
    (0..count).all(|i| sound(band.at(i)))
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(CASES))]
    #[test]
    fn finite_and_in_order_or_silent_with_words(person in person(), first in passive(), gas in gas(), then in passive()) {
        let mut case = Case::new("Any");
        case.person = person;
        prop_assert!(case.add(entry("s", -40.0, EntryKind::Settings(first))).is_ok());
        prop_assert!(case.add(entry("g", 0.0, EntryKind::Gas(gas))).is_ok());
        let study = Study::new(&case, Options::default());
        let minutes = [-40.0, 0.0, 1.0, 30.0, 240.0];
        for change in [None, Some(&then)] {
            let answer = study.forecast(&Now::at(NOW), change, &minutes);
            match &answer.value {
                Some(f) => {
                    prop_assert!(answer.standing.status != Status::Withheld);
                    for band in [&f.paco2_mmhg, &f.ph, &f.hco3_mmol_l, &f.gas_would_read_paco2_mmhg, &f.gas_would_read_ph] {
                        prop_assert!(all_sound(band, minutes.len()), "{band:?}");
                    }
                    prop_assert!(f.paco2_mmhg.p10.iter().all(|p| *p > 0.0));
                    prop_assert!(sound(Some(f.settled.paco2_mmhg)) && sound(Some(f.settled.ph)));
                    prop_assert!(sound(Some(f.minutes_to_within_2_mmhg)) && f.minutes_to_90_percent.p10 >= 0.0);
                }
                None => {
                    prop_assert_eq!(answer.standing.status, Status::Withheld);
                    let silent = answer.standing.withheld.iter().all(|w| w.words.is_empty() || w.would_help.is_empty());
                    prop_assert!(!answer.standing.withheld.is_empty() && !silent);
                }
            }
        }
    }

    #[test]
    fn more_alveolar_ventilation_never_settles_higher(rate in 8.0..30.0_f64, faster in 1.01..1.5_f64, paco2 in 25.0..90.0_f64) {
        let mut case = Case::new("Any");
        let settings = |rate| Settings {
            airway: Some(Airway::Tube), control: Some(Control::Volume), effort: Some(Effort::None), leak: Some(Leak::None),
            rate_per_min: Some(rate), tidal_volume_ml: Some(450.0), ..Settings::default()
        };
        let gas = Gas {
            site: Site::Arterial, ph: 7.3, pco2_mmhg: paco2, po2_mmhg: None, hco3_printed_mmol_l: None, hb_g_dl: None,
            temperature_c: None, reported_at_c: None, analysed_at: None, settings_held_min: Some(60.0),
        };
        prop_assert!(case.add(entry("s", -60.0, EntryKind::Settings(settings(rate)))).is_ok());
        prop_assert!(case.add(entry("g", 0.0, EntryKind::Gas(gas))).is_ok());
        let study = Study::new(&case, Options::default());
        let settled = |change: Option<&Settings>| study.forecast(&Now::at(NOW), change, &[]).value.map(|f| f.settled.paco2_mmhg.p50);
        if let (Some(before), Some(after)) = (settled(None), settled(Some(&settings(rate * faster)))) {
            // The middle of 256 members, each with its own jump of R: within a hundredth of it.
            prop_assert!(after <= before * 1.01, "{before} {after}");
        }
    }
}
