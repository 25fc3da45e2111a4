//! Facets of a plane end cap.

use nalgebra::{Point3, Vector3};

use super::zip::zip;

/// Triangles over a section of which the upper and lower side begin in the same nose; on the starboard side, seen from
/// starboard, they run counter-clockwise. They cover the section once: `None` where the two sides, as chains of straight
/// edges, cross each other, so that no such triangles exist, or where none were found.
pub(super) fn cap(corners: &[Point3<f64>], upper: &[u32], lower: &[u32]) -> Option<Vec<[u32; 3]>> {
    let corner = |k: u32| corners[k as usize];
    let normal = area([upper, lower], corners);
    let sound = |[a, b, c]: [u32; 3]| {
        (corner(b) - corner(a))
            .cross(&(corner(c) - corner(a)))
            .dot(&normal)
            > 0.0
    };
    let sharp = upper.last() == lower.last();
    let less = if sharp { 2 } else { 1 };
    let to = (upper.len() - less, lower.len() - less);
    let zipped = zip((1, 1), to, |(i, j), (k, l)| {
        let facet = if k > i {
            [upper[i], upper[k], lower[j]]
        } else {
            [upper[i], lower[l], lower[j]]
        };
        sound(facet).then(|| [(corner(upper[k]) - corner(lower[l])).norm_squared(), 0.0])
    })?;
    let first = [upper[0], upper[1], lower[1]];
    let last = sharp.then(|| [upper[to.0], upper[to.0 + 1], lower[to.1]]);
    let facets: Vec<[u32; 3]> = std::iter::once(first)
        .chain(zipped.facets((1, 1), upper, lower))
        .chain(last)
        .collect();
    (sound(first) && last.is_none_or(sound)).then_some(facets)
}

/// Area vector of the outline, to starboard where the upper side is above: from the nose over the upper side and back.
fn area([upper, lower]: [&[u32]; 2], corners: &[Point3<f64>]) -> Vector3<f64> {
    let nose = corners[upper[0] as usize];
    let sum = |chain: &[u32]| {
        chain.windows(2).fold(Vector3::zeros(), |sum, pair| {
            let [a, b] = [pair[0], pair[1]].map(|k| corners[k as usize] - nose);
            sum + a.cross(&b)
        })
    };
    let [last_upper, last_lower] =
        [upper, lower].map(|chain| corners[chain[chain.len() - 1] as usize] - nose);
    sum(upper) - sum(lower) + last_upper.cross(&last_lower)
}
