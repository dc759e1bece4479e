//! By how the patient breathes: whether there may be a forecast at all. One decision, shown everywhere.

use case::{Airway, Breath, Control, Effort, Leak, Settings};

use crate::{Condition, Standing, Status, Withheld};

/// How the breath is made, as far as a forecast cares.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Way {
    /// Tube, volume set, no effort, no leak: the set breath is the breath.
    Passive,
    /// Tube, pressure set, no effort: the breath must be measured.
    PressurePassive,
    /// Tube, volume set, own breaths on top.
    OwnBreaths,
    /// Pressure support: a ratio and no curve.
    Support,
    /// Anything else by tube: the minute volume must be measured.
    Measured,
    /// A hand squeezes.
    ByHand,
    /// Mask, nothing, or a leak that is large or unknown.
    NoCurve,
    /// Not said how he breathes.
    NotSaid,
}

/// Which way it is.
pub(crate) fn way(settings: &Settings) -> Way {
    let tube = match settings.airway {
        None => return Way::NotSaid,
        Some(Airway::Mask | Airway::None) => return Way::NoCurve,
        Some(Airway::Supraglottic) => false,
        Some(Airway::Tube) => true,
    };
    if settings.control == Some(Control::ByHand) {
        return Way::ByHand;
    }
    if settings.control == Some(Control::None) {
        return Way::NoCurve;
    }
    let leak = settings.leak.unwrap_or(Leak::Unknown);
    if matches!(leak, Leak::Large | Leak::Unknown) {
        return Way::NoCurve;
    }
    let effort = match (settings.effort, settings.rate_total_per_min, settings.rate_per_min) {
        // More breaths than are set are his own, whatever was said.
        (Some(Effort::None), Some(total), Some(set)) if total > set => Effort::Present,
        (effort, ..) => effort.unwrap_or(Effort::Unknown),
    };
    match (tube, settings.control, effort, leak) {
        (true, Some(Control::Volume), Effort::None, Leak::None) => Way::Passive,
        (true, Some(Control::Pressure), Effort::None, Leak::None) => Way::PressurePassive,
        (true, Some(Control::Volume), Effort::Present, Leak::None) => Way::OwnBreaths,
        (_, Some(Control::PressureSupport), _, _) => Way::Support,
        _ => Way::Measured,
    }
}

/// The breath to compute with, when this way of breathing gives one.
pub(crate) fn breath(settings: &Settings) -> Option<Breath> {
    let breath = settings.breath();
    match way(settings) {
        Way::Passive => breath,
        // The set volume is what the machine adds, not what he takes: his total rate must be counted.
        Way::OwnBreaths => {
            breath.filter(|_| settings.minute_volume_l_min.is_some() || settings.rate_total_per_min.is_some())
        }
        Way::PressurePassive => breath.filter(|b| b.measured),
        Way::Support | Way::Measured => breath.filter(|_| settings.minute_volume_l_min.is_some()),
        Way::ByHand | Way::NoCurve | Way::NotSaid => None,
    }
}

/// The standing that follows from the way alone.
pub(crate) fn standing_of(settings: &Settings) -> Standing {
    let breath = breath(settings);
    match (way(settings), breath) {
        (Way::Passive, Some(_)) => forecast(),
        (Way::Passive, None) => withheld("settings", "Rate or tidal volume is not known.", "Type both."),
        (Way::PressurePassive, Some(b)) => conditional(
            "expired_volume_stays",
            format!("Holds if each breath stays {:.0} mL. Read it again in 2 minutes.", b.tidal_volume_ml),
        ),
        (Way::PressurePassive, None) => withheld(
            "expired_volume",
            "Pressure is set, so the breath isn't known until it is read off.",
            "Type the expired volume or minute volume the machine shows now.",
        ),
        (Way::OwnBreaths, Some(b)) => conditional(
            "keeps_breathing",
            format!(
                "Only if he keeps breathing {:.0} a minute, {:.0} mL each.",
                b.rate_per_min, b.tidal_volume_ml
            ),
        ),
        (Way::OwnBreaths, None) => withheld(
            "total_rate",
            "He takes breaths of his own and they weren't counted.",
            "Type the total rate or the expired minute volume.",
        ),
        (Way::Support, _) => withheld(
            "pressure_support",
            "Under pressure support only a ratio can be given, no curve.",
            "Type the expired minute volume for the ratio. A forecast needs a passive patient.",
        ),
        (Way::Measured, Some(b)) => conditional(
            "minute_volume_stays",
            format!("Only if minute volume stays {:.1} L/min.", b.rate_per_min * b.tidal_volume_ml / 1000.0),
        ),
        (Way::Measured, None) => {
            withheld("minute_volume", "How much he breathes isn't known.", "Type the expired minute volume.")
        }
        (Way::ByHand, _) => withheld(
            "by_hand",
            "By hand the breath isn't known, and the start won't be settled afterwards.",
            "Put him on the machine, then type a gas or the expired minute volume.",
        ),
        (Way::NoCurve, _) => withheld(
            "no_curve",
            "Mask, bag, own breathing or a leak: how much reaches the lung isn't known. No forecast.",
            "Draw a gas 30 to 60 min after a change. Watch drowsiness, rate and effort. Don't sedate to settle the patient.",
        ),
        (Way::NotSaid, _) => {
            withheld("how_he_breathes", "How he breathes was not typed.", "Type the settings.")
        }
    }
}

/// A forecast without conditions.
pub(crate) fn forecast() -> Standing {
    Standing { status: Status::Forecast, conditions: vec![], withheld: vec![] }
}

/// A conditional one.
pub(crate) fn conditional(id: &'static str, words: String) -> Standing {
    Standing { status: Status::Conditional, conditions: vec![Condition { id, words }], withheld: vec![] }
}

/// None, with its reason.
pub(crate) fn withheld(
    id: &'static str,
    words: impl Into<String>,
    would_help: impl Into<String>,
) -> Standing {
    let withheld = Withheld { id, words: words.into(), would_help: would_help.into() };
    Standing { status: Status::Withheld, conditions: vec![], withheld: vec![withheld] }
}

impl Standing {
    /// Both together: withheld beats conditional beats forecast, every word is kept.
    #[must_use]
    pub(crate) fn and(mut self, other: Standing) -> Standing {
        let rank = |status: Status| match status {
            Status::Forecast => 0,
            Status::Conditional => 1,
            Status::Withheld => 2,
        };
        if rank(other.status) > rank(self.status) {
            self.status = other.status;
        }
        self.conditions.extend(other.conditions);
        self.withheld.extend(other.withheld);
        self
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn tube(control: Control, effort: Option<Effort>, leak: Option<Leak>) -> Settings {
        Settings {
            airway: Some(Airway::Tube),
            control: Some(control),
            effort,
            leak,
            rate_per_min: Some(18.0),
            tidal_volume_ml: Some(340.0),
            ..Settings::default()
        }
    }

    #[test]
    fn the_table_row_by_row() {
        let none = (Some(Effort::None), Some(Leak::None));
        let rows: Vec<(Settings, Status)> = vec![
            (tube(Control::Volume, none.0, none.1), Status::Forecast),
            (tube(Control::Pressure, none.0, none.1), Status::Withheld),
            (
                Settings { tidal_volume_expired_ml: Some(380.0), ..tube(Control::Pressure, none.0, none.1) },
                Status::Conditional,
            ),
            (tube(Control::Volume, Some(Effort::Present), none.1), Status::Withheld),
            (
                Settings {
                    rate_total_per_min: Some(26.0),
                    ..tube(Control::Volume, Some(Effort::Present), none.1)
                },
                Status::Conditional,
            ),
            (
                Settings {
                    minute_volume_l_min: Some(8.0),
                    ..tube(Control::PressureSupport, Some(Effort::Present), Some(Leak::Small))
                },
                Status::Withheld,
            ),
            (tube(Control::Volume, None, none.1), Status::Withheld),
            (
                Settings { minute_volume_l_min: Some(8.0), ..tube(Control::Volume, None, none.1) },
                Status::Conditional,
            ),
            (tube(Control::Volume, none.0, None), Status::Withheld),
            (tube(Control::Volume, none.0, Some(Leak::Large)), Status::Withheld),
            (tube(Control::ByHand, none.0, none.1), Status::Withheld),
            (
                Settings { airway: Some(Airway::Mask), ..tube(Control::Volume, none.0, none.1) },
                Status::Withheld,
            ),
            (Settings { airway: Some(Airway::None), ..Settings::default() }, Status::Withheld),
            (Settings::default(), Status::Withheld),
        ];
        for (settings, status) in rows {
            let standing = standing_of(&settings);
            assert_eq!(standing.status, status, "{settings:?}");
            match status {
                Status::Forecast => assert!(standing.conditions.is_empty() && standing.withheld.is_empty()),
                Status::Conditional => assert!(!standing.conditions.is_empty()),
                Status::Withheld => assert!(standing.withheld.iter().all(|w| !w.would_help.is_empty())),
            }
        }
    }

    #[test]
    fn a_new_pressure_silences_it_until_the_volume_is_read() {
        let read = Settings {
            tidal_volume_expired_ml: Some(380.0),
            ..tube(Control::Pressure, Some(Effort::None), Some(Leak::None))
        };
        let changed = read.after(&Settings { inspiratory_pressure_cmh2o: Some(18.0), ..Settings::default() });
        assert_eq!(standing_of(&changed).status, Status::Withheld);
        let again = changed.after(&Settings { tidal_volume_expired_ml: Some(430.0), ..Settings::default() });
        assert_eq!(standing_of(&again).status, Status::Conditional);
    }
}
