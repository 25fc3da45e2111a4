//! One side of a section as an exact function of the parameter that the fit and the loft use.
//!
//! A side runs from the nose (s = 0, where the chord line meets the section) to the trailing edge (s = 1) with
//!
//! ```text
//! x(s) = x₀ + σ(s)²    σ(s) = σₙ (1 - s)² + σₜ s
//! ```
//!
//! x₀ is the least x of the side continued smoothly around the nose, σₙ = ±√-x₀ puts s = 0 at x = 0, and σₜ puts s = 1
//! at the trailing edge. A symmetric section has x₀ = σₙ = 0 and x = s². x(s) is a polynomial of degree 4, so any spline
//! of that degree holds it exactly, and y(s) is smooth even at the nose: only y needs a fit. Sections that share knots
//! so share their chord fractions too, which is what makes constant chord fractions straight on a ruled panel.

use super::formula::{Camber, Formula, Shape};
use crate::spline::Function;

/// Where a derivative of y(s) jumps.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Break {
    /// Parameter.
    pub(super) s: f64,
    /// Where on the mean line \[-\].
    pub(super) place: f64,
    /// Angle of the corner \[rad\], in size.
    pub(super) corner: f64,
    /// Jump of dy/ds \[chord\], such as a 4-digit mean line's jump of curvature causes; 0 where only higher
    /// derivatives jump.
    pub(super) kink: f64,
}

/// One side of a section.
#[derive(Clone, Debug)]
pub(super) struct Side {
    least: f64,
    nose: f64,
    tail: f64,
    law: Law,
}

#[derive(Clone, Debug)]
enum Law {
    /// `side`: 1 upper, -1 lower; `turn`: √x of the mean line's station where x is least.
    Formula { shape: Shape, side: f64, turn: f64 },
    /// y as a spline of σ over the whole contour, lower side at negative σ.
    Spline(Function),
}

impl Side {
    /// The upper (`side` = 1) or lower (-1) side of a formula; `None` where x does not grow along it, so that the
    /// section would cross itself.
    pub(super) fn of_formula(formula: Formula, side: f64) -> Option<Self> {
        let shape = formula.shape();
        let mut turn = 0.0;
        for _ in 0..60 {
            let (x, _) = shape.surface::<3>(side, turn);
            let step = x.first() / x.second();
            turn -= step;
            if step.abs() < 1e-16 {
                break;
            }
        }
        let (x, _) = shape.surface::<3>(side, turn);
        if x.first().abs() > 1e-12 || x.second() <= 0.0 || turn.abs() > 0.3 {
            return None;
        }
        let least = x.value().min(0.0);
        let nose = (-least).sqrt() * if turn > 0.0 { -1.0 } else { 1.0 };
        let (end, _) = shape.surface::<1>(side, 1.0);
        let tail = (end.value() - least).sqrt();
        let rises = (1..=200).all(|i| {
            let t = turn + (1.0 - turn) * f64::from(i) / 200.0;
            shape.surface::<2>(side, t).0.first() > 0.0
        });
        rises.then_some(Self {
            least,
            nose,
            tail,
            law: Law::Formula { shape, side, turn },
        })
    }

    /// A side of a contour whose y is a spline of σ = ±√(x - x₀), from σ at the nose to σ at the trailing edge.
    pub(super) const fn of_spline(function: Function, least: f64, nose: f64, tail: f64) -> Self {
        Self {
            least,
            nose,
            tail,
            law: Law::Spline(function),
        }
    }

    fn sigma(&self, s: f64) -> f64 {
        self.nose * (1.0 - s) * (1.0 - s) + self.tail * s
    }

    /// Coefficients of x(s) by powers of s.
    pub(super) fn x_polynomial(&self) -> [f64; 5] {
        let (a, b, c) = (self.nose, self.tail - 2.0 * self.nose, self.nose);
        // x₀ + (a + b s + c s²)², with x₀ + a² = 0 by construction
        [0.0, 2.0 * a * b, b * b + 2.0 * a * c, 2.0 * b * c, c * c]
    }

    /// x at s \[-\].
    pub(super) fn x(&self, s: f64) -> f64 {
        let sigma = self.sigma(s);
        self.least + sigma * sigma
    }

    /// y at s \[-\].
    pub(super) fn y(&self, s: f64) -> f64 {
        self.y_by_root(self.sigma(s))
    }

    /// y where the signed root √(x - x₀) is `sigma` \[-\].
    pub(super) fn y_by_root(&self, sigma: f64) -> f64 {
        match &self.law {
            Law::Spline(function) => function.at(sigma),
            Law::Formula { shape, side, turn } => {
                let t = solve_station(shape, *side, self.least, *turn, sigma, sigma + turn);
                shape.surface::<1>(*side, t).1.value()
            }
        }
    }

    /// y at ascending parameters \[-\].
    pub(super) fn sample(&self, parameters: &[f64]) -> Vec<f64> {
        let Law::Formula { shape, side, turn } = &self.law else {
            return parameters.iter().map(|s| self.y(*s)).collect();
        };
        // each station is close to where the last one leads
        let (mut last, mut before) = (self.sigma(0.0), self.sigma(0.0) + turn);
        (parameters.iter())
            .map(|s| {
                let sigma = self.sigma(*s);
                let t = solve_station(shape, *side, self.least, *turn, sigma, before + sigma - last);
                (last, before) = (sigma, t);
                shape.surface::<1>(*side, t).1.value()
            })
            .collect()
    }

    /// y at x ≥ 0 \[-\].
    pub(super) fn y_at(&self, x: f64) -> f64 {
        let sigma = (x - self.least).max(0.0).sqrt();
        self.y_by_root(if self.tail < 0.0 { -sigma } else { sigma })
    }

    /// The side turned upside down: the upper side becomes a lower one. Only for sides of points.
    pub(super) fn mirrored(&self) -> Self {
        let mut side = self.clone();
        if let Law::Spline(function) = &self.law {
            side.law = Law::Spline(function.mirrored());
            side.nose = -self.nose;
            side.tail = -self.tail;
        }
        side
    }

    /// Of an upper side of points and the lower one that goes with it: x₀ and the range of σ.
    pub(super) fn root_range(&self, lower: &Self) -> Option<(f64, f64, f64)> {
        matches!(self.law, Law::Spline(_)).then_some((self.least, lower.tail, self.tail))
    }

    /// Distance from a point inside to the side along a unit vector, negative against it; `None` where there is no
    /// crossing near x of the point or the side is given by formula.
    pub(super) fn distance_along(&self, from: [f64; 2], along: [f64; 2]) -> Option<f64> {
        let Law::Spline(function) = &self.law else {
            return None;
        };
        let mut sigma = (from[0] - self.least).max(0.0).sqrt() * self.tail.signum();
        for _ in 0..20 {
            let [y, slope, _] = function.derivatives(sigma);
            let offset = [self.least + sigma * sigma - from[0], y - from[1]];
            // what the point is beside the line, and how fast that changes
            let beside = offset[0] * along[1] - offset[1] * along[0];
            let rate = 2.0 * sigma * along[1] - slope * along[0];
            let step = beside / rate;
            sigma -= step;
            if step.abs() < 1e-11 {
                return Some(offset[0] * along[0] + offset[1] * along[1]);
            }
            if step.abs() > 0.5 || !step.is_finite() {
                return None;
            }
        }
        None
    }

    /// First and second derivative of y by s at the nose.
    pub(super) fn nose_derivatives(&self) -> [f64; 2] {
        let slope = self.tail - 2.0 * self.nose; // dσ/ds
        let bend = 2.0 * self.nose;
        match &self.law {
            Law::Spline(function) => {
                let [_, first, second] = function.derivatives(self.nose);
                [first * slope, second * slope * slope + first * bend]
            }
            Law::Formula { shape, side, .. } => {
                // σ(t)² = x(t) - x₀, differentiated at t = 0
                let (x, y) = shape.surface::<4>(*side, 0.0);
                let (first, second) = if self.nose.abs() < 1e-6 {
                    let first = (x.second() / 2.0).sqrt();
                    (first, x.third() / (6.0 * first))
                } else {
                    let first = x.first() / (2.0 * self.nose);
                    (first, (x.second() - 2.0 * first * first) / (2.0 * self.nose))
                };
                let rate = slope / first; // dt/ds
                let rate_change = (bend - second * rate * rate) / first;
                [
                    y.first() * rate,
                    y.second() * rate * rate + y.first() * rate_change,
                ]
            }
        }
    }

    /// Where a derivative of y(s) jumps, with a jump of slope marked.
    pub(super) fn breaks(&self) -> Vec<Break> {
        let Law::Formula { shape, side, .. } = &self.law else {
            return Vec::new();
        };
        (shape.breaks().into_iter())
            .map(|place| {
                let x = shape.surface::<1>(*side, place.sqrt()).0.value();
                let s = self.parameter_at(x);
                // dy/dx on either side of the station, by its own series there
                let slope = |t: f64| {
                    let (x, y) = shape.surface::<2>(*side, t);
                    y.first() / x.first()
                };
                let root = place.sqrt();
                let speed = 2.0 * self.sigma(s) * (self.tail - 2.0 * self.nose * (1.0 - s));
                let (before, after) = (slope(root - 1e-9), slope(root + 1e-9));
                let jump = (after - before) * speed;
                let corner = (after.atan() - before.atan()).abs();
                Break {
                    s,
                    place,
                    corner,
                    kink: if jump.abs() < 2e-5 { 0.0 } else { jump },
                }
            })
            .collect()
    }

    /// The parameter where the side is at x ≥ 0.
    fn parameter_at(&self, x: f64) -> f64 {
        let (mut low, mut high) = (0.0, 1.0);
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if self.x(middle) < x {
                low = middle
            } else {
                high = middle
            }
        }
        low
    }

    /// The law's own parameter from the nose to the trailing edge, cut where derivatives jump.
    pub(super) fn pieces(&self) -> Vec<[f64; 2]> {
        let corners = match &self.law {
            Law::Formula { shape, .. } => {
                let mut corners = vec![0.0];
                corners.extend(shape.breaks().into_iter().map(f64::sqrt));
                corners.push(1.0);
                corners
            }
            Law::Spline(function) => {
                let within = |sigma: &f64| (sigma - self.nose) * (sigma - self.tail) < 0.0;
                let mut corners: Vec<f64> = function.knots.corners().into_iter().filter(within).collect();
                if self.tail < self.nose {
                    corners.reverse();
                }
                corners.insert(0, self.nose);
                corners.push(self.tail);
                corners
            }
        };
        corners.windows(2).map(|pair| [pair[0], pair[1]]).collect()
    }

    /// Point at the law's own parameter, with its first two derivatives by it, growing towards the trailing edge.
    pub(super) fn local(&self, parameter: f64) -> Local {
        match &self.law {
            Law::Formula { shape, side, .. } => {
                let (x, y) = shape.surface::<3>(*side, parameter);
                Local {
                    point: [x.value(), y.value()],
                    first: [x.first(), y.first()],
                    second: [x.second(), y.second()],
                }
            }
            Law::Spline(function) => {
                let [y, slope, bend] = function.derivatives(parameter);
                let ahead = self.tail.signum();
                Local {
                    point: [self.least + parameter * parameter, y],
                    first: [2.0 * parameter * ahead, slope * ahead],
                    second: [2.0, bend],
                }
            }
        }
    }

    /// Knots of the law itself inside the side, as parameters s: none for formulas.
    pub(super) fn law_knots(&self) -> Vec<f64> {
        let Law::Spline(function) = &self.law else {
            return Vec::new();
        };
        let mut knots: Vec<f64> = (function.knots.corners().iter())
            .filter_map(|&sigma| {
                // σₙ (1 - s)² + σₜ s = σ
                let (a, b, c) = (self.nose, self.tail - 2.0 * self.nose, self.nose - sigma);
                let s = -2.0 * c / (b + b.signum() * (b * b - 4.0 * a * c).sqrt());
                (s > 1e-3 && s < 1.0 - 1e-3).then_some(s)
            })
            .collect();
        knots.sort_by(f64::total_cmp);
        knots
    }
}

/// A point of a side with its first two derivatives.
#[derive(Clone, Copy, Debug)]
pub(super) struct Local {
    pub(super) point: [f64; 2],
    pub(super) first: [f64; 2],
    pub(super) second: [f64; 2],
}

impl Local {
    /// Curvature \[1/chord\], positive where the path turns to its left.
    pub(super) fn curvature(&self) -> f64 {
        let [a, b] = [self.first, self.second];
        (a[0] * b[1] - a[1] * b[0]) / a[0].hypot(a[1]).powi(3)
    }
}

/// The mean line's √x at which the side's signed root √(x - x₀) is `sigma`, from a first guess.
fn solve_station(shape: &Shape, side: f64, least: f64, turn: f64, sigma: f64, guess: f64) -> f64 {
    if shape.camber == Camber::None {
        return sigma; // x = t²
    }
    let mut t = guess;
    for _ in 0..30 {
        let (x, _) = shape.surface::<2>(side, t);
        let root = (x.value() - least).max(0.0).sqrt() * (t - turn).signum();
        // d root/dt = x'/(2 root); at the turn itself √(x''/2)
        let rate = if root.abs() > 1e-7 {
            x.first() / (2.0 * root)
        } else {
            let (x, _) = shape.surface::<3>(side, t);
            (x.second() / 2.0).abs().sqrt()
        };
        let step = (root - sigma) / rate;
        t -= step;
        // the error that is left is of the order of the step's square
        if step.abs() < 1e-9 {
            break;
        }
    }
    t
}
