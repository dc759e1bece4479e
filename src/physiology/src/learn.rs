//! Learning from gases: the most likely body by Gauss–Newton, then members drawn around it, each weighed by
//! how well it fits. Where too few carry the weight the proposal is matched to what they found and all are
//! drawn and weighed anew. Members are never resampled: with a few gases that collapses onto a handful.

use std::sync::Arc;

use libm::{exp, log, sqrt};
use sources as s;

use crate::Chemistry;
use crate::course::Schedule;
use crate::draws::standard_normals;
use crate::ensemble::{EXTRA, Ensemble};
use crate::linear::{backward, cholesky, forward};
use crate::priors::{JUMP_FIRST, Member, Priors};
use crate::proposal::Proposal;

/// Gauss–Newton stops after this many passes.
const PASSES: usize = 4;

/// Longest step of a pass, in standard deviations of the prior: farther the model is no longer straight.
const LONGEST_STEP: f64 = 3.0;

/// A pass that moves less than this, in standard deviations, is the last: members are weighed by what they
/// truly fit, so the mode need not be exact.
const STEP_DONE: f64 = 0.02;

/// Times that the proposal is matched to what the members found, at most.
const MATCHES: usize = 2;

/// Share of effective members that needs no better proposal.
const ENOUGH: f64 = 0.5;

/// Difference for the slopes, in standard deviations: large against rounding, small against curvature.
const DIFFERENCE: f64 = 1e-3;

/// Difference for the bend: a second difference needs a longer one.
const BEND_DIFFERENCE: f64 = 0.05;

/// A PaCO2 that was measured.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Observation {
    /// When, min.
    pub at_min: f64,
    /// PaCO2, mmHg.
    pub paco2_mmhg: f64,
    /// Error as a spread of ln.
    pub ln_sd: f64,
}

/// What is learnt from.
#[derive(Debug, Clone, Copy)]
pub struct Learning<'a> {
    /// Everything known before a gas.
    pub priors: &'a Priors,
    /// The patient's CO2 curve.
    pub chemistry: &'a Chemistry,
    /// The gases, in order.
    pub observations: &'a [Observation],
}

/// Why nothing was learnt.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum NoMode {
    /// The system of a pass is singular or a value is not finite.
    #[error("no body inside the priors fits these gases and settings. Check the numbers typed.")]
    Singular,
    /// Too few members carry the weight.
    #[error(
        "too few simulated bodies fit these gases ({0} of the 64 needed). Check the numbers typed, or start again from a new gas."
    )]
    TooFew(usize),
}

impl Learning<'_> {
    /// Learns. Same seed, same bits.
    ///
    /// # Errors
    /// [`NoMode`] when no mode is found or fewer than 64 members (a quarter of them when fewer than 256 are
    /// asked for) carry the weight.
    pub fn ensemble(&self, members: usize, seed: u32) -> Result<Ensemble, NoMode> {
        let last = self.observations.iter().map(|o| o.at_min).reduce(f64::max);
        let schedule = last.map(|last| self.priors.schedule(last));
        Fit { learning: *self, schedule }.ensemble(members, seed)
    }
}

impl Learning<'_> {
    /// How far the first gas lies from what was expected before it, in standard deviations of ln; 0 without one.
    #[must_use]
    pub fn surprise(&self, members: usize, seed: u32) -> f64 {
        let Some(first) = self.observations.first() else { return 0.0 };
        let schedule = self.priors.schedule(first.at_min);
        let n = self.priors.dimensions();
        let logs: Vec<f64> = standard_normals(members, n, seed)
            .iter()
            .map(|row| self.priors.drawn(row, self.chemistry).course_over(self.chemistry, &schedule))
            .map(|course| log(course.paco2_at(first.at_min)))
            .collect();
        let count = logs.len() as f64;
        let mean = logs.iter().sum::<f64>() / count;
        let variance = logs.iter().map(|l| (l - mean) * (l - mean)).sum::<f64>() / count;
        (log(first.paco2_mmhg) - mean) / sqrt(variance + first.ln_sd * first.ln_sd)
    }
}

/// What is learnt from, with the solver's moments up to the last gas; none without one.
struct Fit<'a> {
    learning: Learning<'a>,
    schedule: Option<Arc<Schedule>>,
}

impl Fit<'_> {
    fn ensemble(&self, members: usize, seed: u32) -> Result<Ensemble, NoMode> {
        let (mode, root) = self.mode()?;
        let n = mode.len();
        let draws = standard_normals(members, n + EXTRA, seed);
        let informed = informed(&root);
        let mut cloud = self.cloud(&Proposal::around_mode(&informed), (&mode, &root), &draws)?;
        for _ in 0..MATCHES {
            if cloud.effective >= ENOUGH * members as f64 {
                break;
            }
            let Some(proposal) =
                Proposal::matching(&cloud.points, &cloud.weights, cloud.effective, &informed)
            else {
                break;
            };
            let next = self.cloud(&proposal, (&mode, &root), &draws)?;
            if next.effective <= cloud.effective {
                break;
            }
            cloud = next;
        }
        let quarter = 0.25 * members as f64;
        let least = if quarter < s::MEMBERS_LEAST.value { quarter } else { s::MEMBERS_LEAST.value };
        if cloud.effective < least {
            return Err(NoMode::TooFew(cloud.effective as usize));
        }
        let extra = draws.iter().map(|row| [row[n], row[n + 1]]).collect();
        let Cloud { members, weights, effective, .. } = cloud;
        Ok(Ensemble { members, weights, extra, chemistry: self.learning.chemistry.clone(), effective })
    }

    /// Members drawn from `proposal` (in the axes of the mode's curvature), each weighed once.
    fn cloud(
        &self,
        proposal: &Proposal,
        mode: (&[f64], &[Vec<f64>]),
        draws: &[Vec<f64>],
    ) -> Result<Cloud, NoMode> {
        let n = mode.0.len();
        let mut members = Vec::with_capacity(draws.len());
        let mut log_weights = Vec::with_capacity(draws.len());
        let mut points = Vec::with_capacity(draws.len());
        for row in draws {
            let xi = &row[..n];
            let point = proposal.point(xi);
            let u: Vec<f64> = mode.0.iter().zip(backward(mode.1, &point)).map(|(m, o)| m + o).collect();
            let member = self.learning.priors.member(&u, Some(self.learning.chemistry));
            log_weights.push(0.5 * (square(xi) - square(&self.residuals(&u, &member))));
            members.push(member);
            points.push(point);
        }
        let weights = normalised(&log_weights).ok_or(NoMode::Singular)?;
        let effective = 1.0 / square(&weights);
        Ok(Cloud { members, weights, points, effective })
    }

    /// The most likely point and the Cholesky factor of the curvature there.
    fn mode(&self) -> Result<(Vec<f64>, Vec<Vec<f64>>), NoMode> {
        let n = self.learning.priors.dimensions();
        let mut u = vec![0.0; n];
        for _ in 0..PASSES {
            let (gradient, curvature) = self.linearised(&u);
            let l = cholesky(&curvature).ok_or(NoMode::Singular)?;
            let mut step = backward(&l, &forward(&l, &gradient));
            let length = sqrt(square(&step));
            if !length.is_finite() {
                return Err(NoMode::Singular);
            }
            if length > LONGEST_STEP {
                step.iter_mut().for_each(|s| *s *= LONGEST_STEP / length);
            }
            u.iter_mut().zip(&step).for_each(|(u, s)| *u -= s);
            if length < STEP_DONE {
                break;
            }
        }
        let (_, mut curvature) = self.linearised(&u);
        let plain = cholesky(&curvature).ok_or(NoMode::Singular)?;
        self.add_bend_of_production(&u, &mut curvature);
        Ok((u, cholesky(&curvature).unwrap_or(plain)))
    }

    /// Adds what Gauss–Newton leaves out where it matters: far from its prior the production's residual bends
    /// with the dead spaces, and members drawn without that bend carry little weight. No body is run for it.
    fn add_bend_of_production(&self, u: &[f64], curvature: &mut [Vec<f64>]) {
        let residual = |moves: [(usize, f64); 2]| {
            let mut moved = u.to_vec();
            moves.iter().for_each(|(i, by)| moved[*i] += by);
            self.learning.priors.member(&moved, None).production_residual
        };
        let here = residual([(0, 0.0), (0, 0.0)]);
        let d = BEND_DIFFERENCE;
        for (i, row) in curvature.iter_mut().enumerate().take(JUMP_FIRST) {
            for (j, cell) in row.iter_mut().enumerate().take(JUMP_FIRST) {
                let same = residual([(i, d), (j, d)]) + residual([(i, -d), (j, -d)]);
                let crossed = residual([(i, d), (j, -d)]) + residual([(i, -d), (j, d)]);
                *cell += here * (same - crossed) / (4.0 * d * d);
            }
        }
    }

    /// Jᵀr and JᵀJ at `u`.
    fn linearised(&self, u: &[f64]) -> (Vec<f64>, Vec<Vec<f64>>) {
        let n = u.len();
        let here = self.residuals(u, &self.learning.priors.member(u, Some(self.learning.chemistry)));
        let mut moved = u.to_vec();
        let columns: Vec<Vec<f64>> = (0..n)
            .map(|i| {
                moved[i] = u[i] + DIFFERENCE;
                let there = self
                    .residuals(&moved, &self.learning.priors.member(&moved, Some(self.learning.chemistry)));
                moved[i] = u[i];
                there.iter().zip(&here).map(|(a, b)| (a - b) / DIFFERENCE).collect()
            })
            .collect();
        let dot = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(x, y)| x * y).sum::<f64>();
        let gradient = columns.iter().map(|c| dot(c, &here)).collect();
        let curvature = columns.iter().map(|a| columns.iter().map(|b| dot(a, b)).collect()).collect();
        (gradient, curvature)
    }

    /// Prior residuals, then (ln model − ln measured)/error of each gas.
    fn residuals(&self, u: &[f64], member: &Member) -> Vec<f64> {
        let mut residuals = u.to_vec();
        residuals[0] = member.production_residual;
        if let Some(schedule) = &self.schedule {
            let course = member.course_over(self.learning.chemistry, schedule);
            residuals.extend(
                self.learning
                    .observations
                    .iter()
                    .map(|o| (log(course.paco2_at(o.at_min)) - log(o.paco2_mmhg)) / o.ln_sd),
            );
        }
        residuals
    }
}

/// Which coordinates the gases say something about: where the curvature differs from the prior's own, 1.
fn informed(root: &[Vec<f64>]) -> Vec<bool> {
    /// Less than this is rounding of the slopes.
    const NOTHING: f64 = 1e-6;
    let n = root.len();
    let touched =
        |i: usize| (0..n).any(|k| k != i && (root[i][k].abs() > NOTHING || root[k][i].abs() > NOTHING));
    (0..n).map(|i| (root[i][i] - 1.0).abs() > NOTHING || touched(i)).collect()
}

/// Members of one proposal.
struct Cloud {
    members: Vec<Member>,
    weights: Vec<f64>,
    points: Vec<Vec<f64>>,
    effective: f64,
}

fn square(values: &[f64]) -> f64 {
    values.iter().map(|v| v * v).sum()
}

/// Weights with sum 1 from their logarithms; `None` when none is finite.
fn normalised(logs: &[f64]) -> Option<Vec<f64>> {
    let most = logs.iter().copied().filter(|l| l.is_finite()).reduce(f64::max)?;
    let raw: Vec<f64> = logs.iter().map(|l| if l.is_finite() { exp(l - most) } else { 0.0 }).collect();
    let total: f64 = raw.iter().sum();
    Some(raw.into_iter().map(|w| w / total).collect())
}
