//! `cargo xtask calibrate`: are the bands honest on simulated patients? Patients are drawn from the priors,
//! gases from them with measurement error, settings change after each gas; the forecast made after one,
//! three and ten gases is compared with what the patient then truly does.

use std::sync::atomic::{AtomicUsize, Ordering};

use anyhow::{Result, bail, ensure};
use bedside::{Anchor, Members, members_at, reading_95, summarise};
use physiology::{
    Chemistry, ChemistryInput, Ensemble, Exact, Future, Learning, Member, Observation, Patient, Priors, Sex,
    Step, normal_quantile, ph_at, predicted_body_weight_kg, standard_base_excess, weighted_quantiles,
};
use pico_args::Arguments;
use sources as s;

use crate::workspace::nothing_else;

/// Patients when none are asked for: a cell of the table is then known to 2.3 points (one standard error).
pub const PATIENTS: usize = 300;

/// Gases after which a forecast is judged.
const AFTER_GASES: [usize; 3] = [1, 3, 10];
/// Minutes after the change at which it is judged.
const AT_MINUTES: [f64; 3] = [10.0, 30.0, 60.0];
/// Central bands: their share, their tails.
const BANDS: [(f64, [f64; 2]); 3] = [(50.0, [0.25, 0.75]), (80.0, [0.1, 0.9]), (95.0, [0.025, 0.975])];
/// Points that one cell of the 80 % band may be off: three standard errors of 300 patients.
const CELL_POINTS: f64 = 7.0;
/// Points that the 80 % band may be off over all cells.
const OVERALL_POINTS: f64 = 3.0;
/// Minutes from one change of settings to the gas that follows it, and from that gas to the next change.
const CHANGE_TO_GAS: f64 = 60.0;
const GAS_TO_CHANGE: f64 = 10.0;
/// Members and seed, as in the app.
const MEMBERS: usize = 256;
const SEED: u32 = 1;

/// Runs the command: `--patients N`.
pub fn command(mut arguments: Arguments) -> Result<()> {
    let patients: usize = arguments.opt_value_from_str("--patients")?.unwrap_or(PATIENTS);
    nothing_else(arguments)?;
    ensure!(patients > 0, "--patients must be at least 1");
    run(patients)
}

/// Prints the coverage on `patients` simulated patients.
///
/// # Errors
/// When the 80 % band is off in a cell or over all.
pub fn run(patients: usize) -> Result<()> {
    let results = simulate_all(patients);
    let (flagged, tested) = results.iter().fold((0, 0), |(f, t), r| (f + r.flagged, t + r.tested));
    let failed: usize = results.iter().map(|r| r.withheld).sum();
    println!("{patients} simulated patients, {MEMBERS} members, seed {SEED}.");
    println!("Coverage says nothing about bodies that the model has wrong.\n");
    let paco2 = report("PaCO2, mmHg", &results, |c| &c.paco2);
    let ph = report("pH", &results, |c| &c.ph);
    println!(
        "gases outside their own 95 % band before they were learnt from: {:.1} % of {tested} (5 % expected)",
        100.0 * flagged as f64 / tested as f64
    );
    let effective = median(results.iter().flat_map(|r| r.cells.iter().map(|c| c.effective)).collect());
    println!(
        "effective members: median {effective:.0}; forecasts withheld for want of 64: {failed} of {}",
        patients * AFTER_GASES.len()
    );
    if paco2 && ph {
        println!("every 80 % cell within ±{CELL_POINTS} points and ±{OVERALL_POINTS} over all: yes");
        return Ok(());
    }
    bail!("an 80 % band is off by more than ±{CELL_POINTS} points in a cell or ±{OVERALL_POINTS} over all")
}

/// One judged forecast.
struct Cell {
    gases: usize,
    minute: f64,
    paco2: Judged,
    ph: Judged,
    effective: f64,
}

/// Which bands held the truth, and how wide the 80 % band was.
struct Judged {
    held: [bool; 3],
    width: f64,
}

struct Patientwise {
    cells: Vec<Cell>,
    flagged: usize,
    tested: usize,
    withheld: usize,
}

fn simulate_all(patients: usize) -> Vec<Patientwise> {
    let next = AtomicUsize::new(0);
    let workers = std::thread::available_parallelism().map_or(1, usize::from);
    let mut all: Vec<(usize, Patientwise)> = std::thread::scope(|scope| {
        let handles: Vec<_> = (0..workers)
            .map(|_| {
                scope.spawn(|| {
                    let mut mine = Vec::new();
                    loop {
                        let number = next.fetch_add(1, Ordering::Relaxed);
                        if number >= patients {
                            return mine;
                        }
                        mine.push((number, simulate(number as u64)));
                    }
                })
            })
            .collect();
        handles.into_iter().flat_map(|h| h.join().unwrap_or_default()).collect()
    });
    all.sort_by_key(|(number, _)| *number);
    all.into_iter().map(|(_, result)| result).collect()
}

/// A patient with everything that is true of him.
struct Truth {
    patient: Patient,
    steps: Vec<Step>,
    gases: Vec<Drawn>,
    member: Member,
    standard_be: f64,
    hb: f64,
    hb_typed: Option<f64>,
}

/// A gas as the analyser read it.
#[derive(Clone, Copy)]
struct Drawn {
    at_min: f64,
    paco2_mmhg: f64,
    ph: f64,
}

fn simulate(number: u64) -> Patientwise {
    let truth = Truth::draw(&mut Draws::new(number));
    let mut result = Patientwise { cells: vec![], flagged: 0, tested: 0, withheld: 0 };
    for count in 1..=truth.gases.len() {
        // The change after this gas is already in the steps: its jump is a coordinate like the others.
        let change_at = truth.gases[count - 1].at_min + GAS_TO_CHANGE;
        let Some(ensemble) = truth.learn(count, change_at) else {
            result.withheld += usize::from(AFTER_GASES.contains(&count));
            continue;
        };
        let past = ensemble.past(change_at);
        let futures = ensemble.futures(&past, change_at + CHANGE_TO_GAS + GAS_TO_CHANGE, None);
        if let Some(gas) = truth.gases.get(count) {
            let (low, high) = reading_95(&futures, gas.at_min);
            result.tested += 1;
            result.flagged += usize::from(gas.paco2_mmhg < low || gas.paco2_mmhg > high);
        }
        if AFTER_GASES.contains(&count) {
            result.cells.extend(truth.judge(count, change_at, &futures, ensemble.effective()));
        }
    }
    result
}

impl Truth {
    fn draw(draws: &mut Draws) -> Self {
        let sex = if draws.uniform() < 0.5 { Sex::Female } else { Sex::Male };
        let height = if sex == Sex::Male { 176.0 } else { 163.0 } + 7.0 * draws.normal();
        let metres = height / 100.0;
        let weight = (27.0 + 5.0 * draws.normal()).max(17.0) * metres * metres;
        let patient = Patient {
            sex: Some(sex),
            age_years: Some(20.0 + 65.0 * draws.uniform()),
            height_cm: Some(height),
            height_guessed: false,
            weight_kg: Some(weight),
        };
        let (steps, gas_at) = history(draws, &patient);
        let hb = (12.0 + 2.0 * draws.normal()).max(6.0);
        let standard_be = 4.0 * draws.normal();
        let chemistry = curve(standard_be, hb);
        let priors = with_jumps(&patient, steps);
        let normals: Vec<f64> = (0..priors.dimensions()).map(|_| draws.normal()).collect();
        let member = priors.drawn(&normals, &chemistry);
        let course = member.course(&chemistry, gas_at[gas_at.len() - 1], 1);
        let gases = gas_at
            .iter()
            .map(|&at_min| {
                let true_paco2 = course.paco2_at(at_min);
                Drawn {
                    at_min,
                    paco2_mmhg: true_paco2 * libm::exp(s::ANALYSER_PACO2.spread * draws.normal()),
                    ph: ph_at(true_paco2, standard_be) + s::ANALYSER_PH.spread * draws.normal(),
                }
            })
            .collect();
        let hb_typed = (draws.uniform() < 0.5).then_some(hb);
        Self { patient, steps: priors.steps().to_vec(), gases, member, standard_be, hb, hb_typed }
    }

    /// Learns from the first `count` gases, with every step up to `change_at` known.
    fn learn(&self, count: usize, change_at: f64) -> Option<Ensemble> {
        let known: Vec<Step> = self.steps.iter().copied().filter(|step| step.at_min <= change_at).collect();
        let priors = with_jumps(&self.patient, known);
        let last = self.gases[count - 1];
        let measured_be = standard_base_excess(last.ph, last.paco2_mmhg);
        let chemistry = curve(measured_be, self.hb_typed.unwrap_or(s::HB_UNKNOWN.value));
        let observations: Vec<Observation> = self.gases[..count]
            .iter()
            .map(|g| Observation {
                at_min: g.at_min,
                paco2_mmhg: g.paco2_mmhg,
                ln_sd: s::ANALYSER_PACO2.spread,
            })
            .collect();
        let learning = Learning { priors: &priors, chemistry: &chemistry, observations: &observations };
        learning.ensemble(MEMBERS, SEED).ok()
    }

    fn judge(&self, gases: usize, change_at: f64, futures: &[Future<'_>], effective: f64) -> Vec<Cell> {
        let last = self.gases[gases - 1];
        let anchor = Anchor { at_min: last.at_min, ph: last.ph };
        let chemistry = curve(self.standard_be, self.hb);
        let horizon = change_at + AT_MINUTES[AT_MINUTES.len() - 1];
        let truth = self.member.course(&chemistry, horizon, 1);
        let shown = summarise(futures, &anchor, change_at, &AT_MINUTES);
        AT_MINUTES
            .iter()
            .enumerate()
            .map(|(i, &minute)| {
                let paco2 = truth.paco2_at(change_at + minute);
                let Members { paco2: members, ph: phs } = members_at(futures, &anchor, change_at + minute);
                let width = |q: Option<bedside::Quantiles>| q.map_or(f64::NAN, |q| q.p90 - q.p10);
                Cell {
                    gases,
                    minute,
                    paco2: Judged { held: held(members, paco2), width: width(shown.paco2_mmhg.at(i)) },
                    ph: Judged {
                        held: held(phs, ph_at(paco2, self.standard_be)),
                        width: width(shown.ph.at(i)),
                    },
                    effective,
                }
            })
            .collect()
    }
}

/// A course of settings: lung-protective breaths at a rate, changed after each gas.
fn history(draws: &mut Draws, patient: &Patient) -> (Vec<Step>, Vec<f64>) {
    let (Some(sex), Some(height)) = (patient.sex, patient.height_cm) else { return (vec![], vec![]) };
    let kg = predicted_body_weight_kg(sex, height);
    let mut rate = 14.0 + 8.0 * draws.uniform();
    let mut volume = (6.0 + 2.0 * draws.uniform()) * kg;
    let step = |at_min, rate_per_min, tidal_volume_ml| Step {
        at_min,
        rate_per_min,
        tidal_volume_ml,
        apparatus_ml: None,
        production_factor: s::ENERGY_MODERATE.value,
        jump_sd: 0.0,
    };
    let mut steps = vec![step(0.0, rate, volume)];
    let mut gases = vec![30.0];
    for _ in 0..AFTER_GASES[AFTER_GASES.len() - 1] {
        let change_at = gases[gases.len() - 1] + GAS_TO_CHANGE;
        // Up or down by up to two fifths, inside what a ventilator is set to.
        let wanted = rate * (0.6 + 0.9 * draws.uniform());
        rate = wanted.clamp(8.0, 35.0);
        if draws.uniform() < 0.3 {
            volume = (6.0 + 2.0 * draws.uniform()) * kg;
        }
        steps.push(step(change_at, rate, volume));
        gases.push(change_at + CHANGE_TO_GAS);
    }
    (steps, gases)
}

/// Priors over `steps`, each with the jump that its size brings.
fn with_jumps(patient: &Patient, steps: Vec<Step>) -> Priors {
    let make =
        |steps: &[Step]| Priors::new(patient, true, false, &Exact::default(), steps, s::START_OFFSET.spread);
    let without = make(&steps);
    make(&without.with_jumps(steps))
}

/// The curve of blood at this base excess; bodies drawn here are inside what it can be made for.
fn curve(standard_be: f64, hb_g_dl: f64) -> Chemistry {
    let input = ChemistryInput { standard_be, hb_g_dl, saturation: s::SAO2_UNKNOWN.value };
    match Chemistry::new(input) {
        Ok(chemistry) => chemistry,
        Err(error) => panic!("a simulated patient's blood: {error}"),
    }
}

fn held(mut members: Vec<(f64, f64)>, truth: f64) -> [bool; 3] {
    BANDS.map(|(_, tails)| {
        let [low, high] = weighted_quantiles(&mut members, tails);
        truth >= low && truth <= high
    })
}

/// Prints one quantity's table; true when its 80 % band is honest.
fn report(name: &str, results: &[Patientwise], of: impl Fn(&Cell) -> &Judged) -> bool {
    println!("{name}: share of patients inside the band, %");
    println!(
        "{:>6} {:>7} {:>7} {:>7} {:>7} {:>14}",
        "gases", "minute", "50 %", "80 %", "95 %", "median width"
    );
    let share = |cells: &[&Judged], band: usize| {
        100.0 * cells.iter().filter(|j| j.held[band]).count() as f64 / cells.len() as f64
    };
    let all: Vec<&Cell> = results.iter().flat_map(|r| &r.cells).collect();
    let mut honest = true;
    for gases in AFTER_GASES {
        for minute in AT_MINUTES {
            let cells: Vec<&Judged> =
                all.iter().filter(|c| c.gases == gases && c.minute == minute).map(|c| of(c)).collect();
            let shares = [share(&cells, 0), share(&cells, 1), share(&cells, 2)];
            honest &= (shares[1] - BANDS[1].0).abs() <= CELL_POINTS;
            let width = median(cells.iter().map(|j| j.width).collect());
            println!(
                "{gases:>6} {minute:>7.0} {:>7.1} {:>7.1} {:>7.1} {width:>14.3}",
                shares[0], shares[1], shares[2]
            );
        }
    }
    let cells: Vec<&Judged> = all.iter().map(|c| of(c)).collect();
    let overall = share(&cells, 1);
    println!("{:>14} {:>7.1} {overall:>7.1} {:>7.1}\n", "over all", share(&cells, 0), share(&cells, 2));
    honest && (overall - BANDS[1].0).abs() <= OVERALL_POINTS
}

fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    values.get(values.len() / 2).copied().unwrap_or(f64::NAN)
}

/// Independent draws for one patient; the same number gives the same patient.
struct Draws(fastrand::Rng);

impl Draws {
    fn new(patient: u64) -> Self {
        Self(fastrand::Rng::with_seed(0x51AC_0000 + patient))
    }

    fn uniform(&mut self) -> f64 {
        self.0.f64()
    }

    fn normal(&mut self) -> f64 {
        // Never exactly 0, where the quantile has no end.
        normal_quantile(self.uniform().max(f64::EPSILON))
    }
}
