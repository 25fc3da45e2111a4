//! The proof sheet: the figures of a wing as a designer reads them on a terminal.

use std::fmt::Write;

use super::record::{Record, SizingStep};

/// The sheet as text, ending in a line feed.
pub fn sheet(record: &Record) -> String {
    let mut out = String::new();
    // a string takes everything that is written to it
    let _ = write_sheet(record, &mut out);
    out
}

fn write_sheet(record: &Record, out: &mut String) -> std::fmt::Result {
    let Record {
        name,
        unit,
        reference,
        built,
        checks,
        section_fit,
        mesh,
        sizing,
        notes,
        files,
    } = record;
    let mac = &reference.mac;
    let title: String = name.chars().take(100).collect();
    writeln!(out, "{title}")?;
    writeln!(out)?;
    if !sizing.is_empty() {
        writeln!(out, "Sizing")?;
        chain(sizing, out)?;
        writeln!(out)?;
    }
    writeln!(out, "Reference wing (to the centreline, both sides)")?;
    writeln!(
        out,
        "  area {} {unit}², span {} {unit}, aspect ratio {}, taper ratio {}",
        figure(reference.area),
        figure(reference.span),
        figure(reference.aspect_ratio),
        figure(reference.taper_ratio)
    )?;
    writeln!(
        out,
        "  chords {} {unit} at the root, {} {unit} at the tip, mean {} {unit}",
        figure(reference.root_chord),
        figure(reference.tip_chord),
        figure(reference.mean_chord)
    )?;
    writeln!(
        out,
        "  mean aerodynamic chord {} {unit}, leading edge at x {}, y {}, z {} {unit}, incidence {}°",
        figure(mac.length),
        figure(mac.x_le),
        figure(mac.y),
        figure(mac.z_le),
        figure(mac.incidence)
    )?;
    let [x, y, z] = reference.aerodynamic_centre.map(figure);
    writeln!(out, "  aerodynamic centre at x {x}, y {y}, z {z} {unit}")?;
    writeln!(out)?;
    let parts = if built.solids == 1 {
        "one solid".to_owned()
    } else {
        format!("{} solids", built.solids)
    };
    writeln!(out, "Built wing ({parts}, {} faces)", built.faces)?;
    writeln!(
        out,
        "  volume {} {unit}³, wetted area {} {unit}², span {} {unit}",
        figure(built.volume),
        figure(built.wetted_area),
        figure(built.span)
    )?;
    let [x, y, z] = built.centroid.map(figure);
    writeln!(out, "  centroid at x {x}, y {y}, z {z} {unit}")?;
    writeln!(
        out,
        "  sections within {} of the chord ({} + {} control points)",
        small(section_fit.max_deviation),
        section_fit.upper_points,
        section_fit.lower_points
    )?;
    let closed = if mesh.watertight {
        "watertight"
    } else {
        "NOT WATERTIGHT"
    };
    writeln!(
        out,
        "  {} facets, {closed}, within {} {unit} of the surface",
        mesh.facets,
        figure(mesh.max_deviation)
    )?;
    writeln!(out)?;
    let header = ["", "asked", "measured", "deviation", "allowed", ""];
    let mut rows = vec![header.map(str::to_owned)];
    for check in checks {
        rows.push([
            check.quantity.clone(),
            format!("{} {}", figure(check.asked), check.unit),
            format!("{} {}", figure(check.built), check.unit),
            // what is mere rounding differs from machine to machine and says nothing
            small(if check.deviation.abs() < 1e-7 * check.allowed {
                0.0
            } else {
                check.deviation
            }),
            small(check.allowed),
            if check.ok { "ok".into() } else { "OUT".into() },
        ]);
    }
    table(&rows, out)?;
    if !notes.is_empty() {
        writeln!(out)?;
        writeln!(out, "Notes")?;
        for note in notes {
            writeln!(out, "  - {}", folded(note, 112, "    "))?;
        }
    }
    if !files.is_empty() {
        writeln!(out)?;
        let names: Vec<&str> = files.values().map(String::as_str).collect();
        writeln!(out, "Written: {}", names.join(", "))?;
    }
    Ok(())
}

/// A chain of results: name, value with unit, ground.
fn chain(steps: &[SizingStep], out: &mut String) -> std::fmt::Result {
    let widest = |texts: &[String]| texts.iter().map(|text| text.chars().count()).max().unwrap_or(0);
    let names: Vec<String> = steps.iter().map(|step| step.name.clone()).collect();
    let values: Vec<String> = steps
        .iter()
        .map(|step| {
            format!("{} {}", figure(step.value), step.unit)
                .trim_end()
                .to_owned()
        })
        .collect();
    let (first, second) = (widest(&names), widest(&values));
    for ((step, name), value) in steps.iter().zip(&names).zip(&values) {
        writeln!(out, "  {name:<first$}  {value:>second$}  {}", step.ground)?;
    }
    Ok(())
}

/// Text columns, the first to the left, the others to the right.
fn table(rows: &[[String; 6]], out: &mut String) -> std::fmt::Result {
    let width = |column: usize| {
        rows.iter()
            .map(|row| row[column].trim_end().chars().count())
            .max()
            .unwrap_or(0)
    };
    let widths: [usize; 6] = std::array::from_fn(width);
    for row in rows {
        let mut line = format!("{:<1$}", row[0], widths[0]);
        for column in 1..6 {
            let text = row[column].trim_end();
            write!(line, "  {text:>0$}", widths[column])?;
        }
        writeln!(out, "{}", line.trim_end())?;
    }
    Ok(())
}

/// Seven significant digits, without trailing zeros.
pub(crate) fn figure(value: f64) -> String {
    if value.abs() < 5e-10 {
        return "0".into();
    }
    let digits = 6.0 - value.abs().log10().floor();
    let decimals = (0..=9_u8).find(|d| f64::from(*d) >= digits).unwrap_or(9);
    let text = format!("{value:.0$}", usize::from(decimals));
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// Two significant digits with an exponent, for deviations.
pub(crate) fn small(value: f64) -> String {
    if value == 0.0 {
        "0".into()
    } else {
        format!("{value:.1e}")
    }
}

/// Breaks a text into lines of at most `width` characters, further lines indented.
pub(super) fn folded(text: &str, width: usize, indent: &str) -> String {
    let mut out = String::new();
    let mut column = 0;
    for word in text.split_whitespace() {
        let length = word.chars().count();
        if column > 0 && column + 1 + length > width {
            out.push('\n');
            out.push_str(indent);
            column = 0;
        } else if column > 0 {
            out.push(' ');
            column += 1;
        }
        out.push_str(word);
        column += length;
    }
    out
}

#[cfg(test)]
mod tests {
    use super::{figure, folded};

    #[test]
    fn figures_have_seven_digits_and_no_idle_zeros() {
        for (value, text) in [
            (0.0, "0"),
            (1.5, "1.5"),
            (-2.0, "-2"),
            (233.333_333_33, "233.3333"),
            (1_234_567.89, "1234568"),
            (12_345_678.9, "12345679"),
            (0.000_123_456_789, "0.000123457"),
            (1e-12, "0"),
        ] {
            assert_eq!(figure(value), text);
        }
    }

    #[test]
    fn long_notes_are_folded_between_words() {
        assert_eq!(folded("one two three four", 9, "  "), "one two\n  three\n  four");
    }
}
