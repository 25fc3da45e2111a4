//! Reference lines and points, with their layers, colours and fonts.

use std::collections::{HashMap, HashSet};

use nalgebra::Point3;

use super::access::{Read, args, finding};
use super::context::typed;
use super::report::{Layer, Line, Point};
use super::shape::{direction, point};
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange, Value};

/// A colour and a font.
type Look = (Option<[f64; 3]>, String);

/// What is drawn beside the solids.
#[derive(Debug, Default)]
pub(super) struct Drawing {
    pub(super) lines: Vec<Line>,
    pub(super) points: Vec<Point>,
    pub(super) layers: Vec<Layer>,
    /// Number of different colours.
    pub(super) colours: usize,
}

/// Reads the drawing. Pieces of one name that follow each other are one line.
pub(super) fn read(file: &Exchange<'_>, tolerance: f64, own: bool, faults: &mut Vec<Finding>) -> Drawing {
    let mut drawing = Drawing::default();
    let layer_of = layers(file, own, &mut drawing, faults);
    let looks = looks(file, faults);
    let mut colours: Vec<[u64; 3]> = (file.all("COLOUR_RGB"))
        .filter_map(|entry| rgb(file, entry).ok())
        .map(|rgb| rgb.map(f64::to_bits))
        .collect();
    colours.sort_unstable();
    colours.dedup();
    drawing.colours = colours.len();
    let kind = |id: u64| {
        layer_of
            .get(&id)
            .map(|layer| layer.to_lowercase().replace('_', " "))
            .unwrap_or_default()
    };
    for entry in file.all("TRIMMED_CURVE") {
        let found = piece(file, entry, tolerance);
        let (name, [a, b]) = match found {
            Ok(piece) => piece,
            Err(fault) => {
                faults.push(fault);
                continue;
            }
        };
        let length = (b - a).norm();
        match drawing.lines.last_mut() {
            Some(line) if line.name == name && near(line.points.last(), &a, tolerance) => {
                line.length += length;
                line.points.push(b.into());
            }
            _ => {
                let (colour, font) = looks.get(&entry.id).cloned().unwrap_or_default();
                drawing.lines.push(Line {
                    name,
                    kind: kind(entry.id),
                    length,
                    points: vec![a.into(), b.into()],
                    colour,
                    font,
                });
            }
        }
    }
    let drawn = drawn_points(file);
    if own {
        for id in drawn.iter().filter(|id| !layer_of.contains_key(id)) {
            faults.push(Finding {
                line: file.entry(*id).map(|entry| entry.line),
                what: format!("#{id} CARTESIAN_POINT is drawn and on no layer"),
            });
        }
    }
    for entry in file
        .all("CARTESIAN_POINT")
        .filter(|entry| drawn.contains(&entry.id))
    {
        let found = args(file, entry, "CARTESIAN_POINT").and_then(|record| {
            let (name, at) = (record.text(0)?, record.reals(1)?);
            match at[..] {
                [x, y, z] => Ok(Point { name, at: [x, y, z] }),
                _ => Err(finding(
                    record.line,
                    format!("#{}: three numbers are expected", record.id),
                )),
            }
        });
        match found {
            Ok(point) => drawing.points.push(point),
            Err(fault) => faults.push(fault),
        }
    }
    drawing
}

fn near(last: Option<&[f64; 3]>, next: &Point3<f64>, tolerance: f64) -> bool {
    last.is_some_and(|last| (Point3::from(*last) - next).norm() <= tolerance)
}

/// Points that are items of construction geometry or of a set of curves.
fn drawn_points(file: &Exchange<'_>) -> HashSet<u64> {
    let items = |keyword| {
        file.all(keyword)
            .filter_map(move |entry| {
                args(file, entry, keyword)
                    .and_then(|record| record.references(1))
                    .ok()
            })
            .flatten()
    };
    items("GEOMETRIC_CURVE_SET")
        .chain(items("CONSTRUCTIVE_GEOMETRY_REPRESENTATION"))
        .filter(|&id| {
            file.entry(id)
                .is_some_and(|entry| file.kind_of(entry).has("CARTESIAN_POINT"))
        })
        .collect()
}

/// A trimmed line: its name and ends, which are stated as points and as parameters that have to agree.
fn piece(file: &Exchange<'_>, entry: Entry, tolerance: f64) -> Read<(String, [Point3<f64>; 2])> {
    let record = args(file, entry, "TRIMMED_CURVE")?;
    let name = record.text(0)?;
    let wrong = |what: String| finding(record.line, format!("reference line `{name}`: {what}"));
    let basis = record.named(file, record.reference(1)?)?;
    if !file.kind_of(basis).has("LINE") {
        return Err(wrong(format!(
            "{} is not read",
            file.kind_of(basis).keywords.join(" ")
        )));
    }
    let basis = args(file, basis, "LINE")?;
    let start = point(&basis, file, basis.reference(1)?)?;
    let vector = basis.follow(file, 2, "VECTOR")?;
    let along = direction(&vector, file, 1)? * vector.real(2)?;
    let mut ends = [start; 2];
    let mut parameters = [0.0; 2];
    for (k, end) in ends.iter_mut().enumerate() {
        let mut stated = None;
        for value in record.list(2 + k)? {
            match value {
                Value::Reference(id) => stated = Some(point(&record, file, *id)?),
                Value::Typed("PARAMETER_VALUE", values) => {
                    parameters[k] = match values[..] {
                        [Value::Real(t)] => t,
                        _ => return Err(wrong("a parameter is no number".to_owned())),
                    }
                }
                _ => return Err(wrong("an end is neither point nor parameter".to_owned())),
            }
        }
        let placed = start + along * parameters[k];
        *end = stated.unwrap_or(placed);
        let off = (*end - placed).norm();
        if off > tolerance {
            let which = ["start", "end"][k];
            return Err(wrong(format!(
                "its {which} is {off:.3e} from where its parameter puts it"
            )));
        }
    }
    if (parameters[1] > parameters[0]) != record.flag(4)? {
        return Err(wrong("it runs against the sense that it states".to_owned()));
    }
    Ok((name, ends))
}

/// The layers, and the layer of each item.
fn layers(
    file: &Exchange<'_>,
    own: bool,
    drawing: &mut Drawing,
    faults: &mut Vec<Finding>,
) -> HashMap<u64, String> {
    let mut layer_of: HashMap<u64, String> = HashMap::new();
    for entry in file.all("PRESENTATION_LAYER_ASSIGNMENT") {
        let found = args(file, entry, "PRESENTATION_LAYER_ASSIGNMENT").and_then(|layer| {
            let (name, description, items) = (layer.text(0)?, layer.text(1)?, layer.references(2)?);
            for id in &items {
                layer.named(file, *id)?;
                if layer_of.insert(*id, name.clone()).is_some() && own {
                    return Err(finding(layer.line, format!("#{id} is on a layer twice")));
                }
            }
            let items = items.len();
            Ok(Layer {
                name,
                description,
                items,
            })
        });
        match found {
            Ok(layer) => drawing.layers.push(layer),
            Err(fault) => faults.push(fault),
        }
    }
    if own {
        for keyword in ["MANIFOLD_SOLID_BREP", "TRIMMED_CURVE"] {
            for entry in file
                .all(keyword)
                .filter(|entry| !layer_of.contains_key(&entry.id))
            {
                faults.push(finding(
                    entry.line,
                    format!("#{} {keyword} is on no layer", entry.id),
                ));
            }
        }
    }
    layer_of
}

/// Colour and font of every curve that has a style.
fn looks(file: &Exchange<'_>, faults: &mut Vec<Finding>) -> HashMap<u64, Look> {
    let mut looks = HashMap::new();
    let mut known: HashMap<u64, Look> = HashMap::new();
    for entry in file.all("STYLED_ITEM") {
        let found = args(file, entry, "STYLED_ITEM").and_then(|item| {
            for id in item.references(1)? {
                let style = item.record_of(file, id, "PRESENTATION_STYLE_ASSIGNMENT")?;
                for id in style.references(0)? {
                    let curve = style.named(file, id)?;
                    if !file.kind_of(curve).has("CURVE_STYLE") {
                        continue;
                    }
                    let look = match known.get(&id) {
                        Some(look) => look.clone(),
                        None => curve_look(file, curve)?,
                    };
                    known.insert(id, look.clone());
                    looks.insert(item.reference(2)?, look);
                }
            }
            Ok(())
        });
        faults.extend(found.err());
    }
    looks
}

fn curve_look(file: &Exchange<'_>, entry: Entry) -> Read<Look> {
    let style = args(file, entry, "CURVE_STYLE")?;
    let font = style.named(file, style.reference(1)?)?;
    let font = match file.kind_of(font).keywords[..] {
        [ref keyword] => args(file, font, keyword)?.text(0)?,
        _ => String::new(),
    };
    typed(&style, 2)?;
    let colour = style.named(file, style.reference(3)?)?;
    let colour = match file.kind_of(colour).has("COLOUR_RGB") {
        true => Some(rgb(file, colour)?),
        false => None,
    };
    Ok((colour, font))
}

fn rgb(file: &Exchange<'_>, entry: Entry) -> Read<[f64; 3]> {
    let colour = args(file, entry, "COLOUR_RGB")?;
    let rgb = [colour.real(1)?, colour.real(2)?, colour.real(3)?];
    if rgb.iter().all(|part| (0.0..=1.0).contains(part)) {
        Ok(rgb)
    } else {
        Err(finding(
            colour.line,
            format!("#{}: a colour beyond 0 to 1", colour.id),
        ))
    }
}
