//! A tip of half ellipses.

use nalgebra::{Point3, Vector3};

use super::Section;
use crate::spline::{Knots, Surface, WeightedSurface};

/// A tip of half ellipses on the last section.
///
/// Upper and lower side are on the same knots then. For each pair of their control points U and L, with r = |U - L|/2 and
/// the outward direction d, the control points are U, U + r d, (U + L)/2 + r d, L + r d, L with weights 1, √½, 1, √½, 1: at
/// every chord station half an ellipse from the upper to the lower side.
#[derive(Clone, Debug, PartialEq)]
pub struct RoundTip {
    /// The surface: u from the nose to the trailing edge, v from the upper side to the lower.
    pub surface: WeightedSurface,
    /// How far it stands out \[mm\].
    pub reach: f64,
}

impl RoundTip {
    pub(super) fn on(section: &Section, knots: &Knots, outwards: &Vector3<f64>) -> Self {
        let mut rows = vec![section.upper.clone()];
        let radius = |i: usize| 0.5 * (section.upper[i] - section.lower[i]).norm();
        let count = section.upper.len();
        let out = |points: &dyn Fn(usize) -> Point3<f64>| {
            (0..count).map(|i| points(i) + outwards * radius(i)).collect()
        };
        rows.push(out(&|i| section.upper[i]));
        rows.push(out(&|i| nalgebra::center(&section.upper[i], &section.lower[i])));
        rows.push(out(&|i| section.lower[i]));
        rows.push(section.lower.clone());
        let across =
            Knots::clamped(2, 0.0, 1.0, &[0.5, 0.5]).expect("a double knot in a parabola is allowed");
        let half = std::f64::consts::FRAC_1_SQRT_2;
        Self {
            surface: WeightedSurface {
                surface: Surface {
                    u: knots.clone(),
                    v: across,
                    rows,
                },
                weights: vec![1.0, half, 1.0, half, 1.0],
            },
            reach: (0..count).map(radius).fold(0.0, f64::max),
        }
    }

    /// The half ellipse at the trailing edge, from the upper edge of the base to the lower: control points.
    pub fn rear(&self) -> Vec<Point3<f64>> {
        self.surface.surface.column_curve(true).points
    }

    pub(super) fn moved(&self, to: impl Fn(&Point3<f64>) -> Point3<f64>) -> Self {
        let mut tip = self.clone();
        for point in tip.surface.surface.rows.iter_mut().flatten() {
            *point = to(point);
        }
        tip
    }
}
