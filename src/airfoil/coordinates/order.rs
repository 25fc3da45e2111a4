//! Points in the file's order to one run around the section.

use crate::airfoil::coordinates::error::Error;
use crate::airfoil::coordinates::layout::{Listing, Point};
use crate::airfoil::coordinates::text::{Line, place};

/// One run from the upper trailing edge over the top to the nose and back to the lower trailing edge, in the file's
/// units; no two neighbours are the same.
#[derive(Clone, Debug)]
pub(super) struct Run {
    /// The points.
    pub(super) points: Vec<Point>,
    /// Decimals of x and y in the file's units.
    pub(super) decimals: [i32; 2],
}

fn distance(a: Point, b: Point) -> f64 {
    (a.at[0] - b.at[0]).hypot(a.at[1] - b.at[1])
}

fn same(a: Point, b: Point) -> bool {
    distance(a, b) <= 0.0
}

/// Middle of two points, at the line of the first.
fn middle(a: Point, b: Point) -> Point {
    Point {
        at: [0.5 * (a.at[0] + b.at[0]), 0.5 * (a.at[1] + b.at[1])],
        line: a.line,
    }
}

/// Index of the point farthest from `from`, and its distance.
fn farthest(points: &[Point], from: Point) -> (usize, f64) {
    let mut best = (0, 0.0);
    for (i, &p) in points.iter().enumerate() {
        let d = distance(p, from);
        if d > best.1 {
            best = (i, d);
        }
    }
    best
}

/// Recognises the layout and brings the points into one run.
pub(super) fn arrange(listing: &Listing, lines: &[Line<'_>], notes: &mut Vec<String>) -> Result<Run, Error> {
    let points = &listing.points;
    let (Some(&first), Some(&last)) = (points.first(), points.last()) else {
        return Err(Error::NoPoints { at: place(lines, 1) });
    };
    let size = farthest(points, first).1;
    if size <= 0.0 {
        return Err(Error::NoChord {
            at: place(lines, first.line),
        });
    }
    let parting = parting(listing, size, lines)?;
    check_headings(listing, parting, lines)?;
    let mut run = match parting {
        Some(k) => join(&points[..k], &points[k..], lines, notes)?,
        None if distance(first, last) > 0.25 * size => {
            return Err(not_one(
                lines,
                last,
                format!(
                    "it begins at ({}, {}) and ends here, far from there",
                    first.at[0], first.at[1]
                ),
            ));
        }
        None => around(points, lines, notes)?,
    };
    let before = run.len();
    let mut kept: Vec<Point> = Vec::with_capacity(before);
    for point in run {
        if kept.last().is_none_or(|&last| !same(last, point)) {
            kept.push(point);
        }
    }
    run = kept;
    if run.len() < before {
        let dropped = before - run.len();
        notes.push(format!(
            "{dropped} repeated point{} left out.",
            if dropped == 1 { "" } else { "s" }
        ));
    }
    drop_base(&mut run, notes);
    if run.len() < 3 {
        let at = place(lines, first.line);
        return Err(Error::TooFewPoints {
            at,
            upper: run.len(),
            lower: 0,
        });
    }
    let turned = signed_area(&run) < 0.0;
    if turned {
        run.reverse();
        notes.push("The lower side comes first: order reversed.".to_owned());
    }
    check_trailing_edge(&run, listing, lines)?;
    Ok(Run {
        points: run,
        decimals: listing.decimals,
    })
}

fn not_one(lines: &[Line<'_>], at: Point, why: String) -> Error {
    Error::NotOneContour {
        at: place(lines, at.line),
        why,
    }
}

/// Twice the area within the closed run \[square of the file's unit\], positive where it runs counter-clockwise.
fn signed_area(points: &[Point]) -> f64 {
    let Some(&Point { at: [x0, y0], .. }) = points.first() else {
        return 0.0;
    };
    let pairs = points.iter().zip(points.iter().cycle().skip(1));
    pairs
        .map(|(a, b)| (a.at[0] - x0) * (b.at[1] - y0) - (b.at[0] - x0) * (a.at[1] - y0))
        .sum()
}

/// Where the second of two sides begins: at a step of more than half the section's size. None in a single run.
fn parting(listing: &Listing, size: f64, lines: &[Line<'_>]) -> Result<Option<usize>, Error> {
    let points = &listing.points;
    let steps: Vec<usize> = (1..points.len())
        .filter(|&i| distance(points[i - 1], points[i]) > 0.5 * size)
        .take(3)
        .collect();
    let found = match *steps.as_slice() {
        [] => None,
        [k] if k < 3 => {
            return Err(Error::Spike {
                at: place(lines, points[0].line),
            });
        }
        [k] if k + 3 > points.len() => {
            return Err(Error::Spike {
                at: place(lines, points[k].line),
            });
        }
        [k] => Some(k),
        [a, b] if b - a < 3 => {
            return Err(Error::Spike {
                at: place(lines, points[a].line),
            });
        }
        [_, b, ..] => {
            let why = "a second step of more than half the chord between neighbours".to_owned();
            return Err(not_one(lines, points[b], why));
        }
    };
    if let (Some((counted, line)), Some(k)) = (listing.counted, found)
        && counted != k
    {
        let found = format!("the sides have {k} and {} points", points.len() - k);
        return Err(Error::Counts {
            at: place(lines, line),
            found,
        });
    }
    Ok(found)
}

/// Words stand only where the second side begins.
fn check_headings(listing: &Listing, parting: Option<usize>, lines: &[Line<'_>]) -> Result<(), Error> {
    let nose_first = parting
        .is_none()
        .then(|| listing.points.first())
        .flatten()
        .map(|&first| {
            // a single run parts at its far end
            farthest(&listing.points, first).0
        });
    for &(at, line) in &listing.headings {
        let fits = parting == Some(at) || nose_first.is_some_and(|k| at.abs_diff(k) <= 1);
        if !fits {
            return Err(Error::Words {
                at: place(lines, line),
            });
        }
    }
    Ok(())
}

/// Widest extent across the line from `a` to `b`, of the points that lie within an eighth of it from `a`.
fn bluntness(points: &[Point], a: Point, b: Point) -> Option<f64> {
    let chord = distance(a, b);
    let along = [(b.at[0] - a.at[0]) / chord, (b.at[1] - a.at[1]) / chord];
    let (mut low, mut high, mut count) = (0.0_f64, 0.0_f64, 0);
    for p in points {
        let d = [p.at[0] - a.at[0], p.at[1] - a.at[1]];
        if d[0] * along[0] + d[1] * along[1] < 0.125 * chord {
            let across = d[1] * along[0] - d[0] * along[1];
            (low, high, count) = (low.min(across), high.max(across), count + 1);
        }
    }
    (count > 2).then_some(high - low)
}

/// Whether `a` is the nose and `b` the trailing edge: by the order in x, unless the shape says clearly otherwise.
fn is_nose(points: &[Point], a: Point, b: Point, lines: &[Line<'_>]) -> Result<bool, Error> {
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

/// Two sides that run the same way, to one run.
fn join(
    one: &[Point],
    two: &[Point],
    lines: &[Line<'_>],
    notes: &mut Vec<String>,
) -> Result<Vec<Point>, Error> {
    let all: Vec<Point> = [one, two].concat();
    let (a, b) = (
        middle(one[0], two[0]),
        middle(one[one.len() - 1], two[two.len() - 1]),
    );
    let chord = distance(a, b);
    for (p, q) in [(two[0], one[0]), (two[two.len() - 1], one[one.len() - 1])] {
        if distance(p, q) > 0.25 * chord {
            let why = format!(
                "this end of a side is far from ({}, {}), the other side's",
                q.at[0], q.at[1]
            );
            return Err(not_one(lines, p, why));
        }
    }
    let nose_first = is_nose(&all, a, b, lines)?;
    let from = if nose_first {
        "from the nose"
    } else {
        "from the trailing edge"
    };
    notes.push(format!(
        "Layout: two sides {from}, {} and {} points.",
        one.len(),
        two.len()
    ));
    let mut run = one.to_vec();
    let mut second = two.to_vec();
    if nose_first {
        run.reverse();
    } else {
        second.reverse();
    }
    check_gap(&run, &second, lines)?;
    if let (Some(&end), Some(&start)) = (run.last(), second.first())
        && same(end, start)
    {
        second.remove(0);
        notes.push("The nose is given twice; once left out.".to_owned());
    }
    run.append(&mut second);
    Ok(run)
}

/// Where `one` ends and `two` begins, at the nose, there is no gap much wider than the steps beside it.
fn check_gap(one: &[Point], two: &[Point], lines: &[Line<'_>]) -> Result<(), Error> {
    let (Some(&a), Some(&c)) = (one.last(), two.first()) else {
        return Ok(());
    };
    let gap = distance(a, c);
    let behind = smaller(&mut one.windows(2).rev().map(|w| distance(w[0], w[1])));
    let ahead = smaller(&mut two.windows(2).map(|w| distance(w[0], w[1])));
    if gap > 3.0 * behind.max(ahead) {
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

/// A single run around the section from the trailing edge, or from the nose.
fn around(points: &[Point], lines: &[Line<'_>], notes: &mut Vec<String>) -> Result<Vec<Point>, Error> {
    let start = middle(points[0], points[points.len() - 1]);
    let (k, chord) = farthest(points, start);
    if !is_nose(points, start, points[k], lines)? {
        notes.push(format!(
            "Layout: one loop from the trailing edge, {} points.",
            points.len()
        ));
        return Ok(points.to_vec());
    }
    notes.push(format!(
        "Layout: one loop from the nose, {} points.",
        points.len()
    ));
    check_gap(points, points, lines)?;
    let along = [
        (points[k].at[0] - start.at[0]) / chord,
        (points[k].at[1] - start.at[1]) / chord,
    ];
    // the base of a blunt trailing edge, or two points given for a sharp one: the steepest step next to the far end
    let across = |i: usize| {
        let (p, q) = (points[i].at, points[i + 1].at);
        let (dx, dy) = (q[0] - p[0], q[1] - p[1]);
        (
            (dx * along[0] + dy * along[1]).abs(),
            (dy * along[0] - dx * along[1]).abs(),
        )
    };
    let base = (k.saturating_sub(1)..=k.min(points.len().saturating_sub(2))).find(|&i| {
        let (ahead, aside) = across(i);
        ahead <= aside && aside < 0.1 * chord
    });
    let (end, begin) = base.map_or((k, k), |i| (i, i + 1));
    let mut run = points[begin..].to_vec();
    let mut rest = &points[..=end];
    if run.last().zip(rest.first()).is_some_and(|(&a, &b)| same(a, b)) {
        rest = &rest[1..];
    }
    run.extend_from_slice(rest);
    Ok(run)
}

/// Drops a base that is drawn into the run: from the lower edge back to the upper one, or from its middle.
fn drop_base(run: &mut Vec<Point>, notes: &mut Vec<String>) {
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

/// Both sides end at the same place along the chord.
fn check_trailing_edge(run: &[Point], listing: &Listing, lines: &[Line<'_>]) -> Result<(), Error> {
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
    if ahead.abs() > 0.5 * aside.abs() + 5e-4 * chord + 2.0 * unit {
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
