//! Splines through given points, and pieces of splines.
//!
//! Reference: C. de Boor, *A Practical Guide to Splines*, revised ed., Springer 2001, chapters IV and XIII.

use nalgebra::{DMatrix, DVector, Point3};

use super::knots::Knots;

/// What a cubic spline through points does at its ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ends {
    /// No bending: the second derivative is zero, as in a batten that ends freely.
    Free,
    /// The first two spans are one polynomial, and so are the last two: most accurate for samples of a smooth law.
    Continued,
}

/// The twice continuously differentiable spline through points, reduced to a matrix: control points are `matrix * values`.
///
/// Two points make a straight line, three a parabola (`Continued`) or a cubic (`Free`), more a cubic.
#[derive(Clone, Debug)]
pub struct Interpolation {
    /// Knots of the spline.
    pub knots: Knots,
    matrix: DMatrix<f64>,
}

impl Interpolation {
    /// Prepares for values at `parameters` (ascending, at least two, from 0 to 1).
    ///
    /// Returns `None` where the parameters do not ascend from 0 to 1.
    pub fn new(parameters: &[f64], ends: Ends) -> Option<Self> {
        let n = parameters.len();
        let ascending = parameters.windows(2).all(|pair| pair[1] - pair[0] > 1e-12);
        let unit = n >= 2 && parameters[0].abs() < 1e-15 && (parameters[n - 1] - 1.0).abs() < 1e-15;
        if !ascending || !unit {
            return None;
        }
        let inner = match (ends, n) {
            (_, 2) | (Ends::Continued, 3 | 4) => Vec::new(),
            (Ends::Continued, _) => parameters[2..n - 2].to_vec(),
            (Ends::Free, _) => parameters[1..n - 1].to_vec(),
        };
        let degree = match (ends, n) {
            (_, 2) => 1,
            (Ends::Continued, 3) => 2,
            _ => 3,
        };
        let knots = Knots::clamped(degree, 0.0, 1.0, &inner)?;
        let count = knots.count();
        let mut system = DMatrix::<f64>::zeros(count, count);
        let mut right = DMatrix::<f64>::zeros(count, n);
        let free_ends = count - n; // 0 or 2
        let offset = free_ends / 2;
        for (i, t) in parameters.iter().enumerate() {
            let (first, basis) = knots.basis(*t);
            for k in 0..=degree {
                system[(i + offset, first + k)] = basis[k];
            }
            right[(i + offset, i)] = 1.0;
        }
        if free_ends == 2 {
            for (row, t) in [(0, 0.0), (count - 1, 1.0)] {
                let d = knots.derivatives(t);
                for k in 0..=degree {
                    system[(row, d.first + k)] = d.rows[2][k];
                }
            }
        }
        let matrix = system.lu().solve(&right)?;
        Some(Self { knots, matrix })
    }

    /// Control points of the spline through `points`, one a parameter.
    pub fn through(&self, points: &[Point3<f64>]) -> Vec<Point3<f64>> {
        let last = points.len() - 1;
        let mut control: Vec<Point3<f64>> = (0..self.matrix.nrows())
            .map(|row| {
                let sum = points
                    .iter()
                    .enumerate()
                    .fold(nalgebra::Vector3::zeros(), |sum, (k, p)| {
                        sum + p.coords * self.matrix[(row, k)]
                    });
                Point3::from(sum)
            })
            .collect();
        // the ends are met to the last bit, so that what meets there stays one
        control[0] = points[0];
        let end = control.len() - 1;
        control[end] = points[last];
        control
    }

    /// The weight of each given value in the value at `t`.
    pub fn weights(&self, t: f64) -> Vec<f64> {
        let (first, basis) = self.knots.basis(t);
        let row = DVector::from_fn(self.matrix.nrows(), |k, _| {
            if k >= first && k <= first + self.knots.degree() {
                basis[k - first]
            } else {
                0.0
            }
        });
        (row.transpose() * &self.matrix).iter().copied().collect()
    }
}

/// The same curve on more knots: control points for `knots` with `added` (inside the range, no knot more often than the
/// degree) put in.
pub fn refined(knots: &Knots, points: &[[f64; 2]], added: &[f64]) -> Vec<[f64; 2]> {
    let p = knots.degree();
    let (mut values, mut points) = (knots.values().to_vec(), points.to_vec());
    for t in added {
        // Boehm's knot insertion
        let span = values.partition_point(|knot| knot <= t) - 1;
        let mut next = Vec::with_capacity(points.len() + 1);
        next.extend_from_slice(&points[..=span - p]);
        for i in span - p + 1..=span {
            let share = (t - values[i]) / (values[i + p] - values[i]);
            next.push([0, 1].map(|k| points[i - 1][k] + (points[i][k] - points[i - 1][k]) * share));
        }
        next.extend_from_slice(&points[span..]);
        values.insert(span + 1, *t);
        points = next;
    }
    points
}

/// The part of a spline from `t` to its end: knots and control points.
///
/// Returns `None` where `t` is not inside the range.
pub fn part_from(knots: &Knots, points: &[Point3<f64>], t: f64) -> Option<(Knots, Vec<Point3<f64>>)> {
    let (start, end) = knots.range();
    if !(t > start && t < end) {
        return None;
    }
    let p = knots.degree();
    let (mut values, mut points) = (knots.values().to_vec(), points.to_vec());
    let present = values.iter().filter(|knot| is(**knot, t)).count();
    for _ in present..p {
        // Boehm's knot insertion
        let span = values.partition_point(|knot| *knot <= t) - 1;
        let mut next = Vec::with_capacity(points.len() + 1);
        next.extend_from_slice(&points[..=span - p]);
        for i in span - p + 1..=span {
            if i >= points.len() {
                break;
            }
            let share = (t - values[i]) / (values[i + p] - values[i]);
            if share <= 0.0 {
                next.push(points[i - 1]);
            } else {
                next.push(points[i - 1] + (points[i] - points[i - 1]) * share);
            }
        }
        next.extend_from_slice(&points[span..]);
        values.insert(span + 1, t);
        points = next;
    }
    let first = values.iter().position(|knot| is(*knot, t))?;
    let interior: Vec<f64> = values[first + p..values.len() - p - 1].to_vec();
    let knots = Knots::clamped(p, t, end, &interior)?;
    let control = points.split_off(points.len() - knots.count());
    Some((knots, control))
}

/// The same number to the last bit, as knots that are copies of each other are.
fn is(a: f64, b: f64) -> bool {
    a.total_cmp(&b).is_eq()
}

#[cfg(test)]
mod tests {
    use nalgebra::Point3;

    use super::super::Curve;
    use super::{Ends, Interpolation, part_from};

    fn parameters(n: u32) -> Vec<f64> {
        (0..n)
            .map(|k| f64::from(k) / f64::from(n - 1))
            .map(|t| 0.7 * t + 0.3 * t * t)
            .map(|t| t / 1.0)
            .collect()
    }

    #[test]
    fn the_spline_passes_the_points_and_its_part_is_the_same_curve() {
        for ends in [Ends::Free, Ends::Continued] {
            for n in 2..9 {
                let mut at = parameters(n);
                let last = at.len() - 1;
                at[last] = 1.0;
                let points: Vec<Point3<f64>> = at
                    .iter()
                    .map(|t| Point3::new(t * 3.0, (5.0 * t).sin(), (3.0 * t).exp()))
                    .collect();
                let interpolation = Interpolation::new(&at, ends).unwrap();
                let curve = Curve {
                    knots: interpolation.knots.clone(),
                    points: interpolation.through(&points),
                };
                for (t, point) in at.iter().zip(&points) {
                    assert!((curve.at(*t) - point).norm() < 1e-12, "{ends:?} {n}");
                }
                for cut in [0.2, 0.37, 0.5, at[last / 2].clamp(0.01, 0.99)] {
                    let (knots, control) = part_from(&curve.knots, &curve.points, cut).unwrap();
                    let part = Curve {
                        knots,
                        points: control,
                    };
                    for k in 0..=20 {
                        let t = cut + (1.0 - cut) * f64::from(k) / 20.0;
                        assert!(
                            (part.at(t) - curve.at(t)).norm() < 1e-12,
                            "{ends:?} {n} {cut} {t}"
                        );
                    }
                }
            }
        }
    }

    #[test]
    fn a_cubic_law_is_met_exactly_where_the_ends_continue() {
        let at: Vec<f64> = (0..7).map(|k| f64::from(k) / 6.0).collect();
        let law = |t: f64| Point3::new(t, 1.0 - t * t, 2.0 * t * t * t - t);
        let points: Vec<_> = at.iter().map(|t| law(*t)).collect();
        let interpolation = Interpolation::new(&at, Ends::Continued).unwrap();
        let curve = Curve {
            knots: interpolation.knots.clone(),
            points: interpolation.through(&points),
        };
        for k in 0..=50 {
            let t = f64::from(k) / 50.0;
            assert!((curve.at(t) - law(t)).norm() < 1e-13);
            let weights = interpolation.weights(t);
            assert!((weights.iter().sum::<f64>() - 1.0).abs() < 1e-12);
        }
    }
}
