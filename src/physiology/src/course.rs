//! The course of PaCO2 over a row of inputs, readable at any minute.

use std::sync::Arc;

use crate::Chemistry;
use crate::body::{Body, Drive, State};
use crate::stepper::{moments, rates, step};

/// A drive from a minute on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Input {
    /// From when, min.
    pub at_min: f64,
    /// What drives the body from then on.
    pub drive: Drive,
}

/// The solver's moments over a row of inputs, small steps first after each: one for all members.
#[derive(Debug, Clone, PartialEq)]
pub struct Schedule {
    minutes: Vec<f64>,
    /// For each stretch the input that drives it and the position of its last moment.
    stretches: Vec<(usize, usize)>,
}

impl Schedule {
    /// From `span_min.0` to `span_min.1`; inputs change at `at_min`, in order, the first of them in force at the
    /// start. `refine` (1 in use) divides every step.
    #[must_use]
    pub fn new(span_min: (f64, f64), at_min: &[f64], refine: u32) -> Self {
        let (from, to) = span_min;
        let inside = |minute: f64| {
            if minute < from {
                from
            } else if minute > to {
                to
            } else {
                minute
            }
        };
        let mut schedule = Self { minutes: vec![from], stretches: vec![] };
        for input in 0..at_min.len() {
            let begins = if input == 0 { from } else { inside(at_min[input]) };
            let ends = at_min.get(input + 1).map_or(to, |next| inside(*next));
            if begins < ends {
                schedule.minutes.extend(moments(begins, ends, refine).into_iter().skip(1));
                schedule.stretches.push((input, schedule.minutes.len() - 1));
            }
        }
        schedule
    }
}

/// PaCO2 at one of the solver's moments, mmHg, with its rate on both sides, mmHg/min.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Point {
    paco2: f64,
    rate_before: f64,
    rate_after: f64,
}

/// PaCO2 over time, readable smoothly between the solver's moments.
#[derive(Debug, Clone, PartialEq)]
pub struct Course {
    schedule: Arc<Schedule>,
    points: Vec<Point>,
    /// The state at the end.
    pub end: State,
}

impl Course {
    /// Runs `body` from `start` over `schedule`, driven by `inputs`.
    #[must_use]
    pub fn run(
        body: &Body,
        chemistry: &Chemistry,
        start: State,
        schedule: &Arc<Schedule>,
        inputs: &[Input],
    ) -> Self {
        let mut points = Vec::with_capacity(schedule.minutes.len());
        points.push(Point { paco2: start.paco2_mmhg(), rate_before: 0.0, rate_after: 0.0 });
        let mut course = Self { schedule: Arc::clone(schedule), points, end: start };
        let mut from = 0;
        for &(input, last) in &schedule.stretches {
            course.stretch(body, chemistry, &inputs[input].drive, &schedule.minutes[from..=last]);
            from = last;
        }
        course
    }

    fn stretch(&mut self, body: &Body, chemistry: &Chemistry, drive: &Drive, minutes: &[f64]) {
        let mut here = rates(body, drive, &self.end.levels);
        if let Some(point) = self.points.last_mut() {
            point.rate_after = here.paco2;
        }
        for pair in minutes.windows(2) {
            self.end = step(body, drive, &self.end, &here, pair[1] - pair[0], chemistry);
            here = rates(body, drive, &self.end.levels);
            let paco2 = self.end.paco2_mmhg();
            self.points.push(Point { paco2, rate_before: here.paco2, rate_after: here.paco2 });
        }
    }

    /// PaCO2 in mmHg at `minute`; before the start its first value, after the end its last.
    #[must_use]
    pub fn paco2_at(&self, minute: f64) -> f64 {
        let minutes = &self.schedule.minutes;
        let after = minutes.partition_point(|m| *m <= minute);
        if after == 0 {
            return self.points[0].paco2;
        }
        if after == minutes.len() {
            return self.points[after - 1].paco2;
        }
        let (from, to) = (&self.points[after - 1], &self.points[after]);
        let h = minutes[after] - minutes[after - 1];
        let t = (minute - minutes[after - 1]) / h;
        let (d0, d1, rise) = (from.rate_after * h, to.rate_before * h, to.paco2 - from.paco2);
        let c2 = 3.0 * rise - 2.0 * d0 - d1;
        let c3 = d0 + d1 - 2.0 * rise;
        from.paco2 + t * (d0 + t * (c2 + t * c3))
    }

    /// The solver's moments and the PaCO2 there.
    pub fn points(&self) -> impl Iterator<Item = (f64, f64)> + '_ {
        self.schedule.minutes.iter().copied().zip(self.points.iter().map(|point| point.paco2))
    }
}

/// Minutes after `from_min` from which PaCO2 stays within `margin_mmhg` of `settled_mmhg`; `None` when it is not
/// there by the end of the course.
#[must_use]
pub fn minutes_to_within(course: &Course, from_min: f64, settled_mmhg: f64, margin_mmhg: f64) -> Option<f64> {
    let mut outside: Option<(f64, f64)> = None;
    let mut crossing = Some(0.0);
    let first = (from_min, course.paco2_at(from_min));
    for (minute, paco2) in core::iter::once(first).chain(course.points().filter(|(m, _)| *m > from_min)) {
        let miss = (paco2 - settled_mmhg).abs() - margin_mmhg;
        if miss > 0.0 {
            outside = Some((minute, miss));
            crossing = None;
        } else if let Some((before, miss_before)) = outside.take() {
            let share = miss_before / (miss_before - miss);
            crossing = Some(before + share * (minute - before) - from_min);
        }
    }
    crossing
}

/// Minutes after `from_min` until `share` of the way to `settled_mmhg` is done for good; 0 when there is no way
/// to go, `None` when it is not done by the end of the course.
#[must_use]
pub fn minutes_to_share(course: &Course, from_min: f64, settled_mmhg: f64, share: f64) -> Option<f64> {
    /// A way shorter than this, mmHg, is none: it could not be measured.
    const NO_WAY_MMHG: f64 = 0.5;
    let way = (course.paco2_at(from_min) - settled_mmhg).abs();
    if way < NO_WAY_MMHG {
        return Some(0.0);
    }
    minutes_to_within(course, from_min, settled_mmhg, (1.0 - share) * way)
}
