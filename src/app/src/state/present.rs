//! What the study says at this minute, and about a change that is tried.

use bedside::{Answer, Caution, Forecast, Freshness, Offers, Price, Study};
use case::{Control, Now, Settings};

use super::outlook;

/// What the study says at this minute.
#[derive(Debug, Clone, PartialEq)]
pub struct Present {
    /// The minute.
    pub now: Now,
    /// How long ago somebody confirmed.
    pub freshness: Freshness,
    /// The forecast if nothing else changes.
    pub answer: Answer<Forecast>,
    /// Cautions of the case.
    pub cautions: Vec<Caution>,
    /// Under pressure support.
    pub ratio: Option<bedside::Ratio>,
    /// A gas that waits for a decision.
    pub doubt: Option<bedside::Doubt>,
    /// The settings offered, while there is a forecast to compare them with.
    pub offers: Option<Offers>,
}

impl Present {
    /// Asks the study.
    pub fn of(study: &Study, now: &Now) -> Self {
        let minutes = outlook::minutes(study.start(), now);
        let mut present = Self {
            now: *now,
            freshness: study.freshness(now),
            answer: study.forecast(now, None, &minutes),
            cautions: study.cautions(now),
            ratio: study.ratio(now),
            doubt: study.doubt().cloned(),
            offers: None,
        };
        if present.shown().is_some() {
            present.offers = study.offers(now).value;
        }
        present
    }

    /// The forecast, unless it is withheld or nobody has confirmed it for an hour.
    pub fn shown(&self) -> Option<&Forecast> {
        let expired = matches!(self.freshness, Freshness::Expired { .. });
        outlook::value(&self.answer).filter(|_| !expired)
    }

    /// Whether nobody has confirmed it for half an hour.
    pub fn is_stale(&self) -> bool {
        matches!(self.freshness, Freshness::StillSo { .. })
    }

    /// Whether it is still on its way: then the chart comes before the offers.
    pub fn moves(&self) -> bool {
        self.shown().is_some_and(|forecast| {
            outlook::at(forecast, 0.0)
                .is_some_and(|(paco2, _)| (paco2.p50 - forecast.settled.paco2_mmhg.p50).abs() >= 2.0)
        })
    }
}

/// A change that is tried, and what comes of it.
#[derive(Debug, Clone, PartialEq)]
pub struct Trial {
    /// The minute it is tried at.
    pub now: Now,
    /// What is set.
    pub in_force: Settings,
    /// What would change; empty while nothing does.
    pub change: Settings,
    /// Where it leads.
    pub answer: Answer<Forecast>,
    /// What it costs.
    pub price: Option<Price>,
}

impl Trial {
    /// Asks the study.
    pub fn of(study: &Study, now: &Now, in_force: &Settings, change: Settings) -> Self {
        let minutes = outlook::minutes(study.start(), now);
        let given = (!change.is_empty()).then_some(&change);
        Self {
            now: *now,
            in_force: *in_force,
            change,
            answer: study.forecast(now, given, &minutes),
            price: study.price(now, &change),
        }
    }

    /// The volume that can be stepped: only where the machine holds it.
    pub fn set_volume(&self) -> Option<f64> {
        self.in_force.tidal_volume_ml.filter(|_| self.in_force.control == Some(Control::Volume))
    }
}
