//! The camber line of a section: the formula's mean line, or the middle between the sides of a section of points.
//!
//! For points it is the line whose normals meet both sides at equal distance, as in the construction of the NACA
//! families. The middle at equal x, which is simpler, is another line: it differs by ½ d(h²)/dx dz/dx, h being half the
//! thickness, and its zero-lift angle by some hundredths of a degree. The line is a spline of x that begins at the nose,
//! found by Newton's method: at each station the ordinate that is half way along the normal depends on the slope, and
//! the condition is made linear in both.

use std::f64::consts::PI;

use nalgebra::{DMatrix, DVector};

use super::figures::{Greatest, greatest};
use super::formula::Camber;
use super::section::Section;
use crate::spline::{Function, Knots, MAX_DEGREE};

/// A camber line on the chord from 0 to 1.
#[derive(Clone, Debug)]
pub struct CamberLine(Law);

#[derive(Clone, Debug)]
enum Law {
    Formula(Camber),
    Spline(Function),
}

/// Stations at which the line is found, and knots inside it.
const STATIONS: u32 = 320;
const KNOTS: u32 = 64;
/// Stations nearer to the ends than this are left out: at the nose the normal only touches the section \[-\].
const ENDS: f64 = 1e-3;

impl CamberLine {
    /// The camber line of a section.
    pub(super) fn of(section: &Section) -> Self {
        if let Some(formula) = section.formula() {
            return Self(Law::Formula(formula.camber));
        }
        let cosine = |i: u32, n: u32| 0.5 * (1.0 - (PI * f64::from(i) / f64::from(n)).cos());
        let stations: Vec<f64> = (0..=STATIONS)
            .map(|i| ENDS + (1.0 - 2.0 * ENDS) * cosine(i, STATIONS))
            .collect();
        // the end spans reach 0.05 in, so that the stations settle them
        let knots: Vec<f64> = (0..=KNOTS).map(|i| 0.05 + 0.9 * cosine(i, KNOTS)).collect();
        let knots = Knots::clamped(MAX_DEGREE, 0.0, 1.0, &knots).expect("knots ascend strictly");
        let mut line = Function {
            coefficients: vec![0.0; knots.count()],
            knots,
        };
        for step in 0..30 {
            let rows: Vec<Condition> = stations
                .iter()
                .filter_map(|x| condition(section, &line, *x))
                .collect();
            let Some(next) = solve(&line.knots, &rows) else {
                break;
            };
            let moved = (next.iter().zip(&line.coefficients)).fold(0.0_f64, |m, (a, b)| m.max((a - b).abs()));
            // half steps at first: from the chord line, the normals near a blunt nose can lead too far
            let share = if step < 4 { 0.5 } else { 1.0 };
            for (old, new) in line.coefficients.iter_mut().zip(next) {
                *old += share * (new - *old);
            }
            if moved < 1e-9 {
                break;
            }
        }
        Self(Law::Spline(line))
    }

    /// Ordinate and slope at `x` from 0 to 1 \[-\].
    pub fn at(&self, x: f64) -> (f64, f64) {
        match &self.0 {
            Law::Formula(camber) => camber.line(x),
            Law::Spline(function) => {
                let [y, slope, _] = function.derivatives(x);
                (y, slope)
            }
        }
    }

    /// Greatest ordinate in size, with its sign, and its place.
    pub fn greatest(&self) -> Greatest {
        match &self.0 {
            Law::Formula(camber) => {
                let (value, x) = camber.greatest();
                Greatest { value, x }
            }
            Law::Spline(_) => {
                let most = greatest(1.0, |x| self.at(x).0);
                let least = greatest(1.0, |x| -self.at(x).0);
                if most.value >= least.value {
                    most
                } else {
                    Greatest {
                        value: -least.value,
                        x: least.x,
                    }
                }
            }
        }
    }

    /// Where its curvature jumps \[-\].
    pub(super) const fn break_at(&self) -> Option<f64> {
        match &self.0 {
            Law::Formula(camber) => camber.break_at(),
            Law::Spline(_) => None,
        }
    }
}

/// `y(x) + weight dy/dx(x) = value`.
struct Condition {
    x: f64,
    weight: f64,
    value: f64,
}

/// What the line must fulfil at `x`, near a line that is known. `None` where a normal misses a side.
fn condition(section: &Section, line: &Function, x: f64) -> Option<Condition> {
    let [y, slope, _] = line.derivatives(x);
    // the ordinate of the middle between the sides, on a normal through the known point; the first line is the chord
    let middle = |slope: f64| -> Option<f64> {
        let length = slope.hypot(1.0);
        let normal = [-slope / length, 1.0 / length];
        let above = section.upper.distance_along([x, y], normal)?;
        let below = section.lower.distance_along([x, y], normal)?;
        Some(y + 0.5 * (above + below) * length)
    };
    let found = middle(slope)?;
    let difference = 1e-5;
    let rate = (middle(slope + difference)? - middle(slope - difference)?) / (2.0 * difference);
    Some(Condition {
        x,
        weight: -rate,
        value: found - rate * slope,
    })
}

/// The spline from (0, 0) that meets the conditions best.
fn solve(knots: &Knots, conditions: &[Condition]) -> Option<Vec<f64>> {
    let free = knots.count() - 1;
    let mut matrix = DMatrix::<f64>::zeros(free, free);
    let mut right = DVector::<f64>::zeros(free);
    for Condition { x, weight, value } in conditions {
        let d = knots.derivatives(*x);
        let row: [f64; MAX_DEGREE + 1] = std::array::from_fn(|i| d.rows[0][i] + weight * d.rows[1][i]);
        for (i, a) in row.iter().enumerate() {
            let Some(at) = (d.first + i).checked_sub(1) else {
                continue;
            };
            right[at] += a * value;
            for (j, b) in row.iter().enumerate() {
                if let Some(beside) = (d.first + j).checked_sub(1) {
                    matrix[(at, beside)] += a * b;
                }
            }
        }
    }
    let solution = matrix.cholesky()?.solve(&right);
    Some(std::iter::once(0.0).chain(solution.iter().copied()).collect())
}
