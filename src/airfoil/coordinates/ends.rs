//! Nose and trailing edge of a run of points: which is which, and whether they are whole.

use crate::airfoil::coordinates::error::Error;
use crate::airfoil::coordinates::layout::{Listing, Point};
use crate::airfoil::coordinates::order::{distance, farthest, middle, not_one, same, signed_area};
use crate::airfoil::coordinates::text::{Line, place};

/// Area of the part of the section within an eighth of the chord from `a`, where `b` is the other end \[square of the
/// file's unit\]. `points` run around the section.
fn bluntness(points: &[Point], a: Point, b: Point) -> Option<f64> {
    let chord = distance(a, b);
    let along = [(b.at[0] - a.at[0]) / chord, (b.at[1] - a.at[1]) / chord];
    let near = |p: &Point| {
        let d = [p.at[0] - a.at[0], p.at[1] - a.at[1]];
        d[0] * along[0] + d[1] * along[1] < 0.125 * chord
    };
    let part: Vec<Point> = points.iter().copied().filter(near).collect();
    (part.len() > 3).then(|| 0.5 * signed_area(&part).abs())
}

/// Whether `a` is the nose and `b` the trailing edge: by the order in x, unless the shape says clearly otherwise.
/// `points` run around the section.
pub(super) fn is_nose(points: &[Point], a: Point, b: Point, lines: &[Line<'_>]) -> Result<bool, Error> {
    let by_order = a.at[0] < b.at[0];
    if let (Some(at_a), Some(at_b)) = (bluntness(points, a, b), bluntness(points, b, a)) {
        let (nose, edge) = if by_order { (at_a, at_b) } else { (at_b, at_a) };
        if edge > 2.0 * nose {
            return Err(Error::NoseAft {
                at: place(lines, points.first().map_or(1, |p| p.line)),
            });
        }
    }
    Ok(by_order)
}

/// Where `one` ends and `two` begins, at the nose, there is no gap much wider than the steps beside it.
pub(super) fn check_gap(one: &[Point], two: &[Point], lines: &[Line<'_>]) -> Result<(), Error> {
    let (Some(&a), Some(&c)) = (one.last(), two.first()) else {
        return Ok(());
    };
    let gap = distance(a, c);
    let behind = smaller(&mut one.windows(2).rev().map(|w| distance(w[0], w[1])));
    let ahead = smaller(&mut two.windows(2).map(|w| distance(w[0], w[1])));
    if gap > 2.0 * behind.max(ahead) {
        let why = format!(
            "a gap at the nose between this line and line {}: points are missing",
            c.line
        );
        return Err(not_one(lines, a, why));
    }
    Ok(())
}

/// The smaller of the first two steps; the first alone may come from a spoiled row. Repeated points do not count.
fn smaller(steps: &mut dyn Iterator<Item = f64>) -> f64 {
    steps.filter(|&d| d > 0.0).take(2).fold(f64::INFINITY, f64::min)
}

/// Drops a base that is drawn into the run: from the lower edge back to the upper one, or from its middle.
pub(super) fn drop_base(run: &mut Vec<Point>, notes: &mut Vec<String>) {
    let n = run.len();
    if n < 8 || !same(run[0], run[n - 1]) {
        return;
    }
    let (_, chord) = farthest(run, run[0]);
    let steep = |a: Point, b: Point| {
        let (dx, dy) = ((a.at[0] - b.at[0]).abs(), (a.at[1] - b.at[1]).abs());
        dy > 3.0 * dx && dy < 0.1 * chord
    };
    let (front, back) = (steep(run[0], run[1]), steep(run[n - 1], run[n - 2]));
    if back {
        run.pop();
    }
    if front {
        run.remove(0);
    }
    if front || back {
        notes.push("The line across the blunt trailing edge left out.".to_owned());
    }
}

/// Both sides end at the same place along the chord, or on a base that leans by at most 45 degrees.
pub(super) fn check_trailing_edge(run: &[Point], listing: &Listing, lines: &[Line<'_>]) -> Result<(), Error> {
    let (Some(&upper), Some(&lower)) = (run.first(), run.last()) else {
        return Ok(());
    };
    let edge = middle(upper, lower);
    let (k, chord) = farthest(run, edge);
    let along = [
        (edge.at[0] - run[k].at[0]) / chord,
        (edge.at[1] - run[k].at[1]) / chord,
    ];
    let d = [upper.at[0] - lower.at[0], upper.at[1] - lower.at[1]];
    let ahead = d[0] * along[0] + d[1] * along[1];
    let aside = d[1] * along[0] - d[0] * along[1];
    let unit = 10_f64
        .powi(-listing.decimals[0].min(listing.decimals[1]))
        .min(1e-3 * chord);
    if ahead.abs() > aside.abs() + 5e-4 * chord + 2.0 * unit {
        let (short, other) = if ahead < 0.0 {
            (upper, lower)
        } else {
            (lower, upper)
        };
        let why = format!(
            "this side ends {:.4} of the chord before the other, at line {}",
            ahead.abs() / chord,
            other.line
        );
        return Err(not_one(lines, short, why));
    }
    Ok(())
}
