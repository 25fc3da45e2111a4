//! How far facets are from the surface they stand for.

use nalgebra::{Point3, Vector3};

use crate::spline::{Knots, Surface};

/// A ruled skin, evaluated at the grid's chordwise parameters and between them.
pub(super) struct Skin {
    /// Per parameter: point on the inner and outer section.
    nodes: Vec<[Point3<f64>; 2]>,
    /// Per interval and inner parameter (1/4, 1/2, 3/4): point and chordwise derivative on the inner and outer section.
    between: Vec<[Probe; 3]>,
}

type Probe = [(Point3<f64>, Vector3<f64>); 2];

/// Two facets over a grid cell.
#[derive(Clone, Copy, Debug)]
pub(super) struct Cell {
    /// Whether the diagonal runs from (u0, v0) to (u1, v1); else from (u1, v0) to (u0, v1).
    pub(super) rising: bool,
    /// Largest distance from the surface \[mm\].
    pub(super) deviation: f64,
}

const QUARTERS: [f64; 3] = [0.25, 0.5, 0.75];

impl Skin {
    pub(super) fn new(surface: &Surface, chordwise: &[f64]) -> Self {
        let rows = [&surface.rows[0], &surface.rows[1]];
        let nodes = chordwise
            .iter()
            .map(|u| rows.map(|row| point(&surface.u, row, *u)))
            .collect();
        let between = (chordwise.windows(2))
            .map(|pair| {
                QUARTERS.map(|q| {
                    let u = pair[0] + q * (pair[1] - pair[0]);
                    rows.map(|row| point_and_slope(&surface.u, row, u))
                })
            })
            .collect();
        Self { nodes, between }
    }

    /// Point at chordwise parameter `i` and spanwise fraction `v`.
    pub(super) fn at(&self, i: usize, v: f64) -> Point3<f64> {
        let [inner, outer] = self.nodes[i];
        inner + (outer - inner) * v
    }

    /// The better of the two ways to split the cell between chordwise parameters `i` and `i + 1`, `v[0]` and `v[1]`.
    pub(super) fn cell(&self, i: usize, v: [f64; 2]) -> Cell {
        let corners = [
            self.at(i, v[0]),
            self.at(i + 1, v[0]),
            self.at(i, v[1]),
            self.at(i + 1, v[1]),
        ];
        let mut worst = [0.0_f64; 2];
        for (q, probe) in QUARTERS.iter().zip(&self.between[i]) {
            for r in [0.0, 0.25, 0.5, 0.75, 1.0] {
                let across = probe[1].0 - probe[0].0;
                let t = v[0] + r * (v[1] - v[0]);
                let on_surface = probe[0].0 + across * t;
                let slope = probe[0].1 + (probe[1].1 - probe[0].1) * t;
                let normal = slope.cross(&across).normalize();
                for (k, worst) in worst.iter_mut().enumerate() {
                    let on_facet = if k == 0 {
                        rising(&corners, *q, r)
                    } else {
                        falling(&corners, *q, r)
                    };
                    // to second order the distance along the surface's normal is the distance
                    *worst = worst.max((on_facet - on_surface).dot(&normal).abs());
                }
            }
        }
        let rising = worst[0] <= worst[1];
        Cell {
            rising,
            deviation: if rising { worst[0] } else { worst[1] },
        }
    }
}

/// Point of the two facets split from (0, 0) to (1, 1), at (q, r) in the cell.
fn rising([a, b, c, d]: &[Point3<f64>; 4], q: f64, r: f64) -> Point3<f64> {
    if q >= r {
        a + (b - a) * q + (d - b) * r
    } else {
        a + (d - c) * q + (c - a) * r
    }
}

/// Point of the two facets split from (1, 0) to (0, 1), at (q, r) in the cell.
fn falling([a, b, c, d]: &[Point3<f64>; 4], q: f64, r: f64) -> Point3<f64> {
    if q + r <= 1.0 {
        a + (b - a) * q + (c - a) * r
    } else {
        d + (c - d) * (1.0 - q) + (b - d) * (1.0 - r)
    }
}

fn point(knots: &Knots, row: &[Point3<f64>], u: f64) -> Point3<f64> {
    let (first, basis) = knots.basis(u);
    (0..=knots.degree()).fold(Point3::origin(), |sum, i| sum + row[first + i].coords * basis[i])
}

fn point_and_slope(knots: &Knots, row: &[Point3<f64>], u: f64) -> (Point3<f64>, Vector3<f64>) {
    let d = knots.derivatives(u);
    let mut sums = [Vector3::zeros(); 2];
    for i in 0..=knots.degree() {
        sums[0] += row[d.first + i].coords * d.rows[0][i];
        sums[1] += row[d.first + i].coords * d.rows[1][i];
    }
    (Point3::from(sums[0]), sums[1])
}
