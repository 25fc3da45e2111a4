//! A sheet as SVG: one user unit a millimetre, the sheet's true size.

use std::fmt::{self, Write};

use super::sheet::{Anchor, Label, Sheet, Stroke};
use crate::write::lettering::{FAMILIES, is_known, width};
use crate::write::markup::Escaped;

/// How an SVG stands in what holds it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Setting {
    /// A file of its own, at its true size.
    File,
    /// Inside a page, as wide as its column; `prefix` keeps identifiers apart.
    Inline {
        /// Beginning of its identifiers.
        prefix: &'static str,
    },
}

/// The sheet as SVG, ending in a line feed.
pub fn svg(sheet: &Sheet, setting: Setting) -> String {
    let mut out = String::with_capacity(1 << 16);
    // a string takes everything that is written to it
    let _ = write_svg(sheet, setting, &mut out);
    out
}

fn write_svg(sheet: &Sheet, setting: Setting, out: &mut String) -> fmt::Result {
    let [w, h] = sheet.size;
    let prefix = match setting {
        Setting::File => {
            writeln!(out, r#"<?xml version="1.0" encoding="UTF-8"?>"#)?;
            "drawing"
        }
        Setting::Inline { prefix } => prefix,
    };
    let size = match setting {
        Setting::File => format!(r#" width="{w}mm" height="{h}mm""#),
        Setting::Inline { .. } => String::new(),
    };
    writeln!(
        out,
        r#"<svg xmlns="http://www.w3.org/2000/svg"{size} viewBox="0 0 {w} {h}" role="img" aria-labelledby="{prefix}-title {prefix}-description" class="sheet">"#
    )?;
    writeln!(
        out,
        r#"<title id="{prefix}-title">{}</title>"#,
        Escaped(&sheet.title)
    )?;
    writeln!(
        out,
        r#"<desc id="{prefix}-description">{}</desc>"#,
        Escaped(&sheet.description)
    )?;
    writeln!(out, "<style>")?;
    for stroke in Stroke::ALL {
        let dashes: Vec<String> = (stroke.dashes().iter())
            .map(|dash| number(dash * stroke.width()))
            .collect();
        let dashes = if dashes.is_empty() {
            String::new()
        } else {
            format!(";stroke-dasharray:{}", dashes.join(" "))
        };
        let (class, colour) = (stroke.class(), stroke.colour());
        writeln!(
            out,
            ".sheet .{class}{{stroke:{colour};stroke-width:{}{dashes}}} .sheet .{class}-patch{{fill:{colour};stroke:none}}",
            stroke.width()
        )?;
    }
    writeln!(
        out,
        ".sheet path{{fill:none;stroke-linecap:butt;stroke-linejoin:round}} .sheet text{{font-family:{FAMILIES};fill:#101214;unicode-bidi:isolate;stroke:#fff;stroke-width:0.9;stroke-linejoin:round;paint-order:stroke}} .sheet .light{{fill:#4a4f54}}"
    )?;
    writeln!(out, "</style>")?;
    writeln!(out, r##"<rect width="{w}" height="{h}" fill="#ffffff"/>"##)?;
    for line in &sheet.lines {
        write!(out, r#"<path class="{}" d=""#, line.stroke.class())?;
        for (k, [x, y]) in line.points.iter().enumerate() {
            write!(
                out,
                "{}{} {}",
                if k == 0 { "M" } else { "L" },
                number(*x),
                number(*y)
            )?;
        }
        match &line.title {
            Some(title) => writeln!(out, r#""><title>{}</title></path>"#, Escaped(title))?,
            None => writeln!(out, r#""/>"#)?,
        }
    }
    for patch in &sheet.patches {
        let points: Vec<String> = (patch.points.iter())
            .map(|[x, y]| format!("{},{}", number(*x), number(*y)))
            .collect();
        writeln!(
            out,
            r#"<polygon class="{}-patch" points="{}"/>"#,
            patch.stroke.class(),
            points.join(" ")
        )?;
    }
    for label in &sheet.labels {
        write_label(label, out)?;
    }
    writeln!(out, "</svg>")
}

fn write_label(label: &Label, out: &mut String) -> fmt::Result {
    let [x, y] = label.at.map(number);
    let anchor = match label.anchor {
        Anchor::Start => "",
        Anchor::Middle => r#" text-anchor="middle""#,
        Anchor::End => r#" text-anchor="end""#,
    };
    write!(
        out,
        r#"<text x="{x}" y="{y}" font-size="{}"{anchor}"#,
        number(label.size())
    )?;
    if label.turned {
        write!(out, r#" transform="rotate(-90 {x} {y})""#)?;
    }
    if label.light {
        write!(out, r#" class="light""#)?;
    }
    if is_known(&label.text) {
        // as wide in any font, so that nothing is covered where the font is another one
        let length = number(width(&label.text, label.size()));
        write!(out, r#" textLength="{length}" lengthAdjust="spacingAndGlyphs""#)?;
    }
    if let Some(datum) = &label.datum {
        write!(
            out,
            r#" data-quantity="{}" data-value="{}""#,
            Escaped(&datum.quantity),
            datum.value
        )?;
    }
    writeln!(out, ">{}</text>", Escaped(&label.text))
}

/// A coordinate on paper to a thousandth of a millimetre, without idle zeros.
pub(super) fn number(value: f64) -> String {
    let text = format!("{value:.3}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    if text == "-0" { "0".into() } else { text.to_owned() }
}
