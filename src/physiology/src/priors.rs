//! From a point in the space of unknowns to a body with its drives. Every coordinate is a standard normal
//! before a gas, but the first: that one is ln R, R = VCO2/(1 − VD/VT), the one thing a settled gas measures.
//! The prior stays on production and dead spaces; taking ln R as a coordinate only turns the axes.

use std::sync::Arc;

use libm::{exp, log};
use sources as s;

use crate::body::{Body, Drive, Pool, State};
use crate::course::{Input, Schedule};
use crate::person::Patient;
use crate::{Chemistry, Course};

const RATIO: usize = 0;
const SERIES: usize = 1;
const ALVEOLAR: usize = 2;
const APPARATUS: usize = 3;
const STORE: usize = 4;
const FLOW_SPLIT: usize = 5;
const MADE_SPLIT: usize = 6;
const OUTPUT: usize = 7;
const FRC: usize = 8;
const LUNG_BLOOD: usize = 9;
const SIZE: usize = 10;
const OFFSET: usize = 11;

/// First of the coordinates that are jumps of ln R, one a real change of settings.
pub const JUMP_FIRST: usize = 12;

/// Nobody is taken to start settled above this, mmHg: a member that would has no weight after its gas.
const HIGHEST_START_MMHG: f64 = 250.0;

/// Settings, and what else drives the body, from a minute on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Step {
    /// From when, min.
    pub at_min: f64,
    /// Breaths a minute; 0 while nobody breathes.
    pub rate_per_min: f64,
    /// Volume of each, mL BTPS.
    pub tidal_volume_ml: f64,
    /// Exchanger, mount and tubing, mL, where typed.
    pub apparatus_ml: Option<f64>,
    /// Factor on the resting production.
    pub production_factor: f64,
    /// Spread of the jump of ln R that comes with this step; 0 for none.
    pub jump_sd: f64,
}

/// What somebody measured; taken with its error, or exactly.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Exact {
    /// CO2 production, mL/min STPD, at the first step.
    pub vco2_ml_min: Option<f64>,
    /// Dead space over tidal volume at the first step.
    pub dead_space_fraction: Option<f64>,
    /// Cardiac output, L/min.
    pub cardiac_output_l_min: Option<f64>,
    /// Functional residual capacity, mL BTPS.
    pub frc_ml: Option<f64>,
    /// Without spread, for comparison with an outside model; stores and splits then stand at their means.
    pub without_spread: bool,
}

/// A mean and a spread of ln, except where said.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Prior {
    mean: f64,
    sd: f64,
}

/// The means of what is assumed before a gas.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Means {
    /// CO2 production at the first step, mL/min STPD.
    pub production_ml_min: f64,
    /// Series dead space without the apparatus, mL.
    pub series_ml: f64,
    /// Alveolar dead space as a share of what passes the series one.
    pub alveolar_dead_share: f64,
    /// Cardiac output, L/min.
    pub cardiac_output_l_min: f64,
    /// Whether the apparatus dead space was not typed and stands apart.
    pub apparatus_assumed: bool,
    /// Whether the series dead space holds the circuit.
    pub circuit_in_series: bool,
}

/// Everything known before a gas.
#[derive(Debug, Clone, PartialEq)]
pub struct Priors {
    size: Prior,
    tissue_kg: f64,
    production: Prior,
    series: Prior,
    series_holds_apparatus: bool,
    alveolar_logit: Prior,
    measured_fraction: Option<Prior>,
    output: Prior,
    frc: Prior,
    shape_sd: f64,
    start_offset_sd: f64,
    steps: Vec<Step>,
}

/// A body with its drives, from one point of the space.
#[derive(Debug, Clone, PartialEq)]
pub struct Member {
    pub(crate) body: Body,
    /// Its drive from each step on.
    pub(crate) inputs: Vec<Input>,
    /// ln of the start's PaCO2 over the settled one.
    offset: f64,
    /// Dead space that every breath passes, mL, without the apparatus.
    series_ml: f64,
    apparatus_unknown_ml: f64,
    alveolar_share: f64,
    resting_ml_min: f64,
    /// ln of all jumps so far.
    jumps: f64,
    /// How far the production lies from its prior, in standard deviations.
    pub(crate) production_residual: f64,
}

fn logit(p: f64) -> f64 {
    log(p / (1.0 - p))
}

fn logistic(x: f64) -> f64 {
    1.0 / (1.0 + exp(-x))
}

impl Priors {
    /// The priors of `patient` under `steps` (at least one). `tube`: one in the trachea. `lung_injury` moves the
    /// alveolar dead space to Nuckton's figure. `start_offset_sd` is the spread of ln by which the start may be
    /// off its settled value.
    #[must_use]
    pub fn new(
        patient: &Patient,
        tube: bool,
        lung_injury: bool,
        measured: &Exact,
        steps: &[Step],
        start_offset_sd: f64,
    ) -> Self {
        let size = patient.size();
        let production = patient.production();
        let (frc_ml, frc_sd) = patient.frc_ml();
        let spread = |sd: f64| if measured.without_spread { 0.0 } else { sd };
        let scale = size.lean_kg / s::BODY_REFERENCE.value;
        let typical_output = s::CARDIAC_OUTPUT.value * libm::pow(scale, s::CARDIAC_OUTPUT_POWER.value);
        let first = steps.first().copied().unwrap_or(NO_STEP);
        let apparatus_typed = first.apparatus_ml.is_some();
        let (series_ml, series_sd) = patient.series_dead_space_ml(tube, apparatus_typed);
        let either = |given: Option<f64>, given_sd: f64, mean: f64, sd: f64| match given {
            Some(value) => Prior { mean: value, sd: spread(given_sd) },
            None => Prior { mean, sd: spread(sd) },
        };
        let measured_resting = measured.vco2_ml_min.map(|ml| ml / first.production_factor);
        let series_holds_apparatus = patient.circuit_in_series(tube, apparatus_typed);
        Self {
            size: Prior { mean: size.lean_kg, sd: spread(size.ln_sd) },
            tissue_kg: size.tissue_kg,
            production: either(
                measured_resting,
                s::MEASURED_VCO2.spread,
                production.resting.0,
                production.ln_sd,
            ),
            series: Prior { mean: series_ml, sd: spread(series_sd) },
            series_holds_apparatus,
            alveolar_logit: alveolar_prior(lung_injury, &first, series_ml, spread(1.0)),
            measured_fraction: measured
                .dead_space_fraction
                .map(|mean| Prior { mean, sd: spread(s::MEASURED_VDVT.spread) }),
            output: either(
                measured.cardiac_output_l_min,
                s::MEASURED_CARDIAC_OUTPUT.spread,
                typical_output,
                s::CARDIAC_OUTPUT.spread,
            ),
            frc: either(measured.frc_ml, s::MEASURED_FRC.spread, frc_ml, frc_sd),
            shape_sd: spread(1.0),
            start_offset_sd: spread(start_offset_sd),
            steps: steps.to_vec(),
        }
    }

    /// How many coordinates there are: the fixed ones and one a step with a jump.
    #[must_use]
    pub fn dimensions(&self) -> usize {
        JUMP_FIRST + self.steps.iter().filter(|step| step.jump_sd > 0.0).count()
    }

    /// The solver's moments from the first step to `to_min`.
    pub(crate) fn schedule(&self, to_min: f64) -> Arc<Schedule> {
        let at: Vec<f64> = self.steps.iter().map(|step| step.at_min).collect();
        Arc::new(Schedule::new((at[0], to_min), &at, 1))
    }

    /// The steps.
    #[must_use]
    pub fn steps(&self) -> &[Step] {
        &self.steps
    }

    /// What is assumed before a gas, for whoever shows it.
    #[must_use]
    pub fn means(&self) -> Means {
        let first = self.steps.first().copied().unwrap_or(NO_STEP);
        Means {
            production_ml_min: self.production.mean * first.production_factor,
            series_ml: self.series.mean,
            alveolar_dead_share: logistic(self.alveolar_logit.mean),
            cardiac_output_l_min: self.output.mean,
            apparatus_assumed: first.apparatus_ml.is_none() && !self.series_holds_apparatus,
            circuit_in_series: self.series_holds_apparatus,
        }
    }

    /// Share of the first breath that reaches alveoli which exchange, at the means.
    #[must_use]
    pub fn alveolar_share_at_means(&self) -> f64 {
        let first = self.steps.first().copied().unwrap_or(NO_STEP);
        self.member(&vec![0.0; self.dimensions()], None).alveolar_share_of(&first)
    }

    /// Spread of the jump of ln R between two steps: the whole of it from a ratio of alveolar ventilations of
    /// 1.4 on, less for less, none where nobody breathes.
    #[must_use]
    pub fn jump_sd(&self, before: &Step, after: &Step) -> f64 {
        let member = self.member(&vec![0.0; self.dimensions()], None);
        let (old, new) = (member.alveolar_l_min(before, 0.0), member.alveolar_l_min(after, 0.0));
        if old <= 0.0 || new <= 0.0 {
            return 0.0;
        }
        let size = log(new / old).abs() / log(s::JUMP_FULL_AT.value);
        s::JUMP.spread * if size < 1.0 { size } else { 1.0 }
    }

    /// The same steps, each with the jump that its change from the last breathed step brings.
    #[must_use]
    pub fn with_jumps(&self, mut steps: Vec<Step>) -> Vec<Step> {
        let mut breathed: Option<Step> = None;
        for step in &mut steps {
            step.jump_sd = breathed.map_or(0.0, |before| self.jump_sd(&before, step));
            if step.rate_per_min > 0.0 {
                breathed = Some(*step);
            }
        }
        steps
    }

    /// Alveolar ventilation under `step` at the means, L/min BTPS.
    #[must_use]
    pub fn alveolar_l_min(&self, step: &Step) -> f64 {
        self.member(&vec![0.0; self.dimensions()], None).alveolar_l_min(step, 0.0)
    }

    /// The body at the middle of every prior.
    #[must_use]
    pub fn at_means(&self, chemistry: &Chemistry) -> Member {
        self.member(&vec![0.0; self.dimensions()], Some(chemistry))
    }

    /// The body at a point whose every coordinate is drawn from its prior: for simulated patients. Here the
    /// first is the production's own normal, and is turned into ln R.
    #[must_use]
    pub fn drawn(&self, normals: &[f64], chemistry: &Chemistry) -> Member {
        let mut u = normals.to_vec();
        u[RATIO] = 0.0;
        // ln production moves one for one with ln R, in the same standard deviations.
        u[RATIO] = normals[RATIO] - self.member(&u, None).production_residual;
        self.member(&u, Some(chemistry))
    }

    /// The body at `u`. With a chemistry the Haldane offsets are set, without one they are 0.
    pub(crate) fn member(&self, u: &[f64], chemistry: Option<&Chemistry>) -> Member {
        let size_factor = exp(self.size.sd * u[SIZE]);
        let scale = self.size.mean * size_factor / s::BODY_REFERENCE.value;
        let tissue_scale = self.tissue_kg * size_factor / s::BODY_REFERENCE.value;
        let lognormal = |prior: Prior, z: f64| prior.mean * exp(prior.sd * z);
        let shape = |figure: s::Figure, z: f64| figure.value * exp(self.shape_sd * figure.spread * z);
        let split =
            |figure: s::Figure, z: f64| logistic(logit(figure.value) + self.shape_sd * figure.spread * z);

        let output = lognormal(self.output, u[OUTPUT]) * size_factor;
        let flow_fast = split(s::FLOW_FAST, u[FLOW_SPLIT]);
        let made_fast = split(s::PRODUCTION_FAST, u[MADE_SPLIT]);
        let root =
            2.0 * libm::sqrt(s::TISSUE_SLOPE_AT.value) * shape(s::TISSUE_SLOPE, u[STORE]) * tissue_scale;
        let tissue = |litres: f64, flow_share: f64| Pool {
            squared: 0.0,
            root: root * litres,
            blood_l: s::VENOUS_BLOOD.value * scale * flow_share,
        };
        let frc_ml = lognormal(self.frc, u[FRC]) * size_factor;
        let lung = Pool {
            squared: frc_ml / s::GAS_CONSTANT_FACTOR.value + s::LUNG_TISSUE.value * scale,
            root: 0.0,
            blood_l: shape(s::LUNG_BLOOD, u[LUNG_BLOOD]) * scale,
        };
        let apparatus_sd = s::APPARATUS.spread / s::APPARATUS.value;
        let mut member = Member {
            body: Body {
                lung,
                fast: tissue(s::FAST_TISSUE.value, flow_fast),
                slow: tissue(s::SLOW_TISSUE.value, 1.0 - flow_fast),
                flow_fast: output * flow_fast,
                flow_slow: output * (1.0 - flow_fast),
                made_fast,
                offset_fast: 0.0,
                offset_slow: 0.0,
            },
            inputs: Vec::with_capacity(self.steps.len()),
            offset: self.start_offset_sd * u[OFFSET],
            series_ml: lognormal(self.series, u[SERIES]) * size_factor,
            apparatus_unknown_ml: if self.series_holds_apparatus {
                0.0
            } else {
                s::APPARATUS.value * exp(self.shape_sd * apparatus_sd * u[APPARATUS])
            },
            alveolar_share: 1.0 - logistic(self.alveolar_logit.mean + self.alveolar_logit.sd * u[ALVEOLAR]),
            resting_ml_min: 0.0,
            jumps: 0.0,
            production_residual: u[RATIO],
        };
        self.meet_measured_fraction(&mut member, u);
        self.set_production(&mut member, u, size_factor);
        if let Some(chemistry) = chemistry {
            let factor = self.steps.first().map_or(1.0, |step| step.production_factor);
            set_offsets(&mut member, chemistry, factor);
        }
        self.set_inputs(&mut member, u);
        member
    }

    /// A measured VD/VT takes the place of both dead spaces at the first breath: the alveolar share gives way,
    /// and where the series part alone is larger than what was measured, that.
    fn meet_measured_fraction(&self, member: &mut Member, u: &[f64]) {
        let (Some(measured), Some(first)) = (self.measured_fraction, self.steps.first()) else { return };
        let exchanging = 1.0 - (measured.mean + measured.sd * u[ALVEOLAR]);
        let passes_series = 1.0 - member.dead_before_alveoli_ml(first) / first.tidal_volume_ml;
        if passes_series > exchanging {
            member.alveolar_share = exchanging / passes_series;
        } else {
            member.alveolar_share = 1.0;
            member.series_ml = (1.0 - exchanging) * first.tidal_volume_ml;
            member.apparatus_unknown_ml = 0.0;
        }
    }

    /// Production from R at the first step, and how far that lies from its prior.
    fn set_production(&self, member: &mut Member, u: &[f64], size_factor: f64) {
        let prior_mean = self.production.mean * size_factor;
        if self.production.sd <= 0.0 {
            member.resting_ml_min = prior_mean;
            return;
        }
        let first = self.steps.first().copied().unwrap_or(NO_STEP);
        let share = member.alveolar_share_of(&first);
        // ln R at the means is ln production − ln share there: u = 0 is the prior's middle.
        let ln_ratio = log(self.production.mean) - log(self.share_at_zero()) + self.production.sd * u[RATIO];
        let ln_production = ln_ratio + log(share);
        member.resting_ml_min = exp(ln_production);
        member.production_residual = (ln_production - log(prior_mean)) / self.production.sd;
    }

    /// Alveolar share of the first breath at the middle of every prior.
    fn share_at_zero(&self) -> f64 {
        let first = self.steps.first().copied().unwrap_or(NO_STEP);
        let apparatus = match first.apparatus_ml {
            Some(ml) if !self.series_holds_apparatus => ml,
            _ if self.series_holds_apparatus => 0.0,
            _ => s::APPARATUS.value,
        };
        if let Some(measured) = self.measured_fraction {
            return 1.0 - measured.mean;
        }
        let alveolar = 1.0 - logistic(self.alveolar_logit.mean);
        above_least(1.0 - (self.series.mean + apparatus) / first.tidal_volume_ml) * alveolar
    }

    fn set_inputs(&self, member: &mut Member, u: &[f64]) {
        let mut jump = JUMP_FIRST;
        for step in &self.steps {
            if step.jump_sd > 0.0 {
                member.jumps += step.jump_sd * u[jump];
                jump += 1;
            }
            member.inputs.push(member.input(step, 0.0));
        }
    }
}

/// A step for callers that give none: nobody breathes.
const NO_STEP: Step = Step {
    at_min: 0.0,
    rate_per_min: 0.0,
    tidal_volume_ml: 1.0,
    apparatus_ml: None,
    production_factor: 1.0,
    jump_sd: 0.0,
};

/// A breath no larger than the dead space still moves a little gas; answers that rest on it are withheld by
/// whoever asks.
fn above_least(share: f64) -> f64 {
    let least = s::LEAST_ALVEOLAR_SHARE.value;
    if share > least { share } else { least }
}

fn alveolar_prior(lung_injury: bool, first: &Step, series_ml: f64, shape_sd: f64) -> Prior {
    /// The alveolar share stays inside these whatever the breath: a logit needs both ends open.
    const ENDS: (f64, f64) = (0.05, 0.9);
    let (mean, sd) = if lung_injury {
        let apparatus = first.apparatus_ml.unwrap_or(s::APPARATUS.value);
        let passes = above_least(1.0 - (series_ml + apparatus) / first.tidal_volume_ml);
        let mean = 1.0 - (1.0 - s::VDVT_LUNG_INJURY.value) / passes;
        let inside = if mean < ENDS.0 {
            ENDS.0
        } else if mean > ENDS.1 {
            ENDS.1
        } else {
            mean
        };
        (inside, s::VDVT_LUNG_INJURY.spread / passes)
    } else {
        (s::ALVEOLAR_SHARE.value, s::ALVEOLAR_SHARE.spread)
    };
    Prior { mean: logit(mean), sd: shape_sd * sd / (mean * (1.0 - mean)) }
}

/// Content gained by giving up oxygen: the share of oxygen used in a tissue is its share of production.
fn set_offsets(member: &mut Member, chemistry: &Chemistry, production_factor: f64) {
    let blood = chemistry.input();
    let oxygen_used = member.resting_ml_min * production_factor / s::RQ.value;
    let capacity_ml_l = s::O2_PER_HB.value * blood.hb_g_dl * 10.0;
    let offset = |share: f64, flow: f64| {
        let wanted = oxygen_used * share / (flow * capacity_ml_l);
        // Blood can't give up more oxygen than it carries.
        let given = if wanted < blood.saturation { wanted } else { blood.saturation };
        given * chemistry.haldane_ml_l()
    };
    member.body.offset_fast = offset(member.body.made_fast, member.body.flow_fast);
    member.body.offset_slow = offset(1.0 - member.body.made_fast, member.body.flow_slow);
}

impl Member {
    fn dead_before_alveoli_ml(&self, step: &Step) -> f64 {
        let apparatus = match step.apparatus_ml {
            Some(ml) if self.apparatus_unknown_ml > 0.0 => ml,
            _ => self.apparatus_unknown_ml,
        };
        self.series_ml + apparatus
    }

    fn alveolar_share_of(&self, step: &Step) -> f64 {
        above_least(1.0 - self.dead_before_alveoli_ml(step) / step.tidal_volume_ml) * self.alveolar_share
    }

    fn alveolar_l_min(&self, step: &Step, jumps: f64) -> f64 {
        step.rate_per_min * step.tidal_volume_ml / 1000.0 * self.alveolar_share_of(step) * exp(-jumps)
    }

    /// The drives, one a step.
    #[must_use]
    pub fn inputs(&self) -> &[Input] {
        &self.inputs
    }

    /// Volumes, flows, production and alveolar ventilation multiplied by `factor`: PaCO2 must not notice.
    #[must_use]
    pub fn scaled(&self, factor: f64) -> Member {
        let pool = |p: &Pool| Pool {
            squared: p.squared * factor,
            root: p.root * factor,
            blood_l: p.blood_l * factor,
        };
        let mut scaled = self.clone();
        scaled.body.lung = pool(&self.body.lung);
        scaled.body.fast = pool(&self.body.fast);
        scaled.body.slow = pool(&self.body.slow);
        scaled.body.flow_fast *= factor;
        scaled.body.flow_slow *= factor;
        for input in &mut scaled.inputs {
            input.drive.alveolar_l_min *= factor;
            input.drive.production_ml_min *= factor;
        }
        scaled
    }

    /// The drive from `step` on, with a further jump of ln R.
    #[must_use]
    pub(crate) fn input(&self, step: &Step, further_jump: f64) -> Input {
        Input {
            at_min: step.at_min,
            drive: Drive {
                alveolar_l_min: self.alveolar_l_min(step, self.jumps + further_jump),
                production_ml_min: self.resting_ml_min * step.production_factor,
            },
        }
    }

    /// The state at the start.
    #[must_use]
    pub fn start(&self, chemistry: &Chemistry) -> State {
        let drive = self.inputs[0].drive;
        let settled = drive.settled_mmhg() * exp(self.offset);
        let start = if settled < HIGHEST_START_MMHG { settled } else { HIGHEST_START_MMHG };
        self.body.resting_at(start, drive.production_ml_min, chemistry)
    }

    /// The course from the first step to `to_min`; `refine` (1 in use) divides every step of the solver.
    #[must_use]
    pub fn course(&self, chemistry: &Chemistry, to_min: f64, refine: u32) -> Course {
        let at: Vec<f64> = self.inputs.iter().map(|input| input.at_min).collect();
        self.course_over(chemistry, &Arc::new(Schedule::new((at[0], to_min), &at, refine)))
    }

    /// The course over a schedule made from the moments of its inputs.
    pub(crate) fn course_over(&self, chemistry: &Chemistry, schedule: &Arc<Schedule>) -> Course {
        Course::run(&self.body, chemistry, self.start(chemistry), schedule, &self.inputs)
    }
}
