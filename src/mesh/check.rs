//! Whether a mesh is a sound solid, also after rounding to a file's numbers.

use std::collections::HashMap;
use std::fmt;

use super::Mesh;

/// Why a mesh is not sound.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Finding {
    /// An edge between two corners that does not belong to exactly two facets in opposite senses.
    OpenEdge(u32, u32),
    /// A facet without area, the corners being equal in the file's 32-bit numbers.
    NoArea(usize),
    /// The facets face inwards.
    InsideOut,
    /// Two corners are equal in the file's 32-bit numbers.
    EqualCorners(u32, u32),
    /// Facets as fine as asked for cannot be said in 32-bit numbers, or are too many.
    TooFine,
}

impl fmt::Display for Finding {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::OpenEdge(a, b) => write!(f, "the edge between corners {a} and {b} is open"),
            Self::NoArea(k) => write!(f, "facet {k} has no area"),
            Self::InsideOut => write!(f, "the facets face inwards"),
            Self::TooFine => write!(f, "no facets within the tolerance were found"),
            Self::EqualCorners(a, b) => write!(f, "corners {a} and {b} are equal in 32-bit numbers"),
        }
    }
}

/// Checks that every edge is used twice in opposite senses, that no two corners fall together when rounded to 32-bit
/// numbers in units of `unit` \[mm\], that no facet loses its area, and that the facets face outwards.
///
/// # Errors
///
/// The first [`Finding`].
pub fn check(mesh: &Mesh, unit: f64) -> Result<(), Finding> {
    let mut edges: HashMap<(u32, u32), i32> = HashMap::with_capacity(mesh.facets.len() * 2);
    for [a, b, c] in &mesh.facets {
        for (p, q) in [(a, b), (b, c), (c, a)] {
            // each direction of an edge may be used once: 1 for low to high, 256 for high to low
            *edges.entry((*p.min(q), *p.max(q))).or_default() += if p < q { 1 } else { 256 };
        }
    }
    if let Some(((a, b), _)) = edges.iter().find(|(_, count)| **count != 257) {
        return Err(Finding::OpenEdge(*a, *b));
    }
    let rounded: Vec<[f32; 3]> = mesh.corners.iter().map(|p| single(p, unit)).collect();
    let mut seen: HashMap<[u32; 3], u32> = HashMap::with_capacity(rounded.len());
    for (k, point) in (0_u32..).zip(&rounded) {
        if let Some(other) = seen.insert(point.map(f32::to_bits), k) {
            return Err(Finding::EqualCorners(other, k));
        }
    }
    for (k, [a, b, c]) in mesh.facets.iter().enumerate() {
        let corner = |n: u32| nalgebra::Vector3::from(rounded[n as usize].map(f64::from));
        if (corner(*b) - corner(*a)).cross(&(corner(*c) - corner(*a))).norm() <= 0.0 {
            return Err(Finding::NoArea(k));
        }
    }
    if mesh.volume() <= 0.0 {
        return Err(Finding::InsideOut);
    }
    Ok(())
}

/// A corner as the file holds it: 32-bit numbers in the file's unit, zero without a sign.
#[expect(
    clippy::cast_possible_truncation,
    reason = "rounding to 32 bits is what is asked for"
)]
pub(crate) fn single(point: &nalgebra::Point3<f64>, unit: f64) -> [f32; 3] {
    [point.x, point.y, point.z].map(|c| (c / unit) as f32 + 0.0)
}
