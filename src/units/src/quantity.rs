//! Newtypes for pressures and flows, and the list of quantities that a person may type.

/// Millimetres of mercury in one kilopascal (NIST SP 811, 2008, table B.8: 1 mmHg = 133.3224 Pa).
pub const KPA_IN_MMHG: f64 = 7.500_62;

/// A gas pressure in mmHg.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Mmhg(pub f64);

/// A gas pressure in kPa.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Kpa(pub f64);

/// A flow of gas in mL/min at 0 °C, 760 mmHg, dry: CO2 made, O2 used.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct FlowStpd(pub f64);

/// A flow of gas in L/min at body temperature, ambient pressure, saturated: ventilation.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct FlowBtps(pub f64);

impl From<Kpa> for Mmhg {
    fn from(kpa: Kpa) -> Self {
        Mmhg(kpa.0 * KPA_IN_MMHG)
    }
}

impl From<Mmhg> for Kpa {
    fn from(mmhg: Mmhg) -> Self {
        Kpa(mmhg.0 / KPA_IN_MMHG)
    }
}

/// Every quantity that a person or a case file may give, with its unit in the name.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Quantity {
    /// pH of blood, no unit.
    Ph,
    /// Partial pressure of CO2 in arterial blood.
    Paco2Mmhg,
    /// Partial pressure of CO2 in a sample that is not arterial.
    Pco2Mmhg,
    /// Partial pressure of O2 in blood.
    Po2Mmhg,
    /// Bicarbonate as the analyser printed it.
    Hco3MmolL,
    /// Breaths a minute, set or counted.
    RatePerMin,
    /// Volume of one breath.
    TidalVolumeMl,
    /// Expired volume of a minute, BTPS.
    MinuteVolumeLMin,
    /// Pressure at the end of expiration.
    PeepCmh2o,
    /// Pressure in a hold at the end of inspiration.
    PlateauCmh2o,
    /// Highest pressure of the breath.
    PeakCmh2o,
    /// Pressure set above PEEP.
    InspiratoryPressureCmh2o,
    /// Inspiratory time.
    InspiratoryTimeS,
    /// Inspired oxygen as a fraction.
    Fio2,
    /// Volume of exchanger, mount and tubing that is breathed again.
    ApparatusDeadSpaceMl,
    /// End-tidal CO2.
    Etco2Mmhg,
    /// Haemoglobin.
    HbGDl,
    /// Body weight.
    WeightKg,
    /// Standing height.
    HeightCm,
    /// Age.
    AgeYears,
    /// Body temperature.
    TemperatureC,
    /// Altitude, or cabin altitude.
    AltitudeM,
    /// Minutes that the settings had been unchanged before a gas.
    SettingsHeldMin,
    /// Pulse-oximeter saturation.
    Spo2Percent,
    /// CO2 production, measured.
    Vco2MlMin,
    /// Dead space over tidal volume, measured.
    DeadSpaceFraction,
    /// Cardiac output, measured.
    CardiacOutputLMin,
    /// Functional residual capacity, measured.
    FrcMl,
    /// Bicarbonate given.
    BicarbonateMmol,
    /// Minutes over which it was given.
    GivenOverMin,
    /// Barometric pressure.
    PressureHpa,
    /// Minutes that the clock which wrote an entry was ahead of UTC.
    UtcOffsetMin,
}
