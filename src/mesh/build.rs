//! From a loft to its facets.

use nalgebra::{Point3, Vector3};

use super::bending::Bending;
use super::caps::cap;
use super::check::{Finding, check, single};
use super::column::Column;
use super::grid::Grid;
use super::tip::{Frame, Side};
use super::{Limits, Mesh};
use crate::loft::{Loft, RoundTip};

/// Times that a grid is made finer before a mesh is given up.
const MOST_TRIALS: usize = 24;
/// Trials after which both skins get the same lines, which no thin trailing edge can make cross.
const APART: usize = 6;
/// Facets beyond which a mesh is given up.
const MOST_FACETS: usize = 50_000_000;

/// Meshes a loft, or two that meet in their root section, within the tolerance.
///
/// Corners are rounded to 32-bit numbers in units of `unit` \[mm\], as files hold them, before anything is measured. Where
/// the deviation measured on the finished facets is above the tolerance, the grid is made finer until it is not.
///
/// # Errors
///
/// A [`Finding`] where facets this fine cannot be said in 32-bit numbers.
pub fn build(lofts: &[&Loft], limits: &Limits, unit: f64) -> Result<Mesh, Finding> {
    let loft = lofts[0];
    if rounding(loft, unit) > 0.25 * limits.tolerance {
        return Err(Finding::TooFine);
    }
    let bendings = [false, true].map(|lower| Bending::of(loft, lower));
    let caps = if lofts.len() > 1 { 1.0 } else { 2.0 };
    // facets coarser than the section is thick would go through the other skin
    // the finest aim first; where its corners fall together in 32-bit numbers, as on a tip far out and very thin, coarser ones
    let thin = thickness(loft);
    let aims = [8.0, 2.0, 0.5].map(|share| limits.tolerance.min(thin / share));
    let mut aim = aims[0];
    let mut found = Finding::TooFine;
    for trial in 0..3 * MOST_TRIALS {
        if trial % MOST_TRIALS == 0 {
            aim = aims[trial / MOST_TRIALS];
        }
        let trial = trial % MOST_TRIALS;
        let grid = Grid::of(loft, &bendings, aim, caps, trial >= APART);
        if grid.facets() > MOST_FACETS {
            break;
        }
        let Some(mesh) = on_grid(lofts, &grid, aim, unit) else {
            aim *= 0.7;
            continue;
        };
        if mesh.deviation > limits.tolerance {
            aim *= 0.98 * (limits.tolerance / mesh.deviation).max(0.3);
            found = Finding::TooFine;
            continue;
        }
        return check(&mesh, unit).map(|()| mesh);
    }
    Err(found)
}

/// How far a corner moves when it is rounded to 32-bit numbers, at most \[mm\].
fn rounding(loft: &Loft, unit: f64) -> f64 {
    let mut most = Vector3::<f64>::zeros();
    for section in &loft.sections {
        for point in [section.nose(), section.upper_tail(), section.lower_tail()] {
            most = most.sup(&point.coords.abs());
        }
    }
    let farthest = single(&Point3::from(most), unit);
    // half the distance to the next number, in each direction
    let halves = farthest.map(|c| 0.5 * (f64::from(c.next_up()) - f64::from(c)) * unit);
    Vector3::from(halves).norm()
}

/// Thickness of the thinnest section where it is thickest, roughly \[mm\].
fn thickness(loft: &Loft) -> f64 {
    let places = [0.3, 0.4, 0.5, 0.6, 0.7, 0.8];
    (0..loft.sections.len())
        .map(|k| {
            let (upper, lower) = (loft.upper_curve(k), loft.lower_curve(k));
            places
                .map(|u| (upper.at(u) - lower.at(u)).norm())
                .into_iter()
                .fold(0.0, f64::max)
        })
        .fold(f64::INFINITY, f64::min)
}

/// Corner numbers of one section's outline, nose to tail, `[upper, lower]`.
type Outline = [Vec<u32>; 2];

struct Builder<'a> {
    mesh: Mesh,
    grid: &'a Grid,
    aim: f64,
    unit: f64,
    port: bool,
}

/// The mesh on a grid; `None` where a section's sides, as chains of straight edges, cross each other.
fn on_grid(lofts: &[&Loft], grid: &Grid, aim: f64, unit: f64) -> Option<Mesh> {
    let mut builder = Builder {
        mesh: Mesh::default(),
        grid,
        aim,
        unit,
        port: false,
    };
    let joined = lofts.len() > 1;
    let mut root: Option<Outline> = None;
    for loft in lofts {
        builder.port = loft.port;
        let first = match root.take().filter(|_| joined) {
            Some(outline) => outline,
            None => builder.outline(loft, 0),
        };
        let facets = cap(&builder.mesh.corners, &first[0], &first[1])?;
        if !joined {
            builder.facets(facets.into_iter().map(|[a, b, c]| [a, c, b]));
        }
        root = Some(first.clone());
        let mut inner = first;
        for panel in 0..loft.panels() {
            let outer = builder.outline(loft, panel + 1);
            builder.panel(loft, panel, [&inner, &outer]);
            let facets = cap(&builder.mesh.corners, &outer[0], &outer[1])?;
            if panel + 1 == loft.panels() {
                match &loft.round {
                    Some(tip) => builder.round_tip(tip, &outer),
                    None => builder.facets(facets.into_iter()),
                }
            }
            inner = outer;
        }
    }
    Some(builder.mesh)
}

impl Builder<'_> {
    fn corner(&mut self, point: Point3<f64>) -> u32 {
        self.mesh.add(&point, self.unit)
    }

    /// Adds facets given counter-clockwise for the starboard side.
    fn facets(&mut self, facets: impl Iterator<Item = [u32; 3]>) {
        let port = self.port;
        self.mesh
            .facets
            .extend(facets.map(|[a, b, c]| if port { [a, c, b] } else { [a, b, c] }));
    }

    /// New corners all around a station; nose and, where it is sharp, tail are shared by both sides.
    fn outline(&mut self, loft: &Loft, k: usize) -> Outline {
        let [upper_lines, lower_lines] = &self.grid.lines;
        let (upper_curve, lower_curve) = (loft.upper_curve(k), loft.lower_curve(k));
        let upper: Vec<u32> = upper_lines
            .iter()
            .map(|u| self.corner(upper_curve.at(*u)))
            .collect();
        let last = lower_lines.len() - 1;
        let lower = (lower_lines.iter().enumerate())
            .map(|(i, u)| {
                if i == 0 {
                    upper[0]
                } else if i == last && !loft.blunt {
                    upper[upper.len() - 1]
                } else {
                    self.corner(lower_curve.at(*u))
                }
            })
            .collect();
        [upper, lower]
    }

    /// The facets of both skins and the base between two stations.
    fn panel(&mut self, loft: &Loft, panel: usize, ends: [&Outline; 2]) {
        let mut rails: Vec<Vec<u32>> = Vec::new();
        for side in [0, 1] {
            let surface = if side == 0 {
                loft.upper(panel)
            } else {
                loft.lower(panel)
            };
            let lines = &self.grid.lines[side];
            let last = lines.len() - 1;
            let mut left: Vec<u32> = Vec::new();
            for i in 0..last {
                let column = Column::new(&surface, lines[i], lines[i + 1]);
                let rail = |builder: &mut Self, line: usize| {
                    let divisions = builder.grid.divisions[side][panel][line];
                    let station = [ends[0][side][line], ends[1][side][line]];
                    builder.rail(&column, line - i, divisions, station)
                };
                if i == 0 {
                    // rails are kept in the order: upper nose, upper tail, lower tail
                    left = match rails.first() {
                        Some(nose) => nose.clone(),
                        None => rail(self, 0),
                    };
                    rails.push(left.clone());
                }
                let right = match rails.get(1) {
                    Some(tail) if i + 1 == last && side == 1 && !loft.blunt => tail.clone(),
                    _ => rail(self, i + 1),
                };
                self.column(&column, [&left, &right], side == 1);
                left = right;
            }
            rails.push(left);
        }
        if let Some(base) = loft.base(panel) {
            // rails: upper nose, upper tail, lower nose (the same), lower tail
            let column = Column::new(&base, 0.0, 1.0);
            self.column(&column, [&rails[1], &rails[3]], false);
        }
    }

    fn round_tip(&mut self, tip: &RoundTip, outline: &Outline) {
        let side = |k: usize| Side {
            parameters: &self.grid.lines[k],
            corners: &outline[k],
        };
        let frame = Frame {
            tip,
            port: self.port,
            unit: self.unit,
            tolerance: self.aim,
        };
        frame.facets(&mut self.mesh, [side(0), side(1)]);
    }

    /// Corners along a straight element, from station to station.
    fn rail(&mut self, column: &Column, element: usize, divisions: u32, ends: [u32; 2]) -> Vec<u32> {
        let mut rail = vec![ends[0]];
        rail.extend((1..divisions).map(|k| {
            let v = f64::from(k) / f64::from(divisions);
            self.corner(column.at(element, v))
        }));
        rail.push(ends[1]);
        rail
    }

    /// The facets between two rails.
    fn column(&mut self, column: &Column, [left, right]: [&[u32]; 2], turned: bool) {
        let divisions =
            [left, right].map(|rail| u32::try_from(rail.len() - 1).expect("corners are counted in 32 bits"));
        let corners = &self.mesh.corners;
        let (zipped, most) = column.zip(divisions, self.aim, |element, place, _| {
            corners[[left, right][element][place] as usize]
        });
        self.mesh.deviation = self.mesh.deviation.max(most);
        let facets: Vec<[u32; 3]> = zipped.facets((0, 0), left, right).collect();
        // counter-clockwise from above: u aft, v to starboard
        self.facets(
            facets
                .into_iter()
                .map(|[a, b, c]| if turned { [a, b, c] } else { [a, c, b] }),
        );
    }
}
