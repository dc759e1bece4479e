//! The step: ROS2, a second-order Rosenbrock method that damps the fastest rate at any length of step
//! (Verwer et al. SIAM J Sci Comput 1999;20:1456, from memory). The system is an arrowhead, solved by hand.
//! Sums of amounts are kept to rounding, since every row of the exchange has its counterpart.

use crate::Chemistry;
use crate::body::{Body, Drive, Pool, State};

/// γ = 1 − 1/√2: L-stable, and the smaller error of the two that are.
const GAMMA: f64 = 1.0 - core::f64::consts::FRAC_1_SQRT_2;

/// First step after a change, min: the fastest pool of a 5 kg child moves at about 15 /min.
const FIRST_STEP_MIN: f64 = 0.02;

/// Each step over the one before: chosen so that halving every step moves PaCO2 by under 0.01 mmHg.
const GROWTH: f64 = 1.06;

/// Longest step, min: long after a change nothing fast is left, and the method damps what is.
const LONGEST_STEP_MIN: f64 = 40.0;

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
        step = if step * GROWTH < LONGEST_STEP_MIN { step * GROWTH } else { LONGEST_STEP_MIN };
    }
    moments
}

/// Rates of change and the parts of the Jacobian that are not zero.
struct Rates {
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
}

#[inline]
fn rates(body: &Body, drive: &Drive, roots: &[f64; 3], chemistry: &Chemistry) -> Rates {
    let pool = |p: &Pool, x: f64| {
        let (f, slope) = chemistry.at(x);
        (
            f,
            slope / (2.0 * p.squared * x + p.root + p.blood_l * slope),
            2.0 * p.squared * x + p.root + p.blood_l * slope,
        )
    };
    let (lung_f, lung_df, lung_slope) = pool(&body.lung, roots[0]);
    let (fast_f, fast_df, _) = pool(&body.fast, roots[1]);
    let (slow_f, slow_df, _) = pool(&body.slow, roots[2]);
    let from_fast = body.flow_fast * (fast_f + body.offset_fast - lung_f);
    let from_slow = body.flow_slow * (slow_f + body.offset_slow - lung_f);
    let washout = drive.washout();
    let exhaled = washout * roots[0] * roots[0];
    Rates {
        lung: from_fast + from_slow - exhaled,
        fast: drive.production_ml_min * body.made_fast - from_fast,
        slow: drive.production_ml_min * (1.0 - body.made_fast) - from_slow,
        exhaled,
        lung_to_fast: body.flow_fast * lung_df,
        lung_to_slow: body.flow_slow * lung_df,
        fast_out: body.flow_fast * fast_df,
        slow_out: body.flow_slow * slow_df,
        washed: washout * 2.0 * roots[0] / lung_slope,
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

fn roots_of(body: &Body, amounts: &[f64; 3], near: &[f64; 3], chemistry: &Chemistry) -> [f64; 3] {
    [
        body.lung.root_for(amounts[0], near[0], chemistry),
        body.fast.root_for(amounts[1], near[1], chemistry),
        body.slow.root_for(amounts[2], near[2], chemistry),
    ]
}

/// One step of `h` minutes.
#[inline]
pub(crate) fn step(body: &Body, drive: &Drive, state: &State, h: f64, chemistry: &Chemistry) -> State {
    let g = GAMMA * h;
    let here = rates(body, drive, &state.roots, chemistry);
    let k1 = solve(&here, g, [here.lung, here.fast, here.slow, here.exhaled]);
    let ahead = [state.amounts[0] + h * k1[0], state.amounts[1] + h * k1[1], state.amounts[2] + h * k1[2]];
    let ahead_roots = roots_of(body, &ahead, &state.roots, chemistry);
    let there = rates(body, drive, &ahead_roots, chemistry);
    let right = [
        there.lung - 2.0 * k1[0],
        there.fast - 2.0 * k1[1],
        there.slow - 2.0 * k1[2],
        there.exhaled - 2.0 * k1[3],
    ];
    let k2 = solve(&here, g, right);
    let moved = |i: usize| h * (1.5 * k1[i] + 0.5 * k2[i]);
    let amounts = [state.amounts[0] + moved(0), state.amounts[1] + moved(1), state.amounts[2] + moved(2)];
    State {
        roots: roots_of(body, &amounts, &ahead_roots, chemistry),
        amounts,
        exhaled: state.exhaled + moved(3),
    }
}

/// Rate of change of PaCO2, mmHg/min.
#[inline]
pub(crate) fn paco2_rate(body: &Body, drive: &Drive, state: &State, chemistry: &Chemistry) -> f64 {
    let slope = body.lung.amount(state.roots[0], chemistry).1;
    2.0 * state.roots[0] * rates(body, drive, &state.roots, chemistry).lung / slope
}
