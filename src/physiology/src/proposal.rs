//! Where members are drawn, in the axes of the curvature at the mode: first a little wider than the Gaussian
//! there, then, where that fits badly, a Gaussian with the mean and spread that the weighted members show.

use sources as s;

use crate::linear::cholesky;

/// A matched Gaussian is drawn this much wider in variance: too narrow a proposal gives a few members all the
/// weight.
const WIDER: f64 = 1.1;

/// A Gaussian to draw from.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Proposal {
    mean: Vec<f64>,
    root: Vec<Vec<f64>>,
}

impl Proposal {
    /// The Gaussian at the mode, wider by the published factor in the coordinates that a gas says something about.
    pub fn around_mode(informed: &[bool]) -> Self {
        let n = informed.len();
        let mut root = vec![vec![0.0; n]; n];
        for (i, row) in root.iter_mut().enumerate() {
            row[i] = if informed[i] { s::PROPOSAL_SPREAD.value } else { 1.0 };
        }
        Self { mean: vec![0.0; n], root }
    }

    /// A Gaussian with the mean and covariance of weighted `points`, trusted as far as their effective number
    /// goes and drawn towards the one at the mode for the rest; `None` when the covariance is not sound. What no
    /// gas says anything about stays as it was: there the members could only add noise.
    pub fn matching(points: &[Vec<f64>], weights: &[f64], effective: f64, informed: &[bool]) -> Option<Self> {
        let n = informed.len();
        let dimensions = informed.iter().filter(|i| **i).count();
        let trust = effective / (effective + dimensions as f64);
        let mut centre = vec![0.0; n];
        for (point, weight) in points.iter().zip(weights) {
            centre.iter_mut().zip(point).for_each(|(c, p)| *c += weight * p);
        }
        let mut covariance = vec![vec![0.0; n]; n];
        for (point, weight) in points.iter().zip(weights) {
            let off: Vec<f64> =
                (0..n).map(|i| if informed[i] { point[i] - centre[i] } else { 0.0 }).collect();
            for (row, a) in covariance.iter_mut().zip(&off) {
                row.iter_mut().zip(&off).for_each(|(c, b)| *c += WIDER * trust * weight * a * b);
            }
        }
        for (i, row) in covariance.iter_mut().enumerate() {
            row[i] += if informed[i] { WIDER * (1.0 - trust) } else { 1.0 };
        }
        let mean = (0..n).map(|i| if informed[i] { trust * centre[i] } else { 0.0 }).collect();
        cholesky(&covariance).map(|root| Self { mean, root })
    }

    /// The point that standard normals `xi` stand for. The density of all points of one proposal differs from
    /// that of `xi` by one factor, which weights don't need.
    pub fn point(&self, xi: &[f64]) -> Vec<f64> {
        self.mean
            .iter()
            .zip(&self.root)
            .map(|(mean, row)| mean + row.iter().zip(xi).map(|(r, x)| r * x).sum::<f64>())
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::standard_normals;

    #[test]
    fn a_matched_proposal_finds_the_middle_and_spread_of_its_points() {
        let points: Vec<Vec<f64>> = standard_normals(4096, 2, 1)
            .into_iter()
            .map(|z| vec![1.0 + 0.5 * z[0], z[1] + 0.8 * z[0]])
            .collect();
        let weights = vec![1.0 / 4096.0; 4096];
        let proposal = Proposal::matching(&points, &weights, 4096.0, &[true, true]).unwrap();
        assert!((proposal.mean[0] - 1.0).abs() < 0.01 && proposal.mean[1].abs() < 0.01);
        let variance = proposal.root[1][0] * proposal.root[1][0] + proposal.root[1][1] * proposal.root[1][1];
        assert!((variance / WIDER - 1.64).abs() < 0.02, "{variance}");
        let half = Proposal::matching(&points, &weights, 4096.0, &[false, true]).unwrap();
        assert_eq!((half.mean[0], half.root[0][0], half.root[1][0]), (0.0, 1.0, 0.0));
    }
}
