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

impl Pool {
    /// Amount and its slope against x.
    #[inline]
    pub fn amount(&self, x: f64, chemistry: &Chemistry) -> (f64, f64) {
        let (f, slope) = chemistry.at(x);
        (
            self.squared * x * x + self.root * x + self.blood_l * f,
            2.0 * self.squared * x + self.root + self.blood_l * slope,
        )
    }

    /// The x at which the pool holds `amount`. It rises and is nearly straight: Newton from the last x.
    #[inline]
    pub fn root_for(&self, amount: f64, guess_x: f64, chemistry: &Chemistry) -> f64 {
        const STEPS: usize = 12;
        const DONE: f64 = 1e-11;
        let mut x = guess_x;
        for _ in 0..STEPS {
            let (held, slope) = self.amount(x, chemistry);
            let next = x - (held - amount) / slope;
            let moved = (next - x).abs();
            x = if next > 0.0 { next } else { 0.5 * x };
            if moved < DONE {
                break;
            }
        }
        x
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
    /// √PCO2 of each pool, the inverse of the amounts.
    pub(crate) roots: [f64; 3],
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
        let roots = [
            lung_x,
            tissue(self.made_fast, self.flow_fast, self.offset_fast),
            tissue(1.0 - self.made_fast, self.flow_slow, self.offset_slow),
        ];
        State {
            amounts: [
                self.lung.amount(roots[0], chemistry).0,
                self.fast.amount(roots[1], chemistry).0,
                self.slow.amount(roots[2], chemistry).0,
            ],
            exhaled: 0.0,
            roots,
        }
    }
}

impl State {
    /// PaCO2, mmHg.
    #[must_use]
    pub fn paco2_mmhg(&self) -> f64 {
        self.roots[0] * self.roots[0]
    }

    /// All the CO2 in the pools and breathed out, mL STPD: it grows by what is made and by nothing else.
    #[must_use]
    pub fn total_ml(&self) -> f64 {
        self.amounts[0] + self.amounts[1] + self.amounts[2] + self.exhaled
    }
}
