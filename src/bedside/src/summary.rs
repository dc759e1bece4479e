//! From weighted members to the percentiles that are shown.

use physiology::{
    Future, hco3_mmol_l, minutes_to_share, minutes_to_within, ph_at, sort_weighted, standard_base_excess,
    weighted_quantiles,
};
use sources as s;

use crate::{Band, Forecast, Quantiles, Settled};

/// The edges of what is shown: eight times in ten between the outer two.
const EDGES: [f64; 3] = [0.1, 0.5, 0.9];

/// Nodes and weights of the five-point Gauss–Hermite rule for a standard normal (Abramowitz, Stegun 1964, table
/// 25.10, from memory): each member's reading is spread over them, since with one draw a member the edges of a
/// reading would be ragged.
const ERROR_NODES: [(f64, f64); 5] = [
    (-2.856_970_013_872_806, 0.011_257_411_327_720_7),
    (-1.355_626_179_974_266, 0.222_075_922_005_612_6),
    (0.0, 0.533_333_333_333_333_3),
    (1.355_626_179_974_266, 0.222_075_922_005_612_6),
    (2.856_970_013_872_806, 0.011_257_411_327_720_7),
];

/// The normal quantile of 90 %: eight in ten lie within as many standard deviations.
const EIGHT_IN_TEN: f64 = 1.281_551_565_544_600_4;

/// Eight times in ten an analyser reads PaCO2 within this share of the truth.
pub const PACO2_READ_WITHIN: f64 = EIGHT_IN_TEN * s::ANALYSER_PACO2.spread;

/// The share of the way after which "90 %" is reached.
const NINETY_PERCENT: f64 = 0.9;

/// How far a course is run to see it settle, min: a day.
pub(crate) const SETTLING_MIN: f64 = 1440.0;

/// A gas as the pH of the members hangs on it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Anchor {
    /// When it was drawn, minutes from the start.
    pub at_min: f64,
    /// Its pH.
    pub ph: f64,
}

fn quantiles(mut pairs: Vec<(f64, f64)>) -> Quantiles {
    let [p10, p50, p90] = weighted_quantiles(&mut pairs, EDGES);
    Quantiles { p10, p50, p90 }
}

fn push(band: &mut Band, q: Quantiles) {
    band.p10.push(q.p10);
    band.p50.push(q.p50);
    band.p90.push(q.p90);
}

/// Spreads each (value, weight) over the measurement error, node by node: sorted pairs give sorted runs, which
/// the sort that follows only has to merge.
fn with_error(pairs: &[(f64, f64)], read: impl Fn(f64) -> Reading) -> Vec<(f64, f64)> {
    let mut sorted = pairs.to_vec();
    sort_weighted(&mut sorted);
    let mut spread = Vec::with_capacity(pairs.len() * ERROR_NODES.len());
    for (z, share) in ERROR_NODES {
        let Reading { factor, shift } = read(z);
        spread.extend(sorted.iter().map(|(value, weight)| (value * factor + shift, weight * share)));
    }
    spread
}

/// What an analyser makes of a true value: `factor`·value + `shift`.
struct Reading {
    factor: f64,
    shift: f64,
}

/// A PaCO2 read with an error of `z` standard deviations.
fn read_paco2(z: f64) -> Reading {
    Reading { factor: libm::exp(s::ANALYSER_PACO2.value * z), shift: 0.0 }
}

/// A pH read with an error of `z` standard deviations.
fn read_ph(z: f64) -> Reading {
    Reading { factor: 1.0, shift: s::ANALYSER_PH.value * z }
}

/// Standard base excess of each member: from the gas's pH less its error, at the PaCO2 the member truly had.
fn base_excesses(futures: &[Future], anchor: &Anchor) -> Vec<f64> {
    futures
        .iter()
        .map(|f| standard_base_excess(anchor.ph - read_ph(f.ph_error).shift, f.paco2_at(anchor.at_min)))
        .collect()
}

/// What each member's PaCO2 (mmHg) and pH are at one minute, each with its weight.
#[derive(Debug, Clone, PartialEq)]
pub struct Members {
    /// (PaCO2, weight).
    pub paco2: Vec<(f64, f64)>,
    /// (pH, weight).
    pub ph: Vec<(f64, f64)>,
}

/// The members at `at_min`, before they become percentiles.
#[must_use]
pub fn members_at(futures: &[Future], anchor: &Anchor, at_min: f64) -> Members {
    members(futures, &base_excesses(futures, anchor), at_min)
}

fn members(futures: &[Future], excesses: &[f64], at_min: f64) -> Members {
    let paco2: Vec<(f64, f64)> = futures.iter().map(|f| (f.paco2_at(at_min), f.weight)).collect();
    let ph = paco2.iter().zip(excesses).map(|((p, w), be)| (ph_at(*p, *be), *w)).collect();
    Members { paco2, ph }
}

/// The 95 % band of what a gas at `at_min` would read, mmHg: its lower and upper edge.
#[must_use]
pub fn reading_95(futures: &[Future], at_min: f64) -> (f64, f64) {
    const TAILS: [f64; 2] = [0.025, 0.975];
    let pairs: Vec<(f64, f64)> = futures.iter().map(|f| (f.paco2_at(at_min), f.weight)).collect();
    let [low, high] = weighted_quantiles(&mut with_error(&pairs, read_paco2), TAILS);
    (low, high)
}

/// The forecast at `minutes` after `now_min`, the end of the members' past: the one place where members become percentiles.
#[must_use]
pub fn summarise(futures: &[Future], anchor: &Anchor, now_min: f64, minutes: &[f64]) -> Forecast {
    let excesses = base_excesses(futures, anchor);
    let mut forecast = Forecast {
        minutes: minutes.to_vec(),
        paco2_mmhg: Band::default(),
        ph: Band::default(),
        hco3_mmol_l: Band::default(),
        gas_would_read_paco2_mmhg: Band::default(),
        gas_would_read_ph: Band::default(),
        settled: settled(futures, &excesses),
        minutes_to_within_2_mmhg: duration(futures, |f| {
            minutes_to_within(&f.course, now_min, f.settled_mmhg, s::SETTLED_WITHIN.value)
        }),
        minutes_to_90_percent: duration(futures, |f| {
            minutes_to_share(&f.course, now_min, f.settled_mmhg, NINETY_PERCENT)
        }),
    };
    for minute in minutes {
        let Members { paco2, ph } = members(futures, &excesses, now_min + minute);
        let hco3 = paco2.iter().zip(&ph).map(|((p, w), (ph, _))| (hco3_mmol_l(*ph, *p), *w)).collect();
        push(&mut forecast.gas_would_read_paco2_mmhg, quantiles(with_error(&paco2, read_paco2)));
        push(&mut forecast.gas_would_read_ph, quantiles(with_error(&ph, read_ph)));
        push(&mut forecast.paco2_mmhg, quantiles(paco2));
        push(&mut forecast.ph, quantiles(ph));
        push(&mut forecast.hco3_mmol_l, quantiles(hco3));
    }
    forecast
}

fn settled(futures: &[Future], excesses: &[f64]) -> Settled {
    let ph = futures.iter().zip(excesses).map(|(f, be)| (ph_at(f.settled_mmhg, *be), f.weight)).collect();
    let paco2 = futures.iter().map(|f| (f.settled_mmhg, f.weight)).collect();
    Settled { ph: quantiles(ph), paco2_mmhg: quantiles(paco2) }
}

fn duration(futures: &[Future], of: impl Fn(&Future) -> Option<f64>) -> Quantiles {
    quantiles(futures.iter().map(|f| (of(f).unwrap_or(SETTLING_MIN), f.weight)).collect())
}
