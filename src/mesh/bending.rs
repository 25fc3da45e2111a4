//! How much a skin bends along the chord and warps across it.

use nalgebra::{Point3, Vector3};

use crate::loft::Loft;
use crate::spline::{Knots, Surface};

/// Number of places along the chord where a skin is probed.
pub(super) const PROBES: usize = 96;

/// What the surface does at one place of one panel, over one unit of the parameters u (chordwise) and v (spanwise).
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Bend {
    /// Largest |S_uu · n| over the panel's span \[mm\].
    pub(super) most: f64,
    /// |S_uu · n| in the middle of the span \[mm\].
    pub(super) middle: f64,
    /// |S_uv · n| in the middle of the span \[mm\].
    pub(super) warp: f64,
}

/// One skin (upper or lower) of all panels of a loft.
#[derive(Debug)]
pub(super) struct Bending {
    /// `[panel][probe]`.
    pub(super) panels: Vec<Vec<Bend>>,
}

/// Parameter of a probe: the middle of one of [`PROBES`] equal intervals.
pub(super) fn place(probe: usize) -> f64 {
    (probe as f64 + 0.5) / PROBES as f64
}

impl Bending {
    /// Probes the upper or the lower skin of every panel.
    pub(super) fn of(loft: &Loft, lower: bool) -> Self {
        let skin = |k: usize| if lower { loft.lower(k) } else { loft.upper(k) };
        let panels = (0..loft.panels())
            .map(|k| {
                let surface = skin(k);
                (0..PROBES).map(|i| bend(&surface, place(i))).collect()
            })
            .collect();
        Self { panels }
    }
}

fn bend(surface: &Surface, u: f64) -> Bend {
    let [inner, outer] = [&surface.rows[0], &surface.rows[1]].map(|row| derivatives(&surface.u, row, u));
    let across = outer[0] - inner[0];
    let warp = outer[1] - inner[1];
    let mut found = Bend::default();
    for v in [0.0, 0.5, 1.0] {
        let slope = inner[1].lerp(&outer[1], v);
        let second = inner[2].lerp(&outer[2], v);
        let normal = slope.cross(&across);
        let length = normal.norm();
        if length > 0.0 {
            let bend = (second.dot(&normal) / length).abs();
            found.most = found.most.max(bend);
            if (v - 0.5).abs() < 0.25 {
                (found.middle, found.warp) = (bend, (warp.dot(&normal) / length).abs());
            }
        }
    }
    found
}

fn derivatives(knots: &Knots, points: &[Point3<f64>], u: f64) -> [Vector3<f64>; 3] {
    let d = knots.derivatives(u);
    d.rows.map(|row| {
        (0..=knots.degree()).fold(Vector3::zeros(), |sum, i| {
            sum + points[d.first + i].coords * row[i]
        })
    })
}
