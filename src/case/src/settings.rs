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
    /// The state after `change`. A change of what drives the breath makes expired volumes measured
    /// before it stale: they are dropped unless the same entry gives them anew. The same for peak,
    /// total PEEP and the flow's return; a plateau outlives a new rate, but no new volume or pressure.
    #[must_use]
    pub fn after(&self, change: &Settings) -> Settings {
        let driven_anew = self.breath_differs(change);
        let keep = |old: Option<f64>| if driven_anew { None } else { old };
        Settings {
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
        }
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
