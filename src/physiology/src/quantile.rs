//! Quantiles of weighted members.

/// The value below which a share `p` of the weight lies, linear between the members' middles. Weights are
/// not negative and not all zero; `pairs` are (value, weight) and come back sorted.
#[must_use]
pub fn weighted_quantile(pairs: &mut [(f64, f64)], p: f64) -> f64 {
    sort_weighted(pairs);
    read(pairs, p)
}

/// Several quantiles of the same members.
#[must_use]
pub fn weighted_quantiles<const N: usize>(pairs: &mut [(f64, f64)], shares: [f64; N]) -> [f64; N] {
    sort_weighted(pairs);
    shares.map(|p| read(pairs, p))
}

/// Sorts (value, weight) by value; runs that are in order already are only merged.
#[inline(never)]
pub fn sort_weighted(pairs: &mut [(f64, f64)]) {
    pairs.sort_by(|a, b| a.0.total_cmp(&b.0));
}

fn read(sorted: &[(f64, f64)], p: f64) -> f64 {
    let total: f64 = sorted.iter().map(|(_, w)| w).sum();
    let wanted = p * total;
    let mut below = 0.0;
    let mut previous: Option<(f64, f64)> = None;
    for &(value, weight) in sorted {
        let middle = below + 0.5 * weight;
        if middle >= wanted {
            return match previous {
                Some((before, at)) if middle > at => {
                    before + (value - before) * (wanted - at) / (middle - at)
                }
                _ => value,
            };
        }
        below += weight;
        previous = Some((value, middle));
    }
    previous.map_or(f64::NAN, |(value, _)| value)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_middle_of_three_and_of_weights() {
        assert_eq!(weighted_quantile(&mut [(3.0, 1.0), (1.0, 1.0), (2.0, 1.0)], 0.5), 2.0);
        // Nearly all the weight on one member pulls every quantile to it.
        let [low, high] = weighted_quantiles(&mut [(1.0, 1e-9), (5.0, 1.0), (9.0, 1e-9)], [0.1, 0.9]);
        assert!((low - 5.0).abs() < 4.0 && (high - 5.0).abs() < 4.0 && low <= high);
    }

    #[test]
    fn evenly_spread_members_give_their_shares() {
        let mut even: Vec<(f64, f64)> = (0..1000).map(|i| (f64::from(i) / 1000.0, 1.0)).collect();
        for p in [0.1, 0.5, 0.9] {
            assert!((weighted_quantile(&mut even, p) - p).abs() < 1e-3);
        }
    }
}
