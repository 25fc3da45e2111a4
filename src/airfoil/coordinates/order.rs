//! Points in the file's order to one run around the section.

use crate::airfoil::coordinates::ends::{check_gap, check_trailing_edge, drop_base, is_nose};
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

/// Distance of two points.
pub(super) fn distance(a: Point, b: Point) -> f64 {
    (a.at[0] - b.at[0]).hypot(a.at[1] - b.at[1])
}

/// Whether two points are the same.
pub(super) fn same(a: Point, b: Point) -> bool {
    distance(a, b) <= 0.0
}

/// Middle of two points, at the line of the first.
pub(super) fn middle(a: Point, b: Point) -> Point {
    Point {
        at: [0.5 * (a.at[0] + b.at[0]), 0.5 * (a.at[1] + b.at[1])],
        line: a.line,
    }
}

/// Index of the point farthest from `from`, and its distance.
pub(super) fn farthest(points: &[Point], from: Point) -> (usize, f64) {
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
    let listing = &single(listing, notes);
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

/// The listing without points that repeat the one before.
fn single(listing: &Listing, notes: &mut Vec<String>) -> Listing {
    let given = &listing.points;
    let mut kept: Vec<Point> = Vec::with_capacity(given.len());
    // new index of each given point, and of the end
    let mut index = Vec::with_capacity(given.len() + 1);
    for &point in given {
        index.push(kept.len());
        if kept.last().is_none_or(|&last| !same(last, point)) {
            kept.push(point);
        }
    }
    index.push(kept.len());
    let dropped = given.len() - kept.len();
    if dropped > 0 {
        let s = if dropped == 1 { "" } else { "s" };
        notes.push(format!("{dropped} repeated point{s} left out."));
    }
    Listing {
        title: None,
        points: kept,
        counted: listing.counted.map(|(at, line)| (index[at], line)),
        headings: listing
            .headings
            .iter()
            .map(|&(at, line)| (index[at], line))
            .collect(),
        decimals: listing.decimals,
    }
}

/// The refusal of points that are not one run, at the point where that shows.
pub(super) fn not_one(lines: &[Line<'_>], at: Point, why: String) -> Error {
    Error::NotOneContour {
        at: place(lines, at.line),
        why,
    }
}

/// Twice the area within the closed run \[square of the file's unit\], positive where it runs counter-clockwise.
pub(super) fn signed_area(points: &[Point]) -> f64 {
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

/// Two sides that run the same way, to one run.
fn join(
    one: &[Point],
    two: &[Point],
    lines: &[Line<'_>],
    notes: &mut Vec<String>,
) -> Result<Vec<Point>, Error> {
    let around: Vec<Point> = one.iter().rev().chain(two).copied().collect();
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
    let nose_first = is_nose(&around, a, b, lines)?;
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
    // the side that was first from the nose comes first from the trailing edge too
    run.reverse();
    Ok(run)
}
