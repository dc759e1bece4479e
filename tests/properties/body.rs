//! The body: the 863 equation, conservation, steps of the solver, scaling, finiteness.

use physiology::{Chemistry, ChemistryInput, Exact, Patient, Priors, Sex, Step, minutes_to_share};

/// Settled PaCO2 against the 863 equation, mmHg: what a screen can show is a whole mmHg.
const EQUATION_MMHG: f64 = 0.05;
/// CO2 in the pools and breathed out against what was made, as a share of it: rounding only.
const CONSERVED: f64 = 1e-6;
/// PaCO2 with every step halved, mmHg.
const STEP_MMHG: f64 = 0.01;
/// PaCO2 of a body scaled as a whole, relative.
const SCALING: f64 = 1e-6;

/// 70 kg, production 200 mL/min, cardiac output 5 L/min, Hb 14, nothing with a spread.
struct Exactly {
    chemistry: Chemistry,
    patient: Patient,
}

/// A man of 70 kg predicted and real weight.
const MAN_70_KG: Patient = Patient {
    sex: Some(Sex::Male),
    age_years: Some(40.0),
    height_cm: Some(174.378),
    height_guessed: false,
    weight_kg: Some(70.0),
};

fn exactly() -> Exactly {
    let input = ChemistryInput { standard_be: -0.58, hb_g_dl: 14.0, saturation: 0.97 };
    Exactly { chemistry: Chemistry::new(input).expect("normal blood has a curve"), patient: MAN_70_KG }
}

fn step(at_min: f64, rate_per_min: f64, tidal_volume_ml: f64) -> Step {
    Step { at_min, rate_per_min, tidal_volume_ml, apparatus_ml: None, production_factor: 1.0, jump_sd: 0.0 }
}

fn priors(exactly: &Exactly, dead_space: f64, steps: &[Step]) -> Priors {
    let measured = Exact {
        vco2_ml_min: Some(200.0),
        dead_space_fraction: Some(dead_space),
        cardiac_output_l_min: Some(5.0),
        frc_ml: None,
        without_spread: true,
    };
    Priors::new(&exactly.patient, true, false, &measured, steps, 0.0)
}

/// The rate at which a breath of 500 mL with VD/VT .33 holds 40 mmHg.
const RATE_AT_40: f64 = 862.93 * 0.200 / 40.0 / (0.5 * 0.67);

#[test]
fn settles_where_the_863_equation_says() {
    let exactly = exactly();
    for minute_volume in [5.0, 7.0, 10.0] {
        for dead_space in [0.3, 0.45, 0.6] {
            let start = step(0.0, RATE_AT_40, 500.0);
            let then = step(1.0, minute_volume / 0.5, 500.0);
            let member = priors(&exactly, dead_space, &[start, then]).at_means(&exactly.chemistry);
            let expected = 760.0 * 310.15 / 273.15 * 0.200 / (minute_volume * (1.0 - dead_space));
            let settled = member.course(&exactly.chemistry, 3000.0, 1).paco2_at(3000.0);
            println!("VE {minute_volume} VD/VT {dead_space}: {settled:.3} mmHg, 863 equation {expected:.3}");
            assert!((settled - expected).abs() < EQUATION_MMHG, "{settled} {expected}");
        }
    }
}

#[test]
fn co2_is_conserved() {
    let exactly = exactly();
    let steps = [
        step(0.0, RATE_AT_40, 500.0),
        step(5.0, 30.0, 500.0),
        step(40.0, 6.0, 450.0),
        step(90.0, 14.0, 600.0),
    ];
    let member = priors(&exactly, 0.33, &steps).at_means(&exactly.chemistry);
    let start = member.start(&exactly.chemistry);
    for minutes in [1.0, 10.0, 60.0, 240.0] {
        let end = member.course(&exactly.chemistry, minutes, 1).end;
        let made = 200.0 * minutes;
        let error = (end.total_ml() - start.total_ml() - made).abs() / made;
        println!("{minutes} min: error {error:.1e} of what was made");
        assert!(error < CONSERVED);
    }
}

#[test]
fn the_result_does_not_depend_on_the_step() {
    let exactly = exactly();
    for (rate, volume) in [(2.0 * RATE_AT_40, 500.0), (0.5 * RATE_AT_40, 500.0), (0.0, 500.0), (35.0, 700.0)]
    {
        let steps = [step(0.0, RATE_AT_40, 500.0), step(5.0, rate, volume)];
        let member = priors(&exactly, 0.33, &steps).at_means(&exactly.chemistry);
        let end = if rate > 0.0 { 240.0 } else { 15.0 };
        let (once, eighth) =
            (member.course(&exactly.chemistry, end, 1), member.course(&exactly.chemistry, end, 8));
        let mut worst = 0.0_f64;
        let mut minute = 5.0;
        while minute < end {
            worst = worst.max((once.paco2_at(minute) - eighth.paco2_at(minute)).abs());
            minute += 0.05;
        }
        println!(
            "rate {rate:.1}: {} moments, worst {worst:.4} mmHg against steps an eighth as long",
            once.points().count()
        );
        assert!(worst < STEP_MMHG);
    }
}

#[test]
fn a_body_scaled_as_a_whole_keeps_its_paco2() {
    let exactly = exactly();
    let steps = [step(0.0, RATE_AT_40, 500.0), step(5.0, 25.0, 500.0)];
    let member = priors(&exactly, 0.33, &steps).at_means(&exactly.chemistry);
    for factor in [0.3, 2.0] {
        let scaled = member.scaled(factor).course(&exactly.chemistry, 120.0, 1);
        let plain = member.course(&exactly.chemistry, 120.0, 1);
        for minute in [0.0, 6.0, 10.0, 30.0, 120.0] {
            let (a, b) = (scaled.paco2_at(minute), plain.paco2_at(minute));
            assert!((a / b - 1.0).abs() < SCALING, "{factor} {minute}: {a} {b}");
        }
    }
}

#[test]
fn half_times_of_a_70_kg_man() {
    // Ranges: Nunn's half-times of about 3 and 16 min (from memory) and the 90 % times computed from published
    // volumes and flows with the store sizes that fit man.
    let exactly = exactly();
    for (factor, half, ninety) in [(2.0, (3.0, 5.0), (20.0, 38.0)), (0.5, (14.0, 22.0), (50.0, 85.0))] {
        let steps = [step(0.0, RATE_AT_40, 500.0), step(1.0, factor * RATE_AT_40, 500.0)];
        let member = priors(&exactly, 0.33, &steps).at_means(&exactly.chemistry);
        let settled = member.inputs()[1].drive.settled_mmhg();
        let course = member.course(&exactly.chemistry, 1000.0, 1);
        let (at_half, at_ninety) = (
            minutes_to_share(&course, 1.0, settled, 0.5).unwrap(),
            minutes_to_share(&course, 1.0, settled, 0.9).unwrap(),
        );
        println!("alveolar ventilation × {factor}: half-time {at_half:.1} min, 90 % at {at_ninety:.1} min");
        assert!(at_half > half.0 && at_half < half.1, "{at_half}");
        assert!(at_ninety > ninety.0 && at_ninety < ninety.1, "{at_ninety}");
    }
}

#[test]
fn the_in_vivo_line() {
    // HCO3 gained per 10 mmHg from 40 to 80 at one standard base excess: 0.9–1.0 mmol/L.
    let be = physiology::standard_base_excess(7.40, 40.0);
    let hco3 = |p: f64| physiology::hco3_mmol_l(physiology::ph_at(p, be), p);
    let line = (hco3(80.0) - hco3(40.0)) / 4.0;
    println!("in vivo line {line:.3} mmol/L per 10 mmHg");
    assert!((0.9..=1.0).contains(&line));
}

#[test]
fn finite_from_5_to_160_kg() {
    for kg in [5.0, 12.0, 40.0, 70.0, 160.0] {
        for age in [0.2, 4.0, 12.0, 30.0, 90.0] {
            for (rate, volume) in [(2.0, 15.0), (80.0, 15.0), (2.0, 2000.0), (80.0, 2000.0), (20.0, 6.0 * kg)]
            {
                for be in [-28.0, 0.0, 25.0] {
                    let patient = Patient { age_years: Some(age), weight_kg: Some(kg), ..Patient::default() };
                    let input = ChemistryInput { standard_be: be, hb_g_dl: 12.0, saturation: 0.95 };
                    let chemistry = Chemistry::new(input).unwrap();
                    let steps = [step(0.0, 20.0, 6.0 * kg), step(30.0, rate, volume)];
                    let priors = Priors::new(&patient, true, false, &Exact::default(), &steps, 0.1);
                    let course = priors.at_means(&chemistry).course(&chemistry, 300.0, 1);
                    for (minute, paco2) in course.points() {
                        assert!(
                            paco2.is_finite() && paco2 >= 0.0,
                            "{kg} kg {age} y {rate}×{volume} BE {be} at {minute}: {paco2}"
                        );
                    }
                }
            }
        }
    }
}
