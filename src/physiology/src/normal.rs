//! The normal distribution on `libm`, so that the same seed gives the same draws everywhere.

use libm::{erfc, exp, log, sqrt};

const SQRT_2: f64 = core::f64::consts::SQRT_2;

/// 1/√(2π).
const PEAK: f64 = 0.398_942_280_401_432_7;

/// Share of a standard normal below `z`.
#[must_use]
pub fn normal_cdf(z: f64) -> f64 {
    0.5 * erfc(-z / SQRT_2)
}

/// The z below which a share `p` of a standard normal lies, for 0 < p < 1.
///
/// Start: the tail's leading term; then Halley's steps on the distribution itself, to the last few bits.
#[must_use]
pub fn normal_quantile(p: f64) -> f64 {
    const STEPS: usize = 12;
    const DONE: f64 = 1e-14;
    let tail = if p < 0.5 { p } else { 1.0 - p };
    let mut z = start(tail);
    for _ in 0..STEPS {
        let density = PEAK * exp(-0.5 * z * z);
        let newton = (normal_cdf(z) - tail) / density;
        let step = newton / (1.0 + 0.5 * z * newton);
        z -= step;
        if step.abs() < DONE {
            break;
        }
    }
    if p < 0.5 { z } else { -z }
}

/// A rough lower-tail quantile: linear near the middle, the tail's asymptote outside.
fn start(tail: f64) -> f64 {
    const MIDDLE_FROM: f64 = 0.2;
    if tail > MIDDLE_FROM {
        return (tail - 0.5) / PEAK;
    }
    let t = sqrt(-2.0 * log(tail));
    let correction = log(t) + 0.5 * log(2.0 * core::f64::consts::PI);
    -(t - correction / t)
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    #[test]
    fn quantiles_as_tabled() {
        // scipy.stats.norm.ppf (SciPy 1.x): p, z.
        for (p, z) in [
            (0.5, 0.0),
            (0.975, 1.959_963_984_540_054),
            (0.9, 1.281_551_565_544_600_4),
            (0.1, -1.281_551_565_544_600_4),
            (0.75, 0.674_489_750_196_081_7),
            (0.001, -3.090_232_306_167_813),
            (1e-6, -4.753_424_308_822_899),
            (1e-9, -5.997_807_015_007_686),
        ] {
            assert_abs_diff_eq!(normal_quantile(p), z, epsilon = 1e-9);
        }
    }
}
