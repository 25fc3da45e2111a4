//! Faces: whether their edges lie on their surface and go around it the right way, and their share of the integrals.

use nalgebra::{Point3, Vector3};

use super::access::finding;
use super::edge::{Edge, Way};
use super::gauss::{on, rule};
use super::nurbs::{Curve, Surface};
use super::shape::Skin;
use crate::inspect::Finding;

/// Sums of surface integrals over outward area vectors.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Sums {
    /// Area.
    pub(super) area: f64,
    /// Volume, by the divergence theorem.
    pub(super) volume: f64,
    /// First moments of the volume.
    pub(super) moment: Vector3<f64>,
}

/// A face as it is read.
#[derive(Clone, Debug)]
pub(super) struct Face<'a> {
    /// Its line in the file.
    pub(super) line: u32,
    /// Its name, or its number.
    pub(super) name: &'a str,
    /// Its surface.
    pub(super) skin: &'a Skin,
    /// True where its outward side is the surface's own.
    pub(super) same_sense: bool,
    /// Its edges in the order of the loops, each with true where it is used forwards.
    pub(super) loops: &'a [Vec<(&'a Edge, bool)>],
}

/// Checks a face and gives its integrals about `origin`; `None` where they can't be had, with a fault or a note why.
pub(super) fn measure(
    face: &Face<'_>,
    origin: Point3<f64>,
    tolerance: f64,
    faults: &mut Vec<Finding>,
    notes: &mut Vec<String>,
) -> Option<Sums> {
    let uses: Vec<(&Way, bool)> = (face.loops.iter().flatten())
        .map(|(edge, forward)| edge.way.as_ref().map(|way| (way, *forward)))
        .collect::<Option<_>>()?;
    match face.skin {
        Skin::Unread(entity) => {
            notes.push(format!(
                "face `{}` lies on {entity}, which is not read: not measured",
                face.name
            ));
            None
        }
        Skin::Plane(at, normal) => Some(plane(face, (*at, *normal), &uses, origin, tolerance, faults)),
        Skin::Spline(surface) => spline(face, surface, &uses, origin, tolerance, faults, notes),
    }
}

/// A part of a plane within its edges, by Green's theorem: the triangles from the plane's origin to each piece of edge.
fn plane(
    face: &Face<'_>,
    (at, normal): (Point3<f64>, Vector3<f64>),
    uses: &[(&Way, bool)],
    origin: Point3<f64>,
    tolerance: f64,
    faults: &mut Vec<Finding>,
) -> Sums {
    let out = if face.same_sense { normal } else { -normal };
    let mut off: f64 = 0.0;
    let (mut area, mut moment) = (0.0, Vector3::zeros());
    let o = at - origin;
    for (way, forward) in uses {
        let sense = if *forward { 1.0 } else { -1.0 };
        let rule = rule(way.order());
        for span in way.corners().windows(2) {
            for (t, weight) in on(&rule, span[0], span[1]) {
                let (point, slope) = way.at(t);
                let d = point - at;
                let element = 0.5 * d.cross(&slope).dot(&out) * weight * sense;
                area += element;
                // ∫ (o + s d)² 2 s ds over s from 0 to 1, for each coordinate
                let squares =
                    o.component_mul(&o) + o.component_mul(&d) * (4.0 / 3.0) + d.component_mul(&d) * 0.5;
                moment += squares.component_mul(&out) * (0.5 * element);
            }
        }
        for t in way.samples() {
            off = off.max((way.at(t).0 - at).dot(&normal).abs());
        }
    }
    if off > tolerance {
        faults.push(finding(
            face.line,
            format!("face `{}`: an edge is {off:.3e} off its plane", face.name),
        ));
    }
    if area <= 0.0 {
        faults.push(finding(face.line, turned(face.name)));
    }
    Sums {
        area: area.abs(),
        volume: o.dot(&out) * area / 3.0,
        moment,
    }
}

fn turned(name: &str) -> String {
    format!("face `{name}`: its edges go around it against the sense that it states for its surface")
}

/// A whole B-spline surface, if the edges are its four sides.
fn spline(
    face: &Face<'_>,
    surface: &Surface,
    uses: &[(&Way, bool)],
    origin: Point3<f64>,
    tolerance: f64,
    faults: &mut Vec<Finding>,
    notes: &mut Vec<String>,
) -> Option<Sums> {
    let sides = surface.sides();
    let mut covered = [0.0; 4];
    let mut turns = 0.0;
    for (way, forward) in uses {
        // the side that the ends fit best is nearly always the one
        let first = (0..sides.len())
            .min_by(|&a, &b| ends_off(way, &sides[a]).total_cmp(&ends_off(way, &sides[b])))?;
        let likely = Fit {
            side: first,
            ..fit(way, &sides[first], tolerance)
        };
        let all = (sides.iter().enumerate()).filter(|_| likely.off > tolerance);
        let fit = all
            .map(|(side, curve)| Fit {
                side,
                ..fit(way, curve, tolerance)
            })
            .chain([likely])
            .min_by(|a, b| a.off.total_cmp(&b.off))?;
        if fit.off > tolerance {
            let off = surface_distance(surface, way).min(fit.off);
            if off > tolerance {
                let what = format!("face `{}`: an edge is {off:.3e} off its surface", face.name);
                faults.push(finding(face.line, what));
            } else {
                notes.push(format!(
                    "face `{}` is a part of its surface: its shape is not measured",
                    face.name
                ));
            }
            return None;
        }
        covered[fit.side] += (fit.to - fit.from).abs();
        // counter-clockwise around the parameters: along u at the start of v, along v at the end of u, and back
        let counter = if matches!(fit.side, 1 | 2) { 1.0 } else { -1.0 };
        turns += (fit.to - fit.from) * counter * if *forward { 1.0 } else { -1.0 };
    }
    let length = |curve: &Curve| {
        let start = curve.points[0].xyz() / curve.points[0].w;
        curve
            .points
            .iter()
            .map(|p| (p.xyz() / p.w - start).norm())
            .fold(0.0, f64::max)
    };
    for (side, curve) in sides.iter().enumerate() {
        let wanted = if length(curve) <= tolerance { 0.0 } else { 1.0 };
        if (covered[side] - wanted).abs() > 1e-6 {
            let what = format!(
                "face `{}`: its edges do not go once around its surface",
                face.name
            );
            faults.push(finding(face.line, what));
            return None;
        }
    }
    if (turns > 0.0) != face.same_sense {
        faults.push(finding(face.line, turned(face.name)));
    }
    Some(integrate(surface, face.same_sense, origin))
}

/// Where an edge lies along a side, and how far off it is.
#[derive(Clone, Copy, Debug)]
struct Fit {
    side: usize,
    off: f64,
    from: f64,
    to: f64,
}

/// How far the ends of an edge are from those of a side, whichever way round fits better.
fn ends_off(way: &Way, side: &Curve) -> f64 {
    let [a, b] = [0.0, 1.0].map(|t| way.at(t).0);
    let [c, d] = [0.0, 1.0].map(|t| side.at(side.knots.at_fraction(t)).0);
    let off = |p: Point3<f64>, q: Point3<f64>| (p - c).norm().max((q - d).norm());
    off(a, b).min(off(b, a))
}

/// Compares an edge with a side: at equal fractions first, forwards or backwards, then by the nearest points.
fn fit(way: &Way, side: &Curve, tolerance: f64) -> Fit {
    let samples = way.samples();
    let place = |fraction: f64| side.at(side.knots.at_fraction(fraction)).0;
    let apart = |back: bool| {
        let other = |t: f64| if back { 1.0 - t } else { t };
        samples
            .iter()
            .map(|&t| (way.at(t).0 - place(other(t))).norm())
            .fold(0.0, f64::max)
    };
    let ahead = apart(false);
    let back = if ahead <= tolerance {
        f64::INFINITY
    } else {
        apart(true)
    };
    let equal = Fit {
        side: 0,
        off: ahead.min(back),
        from: if ahead <= back { 0.0 } else { 1.0 },
        to: if ahead <= back { 1.0 } else { 0.0 },
    };
    if equal.off <= tolerance {
        return equal;
    }
    let (from, start) = nearest(side, way.at(0.0).0);
    let (to, end) = nearest(side, way.at(1.0).0);
    if start.max(end) > tolerance || (to - from).abs() < 1e-9 {
        return equal;
    }
    let off = samples
        .iter()
        .map(|&t| nearest(side, way.at(t).0).1)
        .fold(0.0, f64::max);
    if off < equal.off {
        Fit {
            side: 0,
            off,
            from,
            to,
        }
    } else {
        equal
    }
}

/// Fraction of the place on a curve that is nearest to a point, and the distance.
fn nearest(curve: &Curve, point: Point3<f64>) -> (f64, f64) {
    let distance = |t: f64| (curve.at(curve.knots.at_fraction(t)).0 - point).norm();
    let steps = 8 * curve.points.len();
    let coarse = |i: usize| i as f64 / steps as f64;
    let best = (0..=steps)
        .min_by(|&a, &b| distance(coarse(a)).total_cmp(&distance(coarse(b))))
        .unwrap_or(0);
    let (mut low, mut high) = (coarse(best.saturating_sub(1)), coarse((best + 1).min(steps)));
    // a third of the bracket goes with each comparison
    for _ in 0..90 {
        let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
        if distance(a) <= distance(b) {
            high = b
        } else {
            low = a
        }
    }
    [low, 0.5 * (low + high), high]
        .map(|t| (t, distance(t)))
        .into_iter()
        .min_by(|a, b| a.1.total_cmp(&b.1))
        .unwrap_or((0.0, f64::INFINITY))
}

/// Largest distance of an edge from anywhere on a surface, from a grid of starts improved by Gauss-Newton steps.
fn surface_distance(surface: &Surface, way: &Way) -> f64 {
    const GRID: u32 = 12;
    let grid: Vec<(f64, f64)> = (0..=GRID)
        .flat_map(|i| {
            (0..=GRID).map(move |j| (f64::from(i) / f64::from(GRID), f64::from(j) / f64::from(GRID)))
        })
        .collect();
    let at = |(u, v): (f64, f64)| {
        let across = surface.across(surface.u.at_fraction(u));
        surface.along(&across, surface.v.at_fraction(v))
    };
    let span = |range: (f64, f64)| range.1 - range.0;
    let (width, height) = (span(surface.u.range()), span(surface.v.range()));
    let places: Vec<Point3<f64>> = grid.iter().map(|&place| at(place).0).collect();
    let from = |point: Point3<f64>| {
        let start = (0..grid.len())
            .min_by(|&a, &b| (places[a] - point).norm().total_cmp(&(places[b] - point).norm()));
        let mut place = grid[start.unwrap_or(0)];
        let mut least = f64::INFINITY;
        for _ in 0..30 {
            let (found, du, dv) = at(place);
            let (du, dv, away) = (du * width, dv * height, point - found);
            least = least.min(away.norm());
            let (a, b, c) = (du.dot(&du), du.dot(&dv), dv.dot(&dv));
            let determinant = a * c - b * b;
            if determinant <= 1e-14 * a * c {
                break;
            }
            let (p, q) = (du.dot(&away), dv.dot(&away));
            place.0 = (place.0 + (p * c - q * b) / determinant).clamp(0.0, 1.0);
            place.1 = (place.1 + (q * a - p * b) / determinant).clamp(0.0, 1.0);
        }
        least
    };
    way.samples()
        .iter()
        .map(|&t| from(way.at(t).0))
        .fold(0.0, f64::max)
}

/// Integrals over a whole surface: exact for the volume and centroid of polynomial patches up to rounding.
fn integrate(surface: &Surface, same_sense: bool, origin: Point3<f64>) -> Sums {
    let sense = if same_sense { 1.0 } else { -1.0 };
    let points = |degree: usize| {
        if surface.rational {
            24
        } else {
            (2 * degree).max(if degree > 1 { 12 } else { 8 })
        }
    };
    let (rule_u, rule_v) = (rule(points(surface.u.degree())), rule(points(surface.v.degree())));
    let (corners_u, corners_v) = (surface.u.corners(), surface.v.corners());
    let mut sums = Sums::default();
    for u in corners_u.windows(2) {
        for (s, weight_u) in on(&rule_u, u[0], u[1]) {
            let across = surface.across(s);
            for v in corners_v.windows(2) {
                for (t, weight_v) in on(&rule_v, v[0], v[1]) {
                    let (point, du, dv) = surface.along(&across, t);
                    let r = point - origin;
                    let area = du.cross(&dv) * (sense * weight_u * weight_v);
                    sums.area += area.norm();
                    sums.volume += r.dot(&area) / 3.0;
                    sums.moment += r.component_mul(&r).component_mul(&area) * 0.5;
                }
            }
        }
    }
    sums
}
