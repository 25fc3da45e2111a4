//! A shaded picture of the facets with the construction lines, as SVG.

use std::fmt::{self, Write};

use nalgebra::{Point3, Vector3};

use super::drawing::{Rect, Setting};
use super::markup::Escaped;
use crate::mesh::Mesh;
use crate::planform::{LineKind, Reference};

/// Width of the picture, in its own units.
const WIDTH: f64 = 940.0;
/// Margin around what is shown.
const MARGIN: f64 = 20.0;

/// Axes of the picture: to the right, up, and towards the eye, which stands ahead, above and to port.
struct Eye {
    across: Vector3<f64>,
    up: Vector3<f64>,
    towards: Vector3<f64>,
}

impl Eye {
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

/// The picture of some solids. In a page it takes the page's colours and has no ground of its own.
pub fn picture(meshes: &[Mesh], reference: &Reference, name: &str, setting: Setting) -> String {
    let mut out = String::with_capacity(1 << 17);
    // a string takes everything that is written to it
    let _ = write_picture(meshes, reference, name, setting, &mut out);
    out
}

fn write_picture(
    meshes: &[Mesh],
    reference: &Reference,
    name: &str,
    setting: Setting,
    out: &mut String,
) -> fmt::Result {
    let eye = Eye::new();
    let facets = facets(meshes, &eye);
    let points = (facets.iter().flat_map(|facet| facet.corners.iter()))
        .chain(reference.lines.iter().flat_map(|line| line.points.iter()))
        .map(|point| eye.at(point));
    let bounds = Rect::around(points);
    let scale = (WIDTH - 2.0 * MARGIN) / bounds.width();
    let place = |point: &Point3<f64>| {
        let [x, y] = eye.at(point);
        format!(
            "{:.1},{:.1}",
            MARGIN + (x - bounds.left) * scale,
            MARGIN + (y - bounds.top) * scale
        )
    };
    let height = 2.0 * MARGIN + bounds.height() * scale;
    let prefix = match setting {
        Setting::File => "picture",
        Setting::Inline { prefix } => prefix,
    };
    writeln!(
        out,
        r#"<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {WIDTH} {height:.0}" stroke-linejoin="round" role="img" aria-labelledby="{prefix}-title">"#
    )?;
    writeln!(
        out,
        r#"<title id="{prefix}-title">Shaded view of {} with its reference lines, from ahead, above and port</title>"#,
        Escaped(name)
    )?;
    if setting == Setting::File {
        writeln!(
            out,
            r##"<rect width="{WIDTH}" height="{height:.0}" fill="#f7f5f0"/>"##
        )?;
    }
    for facet in &facets {
        let [r, g, b] = [196.0, 208.0, 214.0].map(|c: f64| (c * facet.shade).round().clamp(0.0, 255.0));
        let corners = facet.corners.iter().map(place).collect::<Vec<_>>().join(" ");
        let colour = format!("rgb({r},{g},{b})");
        writeln!(
            out,
            r#"<polygon points="{corners}" fill="{colour}" stroke="{colour}" stroke-width="0.6"/>"#
        )?;
    }
    for line in &reference.lines {
        let (colour, variable, width, dash) = match line.kind {
            LineKind::MeanAerodynamicChord => ("#b3420a", "mac", 2.4, ""),
            LineKind::QuarterChord => ("#1c4f7c", "quarter", 1.4, "9 4"),
            LineKind::Custom => ("#5a3d7a", "named", 1.2, "4 3"),
            LineKind::Outline | LineKind::Chord => ("#30363a", "outline", 0.9, ""),
            LineKind::Centreline => ("#30363a", "outline", 0.9, "14 4 3 4"),
            LineKind::TwistAxis => continue,
        };
        let points = line.points.iter().map(place).collect::<Vec<_>>().join(" ");
        let colour = match setting {
            Setting::File => format!(r#"stroke="{colour}""#),
            Setting::Inline { .. } => format!(r#"style="stroke:var(--line-{variable},{colour})""#),
        };
        writeln!(
            out,
            r#"<polyline points="{points}" fill="none" {colour} stroke-width="{width}" stroke-dasharray="{dash}"/>"#
        )?;
    }
    writeln!(out, "</svg>")
}

/// A facet that faces the eye.
struct Facet {
    depth: f64,
    corners: [Point3<f64>; 3],
    shade: f64,
}

/// Facets that face the eye, the furthest first.
fn facets(meshes: &[Mesh], eye: &Eye) -> Vec<Facet> {
    let light = Vector3::new(-0.35, 0.25, 0.9).normalize();
    let mut facets = Vec::new();
    for mesh in meshes {
        for facet in &mesh.facets {
            let corners = facet.map(|k| mesh.corners[k as usize]);
            let normal = (corners[1] - corners[0])
                .cross(&(corners[2] - corners[0]))
                .normalize();
            if normal.dot(&eye.towards) > 0.0 {
                facets.push(Facet {
                    depth: corners.iter().map(|c| c.coords.dot(&eye.towards)).sum(),
                    corners,
                    shade: 0.30 + 0.62 * normal.dot(&light).max(0.0),
                });
            }
        }
    }
    facets.sort_by(|a, b| a.depth.total_cmp(&b.depth));
    facets
}
