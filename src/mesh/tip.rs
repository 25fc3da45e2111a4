//! Facets of a round tip.

use nalgebra::Point3;

use super::Mesh;
use crate::loft::RoundTip;

/// A side of the tip section as it stands in the mesh: chordwise parameters and corner numbers from nose to tail.
#[derive(Clone, Copy)]
pub(super) struct Side<'a> {
    pub(super) parameters: &'a [f64],
    pub(super) corners: &'a [u32],
}

/// Share of the tolerance that the bend across the tip may take.
const SHARE: f64 = 0.6;
/// Most facets across a tip.
const MOST: u32 = 200;

/// A round tip and how it is to be divided.
#[derive(Clone, Copy)]
pub(super) struct Frame<'a> {
    pub(super) tip: &'a RoundTip,
    pub(super) port: bool,
    /// Unit of the 32-bit numbers that corners are rounded to \[mm\].
    pub(super) unit: f64,
    /// Largest distance of a facet from the surface that is aimed at \[mm\].
    pub(super) tolerance: f64,
}

impl Frame<'_> {
    /// Adds the facets between the upper and the lower side of the tip section, and of the half disc behind it where the
    /// trailing edge is blunt. Lines across the tip start at the upper side's parameters.
    pub(super) fn facets(self, mesh: &mut Mesh, [upper, lower]: [Side<'_>; 2]) {
        let rows = (1..MOST)
            .find(|n| sagitta(self.tip.reach, *n) <= SHARE * self.tolerance)
            .unwrap_or(MOST)
            .max(2);
        let last = upper.corners.len() - 1;
        let blunt = upper.corners[last] != lower.corners[lower.corners.len() - 1];
        let mut builder = Builder { mesh, frame: self };
        let mut before: Vec<u32> = upper.corners.to_vec();
        let mut rear = vec![before[last]];
        for j in 1..rows {
            let v = [j - 1, j].map(|j| f64::from(j) / f64::from(rows));
            let mut row = vec![before[0]];
            row.extend((1..last).map(|i| builder.corner(upper.parameters[i], v[1])));
            row.push(if blunt {
                builder.corner(1.0, v[1])
            } else {
                before[last]
            });
            builder.strip((upper.parameters, &before), (upper.parameters, &row), v);
            rear.push(row[last]);
            before = row;
        }
        let v = [rows - 1, rows].map(|j| f64::from(j) / f64::from(rows));
        builder.strip((upper.parameters, &before), (lower.parameters, lower.corners), v);
        if blunt {
            // from the upper edge down the base to the lower one, then up along the arc
            rear.push(lower.corners[lower.corners.len() - 1]);
            for pair in rear[1..].windows(2).rev() {
                builder.facet([rear[0], pair[1], pair[0]]);
            }
        }
    }
}

/// How far the middle of a chord is from a half circle of radius `r` that is cut into `n` parts, even in the parameter of a
/// weighted parabola, whose largest part is a quarter larger than the mean.
fn sagitta(r: f64, n: u32) -> f64 {
    r * (1.0 - (0.5 * 1.25 * std::f64::consts::PI / f64::from(n)).cos())
}

struct Builder<'a> {
    mesh: &'a mut Mesh,
    frame: Frame<'a>,
}

impl Builder<'_> {
    fn corner(&mut self, u: f64, v: f64) -> u32 {
        self.mesh.add(&self.frame.tip.surface.at(u, v), self.frame.unit)
    }

    /// A facet given counter-clockwise for the starboard side.
    fn facet(&mut self, [a, b, c]: [u32; 3]) {
        self.mesh
            .facets
            .push(if self.frame.port { [a, c, b] } else { [a, b, c] });
    }

    /// Facets between two lines of constant v, each with its own chordwise parameters: always on to the nearer next corner.
    fn strip(&mut self, (from_u, from): (&[f64], &[u32]), (to_u, to): (&[f64], &[u32]), v: [f64; 2]) {
        let (mut i, mut k) = (0, 0);
        while i + 1 < from.len() || k + 1 < to.len() {
            let first = k + 1 == to.len() || (i + 1 < from.len() && from_u[i + 1] <= to_u[k + 1]);
            let facet = if first {
                i += 1;
                [
                    (from[i - 1], from_u[i - 1], v[0]),
                    (from[i], from_u[i], v[0]),
                    (to[k], to_u[k], v[1]),
                ]
            } else {
                k += 1;
                [
                    (from[i], from_u[i], v[0]),
                    (to[k], to_u[k], v[1]),
                    (to[k - 1], to_u[k - 1], v[1]),
                ]
            };
            let [a, b, c] = facet.map(|corner| corner.0);
            if a != b && b != c && c != a {
                self.facet([a, b, c]);
                self.measure(&facet);
            }
        }
    }

    /// Distance of the surface from a facet's plane, at its middle and near the middles of its edges.
    fn measure(&mut self, facet: &[(u32, f64, f64); 3]) {
        let [a, b, c] = facet.map(|(corner, ..)| self.mesh.corners[corner as usize]);
        let normal = (b - a).cross(&(c - a));
        let length = normal.norm();
        if length == 0.0 {
            return;
        }
        for shares in [
            [1.0 / 3.0; 3],
            [0.48, 0.48, 0.04],
            [0.04, 0.48, 0.48],
            [0.48, 0.04, 0.48],
        ] {
            let mix = |pick: fn(&(u32, f64, f64)) -> f64| -> f64 {
                facet.iter().zip(shares).map(|(p, s)| pick(p) * s).sum()
            };
            let point: Point3<f64> = self.frame.tip.surface.at(mix(|p| p.1), mix(|p| p.2));
            self.mesh.deviation = self.mesh.deviation.max((point - a).dot(&normal).abs() / length);
        }
    }
}
