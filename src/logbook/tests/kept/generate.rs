//! Invented cases, any that the limits allow.

use case::{
    Airway, AirwayState, Case, Circulation, Condition, Control, Correction, Effort, EndTidal, Entry, EntryId,
    EntryKind, Gas, GasChoice, GasVerdict, HeightHow, Leak, Measured, Moment, NotUnderstood, Person,
    Sedation, SedationLevel, Settings, Sex, Site, Trace,
};
use proptest::prelude::*;
use units::{AgeGroup, Quantity as Q};

/// Times of this century, to the millisecond.
pub fn moment() -> impl Strategy<Value = Moment> {
    (946_684_800_000_i64..4_102_444_800_000).prop_map(Moment)
}

fn number(quantity: Q) -> BoxedStrategy<f64> {
    let limit = units::limit(quantity, AgeGroup::Adult);
    let whole = (limit.least.ceil() as i64..=limit.most.floor() as i64).prop_map(|n| n as f64);
    if limit.most - limit.least < 2.0 {
        (limit.least..=limit.most).boxed()
    } else {
        prop_oneof![limit.least..=limit.most, whole].boxed()
    }
}

fn maybe(quantity: Q) -> BoxedStrategy<Option<f64>> {
    proptest::option::of(number(quantity)).boxed()
}

fn one_of<T: Clone + std::fmt::Debug + 'static>(all: &[T]) -> impl Strategy<Value = T> + use<T> {
    proptest::sample::select(all.to_vec())
}

fn maybe_of<T: Clone + std::fmt::Debug + 'static>(all: &[T]) -> impl Strategy<Value = Option<T>> + use<T> {
    proptest::option::of(one_of(all))
}

fn settings() -> impl Strategy<Value = EntryKind> {
    let words = (
        maybe_of(&[Airway::Tube, Airway::Supraglottic, Airway::Mask, Airway::None]),
        maybe_of(&[
            Control::Volume,
            Control::Pressure,
            Control::PressureSupport,
            Control::ByHand,
            Control::None,
        ]),
        maybe_of(&[Effort::None, Effort::Present, Effort::Unknown]),
        maybe_of(&[Leak::None, Leak::Small, Leak::Large, Leak::Unknown]),
        proptest::option::of(any::<bool>()),
    );
    let volumes = (
        maybe(Q::RatePerMin),
        maybe(Q::RatePerMin),
        maybe(Q::TidalVolumeMl),
        maybe(Q::TidalVolumeMl),
        maybe(Q::MinuteVolumeLMin),
        maybe(Q::ApparatusDeadSpaceMl),
    );
    let pressures = (
        maybe(Q::InspiratoryPressureCmh2o),
        maybe(Q::PeepCmh2o),
        maybe(Q::PeepCmh2o),
        maybe(Q::PlateauCmh2o),
        maybe(Q::PeakCmh2o),
        maybe(Q::InspiratoryTimeS),
        maybe(Q::Fio2),
    );
    (words, volumes, pressures).prop_map(|(w, v, p)| {
        EntryKind::Settings(Settings {
            airway: w.0,
            control: w.1,
            effort: w.2,
            leak: w.3,
            flow_returns_to_zero: w.4,
            rate_per_min: v.0,
            rate_total_per_min: v.1,
            tidal_volume_ml: v.2,
            tidal_volume_expired_ml: v.3,
            minute_volume_l_min: v.4,
            apparatus_dead_space_ml: v.5,
            inspiratory_pressure_cmh2o: p.0,
            peep_cmh2o: p.1,
            total_peep_cmh2o: p.2,
            plateau_cmh2o: p.3,
            peak_cmh2o: p.4,
            inspiratory_time_s: p.5,
            fio2: p.6,
        })
    })
}

fn gas() -> impl Strategy<Value = EntryKind> {
    let site = one_of(&[Site::Arterial, Site::Capillary, Site::CentralVenous, Site::PeripheralVenous]);
    let printed =
        (number(Q::Ph), number(Q::Paco2Mmhg), maybe(Q::Po2Mmhg), maybe(Q::Hco3MmolL), maybe(Q::HbGDl));
    let beside = (maybe(Q::TemperatureC), maybe(Q::TemperatureC), maybe(Q::SettingsHeldMin));
    (site, printed, beside, proptest::option::of(moment())).prop_map(|(site, p, b, analysed_at)| {
        EntryKind::Gas(Gas {
            site,
            ph: p.0,
            pco2_mmhg: p.1,
            po2_mmhg: p.2,
            hco3_printed_mmol_l: p.3,
            hb_g_dl: p.4,
            temperature_c: b.0,
            reported_at_c: b.1,
            settings_held_min: b.2,
            analysed_at,
        })
    })
}

fn condition() -> impl Strategy<Value = EntryKind> {
    let named = prop_oneof![
        one_of(&[
            Condition::LungInjury,
            Condition::AirflowObstruction,
            Condition::RaisedIntracranialPressure,
            Condition::Pregnancy,
            Condition::MetabolicAcidosis,
            Condition::Other("smoke".into()),
        ]),
        maybe(Q::Paco2Mmhg).prop_map(|usual_paco2_mmhg| Condition::ChronicRetainer { usual_paco2_mmhg }),
    ];
    (named, any::<bool>()).prop_map(|(name, present)| EntryKind::Condition { name, present })
}

fn measured() -> impl Strategy<Value = EntryKind> {
    let values =
        (maybe(Q::Vco2MlMin), maybe(Q::DeadSpaceFraction), maybe(Q::CardiacOutputLMin), maybe(Q::FrcMl));
    (values, any::<bool>()).prop_map(|(v, exact)| {
        EntryKind::Measured(Measured {
            vco2_ml_min: v.0,
            dead_space_fraction: v.1,
            cardiac_output_l_min: v.2,
            frc_ml: v.3,
            exact,
        })
    })
}

fn ambient() -> impl Strategy<Value = EntryKind> {
    prop_oneof![
        number(Q::AltitudeM).prop_map(EntryKind::AltitudeM),
        number(Q::PressureHpa).prop_map(EntryKind::PressureHpa),
    ]
}

/// Two entries' words of one kind: what was written, and what a correction may say instead.
fn pair() -> impl Strategy<Value = (EntryKind, EntryKind)> {
    let twice = |kind: BoxedStrategy<EntryKind>| (kind.clone(), kind).boxed();
    let text = "\\PC{0,20}";
    let levels = [SedationLevel::None, SedationLevel::Light, SedationLevel::Moderate, SedationLevel::Heavy];
    let traces = [Trace::Plateau, Trace::Sloping, Trace::Flat];
    let airways = [AirwayState::OpenOxygen, AirwayState::OpenAir, AirwayState::Closed];
    let circulations = [Circulation::Steady, Circulation::Shock, Circulation::Arrest, Circulation::Restored];
    prop_oneof![
        3 => twice(settings().boxed()),
        3 => twice(gas().boxed()),
        1 => twice(
            (number(Q::Etco2Mmhg), maybe_of(&traces))
                .prop_map(|(etco2_mmhg, trace)| EntryKind::EndTidal(EndTidal { etco2_mmhg, trace }))
                .boxed()
        ),
        1 => twice(measured().boxed()),
        1 => twice(one_of(&airways).prop_map(EntryKind::BreathingStopped).boxed()),
        1 => twice(
            (maybe_of(&levels), proptest::option::of(any::<bool>()))
                .prop_map(|(level, relaxant)| EntryKind::Sedation(Sedation { level, relaxant }))
                .boxed()
        ),
        1 => twice(one_of(&circulations).prop_map(EntryKind::Circulation).boxed()),
        1 => twice(
            (number(Q::BicarbonateMmol), maybe(Q::GivenOverMin))
                .prop_map(|(mmol, over_min)| EntryKind::BicarbonateGiven { mmol, over_min })
                .boxed()
        ),
        1 => twice(number(Q::TemperatureC).prop_map(EntryKind::Temperature).boxed()),
        1 => twice(ambient().boxed()),
        1 => twice(number(Q::Spo2Percent).prop_map(EntryKind::Saturation).boxed()),
        1 => twice(condition().boxed()),
        1 => twice(proptest::collection::vec(text, 0..4).prop_map(EntryKind::Checked).boxed()),
        1 => twice(text.prop_map(EntryKind::Note).boxed()),
        1 => one_of(&[EntryKind::Seizure, EntryKind::Unchanged, EntryKind::BreathingRestored])
            .prop_map(|kind| (kind.clone(), kind)),
    ]
}

/// One entry, perhaps with a correction of it and a decision about it.
fn group(number: usize) -> impl Strategy<Value = Vec<Entry>> {
    let id = "[a-zé \"\\\\./0-9-]{0,8}".prop_map(move |text| EntryId(format!("{text}{number}")));
    let head = (moment(), proptest::option::of(moment()), proptest::option::of(-840..=840_i32));
    let choice = maybe_of(&[GasChoice::Sample, GasChoice::Patient, GasChoice::Machine]);
    let fix = proptest::option::of((moment(), proptest::option::of(moment())));
    (id, pair(), head, choice, fix).prop_map(|(id, (kind, other), head, choice, fix)| {
        let entry = |id: EntryId, at: Moment, kind: EntryKind| Entry {
            id,
            at,
            written_at: head.1,
            utc_offset_min: head.2,
            kind,
            not_understood: vec![],
        };
        let beside = |what: &str| EntryId(format!("{} {what}", id.0));
        let mut all = vec![entry(id.clone(), head.0, kind)];
        if let Some((at, moved_to)) = fix {
            let correction = Correction { of: id.clone(), at: moved_to, kind: Box::new(other) };
            all.push(entry(beside("fix"), at, EntryKind::Correction(correction)));
        }
        if let Some(choice) = choice {
            let verdict = GasVerdict { of: id.clone(), choice };
            all.push(entry(beside("verdict"), head.0, EntryKind::GasVerdict(verdict)));
        }
        all
    })
}

/// A kind that no version knows.
pub fn unknown_kind() -> EntryKind {
    EntryKind::NotUnderstood(NotUnderstood { kind: "tide".into() })
}

/// Up to eight entries with their corrections.
pub fn entries() -> impl Strategy<Value = Vec<Entry>> {
    (0..8_usize).prop_flat_map(|count| (0..count).map(group).collect::<Vec<_>>()).prop_map(|all| all.concat())
}

/// Any person, adult, so that every volume of the adult's table may stand beside it.
pub fn person() -> impl Strategy<Value = Person> {
    let words = (
        maybe_of(&[Sex::Female, Sex::Male]),
        maybe_of(&[HeightHow::Measured, HeightHow::Stated, HeightHow::Guessed]),
    );
    let age = proptest::option::of(18.0..=110.0_f64);
    (words, age, maybe(Q::HeightCm), maybe(Q::WeightKg)).prop_map(
        |((sex, height_how), age_years, height, weight)| Person {
            sex,
            height_how,
            age_years,
            height_cm: height,
            weight_kg: weight,
        },
    )
}

/// Any case.
pub fn case() -> impl Strategy<Value = Case> {
    ("\\PC{0,12}", person(), entries()).prop_map(|(label, person, entries)| {
        let mut case = Case::new(label);
        case.person = person;
        entries.into_iter().for_each(|entry| case.add(entry).unwrap());
        case
    })
}
