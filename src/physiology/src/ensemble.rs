//! Bodies that fit the gases, each with its weight, and what they do next. The past is run once; a finger on a
//! stepper re-runs only the future, from the stored states.

use std::sync::Arc;

use crate::course::{Input, Schedule};
use crate::priors::{Member, Step};
use crate::{Chemistry, Course};

/// Draws beside the coordinates: a jump that a future change brings, and the error of a pH.
pub(crate) const EXTRA: usize = 2;

/// Bodies that fit the gases, each with its weight.
#[derive(Debug, Clone, PartialEq)]
pub struct Ensemble {
    pub(crate) members: Vec<Member>,
    /// Not negative, sum 1.
    pub(crate) weights: Vec<f64>,
    pub(crate) extra: Vec<[f64; EXTRA]>,
    pub(crate) chemistry: Chemistry,
    pub(crate) effective: f64,
}

/// Every member's course up to a minute.
#[derive(Debug, Clone, PartialEq)]
pub struct Past {
    until_min: f64,
    courses: Vec<Course>,
}

/// One member from its first step to the end of what was asked.
#[derive(Debug, Clone, PartialEq)]
pub struct Future<'a> {
    past: &'a Course,
    until_min: f64,
    /// Its course from the end of the past on.
    pub course: Course,
    /// Where it settles, mmHg.
    pub settled_mmhg: f64,
    /// Its weight; those of an ensemble sum to 1.
    pub weight: f64,
    /// Standard normal for the error of a pH.
    pub ph_error: f64,
}

impl Future<'_> {
    /// PaCO2 in mmHg at `at_min`, past or future; before the start its first value.
    #[must_use]
    pub fn paco2_at(&self, at_min: f64) -> f64 {
        if at_min < self.until_min { self.past.paco2_at(at_min) } else { self.course.paco2_at(at_min) }
    }
}

impl Ensemble {
    /// Effective number of members: 1/Σw².
    #[must_use]
    pub fn effective(&self) -> f64 {
        self.effective
    }

    /// The CO2 curve the members share.
    #[must_use]
    pub fn chemistry(&self) -> &Chemistry {
        &self.chemistry
    }

    /// Every member from its first step to `until_min` (or to that step, when it lies later).
    #[must_use]
    pub fn past(&self, until_min: f64) -> Past {
        let first = self.members.first().map_or(0.0, |member| member.inputs[0].at_min);
        let until_min = if until_min > first { until_min } else { first };
        let at: Vec<f64> = self
            .members
            .first()
            .map_or_else(Vec::new, |m| m.inputs.iter().map(|input| input.at_min).collect());
        let schedule = Arc::new(Schedule::new((first, until_min), &at, 1));
        let courses = self.members.iter().map(|m| m.course_over(&self.chemistry, &schedule)).collect();
        Past { until_min, courses }
    }

    /// Each member from the end of `past` to `to_min`: with its own later steps, or with `change` in their place;
    /// the change's `jump_sd` says how far R may move with it.
    #[must_use]
    pub fn futures<'a>(&self, past: &'a Past, to_min: f64, change: Option<&Step>) -> Vec<Future<'a>> {
        let later = self.members.first().map_or(0, |m| in_force(&m.inputs, past.until_min));
        let at: Vec<f64> = match (change, self.members.first()) {
            (None, Some(member)) => member.inputs[later..].iter().map(|input| input.at_min).collect(),
            _ => vec![past.until_min],
        };
        let schedule = Arc::new(Schedule::new((past.until_min, to_min), &at, 1));
        let weighed = self.members.iter().zip(&self.weights).zip(&self.extra).zip(&past.courses);
        let run = |(((member, weight), extra), before): (((&Member, &f64), &[f64; EXTRA]), &'a Course)| {
            let changed = change.map(|step| [member.input(step, step.jump_sd * extra[0])]);
            let inputs = changed.as_ref().map_or(&member.inputs[later..], |input| &input[..]);
            let course = Course::run(&member.body, &self.chemistry, before.end, &schedule, inputs);
            Future {
                past: before,
                until_min: past.until_min,
                course,
                settled_mmhg: inputs[inputs.len() - 1].drive.settled_mmhg(),
                weight: *weight,
                ph_error: extra[1],
            }
        };
        weighed.map(run).collect()
    }
}

/// Position of the input in force at `minute`.
fn in_force(inputs: &[Input], minute: f64) -> usize {
    inputs.partition_point(|input| input.at_min <= minute).saturating_sub(1)
}
