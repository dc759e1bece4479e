//! Settings offered, each with where it leads and what it costs.

use case::{Condition, Now, Settings};
use physiology::Patient;
use sources as s;

use crate::cautions::{broken_limits, is_retainer, retainer_unanswered};
use crate::standing::breath;
use crate::study::{Learnt, Study};
use crate::{Answer, Caution, Forecast, Status};

/// What settings cost: only what can be said from what was typed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Price {
    /// Rate, /min.
    pub rate_per_min: f64,
    /// Tidal volume, mL.
    pub tidal_volume_ml: f64,
    /// Tidal volume over predicted body weight; `None` without height and sex, and for children.
    pub ml_per_kg: Option<f64>,
    /// Plateau, cmH2O, scaled with the breath from the one typed; `None` without one.
    pub plateau_cmh2o: Option<f64>,
    /// Minute volume, L/min BTPS.
    pub minute_volume_l_min: f64,
}

/// One way forward.
#[derive(Debug, Clone, PartialEq)]
pub struct Offer {
    /// What would change.
    pub change: Settings,
    /// Where it leads.
    pub forecast: Forecast,
    /// What it costs.
    pub price: Price,
    /// What to heed with it, the broken limit first.
    pub cautions: Vec<Caution>,
}

/// The ways offered; fewer, or none with the reason, where they could hurt.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Offers {
    /// At most three, none chosen.
    pub offers: Vec<Offer>,
    /// Why there are fewer, and when none of them should be used, each a sentence.
    pub fewer_because: Vec<Caution>,
}

/// How many are offered at most.
const MOST_OFFERS: u32 = 3;

/// The cost of `change` on top of `current`; `None` without a breath.
pub(crate) fn price(patient: &Patient, current: &Settings, change: &Settings) -> Option<Price> {
    let planned = current.after(change);
    let breath = breath(&planned)?;
    Some(Price {
        rate_per_min: breath.rate_per_min,
        tidal_volume_ml: breath.tidal_volume_ml,
        ml_per_kg: patient.predicted_body_weight_kg().map(|kg| breath.tidal_volume_ml / kg),
        plateau_cmh2o: planned.plateau_cmh2o.or_else(|| scaled_plateau(current, &planned)),
        minute_volume_l_min: breath.rate_per_min * breath.tidal_volume_ml / 1000.0,
    })
}

/// The plateau above PEEP grows with the breath, at the compliance that the typed one shows.
fn scaled_plateau(current: &Settings, planned: &Settings) -> Option<f64> {
    let (old, new) = (breath(current)?, breath(planned)?);
    let old_peep = current.total_peep_cmh2o.or(current.peep_cmh2o)?;
    let driving = current.plateau_cmh2o? - old_peep;
    let new_peep = planned.peep_cmh2o?;
    (driving > 0.0).then(|| new_peep + driving * new.tidal_volume_ml / old.tidal_volume_ml)
}

impl Study {
    /// Settings that would help, each with where it leads and what it costs: the rate raised by 4, 8 and 12, at
    /// most 35 a minute; fewer where that could hurt, with the reason.
    #[must_use]
    pub fn offers(&self, now: &Now) -> Answer<Offers> {
        let standing = self.standing(now);
        let mut answer = self.answer(now, standing);
        let Some(learnt) = self.learnt() else { return answer };
        if answer.standing.status == Status::Withheld {
            return answer;
        }
        let current = self.history.settings_at(now.wall);
        let mut offers = Offers::default();
        if let Some(reason) = self.no_offer(now, answer.standing.status) {
            offers.fewer_because.push(reason);
        } else if let Some(rate) = breath(&current).map(|b| b.rate_per_min) {
            self.fill(&mut offers, now, learnt, rate);
        }
        answer.value = Some(offers);
        answer
    }

    fn fill(&self, offers: &mut Offers, now: &Now, learnt: &Learnt, rate: f64) {
        let mut dropped = false;
        for count in 1..=MOST_OFFERS {
            let faster = rate + s::OFFER_STEP.value * f64::from(count);
            if faster > s::RATE_MOST.value {
                let words = format!("No more than {:.0} a minute is offered.", s::RATE_MOST.value);
                offers.fewer_because.push(because("rate_most", words, Some(s::RATE_MOST.id)));
                break;
            }
            let change = Settings { rate_per_min: Some(faster), ..Settings::default() };
            let answer = self.forecast(now, Some(&change), &[]);
            let (Some(forecast), Some(price)) = (answer.value, self.price(now, &change)) else { continue };
            if self.overshoots(learnt, &forecast) {
                dropped = true;
                continue;
            }
            let cautions = broken_limits(&price);
            offers.offers.push(Offer { change, forecast, price, cautions });
        }
        if dropped {
            offers.fewer_because.push(self.overshoot_reason(learnt));
        }
        // Nobody has said whether he has it: where it is, each of these could kill.
        if !offers.offers.is_empty() && self.history.has(|c| *c == Condition::AirflowObstruction).is_none() {
            let words = "Not in airflow obstruction: there a faster rate traps gas and can raise PaCO₂.";
            offers.fewer_because.push(because("obstruction_unasked", words, None));
        }
    }

    /// A rise of pH that could pass what this patient should have.
    fn overshoots(&self, learnt: &Learnt, forecast: &Forecast) -> bool {
        let ph = &forecast.settled.ph;
        if self.history.has(is_retainer) == Some(true) {
            return ph.p50 > s::RETAINER_PH_USUAL_HIGH.value || ph.p90 > s::PH_GOAL_HIGH.value;
        }
        if retainer_unanswered(self, learnt) {
            return ph.p90 > s::PH_GOAL_HIGH.value;
        }
        let skull = self.history.has(|c| *c == Condition::RaisedIntracranialPressure) == Some(true);
        ph.p50 > s::PH_GOAL_HIGH.value
            || (skull && forecast.settled.paco2_mmhg.p50 < s::PACO2_USUAL_LOW.value)
    }

    fn overshoot_reason(&self, learnt: &Learnt) -> Caution {
        if self.history.has(is_retainer) == Some(true) {
            let words =
                "Chronic retainer: rates that pass his own pH are not offered. First 7.30 to 7.35, slowly.";
            return because("retainer", words, Some(s::RETAINER_PH_USUAL_HIGH.id));
        }
        if retainer_unanswered(self, learnt) {
            let words = "May usually retain CO₂: rates that could pass pH 7.45 wait for the history.";
            return because("retainer_question", words, Some(s::RETAINER_SBE.id));
        }
        because(
            "overshoot",
            "Rates that would pass pH 7.45, or fall under PaCO₂ 35 with raised pressure in the skull, are not offered.",
            Some(s::PH_GOAL_HIGH.id),
        )
    }

    /// The reason to offer nothing at all, if there is one.
    fn no_offer(&self, now: &Now, status: Status) -> Option<Caution> {
        let has = |wanted: fn(&Condition) -> bool| self.history.has(wanted) == Some(true);
        let skull = has(|c| *c == Condition::RaisedIntracranialPressure);
        if skull && (has(|c| *c == Condition::LungInjury) || has(is_retainer)) {
            let words = "Raised pressure in the skull wants PaCO₂ 35 to 45; lung or chronic retention wants more. \
                         These conflict. Call for advice.";
            return Some(because("conflict", words, Some(s::PACO2_USUAL_HIGH.id)));
        }
        if has(|c| *c == Condition::AirflowObstruction) {
            let words =
                "Airflow obstruction: more rate can trap gas and raise PaCO₂. No faster rate is offered.";
            return Some(because("obstruction", words, None));
        }
        if status != Status::Forecast {
            let words =
                "The breath isn't the machine's alone, so no rate is offered. Try one and read the volume.";
            return Some(because("not_passive", words, None));
        }
        let heading = self.forecast(now, None, &[]).value?.settled;
        let wanted = heading.ph.p50 < s::PH_USUAL_LOW.value
            || (skull && heading.paco2_mmhg.p50 > s::PACO2_USUAL_HIGH.value);
        if wanted {
            return None;
        }
        let words = format!("pH is heading for {:.2} as it is: no faster rate is offered.", heading.ph.p50);
        Some(because("no_need", words, Some(s::PH_USUAL_LOW.id)))
    }
}

fn because(id: &'static str, words: impl Into<String>, source: Option<&'static str>) -> Caution {
    Caution { id, words: words.into(), source }
}
