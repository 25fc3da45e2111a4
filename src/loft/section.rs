//! Sections in space.

use nalgebra::Point3;

use crate::airfoil::Profile;
use crate::planform::Station;

/// A section placed in space.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// Control points of the upper side \[mm\].
    pub upper: Vec<Point3<f64>>,
    /// Control points of the lower side \[mm\].
    pub lower: Vec<Point3<f64>>,
}

impl Section {
    pub(super) fn at(station: &Station, profile: &Profile) -> Self {
        let place = |points: &[[f64; 2]]| points.iter().map(|point| station.place(*point)).collect();
        let mut section = Self {
            upper: place(&profile.upper),
            lower: place(&profile.lower),
        };
        section.lower[0] = section.upper[0];
        section
    }

    /// The section a share of the way along straight elements to another.
    pub(super) fn towards(&self, other: &Self, share: f64) -> Self {
        let mix = |a: &[Point3<f64>], b: &[Point3<f64>]| {
            a.iter().zip(b).map(|(a, b)| a + (b - a) * share).collect()
        };
        Self {
            upper: mix(&self.upper, &other.upper),
            lower: mix(&self.lower, &other.lower),
        }
    }

    /// The chord line's front end: where upper and lower side meet \[mm\].
    pub fn nose(&self) -> Point3<f64> {
        self.upper[0]
    }

    /// Upper edge of the base \[mm\].
    pub fn upper_tail(&self) -> Point3<f64> {
        self.upper[self.upper.len() - 1]
    }

    /// Lower edge of the base; where the trailing edge is sharp the same as the upper \[mm\].
    pub fn lower_tail(&self) -> Point3<f64> {
        self.lower[self.lower.len() - 1]
    }
}
