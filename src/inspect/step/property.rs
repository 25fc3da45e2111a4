//! Validation properties and user-defined attributes.

use std::collections::HashMap;

use super::access::{Args, Read, args, finding};
use super::context::{length, typed};
use super::report::{Attribute, AttributeValue, Stated};
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange};

/// What the properties of a file say.
#[derive(Debug, Default)]
pub(super) struct Properties {
    /// Validation properties, by the number of the shape that they are of.
    pub(super) stated: HashMap<u64, Stated>,
    /// Attributes.
    pub(super) attributes: Vec<Attribute>,
}

impl Properties {
    /// Reads every property that has a representation.
    pub(super) fn read(file: &Exchange<'_>, own: bool, faults: &mut Vec<Finding>) -> Self {
        let mut properties = Self::default();
        let mut seen: Vec<u64> = Vec::new();
        for entry in file.all("PROPERTY_DEFINITION_REPRESENTATION") {
            match properties.add(file, entry, own) {
                Ok(property) => seen.push(property),
                Err(fault) => faults.push(fault),
            }
        }
        if own {
            seen.sort_unstable();
            for entry in file.all("PROPERTY_DEFINITION") {
                if seen.binary_search(&entry.id).is_err() {
                    faults.push(finding(
                        entry.line,
                        format!("#{}: a property without a value", entry.id),
                    ));
                }
            }
        }
        properties
    }

    fn add<'a>(&mut self, file: &Exchange<'a>, entry: Entry, own: bool) -> Read<u64> {
        let link = args(file, entry, "PROPERTY_DEFINITION_REPRESENTATION")?;
        let property = link.follow(file, 0, "PROPERTY_DEFINITION")?;
        let (name, about) = (property.text(0)?, property.text(1)?);
        let representation = link.named(file, link.reference(1)?)?;
        if !file.kind_of(representation).has("REPRESENTATION") {
            return Ok(property.id);
        }
        let items = args(file, representation, "REPRESENTATION")?;
        if name == "geometric validation property" {
            let of = property.reference(2)?;
            self.state(file, of, &about, &items)?;
        } else if about == "user defined attribute" {
            for id in items.references(1)? {
                let attribute = attribute(file, &items, id)?;
                let agree = attribute.name == name && items.text(0)? == name;
                if own && !agree {
                    let what = format!("attribute `{name}` has the value of `{}`", attribute.name);
                    return Err(finding(property.line, what));
                }
                self.attributes.push(attribute);
            }
        } else if own {
            let what = format!(
                "#{}: property `{name}`, `{about}` is none that this program writes",
                property.id
            );
            return Err(finding(property.line, what));
        }
        Ok(property.id)
    }

    fn state<'a>(&mut self, file: &Exchange<'a>, of: u64, about: &str, items: &Args<'a>) -> Read<()> {
        let stated = self.stated.entry(of).or_default();
        let ids = items.references(1)?;
        let points = || -> Read<Vec<[f64; 3]>> {
            let point = |id: &u64| super::shape::point(items, file, *id).map(Into::into);
            ids.iter().map(point).collect()
        };
        let measure = |unit: &str| -> Read<f64> {
            let [id] = ids[..] else {
                return Err(finding(
                    items.line,
                    format!("#{}: one value is expected", items.id),
                ));
            };
            let (value, found) = measure(file, &items.record_of(file, id, "MEASURE_REPRESENTATION_ITEM")?)?;
            if found.ends_with(unit) {
                Ok(value)
            } else {
                Err(finding(items.line, format!("#{}: {about} in {found}", items.id)))
            }
        };
        let twice = match about {
            "volume" => stated.volume.replace(measure("^3")?).is_some(),
            "surface area" => stated.area.replace(measure("^2")?).is_some(),
            "centroid" => match points()?[..] {
                [point] => stated.centroid.replace(point).is_some(),
                _ => {
                    return Err(finding(
                        items.line,
                        format!("#{}: a centroid is one point", items.id),
                    ));
                }
            },
            "bounding box" => match points()?[..] {
                [low, high] => stated.bounds.replace([low, high]).is_some(),
                _ => {
                    return Err(finding(
                        items.line,
                        format!("#{}: a bounding box has two corners", items.id),
                    ));
                }
            },
            _ => {
                return Err(finding(
                    items.line,
                    format!("validation property `{about}` is not read"),
                ));
            }
        };
        if twice {
            return Err(finding(items.line, format!("the {about} is stated twice")));
        }
        Ok(())
    }
}

/// An item's measure, and the symbol of its unit.
fn measure<'a>(file: &Exchange<'a>, item: &Args<'a>) -> Read<(f64, String)> {
    let (kind, value) = typed(item, 1)?;
    let unit = item.named(file, item.reference(2)?)?;
    let is = file.kind_of(unit);
    let (fits, symbol) = if is.has("LENGTH_UNIT") {
        (
            kind == "LENGTH_MEASURE" || kind == "POSITIVE_LENGTH_MEASURE",
            length(file, unit)?.0,
        )
    } else if is.has("PLANE_ANGLE_UNIT") {
        (kind == "PLANE_ANGLE_MEASURE", angle(file, unit)?)
    } else if is.has("DERIVED_UNIT") {
        let elements = args(file, unit, "DERIVED_UNIT")?;
        let [element] = elements.references(0)?[..] else {
            return Err(finding(
                unit.line,
                format!("#{}: a unit of one part is read", unit.id),
            ));
        };
        let element = elements.record_of(file, element, "DERIVED_UNIT_ELEMENT")?;
        let base = length(file, element.named(file, element.reference(0)?)?)?.0;
        let power = element.real(1)?;
        let square = (power - 2.0).abs() < 1e-12;
        let fits = match kind {
            "AREA_MEASURE" => square,
            "VOLUME_MEASURE" => (power - 3.0).abs() < 1e-12,
            _ => false,
        };
        (fits, format!("{base}^{power}"))
    } else {
        return Err(finding(
            unit.line,
            format!("#{}: not a unit that is read", unit.id),
        ));
    };
    if fits {
        Ok((value, symbol))
    } else {
        Err(finding(item.line, format!("#{}: a {kind} in {symbol}", item.id)))
    }
}

fn angle(file: &Exchange<'_>, unit: Entry) -> Read<String> {
    if file.kind_of(unit).has("SI_UNIT") {
        return Ok("rad".to_owned());
    }
    let conversion = args(file, unit, "CONVERSION_BASED_UNIT")?;
    let name = conversion.text(0)?;
    let factor = conversion.follow(file, 1, "PLANE_ANGLE_MEASURE_WITH_UNIT")?;
    let radians = typed(&factor, 0)?.1;
    if name.to_uppercase() == "DEGREE" {
        if (radians / 1.0_f64.to_radians() - 1.0).abs() > 1e-9 {
            return Err(finding(
                factor.line,
                format!("#{}: a degree of {radians:?} rad", factor.id),
            ));
        }
        return Ok("deg".to_owned());
    }
    Ok(name)
}

fn attribute<'a>(file: &Exchange<'a>, by: &Args<'a>, id: u64) -> Read<Attribute> {
    let entry = by.named(file, id)?;
    let kind = file.kind_of(entry);
    let item = |keyword: &str| args(file, entry, keyword);
    let (item, value, unit) = if kind.has("MEASURE_REPRESENTATION_ITEM") {
        let item = item("MEASURE_REPRESENTATION_ITEM")?;
        let (value, unit) = measure(file, &item)?;
        (item, AttributeValue::Number(value), unit)
    } else if kind.has("REAL_REPRESENTATION_ITEM") {
        let item = item("REAL_REPRESENTATION_ITEM")?;
        let value = item.real(1)?;
        (item, AttributeValue::Number(value), String::new())
    } else if kind.has("VALUE_REPRESENTATION_ITEM") {
        let item = item("VALUE_REPRESENTATION_ITEM")?;
        let value = typed(&item, 1)?.1;
        (item, AttributeValue::Number(value), String::new())
    } else {
        let item = item("DESCRIPTIVE_REPRESENTATION_ITEM")?;
        let text = item.text(1)?;
        (item, AttributeValue::Text(text), String::new())
    };
    Ok(Attribute {
        name: item.text(0)?,
        value,
        unit,
    })
}
