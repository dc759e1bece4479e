//! Small dense algebra for the learning: a positive definite system by Cholesky.

/// The lower factor L of a symmetric positive definite matrix, L·Lᵀ = A; `None` when it is not.
#[must_use]
pub(crate) fn cholesky(a: &[Vec<f64>]) -> Option<Vec<Vec<f64>>> {
    let n = a.len();
    let mut l = vec![vec![0.0; n]; n];
    for i in 0..n {
        for j in 0..=i {
            let known: f64 = l[i][..j].iter().zip(&l[j][..j]).map(|(x, y)| x * y).sum();
            let sum = a[i][j] - known;
            if i == j {
                if !(sum > 0.0 && sum.is_finite()) {
                    return None;
                }
                l[i][i] = libm::sqrt(sum);
            } else {
                l[i][j] = sum / l[j][j];
            }
        }
    }
    Some(l)
}

/// Solves L·y = b.
#[must_use]
pub(crate) fn forward(l: &[Vec<f64>], b: &[f64]) -> Vec<f64> {
    let mut y: Vec<f64> = Vec::with_capacity(b.len());
    for i in 0..b.len() {
        let sum: f64 = (0..i).map(|k| l[i][k] * y[k]).sum();
        y.push((b[i] - sum) / l[i][i]);
    }
    y
}

/// Solves Lᵀ·x = y.
#[must_use]
pub(crate) fn backward(l: &[Vec<f64>], y: &[f64]) -> Vec<f64> {
    let n = y.len();
    let mut x = vec![0.0; n];
    for i in (0..n).rev() {
        let sum: f64 = (i + 1..n).map(|k| l[k][i] * x[k]).sum();
        x[i] = (y[i] - sum) / l[i][i];
    }
    x
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn solves_a_system_known_by_hand() {
        // [[4, 2], [2, 3]]·[1, 2] = [8, 8].
        let l = cholesky(&[vec![4.0, 2.0], vec![2.0, 3.0]]).unwrap();
        let x = backward(&l, &forward(&l, &[8.0, 8.0]));
        assert!((x[0] - 1.0).abs() < 1e-12 && (x[1] - 2.0).abs() < 1e-12);
        assert_eq!(cholesky(&[vec![1.0, 2.0], vec![2.0, 1.0]]), None);
    }
}
