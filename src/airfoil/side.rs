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

use super::formula::Formula;
use crate::spline::Function;

/// Where a derivative of y(s) jumps.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Break {
    /// Parameter.
    pub(super) s: f64,
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
    Formula { formula: Formula, side: f64, turn: f64 },
    /// y as a spline of σ over the whole contour, lower side at negative σ.
    Spline(Function),
}

impl Side {
    /// The upper (`side` = 1) or lower (-1) side of a formula; `None` where x does not grow along it, so that the
    /// section would cross itself.
    pub(super) fn of_formula(formula: Formula, side: f64) -> Option<Self> {
        let mut turn = 0.0;
        for _ in 0..60 {
            let (x, _) = formula.surface(side, turn);
            let step = x.first() / x.second();
            turn -= step;
            if step.abs() < 1e-16 {
                break;
            }
        }
        let (x, _) = formula.surface(side, turn);
        if x.first().abs() > 1e-12 || x.second() <= 0.0 || turn.abs() > 0.3 {
            return None;
        }
        let least = x.value().min(0.0);
        let nose = (-least).sqrt() * if turn > 0.0 { -1.0 } else { 1.0 };
        let (end, _) = formula.surface(side, 1.0);
        let tail = (end.value() - least).sqrt();
        let rises = (1..=200).all(|i| {
            let t = turn + (1.0 - turn) * f64::from(i) / 200.0;
            formula.surface(side, t).0.first() > 0.0
        });
        rises.then_some(Self {
            least,
            nose,
            tail,
            law: Law::Formula { formula, side, turn },
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
        let sigma = self.sigma(s);
        match &self.law {
            Law::Spline(function) => function.at(sigma),
            Law::Formula { formula, side, turn } => {
                let t = solve_station(formula, *side, self.least, *turn, sigma);
                formula.surface(*side, t).1.value()
            }
        }
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
            Law::Formula { formula, side, .. } => {
                // σ(t)² = x(t) - x₀, differentiated at t = 0
                let (x, y) = formula.surface(*side, 0.0);
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
        let Law::Formula { formula, side, .. } = &self.law else {
            return Vec::new();
        };
        let Some(place) = formula.camber.break_at() else {
            return Vec::new();
        };
        let target = formula.surface(*side, place.sqrt()).0.value();
        let (mut low, mut high) = (0.0, 1.0);
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if self.x(middle) < target {
                low = middle
            } else {
                high = middle
            }
        }
        let slope = |s: f64, h: f64| (self.y(s + h) - self.y(s)) / h;
        let jump = slope(low + 1e-9, 1e-6) - slope(low - 1e-9, -1e-6);
        vec![Break {
            s: low,
            kink: if jump.abs() < 2e-5 { 0.0 } else { jump },
        }]
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

/// The mean line's √x at which the side's signed root √(x - x₀) is `sigma`.
fn solve_station(formula: &Formula, side: f64, least: f64, turn: f64, sigma: f64) -> f64 {
    let mut t = sigma + turn;
    for _ in 0..30 {
        let (x, _) = formula.surface(side, t);
        let root = (x.value() - least).max(0.0).sqrt() * (t - turn).signum();
        // d root/dt = x'/(2 root); at the turn itself √(x''/2)
        let rate = if root.abs() > 1e-7 {
            x.first() / (2.0 * root)
        } else {
            (x.second() / 2.0).abs().sqrt()
        };
        let step = (root - sigma) / rate;
        t -= step;
        if step.abs() < 1e-14 {
            break;
        }
    }
    t
}
