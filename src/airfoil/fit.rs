//! The fit: all sections of a wing on shared knots, as few as the tolerance allows.
//!
//! The knots of the upper side are shared by the upper sides of all sections, those of the lower side likewise. At the
//! nose position, slope and curvature are those of the section itself, so that upper and lower side meet there with
//! equal curvature; at the trailing edge the position is exact. In between y is fitted by least squares at many more
//! parameters than there are knots, and knots are put where the deviation is too large, then taken out again where they
//! are not needed. Inside a side the fit is four times continuously differentiable. The jump of curvature of a 4-digit
//! mean line makes a jump of slope of some 1e-4 on the surface; it is rounded off within the tolerance by close knots.

use super::side::{Break, Side};
use super::{Error, Section};
use crate::spline::{Knots, LeastSquares, MAX_DEGREE, refined};

/// Largest distance between a section and its fit that is aimed for \[chord\].
pub const TOLERANCE: f64 = 1e-6;
/// Knot spans are not halved below this \[-\].
const CLOSE: f64 = 3e-5;
/// Most knots a side may take before the fit is given up.
const MOST_KNOTS: usize = 400;
/// Knots that will be missed by more than this many times the tolerance are not tried to be taken out: of those that
/// could be, 3 % are above it.
const MISSED: f64 = 30.0;

/// All sections of a wing, fitted on shared knots.
#[derive(Clone, Debug, PartialEq)]
pub struct Profiles {
    /// Knots of every upper side, from the nose (0) to the trailing edge (1).
    pub upper: Knots,
    /// Knots of every lower side, likewise.
    pub lower: Knots,
    /// The sections, in the order given.
    pub profiles: Vec<Profile>,
    /// Largest distance between a section and its fit, measured between the parameters that were fitted \[chord\].
    pub deviation: f64,
}

/// A fitted section of unit chord: control points (x, y) from the nose at (0, 0) to the trailing edge.
#[derive(Clone, Debug, PartialEq)]
pub struct Profile {
    /// Control points of the upper side, `(upper.count())`.
    pub upper: Vec<[f64; 2]>,
    /// Control points of the lower side, `(lower.count())`.
    pub lower: Vec<[f64; 2]>,
}

impl Profile {
    /// Thickness of the trailing edge's base, from its upper to its lower edge \[chord\].
    pub fn base(&self) -> f64 {
        let [along, height] = self.base_vector();
        along.hypot(height)
    }

    /// From the base's lower edge to its upper one.
    fn base_vector(&self) -> [f64; 2] {
        let (upper, lower) = (self.upper[self.upper.len() - 1], self.lower[self.lower.len() - 1]);
        [upper[0] - lower[0], upper[1] - lower[1]]
    }

    /// The profile with its base opened (or closed) to `base`, by a wedge that grows in proportion to x from the nose.
    pub fn with_base(&self, base: f64) -> Self {
        let [along, height] = self.base_vector();
        let half = 0.5 * ((base * base - along * along).max(0.0).sqrt() - height);
        let wedge = |points: &[[f64; 2]], side: f64| -> Vec<[f64; 2]> {
            let end = points[points.len() - 1][0];
            points
                .iter()
                .map(|[x, y]| [*x, y + side * half * x / end])
                .collect()
        };
        let mut profile = Self {
            upper: wedge(&self.upper, 1.0),
            lower: wedge(&self.lower, -1.0),
        };
        if base == 0.0 {
            // a closed edge is one point, to the last bit
            let (u, l) = (profile.upper.len() - 1, profile.lower.len() - 1);
            let middle = [0, 1].map(|k| 0.5 * (profile.upper[u][k] + profile.lower[l][k]));
            profile.upper[u] = middle;
            profile.lower[l] = middle;
        }
        profile
    }

    /// The profile a `share` of the way to another on the same knots.
    pub fn blended(&self, other: &Self, share: f64) -> Self {
        if share == 0.0 {
            return self.clone();
        }
        let mix = |a: &[[f64; 2]], b: &[[f64; 2]]| {
            a.iter()
                .zip(b)
                .map(|(a, b)| [0, 1].map(|k| a[k] + (b[k] - a[k]) * share))
                .collect()
        };
        Self {
            upper: mix(&self.upper, &other.upper),
            lower: mix(&self.lower, &other.lower),
        }
    }
}

impl Profiles {
    /// The same profiles with upper and lower sides on the same knots: those of either that the other lacks are put in,
    /// which changes no shape.
    pub fn on_common_knots(&self) -> Self {
        let lacking = |own: &Knots, other: &Knots| -> Vec<f64> {
            other
                .values()
                .iter()
                .copied()
                .filter(|knot| !own.values().contains(knot))
                .collect()
        };
        let (for_upper, for_lower) = (
            lacking(&self.upper, &self.lower),
            lacking(&self.lower, &self.upper),
        );
        let mut all: Vec<f64> = self
            .upper
            .values()
            .iter()
            .copied()
            .chain(for_upper.iter().copied())
            .collect();
        all.sort_by(f64::total_cmp);
        let degree = self.upper.degree();
        let interior = &all[degree + 1..all.len() - degree - 1];
        let Some(knots) = Knots::clamped(degree, 0.0, 1.0, interior) else {
            return self.clone();
        };
        let profiles = (self.profiles.iter())
            .map(|profile| Profile {
                upper: refined(&self.upper, &profile.upper, &for_upper),
                lower: refined(&self.lower, &profile.lower, &for_lower),
            })
            .collect();
        Self {
            upper: knots.clone(),
            lower: knots,
            profiles,
            deviation: self.deviation,
        }
    }
}

/// Fits `sections` on shared knots within `tolerance` \[chord\] of each.
///
/// What the curve through a file's points has used up of the tolerance, the fit does not use again, up to half of it; a
/// section that was given leave to be farther from its points still gets that half.
///
/// # Errors
///
/// [`Error::Fit`] where no reasonable number of knots reaches the tolerance.
pub fn fit(sections: &[&Section], tolerance: f64) -> Result<Profiles, Error> {
    let used = sections
        .iter()
        .map(|section| section.deviation)
        .fold(0.0, f64::max);
    let tolerance = (tolerance - used).max(0.5 * tolerance);
    let side = |pick: fn(&Section) -> &Side| {
        let sides: Vec<&Side> = sections.iter().map(|section| pick(section)).collect();
        fit_sides(&sides, tolerance).ok_or_else(|| why_not(sections, tolerance))
    };
    let upper = side(|section| &section.upper)?;
    let lower = side(|section| &section.lower)?;
    let profiles = (upper.points.into_iter().zip(lower.points))
        .map(|(upper, lower)| Profile { upper, lower })
        .collect();
    let deviation = upper.deviation.max(lower.deviation);
    Ok(Profiles {
        upper: upper.knots,
        lower: lower.knots,
        profiles,
        deviation,
    })
}

/// Corners of the surface that are blunter than this are no reason why a fit fails \[rad\].
const CORNER: f64 = 0.01;

/// Why sections could not be fitted: a corner of one of them, or else that they are too different or too rough.
fn why_not(sections: &[&Section], tolerance: f64) -> Error {
    let corners = sections.iter().flat_map(|section| {
        let breaks = section.upper.breaks().into_iter().chain(section.lower.breaks());
        breaks.map(|b| (section.name.clone(), b.place, b.corner))
    });
    match corners.max_by(|a, b| a.2.total_cmp(&b.2)) {
        Some((name, place, corner)) if corner > CORNER => Error::Corner {
            name,
            percent: 100.0 * place,
            degrees: corner.to_degrees(),
        },
        _ => Error::Fit {
            sections: sections
                .iter()
                .map(|section| section.name.as_str())
                .collect::<Vec<_>>()
                .join(", "),
            tolerance,
        },
    }
}

struct Fitted {
    knots: Knots,
    points: Vec<Vec<[f64; 2]>>,
    deviation: f64,
}

/// A side sampled at the shared parameters, with what the ends must be.
struct Target {
    values: Vec<f64>,
    checks: Vec<f64>,
    nose: [f64; 2],
    tail: f64,
}

struct Grid {
    parameters: Vec<f64>,
    checks: Vec<f64>,
    targets: Vec<Target>,
}

struct Attempt {
    knots: Knots,
    coefficients: Vec<Vec<f64>>,
    /// Largest deviation in each knot span, over all sides.
    spans: Vec<f64>,
    worst: f64,
}

fn fit_sides(sides: &[&Side], tolerance: f64) -> Option<Fitted> {
    let breaks = breaks(sides);
    let mut own: Vec<f64> = sides.iter().flat_map(|side| side.law_knots()).collect();
    own.sort_by(f64::total_cmp);
    // where the deviation between the fitted parameters is larger than at them, they are taken closer, or less is allowed
    let (best, deviation) = [1, 2, 4].into_iter().find_map(|density| {
        let grid = sample(sides, &breaks, own.len(), density);
        [0.97, 0.7].into_iter().find_map(|share| {
            let start = starting_knots(&breaks, &own, share * tolerance);
            let best = refine(start, &grid, share * tolerance)?;
            let deviation = measure(&best, &grid).max(best.worst);
            (deviation <= tolerance).then_some((best, deviation))
        })
    })?;
    let points = (sides.iter().zip(&best.coefficients))
        .map(|(side, y)| {
            let x = best.knots.polynomial(&side.x_polynomial());
            let mut points: Vec<[f64; 2]> = x.into_iter().zip(y).map(|(x, y)| [x, *y]).collect();
            points[0] = [0.0, 0.0];
            points
        })
        .collect();
    Some(Fitted {
        knots: best.knots,
        points,
        deviation,
    })
}

/// Adds knots where the deviation is above `aim`, then takes out those that are not needed.
fn refine(mut interior: Vec<f64>, grid: &Grid, aim: f64) -> Option<Attempt> {
    let mut best = attempt(&interior, grid, f64::INFINITY)?;
    while best.worst > aim {
        let corners = best.knots.corners();
        let mut finer = interior.clone();
        for (span, worst) in corners.windows(2).zip(&best.spans) {
            if *worst > aim.max(0.25 * best.worst) && span[1] - span[0] > 2.0 * CLOSE {
                finer.push(0.5 * (span[0] + span[1]));
            }
        }
        if finer.len() == interior.len() || finer.len() > MOST_KNOTS {
            return None;
        }
        finer.sort_by(f64::total_cmp);
        interior = finer;
        best = attempt(&interior, grid, f64::INFINITY)?;
    }
    Some(thin_out(best, interior, grid, aim))
}

/// The breaks of all sides, in order.
fn breaks(sides: &[&Side]) -> Vec<Break> {
    let mut breaks: Vec<Break> = sides.iter().flat_map(|side| side.breaks()).collect();
    breaks.sort_by(|a, b| a.s.total_cmp(&b.s));
    breaks
}

/// Knots to begin with: a few, the laws' own, and about each kink as many and as close as its jump of slope needs to be
/// rounded off within `aim` (a jump j is missed by about j h at a knot spacing h).
fn starting_knots(breaks: &[Break], own: &[f64], aim: f64) -> Vec<f64> {
    let mut knots: Vec<f64> = Vec::new();
    for Break { s, kink, .. } in breaks {
        let spacing = (aim / kink.abs().max(1e-12)).max(CLOSE);
        if spacing < 0.03 {
            let near = knots
                .last()
                .is_some_and(|last| s - 1.5 * spacing < last + 0.5 * spacing);
            let start = if near {
                knots[knots.len() - 1] + spacing
            } else {
                s - 1.5 * spacing
            };
            let mut knot = start;
            while knot < s + 2.0 * spacing {
                knots.push(knot);
                knot += spacing;
            }
        }
    }
    for knot in [0.2, 0.4, 0.6, 0.8] {
        if breaks.iter().all(|b| b.kink == 0.0 || (knot - b.s).abs() > 0.05) {
            knots.push(knot);
        }
    }
    for knot in own {
        if knots.iter().all(|other| (other - knot).abs() > 0.01) {
            knots.push(*knot);
        }
    }
    knots.retain(|knot| *knot > CLOSE && *knot < 1.0 - CLOSE);
    knots.sort_by(f64::total_cmp);
    knots
}

/// Distances from a break at which a side is sampled: closer and closer, down to the least knot span.
const NEAR_BREAK: u32 = 36;

/// Samples the sides, `density` times as closely as usual.
fn sample(sides: &[&Side], breaks: &[Break], own: usize, density: u32) -> Grid {
    let steps = 160.max(6 * own) * density as usize;
    let closer = 0.82_f64.powf(1.0 / f64::from(density));
    let mut parameters: Vec<f64> = (0..=steps).map(|i| i as f64 / steps as f64).collect();
    for Break { s, .. } in breaks {
        let mut distance = 0.04;
        for _ in 0..NEAR_BREAK * density {
            parameters.extend([s - distance, s + distance]);
            distance *= closer;
        }
    }
    parameters.retain(|s| *s > 0.0 && *s < 1.0);
    parameters.sort_by(f64::total_cmp);
    parameters.dedup_by(|a, b| *a - *b < 3e-6);
    let checks: Vec<f64> = parameters
        .windows(2)
        .map(|pair| 0.5 * (pair[0] + pair[1]))
        .collect();
    let targets = (sides.iter())
        .map(|side| Target {
            values: side.sample(&parameters),
            checks: side.sample(&checks),
            nose: side.nose_derivatives(),
            tail: side.y(1.0),
        })
        .collect();
    Grid {
        parameters,
        checks,
        targets,
    }
}

/// Fits all sides on knots; `None` where one is found to be off by more than `limit`.
fn attempt(interior: &[f64], grid: &Grid, limit: f64) -> Option<Attempt> {
    let knots = Knots::clamped(MAX_DEGREE, 0.0, 1.0, interior)?;
    // three coefficients hold position, slope and curvature at the nose, the last one the trailing edge
    let system = LeastSquares::new(&knots, grid.parameters.iter().map(|s| (*s, 1.0)), 3, 1)?;
    let corners = knots.corners();
    let mut spans = vec![0.0_f64; corners.len() - 1];
    let mut coefficients = Vec::with_capacity(grid.targets.len());
    let values = knots.values();
    let (first, second) = (values[MAX_DEGREE + 1], values[MAX_DEGREE + 2]);
    let p = MAX_DEGREE as f64;
    for target in &grid.targets {
        // end derivatives of a clamped spline: y' = p (c1 - c0)/t1, y'' = p (p-1)/t1 ((c2 - c1)/t2 - (c1 - c0)/t1)
        let c1 = target.nose[0] * first / p;
        let c2 = c1 + second * (target.nose[1] * first / (p * (p - 1.0)) + c1 / first);
        let fit = system.solve(&target.values, &[0.0, c1, c2], &[target.tail]);
        let mut span = 0;
        for (s, deviation) in grid.parameters.iter().zip(&fit.deviations) {
            while *s > corners[span + 1] {
                span += 1;
            }
            spans[span] = spans[span].max(deviation.abs());
        }
        if spans.iter().any(|worst| *worst > limit) {
            return None;
        }
        coefficients.push(fit.function.coefficients);
    }
    let worst = spans.iter().copied().fold(0.0, f64::max);
    Some(Attempt {
        knots,
        coefficients,
        spans,
        worst,
    })
}

/// Takes out knots, those that will be missed least first, as long as the rest stays within `aim`.
fn thin_out(mut best: Attempt, mut interior: Vec<f64>, grid: &Grid, aim: f64) -> Attempt {
    let mut kept: Vec<f64> = Vec::new(); // knots that were tried and are needed
    loop {
        let missed = missed(&best);
        let candidate = (interior.iter().zip(&missed).enumerate())
            .filter(|(_, (knot, _))| !kept.contains(knot))
            .map(|(i, (_, missed))| (i, *missed))
            .min_by(|a, b| a.1.total_cmp(&b.1));
        let Some((candidate, _)) = candidate.filter(|(_, missed)| *missed < MISSED * aim) else {
            return best;
        };
        let mut fewer = interior.clone();
        let knot = fewer.remove(candidate);
        match attempt(&fewer, grid, aim) {
            Some(trial) => {
                best = trial;
                interior = fewer;
            }
            None => kept.push(knot),
        }
    }
}

/// About what the fit would be off by without each of its interior knots: the jump of the pth derivative there, over the
/// jump that a basis function around the knot has, whose height is about one.
fn missed(best: &Attempt) -> Vec<f64> {
    let values = best.knots.values();
    let count = best.knots.count() - MAX_DEGREE - 1;
    let mut missed = vec![0.0_f64; count];
    for coefficients in &best.coefficients {
        // the pth derivative, one value a span
        let mut d = coefficients.clone();
        for level in (1..=MAX_DEGREE).rev() {
            let from = MAX_DEGREE + 1 - level;
            for i in 0..d.len() - 1 {
                d[i] = level as f64 * (d[i + 1] - d[i]) / (values[from + i + level] - values[from + i]);
            }
            d.pop();
        }
        for (i, missed) in missed.iter_mut().enumerate() {
            let at = MAX_DEGREE + 1 + i;
            let around = &values[at - 3..=at + 3];
            let factorial = 120.0;
            let product: f64 = (around.iter().enumerate())
                .filter(|(k, _)| *k != 3)
                .map(|(_, knot)| (knot - values[at]).abs())
                .product();
            let height = product / (factorial * (around[6] - around[0]));
            *missed = missed.max((d[i + 1] - d[i]).abs() * height);
        }
    }
    missed
}

/// Largest deviation between the parameters that were fitted.
fn measure(best: &Attempt, grid: &Grid) -> f64 {
    let degree = best.knots.degree();
    let mut worst = 0.0_f64;
    for (i, s) in grid.checks.iter().enumerate() {
        let (first, basis) = best.knots.basis(*s);
        for (target, coefficients) in grid.targets.iter().zip(&best.coefficients) {
            let fitted: f64 = (0..=degree).map(|k| basis[k] * coefficients[first + k]).sum();
            worst = worst.max((fitted - target.checks[i]).abs());
        }
    }
    worst
}
