//! Curves and surfaces of a solid, from instances.

use nalgebra::{Point3, Vector3, Vector4};

use super::access::{Args, Read, args, finding};
use super::nurbs::{Curve, Knots, Surface, weighted};
use crate::inspect::part21::{Entry, Exchange};

/// A surface of a face.
#[derive(Clone, Debug)]
pub(super) enum Skin {
    /// A plane through a point with a unit normal.
    Plane(Point3<f64>, Vector3<f64>),
    /// A B-spline surface.
    Spline(Box<Surface>),
    /// A surface that is not read: its entity.
    Unread(String),
}

/// The curve of an edge.
#[derive(Clone, Debug)]
pub(super) enum Path {
    /// A line: a point and its direction.
    Line(Point3<f64>, Vector3<f64>),
    /// A B-spline curve.
    Spline(Curve),
    /// A curve that is not read: its entity.
    Unread(String),
}

/// A point from an instance that must be one.
pub(super) fn point<'a>(by: &Args<'a>, file: &Exchange<'a>, id: u64) -> Read<Point3<f64>> {
    coordinates(&by.record_of(file, id, "CARTESIAN_POINT")?).map(Point3::from)
}

fn coordinates(record: &Args<'_>) -> Read<Vector3<f64>> {
    match record.reals(1)?[..] {
        [x, y, z] => Ok(Vector3::new(x, y, z)),
        _ => Err(finding(
            record.line,
            format!("#{} {}: three numbers are expected", record.id, record.keyword),
        )),
    }
}

/// A direction as a unit vector.
pub(super) fn direction<'a>(by: &Args<'a>, file: &Exchange<'a>, i: usize) -> Read<Vector3<f64>> {
    let record = by.follow(file, i, "DIRECTION")?;
    let vector = coordinates(&record)?;
    let size = vector.norm();
    if size > 0.0 {
        Ok(vector / size)
    } else {
        Err(finding(
            record.line,
            format!("#{} DIRECTION: no direction", record.id),
        ))
    }
}

/// The place of a placement, its z axis and its x axis (unit vectors, x made square to z).
pub(super) fn placement<'a>(
    record: &Args<'a>,
    file: &Exchange<'a>,
) -> Read<(Point3<f64>, Vector3<f64>, Vector3<f64>)> {
    let origin = point(record, file, record.reference(1)?)?;
    let z = direction(record, file, 2)?;
    let x = direction(record, file, 3)?;
    let square = x - z * x.dot(&z);
    if square.norm() < 1e-6 {
        return Err(finding(
            record.line,
            format!("#{} {}: its axes are parallel", record.id, record.keyword),
        ));
    }
    Ok((origin, z, square.normalize()))
}

fn points<'a>(
    by: &Args<'a>,
    file: &Exchange<'a>,
    ids: &[u64],
    weights: Option<&[f64]>,
) -> Read<Vec<Vector4<f64>>> {
    if let Some(weights) = weights {
        let sound = weights.len() == ids.len() && weights.iter().all(|&w| w > 0.0);
        if !sound {
            let what = format!("#{}: each control point needs a weight above 0", by.id);
            return Err(finding(by.line, what));
        }
    }
    let one = |(i, &id): (usize, &u64)| {
        let weight = weights.map_or(1.0, |weights| weights[i]);
        point(by, file, id).map(|point| weighted(point, weight))
    };
    ids.iter().enumerate().map(one).collect()
}

fn knots(
    by: &Args<'_>,
    degree: usize,
    multiplicities: &[usize],
    distinct: &[f64],
    points: usize,
) -> Read<Knots> {
    Knots::new(degree, multiplicities, distinct, points)
        .map_err(|what| finding(by.line, format!("#{} {}: {what}", by.id, by.keyword)))
}

/// The curve that an edge names.
pub(super) fn path<'a>(file: &Exchange<'a>, entry: Entry) -> Read<Path> {
    let kind = file.kind_of(entry);
    if kind.has("LINE") {
        let record = args(file, entry, "LINE")?;
        let start = point(&record, file, record.reference(1)?)?;
        let vector = record.follow(file, 2, "VECTOR")?;
        return Ok(Path::Line(start, direction(&vector, file, 1)?));
    }
    if !kind.has("B_SPLINE_CURVE_WITH_KNOTS") {
        return Ok(Path::Unread(kind.keywords.join(" ")));
    }
    let own = args(file, entry, "B_SPLINE_CURVE_WITH_KNOTS")?;
    // in a complex instance the attributes stand with the entity that declares them, and the name elsewhere
    let (basic, first, after) = if kind.complex {
        (args(file, entry, "B_SPLINE_CURVE")?, 0, 0)
    } else {
        (own.clone(), 1, 6)
    };
    let degree = basic.count(first)?;
    let ids = basic.references(first + 1)?;
    let rational = kind.has("RATIONAL_B_SPLINE_CURVE");
    let weights = match rational {
        true => Some(args(file, entry, "RATIONAL_B_SPLINE_CURVE")?.reals(0)?),
        false => None,
    };
    let curve = Curve {
        knots: knots(
            &own,
            degree,
            &own.counts(after)?,
            &own.reals(after + 1)?,
            ids.len(),
        )?,
        points: points(&own, file, &ids, weights.as_deref())?,
        rational,
    };
    says_closed(&basic, first + 3, first + 4)?;
    Ok(Path::Spline(curve))
}

/// Neither closed nor crossing itself: what is read here is neither.
fn says_closed(record: &Args<'_>, closed: usize, crossing: usize) -> Read<()> {
    for (i, what) in [
        (closed, "is closed, which it is not"),
        (crossing, "crosses itself"),
    ] {
        if record.says_true(i) {
            return Err(finding(
                record.line,
                format!("#{} {} says that it {what}", record.id, record.keyword),
            ));
        }
    }
    Ok(())
}

/// The surface that a face names.
pub(super) fn skin<'a>(file: &Exchange<'a>, entry: Entry) -> Read<Skin> {
    let kind = file.kind_of(entry);
    if kind.has("PLANE") {
        let record = args(file, entry, "PLANE")?;
        let (origin, z, _) = placement(&record.follow(file, 1, "AXIS2_PLACEMENT_3D")?, file)?;
        return Ok(Skin::Plane(origin, z));
    }
    if !kind.has("B_SPLINE_SURFACE_WITH_KNOTS") {
        return Ok(Skin::Unread(kind.keywords.join(" ")));
    }
    let own = args(file, entry, "B_SPLINE_SURFACE_WITH_KNOTS")?;
    let (basic, first, after) = if kind.complex {
        (args(file, entry, "B_SPLINE_SURFACE")?, 0, 0)
    } else {
        (own.clone(), 1, 8)
    };
    let degrees = (basic.count(first)?, basic.count(first + 1)?);
    let net = basic.net(first + 2)?;
    let width = net.first().map_or(0, Vec::len);
    if width == 0 || net.iter().any(|row| row.len() != width) {
        return Err(finding(
            own.line,
            format!("#{}: rows of control points of different lengths", own.id),
        ));
    }
    let rational = kind.has("RATIONAL_B_SPLINE_SURFACE");
    let weights = match rational {
        true => Some(args(file, entry, "RATIONAL_B_SPLINE_SURFACE")?.real_net(0)?),
        false => None,
    };
    let row = |(i, ids): (usize, &Vec<u64>)| {
        let weights = weights
            .as_ref()
            .map(|net| net.get(i).map_or(&[][..], Vec::as_slice));
        points(&own, file, ids, weights)
    };
    let surface = Surface {
        u: knots(
            &own,
            degrees.0,
            &own.counts(after)?,
            &own.reals(after + 2)?,
            net.len(),
        )?,
        v: knots(
            &own,
            degrees.1,
            &own.counts(after + 1)?,
            &own.reals(after + 3)?,
            width,
        )?,
        net: net.iter().enumerate().map(row).collect::<Read<_>>()?,
        rational,
    };
    says_closed(&basic, first + 4, first + 6)?;
    says_closed(&basic, first + 5, first + 6)?;
    if !(surface.u.is_clamped() && surface.v.is_clamped()) {
        return Ok(Skin::Unread(
            "B_SPLINE_SURFACE_WITH_KNOTS that does not reach its outer control points".to_owned(),
        ));
    }
    Ok(Skin::Spline(Box::new(surface)))
}
