//! Draws a wing as a shaded picture: `cargo run --release --example picture -- examples/corrie.toml examples/corrie.svg`.
//!
//! A use of the library: read a spec, build the wing, take its facets and reference lines.

use std::error::Error;
use std::fmt::Write;
use std::path::Path;

use nalgebra::{Point3, Vector3};
use spanwise::planform::LineKind;
use spanwise::spec::Source;
use spanwise::wing::{Wing, prepare};

fn main() -> Result<(), Box<dyn Error>> {
    let arguments: Vec<String> = std::env::args().skip(1).collect();
    let [spec, picture] = arguments.as_slice() else {
        return Err("usage: picture SPEC PICTURE.svg".into());
    };
    let text = std::fs::read_to_string(spec)?;
    let directory = Path::new(spec).parent().unwrap_or(Path::new(""));
    let source = Source {
        text: &text,
        file: spec,
        set: &[],
    };
    let prepared = prepare(&source, &|name| std::fs::read(directory.join(name))).map_err(|faults| {
        faults
            .iter()
            .map(ToString::to_string)
            .collect::<Vec<_>>()
            .join("\n")
    })?;
    let wing = Wing::build(&prepared)?;
    std::fs::write(picture, draw(&wing)?)?;
    Ok(())
}

/// View from ahead, above and port: picture axes across and up, and the direction towards the eye.
struct View {
    across: Vector3<f64>,
    up: Vector3<f64>,
    towards: Vector3<f64>,
}

impl View {
    fn new() -> Self {
        let towards = Vector3::new(-0.62, -0.52, 0.59).normalize();
        let across = towards.cross(&Vector3::z()).normalize() * -1.0;
        Self {
            across,
            up: towards.cross(&across),
            towards,
        }
    }

    fn at(&self, point: &Point3<f64>) -> [f64; 2] {
        [point.coords.dot(&self.across), -point.coords.dot(&self.up)]
    }
}

fn draw(wing: &Wing) -> Result<String, std::fmt::Error> {
    let view = View::new();
    let light = Vector3::new(-0.35, 0.25, 0.9).normalize();
    let mut facets = Vec::new();
    for mesh in &wing.meshes {
        for facet in &mesh.facets {
            let corners = facet.map(|k| mesh.corners[k as usize]);
            let normal = (corners[1] - corners[0])
                .cross(&(corners[2] - corners[0]))
                .normalize();
            if normal.dot(&view.towards) > 0.0 {
                let depth: f64 = corners.iter().map(|c| c.coords.dot(&view.towards)).sum();
                facets.push((depth, corners, 0.30 + 0.62 * normal.dot(&light).max(0.0)));
            }
        }
    }
    facets.sort_by(|a, b| a.0.total_cmp(&b.0));
    let points: Vec<[f64; 2]> = (facets.iter().flat_map(|(_, corners, _)| corners.iter()))
        .chain(wing.reference.lines.iter().flat_map(|line| line.points.iter()))
        .map(|point| view.at(point))
        .collect();
    let extreme =
        |k: usize, pick: fn(f64, f64) -> f64, start: f64| points.iter().map(|p| p[k]).fold(start, pick);
    let (left, right) = (
        extreme(0, f64::min, f64::INFINITY),
        extreme(0, f64::max, f64::NEG_INFINITY),
    );
    let (top, bottom) = (
        extreme(1, f64::min, f64::INFINITY),
        extreme(1, f64::max, f64::NEG_INFINITY),
    );
    let scale = 900.0 / (right - left);
    let place = |point: &Point3<f64>| {
        let [x, y] = view.at(point);
        format!("{:.1},{:.1}", 20.0 + (x - left) * scale, 20.0 + (y - top) * scale)
    };
    let height = 40.0 + (bottom - top) * scale;
    let mut out = String::new();
    writeln!(
        out,
        r#"<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 940 {height:.0}" stroke-linejoin="round">"#
    )?;
    writeln!(
        out,
        "<title>Shaded view of a wing with its reference lines</title>"
    )?;
    writeln!(
        out,
        r##"<rect width="940" height="{height:.0}" fill="#f7f5f0"/>"##
    )?;
    for (_, corners, shade) in &facets {
        let [r, g, b] = [196.0, 208.0, 214.0].map(|c: f64| (c * shade).round().clamp(0.0, 255.0));
        let outline = corners.iter().map(&place).collect::<Vec<_>>().join(" ");
        let colour = format!("rgb({r},{g},{b})");
        writeln!(
            out,
            r#"<polygon points="{outline}" fill="{colour}" stroke="{colour}" stroke-width="0.6"/>"#
        )?;
    }
    for line in &wing.reference.lines {
        let (colour, width, dash) = match line.kind {
            LineKind::MeanAerodynamicChord => ("#b3420a", 2.4, ""),
            LineKind::QuarterChord => ("#1c4f7c", 1.4, "9 4"),
            LineKind::Custom => ("#5a3d7a", 1.2, "4 3"),
            LineKind::Outline | LineKind::Chord => ("#30363a", 0.9, ""),
            LineKind::Centreline => ("#30363a", 0.9, "14 4 3 4"),
            LineKind::TwistAxis => continue,
        };
        let points = line.points.iter().map(&place).collect::<Vec<_>>().join(" ");
        writeln!(
            out,
            r#"<polyline points="{points}" fill="none" stroke="{colour}" stroke-width="{width}" stroke-dasharray="{dash}"/>"#
        )?;
    }
    writeln!(out, "</svg>")?;
    Ok(out)
}
