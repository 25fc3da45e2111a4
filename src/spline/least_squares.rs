//! Weighted least squares for spline functions with some coefficients given.

use nalgebra::{DMatrix, DVector};

use super::curve::Function;
use super::knots::{Knots, MAX_DEGREE};

/// A fitted function and how far it is from the samples.
#[derive(Clone, Debug)]
pub struct Fit {
    /// The function.
    pub function: Function,
    /// Deviation at each sample times its weight.
    pub deviations: Vec<f64>,
}

/// A parameter's place in the system.
#[derive(Clone, Copy, Debug)]
struct Row {
    first: usize,
    basis: [f64; MAX_DEGREE + 1],
    weight: f64,
}

/// The normal equations on one knot vector and one set of parameters and weights, factorised once for many right sides.
#[derive(Debug)]
pub struct LeastSquares {
    knots: Knots,
    rows: Vec<Row>,
    fixed_start: usize,
    free: usize,
    factor: Option<nalgebra::Cholesky<f64, nalgebra::Dyn>>,
}

impl LeastSquares {
    /// Prepares a fit on `knots` at parameters with weights; the first `fixed_start` and last `fixed_end` coefficients
    /// will be given, not solved for. Returns `None` where the parameters do not settle the rest.
    pub fn new(
        knots: &Knots,
        parameters: impl Iterator<Item = (f64, f64)>,
        fixed_start: usize,
        fixed_end: usize,
    ) -> Option<Self> {
        let rows: Vec<_> = parameters
            .map(|(t, weight)| {
                let (first, basis) = knots.basis(t);
                Row { first, basis, weight }
            })
            .collect();
        let free = knots.count().checked_sub(fixed_start + fixed_end)?;
        let width = knots.degree() + 1;
        let mut normal = DMatrix::<f64>::zeros(free, free);
        for Row { first, basis, weight } in &rows {
            let square = weight * weight;
            for i in 0..width {
                let Some(a) = (first + i).checked_sub(fixed_start).filter(|a| *a < free) else {
                    continue;
                };
                for j in 0..=i {
                    let Some(b) = (first + j).checked_sub(fixed_start) else {
                        continue;
                    };
                    normal[(a, b)] += square * basis[i] * basis[j];
                }
            }
        }
        // a trace of the identity keeps a coefficient that no sample reaches from making the system singular
        let scale = (0..free).map(|i| normal[(i, i)]).fold(0.0, f64::max);
        for i in 0..free {
            normal[(i, i)] += scale * 1e-14;
        }
        let factor = if free == 0 { None } else { Some(normal.cholesky()?) };
        Some(Self {
            knots: knots.clone(),
            rows,
            fixed_start,
            free,
            factor,
        })
    }

    /// Solves for the function that meets `values` (one a parameter) best, with the given first and last coefficients.
    pub fn solve(&self, values: &[f64], start: &[f64], end: &[f64]) -> Fit {
        let width = self.knots.degree() + 1;
        let mut coefficients = vec![0.0; self.knots.count()];
        coefficients[..start.len()].copy_from_slice(start);
        let tail = coefficients.len() - end.len();
        coefficients[tail..].copy_from_slice(end);
        if let Some(factor) = &self.factor {
            let mut right = DVector::<f64>::zeros(self.free);
            for (Row { first, basis, weight }, value) in self.rows.iter().zip(values) {
                let given: f64 = (0..width).map(|i| basis[i] * coefficients[first + i]).sum();
                let rest = (value - given) * weight * weight;
                for i in 0..width {
                    if let Some(a) = (first + i)
                        .checked_sub(self.fixed_start)
                        .filter(|a| *a < self.free)
                    {
                        right[a] += basis[i] * rest;
                    }
                }
            }
            factor.solve_mut(&mut right);
            for (i, value) in right.iter().enumerate() {
                coefficients[self.fixed_start + i] = *value;
            }
        }
        let function = Function {
            knots: self.knots.clone(),
            coefficients,
        };
        let deviations = (self.rows.iter().zip(values))
            .map(|(Row { first, basis, weight }, value)| {
                let fitted: f64 = (0..width)
                    .map(|i| basis[i] * function.coefficients[first + i])
                    .sum();
                (fitted - value) * weight
            })
            .collect();
        Fit { function, deviations }
    }
}
