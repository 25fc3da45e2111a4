//! STEP files: what is in them, and whether they agree with themselves.
//!
//! Everything is computed from the numbers in the file, by code of its own: its splines, its quadrature, its reading of
//! the topology. What this program writes is read in full. Of other programs' files products, units, planar and
//! B-spline faces, straight and B-spline edges, trimmed lines, layers, colours and properties are read, and what is not
//! is named.

mod access;
mod context;
mod drawing;
mod edge;
mod face;
mod gauss;
mod nurbs;
mod own;
mod product;
mod property;
mod report;
mod schema;
mod shape;
mod sheet;
mod solid;

pub use report::{
    Attribute, AttributeValue, Face, Figures, Layer, Line, NotRead, Point, Product, Solid, Stated, StepReport,
};
pub use sheet::sheet;

use context::Context;

use super::part21::{Exchange, Value, decode};
use super::{Error, Finding};

/// Agreement demanded of a file of this program between stated and integrated figures: shares of volume and area, and of
/// the box's diagonal for the centroid. Area is no polynomial's integral: two quadratures of it agree to some 1e-8.
const OWN: Agreement = Agreement {
    volume: 1e-10,
    area: 1e-7,
    centroid: 1e-10,
    bounds: 1e-4,
};

/// Agreement demanded of other programs' files: the practice for geometric validation properties names 0.5 % for volume
/// and area, and 0.1 % of the size for the centroid.
const OTHERS: Agreement = Agreement {
    volume: 5e-3,
    area: 5e-3,
    centroid: 1e-3,
    bounds: 1e-2,
};

#[derive(Clone, Copy, Debug)]
struct Agreement {
    volume: f64,
    area: f64,
    centroid: f64,
    bounds: f64,
}

/// Reads and measures a STEP file.
///
/// # Errors
///
/// [`Error::Syntax`] where the bytes are no whole exchange structure.
pub fn read(bytes: &[u8]) -> Result<StepReport, Error> {
    let file = Exchange::read(bytes)?;
    let is_own = own::is_own(&file);
    let mut report = StepReport {
        instances: file.entries().len() + file.repeated.len(),
        ..StepReport::default()
    };
    header(&file, is_own, &mut report);
    for entry in &file.repeated {
        report.findings.push(access::finding(
            entry.line,
            format!("#{} is there twice", entry.id),
        ));
    }
    own::references(&file, is_own, &mut report.findings);
    if is_own {
        let unknown = schema::check(&file, &mut report.findings);
        for entity in unknown {
            let what = format!("{entity} is no entity that this program writes");
            report.findings.push(Finding { line: None, what });
        }
        own::check(&file, &mut report.findings);
        product::check(&file, &mut report.findings);
    } else {
        report
            .notes
            .push("written by another program: not compared with the schema".to_owned());
    }
    let context = Context::read(&file, is_own, &mut report.findings);
    report.unit.clone_from(&context.symbol);
    report.uncertainty = context.uncertainty;
    report.products = product::products(&file, &mut report.findings);
    solids(&file, &context, &mut report);
    let drawing = drawing::read(&file, context.tolerance, is_own, &mut report.findings);
    (report.lines, report.points) = (drawing.lines, drawing.points);
    (report.layers, report.colours) = (drawing.layers, drawing.colours);
    if is_own {
        own::figures(&mut report);
    }
    not_read(&file, &mut report);
    tidy(&mut report);
    Ok(report)
}

/// What the header says.
fn header(file: &Exchange<'_>, is_own: bool, report: &mut StepReport) {
    let text = |keyword: &str, i: usize| {
        let record = file.header.iter().find(|record| record.keyword == keyword);
        let mut value = record.and_then(|record| record.values.get(i));
        while let Some(Value::List(list)) = value {
            value = list.first();
        }
        match value {
            Some(Value::Text(text)) => decode(text).ok(),
            _ => None,
        }
    };
    let mut missing = |keyword: &str, found: Option<String>| {
        found.unwrap_or_else(|| {
            let what = format!("the header has no right {keyword}");
            report.findings.push(Finding { line: None, what });
            String::new()
        })
    };
    missing("FILE_DESCRIPTION", text("FILE_DESCRIPTION", 0));
    let schema = missing("FILE_SCHEMA", text("FILE_SCHEMA", 0));
    let time_stamp = missing("FILE_NAME", text("FILE_NAME", 1));
    if is_own && !crate::write::step::SCHEMAS.contains(&schema.as_str()) {
        let what = format!("the schema {schema:?} is none that this program writes");
        report.findings.push(Finding { line: None, what });
    }
    report.program = text("FILE_NAME", 4).or(text("FILE_NAME", 5)).unwrap_or_default();
    (report.schema, report.time_stamp) = (schema, time_stamp);
}

/// Every solid with what is stated of it.
fn solids(file: &Exchange<'_>, context: &Context, report: &mut StepReport) {
    let faults = &mut report.findings;
    let owners = product::owners(file, faults);
    let mut properties = property::Properties::read(file, context.own, faults);
    for entry in file.all("MANIFOLD_SOLID_BREP") {
        let mut solid = match solid::read(file, entry, context, faults, &mut report.notes) {
            Ok(solid) => solid,
            Err(fault) => {
                faults.push(fault);
                continue;
            }
        };
        match owners.get(&entry.id) {
            Some(owner) => {
                solid.product.clone_from(&owner.product);
                solid.stated = properties.stated.remove(&owner.shape).unwrap_or_default();
            }
            None if context.own => {
                let what = format!("solid `{}` is no product's shape", solid.name);
                faults.push(access::finding(entry.line, what));
            }
            None => {}
        }
        let allowed = if context.own { OWN } else { OTHERS };
        compare(&solid, entry.line, allowed, context.own, faults);
        report.solids.push(solid);
    }
    if context.own && !properties.stated.is_empty() {
        faults.push(Finding {
            line: None,
            what: "there are validation properties of what is no solid".to_owned(),
        });
    }
    report.attributes = properties.attributes;
}

/// What is stated of a solid against what is integrated.
fn compare(solid: &Solid, line: u32, allowed: Agreement, needed: bool, faults: &mut Vec<Finding>) {
    let Some(found) = &solid.measured else { return };
    let stated = &solid.stated;
    let [low, high] = found.bounds;
    let apart = |a: [f64; 3], b: [f64; 3]| (a[0] - b[0]).hypot(a[1] - b[1]).hypot(a[2] - b[2]);
    let size = apart(low, high);
    let mut say = |what: &str, stated: Option<(f64, String, String)>| match stated {
        Some((off, _, _)) if off <= 1.0 => {}
        Some((off, stated, found)) => {
            let what = format!(
                "solid `{}`: the {what} is stated as {stated} and is {found}: {off:.2e} times what is allowed apart",
                solid.name
            );
            faults.push(access::finding(line, what));
        }
        None if needed => {
            faults.push(access::finding(
                line,
                format!("solid `{}`: no {what} is stated", solid.name),
            ));
        }
        None => {}
    };
    let number = |stated: f64, found: f64, share: f64| {
        let off = (stated - found).abs() / (share * found.abs());
        (off, format!("{stated:?}"), format!("{found:?}"))
    };
    say(
        "volume",
        stated
            .volume
            .map(|volume| number(volume, found.volume, allowed.volume)),
    );
    say(
        "area",
        stated.area.map(|area| number(area, found.area, allowed.area)),
    );
    let point = |stated: [f64; 3], found: [f64; 3], share: f64| {
        (
            apart(stated, found) / (share * size),
            format!("{stated:?}"),
            format!("{found:?}"),
        )
    };
    say(
        "centroid",
        stated
            .centroid
            .map(|at| point(at, found.centroid, allowed.centroid)),
    );
    for (k, corner) in ["lowest corner", "highest corner"].into_iter().enumerate() {
        say(
            corner,
            stated
                .bounds
                .map(|bounds| point(bounds[k], found.bounds[k], allowed.bounds)),
        );
    }
}

/// Shapes that are not read here, by entity.
fn not_read(file: &Exchange<'_>, report: &mut StepReport) {
    const SHAPES: [&str; 12] = [
        "BREP_WITH_VOIDS",
        "FACETED_BREP",
        "SHELL_BASED_SURFACE_MODEL",
        "OPEN_SHELL",
        "FACE_SURFACE",
        "EDGE_BASED_WIREFRAME_MODEL",
        "TESSELLATED_SOLID",
        "TESSELLATED_SHELL",
        "POLYLINE",
        "MAPPED_ITEM",
        "COMPOSITE_CURVE",
        "VERTEX_LOOP",
    ];
    for kind in &file.kinds {
        for entity in SHAPES.into_iter().filter(|entity| kind.has(entity)) {
            report.not_read.push(NotRead {
                entity: entity.to_owned(),
                count: kind.count,
            });
        }
    }
}

/// Findings in the order of the file, each once, and no more than can be of use.
fn tidy(report: &mut StepReport) {
    const MOST: usize = 200;
    report.findings.sort_by_key(|finding| finding.line.unwrap_or(0));
    report.findings.dedup();
    let more = report.findings.len().saturating_sub(MOST);
    if more > 0 {
        report.findings.truncate(MOST);
        report.findings.push(Finding {
            line: None,
            what: format!("and {more} more like these"),
        });
    }
    report.notes.dedup();
}
