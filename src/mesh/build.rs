//! From a loft to its facets.

use nalgebra::Point3;

use super::Mesh;
use super::caps::cap;
use super::deviation::{Cell, Skin};
use super::spacing::{Bending, Grid};
use super::tip::{Side, round_tip};
use crate::loft::Loft;

/// Meshes a loft, or two that meet in their root section, within `tolerance` \[mm\] of the surface.
///
/// The deviation is measured on the finished facets; where it is above the tolerance the grid is made finer until it
/// is not.
pub fn build(lofts: &[&Loft], tolerance: f64) -> Mesh {
    let bending = Bending::of(lofts[0]);
    let mut aim = tolerance;
    loop {
        let grid = bending.grid(aim);
        let mesh = on_grid(lofts, &grid, aim);
        if mesh.deviation <= tolerance {
            return mesh;
        }
        aim *= 0.97 * (tolerance / mesh.deviation).max(0.3);
    }
}

/// Corner numbers along one section's outline.
#[derive(Clone)]
struct Outline {
    upper: Vec<u32>,
    lower: Vec<u32>,
}

struct Builder<'a> {
    mesh: Mesh,
    grid: &'a Grid,
    port: bool,
}

fn on_grid(lofts: &[&Loft], grid: &Grid, tolerance: f64) -> Mesh {
    let mut builder = Builder {
        mesh: Mesh::default(),
        grid,
        port: false,
    };
    let joined = lofts.len() > 1;
    let mut root: Option<Outline> = None;
    for loft in lofts {
        builder.port = loft.port;
        let skins: Vec<[Skin; 2]> = (0..loft.panels())
            .map(|k| {
                [
                    Skin::new(&loft.upper(k), &grid.chordwise),
                    Skin::new(&loft.lower(k), &grid.chordwise),
                ]
            })
            .collect();
        let first = root
            .clone()
            .filter(|_| joined)
            .unwrap_or_else(|| builder.outline(loft, &skins[0], 0.0));
        if !joined {
            builder.cap(&first, false);
        }
        root = Some(first.clone());
        let mut inner = first;
        for (k, pair) in skins.iter().enumerate() {
            let divisions = grid.spanwise[k];
            for j in 0..divisions {
                let [v0, v1] = [j, j + 1].map(|j| f64::from(j) / f64::from(divisions));
                let outer = builder.outline(loft, pair, v1);
                builder.strip(pair, [&inner, &outer], [v0, v1]);
                inner = outer;
            }
        }
        match &loft.round {
            Some(tip) => {
                let side = |corners| Side {
                    parameters: &grid.chordwise,
                    corners,
                };
                let (upper, lower) = (side(&inner.upper), side(&inner.lower));
                round_tip(&mut builder.mesh, tip, upper, lower, loft.port, tolerance);
            }
            None => builder.cap(&inner, true),
        }
    }
    builder.mesh
}

impl Builder<'_> {
    fn corner(&mut self, point: Point3<f64>) -> u32 {
        let number = u32::try_from(self.mesh.corners.len()).expect("a mesh has fewer than 2^32 corners");
        self.mesh.corners.push(point);
        number
    }

    /// New corners all around a section; nose and, where it is sharp, tail are shared by both sides.
    fn outline(&mut self, loft: &Loft, skins: &[Skin; 2], v: f64) -> Outline {
        let last = self.grid.chordwise.len() - 1;
        let upper: Vec<u32> = (0..=last).map(|i| self.corner(skins[0].at(i, v))).collect();
        let mut lower = vec![upper[0]];
        lower.extend((1..last).map(|i| self.corner(skins[1].at(i, v))));
        lower.push(if loft.blunt {
            self.corner(skins[1].at(last, v))
        } else {
            upper[last]
        });
        Outline { upper, lower }
    }

    /// A facet given counter-clockwise for the starboard side.
    fn facet(&mut self, [a, b, c]: [u32; 3]) {
        self.mesh
            .facets
            .push(if self.port { [a, c, b] } else { [a, b, c] });
    }

    /// The cells of both skins and the base between two outlines.
    fn strip(&mut self, skins: &[Skin; 2], [inner, outer]: [&Outline; 2], v: [f64; 2]) {
        for i in 0..self.grid.chordwise.len() - 1 {
            let upper = [
                inner.upper[i],
                inner.upper[i + 1],
                outer.upper[i],
                outer.upper[i + 1],
            ];
            let lower = [
                inner.lower[i],
                inner.lower[i + 1],
                outer.lower[i],
                outer.lower[i + 1],
            ];
            for (side, corners) in [upper, lower].into_iter().enumerate() {
                let cell = skins[side].cell(i, v);
                self.cell(corners, cell, side == 1);
            }
        }
        let last = self.grid.chordwise.len() - 1;
        let [a, b, c, d] = [
            inner.upper[last],
            inner.lower[last],
            outer.upper[last],
            outer.lower[last],
        ];
        if a != b {
            // the base: seen from behind the upper edge is left of the lower one when starboard is up
            self.facet([a, b, d]);
            self.facet([a, d, c]);
        }
    }

    /// Two facets over a cell (corners at (u0 v0), (u1 v0), (u0 v1), (u1 v1)), on the better diagonal.
    fn cell(&mut self, [a, b, c, d]: [u32; 4], cell: Cell, turned: bool) {
        let facets = if cell.rising {
            [[a, b, d], [a, d, c]]
        } else {
            [[a, b, c], [b, d, c]]
        };
        for [p, q, r] in facets {
            self.facet(if turned { [p, r, q] } else { [p, q, r] });
        }
        self.mesh.deviation = self.mesh.deviation.max(cell.deviation);
    }

    fn cap(&mut self, outline: &Outline, tip: bool) {
        for [a, b, c] in cap(&self.mesh.corners, &outline.upper, &outline.lower) {
            self.facet(if tip { [a, b, c] } else { [a, c, b] });
        }
    }
}
