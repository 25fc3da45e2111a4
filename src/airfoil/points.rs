//! A smooth section through the points of a coordinate file.
//!
//! y is a spline of degree 5 in the signed root σ = ±√(x - x₀), positive on the upper side, over the whole contour at
//! once: the slope at the foremost point is vertical by construction, and curvature runs smoothly around the nose. As
//! few knots are taken as bring the curve within the tolerance of every given point, the distance being measured
//! square to the contour.

use std::cmp::Ordering;

use super::coordinates::Contour;
use super::side::Side;
use crate::spline::{Fit, Function, Knots, LeastSquares, MAX_DEGREE};

/// Largest distance between the curve and a given point \[chord\], however coarsely the file is printed.
pub(super) const WORST: f64 = 1e-5;
/// Distance aimed for where the file is printed finely enough \[chord\].
const BEST: f64 = 5e-7;

/// σ at the nose below which the nose counts as the foremost point.
const SMALL: f64 = 1e-4;

/// Both sides of a contour, and the largest distance of a given point from them \[chord\].
pub(super) struct Smooth {
    pub(super) upper: Side,
    pub(super) lower: Side,
    pub(super) deviation: f64,
}

/// Distance aimed for at a contour that is known exactly \[chord\].
pub(super) const EXACT: f64 = 5e-8;

/// How close a curve must pass the points \[chord\].
#[derive(Clone, Copy, Debug)]
pub(super) struct Closeness {
    /// What is aimed for.
    pub(super) aim: f64,
    /// What is still accepted.
    pub(super) limit: f64,
}

impl Closeness {
    /// As close as the contour's print allows: half a unit of the last printed place is in the data anyway.
    pub(super) fn of_print(contour: &Contour) -> Self {
        let decimals = i32::try_from(contour.decimals).unwrap_or(i32::MAX).min(12);
        let aim = (0.75 * 10.0_f64.powi(-decimals)).clamp(BEST, WORST);
        Self { aim, limit: WORST }
    }

    /// Anywhere within `fairing`.
    pub(super) const fn within(fairing: f64) -> Self {
        Self {
            aim: fairing,
            limit: fairing,
        }
    }
}

/// Fits a contour. `None` where no reasonable curve passes all points as closely as that.
pub(super) fn smooth(contour: &Contour, closeness: Closeness) -> Option<Smooth> {
    let mut best: Option<Attempt> = None;
    for near in NEAR {
        let Some(foremost) = Foremost::of(&contour.points, contour.nose, near) else {
            continue;
        };
        let Some(attempt) = Attempt::of(&contour.points, &foremost, closeness) else {
            continue;
        };
        if best.as_ref().is_none_or(|best| attempt.off() < best.off()) {
            best = Some(attempt);
        }
        if best.as_ref().is_some_and(|best| best.off() <= closeness.aim) {
            break;
        }
    }
    let Attempt {
        function,
        range: (low, high),
        nose,
        deviation,
        shift,
    } = best?;
    if deviation > closeness.limit || shift > closeness.limit {
        return None;
    }
    let least = -nose * nose;
    let upper = Side::of_spline(function.clone(), least, nose, high);
    let lower = Side::of_spline(function, least, nose, low);
    Some(Smooth {
        upper,
        lower,
        deviation,
    })
}

/// A curve through the points, and how far it is off.
struct Attempt {
    function: Function,
    /// σ at the lower and the upper trailing edge.
    range: (f64, f64),
    /// σ where the curve itself meets the chord line; x is counted from there.
    nose: f64,
    deviation: f64,
    /// How far that moves the frame along the chord, which does not change the shape.
    shift: f64,
}

impl Attempt {
    fn of(points: &[[f64; 2]], foremost: &Foremost, closeness: Closeness) -> Option<Self> {
        let data = data(points, foremost);
        let (knots, fit) = fit(&data, closeness)?;
        let deviation = worst(&fit);
        let function = Function {
            knots,
            coefficients: fit.function.coefficients,
        };
        let mut nose = chord_line_sigma(&data);
        for _ in 0..20 {
            let [y, slope, _] = function.derivatives(nose);
            nose -= y / slope;
        }
        let shift = (-nose * nose - foremost.x).abs();
        let range = (data[0].sigma, data[data.len() - 1].sigma);
        (nose.is_finite() && calm(&function, &data)).then_some(Self {
            function,
            range,
            nose,
            deviation,
            shift,
        })
    }

    fn off(&self) -> f64 {
        self.deviation.max(self.shift)
    }
}

/// The foremost point of the smooth contour.
struct Foremost {
    x: f64,
    /// Index of the given point nearest to it, and that point's σ.
    index: usize,
    sigma: f64,
}

/// Points on either side of the foremost given one that settle where the contour itself is foremost: tried in turn, as
/// a break of the contour may be near.
const NEAR: [usize; 3] = [9, 6, 13];

impl Foremost {
    /// Where the contour is foremost: with q the σ of the foremost given point, so that x₀ = x - q² there, that q for
    /// which a curve y(σ) passes the points around it best: two polynomials of degree 5 that meet at the chord line.
    fn of(points: &[[f64; 2]], nose: usize, reach: usize) -> Option<Self> {
        let index = (nose.saturating_sub(1)..=nose + 1)
            .filter(|i| *i < points.len())
            .min_by(|a, b| points[*a][0].total_cmp(&points[*b][0]))?;
        let from = index.saturating_sub(reach);
        let near = points.get(from..=(index + reach).min(points.len() - 1))?;
        let middle = index - from;
        if middle < 4 || near.len() < middle + 5 {
            return None;
        }
        let x = near[middle][0];
        // the foremost given point is at most about half a step from where the contour is foremost
        let beside = near[middle - 1][0].max(near[middle + 1][0]) - x;
        let most = beside.max(0.0).sqrt().max(1e-9);
        let foremost = |q: f64| Self {
            x: x - q * q,
            index: middle,
            sigma: q,
        };
        let misfit = |q: f64| -> f64 {
            let data = data(near, &foremost(q));
            let (at, times) = nose_break(&data);
            attempt(&data, &[at; 4][..times], false).map_or(f64::INFINITY, |(_, fit)| {
                fit.deviations.iter().map(|d| d * d).sum()
            })
        };
        let steps = 32_u32;
        let at = |i: u32| most * (2.0 * f64::from(i) / f64::from(steps) - 1.0);
        let best = (0..=steps).min_by(|a, b| misfit(at(*a)).total_cmp(&misfit(at(*b))))?;
        // golden-section search between its neighbours
        let ratio = 0.5 * (5.0_f64.sqrt() - 1.0);
        let width = at(1) - at(0);
        let (mut low, mut high) = (at(best) - width, at(best) + width);
        for _ in 0..40 {
            let (a, b) = (high - ratio * (high - low), low + ratio * (high - low));
            if misfit(a) < misfit(b) { high = b } else { low = a }
        }
        let refined = 0.5 * (low + high);
        let q = if misfit(refined) < misfit(at(best)) {
            refined
        } else {
            at(best)
        };
        Some(Self { index, ..foremost(q) })
    }
}

/// σ where the contour meets the chord line, y = 0, nearest to the foremost point.
fn chord_line_sigma(data: &[Datum]) -> f64 {
    (data.windows(2))
        .filter(|pair| pair[0].y < 0.0 && pair[1].y >= 0.0)
        .map(|pair| {
            let share = pair[0].y / (pair[0].y - pair[1].y);
            pair[0].sigma + share * (pair[1].sigma - pair[0].sigma)
        })
        .min_by(|a, b| a.abs().total_cmp(&b.abs()))
        .unwrap_or(0.0)
}

/// Where y(σ) may have a break, and how many knots make it one.
///
/// The sections of formulas have a break at the nose, a jump of the change of curvature. In y(σ) it is one of the second
/// derivative where the nose is foremost, of the third where it is not. Curvature itself stays continuous.
fn nose_break(data: &[Datum]) -> (f64, usize) {
    let nose = chord_line_sigma(data);
    if nose.abs() < SMALL { (0.0, 4) } else { (nose, 3) }
}

struct Datum {
    sigma: f64,
    y: f64,
    /// Cosine of the slope: turns a deviation of y into a distance.
    weight: f64,
}

/// The points by ascending σ: from the lower trailing edge around the nose to the upper.
fn data(points: &[[f64; 2]], foremost: &Foremost) -> Vec<Datum> {
    let last = points.len() - 1;
    let mut data: Vec<Datum> = (points.iter().enumerate())
        .map(|(i, [x, y])| {
            let root = (x - foremost.x).max(0.0).sqrt();
            let sigma = match i.cmp(&foremost.index) {
                Ordering::Less => root,
                Ordering::Equal => foremost.sigma,
                Ordering::Greater => -root,
            };
            let [a, b] = [points[i.saturating_sub(1)], points[(i + 1).min(last)]];
            let (dx, dy) = (b[0] - a[0], b[1] - a[1]);
            let weight = (dx.abs() / dx.hypot(dy)).max(0.02);
            Datum { sigma, y: *y, weight }
        })
        .collect();
    data.reverse();
    data.sort_by(|a, b| a.sigma.total_cmp(&b.sigma));
    data.dedup_by(|a, b| a.sigma - b.sigma < 1e-9);
    data
}

fn worst(fit: &Fit) -> f64 {
    fit.deviations.iter().fold(0.0, |worst, d| d.abs().max(worst))
}

/// Least squares on given knots.
///
/// With `steady`, the middle between neighbouring points counts a little too, at the ordinate that a cubic through the
/// four points around it has: then the curve does not swing between points where knots are close. The deviations are
/// those of the points.
fn attempt(data: &[Datum], interior: &[f64], steady: bool) -> Option<(Knots, Fit)> {
    let (first, last) = (&data[0], &data[data.len() - 1]);
    let knots = Knots::clamped(MAX_DEGREE, first.sigma, last.sigma, interior)?;
    let mut samples: Vec<(f64, f64, f64)> = Vec::with_capacity(2 * data.len());
    for (i, d) in data.iter().enumerate() {
        samples.push((d.sigma, d.weight, d.y));
        if steady && i + 1 < data.len() {
            let (sigma, y) = between(data, i);
            samples.push((sigma, STEADY * d.weight, y));
        }
    }
    let system = LeastSquares::new(
        &knots,
        samples.iter().map(|(sigma, weight, _)| (*sigma, *weight)),
        1,
        1,
    )?;
    let values: Vec<f64> = samples.iter().map(|(_, _, y)| *y).collect();
    let mut fit = system.solve(&values, &[first.y], &[last.y]);
    if steady {
        fit.deviations = fit.deviations.into_iter().step_by(2).collect();
    }
    Some((knots, fit))
}

/// Weight of the middle between points against that of a point.
const STEADY: f64 = 0.02;

/// Middle between a point and the next, on the cubic through the four points around it.
fn between(data: &[Datum], i: usize) -> (f64, f64) {
    let from = i.saturating_sub(1).min(data.len().saturating_sub(4));
    let near = &data[from..(from + 4).min(data.len())];
    let sigma = 0.5 * (data[i].sigma + data[i + 1].sigma);
    let y = (near.iter().enumerate())
        .map(|(k, d)| {
            let others = near.iter().enumerate().filter(|(j, _)| *j != k);
            d.y * others
                .map(|(_, o)| (sigma - o.sigma) / (d.sigma - o.sigma))
                .product::<f64>()
        })
        .sum();
    (sigma, y)
}

/// Farthest that a curve may be from the cubic through four points, between the points \[chord\].
const SWING: f64 = 2e-3;

/// Whether the curve runs from point to point without swinging out.
fn calm(function: &Function, data: &[Datum]) -> bool {
    (0..data.len() - 1).all(|i| {
        let (sigma, y) = between(data, i);
        ((function.at(sigma) - y) * data[i].weight).abs() < SWING
    })
}

/// Adds knots in the middle of the data where the curve is too far from it, then takes out those that are not needed.
fn fit(data: &[Datum], closeness: Closeness) -> Option<(Knots, Fit)> {
    let Closeness {
        aim: tolerance,
        limit,
    } = closeness;
    let (low, high) = (data[0].sigma, data[data.len() - 1].sigma);
    let nose = chord_line_sigma(data);
    let mut interior: Vec<f64> = (1..8).map(|i| low + (high - low) * f64::from(i) / 8.0).collect();
    interior.retain(|knot| (knot - nose).abs() > 0.02);
    let (at, times) = nose_break(data);
    interior.extend(std::iter::repeat_n(at, times));
    interior.sort_by(f64::total_cmp);
    let mut best = attempt(data, &interior, false)?;
    // at first two points stay on either side of a new knot, so that the curve cannot swing between points; where that
    // does not bring it close enough, one
    let mut apart = 4;
    while worst(&best.1) > if apart == 4 { tolerance } else { limit } {
        let corners = best.0.corners();
        let mut finer = interior.clone();
        for span in corners.windows(2) {
            let from = data.partition_point(|d| d.sigma < span[0]);
            let to = data.partition_point(|d| d.sigma < span[1]);
            let off = best.1.deviations[from..to].iter().any(|d| d.abs() > tolerance);
            if off && to - from >= apart {
                let middle = from + (to - from) / 2;
                finer.push(0.5 * (data[middle - 1].sigma + data[middle].sigma));
            }
        }
        if finer.len() == interior.len() {
            if apart == 2 {
                break;
            }
            apart = 2;
            continue;
        }
        finer.sort_by(f64::total_cmp);
        interior = finer;
        best = attempt(data, &interior, apart == 2)?;
    }
    let reached = tolerance.max(worst(&best.1));
    let mut k = 0;
    while k < interior.len() {
        let mut fewer = interior.clone();
        fewer.remove(k);
        match attempt(data, &fewer, apart == 2) {
            Some(trial) if worst(&trial.1) <= reached => {
                interior = fewer;
                best = trial;
            }
            _ => k += 1,
        }
    }
    Some(best)
}
