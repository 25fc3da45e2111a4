//! Visible outlines and edges of a solid, from its facets.
//!
//! An edge between two facets is drawn where only one of them faces the eye (an outline) or where they meet at an angle
//! (an edge of the solid); of each, the parts that no facet covers.

use nalgebra::{Point3, Vector3};

use super::sheet::{At, Rect};
use super::view::View;
use crate::mesh::Mesh;

/// Facets that meet at more than this make an edge \[rad\]: 25°.
const CREASE: f64 = 25.0 * std::f64::consts::PI / 180.0;
/// Parts of an edge that are looked at by themselves \[mm of paper\].
const PART: f64 = 1.0;
/// Cells along each side of the grid that finds facets over a point.
const CELLS: usize = 48;

/// An edge between two facets.
#[derive(Clone, Copy, Debug)]
struct Edge {
    corners: [u32; 2],
    facets: [usize; 2],
}

/// A mesh with its edges and normals: the same for all views.
#[derive(Debug)]
pub(super) struct Edges<'a> {
    mesh: &'a Mesh,
    normals: Vec<Vector3<f64>>,
    edges: Vec<Edge>,
}

impl<'a> Edges<'a> {
    /// Finds the edges of a closed mesh.
    pub(super) fn of(mesh: &'a Mesh) -> Self {
        let mut halves: Vec<([u32; 2], usize)> = Vec::with_capacity(3 * mesh.facets.len());
        for (facet, [a, b, c]) in mesh.facets.iter().enumerate() {
            for (from, to) in [(a, b), (b, c), (c, a)] {
                halves.push(([*from.min(to), *from.max(to)], facet));
            }
        }
        halves.sort_unstable();
        let edges = (halves.windows(2))
            .filter(|pair| pair[0].0 == pair[1].0)
            .map(|pair| Edge {
                corners: pair[0].0,
                facets: [pair[0].1, pair[1].1],
            })
            .collect();
        let normals = (mesh.facets.iter())
            .map(|facet| {
                let [a, b, c] = facet.map(|k| mesh.corners[k as usize]);
                (b - a).cross(&(c - a)).try_normalize(0.0).unwrap_or_default()
            })
            .collect();
        Self { mesh, normals, edges }
    }
}

/// The visible outlines and edges of solids in a view, as broken lines on paper.
pub(super) fn visible(solids: &[Edges<'_>], view: &View) -> Vec<Vec<At>> {
    let cover = Cover::of(solids, view);
    let mut parts = Vec::new();
    for solid in solids {
        let facing: Vec<bool> = (solid.normals.iter())
            .map(|normal| normal.dot(&view.towards) > 1e-7)
            .collect();
        for edge in &solid.edges {
            let [one, other] = edge.facets;
            let outline = facing[one] != facing[other];
            let creased = (facing[one] || facing[other])
                && solid.normals[one].dot(&solid.normals[other]) < CREASE.cos();
            if !(outline || creased) {
                continue;
            }
            let [a, b] = edge.corners.map(|k| solid.mesh.corners[k as usize]);
            let (from, to) = (view.at(&a), view.at(&b));
            let length = (to[0] - from[0]).hypot(to[1] - from[1]);
            if length < 1e-6 {
                continue;
            }
            let steps = (1..=4096_u32)
                .find(|n| length <= PART * f64::from(*n))
                .unwrap_or(4096);
            let at = |step: u32| a + (b - a) * (f64::from(step) / f64::from(steps));
            let mut start = None;
            for step in 0..steps {
                let middle = nalgebra::center(&at(step), &at(step + 1));
                if cover.hides(&middle, view) {
                    if let Some(first) = start.take() {
                        parts.push([view.at(&at(first)), view.at(&at(step))]);
                    }
                } else if start.is_none() {
                    start = Some(step);
                }
            }
            if let Some(first) = start {
                parts.push([view.at(&at(first)), to]);
            }
        }
    }
    joined(parts)
}

/// Facets that face the eye, found by their place on paper.
struct Cover {
    facets: Vec<([At; 3], [f64; 3])>,
    cells: Vec<Vec<usize>>,
    bounds: Rect,
    /// How far a facet must lie in front of a point to hide it \[mm\].
    margin: f64,
}

impl Cover {
    fn of(solids: &[Edges<'_>], view: &View) -> Self {
        let mut facets = Vec::new();
        for solid in solids {
            for (facet, normal) in solid.mesh.facets.iter().zip(&solid.normals) {
                if normal.dot(&view.towards) > 1e-7 {
                    let corners = facet.map(|k| solid.mesh.corners[k as usize]);
                    let depth = corners.map(|c| c.coords.dot(&view.towards));
                    facets.push((corners.map(|c| view.at(&c)), depth));
                }
            }
        }
        let bounds = Rect::around(facets.iter().flat_map(|(corners, _)| *corners)).grown(1e-6);
        let deviation = solids.iter().map(|s| s.mesh.deviation).fold(0.0, f64::max);
        let mut cover = Self {
            facets,
            cells: vec![Vec::new(); CELLS * CELLS],
            margin: 4.0 * deviation + 2e-6 * (bounds.width() + bounds.height()) / view.scale,
            bounds,
        };
        for k in 0..cover.facets.len() {
            let around = Rect::around(cover.facets[k].0);
            let (low, high) = (
                cover.cell([around.left, around.top]),
                cover.cell([around.right, around.bottom]),
            );
            for row in low[1]..=high[1] {
                for column in low[0]..=high[0] {
                    cover.cells[row * CELLS + column].push(k);
                }
            }
        }
        cover
    }

    /// Column and row of a point's cell.
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to the grid, a few dozen cells wide"
    )]
    fn cell(&self, [x, y]: At) -> [usize; 2] {
        let count = f64::from(u32::try_from(CELLS).unwrap_or(u32::MAX));
        let place = |v: f64, low: f64, length: f64| {
            ((v - low) / length.max(1e-12) * count).clamp(0.0, count - 1.0) as usize
        };
        [
            place(x, self.bounds.left, self.bounds.width()),
            place(y, self.bounds.top, self.bounds.height()),
        ]
    }

    /// Whether a facet lies in front of a point of the solid.
    fn hides(&self, point: &Point3<f64>, view: &View) -> bool {
        let at = view.at(point);
        let depth = point.coords.dot(&view.towards);
        let [column, row] = self.cell(at);
        self.cells[row * CELLS + column].iter().any(|k| {
            let (corners, depths) = &self.facets[*k];
            let Some(weights) = weights(corners, at) else {
                return false;
            };
            let here: f64 = weights.iter().zip(depths).map(|(w, d)| w * d).sum();
            here > depth + self.margin
        })
    }
}

/// Barycentric weights of a point well inside a triangle.
fn weights([a, b, c]: &[At; 3], [x, y]: At) -> Option<[f64; 3]> {
    let double = (b[0] - a[0]) * (c[1] - a[1]) - (c[0] - a[0]) * (b[1] - a[1]);
    let second = ((x - a[0]) * (c[1] - a[1]) - (c[0] - a[0]) * (y - a[1])) / double;
    let third = ((b[0] - a[0]) * (y - a[1]) - (x - a[0]) * (b[1] - a[1])) / double;
    let weights = [1.0 - second - third, second, third];
    // a point on a facet's own edge is not hidden by it
    weights.iter().all(|w| *w > 1e-4).then_some(weights)
}

/// Parts joined end to end where just two of them meet, and freed of points on straight lines.
fn joined(parts: Vec<[At; 2]>) -> Vec<Vec<At>> {
    let key = |[x, y]: At| ((x * 1e4).round().to_bits(), (y * 1e4).round().to_bits());
    let mut ends = std::collections::BTreeMap::<(u64, u64), Vec<usize>>::new();
    let mut seen = std::collections::BTreeSet::new();
    let parts: Vec<[At; 2]> = (parts.into_iter())
        .filter(|[a, b]| {
            let (a, b) = (key(*a), key(*b));
            a != b && seen.insert((a.min(b), a.max(b)))
        })
        .collect();
    for (k, [a, b]) in parts.iter().enumerate() {
        ends.entry(key(*a)).or_default().push(k);
        ends.entry(key(*b)).or_default().push(k);
    }
    let mut used = vec![false; parts.len()];
    let mut lines = Vec::new();
    for first in 0..parts.len() {
        if used[first] {
            continue;
        }
        used[first] = true;
        let mut line: std::collections::VecDeque<At> = parts[first].into();
        for forward in [true, false] {
            loop {
                let tip = if forward { line[line.len() - 1] } else { line[0] };
                let Some([one, other]) = ends.get(&key(tip)).map(Vec::as_slice) else {
                    break;
                };
                let Some(next) = [*one, *other].into_iter().find(|k| !used[*k]) else {
                    break;
                };
                used[next] = true;
                let [a, b] = parts[next];
                let far = if key(a) == key(tip) { b } else { a };
                if forward {
                    line.push_back(far);
                } else {
                    line.push_front(far);
                }
            }
        }
        lines.push(straightened(line.into()));
    }
    lines
}

/// The line without points that lie within 2 µm of paper of the straight line between their neighbours.
fn straightened(points: Vec<At>) -> Vec<At> {
    let mut kept: Vec<At> = Vec::with_capacity(points.len());
    for point in points {
        if let [.., a, b] = kept.as_slice() {
            let (way, step) = ([point[0] - a[0], point[1] - a[1]], [b[0] - a[0], b[1] - a[1]]);
            let length = way[0].hypot(way[1]);
            let aside = (way[0] * step[1] - way[1] * step[0]).abs();
            if aside <= 2e-3 * length && way[0] * step[0] + way[1] * step[1] > 0.0 {
                kept.pop();
            }
        }
        kept.push(point);
    }
    kept
}

#[cfg(test)]
mod tests {
    use nalgebra::Point3;

    use super::{Edges, visible};
    use crate::mesh::Mesh;
    use crate::write::drawing::view::View;

    fn block(low: [f64; 3], high: [f64; 3], shift: u32) -> (Vec<Point3<f64>>, Vec<[u32; 3]>) {
        let corners = (0..8_usize)
            .map(|k| {
                let pick = |axis: usize| if k >> axis & 1 == 1 { high[axis] } else { low[axis] };
                Point3::new(pick(0), pick(1), pick(2))
            })
            .collect();
        let facets = [
            [0, 2, 1],
            [1, 2, 3],
            [4, 5, 6],
            [5, 7, 6],
            [0, 1, 4],
            [1, 5, 4],
            [2, 6, 3],
            [3, 6, 7],
            [0, 4, 2],
            [2, 4, 6],
            [1, 3, 5],
            [3, 7, 5],
        ];
        (corners, facets.map(|f| f.map(|k: u32| k + shift)).to_vec())
    }

    #[test]
    fn a_block_shows_its_outline_and_hides_what_is_behind() {
        // a block of 10 x 20 under a smaller one of 4 x 4: from above both outlines, from ahead the front one's
        let (mut corners, mut facets) = block([0.0, 0.0, 0.0], [10.0, 20.0, 2.0], 0);
        let (more, others) = block([3.0, 8.0, 3.0], [7.0, 12.0, 5.0], 8);
        corners.extend(more);
        facets.extend(others);
        let mesh = Mesh {
            corners,
            facets,
            deviation: 0.0,
        };
        let edges = [Edges::of(&mesh)];
        let length = |view: &View| -> f64 {
            (visible(&edges, view).iter().flat_map(|line| line.windows(2)))
                .map(|p| (p[1][0] - p[0][0]).hypot(p[1][1] - p[0][1]))
                .sum()
        };
        // outlines of 60 and 16 mm; the lower block's outline passes nowhere under the upper one
        assert!(
            (length(&View::plan()) - 76.0).abs() < 1e-6,
            "{}",
            length(&View::plan())
        );
        // 44 mm of the lower block, 12 mm of the upper one
        assert!(
            (length(&View::front()) - 56.0).abs() < 1e-6,
            "{}",
            length(&View::front())
        );
    }
}
