//! Facets of a plane end cap.

use nalgebra::Point3;

/// Triangles over a section whose upper and lower side begin in the same nose and have equally many corners at matching
/// chord fractions, so that lines between matching corners cut it into strips. On the starboard side, seen from
/// starboard, they run counter-clockwise.
pub(super) fn cap(corners: &[Point3<f64>], upper: &[u32], lower: &[u32]) -> Vec<[u32; 3]> {
    let mut facets = Vec::with_capacity(2 * upper.len());
    let distance = |a: u32, b: u32| (corners[a as usize] - corners[b as usize]).norm_squared();
    for i in 0..upper.len() - 1 {
        let (a, b, c, d) = (upper[i], upper[i + 1], lower[i], lower[i + 1]);
        match (a == c, b == d) {
            (true, true) => {}
            (true, false) => facets.push([a, b, d]),
            (false, true) => facets.push([a, b, c]),
            (false, false) if distance(a, d) <= distance(b, c) => facets.extend([[a, b, d], [a, d, c]]),
            (false, false) => facets.extend([[a, b, c], [b, d, c]]),
        }
    }
    facets
}
