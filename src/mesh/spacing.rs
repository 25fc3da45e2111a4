//! How closely a wing's faces must be divided: chordwise by curvature, spanwise by twist.
//!
//! Between two neighbouring grid lines at a distance Δu (Δv) a facet misses the surface by about
//!
//! ```text
//! |S_uu · n| Δu² / 8 + |S_uv · n| Δu Δv / 4
//! ```
//!
//! (n the surface normal; the second term is the warp of a ruled surface across a cell's diagonal). For given spanwise
//! divisions this settles Δu everywhere; of all spanwise divisions those with the fewest cells are taken.

use nalgebra::Vector3;

use crate::loft::Loft;
use crate::spline::{Knots, Surface};

/// Chordwise parameters, shared by all faces, and spanwise divisions of each panel.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Grid {
    /// From 0 to 1.
    pub(super) chordwise: Vec<f64>,
    /// Divisions of each panel, at least 1.
    pub(super) spanwise: Vec<u32>,
}

/// Places where the surface is probed, and how much it bends there.
pub(super) struct Bending {
    /// Parameter of each probe, the middle of one of `PROBES` equal intervals.
    probes: Vec<f64>,
    /// Per panel and probe: largest |S_uu·n| and |S_uv·n| over both skins \[mm\].
    panels: Vec<Vec<(f64, f64)>>,
}

const PROBES: u32 = 128;
/// Most spanwise divisions of a panel that are considered.
const MOST_DIVISIONS: u32 = 400;

impl Bending {
    /// Probes both skins of every panel at its two ends.
    pub(super) fn of(loft: &Loft) -> Self {
        // probes crowd at the nose, where curvature changes fastest
        let probes: Vec<f64> = (0..PROBES)
            .map(|i| (f64::from(i) + 0.5) / f64::from(PROBES))
            .collect();
        let panels = (0..loft.panels())
            .map(|k| {
                let mut most = vec![(0.0_f64, 0.0_f64); probes.len()];
                for skin in [loft.upper(k), loft.lower(k)] {
                    for (value, u) in most.iter_mut().zip(&probes) {
                        let (bend, warp) = bend_and_warp(&skin, *u);
                        value.0 = value.0.max(bend);
                        value.1 = value.1.max(warp);
                    }
                }
                most
            })
            .collect();
        Self { probes, panels }
    }

    /// The grid with the fewest cells that this estimate allows for a tolerance \[mm\].
    pub(super) fn grid(&self, tolerance: f64) -> Grid {
        let warps: Vec<f64> = self
            .panels
            .iter()
            .map(|panel| panel.iter().map(|(_, warp)| *warp).fold(0.0, f64::max))
            .collect();
        let greatest = warps.iter().copied().fold(0.0, f64::max);
        let divisions = |most: u32| -> Vec<u32> {
            let share = |warp: f64| {
                if greatest > 0.0 {
                    warp / greatest * f64::from(most)
                } else {
                    0.0
                }
            };
            warps
                .iter()
                .map(|warp| whole(share(*warp).ceil().max(1.0)))
                .collect()
        };
        let mut best: Option<(f64, Vec<u32>)> = None;
        let mut most = 1;
        while most <= MOST_DIVISIONS {
            let spanwise = divisions(most);
            let count = self.lines(&spanwise, tolerance).ceil().max(2.0);
            let cells = count * spanwise.iter().copied().map(f64::from).sum::<f64>() + count;
            match &best {
                Some((least, _)) if cells > 1.5 * least => break,
                Some((least, _)) if cells >= *least => {}
                _ => best = Some((cells, spanwise)),
            }
            most = (most + 1).max(most * 5 / 4);
        }
        let spanwise = best.map_or_else(|| divisions(1), |(_, spanwise)| spanwise);
        let chordwise = self.place_lines(&spanwise, tolerance);
        Grid { chordwise, spanwise }
    }

    /// 1/Δu at a probe.
    fn density(&self, probe: usize, spanwise: &[u32], tolerance: f64) -> f64 {
        (self.panels.iter().zip(spanwise))
            .map(|(panel, n)| {
                let (bend, warp) = panel[probe];
                let (a, b) = (bend / 8.0, warp / (4.0 * f64::from(*n)));
                // a Δu² + b Δu = tolerance
                (b + (b * b + 4.0 * a * tolerance).sqrt()) / (2.0 * tolerance)
            })
            .fold(1.0, f64::max)
    }

    fn lines(&self, spanwise: &[u32], tolerance: f64) -> f64 {
        let sum: f64 = (0..self.probes.len())
            .map(|i| self.density(i, spanwise, tolerance))
            .sum();
        sum / f64::from(PROBES)
    }

    /// Grid lines so that each interval takes the same share of the summed density.
    fn place_lines(&self, spanwise: &[u32], tolerance: f64) -> Vec<f64> {
        let count = self.lines(spanwise, tolerance).ceil().max(2.0);
        let total = self.lines(spanwise, tolerance) * f64::from(PROBES);
        let mut lines = vec![0.0];
        let (mut sum, mut wanted) = (0.0, 1.0);
        for i in 0..self.probes.len() {
            let density = self.density(i, spanwise, tolerance);
            while wanted < count && wanted / count * total <= sum + density {
                let inside = (wanted / count * total - sum) / density;
                lines.push(((i as f64) + inside) / f64::from(PROBES));
                wanted += 1.0;
            }
            sum += density;
        }
        lines.push(1.0);
        lines
    }
}

/// A small whole number given as a float.
#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "the value lies between 1 and 400"
)]
fn whole(value: f64) -> u32 {
    value.clamp(1.0, f64::from(MOST_DIVISIONS)) as u32
}

/// |S_uu·n| at the worse end and |S_uv·n| of a ruled surface at u.
fn bend_and_warp(surface: &Surface, u: f64) -> (f64, f64) {
    let rows: Vec<[Vector3<f64>; 3]> = surface
        .rows
        .iter()
        .map(|row| derivatives(&surface.u, row, u))
        .collect();
    let (first, last) = (&rows[0], &rows[rows.len() - 1]);
    let across = last[0] - first[0];
    let warp = last[1] - first[1];
    let mut most = (0.0_f64, 0.0_f64);
    for end in [first, last] {
        let normal = end[1].cross(&across);
        let length = normal.norm();
        if length > 0.0 {
            most.0 = most.0.max((end[2].dot(&normal) / length).abs());
            most.1 = most.1.max((warp.dot(&normal) / length).abs());
        }
    }
    most
}

fn derivatives(knots: &Knots, points: &[nalgebra::Point3<f64>], u: f64) -> [Vector3<f64>; 3] {
    let d = knots.derivatives(u);
    d.rows.map(|row| {
        (0..=knots.degree()).fold(Vector3::zeros(), |sum, i| {
            sum + points[d.first + i].coords * row[i]
        })
    })
}
