//! The reference lines and points.

use std::io::Write;

use nalgebra::Point3;

use crate::planform::{Reference, ReferenceLine};

use super::error::Error;
use super::part21::{Exchange, Id, Typed};
use super::presentation::Presentation;
use super::style::POINT_LAYER;
use super::units::Units;

/// A named line or point and its instances: one a straight piece.
pub(super) struct Drawn<'a> {
    pub(super) name: &'a str,
    pub(super) items: Vec<Id>,
}

/// Writes every line as one trimmed line a straight piece, all with the line's name, and every point, styled and on the
/// layer of its kind.
pub(super) fn write_reference<'a, W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    reference: &'a Reference,
    presentation: &mut Presentation,
) -> Result<Vec<Drawn<'a>>, Error> {
    let mut drawn = Vec::with_capacity(reference.lines.len() + reference.points.len());
    for line in &reference.lines {
        let items = write_line(out, units, line)?;
        for &item in &items {
            presentation.curve(out, units, &line.name, line.kind, item)?;
        }
        drawn.push(Drawn {
            name: &line.name,
            items,
        });
    }
    for point in &reference.points {
        let item = out.cartesian_point(&point.name, units.to_point(point.point))?;
        presentation.point(out, units, &point.name, item)?;
        presentation.put_on(POINT_LAYER, item);
        drawn.push(Drawn {
            name: &point.name,
            items: vec![item],
        });
    }
    Ok(drawn)
}

/// Writes the pieces of a line. Both ends of a piece are given as points and as parameters, which agree as the vector
/// has unit length.
fn write_line<W: Write>(out: &mut Exchange<W>, units: Units, line: &ReferenceLine) -> Result<Vec<Id>, Error> {
    let point = |out: &mut Exchange<W>, p: Point3<f64>| out.cartesian_point("", units.to_point(p));
    let mut items = Vec::new();
    let Some((&first, rest)) = line.points.split_first() else {
        return Ok(items);
    };
    let (mut from, mut start) = (first, point(out, first)?);
    for &to in rest {
        let along = to - from;
        let length = along.norm();
        if length == 0.0 {
            return Err(Error::NoLength {
                place: format!("reference line `{}`", line.name),
            });
        }
        let end = point(out, to)?;
        let direction = out.direction((along / length).into())?;
        let vector = out.unit_vector(direction)?;
        let basis = out.line(start, vector)?;
        let parameter = |value| Typed("PARAMETER_VALUE", value);
        let ends = ((start, parameter(0.0)), (end, parameter(units.to_length(length))));
        items.push(out.trimmed_curve(&line.name, basis, ends.0, ends.1)?);
        (from, start) = (to, end);
    }
    Ok(items)
}
