//! Curves and surfaces of the solid.

use std::io::Write;

use truck_modeling::{BSplineCurve, BSplineSurface, Curve, InnerSpace, KnotVec};
use truck_modeling::{Plane, Point3, Surface, Vector3, Vector4};

use super::error::Error;
use super::part21::{Exchange, Id};
use super::units::Units;

/// Largest distance of a bilinear surface's corners from a plane for it to be written as that plane \[mm\].
const FLAT: f64 = 1e-9;

/// Writes a point.
pub(super) fn write_point<W: Write>(out: &mut Exchange<W>, units: Units, point: Point3) -> Result<Id, Error> {
    out.cartesian_point("", units.to_point(point))
}

/// Writes an edge's curve; `face` names the face in errors.
pub(super) fn write_curve<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    curve: &Curve,
    face: &dyn Fn() -> String,
) -> Result<Id, Error> {
    match curve {
        Curve::Line(line) => write_line(out, units, line.0, line.1, face),
        Curve::BSplineCurve(curve) => match curve.control_points()[..] {
            [start, end] => write_line(out, units, start, end, face),
            _ => {
                let points = write_points(out, units, curve.control_points())?;
                let (multiplicities, knots) = distinct(curve.knot_vec());
                out.curve(curve.degree(), &points, (&multiplicities, &knots))
            }
        },
        Curve::NurbsCurve(curve) => {
            let curve: &BSplineCurve<Vector4> = curve.non_rationalized();
            let control = curve.control_points();
            let (points, weights): (Vec<_>, Vec<_>) = control.iter().map(|&p| unweighted(p)).unzip();
            let points = write_points(out, units, &points)?;
            let (multiplicities, knots) = distinct(curve.knot_vec());
            out.rational_curve(curve.degree(), &points, (&multiplicities, &knots), &weights)
        }
        Curve::IntersectionCurve(_) => Err(Error::Curve {
            face: face(),
            kind: "an intersection curve",
        }),
    }
}

/// Writes a face's surface; `face` names the face in errors.
pub(super) fn write_surface<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    surface: &Surface,
    face: &dyn Fn() -> String,
) -> Result<Id, Error> {
    match surface {
        Surface::Plane(plane) => write_plane(out, units, plane, face),
        Surface::BSplineSurface(surface) => {
            if let Some(plane) = flat(surface) {
                return write_plane(out, units, &plane, face);
            }
            let net = surface.control_points();
            let net = net
                .iter()
                .map(|row| write_points(out, units, row))
                .collect::<Result<Vec<_>, _>>()?;
            let (u, v) = (distinct(surface.uknot_vec()), distinct(surface.vknot_vec()));
            out.surface(surface.degrees(), &net, (&u.0, &u.1), (&v.0, &v.1))
        }
        Surface::NurbsSurface(surface) => {
            let surface: &BSplineSurface<Vector4> = surface.non_rationalized();
            let (mut net, mut weights) = (Vec::new(), Vec::new());
            for row in surface.control_points() {
                let (points, row): (Vec<_>, Vec<_>) = row.iter().map(|&p| unweighted(p)).unzip();
                net.push(write_points(out, units, &points)?);
                weights.push(row);
            }
            let (u, v) = (distinct(surface.uknot_vec()), distinct(surface.vknot_vec()));
            out.rational_surface(surface.degrees(), &net, (&u.0, &u.1), (&v.0, &v.1), &weights)
        }
        Surface::RevolutedCurve(_) => Err(Error::Surface {
            face: face(),
            kind: "a surface of revolution",
        }),
    }
}

/// Writes a line through two points, with a unit vector.
fn write_line<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    start: Point3,
    end: Point3,
    face: &dyn Fn() -> String,
) -> Result<Id, Error> {
    let along = end - start;
    let length = along.magnitude();
    if length == 0.0 {
        return Err(Error::NoLength {
            place: format!("an edge of face `{}`", face()),
        });
    }
    let point = write_point(out, units, start)?;
    let direction = out.direction((along / length).into())?;
    let vector = out.unit_vector(direction)?;
    out.line(point, vector)
}

fn write_plane<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    plane: &Plane,
    face: &dyn Fn() -> String,
) -> Result<Id, Error> {
    let normal = plane.u_axis().cross(plane.v_axis());
    let size = normal.magnitude();
    if size == 0.0 {
        return Err(Error::NoNormal { face: face() });
    }
    let origin = write_point(out, units, plane.origin())?;
    let z = out.direction((normal / size).into())?;
    let x = out.direction(plane.u_axis().normalize().into())?;
    let placement = out.placement(origin, z, x)?;
    out.plane(placement)
}

fn write_points<W: Write>(out: &mut Exchange<W>, units: Units, points: &[Point3]) -> Result<Vec<Id>, Error> {
    points
        .iter()
        .map(|&point| write_point(out, units, point))
        .collect()
}

/// A control point in homogeneous coordinates as point and weight.
fn unweighted(p: Vector4) -> (Point3, f64) {
    (Point3::new(p.x / p.w, p.y / p.w, p.z / p.w), p.w)
}

/// The plane of a bilinear patch whose corners lie in one, with the patch's normal.
///
/// The product of the diagonals is the normal in the patch's middle; the corners lie at equal distances from the plane
/// through their mean, in turn on either side of it.
fn flat(surface: &BSplineSurface<Point3>) -> Option<Plane> {
    let net = surface.control_points();
    let ([a, b], [d, c]) = (net.first()?.as_slice(), net.get(1)?.as_slice()) else {
        return None;
    };
    if net.len() != 2 {
        return None;
    }
    let normal: Vector3 = (*c - *a).cross(*b - *d);
    let size = normal.magnitude();
    let off = (*a - *b + (*c - *d)).dot(normal) / (4.0 * size);
    let x = (*d - *a) + (*c - *b);
    if !(size > 0.0 && off.abs() <= FLAT && x.magnitude2() > 0.0) {
        return None;
    }
    let x = x.normalize();
    let origin = *a + ((*b - *a) + (*c - *a) + (*d - *a)) / 4.0;
    Some(Plane::new(
        origin,
        origin + x,
        origin + normal.cross(x).normalize(),
    ))
}

/// The multiplicities and the distinct values of a knot vector. Only equal knots are one: the values stay exact.
fn distinct(knots: &KnotVec) -> (Vec<usize>, Vec<f64>) {
    let mut multiplicities: Vec<usize> = Vec::new();
    let mut values: Vec<f64> = Vec::new();
    for &knot in knots.as_slice() {
        match (values.last(), multiplicities.last_mut()) {
            (Some(&last), Some(count)) if last >= knot => *count += 1,
            _ => {
                values.push(knot);
                multiplicities.push(1);
            }
        }
    }
    (multiplicities, values)
}

#[cfg(test)]
mod tests {
    use super::{distinct, flat};
    use truck_modeling::{BSplineSurface, InnerSpace, KnotVec, Point3, Vector3};

    /// A bilinear patch, 300 by 2 mm in the plane x = 100, one corner off it by `off` \[mm\].
    fn patch(off: f64) -> BSplineSurface<Point3> {
        let row = |z: f64, off: f64| vec![Point3::new(100.0, 0.0, z), Point3::new(100.0 + off, 300.0, z)];
        let knots = || KnotVec::bezier_knot(1);
        BSplineSurface::new((knots(), knots()), vec![row(1.0, 0.0), row(-1.0, off)])
    }

    #[test]
    fn only_a_patch_within_a_billionth_of_a_millimetre_is_a_plane() {
        // a corner that is off by d leaves each corner d/4 from the mean plane
        for (off, is_flat) in [
            (0.0, true),
            (3e-9, true),
            (5e-9, false),
            (1e-3, false),
            (1.0, false),
        ] {
            let plane = flat(&patch(off));
            assert_eq!(plane.is_some(), is_flat, "{off}");
            if let Some(plane) = plane {
                // down times to starboard is aft: the patch's own normal
                assert!((plane.normal() - Vector3::unit_x()).magnitude() < 1e-9);
            }
        }
    }

    #[test]
    fn a_patch_without_area_is_no_plane() {
        let point = Point3::new(1.0, 2.0, 3.0);
        let knots = || KnotVec::bezier_knot(1);
        assert!(flat(&BSplineSurface::new((knots(), knots()), vec![vec![point; 2]; 2])).is_none());
    }

    #[test]
    fn only_equal_knots_are_one() {
        let knots = KnotVec::from(vec![0.0, 0.0, 0.5, 0.5 + 1e-9, 1.0, 1.0]);
        assert_eq!(
            distinct(&knots),
            (vec![2, 1, 1, 2], vec![0.0, 0.5, 0.5 + 1e-9, 1.0])
        );
    }
}
