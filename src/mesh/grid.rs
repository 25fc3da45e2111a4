//! Lines and their points for both skins of a wing.

use super::bending::Bending;
use super::column::Column;
use super::spacing::{Density, FAMILIES};
use crate::loft::Loft;
use crate::spline::Surface;

/// Lines of constant u on both skins, and the points along them.
#[derive(Clone, Debug)]
pub(super) struct Grid {
    /// Parameters from 0 to 1, `[upper, lower]`.
    pub(super) lines: [Vec<f64>; 2],
    /// Divisions of a line in a panel, `[upper, lower][panel][line]`.
    pub(super) divisions: [Vec<Vec<u32>>; 2],
}

/// Most divisions of the edges of a base.
const MOST_DIVISIONS: u32 = 1 << 16;
/// How often the spacing is corrected by what was measured.
const CORRECTIONS: usize = 5;

impl Grid {
    /// The grid with the fewest facets within `aim` \[mm\]; with `shared` both skins have the same lines.
    pub(super) fn of(loft: &Loft, bendings: &[Bending; 2], aim: f64, caps: f64, shared: bool) -> Self {
        let of_family = |family: &[u32]| {
            let both = [0, 1].map(|side| Density::of(&bendings[side], family, aim, caps));
            (both[0].cost(caps) + both[1].cost(caps), both)
        };
        let mut best = of_family(&FAMILIES[0]);
        for family in &FAMILIES[1..] {
            let other = of_family(family);
            if other.0 < best.0 {
                best = other;
            }
        }
        let mut densities = best.1;
        let surfaces = [false, true].map(|lower| -> Vec<Surface> {
            (0..loft.panels())
                .map(|k| if lower { loft.lower(k) } else { loft.upper(k) })
                .collect()
        });
        let mut lines = [0, 1].map(|side| fitted(&surfaces[side], &mut densities[side], aim));
        if shared {
            let denser = usize::from(lines[1].len() > lines[0].len());
            let mut all = lines[denser].clone();
            all.extend(lines[1 - denser].iter().copied().filter(|u| *u > 0.0 && *u < 1.0));
            all.sort_by(f64::total_cmp);
            all.dedup_by(|a, b| (*a - *b).abs() < 1e-9);
            lines = [all.clone(), all];
        }
        let divisions = [0, 1].map(|side| divisions(&lines[side], &densities[side], loft.panels()));
        let mut grid = Self { lines, divisions };
        grid.join(loft, aim);
        grid
    }

    /// Number of facets of the skins of one loft.
    pub(super) fn facets(&self) -> usize {
        let points = self.divisions.iter().flatten().flatten();
        2 * points.map(|n| *n as usize).sum::<usize>()
    }

    /// Both skins share the points of the nose and of a sharp trailing edge; a base needs points for its own warp.
    fn join(&mut self, loft: &Loft, aim: f64) {
        let [upper, lower] = &mut self.divisions;
        for (panel, (upper, lower)) in upper.iter_mut().zip(lower).enumerate() {
            let most = upper[0].max(lower[0]);
            (upper[0], lower[0]) = (most, most);
            let last = (upper.len() - 1, lower.len() - 1);
            let mut most = upper[last.0].max(lower[last.1]);
            if let Some(base) = loft.base(panel) {
                let column = Column::new(&base, 0.0, 1.0);
                let off = |n| column.zip([n, n], aim, |element, _, v| column.at(element, v)).1;
                if off(upper[last.0].min(lower[last.1])) <= aim {
                    continue;
                }
                while off(most) > aim && most < MOST_DIVISIONS {
                    most *= 2;
                }
            }
            (upper[last.0], lower[last.1]) = (most, most);
        }
    }
}

/// Lines that are spaced so that every column misses the surface by about the same.
fn fitted(surfaces: &[Surface], density: &mut Density, aim: f64) -> Vec<f64> {
    let mut best: Option<(f64, Vec<f64>)> = None;
    for _ in 0..=CORRECTIONS {
        let lines = density.place();
        let points = divisions(&lines, density, surfaces.len());
        let deviations: Vec<f64> = (0..lines.len() - 1)
            .map(|i| {
                let across = |(points, surface): (&Vec<u32>, &Surface)| {
                    let column = Column::new(surface, lines[i], lines[i + 1]);
                    let ends = [points[i], points[i + 1]];
                    column.zip(ends, aim, |element, _, v| column.at(element, v)).1
                };
                points.iter().zip(surfaces).map(across).fold(0.0, f64::max)
            })
            .collect();
        let most = deviations.iter().copied().fold(0.0, f64::max);
        let better = best.as_ref().is_none_or(|(least, then)| {
            let (fits, fitted) = (most <= aim, *least <= aim);
            match (fits, fitted) {
                (true, true) => lines.len() < then.len(),
                (false, false) => most < *least,
                (fits, _) => fits,
            }
        });
        density.correct(&lines, &deviations, 0.97 * aim);
        if better {
            best = Some((most, lines));
        }
        if most <= aim && most > 0.9 * aim {
            break;
        }
    }
    best.map_or_else(Vec::new, |(_, lines)| lines)
}

fn divisions(lines: &[f64], density: &Density, panels: usize) -> Vec<Vec<u32>> {
    (0..panels)
        .map(|panel| {
            let columns: Vec<u32> = (lines.windows(2))
                .map(|pair| density.divisions(pair[0], pair[1], panel))
                .collect();
            let last = columns.len() - 1;
            (0..lines.len())
                .map(|line| columns[line.saturating_sub(1)].max(columns[line.min(last)]))
                .collect()
        })
        .collect()
}
