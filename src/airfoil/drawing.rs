//! What a drawing of a section shows besides its contour.

use super::section::Section;
use super::side::Side;

/// Curvature at a point of the contour.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Curvature {
    /// The point \[chord\].
    pub point: [f64; 2],
    /// Unit vector square to the contour, outwards.
    pub outwards: [f64; 2],
    /// Curvature, positive where the contour bulges outwards \[1/chord\].
    pub value: f64,
}

impl Section {
    /// Centre and radius of the circle that fits the nose \[chord\].
    pub fn nose_circle(&self) -> ([f64; 2], f64) {
        let at = self.nose();
        let radius = 1.0 / at.curvature().abs();
        // the upper side leaves the nose upwards, so that the inside is at its right
        let length = at.first[0].hypot(at.first[1]);
        let inside = [at.first[1] / length, -at.first[0] / length];
        (
            [at.point[0] + radius * inside[0], at.point[1] + radius * inside[1]],
            radius,
        )
    }

    /// Curvature along the contour from the upper trailing edge to the lower, at least `count` places a side.
    pub fn curvature(&self, count: usize) -> Vec<Curvature> {
        let mut upper = along(&self.upper, 1.0, count);
        upper.reverse();
        upper.extend(along(&self.lower, -1.0, count));
        upper
    }
}

/// Curvature along one side from the nose; `up` is 1 for the upper side, -1 for the lower.
fn along(side: &Side, up: f64, count: usize) -> Vec<Curvature> {
    let pieces = side.pieces();
    let each = count.div_ceil(pieces.len()).max(2);
    (pieces.iter())
        .flat_map(|&[from, to]| (0..each).map(move |i| from + (to - from) * (i as f64 + 0.5) / each as f64))
        .map(|parameter| {
            let at = side.local(parameter);
            let length = at.first[0].hypot(at.first[1]);
            Curvature {
                point: at.point,
                outwards: [-up * at.first[1] / length, up * at.first[0] / length],
                value: -up * at.curvature(),
            }
        })
        .collect()
}
