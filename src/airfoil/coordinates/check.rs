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
    match crossing::find(&points, 2.0 * unit) {
        Some((i, j)) => {
            let other = run.points.get(i).map_or(1, |p| p.line);
            Err(Error::CrossesItself { at: at(j), other })
        }
        None => Ok((points, nose)),
    }
}

/// A point where the run turns back by more than 120 degrees, both ways longer than the print rounding explains.
/// At the nose itself points far apart may turn so.
fn spike(points: &[[f64; 2]], nose: usize, unit: f64) -> Option<usize> {
    (1..points.len().saturating_sub(1)).find(|&i| {
        let (p, q, r) = (points[i - 1], points[i], points[i + 1]);
        let (a, b) = ([q[0] - p[0], q[1] - p[1]], [r[0] - q[0], r[1] - q[1]]);
        let (la, lb) = (a[0].hypot(a[1]), b[0].hypot(b[1]));
        let back = a[0] * b[0] + a[1] * b[1] < -0.5 * la * lb;
        back && la.min(lb) > 5.0 * unit && !(i.abs_diff(nose) <= 1 && q[0] < 0.05)
    })
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
