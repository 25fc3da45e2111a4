//! Weighted least squares for spline functions with some coefficients given.

use super::banded::Banded;
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
    factor: Banded,
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
        let free = knots.count().checked_sub(fixed_start + fixed_end)?;
        let width = knots.degree() + 1;
        // the products of all coefficients, the given ones included, row i holding those with i to i + degree
        let mut products = vec![[0.0; MAX_DEGREE + 1]; knots.count()];
        let mut rows = Vec::with_capacity(parameters.size_hint().0);
        let mut span = knots.on_span(knots.degree());
        for (t, weight) in parameters {
            if !span.holds(t) {
                span = knots.on_span(knots.span(t));
            }
            let (first, basis) = (span.first, span.at(t));
            let square = weight * weight;
            for i in 0..width {
                let scaled = square * basis[i];
                for (product, other) in products[first + i].iter_mut().zip(&basis[i..width]) {
                    *product += scaled * other;
                }
            }
            rows.push(Row { first, basis, weight });
        }
        let mut normal = products[fixed_start..fixed_start + free].to_vec();
        // a trace of the identity keeps a coefficient that no sample reaches from making the system singular
        let trace = 1e-14 * normal.iter().map(|row| row[0]).fold(0.0, f64::max);
        for row in &mut normal {
            row[0] += trace;
        }
        Some(Self {
            knots: knots.clone(),
            rows,
            fixed_start,
            free,
            factor: Banded::factorised(normal)?,
        })
    }

    /// Solves for the function that meets `values` (one a parameter) best, with the given first and last coefficients.
    pub fn solve(&self, values: &[f64], start: &[f64], end: &[f64]) -> Fit {
        let width = self.knots.degree() + 1;
        let mut coefficients = vec![0.0; self.knots.count()];
        coefficients[..start.len()].copy_from_slice(start);
        let tail = coefficients.len() - end.len();
        coefficients[tail..].copy_from_slice(end);
        let mut right = vec![0.0; coefficients.len()];
        for (Row { first, basis, weight }, value) in self.rows.iter().zip(values) {
            let given: f64 = (0..width).map(|i| basis[i] * coefficients[first + i]).sum();
            let rest = (value - given) * weight * weight;
            for i in 0..width {
                right[first + i] += basis[i] * rest;
            }
        }
        let free = self.fixed_start..self.fixed_start + self.free;
        self.factor.solve(&mut right[free.clone()]);
        coefficients[free.clone()].copy_from_slice(&right[free]);
        let deviations = (self.rows.iter().zip(values))
            .map(|(Row { first, basis, weight }, value)| {
                let fitted: f64 = (0..width).map(|i| basis[i] * coefficients[first + i]).sum();
                (fitted - value) * weight
            })
            .collect();
        let function = Function {
            knots: self.knots.clone(),
            coefficients,
        };
        Fit { function, deviations }
    }
}
