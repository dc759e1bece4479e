//! One body: three pools of CO2 and the flows between them.

use libm::sqrt;
use sources as s;

use crate::Chemistry;

/// What a pool holds at x = √PCO2: `squared`·x² + `root`·x + `blood_l`·F(x), in mL STPD.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Pool {
    /// Gas and lung tissue, mL/mmHg.
    pub squared: f64,
    /// Tissue, mL/mmHg^½: a slope that falls as the square root integrates to a root.
    pub root: f64,
    /// Blood at this pool's pressure, L.
    pub blood_l: f64,
}

/// Where a pool's pressure stands, with what hangs on it: x = √PCO2, F(x), and the slopes of F and of the
/// amount against x.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Level {
    pub x: f64,
    pub content: f64,
    pub content_slope: f64,
    pub amount_slope: f64,
}

impl Pool {
    /// The amount at x, and the level there.
    #[inline]
    pub fn at(&self, x: f64, chemistry: &Chemistry) -> (f64, Level) {
        let (content, content_slope) = chemistry.at(x);
        let amount = self.squared * x * x + self.root * x + self.blood_l * content;
        let amount_slope = 2.0 * self.squared * x + self.root + self.blood_l * content_slope;
        (amount, Level { x, content, content_slope, amount_slope })
    }

    /// The level at which the pool holds `amount`, `more` above what it held at `near`. It rises and is nearly
    /// straight: Newton, the first step from what is known of `near`. After a step under `DONE` the rest is
    /// its square, so the last correction is made straight on.
    #[inline]
    pub fn level_for(&self, amount: f64, more: f64, near: &Level, chemistry: &Chemistry) -> Level {
        const STEPS: usize = 12;
        const DONE: f64 = 1e-5;
        let positive = |next: f64, x: f64| if next > 0.0 { next } else { 0.5 * x };
        let mut x = positive(near.x + more / near.amount_slope, near.x);
        for _ in 0..STEPS {
            let (held, level) = self.at(x, chemistry);
            let by = (amount - held) / level.amount_slope;
            if by.abs() < DONE {
                return Level { x: x + by, content: level.content + level.content_slope * by, ..level };
            }
            x = positive(x + by, x);
        }
        self.at(x, chemistry).1
    }
}

/// A body. Flows in L/min, amounts in mL STPD.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Body {
    /// Lung gas, lung tissue and the blood at their pressure.
    pub(crate) lung: Pool,
    /// Well-perfused tissue with its blood.
    pub(crate) fast: Pool,
    /// Muscle, skin and fat with their blood.
    pub(crate) slow: Pool,
    /// Blood flow through the fast tissue, L/min.
    pub(crate) flow_fast: f64,
    /// Blood flow through the slow tissue, L/min.
    pub(crate) flow_slow: f64,
    /// Share of production in the fast tissue.
    pub(crate) made_fast: f64,
    /// Content that blood gains in the fast tissue by giving up oxygen, mL/L.
    pub(crate) offset_fast: f64,
    /// The same in the slow tissue.
    pub(crate) offset_slow: f64,
}

/// The state: amounts of CO2, what was breathed out, and where each pool's pressure stands.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct State {
    /// mL STPD in lung, fast, slow.
    pub(crate) amounts: [f64; 3],
    /// mL STPD breathed out so far.
    pub(crate) exhaled: f64,
    /// Where each pool's pressure stands: the inverse of the amounts.
    pub(crate) levels: [Level; 3],
}

/// What drives the body over a stretch of time.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Drive {
    /// Alveolar ventilation, L/min BTPS.
    pub alveolar_l_min: f64,
    /// Production, mL/min STPD.
    pub production_ml_min: f64,
}

impl Drive {
    /// CO2 carried off per mmHg, mL STPD/min/mmHg.
    #[inline]
    pub(crate) fn washout(&self) -> f64 {
        self.alveolar_l_min * 1000.0 / s::GAS_CONSTANT_FACTOR.value
    }

    /// The settled PaCO2 in mmHg: the 863 equation.
    #[must_use]
    pub fn settled_mmhg(&self) -> f64 {
        self.production_ml_min / self.washout()
    }
}

impl Body {
    /// The state in which nothing moves while the lung is held at `lung_mmhg`: tissues as far above it as
    /// their production needs.
    #[must_use]
    pub fn resting_at(&self, lung_mmhg: f64, production_ml_min: f64, chemistry: &Chemistry) -> State {
        let lung_x = sqrt(lung_mmhg);
        let arterial = chemistry.at(lung_x).0;
        let tissue = |made: f64, flow: f64, offset: f64| {
            chemistry.root_at_content(arterial + production_ml_min * made / flow - offset, lung_x)
        };
        let (lung, lung_level) = self.lung.at(lung_x, chemistry);
        let (fast, fast_level) =
            self.fast.at(tissue(self.made_fast, self.flow_fast, self.offset_fast), chemistry);
        let (slow, slow_level) =
            self.slow.at(tissue(1.0 - self.made_fast, self.flow_slow, self.offset_slow), chemistry);
        State { amounts: [lung, fast, slow], exhaled: 0.0, levels: [lung_level, fast_level, slow_level] }
    }
}

impl State {
    /// PaCO2, mmHg.
    #[must_use]
    pub fn paco2_mmhg(&self) -> f64 {
        self.levels[0].x * self.levels[0].x
    }

    /// All the CO2 in the pools and breathed out, mL STPD: it grows by what is made and by nothing else.
    #[must_use]
    pub fn total_ml(&self) -> f64 {
        self.amounts[0] + self.amounts[1] + self.amounts[2] + self.exhaled
    }
}
