//! How closely a skin must be divided: lines along the span (u constant) by curvature, points along them by warp.
//!
//! An edge between two points of the surface that lie Δu and Δv apart misses it, to second order, by
//!
//! ```text
//! | S_uu·n Δu² + 2 S_uv·n Δu Δv | / 8
//! ```
//!
//! (n the surface normal; straight elements have no S_vv). On one of a cell's two diagonals the terms have opposite
//! signs and cancel, so with that diagonal a cell may be as wide as its chord's own curvature allows, Δu² = 8 t / S_uu,
//! and as long as Δv = 8 t / (S_uv Δu) for a tolerance t. A surface that is ruled is nowhere curved like a ball, so a
//! facet is nowhere farther from it than along its edges.
//!
//! For each place along the chord the numbers of points are taken that make the fewest facets. All numbers belong to one
//! row in which each divides the next, so that lines with few points and lines with many fit together.

use super::bending::{Bend, Bending, PROBES};

/// Rows of numbers of divisions along the span, each dividing the next.
pub(super) const FAMILIES: [[u32; 11]; 4] = [
    [1, 2, 4, 8, 16, 32, 64, 128, 256, 512, 1024],
    [1, 3, 6, 12, 24, 48, 96, 192, 384, 768, 1536],
    [1, 2, 6, 12, 24, 48, 96, 192, 384, 768, 1536],
    [1, 5, 10, 20, 40, 80, 160, 320, 640, 1280, 2560],
];

/// How many lines a skin needs at each place along the chord, and how many points they need in each panel.
#[derive(Clone, Debug)]
pub(super) struct Density {
    /// Lines per unit of u, per probe.
    pub(super) lines: Vec<f64>,
    /// Divisions of the lines, `[probe][panel]`.
    pub(super) divisions: Vec<Vec<u32>>,
}

/// Least number of intervals along the chord of a skin.
const LEAST_LINES: f64 = 4.0;

impl Density {
    /// The density with the fewest facets within `tolerance` \[mm\], with `caps` plane faces at the ends.
    pub(super) fn of(bending: &Bending, family: &[u32], tolerance: f64, caps: f64) -> Self {
        let (lines, divisions) = (0..PROBES)
            .map(|probe| cheapest(bending, probe, family, tolerance, caps))
            .unzip();
        Self { lines, divisions }
    }

    /// About how many facets it leads to.
    pub(super) fn cost(&self, caps: f64) -> f64 {
        let per_probe = self.lines.iter().zip(&self.divisions);
        let sum: f64 = per_probe
            .map(|(lines, divisions)| lines * (caps + 2.0 * f64::from(divisions.iter().sum::<u32>())))
            .sum();
        sum / PROBES as f64
    }

    /// Lines so that each interval takes the same share of the summed density; from 0 to 1.
    pub(super) fn place(&self) -> Vec<f64> {
        let total: f64 = self.lines.iter().sum();
        let count = (total / PROBES as f64).ceil().max(LEAST_LINES);
        let mut lines = vec![0.0];
        let (mut sum, mut wanted) = (0.0, 1.0);
        for (i, density) in self.lines.iter().enumerate() {
            while wanted < count && wanted / count * total <= sum + density {
                let inside = (wanted / count * total - sum) / density;
                lines.push(((i as f64) + inside.clamp(0.0, 1.0)) / PROBES as f64);
                wanted += 1.0;
            }
            sum += density;
        }
        lines.push(1.0);
        lines
    }

    /// Divisions that were chosen for a panel between two parameters: the most of the probes there.
    pub(super) fn divisions(&self, from: f64, to: f64, panel: usize) -> u32 {
        probes(from, to)
            .map(|probe| self.divisions[probe][panel])
            .max()
            .unwrap_or(1)
    }

    /// Makes intervals narrower or wider, so that those that miss the surface by `deviations` miss it by `aim` \[mm\].
    pub(super) fn correct(&mut self, lines: &[f64], deviations: &[f64], aim: f64) {
        let mut corrected = vec![0.0_f64; PROBES];
        for (pair, deviation) in lines.windows(2).zip(deviations) {
            // the miss grows with the square of the width, or in proportion to it where warp prevails
            let ratio = deviation / aim;
            let factor = ratio.powf(if ratio > 1.0 { 0.7 } else { 0.5 }).clamp(0.6, 1.6);
            let density = factor / (pair[1] - pair[0]);
            for probe in probes(pair[0], pair[1]) {
                corrected[probe] = corrected[probe].max(density);
            }
        }
        // every probe lies in an interval, or is the nearest to one
        self.lines = corrected;
    }
}

/// The probes between two parameters, or the one that is nearest.
#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "a parameter lies between 0 and 1"
)]
fn probes(from: f64, to: f64) -> std::ops::Range<usize> {
    let [first, end] = [from, to].map(|u| (u * PROBES as f64 - 0.5).ceil().max(0.0) as usize);
    if first < end {
        return first..end.min(PROBES);
    }
    let nearest = ((0.5 * (from + to) * PROBES as f64) as usize).min(PROBES - 1);
    nearest..nearest + 1
}

/// Lines per unit of u, and divisions of each panel, that make the fewest facets at a probe.
fn cheapest(bending: &Bending, probe: usize, family: &[u32], tolerance: f64, caps: f64) -> (f64, Vec<u32>) {
    let panels = bending.panels.len();
    // no panel can do with fewer lines than its chord's curvature asks for
    let floor = (0..panels)
        .map(|k| (bending.panels[k][probe].most / (8.0 * tolerance)).sqrt())
        .fold(1.0, f64::max);
    let lines_at = |panel: usize, level: usize| {
        let bend = bending.panels[panel][probe];
        needed(bend, bend.warp / f64::from(family[level]), tolerance)
    };
    let cost = |lines: f64, levels: &[usize]| {
        let points: u32 = levels.iter().map(|level| family[*level]).sum();
        lines * (caps + 2.0 * f64::from(points))
    };
    let mut levels = vec![0_usize; panels];
    let mut each: Vec<f64> = (0..panels).map(|k| lines_at(k, 0)).collect();
    let mut lines = each.iter().copied().fold(floor, f64::max);
    let mut best = (cost(lines, &levels), lines, levels.clone());
    while lines > floor {
        // the panels that ask for the most lines get more points
        let mut raised = false;
        for k in 0..panels {
            if each[k] >= lines && levels[k] + 1 < family.len() {
                levels[k] += 1;
                each[k] = lines_at(k, levels[k]);
                raised = true;
            }
        }
        if !raised {
            break;
        }
        lines = each.iter().copied().fold(floor, f64::max);
        let found = cost(lines, &levels);
        if found < best.0 {
            best.0 = found;
            best.1 = lines;
            best.2.copy_from_slice(&levels);
        }
    }
    (best.1, best.2.iter().map(|level| family[*level]).collect())
}

/// 1/Δu that keeps chords and the better diagonals of a panel within a tolerance; `warp` is that of one division.
fn needed(bend: Bend, warp: f64, tolerance: f64) -> f64 {
    let by_chord = (bend.most / (8.0 * tolerance)).sqrt();
    // the diagonal: warp Δu / 4 - bend Δu² / 8 <= tolerance, up to the lesser root where there are two
    let (a, b) = (bend.middle / 8.0, warp / 4.0);
    let discriminant = b * b - 4.0 * a * tolerance;
    if discriminant <= 0.0 || b <= 0.0 {
        return by_chord;
    }
    by_chord.max((b + discriminant.sqrt()) / (2.0 * tolerance))
}
