//! A smooth section through the points of a coordinate file.
//!
//! y is a spline of degree 5 in the signed root σ = ±√(x - x₀), positive on the upper side, over the whole contour at
//! once: the slope at the foremost point is vertical by construction, and curvature runs smoothly around the nose. As
//! few knots are taken as bring the curve within the tolerance of every given point, the distance being measured
//! square to the contour.

use super::coordinates::Contour;
use super::side::Side;
use crate::spline::{Fit, Function, Knots, LeastSquares, MAX_DEGREE};

/// Largest distance between the curve and a given point \[chord\], however coarsely the file is printed.
const WORST: f64 = 1e-5;
/// Distance aimed for where the file is printed finely enough \[chord\].
const BEST: f64 = 5e-7;

/// Both sides of a contour, and the largest distance of a given point from them \[chord\].
pub(super) struct Smooth {
    pub(super) upper: Side,
    pub(super) lower: Side,
    pub(super) deviation: f64,
}

/// Fits a contour. `None` where no reasonable curve is within 1e-5 of the chord of all points.
pub(super) fn smooth(contour: &Contour) -> Option<Smooth> {
    let estimate = Foremost::of(&contour.points, contour.nose)?;
    // half a unit of the last printed place is in the data anyway
    let decimals = i32::try_from(contour.decimals).unwrap_or(i32::MAX).min(12);
    let tolerance = (0.75 * 10.0_f64.powi(-decimals)).clamp(BEST, WORST);
    // the foremost point may be a given one, or lie ahead of all given ones: the curve tells which
    let given = estimate.at_given_point(&contour.points, contour.nose);
    let trial = |foremost: Foremost| {
        let data = data(&contour.points, &foremost);
        fit(&data, tolerance).map(|(knots, fit)| (foremost, data, knots, fit))
    };
    let (foremost, data, knots, fit) = [given, estimate]
        .into_iter()
        .filter_map(trial)
        .min_by(|a, b| worst(&a.3).max(tolerance).total_cmp(&worst(&b.3).max(tolerance)))?;
    let deviation = worst(&fit);
    let function = Function {
        knots,
        coefficients: fit.function.coefficients,
    };
    let (low, high) = (data[0].sigma, data[data.len() - 1].sigma);
    // the nose is where the curve itself meets the chord line; x is counted from there
    let mut nose = foremost.chord_line_sigma();
    for _ in 0..20 {
        let [y, slope, _] = function.derivatives(nose);
        nose -= y / slope;
    }
    let least = -nose * nose;
    let shift = (least - foremost.x).abs(); // of the frame along the chord, not of the shape
    if deviation > WORST || shift > WORST {
        return None;
    }
    let upper = Side::of_spline(function.clone(), least, nose, high);
    let lower = Side::of_spline(function, least, nose, low);
    Some(Smooth {
        upper,
        lower,
        deviation,
    })
}

/// The foremost point of the smooth contour.
struct Foremost {
    x: f64,
    y: f64,
    /// Place along the given points: index and fraction to the next.
    place: f64,
}

impl Foremost {
    /// Least x of the curve of degree 4 through the five points around the foremost given one.
    fn of(points: &[[f64; 2]], nose: usize) -> Option<Self> {
        let first = nose.checked_sub(2)?.min(points.len().checked_sub(5)?);
        let near = &points[first..first + 5];
        let mut t = [0.0; 5];
        for i in 1..5 {
            t[i] = t[i - 1] + (near[i][0] - near[i - 1][0]).hypot(near[i][1] - near[i - 1][1]);
        }
        let at = |s: f64| -> [f64; 2] {
            let mut sum = [0.0; 2];
            for i in 0..5 {
                let weight: f64 = (0..5)
                    .filter(|j| *j != i)
                    .map(|j| (s - t[j]) / (t[i] - t[j]))
                    .product();
                sum[0] += weight * near[i][0];
                sum[1] += weight * near[i][1];
            }
            sum
        };
        // golden-section search between the second and the fourth point
        let ratio = 0.5 * (5.0_f64.sqrt() - 1.0);
        let (mut low, mut high) = (t[1], t[3]);
        for _ in 0..80 {
            let (a, b) = (high - ratio * (high - low), low + ratio * (high - low));
            if at(a)[0] < at(b)[0] { high = b } else { low = a }
        }
        let s = 0.5 * (low + high);
        let [x, y] = at(s);
        let before = (0..4).rev().find(|i| t[*i] <= s)?;
        let place = (first + before) as f64 + (s - t[before]) / (t[before + 1] - t[before]);
        let least = points.iter().map(|p| p[0]).fold(x, f64::min).min(0.0);
        Some(Self { x: least, y, place })
    }

    /// The same with the foremost given point as the foremost of all.
    fn at_given_point(&self, points: &[[f64; 2]], nose: usize) -> Self {
        let [x, y] = points[nose];
        Self {
            x: x.min(0.0),
            y,
            place: nose as f64,
        }
    }

    /// σ where the contour meets the chord line at the nose, x = 0: behind the foremost point, on the side away from it.
    fn chord_line_sigma(&self) -> f64 {
        let size = (-self.x).max(0.0).sqrt();
        if self.y > 0.0 { -size } else { size }
    }
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
            let [a, b] = [points[i.saturating_sub(1)], points[(i + 1).min(last)]];
            let (dx, dy) = (b[0] - a[0], b[1] - a[1]);
            let weight = (dx.abs() / dx.hypot(dy)).max(0.02);
            let sigma = if (i as f64) < foremost.place { root } else { -root };
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

fn attempt(data: &[Datum], interior: &[f64]) -> Option<(Knots, Fit)> {
    let (first, last) = (&data[0], &data[data.len() - 1]);
    let knots = Knots::clamped(MAX_DEGREE, first.sigma, last.sigma, interior)?;
    let system = LeastSquares::new(&knots, data.iter().map(|d| (d.sigma, d.weight)), 1, 1)?;
    let values: Vec<f64> = data.iter().map(|d| d.y).collect();
    let fit = system.solve(&values, &[first.y], &[last.y]);
    Some((knots, fit))
}

/// Adds knots in the middle of the data where the curve is too far from it, then takes out those that are not needed.
fn fit(data: &[Datum], tolerance: f64) -> Option<(Knots, Fit)> {
    let (low, high) = (data[0].sigma, data[data.len() - 1].sigma);
    let mut interior: Vec<f64> = (1..8).map(|i| low + (high - low) * f64::from(i) / 8.0).collect();
    let mut best = attempt(data, &interior)?;
    while worst(&best.1) > tolerance {
        let corners = best.0.corners();
        let mut finer = interior.clone();
        for span in corners.windows(2) {
            let from = data.partition_point(|d| d.sigma < span[0]);
            let to = data.partition_point(|d| d.sigma < span[1]);
            let off = best.1.deviations[from..to].iter().any(|d| d.abs() > tolerance);
            // a point stays on either side, so that the points settle every coefficient
            if off && to - from >= 3 {
                let middle = from + (to - from) / 2;
                finer.push(0.5 * (data[middle - 1].sigma + data[middle].sigma));
            }
        }
        if finer.len() == interior.len() {
            break;
        }
        finer.sort_by(f64::total_cmp);
        interior = finer;
        best = attempt(data, &interior)?;
    }
    let limit = tolerance.max(worst(&best.1));
    let mut k = 0;
    while k < interior.len() {
        let mut fewer = interior.clone();
        fewer.remove(k);
        match attempt(data, &fewer) {
            Some(trial) if worst(&trial.1) <= limit => {
                interior = fewer;
                best = trial;
            }
            _ => k += 1,
        }
    }
    Some(best)
}
