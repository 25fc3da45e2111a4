//! The report as a table for a terminal.

use std::fmt::Write;

use super::report::{AttributeValue, Figures, Solid, StepReport};

/// Decimal places that a figure of this size is shown with: seven digits.
fn figure(x: f64) -> String {
    if x == 0.0 || !x.is_finite() {
        return if x == 0.0 { "0".to_owned() } else { format!("{x}") };
    }
    let size = x.abs().log10().floor();
    if !(-5.0..15.0).contains(&size) {
        return format!("{x:.6e}");
    }
    // from -5 to 14, so that this is from 0 to 11
    let places = (0..=11)
        .find(|places| f64::from(*places) >= 6.0 - size)
        .unwrap_or(11);
    let text = format!("{x:.places$}", places = usize::try_from(places).unwrap_or(0));
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

fn point(p: [f64; 3]) -> String {
    p.map(figure).join(", ")
}

/// The report as text, ending in a line feed.
pub fn sheet(report: &StepReport) -> String {
    let mut out = String::new();
    // a string takes everything that is written to it
    let _ = put(report, &mut out);
    out
}

fn put(report: &StepReport, out: &mut String) -> std::fmt::Result {
    let unit = &report.unit;
    writeln!(out, "  {}", report.schema)?;
    writeln!(
        out,
        "  by {}, {}; {} instances; lengths in {unit}",
        report.program, report.time_stamp, report.instances
    )?;
    for product in &report.products {
        let description = match product.description.as_str() {
            "" => String::new(),
            text => format!(": {text}"),
        };
        writeln!(
            out,
            "  product {} ({}){description}",
            short(&product.name),
            short(&product.id)
        )?;
    }
    for solid in &report.solids {
        put_solid(solid, unit, out)?;
    }
    if !report.lines.is_empty() {
        writeln!(out, "\n  Reference lines")?;
    }
    let wide = report
        .lines
        .iter()
        .map(|line| line.name.chars().count())
        .max()
        .unwrap_or(0)
        .min(48);
    let kinds = report.lines.iter().map(|line| line.kind.len()).max().unwrap_or(0);
    for line in &report.lines {
        let (first, last) = (line.points.first(), line.points.last());
        let ends = first.zip(last).map_or(String::new(), |(a, b)| {
            format!("({}) to ({})", point(*a), point(*b))
        });
        writeln!(
            out,
            "    {:wide$}  {:kinds$}  {:>10} {unit}  {ends}",
            short(&line.name),
            line.kind,
            figure(line.length)
        )?;
    }
    for p in &report.points {
        writeln!(
            out,
            "    {:wide$}  {:kinds$}  {:>10} {:>blank$}  ({})",
            short(&p.name),
            "point",
            "",
            "",
            point(p.at),
            blank = unit.len()
        )?;
    }
    if !report.attributes.is_empty() {
        writeln!(out, "\n  Attributes")?;
    }
    let wide = report
        .attributes
        .iter()
        .map(|attribute| attribute.name.chars().count())
        .max()
        .unwrap_or(0)
        .min(48);
    for attribute in &report.attributes {
        let value = match &attribute.value {
            AttributeValue::Number(x) => format!("{} {}", figure(*x), attribute.unit),
            AttributeValue::Text(text) => text.clone(),
        };
        writeln!(out, "    {:wide$}  {}", short(&attribute.name), value.trim_end())?;
    }
    if !report.layers.is_empty() {
        writeln!(out, "\n  Layers ({} colours)", report.colours)?;
    }
    let wide = report
        .layers
        .iter()
        .map(|layer| layer.name.chars().count())
        .max()
        .unwrap_or(0)
        .min(48);
    for layer in &report.layers {
        writeln!(
            out,
            "    {:wide$}  {:>4} items  {}",
            short(&layer.name),
            layer.items,
            layer.description
        )?;
    }
    for entity in &report.not_read {
        writeln!(out, "\n  Not read: {} {}", entity.count, entity.entity)?;
    }
    for note in &report.notes {
        writeln!(out, "\n  Note: {note}")?;
    }
    writeln!(out)?;
    match report.findings.len() {
        0 => writeln!(out, "  The file agrees with itself.")?,
        1 => writeln!(out, "  The file disagrees with itself:")?,
        n => writeln!(out, "  The file disagrees with itself in {n} places:")?,
    }
    for finding in &report.findings {
        writeln!(out, "    {finding}")?;
    }
    Ok(())
}

fn short(text: &str) -> String {
    let cut: String = text.chars().take(48).collect();
    if cut.len() < text.len() {
        format!("{cut}…")
    } else {
        cut
    }
}

fn put_solid(solid: &Solid, unit: &str, out: &mut String) -> std::fmt::Result {
    let closed = if solid.closed {
        "each edge used twice, once each way"
    } else {
        "NOT closed"
    };
    writeln!(
        out,
        "\n  Solid {}: {} faces, {} edges, {} vertices; {closed}",
        short(&solid.name),
        solid.faces.len(),
        solid.edges,
        solid.vertices
    )?;
    for face in &solid.faces {
        let area = face.area.map_or("not measured".to_owned(), |area| {
            format!("{} {unit}²", figure(area))
        });
        writeln!(out, "    {:40}  {:18}  {area}", short(&face.name), face.surface)?;
    }
    let stated = &solid.stated;
    let none = || "-".to_owned();
    let row = |out: &mut String, what: &str, found: Option<String>, stated: Option<String>, unit: String| {
        writeln!(
            out,
            "    {what:14}  {:>36}  {:>36}  {unit}",
            found.unwrap_or_else(none),
            stated.unwrap_or_else(none)
        )
    };
    let found = |f: fn(&Figures) -> String| solid.measured.as_ref().map(f);
    writeln!(
        out,
        "    {:14}  {:>36}  {:>36}",
        "", "integrated", "stated in the file"
    )?;
    row(
        out,
        "volume",
        found(|f| figure(f.volume)),
        stated.volume.map(figure),
        format!("{unit}³"),
    )?;
    row(
        out,
        "area",
        found(|f| figure(f.area)),
        stated.area.map(figure),
        format!("{unit}²"),
    )?;
    row(
        out,
        "centroid",
        found(|f| point(f.centroid)),
        stated.centroid.map(point),
        unit.to_owned(),
    )?;
    row(
        out,
        "lowest corner",
        found(|f| point(f.bounds[0])),
        stated.bounds.map(|b| point(b[0])),
        unit.to_owned(),
    )?;
    row(
        out,
        "highest corner",
        found(|f| point(f.bounds[1])),
        stated.bounds.map(|b| point(b[1])),
        unit.to_owned(),
    )
}
