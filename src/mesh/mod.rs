//! Watertight facets of a wing, and their check.
//!
//! All side faces are bounded by lines of constant parameter, so one shared grid of parameters makes a mesh that is
//! watertight by construction: facets of neighbouring faces share the very same corner numbers.

mod build;
mod caps;
mod check;
mod deviation;
mod spacing;
mod tip;

pub use build::build;
pub(crate) use check::single;
pub use check::{Finding, check};

use nalgebra::Point3;

/// A closed triangle mesh.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Mesh {
    /// Corners \[mm\], none repeated.
    pub corners: Vec<Point3<f64>>,
    /// Facets as corner numbers, counter-clockwise as seen from outside.
    pub facets: Vec<[u32; 3]>,
    /// Largest distance between a facet and the surface it stands for, measured on the finished facets \[mm\].
    pub deviation: f64,
}

impl Mesh {
    /// Volume that the facets enclose \[mm³\].
    pub fn volume(&self) -> f64 {
        let origin = self.corners.first().copied().unwrap_or_else(Point3::origin);
        let corner = |k: u32| self.corners[k as usize] - origin;
        self.facets
            .iter()
            .map(|[a, b, c]| corner(*a).dot(&corner(*b).cross(&corner(*c))))
            .sum::<f64>()
            / 6.0
    }

    /// Area of all facets \[mm²\].
    pub fn area(&self) -> f64 {
        let corner = |k: u32| self.corners[k as usize];
        let area =
            |[a, b, c]: &[u32; 3]| (corner(*b) - corner(*a)).cross(&(corner(*c) - corner(*a))).norm() / 2.0;
        self.facets.iter().map(area).sum()
    }
}
