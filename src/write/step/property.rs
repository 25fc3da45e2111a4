//! Geometric validation properties and user-defined attributes.

use std::io::Write;

use super::error::Error;
use super::part21::{Exchange, Id, Typed};
use super::product::Product;
use super::units::Units;
use super::{Attribute, Properties, Schema, Value};

/// Writes a part's validation properties. The bounding box comes before the centroid: some readers take the last point
/// of any of these properties for the centroid.
pub(super) fn write_properties<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    part: Product,
    properties: &Properties,
) -> Result<(), Error> {
    let mut corners = [None; 2];
    for (id, corner) in corners.iter_mut().zip(properties.corners) {
        *id = Some(out.cartesian_point("bounding box corner point", units.to_point(corner))?);
    }
    let corners: Vec<Id> = corners.into_iter().flatten().collect();
    validation(out, units, part, "bounding box", &corners)?;
    let volume = Typed("VOLUME_MEASURE", units.to_volume(properties.volume));
    let volume = out.measure_item("volume measure", volume, units.volume)?;
    validation(out, units, part, "volume", &[volume])?;
    let area = Typed("AREA_MEASURE", units.to_area(properties.area));
    let area = out.measure_item("surface area measure", area, units.area)?;
    validation(out, units, part, "surface area", &[area])?;
    let centre = out.cartesian_point("centre point", units.to_point(properties.centroid))?;
    validation(out, units, part, "centroid", &[centre])
}

fn validation<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    part: Product,
    name: &str,
    items: &[Id],
) -> Result<(), Error> {
    let property = out.property("geometric validation property", name, part.shape)?;
    let representation = out.representation(name, items, units.context)?;
    out.property_representation(property, representation)?;
    Ok(())
}

/// Writes the attributes of the whole. Numbers are properties of the definition, texts of its shape: some readers make
/// a material of a text on the definition.
pub(super) fn write_attributes<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    schema: Schema,
    whole: Product,
    attributes: &[Attribute],
) -> Result<(), Error> {
    let mut degree = None;
    for Attribute { name, value } in attributes {
        let item = match value {
            Value::Length(mm) => {
                out.measure_item(name, Typed("LENGTH_MEASURE", units.to_length(*mm)), units.length)?
            }
            Value::Area(mm2) => {
                out.measure_item(name, Typed("AREA_MEASURE", units.to_area(*mm2)), units.area)?
            }
            Value::Angle(rad) => {
                let unit = match degree {
                    Some(unit) => unit,
                    None => *degree.insert(units.degree(out)?),
                };
                out.measure_item(name, Typed("PLANE_ANGLE_MEASURE", rad.to_degrees()), unit)?
            }
            Value::Ratio(x) => match schema {
                Schema::Ap242 => out.real_item(name, *x)?,
                Schema::Ap214 => out.value_item(name, Typed("NUMERIC_MEASURE", *x))?,
            },
            Value::Count(n) => out.value_item(name, Typed("COUNT_MEASURE", f64::from(*n)))?,
            Value::Text(text) => out.text_item(name, text)?,
        };
        let of = match value {
            Value::Text(_) => whole.shape,
            _ => whole.definition,
        };
        let property = out.property(name, "user defined attribute", of)?;
        let general = out.general_property(name)?;
        out.general_property_of(general, property)?;
        let representation = out.representation(name, &[item], units.context)?;
        out.property_representation(property, representation)?;
    }
    Ok(())
}
