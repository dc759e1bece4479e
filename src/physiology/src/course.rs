//! The course of PaCO2 over a row of inputs, readable at any minute.

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

/// PaCO2 at the solver's moments, with its rate on both sides of each, so that it reads smoothly between.
#[derive(Debug, Clone, PartialEq)]
pub struct Course {
    minutes: Vec<f64>,
    paco2: Vec<f64>,
    /// Rate as the stretch after the moment sees it, mmHg/min.
    rate_after: Vec<f64>,
    /// Rate as the stretch before the moment sees it, mmHg/min.
    rate_before: Vec<f64>,
    /// The state at the end.
    pub end: State,
}

impl Course {
    /// Runs `body` from `start` at `from_min` to `to_min`. `inputs` are in order and the first is in force at
    /// `from_min`. `refine` (1 in use) divides every step.
    #[must_use]
    pub fn run(
        body: &Body,
        chemistry: &Chemistry,
        start: State,
        span_min: (f64, f64),
        inputs: &[Input],
        refine: u32,
    ) -> Self {
        let (from_min, to_min) = span_min;
        let mut course =
            Course { minutes: vec![], paco2: vec![], rate_after: vec![], rate_before: vec![], end: start };
        for (i, input) in inputs.iter().enumerate() {
            let begins = if i == 0 || input.at_min < from_min { from_min } else { input.at_min };
            let ends = inputs
                .get(i + 1)
                .map_or(to_min, |next| if next.at_min < to_min { next.at_min } else { to_min });
            if begins < ends {
                course.stretch(body, chemistry, &input.drive, (begins, ends), refine);
            }
        }
        if course.minutes.is_empty() {
            course.push(from_min, start.paco2_mmhg(), 0.0);
        }
        course
    }

    fn stretch(
        &mut self,
        body: &Body,
        chemistry: &Chemistry,
        drive: &Drive,
        span_min: (f64, f64),
        refine: u32,
    ) {
        let moments = moments(span_min.0, span_min.1, refine);
        let mut here = rates(body, drive, &self.end.levels);
        match self.rate_after.last_mut() {
            Some(after) => *after = here.paco2,
            None => self.push(moments[0], self.end.paco2_mmhg(), here.paco2),
        }
        for pair in moments.windows(2) {
            self.end = step(body, drive, &self.end, &here, pair[1] - pair[0], chemistry);
            here = rates(body, drive, &self.end.levels);
            self.push(pair[1], self.end.paco2_mmhg(), here.paco2);
        }
    }

    fn push(&mut self, minute: f64, paco2: f64, rate: f64) {
        self.minutes.push(minute);
        self.paco2.push(paco2);
        self.rate_after.push(rate);
        self.rate_before.push(rate);
    }

    /// PaCO2 in mmHg at `minute`; before the start its first value, after the end its last.
    #[must_use]
    pub fn paco2_at(&self, minute: f64) -> f64 {
        let after = self.minutes.partition_point(|m| *m <= minute);
        if after == 0 {
            return self.paco2[0];
        }
        if after == self.minutes.len() {
            return self.paco2[after - 1];
        }
        let (i, j) = (after - 1, after);
        let h = self.minutes[j] - self.minutes[i];
        let t = (minute - self.minutes[i]) / h;
        let (y0, y1) = (self.paco2[i], self.paco2[j]);
        let (d0, d1) = (self.rate_after[i] * h, self.rate_before[j] * h);
        let c2 = 3.0 * (y1 - y0) - 2.0 * d0 - d1;
        let c3 = 2.0 * (y0 - y1) + d0 + d1;
        y0 + t * (d0 + t * (c2 + t * c3))
    }

    /// The solver's moments and the PaCO2 there.
    pub fn points(&self) -> impl Iterator<Item = (f64, f64)> + '_ {
        self.minutes.iter().copied().zip(self.paco2.iter().copied())
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
