//! Symmetric banded systems of equations.

use super::knots::MAX_DEGREE;

const WIDTH: usize = MAX_DEGREE + 1;

/// The factor U of a symmetric positive definite matrix A = UᵀU with at most [`MAX_DEGREE`] entries right of its
/// diagonal: row i holds columns i to i + [`MAX_DEGREE`], the diagonal as its reciprocal.
#[derive(Clone, Debug)]
pub(super) struct Banded {
    rows: Vec<[f64; WIDTH]>,
}

impl Banded {
    /// Factorises a matrix whose row i holds columns i to i + [`MAX_DEGREE`]; what reaches beyond the last column is
    /// not read. `None` where it is not positive definite.
    pub(super) fn factorised(mut rows: Vec<[f64; WIDTH]>) -> Option<Self> {
        let n = rows.len();
        for i in 0..n {
            let diagonal = rows[i][0];
            if diagonal <= 0.0 || !diagonal.is_finite() {
                return None;
            }
            let reciprocal = 1.0 / diagonal.sqrt();
            for value in &mut rows[i] {
                *value *= reciprocal;
            }
            let pivot = rows[i];
            for (k, below) in rows[i + 1..n.min(i + WIDTH)].iter_mut().enumerate() {
                let factor = pivot[k + 1];
                for (j, value) in below.iter_mut().enumerate().take(WIDTH - 1 - k) {
                    *value -= factor * pivot[k + 1 + j];
                }
            }
            rows[i][0] = reciprocal;
        }
        Some(Self { rows })
    }

    /// Solves A x = b in place.
    pub(super) fn solve(&self, b: &mut [f64]) {
        let n = self.rows.len();
        for i in 0..n {
            let row = &self.rows[i];
            b[i] *= row[0];
            let value = b[i];
            for (k, below) in b[i + 1..n.min(i + WIDTH)].iter_mut().enumerate() {
                *below -= row[k + 1] * value;
            }
        }
        for i in (0..n).rev() {
            let row = &self.rows[i];
            let known: f64 = (b[i + 1..n.min(i + WIDTH)].iter().enumerate())
                .map(|(k, value)| row[k + 1] * value)
                .sum();
            b[i] = (b[i] - known) * row[0];
        }
    }
}

#[cfg(test)]
mod tests {
    use super::{Banded, WIDTH};

    #[test]
    fn a_system_with_a_known_solution_is_solved() {
        let n = 9;
        let matrix: Vec<[f64; WIDTH]> = (0..n)
            .map(|i| {
                std::array::from_fn(|k| {
                    if k == 0 {
                        8.0 + i as f64
                    } else {
                        1.0 / (k + i + 1) as f64
                    }
                })
            })
            .collect();
        let known: Vec<f64> = (0..n).map(|i| (i as f64 * 1.7).sin()).collect();
        let entry = |i: usize, j: usize| matrix[i.min(j)].get(i.abs_diff(j)).copied().unwrap_or(0.0);
        let mut b: Vec<f64> = (0..n)
            .map(|i| (0..n).map(|j| entry(i, j) * known[j]).sum())
            .collect();
        Banded::factorised(matrix.clone()).unwrap().solve(&mut b);
        for (found, known) in b.iter().zip(&known) {
            assert!((found - known).abs() < 1e-13, "{found} {known}");
        }
        assert!(
            Banded::factorised(vec![
                [1.0, 2.0, 0.0, 0.0, 0.0, 0.0],
                [1.0, 0.0, 0.0, 0.0, 0.0, 0.0]
            ])
            .is_none()
        );
    }
}
