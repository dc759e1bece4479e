//! A case studied once an entry: the body learnt from its gases. Forecasts and offers are asked of it.

use std::cell::RefCell;
use std::rc::Rc;

use case::{Case, Condition, EntryId, Moment, Now, Settings};
use physiology::{
    Chemistry, ChemistryInput, Ensemble, Learning, Observation, Past, Priors, Step, saturation_in_blood,
    standard_base_excess,
};
use sources as s;

use crate::history::{History, UsableGas};
use crate::standing::{Way, breath, standing_of, way, withheld};
use crate::stretch::{Before, Stretch};
use crate::summary::{Anchor, SETTLING_MIN, reading_95};
use crate::{
    Answer, Caution, Forecast, Price, Quantiles, Ratio, Standing, Status, assumed, cautions, summary,
};

/// How far ahead a forecast may be asked for, min.
pub const HORIZON_MIN: f64 = s::HORIZON.value;

/// How a study is made.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Options {
    /// Members of the ensemble.
    pub members: usize,
    /// Seed of the draws.
    pub seed: u32,
}

impl Default for Options {
    fn default() -> Self {
        Self { members: 256, seed: 1 }
    }
}

/// How long ago somebody last typed or confirmed something.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Freshness {
    /// No entry yet.
    NoEntries,
    /// Under 30 min.
    Fresh,
    /// 30 to 60 min: "Still so?"
    StillSo {
        /// The last entry.
        since: Moment,
    },
    /// Over 60 min: no number.
    Expired {
        /// The last entry.
        since: Moment,
    },
}

/// A gas outside its 95 % predictive band; not learnt from until the user has chosen.
#[derive(Debug, Clone, PartialEq)]
pub struct Doubt {
    /// The gas.
    pub gas: EntryId,
    /// When it was drawn.
    pub at: Moment,
    /// What it reads, mmHg.
    pub measured_mmhg: f64,
    /// What a gas should have read, mmHg: 95 % band, its lower and upper edge.
    pub expected_mmhg: (f64, f64),
}

/// A case studied: what its gases taught, ready to be asked.
#[derive(Debug, Clone)]
pub struct Study {
    pub(crate) history: History,
    learnt: Result<Learnt, Standing>,
    doubt: Option<Doubt>,
    /// The moments of all entries, in order.
    touched: Vec<Moment>,
}

/// What was learnt.
#[derive(Debug, Clone)]
pub(crate) struct Learnt {
    ensemble: Ensemble,
    /// The past up to the minute last asked about: a finger on a stepper asks again and again at one minute.
    past: RefCell<Option<(f64, Rc<Past>)>>,
    pub(crate) start: Moment,
    pub(crate) priors: Priors,
    anchor: Anchor,
    /// Standard base excess of the last gas, mmol/L.
    pub(crate) standard_be: f64,
    /// The last gas learnt from.
    pub(crate) last_gas: case::Gas,
    pub(crate) last_gas_at: Moment,
    pub(crate) first_gas: case::Gas,
    /// How far the first gas lies from what was expected before it, in standard deviations of ln.
    pub(crate) surprise: f64,
    pub(crate) hb_known: bool,
    pub(crate) saturation_known: bool,
}

impl Study {
    /// Learns from every gas of the case in order.
    #[must_use]
    pub fn new(case: &Case, options: Options) -> Self {
        let history = History::of(case);
        // When it was so, not when it was typed: a gas of an hour ago confirms nothing about now.
        let touched = case.entries().iter().map(|entry| entry.at).collect();
        let (learnt, doubt) = learn(&history, options);
        Self { learnt, doubt, touched, history }
    }

    /// How long ago the case was last confirmed.
    #[must_use]
    pub fn freshness(&self, now: &Now) -> Freshness {
        let Some(since) = self.last_touched(now) else { return Freshness::NoEntries };
        let minutes = now.wall.minutes_since(since);
        if minutes >= s::VALID_FOR.value {
            Freshness::Expired { since }
        } else if minutes >= s::STILL_SO_AFTER.value {
            Freshness::StillSo { since }
        } else {
            Freshness::Fresh
        }
    }

    /// The last moment at which somebody wrote or saw something, as of `now`: what a wrong clock has put into the
    /// future confirms nothing, unless there is nothing else.
    fn last_touched(&self, now: &Now) -> Option<Moment> {
        let past = self.touched.partition_point(|at| *at <= now.wall);
        self.touched[..past].last().or(self.touched.first()).copied()
    }

    /// Whether there may be an answer now.
    #[must_use]
    pub fn standing(&self, now: &Now) -> Standing {
        self.standing_under(now, &self.history.settings_at(now.wall))
    }

    fn standing_under(&self, now: &Now, settings: &Settings) -> Standing {
        let mut standing = match &self.learnt {
            Ok(learnt) => match self.history.unsettled_since(learnt.last_gas_at) {
                Some(unsettled) => unsettled.and(standing_of(settings)),
                None => standing_of(settings),
            },
            Err(why) => why.clone(),
        };
        if let Some(last) =
            self.touched.last().filter(|last| last.minutes_since(now.wall) > s::CLOCKS_APART.value)
        {
            let words =
                format!("The last entry is of {}, later than this clock.", last.clock(now.utc_offset_min));
            standing = standing.and(withheld("clock", words, "Check the clock of this phone."));
        }
        if let Freshness::Expired { since } = self.freshness(now) {
            let words = format!("Not known since {}.", since.clock(now.utc_offset_min));
            standing = standing.and(withheld(
                "expired",
                words,
                "Type a gas, or what has changed, or that nothing has.",
            ));
        }
        if self.history.relaxed_at(now.wall) && way(settings) == Way::OwnBreaths {
            let would_help =
                "Raise the rate first. Then type what the machine gives, with no breaths of his own.";
            standing =
                standing.and(withheld("relaxant", "Relaxed, he takes no breaths of his own.", would_help));
        }
        if self.history.breathing_stopped_at(now.wall) {
            standing = standing.and(withheld(
                "no_breaths",
                "Nobody breathes for him now.",
                "Give a breath, then say so.",
            ));
        }
        standing
    }

    /// When the computed course begins; minutes asked for before it read as its first value.
    #[must_use]
    pub fn start(&self) -> Option<Moment> {
        self.learnt.as_ref().ok().map(|learnt| learnt.start)
    }

    /// Standard base excess of the last gas learnt from, mmol/L.
    #[must_use]
    pub fn standard_base_excess(&self) -> Option<f64> {
        self.learnt.as_ref().ok().map(|learnt| learnt.standard_be)
    }

    /// The forecast at `minutes` after `now` (negative minutes reach back to the start of the record), with
    /// `change` made at `now` where one is given.
    #[must_use]
    pub fn forecast(&self, now: &Now, change: Option<&Settings>, minutes: &[f64]) -> Answer<Forecast> {
        let current = self.history.settings_at(now.wall);
        let planned = change.map_or(current, |change| current.after(change));
        let standing = self.standing_under(now, &planned);
        let mut answer = self.answer(now, standing);
        if let Some(change) = change {
            answer.cautions.splice(0..0, cautions::of_change(self, &current, change));
        }
        if answer.standing.status == Status::Withheld {
            return answer;
        }
        let Ok(learnt) = &self.learnt else { return answer };
        let forecast = self.computed(learnt, now, change.map(|_| &planned), minutes);
        if let Some(beyond) = beyond_chemistry(&forecast) {
            answer.standing = answer.standing.and(beyond);
            return answer;
        }
        // Under the dangers of the change itself, over its limits.
        let place = answer.cautions.iter().take_while(|caution| caution.is_danger()).count();
        answer.cautions.splice(place..place, cautions::of_heading(&forecast.settled));
        answer.value = Some(forecast);
        answer
    }

    fn computed(&self, learnt: &Learnt, now: &Now, planned: Option<&Settings>, minutes: &[f64]) -> Forecast {
        let now_min = now.wall.minutes_since(learnt.start);
        let step = planned.and_then(|settings| self.step_under(learnt, settings, now.wall));
        let past = learnt.past(now_min);
        let futures = learnt.ensemble.futures(&past, now_min + SETTLING_MIN, step.as_ref());
        summary::summarise(&futures, &learnt.anchor, now_min, minutes)
    }

    /// The step that `settings` make at `at`, with the jump of R that its size brings; `None` when nothing that
    /// drives the body differs.
    fn step_under(&self, learnt: &Learnt, settings: &Settings, at: Moment) -> Option<Step> {
        let mut step = self.history.step_for(settings, at, learnt.start)?;
        let before = self.history.step_for(&self.history.settings_at(at), at, learnt.start)?;
        if (Step { at_min: before.at_min, ..step }) == before {
            return None;
        }
        step.jump_sd = learnt.priors.jump_sd(&before, &step);
        Some(step)
    }

    /// Whether `planned` brings less alveolar ventilation than `current`, at the means.
    pub(crate) fn ventilates_less(&self, current: &Settings, planned: &Settings) -> bool {
        let Ok(learnt) = &self.learnt else { return false };
        let step = |settings| self.history.step_for(settings, learnt.last_gas_at, learnt.start);
        match (step(current), step(planned)) {
            (Some(old), Some(new)) => learnt.priors.alveolar_l_min(&new) < learnt.priors.alveolar_l_min(&old),
            _ => false,
        }
    }

    /// An answer's frame: standing, validity, what is assumed, what to heed.
    pub(crate) fn answer<T>(&self, now: &Now, standing: Standing) -> Answer<T> {
        Answer {
            standing,
            value: None,
            valid_until: self.last_touched(now).map(|at| at.plus_minutes(s::VALID_FOR.value)),
            assumed: self.learnt.as_ref().map_or_else(|_| vec![], |learnt| assumed::of(self, learnt)),
            cautions: self.cautions(now),
        }
    }

    /// What settings cost when `change` is made at `now`; `None` without a breath.
    #[must_use]
    pub fn price(&self, now: &Now, change: &Settings) -> Option<Price> {
        let current = self.history.settings_at(now.wall);
        crate::offer::price(&self.history.patient, &current, change)
    }

    /// Under pressure support: where PaCO2 would settle with a fifth more minute volume, dead space the same
    /// share of it. Needs a measured minute volume and a gas under it.
    #[must_use]
    pub fn ratio(&self, now: &Now) -> Option<Ratio> {
        let settings = self.history.settings_at(now.wall);
        let Ok(learnt) = &self.learnt else { return None };
        let silent = self.standing(now).withheld.iter().any(|why| why.id != "pressure_support");
        if silent || way(&settings) != Way::Support || breath(&settings).is_none() {
            return None;
        }
        let now_min = now.wall.minutes_since(learnt.start);
        let past = learnt.past(now_min);
        let mut pairs: Vec<(f64, f64)> = learnt
            .ensemble
            .futures(&past, now_min, None)
            .iter()
            .map(|f| (f.settled_mmhg / s::RATIO_STEP.value, f.weight))
            .collect();
        let [p10, p50, p90] = physiology::weighted_quantiles(&mut pairs, [0.1, 0.5, 0.9]);
        Some(Ratio { minute_volume_factor: s::RATIO_STEP.value, paco2_mmhg: Quantiles { p10, p50, p90 } })
    }

    /// The gas that waits for a decision.
    #[must_use]
    pub fn doubt(&self) -> Option<&Doubt> {
        self.doubt.as_ref()
    }

    /// Cautions for the case as it stands, the most dangerous first.
    #[must_use]
    pub fn cautions(&self, now: &Now) -> Vec<Caution> {
        cautions::of_case(self, now)
    }

    pub(crate) fn learnt(&self) -> Option<&Learnt> {
        self.learnt.as_ref().ok()
    }
}

impl Learnt {
    fn past(&self, now_min: f64) -> Rc<Past> {
        if let Some((minute, past)) = &*self.past.borrow()
            && *minute == now_min
        {
            return Rc::clone(past);
        }
        let past = Rc::new(self.ensemble.past(now_min));
        *self.past.borrow_mut() = Some((now_min, Rc::clone(&past)));
        past
    }

    /// Whether the CO2 curve is sure at the last gas.
    pub(crate) fn curve_is_sure(&self) -> bool {
        self.ensemble.chemistry().inside_douglas(self.last_gas.pco2_mmhg)
    }
}

/// Withheld where a shown edge leaves the range the chemistry is made for.
fn beyond_chemistry(forecast: &Forecast) -> Option<Standing> {
    let settled = &forecast.settled.paco2_mmhg;
    let low = forecast.paco2_mmhg.p10.iter().copied().fold(settled.p10, f64::min);
    let high = forecast.paco2_mmhg.p90.iter().copied().fold(settled.p90, f64::max);
    if low >= s::PRESSURE_LEAST.value && high <= s::PRESSURE_MOST.value {
        return None;
    }
    Some(withheld(
        "beyond_chemistry",
        "This would leave 4 to 196 mmHg, where the blood's chemistry is known.",
        "Check rate and tidal volume: is the breath larger than the dead space?",
    ))
}

/// Learns gas by gas; each after the first is tested against its own predictive band before it is learnt from.
fn learn(history: &History, options: Options) -> (Result<Learnt, Standing>, Option<Doubt>) {
    let gases = match usable(history) {
        Ok(gases) => gases,
        Err(why) => return (Err(why), None),
    };
    let mut learnt: Option<Learnt> = None;
    for (count, gas) in gases.iter().enumerate() {
        if let Some(doubt) = learnt.as_ref().and_then(|before| doubt_about(before, gas)) {
            let words = format!(
                "The gas at this time reads {:.0} mmHg; {:.0} to {:.0} was expected. It doesn't fit.",
                doubt.measured_mmhg, doubt.expected_mmhg.0, doubt.expected_mmhg.1
            );
            let why = withheld(
                "gas_does_not_fit",
                words,
                "Check the patient, then say: the sample, the patient or the machine?",
            );
            return (Err(why), Some(doubt));
        }
        let surprise = learnt.as_ref().map(|before| before.surprise);
        match learn_from(history, &gases[..=count], options, surprise) {
            Ok(next) => learnt = Some(next),
            Err(why) => return (Err(why), None),
        }
    }
    (learnt.ok_or_else(no_gas), None)
}

fn no_gas() -> Standing {
    withheld(
        "no_gas",
        "No arterial gas yet: what is usual is not shown as this patient.",
        "Type an arterial gas.",
    )
}

/// The gases to learn from, in order: since the last restart, inside the stretch that can be computed.
fn usable(history: &History) -> Result<Vec<UsableGas<'_>>, Standing> {
    let gases = history.arterial_gases();
    if history.circulation_steady_from().is_none() {
        return Err(withheld(
            "circulation",
            "Circulation not steady: CO₂ can't be forecast from breathing alone.",
            "Draw a gas 20 min or more after it is steady.",
        ));
    }
    if gases.is_empty() {
        return Err(only_other_samples(history).unwrap_or_else(no_gas));
    }
    let Some(from) = history.computable_from() else {
        let now = history.settings.last().map_or_else(Settings::default, |(_, settings)| *settings);
        let standing = standing_of(&now);
        return Err(if standing.status == Status::Withheld { standing } else { no_settings() });
    };
    let restart = gases
        .iter()
        .rposition(|g| matches!(g.verdict, Some(case::GasChoice::Patient | case::GasChoice::Machine)))
        .unwrap_or(0);
    let usable: Vec<UsableGas<'_>> = gases[restart..].iter().copied().filter(|g| g.at >= from).collect();
    if usable.first().is_some_and(|first| after_hand(history, first)) {
        return Err(withheld(
            "after_hand",
            "The gas was drawn soon after ventilation by hand: nothing was settled then.",
            "Draw one when the machine's settings have held 30 min.",
        ));
    }
    if usable.is_empty() {
        return Err(withheld(
            "no_gas_since",
            "No arterial gas since his breathing or circulation changed.",
            "Type the next gas, or the settings that held when the last one was drawn.",
        ));
    }
    Ok(usable)
}

/// Whether a gas was drawn so soon after ventilation by hand that its PaCO2 says little about the machine's.
fn after_hand(history: &History, gas: &UsableGas<'_>) -> bool {
    let by_hand = |stretch: &Stretch| stretch.before == Before::ByHand;
    history
        .stretch
        .as_ref()
        .filter(|s| by_hand(s))
        .is_some_and(|stretch| gas.at.minutes_since(stretch.from) < s::SETTLED_AFTER.value)
}

fn no_settings() -> Standing {
    withheld("settings", "The settings at the time of the gas are not known.", "Type rate and tidal volume.")
}

/// Venous and capillary samples alone: said, with what they can tell.
fn only_other_samples(history: &History) -> Option<Standing> {
    history.entries.iter().rev().find_map(|e| match &e.kind {
        case::EntryKind::Gas(gas) if gas.site != case::Site::Arterial => Some(withheld(
            "not_arterial",
            format!(
                "PCO₂ {:.0} is not arterial: in one patient PaCO₂ may lie 20 lower or higher; pH about .03 higher.",
                gas.pco2_mmhg
            ),
            "Draw an arterial gas for a forecast.",
        )),
        case::EntryKind::EndTidal(reading) => Some(withheld(
            "end_tidal_only",
            format!("EtCO₂ {:.0} alone gives no pH and no forecast: PaCO₂ is usually higher, by an unknown gap.", reading.etco2_mmhg),
            "Draw an arterial gas.",
        )),
        _ => None,
    })
}

/// The doubt about `gas`, when what was learnt before it did not expect it and nobody has decided yet.
fn doubt_about(before: &Learnt, gas: &UsableGas<'_>) -> Option<Doubt> {
    let at_min = gas.at.minutes_since(before.start);
    let past = before.ensemble.past(at_min);
    let expected_mmhg = reading_95(&before.ensemble.futures(&past, at_min, None), at_min);
    let read = gas.gas.pco2_mmhg;
    let fits = read >= expected_mmhg.0 && read <= expected_mmhg.1;
    (!fits).then(|| Doubt { gas: gas.id.clone(), at: gas.at, measured_mmhg: read, expected_mmhg })
}

fn learn_from(
    history: &History,
    gases: &[UsableGas<'_>],
    options: Options,
    surprise: Option<f64>,
) -> Result<Learnt, Standing> {
    let (first, last) = (&gases[0], &gases[gases.len() - 1]);
    let (start, offset_sd) = start_of(history, first).ok_or_else(no_settings)?;
    let mut steps = history.steps(start);
    let Some(first_step) = steps.first_mut() else { return Err(no_settings()) };
    first_step.at_min = 0.0;
    let priors = priors_with_jumps(history, steps, offset_sd);
    if priors.alveolar_share_at_means() <= LEAST_SHARE {
        return Err(withheld(
            "breath_in_dead_space",
            "The breath is hardly larger than the dead space assumed for this size.",
            "Check the tidal volume; type age, height and weight, and the apparatus dead space.",
        ));
    }
    let (input, hb_known, saturation_known) = chemistry_input(history, last);
    let chemistry =
        Chemistry::new(input).map_err(|e| withheld("chemistry", e.to_string(), "Check the gas."))?;
    let observations: Vec<Observation> = gases
        .iter()
        .map(|g| Observation {
            at_min: g.at.minutes_since(start),
            paco2_mmhg: g.gas.pco2_mmhg,
            ln_sd: s::ANALYSER_PACO2.spread,
        })
        .collect();
    let learning = Learning { priors: &priors, chemistry: &chemistry, observations: &observations };
    let ensemble = learning.ensemble(options.members, options.seed).map_err(|e| {
        withheld("no_body_fits", e.to_string(), "Check settings and gases; start again from a new gas.")
    })?;
    let surprise = surprise.unwrap_or_else(|| learning.surprise(options.members, options.seed));
    let anchor = Anchor { at_min: last.at.minutes_since(start), ph: last.gas.ph };
    let (last_gas, last_gas_at) = (*last.gas, last.at);
    Ok(Learnt {
        ensemble,
        past: RefCell::new(None),
        start,
        priors,
        anchor,
        standard_be: input.standard_be,
        last_gas,
        first_gas: *first.gas,
        surprise,
        last_gas_at,
        hb_known,
        saturation_known,
    })
}

/// An alveolar share at or under this says that the breath does not get past the dead space.
const LEAST_SHARE: f64 = 0.05;

/// Where the computed course begins, and how far from settled it may be there.
fn start_of(history: &History, first: &UsableGas<'_>) -> Option<(Moment, f64)> {
    if first.verdict.is_some() {
        return Some((first.at, s::START_OFFSET.spread));
    }
    let from = history.computable_from()?;
    let held_min = first.gas.settings_held_min;
    let held_since = first.at.plus_minutes(-held_min.unwrap_or(0.0));
    let start = if held_since < from { held_since } else { from };
    let moving = held_min.is_some_and(|minutes| minutes < s::JUST_CHANGED.value) && start >= held_since;
    let unknown_before = history.stretch.as_ref().is_some_and(|stretch| stretch.before != Before::Nothing);
    let spread =
        if moving || unknown_before { s::START_OFFSET_CHANGED.spread } else { s::START_OFFSET.spread };
    Some((start, spread))
}

fn priors_with_jumps(history: &History, steps: Vec<Step>, offset_sd: f64) -> Priors {
    let settings = history.settings.first().map_or_else(Settings::default, |(_, settings)| *settings);
    let tube = settings.airway == Some(case::Airway::Tube);
    let injury = history.has(|c| *c == Condition::LungInjury) == Some(true);
    let make =
        |steps: &[Step]| Priors::new(&history.patient, tube, injury, &history.measured(), steps, offset_sd);
    let without = make(&steps);
    make(&without.with_jumps(steps))
}

/// The blood: base excess of the last gas, haemoglobin and saturation as far as known.
fn chemistry_input(history: &History, last: &UsableGas<'_>) -> (ChemistryInput, bool, bool) {
    let gas = last.gas;
    let hb = history.haemoglobin(last.at);
    let by_gas = gas.po2_mmhg.map(|po2| saturation_in_blood(po2, gas.ph));
    let saturation = by_gas.or_else(|| history.saturation(last.at));
    let input = ChemistryInput {
        standard_be: standard_base_excess(gas.ph, gas.pco2_mmhg),
        hb_g_dl: hb.unwrap_or(s::HB_UNKNOWN.value),
        saturation: saturation.unwrap_or(s::SAO2_UNKNOWN.value),
    };
    (input, hb.is_some(), saturation.is_some())
}
