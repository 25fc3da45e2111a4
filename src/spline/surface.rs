//! Spline surfaces.

use nalgebra::{Point3, Vector3};

use super::curve::Curve;
use super::knots::Knots;

/// A tensor-product spline surface.
#[derive(Clone, Debug, PartialEq)]
pub struct Surface {
    /// Knots of the first parameter.
    pub u: Knots,
    /// Knots of the second parameter.
    pub v: Knots,
    /// Control rows \[mm\], `(v.count(), u.count())`.
    pub rows: Vec<Vec<Point3<f64>>>,
}

/// A point of a surface with its first derivatives \[mm\].
#[derive(Clone, Copy, Debug)]
pub struct Derivative {
    /// The point.
    pub point: Point3<f64>,
    /// Derivative by the first parameter.
    pub u: Vector3<f64>,
    /// Derivative by the second parameter.
    pub v: Vector3<f64>,
}

impl Surface {
    /// Point at (u, v) \[mm\].
    pub fn at(&self, u: f64, v: f64) -> Point3<f64> {
        let (first_u, basis_u) = self.u.basis(u);
        let (first_v, basis_v) = self.v.basis(v);
        let mut sum = Vector3::zeros();
        for j in 0..=self.v.degree() {
            let row = &self.rows[first_v + j];
            for i in 0..=self.u.degree() {
                sum += row[first_u + i].coords * (basis_u[i] * basis_v[j]);
            }
        }
        Point3::from(sum)
    }

    /// Point and first derivatives at (u, v) \[mm\].
    pub fn derivative(&self, u: f64, v: f64) -> Derivative {
        let du = self.u.derivatives(u);
        let dv = self.v.derivatives(v);
        let mut sums = [Vector3::zeros(); 3];
        for j in 0..=self.v.degree() {
            let row = &self.rows[dv.first + j];
            let (mut along, mut slope) = (Vector3::zeros(), Vector3::zeros());
            for i in 0..=self.u.degree() {
                along += row[du.first + i].coords * du.rows[0][i];
                slope += row[du.first + i].coords * du.rows[1][i];
            }
            sums[0] += along * dv.rows[0][j];
            sums[1] += slope * dv.rows[0][j];
            sums[2] += along * dv.rows[1][j];
        }
        Derivative {
            point: Point3::from(sums[0]),
            u: sums[1],
            v: sums[2],
        }
    }

    /// The boundary curve at the first (`false`) or last (`true`) u, along v: the surface's own control column.
    pub fn column_curve(&self, last: bool) -> Curve {
        let column = if last { self.u.count() - 1 } else { 0 };
        Curve {
            knots: self.v.clone(),
            points: self.rows.iter().map(|row| row[column]).collect(),
        }
    }
}
