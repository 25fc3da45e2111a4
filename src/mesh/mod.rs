//! Watertight facets of a wing, and their check.
//!
//! Each skin is divided along straight elements, which lead from root to tip; where it warps, the elements are divided
//! in turn. Neighbouring faces share the very same corner numbers, so the mesh is watertight by construction.

mod bending;
mod build;
mod caps;
mod check;
mod column;
mod grid;
mod spacing;
#[cfg(test)]
mod tests;
mod tip;
mod zip;

pub use build::build;
pub(crate) use check::single;
pub use check::{Finding, check};

use nalgebra::Point3;

/// What is asked of the facets.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Limits {
    /// Largest distance between a facet and the surface \[mm\].
    pub tolerance: f64,
}

/// A closed triangle mesh.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Mesh {
    /// Corners \[mm\], none repeated, each a 32-bit number of the file's unit.
    pub corners: Vec<Point3<f64>>,
    /// Facets as corner numbers, counter-clockwise as seen from outside.
    pub facets: Vec<[u32; 3]>,
    /// Largest distance between a facet and the surface it stands for, measured on the finished facets \[mm\].
    pub deviation: f64,
}

impl Mesh {
    /// Adds a corner, rounded to 32-bit numbers in units of `unit` \[mm\]; gives its number.
    fn add(&mut self, point: &Point3<f64>, unit: f64) -> u32 {
        let number = u32::try_from(self.corners.len()).expect("a mesh has fewer than 2^32 corners");
        let rounded = single(point, unit).map(|c| f64::from(c) * unit);
        self.corners.push(Point3::from(rounded));
        number
    }

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
