//! The forecast: where PaCO2 and pH will be, how sure that is, and when it has settled.

/// The 10th, 50th and 90th percentile of one value: eight times in ten it lies between the outer two.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Quantiles {
    /// Lower edge.
    pub p10: f64,
    /// Middle.
    pub p50: f64,
    /// Upper edge.
    pub p90: f64,
}

/// Percentiles over time, one entry a minute asked for.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Band {
    /// Lower edges.
    pub p10: Vec<f64>,
    /// Middles.
    pub p50: Vec<f64>,
    /// Upper edges.
    pub p90: Vec<f64>,
}

impl Band {
    /// The percentiles at position `index` of the minutes asked for.
    #[must_use]
    pub fn at(&self, index: usize) -> Option<Quantiles> {
        Some(Quantiles { p10: *self.p10.get(index)?, p50: *self.p50.get(index)?, p90: *self.p90.get(index)? })
    }
}

/// Settled values.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Settled {
    /// PaCO2, mmHg.
    pub paco2_mmhg: Quantiles,
    /// pH (p10 is the lowest).
    pub ph: Quantiles,
}

/// What little can be said under pressure support: how PaCO2 answers to minute volume.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ratio {
    /// Minute volume over today's.
    pub minute_volume_factor: f64,
    /// Where PaCO2 would settle, mmHg.
    pub paco2_mmhg: Quantiles,
}

/// A forecast from a moment on.
#[derive(Debug, Clone, PartialEq)]
pub struct Forecast {
    /// Minutes after the moment asked about, as asked.
    pub minutes: Vec<f64>,
    /// The patient's PaCO2, mmHg.
    pub paco2_mmhg: Band,
    /// The patient's pH; p10 is the lowest.
    pub ph: Band,
    /// HCO3 in blood, mmol/L.
    pub hco3_mmol_l: Band,
    /// What a gas would read: PaCO2 with measurement error, mmHg.
    pub gas_would_read_paco2_mmhg: Band,
    /// What a gas would read: pH with measurement error.
    pub gas_would_read_ph: Band,
    /// Where it settles if nothing else changes.
    pub settled: Settled,
    /// Minutes until PaCO2 stays within 2 mmHg of its settled value; 0 when it is already there.
    pub minutes_to_within_2_mmhg: Quantiles,
    /// Minutes until 90 % of the way is done; 0 when there is no way to go.
    pub minutes_to_90_percent: Quantiles,
}
