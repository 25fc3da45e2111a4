//! Surfaces with weighted control rows.

use nalgebra::{Point3, Vector3};

use super::surface::{Derivative, Surface};

/// A spline surface of which each control row has a weight: what makes arcs of ellipses along v exact.
#[derive(Clone, Debug, PartialEq)]
pub struct WeightedSurface {
    /// Knots and control rows, not multiplied by their weights.
    pub surface: Surface,
    /// Weight of each row, `(surface.rows.len())`, > 0.
    pub weights: Vec<f64>,
}

impl WeightedSurface {
    /// Point at (u, v) \[mm\].
    pub fn at(&self, u: f64, v: f64) -> Point3<f64> {
        self.derivative(u, v).point
    }

    /// Point and first derivatives at (u, v) \[mm\].
    pub fn derivative(&self, u: f64, v: f64) -> Derivative {
        let (along, across) = (self.surface.u.derivatives(u), self.surface.v.derivatives(v));
        let (mut point, mut by_u, mut by_v) = (Vector3::zeros(), Vector3::zeros(), Vector3::zeros());
        let (mut weight, mut weight_rate) = (0.0, 0.0);
        for j in 0..=self.surface.v.degree() {
            let row = &self.surface.rows[across.first + j];
            let (mut value, mut slope) = (Vector3::zeros(), Vector3::zeros());
            for i in 0..=self.surface.u.degree() {
                value += row[along.first + i].coords * along.rows[0][i];
                slope += row[along.first + i].coords * along.rows[1][i];
            }
            let w = self.weights[across.first + j];
            point += value * (w * across.rows[0][j]);
            by_u += slope * (w * across.rows[0][j]);
            by_v += value * (w * across.rows[1][j]);
            weight += w * across.rows[0][j];
            weight_rate += w * across.rows[1][j];
        }
        let point = point / weight;
        Derivative {
            point: Point3::from(point),
            u: by_u / weight,
            v: (by_v - point * weight_rate) / weight,
        }
    }
}
