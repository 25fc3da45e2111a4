//! Orthographic views: from millimetres of the wing to millimetres of paper.

use nalgebra::{Point3, Vector3};

use super::sheet::{At, Rect};

/// How views are arranged around the one from ahead.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Angle {
    /// First angle: what is seen from above stands below, what is seen from the left (starboard) stands on the right.
    First,
    /// Third angle: what is seen from above stands above, what is seen from the right (port) stands on the right.
    Third,
}

/// A view of the wing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct View {
    right: Vector3<f64>,
    up: Vector3<f64>,
    /// Towards the eye.
    pub towards: Vector3<f64>,
    /// Millimetres of paper a millimetre of the wing.
    pub scale: f64,
    /// Where the wing's origin stands on paper.
    pub origin: At,
}

impl View {
    const fn new(right: Vector3<f64>, up: Vector3<f64>, towards: Vector3<f64>) -> Self {
        Self {
            right,
            up,
            towards,
            scale: 1.0,
            origin: [0.0; 2],
        }
    }

    /// From ahead: starboard on the left.
    pub fn front() -> Self {
        Self::new(-Vector3::y(), Vector3::z(), -Vector3::x())
    }

    /// From above, the nose down the sheet, so that it stands in line with the view from ahead.
    pub fn plan() -> Self {
        Self::new(-Vector3::y(), Vector3::x(), Vector3::z())
    }

    /// From the side that stands on the right of the view from ahead.
    pub fn side(angle: Angle) -> Self {
        match angle {
            Angle::First => Self::new(-Vector3::x(), Vector3::z(), Vector3::y()),
            Angle::Third => Self::new(Vector3::x(), Vector3::z(), -Vector3::y()),
        }
    }

    /// Where a point of the wing \[mm\] stands on paper.
    pub fn at(&self, point: &Point3<f64>) -> At {
        let c = &point.coords;
        [
            self.origin[0] + self.scale * c.dot(&self.right),
            self.origin[1] - self.scale * c.dot(&self.up),
        ]
    }

    /// The box around points of the wing on paper.
    pub fn bounds<'a>(&self, points: impl IntoIterator<Item = &'a Point3<f64>>) -> Rect {
        Rect::around(points.into_iter().map(|point| self.at(point)))
    }

    /// Upper side, on paper, of a box that was taken of the view at scale 1.
    pub fn bounds_top(&self, bounds: &Rect) -> f64 {
        self.origin[1] + self.scale * bounds.top
    }

    /// The same view at a scale, moved so that the box `bounds` of the view at scale 1 has its upper left corner at
    /// `corner`.
    pub fn put(mut self, scale: f64, bounds: &Rect, corner: At) -> Self {
        self.scale = scale;
        self.origin = [corner[0] - scale * bounds.left, corner[1] - scale * bounds.top];
        self
    }
}

#[cfg(test)]
mod tests {
    use super::{Angle, View};

    #[test]
    fn views_are_right_handed_and_seen_from_outside() {
        for view in [
            View::front(),
            View::plan(),
            View::side(Angle::First),
            View::side(Angle::Third),
        ] {
            assert!((view.right.cross(&view.up) - view.towards).norm() < 1e-15);
        }
    }
}
