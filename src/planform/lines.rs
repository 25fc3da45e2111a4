//! The construction lines of a wing: outline, quarter-chord line, mean aerodynamic chord and the rest.

use nalgebra::Point3;

use super::{LineKind, Planform, Reference, ReferenceLine, ReferencePoint, SpanLaw};
use crate::spec::{Sides, Spec};

/// All construction geometry of a wing, on the sides that are built.
pub fn reference_geometry(spec: &Spec, planform: &Planform) -> Reference {
    let mut reference = Reference::default();
    let sides: &[(&str, f64)] = match spec.sides {
        Sides::Starboard => &[("starboard", 1.0)],
        Sides::Port => &[("port", -1.0)],
        Sides::Both | Sides::Pair => &[("starboard", 1.0), ("port", -1.0)],
    };
    for (k, (side, sign)) in sides.iter().enumerate() {
        let mirror = |p: Point3<f64>| Point3::new(p.x, p.y * sign, p.z) + planform.shift;
        let mut add = |name: String, kind: LineKind, points: Vec<Point3<f64>>| {
            let points = straightened(points.into_iter().map(mirror).collect());
            reference.lines.push(ReferenceLine { name, kind, points });
        };
        let stations = &planform.stations;
        let (root, tip) = (&stations[0], &stations[stations.len() - 1]);
        let last = (stations.len() - 1) as f64;
        if k == 0 {
            add(
                "root chord".into(),
                LineKind::Chord,
                vec![root.leading_edge(), root.trailing_edge()],
            );
            add("centreline".into(), LineKind::Centreline, centreline(planform));
        }
        let along = |fraction: f64| -> Vec<Point3<f64>> {
            places(planform, 0.0, last)
                .into_iter()
                .map(|t| planform.chord(t).at(fraction))
                .collect()
        };
        add(
            format!("reference leading edge, {side}"),
            LineKind::Outline,
            along(0.0),
        );
        add(
            format!("reference trailing edge, {side}"),
            LineKind::Outline,
            along(1.0),
        );
        add(
            format!("tip chord, {side}"),
            LineKind::Chord,
            vec![tip.leading_edge(), tip.trailing_edge()],
        );
        add(
            format!("quarter-chord line, {side}"),
            LineKind::QuarterChord,
            along(0.25),
        );
        add(
            format!("twist axis, {side}"),
            LineKind::TwistAxis,
            along(spec.setting.twist_axis),
        );
        let mac = &planform.wing.mac;
        add(
            format!("mean aerodynamic chord, {side}"),
            LineKind::MeanAerodynamicChord,
            vec![mac.leading_edge, mac.trailing_edge],
        );
        for line in &spec.lines {
            let points = spanwise(planform, line.chord_fraction, line.from, line.to);
            add(format!("{}, {side}", line.name), LineKind::Custom, points);
        }
        reference.points.push(ReferencePoint {
            name: format!("aerodynamic centre, {side}"),
            point: mirror(mac.aerodynamic_centre()),
        });
    }
    reference
}

/// From a tenth of the root chord ahead of the wing to a tenth behind it, in the plane of symmetry at the root's height.
fn centreline(planform: &Planform) -> Vec<Point3<f64>> {
    let root = &planform.stations[0];
    let start = root.nominal_leading_edge - 0.1 * root.chord;
    let end = root.nominal_leading_edge + 1.1 * root.chord;
    vec![Point3::new(start, 0.0, 0.0), Point3::new(end, 0.0, 0.0)]
}

/// Corners of the line at a chord fraction from one fraction of the semispan to another, counted along the panels'
/// extents in the reference plane.
fn spanwise(planform: &Planform, chord_fraction: f64, from: f64, to: f64) -> Vec<Point3<f64>> {
    let semispan = 0.5 * planform.wing.span;
    let end = |fraction: f64| {
        let last = (planform.stations.len() - 1) as f64;
        if fraction >= 1.0 {
            last
        } else {
            planform.place_of(fraction * semispan)
        }
    };
    let places = places(planform, end(from), end(to));
    places
        .into_iter()
        .map(|t| planform.chord(t).at(chord_fraction))
        .collect()
}

/// Places of the corners of a spanwise line between two places: its ends and the stations between them; on a smooth wing
/// many more, so that the broken line is a good picture of the curve.
fn places(planform: &Planform, from: f64, to: f64) -> Vec<f64> {
    let parts = match planform.law {
        SpanLaw::Straight => 1_u32,
        SpanLaw::Smooth(..) => SMOOTH_PARTS,
    };
    let mut places = vec![from];
    for k in 0..planform.stations.len() - 1 {
        for j in 0..parts {
            let t = k as f64 + f64::from(j) / f64::from(parts);
            if t > from + 1e-9 && t < to - 1e-9 {
                places.push(t);
            }
        }
    }
    places.push(to);
    places
}

/// Pieces of a reference line between two stations of a smooth wing.
const SMOOTH_PARTS: u32 = 6;

/// The same line without corners that are none: repeated points, and points on the straight line between neighbours.
fn straightened(points: Vec<Point3<f64>>) -> Vec<Point3<f64>> {
    let mut kept: Vec<Point3<f64>> = Vec::with_capacity(points.len());
    for point in points {
        if kept.last().is_some_and(|last| (point - last).norm() < 1e-9) {
            continue;
        }
        if let [.., a, b] = kept.as_slice() {
            let (first, second) = (b - a, point - b);
            if first.cross(&second).norm() <= 1e-12 * first.norm() * second.norm() && first.dot(&second) > 0.0
            {
                kept.pop();
            }
        }
        kept.push(point);
    }
    kept
}
