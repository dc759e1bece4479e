//! The step: ROS3, a third-order Rosenbrock method with three stages and two evaluations that damps the fastest
//! rate at any length of step (Sandu et al. Atmos Environ 1997;31:3459, coefficients from memory and checked by
//! the order they give). The system is an arrowhead, solved by hand. Sums of amounts are kept to rounding, since
//! every row of the exchange has its counterpart.

use crate::Chemistry;
use crate::body::{Body, Drive, Level, State};

/// The method's γ: the root of γ³ − 3γ² + 3γ/2 − 1/6 that makes it L-stable.
const GAMMA: f64 = 0.435_866_521_508_459;
/// Couplings between the stages, times γ.
const C21: f64 = -1.015_617_108_387_770_2 * GAMMA;
const C31: f64 = 4.075_995_645_253_77 * GAMMA;
const C32: f64 = 9.207_679_429_833_079 * GAMMA;
/// Weights of the second and third stage; that of the first is 1.
const M2: f64 = 6.169_794_704_382_824_6;
const M3: f64 = -0.427_722_565_432_185_73;

/// First step after a change, min: the fastest pool of a 5 kg child moves at about 15 /min.
const FIRST_STEP_MIN: f64 = 0.02;

/// Each step over the one before: chosen so that halving every step moves PaCO2 by under 0.01 mmHg.
const GROWTH: f64 = 1.2;

/// The moments from `from_min` to `to_min`, both in it, small steps first. The same for every member.
/// `refine` divides every step, for the check that the result does not depend on them.
pub(crate) fn moments(from_min: f64, to_min: f64, refine: u32) -> Vec<f64> {
    let mut moments = vec![from_min];
    let (mut at, mut step) = (from_min, FIRST_STEP_MIN);
    while at < to_min {
        // A last crumb is joined to the step before it.
        let next = if at + 1.5 * step >= to_min { to_min } else { at + step };
        for part in 1..=refine {
            let last = part == refine;
            moments.push(if last { next } else { at + (next - at) * f64::from(part) / f64::from(refine) });
        }
        at = next;
        // Without an end: long after a change nothing fast is left, and the method damps what is.
        step *= GROWTH;
    }
    moments
}

/// Rates of change and the parts of the Jacobian that are not zero.
pub(crate) struct Rates {
    lung: f64,
    fast: f64,
    slow: f64,
    exhaled: f64,
    /// dF/dA of each pool, times the flow through fast and slow.
    lung_to_fast: f64,
    lung_to_slow: f64,
    fast_out: f64,
    slow_out: f64,
    washed: f64,
    /// Of PaCO2, mmHg/min.
    pub paco2: f64,
}

/// The rates at `levels`.
#[inline]
pub(crate) fn rates(body: &Body, drive: &Drive, levels: &[Level; 3]) -> Rates {
    let [lung, fast, slow] = levels;
    let from_fast = body.flow_fast * (fast.content + body.offset_fast - lung.content);
    let from_slow = body.flow_slow * (slow.content + body.offset_slow - lung.content);
    let washout = drive.washout();
    let exhaled = washout * lung.x * lung.x;
    let lung_rate = from_fast + from_slow - exhaled;
    let per_amount = |level: &Level| level.content_slope / level.amount_slope;
    let lung_per_amount = per_amount(lung);
    let pressure_per_amount = 2.0 * lung.x / lung.amount_slope;
    Rates {
        lung: lung_rate,
        fast: drive.production_ml_min * body.made_fast - from_fast,
        slow: drive.production_ml_min * (1.0 - body.made_fast) - from_slow,
        exhaled,
        lung_to_fast: body.flow_fast * lung_per_amount,
        lung_to_slow: body.flow_slow * lung_per_amount,
        fast_out: body.flow_fast * per_amount(fast),
        slow_out: body.flow_slow * per_amount(slow),
        washed: washout * pressure_per_amount,
        paco2: pressure_per_amount * lung_rate,
    }
}

/// Solves (I − g·J)·k = right side, g = γ·h, by eliminating the two arms of the arrow.
#[inline]
fn solve(r: &Rates, g: f64, right: [f64; 4]) -> [f64; 4] {
    let fast_d = 1.0 + g * r.fast_out;
    let slow_d = 1.0 + g * r.slow_out;
    // Arm rows: −g·lung_to·kL + d·k = right.
    let (fast_w, slow_w) = (g * r.fast_out / fast_d, g * r.slow_out / slow_d);
    let lung_d = 1.0 + g * (r.lung_to_fast + r.lung_to_slow + r.washed)
        - fast_w * g * r.lung_to_fast
        - slow_w * g * r.lung_to_slow;
    let lung = (right[0] + fast_w * right[1] + slow_w * right[2]) / lung_d;
    let fast = (right[1] + g * r.lung_to_fast * lung) / fast_d;
    let slow = (right[2] + g * r.lung_to_slow * lung) / slow_d;
    [lung, fast, slow, right[3] + g * r.washed * lung]
}

/// The levels after amounts moved by `more`.
#[inline]
fn levels_for(
    body: &Body,
    amounts: &[f64; 3],
    more: &[f64; 3],
    near: &[Level; 3],
    chemistry: &Chemistry,
) -> [Level; 3] {
    [
        body.lung.level_for(amounts[0], more[0], &near[0], chemistry),
        body.fast.level_for(amounts[1], more[1], &near[1], chemistry),
        body.slow.level_for(amounts[2], more[2], &near[2], chemistry),
    ]
}

/// One step of `h` minutes from `state`, where the rates are `here`.
#[inline]
pub(crate) fn step(
    body: &Body,
    drive: &Drive,
    state: &State,
    here: &Rates,
    h: f64,
    chemistry: &Chemistry,
) -> State {
    let g = GAMMA * h;
    let k1 = solve(here, g, here.times(g));
    let first = [k1[0], k1[1], k1[2]];
    let ahead = [state.amounts[0] + k1[0], state.amounts[1] + k1[1], state.amounts[2] + k1[2]];
    let ahead_levels = levels_for(body, &ahead, &first, &state.levels, chemistry);
    let there = rates(body, drive, &ahead_levels).times(g);
    let k2 = solve(here, g, core::array::from_fn(|i| there[i] + C21 * k1[i]));
    let k3 = solve(here, g, core::array::from_fn(|i| there[i] + C31 * k1[i] + C32 * k2[i]));
    let second: [f64; 4] = core::array::from_fn(|i| M2 * k2[i] + M3 * k3[i]);
    let more = [second[0], second[1], second[2]];
    let amounts = [ahead[0] + more[0], ahead[1] + more[1], ahead[2] + more[2]];
    let levels = levels_for(body, &amounts, &more, &ahead_levels, chemistry);
    State { levels, amounts, exhaled: state.exhaled + k1[3] + second[3] }
}

impl Rates {
    fn times(&self, g: f64) -> [f64; 4] {
        [g * self.lung, g * self.fast, g * self.slow, g * self.exhaled]
    }
}
