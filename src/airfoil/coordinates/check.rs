//! What cannot be a section.

use crate::airfoil::coordinates::MIN_SIDE;
use crate::airfoil::coordinates::crossing;
use crate::airfoil::coordinates::error::Error;
use crate::airfoil::coordinates::order::Run;
use crate::airfoil::coordinates::text::{Line, place};

/// Thickness of a section \[chord\]: more than the first, at most the second.
const THICKNESS: [f64; 2] = [1e-4, 0.6];

/// Passes points in the chord frame that can be a section, with the index of the nose.
pub(super) fn section(
    mut points: Vec<[f64; 2]>,
    run: &Run,
    unit: f64,
    lines: &[Line<'_>],
    notes: &mut Vec<String>,
) -> Result<(Vec<[f64; 2]>, usize), Error> {
    let at = |i: usize| place(lines, run.points.get(i).map_or(1, |p| p.line));
    let mut nose = 0;
    for i in 1..points.len() {
        if points[i][0] < points[nose][0] {
            nose = i;
        }
    }
    let (upper, lower) = (nose + 1, points.len() - nose);
    if upper < MIN_SIDE || lower < MIN_SIDE {
        return Err(Error::TooFewPoints {
            at: at(nose),
            upper,
            lower,
        });
    }
    if let Some(i) = spike(&points, nose, unit) {
        return Err(Error::Spike { at: at(i) });
    }
    let thickness = thickness(&points[..=nose], &points[nose..]);
    if !(thickness > THICKNESS[0] && thickness <= THICKNESS[1]) {
        return Err(Error::Thickness {
            at: at(nose),
            thickness,
        });
    }
    let last = points.len() - 1;
    let overlap = points[last][1] - points[0][1];
    if overlap > 2.0 * unit {
        return Err(Error::CrossedTrailingEdge {
            at: at(last),
            overlap,
        });
    }
    if overlap > 0.0 {
        points[0] = [1.0, 0.0];
        points[last] = [1.0, 0.0];
        notes.push("Trailing edge closed: the sides crossed there within the print rounding.".to_owned());
    }
    for (i, off) in misprints(&points, nose, unit) {
        let line = at(i).line;
        notes.push(format!(
            "Line {line} lies {off:.4} of the chord off the curve through its neighbours: a misprint?"
        ));
    }
    match crossing::find(&points, 2.0 * unit) {
        Some((i, j)) => {
            let other = run.points.get(i).map_or(1, |p| p.line);
            Err(Error::CrossesItself { at: at(j), other })
        }
        None => Ok((points, nose)),
    }
}

/// A point where the run turns back by more than 120 degrees, both ways longer than the print rounding explains.
/// At the nose itself points far apart may turn so. Next to a point far off the run turns back too: of neighbours the
/// one is meant that lengthens the run most.
fn spike(points: &[[f64; 2]], nose: usize, unit: f64) -> Option<usize> {
    let length = |p: [f64; 2], q: [f64; 2]| (q[0] - p[0]).hypot(q[1] - p[1]);
    let last = points.len().saturating_sub(1);
    let turns = |i: usize| {
        let (p, q, r) = (points[i - 1], points[i], points[i + 1]);
        let (a, b) = ([q[0] - p[0], q[1] - p[1]], [r[0] - q[0], r[1] - q[1]]);
        let (la, lb) = (length(p, q), length(q, r));
        let back = a[0] * b[0] + a[1] * b[1] < -0.5 * la * lb;
        back && la.min(lb) > 5.0 * unit && !(i.abs_diff(nose) <= 1 && q[0] < 0.05)
    };
    let detour = |i: usize| {
        let (p, q, r) = (points[i - 1], points[i], points[i + 1]);
        length(p, q) + length(q, r) - length(p, r)
    };
    if strays([points[3], points[2], points[1], points[0]], unit) {
        return Some(0);
    }
    if strays(
        [points[last - 3], points[last - 2], points[last - 1], points[last]],
        unit,
    ) {
        return Some(last);
    }
    let first = (1..last).find(|&i| turns(i))?;
    (first..last.min(first + 3)).max_by(|&i, &j| detour(i).total_cmp(&detour(j)))
}

/// Whether the last of four points is off the parabola through the others by more than a fifth of its step: a number
/// cut short. Steps of few units of the print rounding tell nothing.
fn strays([p, q, r, end]: [[f64; 2]; 4], unit: f64) -> bool {
    let length = |p: [f64; 2], q: [f64; 2]| (q[0] - p[0]).hypot(q[1] - p[1]);
    let (a, b, step) = (length(p, q), length(q, r), length(r, end));
    let t = a + b + step;
    let weights = [
        (t - a) * (t - a - b) / (a * (a + b)),
        -t * (t - a - b) / (a * b),
        t * (t - a) / ((a + b) * b),
    ];
    let ahead = [0, 1].map(|k: usize| weights[0] * p[k] + weights[1] * q[k] + weights[2] * r[k]);
    a.min(b).min(step) > 50.0 * unit && step < 3.0 * b && length(ahead, end) > 0.2 * step
}

/// Largest thickness across the chord line \[chord\], from given points to the other side's polygon.
fn thickness(upper: &[[f64; 2]], lower: &[[f64; 2]]) -> f64 {
    let sorted = |side: &[[f64; 2]]| {
        let mut side = side.to_vec();
        side.sort_by(|a, b| a[0].total_cmp(&b[0]));
        side
    };
    let height = |side: &[[f64; 2]], x: f64| {
        let k = side.partition_point(|p| p[0] < x).clamp(1, side.len() - 1);
        let (p, q) = (side[k - 1], side[k]);
        let share = if q[0] > p[0] {
            ((x - p[0]) / (q[0] - p[0])).clamp(0.0, 1.0)
        } else {
            0.0
        };
        p[1] + (q[1] - p[1]) * share
    };
    let (up, low) = (sorted(upper), sorted(lower));
    let above = upper.iter().map(|p| p[1] - height(&low, p[0]));
    let below = lower.iter().map(|p| height(&up, p[0]) - p[1]);
    above.chain(below).fold(0.0, f64::max)
}

/// Points off the curve through their neighbours, ten times as far as the points around, and how far \[chord\]: away
/// from the nose and the ends, where the curve bends too much between points to tell. A fiftieth of the distance
/// between the neighbours is more than a break in the curvature of a camber line makes.
fn misprints(points: &[[f64; 2]], nose: usize, unit: f64) -> Vec<(usize, f64)> {
    let n = points.len();
    let off: Vec<f64> = (0..n)
        .map(|i| {
            if i < 2 || i + 2 >= n {
                0.0
            } else {
                deviation(&points[i - 2..i + 3])
            }
        })
        .collect();
    let span = |i: usize| (points[i + 1][0] - points[i - 1][0]).hypot(points[i + 1][1] - points[i - 1][1]);
    (6..n.saturating_sub(6))
        .filter(|&i| i.abs_diff(nose) > 6 && off[i] > (20.0 * unit).max(5e-4).max(0.02 * span(i)))
        .filter(|&i| [i - 2, i - 1, i + 1, i + 2].iter().all(|&j| off[j] < off[i]))
        .filter(|&i| {
            [i - 4, i - 3, i + 3, i + 4]
                .iter()
                .all(|&j| 10.0 * off[j] < off[i])
        })
        .map(|i| (i, off[i]))
        .take(10)
        .collect()
}

/// Distance of the middle one of five points from the cubic through the others, by lengths along their polygon.
fn deviation(five: &[[f64; 2]]) -> f64 {
    let mut t = [0.0; 5];
    for i in 1..5 {
        t[i] = t[i - 1] + (five[i][0] - five[i - 1][0]).hypot(five[i][1] - five[i - 1][1]);
    }
    let others = [0, 1, 3, 4];
    let mut at = [0.0; 2];
    for i in others {
        let weights = others
            .iter()
            .filter(|&&j| j != i)
            .map(|&j| (t[2] - t[j]) / (t[i] - t[j]));
        let weight: f64 = weights.product();
        at = [at[0] + weight * five[i][0], at[1] + weight * five[i][1]];
    }
    (at[0] - five[2][0]).hypot(at[1] - five[2][1])
}
