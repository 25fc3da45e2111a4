//! What files of this program keep to beyond the standard: nothing in them is unused, styled items are styled once,
//! and the attributes agree with each other and with the lines.

use super::access::{Read, args, finding};
use super::report::{AttributeValue, StepReport};
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange, Value};
use crate::write::step::schema::ROOTS;

/// How far attributes may be from what others say, as a share.
const AGREE: f64 = 1e-9;

/// Whether a header is that of a file of this program.
pub(super) fn is_own(file: &Exchange<'_>) -> bool {
    let name = file.header.iter().find(|record| record.keyword == "FILE_NAME");
    let says = |i: usize, start: &str| {
        name.and_then(|name| name.values.get(i))
            .is_some_and(|value| matches!(value, Value::Text(text) if text.starts_with(start)))
    };
    says(4, concat!(env!("CARGO_PKG_NAME"), " ")) || says(5, env!("CARGO_PKG_NAME"))
}

/// Instances that nothing refers to, and references that lead nowhere, in one pass.
pub(super) fn references(file: &Exchange<'_>, own: bool, faults: &mut Vec<Finding>) {
    let mut used = vec![false; file.entries().len()];
    for &entry in file.entries() {
        for record in &file.instance_at(entry).records {
            for value in &record.values {
                follow(file, entry, value, &mut used, faults);
            }
        }
    }
    if own {
        for (entry, _) in file.entries().iter().zip(&used).filter(|(_, used)| !**used) {
            let kind = file.kind_of(*entry);
            if !ROOTS.iter().any(|root| kind.has(root)) {
                let what = format!("#{} {}: nothing refers to it", entry.id, kind.keywords.join(" "));
                faults.push(finding(entry.line, what));
            }
        }
    }
}

fn follow(file: &Exchange<'_>, from: Entry, value: &Value<'_>, used: &mut [bool], faults: &mut Vec<Finding>) {
    match value {
        Value::Reference(id) => match file.place(*id) {
            Some(place) => used[place] = true,
            None => faults.push(finding(from.line, format!("#{}: there is no #{id}", from.id))),
        },
        Value::List(values) | Value::Typed(_, values) => {
            values
                .iter()
                .for_each(|value| follow(file, from, value, used, faults));
        }
        _ => {}
    }
}

/// Styles, placements and unit vectors as this program writes them.
pub(super) fn check(file: &Exchange<'_>, faults: &mut Vec<Finding>) {
    let mut styled: Vec<u64> = Vec::new();
    let mut shown: Vec<u64> = Vec::new();
    for entry in file.all("STYLED_ITEM") {
        match args(file, entry, "STYLED_ITEM").and_then(|item| item.reference(2)) {
            Ok(id) => styled.push(id),
            Err(fault) => faults.push(fault),
        }
    }
    for entry in file.all("MECHANICAL_DESIGN_GEOMETRIC_PRESENTATION_REPRESENTATION") {
        let found = args(
            file,
            entry,
            "MECHANICAL_DESIGN_GEOMETRIC_PRESENTATION_REPRESENTATION",
        );
        match found.and_then(|record| record.references(1)) {
            Ok(ids) => shown.extend(ids),
            Err(fault) => faults.push(fault),
        }
    }
    styled.sort_unstable();
    shown.sort_unstable();
    for keyword in ["MANIFOLD_SOLID_BREP", "ADVANCED_FACE", "TRIMMED_CURVE"] {
        for entry in file.all(keyword) {
            let times = times(&styled, entry.id);
            if times != 1 {
                faults.push(finding(
                    entry.line,
                    format!("#{} {keyword} has {times} styles; one is expected", entry.id),
                ));
            }
        }
    }
    for entry in file
        .all("STYLED_ITEM")
        .filter(|entry| times(&shown, entry.id) != 1)
    {
        faults.push(finding(
            entry.line,
            format!("#{} STYLED_ITEM is not shown once", entry.id),
        ));
    }
    for (keyword, unit) in [
        (
            "DIRECTION",
            unit_direction as fn(&Exchange<'_>, Entry) -> Read<()>,
        ),
        ("VECTOR", unit_vector),
    ] {
        faults.extend(file.all(keyword).filter_map(|entry| unit(file, entry).err()));
    }
    faults.extend(placements(file).err());
}

fn times(sorted: &[u64], id: u64) -> usize {
    sorted.partition_point(|&other| other <= id) - sorted.partition_point(|&other| other < id)
}

fn unit_direction(file: &Exchange<'_>, entry: Entry) -> Read<()> {
    let ratios = args(file, entry, "DIRECTION")?.reals(1)?;
    let size = ratios.iter().map(|x| x * x).sum::<f64>().sqrt();
    if ratios.len() == 3 && (size - 1.0).abs() < 1e-12 {
        return Ok(());
    }
    Err(finding(
        entry.line,
        format!("#{} DIRECTION: its length is {size:?}; 1 is expected", entry.id),
    ))
}

fn unit_vector(file: &Exchange<'_>, entry: Entry) -> Read<()> {
    let size = args(file, entry, "VECTOR")?.real(2)?;
    if (size - 1.0).abs() < 1e-12 {
        return Ok(());
    }
    Err(finding(
        entry.line,
        format!("#{} VECTOR: its length is {size:?}; 1 is expected", entry.id),
    ))
}

/// Placements that are not a plane's are the origin with the axes of the whole; a plane's axes are square.
fn placements(file: &Exchange<'_>) -> Read<()> {
    let mut planes = Vec::new();
    for entry in file.all("PLANE") {
        planes.push(args(file, entry, "PLANE")?.reference(1)?);
    }
    planes.sort_unstable();
    for entry in file.all("AXIS2_PLACEMENT_3D") {
        let record = args(file, entry, "AXIS2_PLACEMENT_3D")?;
        let (origin, z, square) = super::shape::placement(&record, file)?;
        let x = super::shape::direction(&record, file, 3)?;
        let of_plane = planes.binary_search(&entry.id).is_ok();
        let at_origin = origin.coords.norm() < 1e-12 && z.z > 1.0 - 1e-12 && x.x > 1.0 - 1e-12;
        if (x - square).norm() > 1e-9 || !(of_plane || at_origin) {
            return Err(finding(
                entry.line,
                format!("#{}: a part is placed away from where it is drawn", entry.id),
            ));
        }
    }
    Ok(())
}

/// Attributes against each other and against the lines.
pub(super) fn figures(report: &mut StepReport) {
    let number = |name: &str| {
        let found = report.attributes.iter().find(|attribute| attribute.name == name);
        found.and_then(|attribute| match attribute.value {
            AttributeValue::Number(x) => Some(x),
            AttributeValue::Text(_) => None,
        })
    };
    let line = |start: &str| report.lines.iter().find(|line| line.name.starts_with(start));
    let mut wrong = Vec::new();
    let mut compare = |what: &str, stated: Option<f64>, found: Option<f64>, size: f64| {
        if let (Some(stated), Some(found)) = (stated, found)
            && (stated - found).abs() > AGREE * size.max(stated.abs())
        {
            wrong.push(format!("{what} is stated as {stated:?} and is {found:?}"));
        }
    };
    let aspect = number("reference span")
        .zip(number("reference area"))
        .map(|(span, area)| span * span / area);
    compare("the aspect ratio", number("aspect ratio"), aspect, 0.0);
    let chords = line("root chord").zip(line("tip chord"));
    compare(
        "the taper ratio",
        number("taper ratio"),
        chords.map(|(root, tip)| tip.length / root.length),
        0.0,
    );
    let mac = line("mean aerodynamic chord");
    compare(
        "the mean aerodynamic chord",
        number("mean aerodynamic chord"),
        mac.map(|line| line.length),
        0.0,
    );
    for (name, line) in [
        ("incidence at the mean aerodynamic chord", mac),
        ("incidence at the root", line("root chord")),
    ] {
        // a chord that leans to the side has an incidence in a plane of its own
        let upright = line.and_then(|line| match line.points[..] {
            [a, b] if (a[1] - b[1]).abs() <= 1e-9 * line.length => {
                Some((a[2] - b[2]).atan2(b[0] - a[0]).to_degrees())
            }
            _ => None,
        });
        compare(name, number(name), upright, 1.0);
    }
    for point in &report.points {
        let side = point.name.strip_prefix("aerodynamic centre");
        let chord = side.and_then(|side| {
            report
                .lines
                .iter()
                .find(|line| line.name == format!("mean aerodynamic chord{side}"))
        });
        if let Some([a, b]) = chord.map(|line| &line.points[..]) {
            for k in 0..3 {
                let quarter = a[k] + 0.25 * (b[k] - a[k]);
                compare(
                    &format!("`{}`", point.name),
                    Some(point.at[k]),
                    Some(quarter),
                    chord.map_or(0.0, |line| line.length),
                );
            }
        }
    }
    report
        .findings
        .extend(wrong.into_iter().map(|what| Finding { line: None, what }));
}
