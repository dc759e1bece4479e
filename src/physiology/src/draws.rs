//! Standard normal draws: a Sobol sequence with a fixed seed, through the normal quantile.

use crate::normal_quantile;

/// Half the spacing of the sequence's 24-bit numbers: keeps a draw of exactly 0 off the infinite tail.
const HALF_STEP: f64 = 1.0 / 33_554_432.0;

/// `members` rows of `dimensions` standard normals. Same seed, same bits. Dimensions beyond the sequence's
/// 256 continue it under another seed.
#[must_use]
pub fn standard_normals(members: usize, dimensions: usize, seed: u32) -> Vec<Vec<f64>> {
    let sequence_dimensions = sobol_burley::NUM_DIMENSIONS;
    (0..members as u32)
        .map(|member| {
            (0..dimensions as u32)
                .map(|d| {
                    let block = d / sequence_dimensions;
                    let u =
                        sobol_burley::sample(member, d % sequence_dimensions, seed ^ (block * 0x9E37_79B9));
                    normal_quantile(f64::from(u) + HALF_STEP)
                })
                .collect()
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_dimension_is_standard_normal_and_the_seed_decides() {
        let draws = standard_normals(256, 20, 1);
        for d in 0..20 {
            let mean: f64 = draws.iter().map(|row| row[d]).sum::<f64>() / 256.0;
            let square: f64 = draws.iter().map(|row| row[d] * row[d]).sum::<f64>() / 256.0;
            assert!(mean.abs() < 0.02 && (square - 1.0).abs() < 0.05, "{d}: {mean} {square}");
        }
        assert_eq!(draws, standard_normals(256, 20, 1));
        assert_ne!(draws, standard_normals(256, 20, 2));
    }
}
