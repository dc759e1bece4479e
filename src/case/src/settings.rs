//! Settings: what an entry changes, and what a row of entries amounts to.

/// What the gas passes through.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Airway {
    /// A tube in the trachea.
    Tube,
    /// A supraglottic airway.
    Supraglottic,
    /// A mask.
    Mask,
    /// Nothing.
    None,
}

/// What the machine holds constant.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Control {
    /// Volume of the breath.
    Volume,
    /// Pressure of the breath.
    Pressure,
    /// Pressure under the patient's own breaths.
    PressureSupport,
    /// Nothing: a hand squeezes.
    ByHand,
    /// No machine.
    None,
}

/// Whether the patient breathes himself.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Effort {
    /// No breath of his own.
    None,
    /// Own breaths.
    Present,
    /// Not known.
    Unknown,
}

/// How much of the breath is lost.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Leak {
    /// None.
    None,
    /// Small.
    Small,
    /// Large.
    Large,
    /// Not known.
    Unknown,
}

/// One entry's settings (only what changed is given), or the state that several amount to.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Settings {
    /// What the gas passes through.
    pub airway: Option<Airway>,
    /// What the machine holds constant.
    pub control: Option<Control>,
    /// Whether the patient breathes himself; missing means unknown.
    pub effort: Option<Effort>,
    /// How much is lost; missing means unknown.
    pub leak: Option<Leak>,
    /// Rate set, /min.
    pub rate_per_min: Option<f64>,
    /// Rate counted with own breaths, /min.
    pub rate_total_per_min: Option<f64>,
    /// Tidal volume set, mL BTPS.
    pub tidal_volume_ml: Option<f64>,
    /// Tidal volume measured in expiration, mL BTPS.
    pub tidal_volume_expired_ml: Option<f64>,
    /// Minute volume measured in expiration, L/min BTPS.
    pub minute_volume_l_min: Option<f64>,
    /// Pressure set above PEEP, cmH2O.
    pub inspiratory_pressure_cmh2o: Option<f64>,
    /// PEEP set, cmH2O.
    pub peep_cmh2o: Option<f64>,
    /// PEEP measured in a hold, cmH2O.
    pub total_peep_cmh2o: Option<f64>,
    /// Plateau, cmH2O.
    pub plateau_cmh2o: Option<f64>,
    /// Peak, cmH2O.
    pub peak_cmh2o: Option<f64>,
    /// Inspiratory time, s.
    pub inspiratory_time_s: Option<f64>,
    /// Whether the expiratory flow comes back to zero before the next breath.
    pub flow_returns_to_zero: Option<bool>,
    /// Inspired oxygen, fraction.
    pub fio2: Option<f64>,
    /// Exchanger, mount and tubing, mL.
    pub apparatus_dead_space_ml: Option<f64>,
}

/// The breath that ventilates: rate and volume, and whether they were measured.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Breath {
    /// Breaths a minute.
    pub rate_per_min: f64,
    /// Volume of each, mL BTPS.
    pub tidal_volume_ml: f64,
    /// True when it comes from a measured expired or minute volume.
    pub measured: bool,
}

impl Settings {
    /// The state after `change`.
    ///
    /// What was measured holds until what drives the breath is changed. Then it is dropped, but for a volume that
    /// a machine sets against a passive patient: there the share that arrived before is taken to arrive again. A
    /// measured value typed later puts aside older ones that it contradicts. A plateau outlives a new rate, but
    /// no new volume or pressure; peak, total PEEP and the flow's return outlive nothing.
    #[must_use]
    pub fn after(&self, change: &Settings) -> Settings {
        let driven_anew = self.breath_differs(change);
        let keep = |old: Option<f64>| if driven_anew { None } else { old };
        let counted_anew =
            change.rate_total_per_min.is_some() && change.rate_total_per_min != self.rate_total_per_min;
        let mut after = Settings {
            airway: change.airway.or(self.airway),
            control: change.control.or(self.control),
            effort: change.effort.or(self.effort),
            leak: change.leak.or(self.leak),
            rate_per_min: change.rate_per_min.or(self.rate_per_min),
            rate_total_per_min: change.rate_total_per_min.or(keep(self.rate_total_per_min)),
            tidal_volume_ml: change.tidal_volume_ml.or(self.tidal_volume_ml),
            tidal_volume_expired_ml: change.tidal_volume_expired_ml.or(keep(self.tidal_volume_expired_ml)),
            minute_volume_l_min: change.minute_volume_l_min.or(keep(self.minute_volume_l_min)),
            inspiratory_pressure_cmh2o: change.inspiratory_pressure_cmh2o.or(self.inspiratory_pressure_cmh2o),
            peep_cmh2o: change.peep_cmh2o.or(self.peep_cmh2o),
            total_peep_cmh2o: change.total_peep_cmh2o.or(keep(self.total_peep_cmh2o)),
            plateau_cmh2o: change.plateau_cmh2o.or(if self.volume_differs(change) {
                None
            } else {
                self.plateau_cmh2o
            }),
            peak_cmh2o: change.peak_cmh2o.or(keep(self.peak_cmh2o)),
            inspiratory_time_s: change.inspiratory_time_s.or(self.inspiratory_time_s),
            flow_returns_to_zero: if driven_anew {
                change.flow_returns_to_zero
            } else {
                change.flow_returns_to_zero.or(self.flow_returns_to_zero)
            },
            fio2: change.fio2.or(self.fio2),
            apparatus_dead_space_ml: change.apparatus_dead_space_ml.or(self.apparatus_dead_space_ml),
        };
        if change.minute_volume_l_min.is_none() && (change.tidal_volume_expired_ml.is_some() || counted_anew)
        {
            after.minute_volume_l_min = None;
        }
        if change.minute_volume_l_min.is_some() && change.tidal_volume_expired_ml.is_none() {
            after.tidal_volume_expired_ml = None;
        }
        if driven_anew && !after.is_measured() {
            after.tidal_volume_expired_ml =
                self.arriving_share().and_then(|share| after.passive_volume().map(|ml| ml * share));
        }
        after
    }

    fn is_measured(&self) -> bool {
        self.minute_volume_l_min.is_some() || self.tidal_volume_expired_ml.is_some()
    }

    /// The volume set against a patient without breaths of his own.
    fn passive_volume(&self) -> Option<f64> {
        let passive = self.control == Some(Control::Volume)
            && self.effort == Some(Effort::None)
            && self.rate_total_per_min.is_none();
        self.tidal_volume_ml.filter(|_| passive)
    }

    /// Measured over set volume, where a machine sets it and it was measured.
    fn arriving_share(&self) -> Option<f64> {
        let measured = self.breath().filter(|breath| breath.measured)?;
        self.passive_volume().map(|set| measured.tidal_volume_ml / set)
    }

    /// Whether `change` sets another rate, volume, pressure, inspiratory time, airway or control.
    #[must_use]
    pub fn breath_differs(&self, change: &Settings) -> bool {
        self.volume_differs(change)
            || is_new(self.rate_per_min, change.rate_per_min)
            || is_new(self.inspiratory_time_s, change.inspiratory_time_s)
            || is_new(self.effort, change.effort)
    }

    /// Whether `change` alters what one breath holds or the pressure it needs.
    fn volume_differs(&self, change: &Settings) -> bool {
        is_new(self.tidal_volume_ml, change.tidal_volume_ml)
            || is_new(self.inspiratory_pressure_cmh2o, change.inspiratory_pressure_cmh2o)
            || is_new(self.peep_cmh2o, change.peep_cmh2o)
            || is_new(self.airway, change.airway)
            || is_new(self.control, change.control)
    }

    /// The breath: measured minute volume before measured expired volume before the set volume, with
    /// the total rate where it was counted. `None` when rate or every volume is missing.
    #[must_use]
    pub fn breath(&self) -> Option<Breath> {
        let rate_per_min = self.rate_total_per_min.or(self.rate_per_min)?;
        if rate_per_min <= 0.0 {
            return None;
        }
        let from_minute_volume = self.minute_volume_l_min.map(|l_min| l_min * 1000.0 / rate_per_min);
        let measured_ml = from_minute_volume.or(self.tidal_volume_expired_ml);
        let tidal_volume_ml = measured_ml.or(self.tidal_volume_ml)?;
        Some(Breath { rate_per_min, tidal_volume_ml, measured: measured_ml.is_some() })
    }

    /// Whether nothing at all is given.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        *self == Settings::default()
    }
}

fn is_new<T: PartialEq>(old: Option<T>, given: Option<T>) -> bool {
    given.is_some() && given != old
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ferry() -> Settings {
        Settings { rate_per_min: Some(18.0), tidal_volume_ml: Some(340.0), ..Settings::default() }
    }

    #[test]
    fn measured_minute_volume_wins_from_its_minute_on_and_goes_stale_with_a_new_rate() {
        let measured = ferry().after(&Settings { minute_volume_l_min: Some(5.4), ..Settings::default() });
        let breath = measured.breath().unwrap();
        assert_eq!((breath.tidal_volume_ml, breath.measured), (300.0, true));
        let faster = measured.after(&Settings { rate_per_min: Some(24.0), ..Settings::default() });
        let breath = faster.breath().unwrap();
        assert_eq!((breath.rate_per_min, breath.tidal_volume_ml, breath.measured), (24.0, 340.0, false));
    }

    #[test]
    fn the_share_that_arrives_of_a_set_volume_is_carried_on() {
        let passive = Settings { control: Some(Control::Volume), effort: Some(Effort::None), ..ferry() };
        let measured = passive.after(&Settings { minute_volume_l_min: Some(5.4), ..Settings::default() });
        for (change, ml) in [
            (Settings { rate_per_min: Some(24.0), ..Settings::default() }, 300.0),
            (Settings { tidal_volume_ml: Some(408.0), ..Settings::default() }, 360.0),
            (Settings { peep_cmh2o: Some(12.0), ..Settings::default() }, 300.0),
        ] {
            let breath = measured.after(&change).breath().unwrap();
            assert!((breath.tidal_volume_ml - ml).abs() < 1e-9, "{change:?}: {breath:?}");
        }
    }

    #[test]
    fn a_new_measured_value_puts_older_ones_aside() {
        let both = Settings { rate_total_per_min: Some(26.0), minute_volume_l_min: Some(9.0), ..ferry() };
        let counted = both.after(&Settings { rate_total_per_min: Some(14.0), ..Settings::default() });
        assert_eq!(counted.breath().map(|b| b.tidal_volume_ml), Some(340.0));
        let read = both.after(&Settings { tidal_volume_expired_ml: Some(220.0), ..Settings::default() });
        assert_eq!(read.breath().map(|b| b.tidal_volume_ml), Some(220.0));
        let minute = read.after(&Settings { minute_volume_l_min: Some(7.8), ..Settings::default() });
        assert_eq!(minute.breath().map(|b| b.tidal_volume_ml), Some(300.0));
    }

    #[test]
    fn the_same_values_typed_again_make_nothing_stale() {
        let measured =
            ferry().after(&Settings { tidal_volume_expired_ml: Some(331.0), ..Settings::default() });
        assert_eq!(measured.after(&ferry()), measured);
    }

    #[test]
    fn no_rate_no_breath() {
        assert_eq!(Settings { tidal_volume_ml: Some(340.0), ..Settings::default() }.breath(), None);
        assert_eq!(Settings { rate_per_min: Some(18.0), ..Settings::default() }.breath(), None);
    }
}
