//! Entries: what somebody saw, measured or did at a moment. Nothing is ever erased; a correction is an
//! entry of its own.

use crate::{Moment, Settings};

/// An entry's own name, unique in the case.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct EntryId(pub String);

/// One entry.
#[derive(Debug, Clone, PartialEq)]
pub struct Entry {
    /// Its name.
    pub id: EntryId,
    /// When it was so.
    pub at: Moment,
    /// When it was written, where an app wrote it.
    pub written_at: Option<Moment>,
    /// Minutes that the writing clock was ahead of UTC.
    pub utc_offset_min: Option<i32>,
    /// What it says.
    pub kind: EntryKind,
    /// Names of fields in it that were not understood; they are kept by whoever stores the case.
    pub not_understood: Vec<String>,
}

/// What an entry says.
#[derive(Debug, Clone, PartialEq)]
pub enum EntryKind {
    /// Settings that changed, or how he breathes.
    Settings(Settings),
    /// A blood gas.
    Gas(Gas),
    /// An end-tidal reading; kept, not learnt from yet.
    EndTidal(EndTidal),
    /// Something measured that is otherwise assumed.
    Measured(Measured),
    /// Breaths stopped, with the airway's state.
    BreathingStopped(AirwayState),
    /// Breaths again.
    BreathingRestored,
    /// Sedation.
    Sedation(Sedation),
    /// The circulation: steady, shock, arrest, restored.
    Circulation(Circulation),
    /// Bicarbonate given, mmol.
    BicarbonateGiven {
        /// How much, mmol.
        mmol: f64,
        /// Over how many minutes, where known.
        over_min: Option<f64>,
    },
    /// Body temperature, °C.
    Temperature(f64),
    /// A seizure.
    Seizure,
    /// Altitude in m.
    AltitudeM(f64),
    /// Barometric pressure in hPa.
    PressureHpa(f64),
    /// Pulse-oximeter saturation, %.
    Saturation(f64),
    /// Somebody looked and nothing has changed.
    Unchanged,
    /// A condition that is present, or not.
    Condition {
        /// Which.
        name: Condition,
        /// Present or ruled out.
        present: bool,
    },
    /// What the user decided about a gas that did not fit.
    GasVerdict(GasVerdict),
    /// New values for an earlier entry.
    Correction(Correction),
    /// Ticked checks, by their words.
    Checked(Vec<String>),
    /// Free words.
    Note(String),
    /// A kind this version does not know.
    NotUnderstood(NotUnderstood),
}

/// Where a sample came from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Site {
    /// An artery.
    Arterial,
    /// Arterialised capillary.
    Capillary,
    /// A central line.
    CentralVenous,
    /// An arm vein.
    PeripheralVenous,
}

/// A blood gas as the analyser printed it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Gas {
    /// Where from.
    pub site: Site,
    /// pH at the reported temperature, 6.5–8.0.
    pub ph: f64,
    /// PCO2, mmHg.
    pub pco2_mmhg: f64,
    /// PO2, mmHg.
    pub po2_mmhg: Option<f64>,
    /// HCO3 as printed, mmol/L.
    pub hco3_printed_mmol_l: Option<f64>,
    /// Haemoglobin, g/dL.
    pub hb_g_dl: Option<f64>,
    /// The patient's temperature, °C.
    pub temperature_c: Option<f64>,
    /// The temperature the values are reported at, °C.
    pub reported_at_c: Option<f64>,
    /// When it was analysed.
    pub analysed_at: Option<Moment>,
    /// Minutes the settings had been unchanged; `None`: not known to be settled.
    pub settings_held_min: Option<f64>,
}

/// The shape of the capnogram.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Trace {
    /// A plateau.
    Plateau,
    /// Sloping.
    Sloping,
    /// Flat or falling away.
    Flat,
}

/// An end-tidal reading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct EndTidal {
    /// EtCO2, mmHg.
    pub etco2_mmhg: f64,
    /// The trace, where it was looked at.
    pub trace: Option<Trace>,
}

/// What somebody measured; with `exact` it is taken without spread, for comparison with other models.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Measured {
    /// CO2 production, mL/min STPD.
    pub vco2_ml_min: Option<f64>,
    /// Dead space over tidal volume, 0–0.95.
    pub dead_space_fraction: Option<f64>,
    /// Cardiac output, L/min.
    pub cardiac_output_l_min: Option<f64>,
    /// Functional residual capacity, mL BTPS.
    pub frc_ml: Option<f64>,
    /// Taken without spread.
    pub exact: bool,
}

/// The airway while nobody breathes.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum AirwayState {
    /// Open, oxygen at it.
    OpenOxygen,
    /// Open to air.
    OpenAir,
    /// Closed.
    Closed,
}

/// How deep the sedation is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SedationLevel {
    /// None.
    None,
    /// Light.
    Light,
    /// Moderate.
    Moderate,
    /// Heavy.
    Heavy,
}

/// Sedation and muscle relaxation.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Sedation {
    /// Depth, where given.
    pub level: Option<SedationLevel>,
    /// Relaxant on board, where given.
    pub relaxant: Option<bool>,
}

/// State of the circulation.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Circulation {
    /// Steady.
    Steady,
    /// Shock.
    Shock,
    /// Arrest.
    Arrest,
    /// Restored after an arrest.
    Restored,
}

/// Conditions that change what may be offered.
#[derive(Debug, Clone, PartialEq)]
pub enum Condition {
    /// Lung injury.
    LungInjury,
    /// Severe airflow obstruction.
    AirflowObstruction,
    /// A chronic CO2 retainer, with the usual PaCO2 where known, mmHg.
    ChronicRetainer {
        /// Usual PaCO2, mmHg.
        usual_paco2_mmhg: Option<f64>,
    },
    /// Raised pressure in the skull.
    RaisedIntracranialPressure,
    /// Pregnancy.
    Pregnancy,
    /// Metabolic acidosis.
    MetabolicAcidosis,
    /// One this version does not know, by its name in the file.
    Other(String),
}

/// What to do with a gas that does not fit the forecast.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum GasChoice {
    /// The sample is wrong: left out.
    Sample,
    /// The patient has changed: start again from it.
    Patient,
    /// The machine or circuit has changed: start again from it.
    Machine,
}

/// The user's decision about one gas.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct GasVerdict {
    /// The gas.
    pub of: EntryId,
    /// The decision.
    pub choice: GasChoice,
}

/// New values for an earlier entry, which stays readable beside it.
#[derive(Debug, Clone, PartialEq)]
pub struct Correction {
    /// The entry corrected.
    pub of: EntryId,
    /// Its moment, where that is corrected.
    pub at: Option<Moment>,
    /// What it says now, whole.
    pub kind: Box<EntryKind>,
}

/// A kind of entry from a newer version: kept and shown, not used.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct NotUnderstood {
    /// The kind's name in the file.
    pub kind: String,
}
