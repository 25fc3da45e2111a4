//! The figures of a section: as scripts read them, and as a table for the terminal.

use std::collections::BTreeMap;
use std::fmt::Write;

use serde::Serialize;

use super::sheet::{figure, folded, small};

/// All figures of one section; lengths in parts of the chord, angles in degrees.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct SectionRecord {
    /// The designation or path as typed, with what was changed.
    pub name: String,
    /// The title of the coordinate file.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub title: Option<String>,
    /// Area within the contour.
    pub area: f64,
    /// Its centroid.
    pub centroid: [f64; 2],
    /// Length of both sides without the base.
    pub perimeter: f64,
    /// Greatest thickness.
    pub thickness: AtX,
    /// Greatest camber in size, with its sign.
    pub camber: AtX,
    /// Radius of curvature at the nose.
    pub nose_radius: f64,
    /// The trailing edge.
    pub trailing_edge: Edge,
    /// Angle of the chord line at which there is no lift, by thin-aerofoil theory.
    pub zero_lift_angle: f64,
    /// Moment coefficient about the quarter-chord point, nose up positive.
    pub quarter_chord_moment: f64,
    /// Angle at which the flow meets the nose of the camber line smoothly.
    pub ideal_angle: f64,
    /// Lift coefficient there.
    pub ideal_lift: f64,
    /// How a wing would carry the section.
    pub fit: SectionFit,
    /// Changes of sign of the curvature.
    pub waviness: Waves,
    /// What was found in the coordinate file, and cautions.
    pub notes: Vec<String>,
    /// Points around the section, where they were asked for.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub points: Option<Vec<[f64; 2]>>,
    /// Names of the files written, by kind.
    pub files: BTreeMap<String, String>,
}

/// A value and its place on the chord.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct AtX {
    /// The value.
    pub value: f64,
    /// Where it is.
    pub x: f64,
}

/// A trailing edge.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Edge {
    /// Angle between the sides.
    pub angle: f64,
    /// Distance between the ends of the sides.
    pub base: f64,
    /// How it is closed, in words.
    pub closing: String,
}

/// The control points that carry a section.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct SectionFit {
    /// Largest distance between the section's exact curve and its fit.
    pub max_deviation: f64,
    /// Largest distance of a given point from the exact curve; 0 for formulas.
    pub point_deviation: f64,
    /// Control points of the upper side.
    pub upper_points: usize,
    /// Control points of the lower side.
    pub lower_points: usize,
}

/// Changes of sign of the curvature.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Waves {
    /// Of the upper side.
    pub upper: usize,
    /// Of the lower side.
    pub lower: usize,
    /// Those that a section should not have.
    pub excess: usize,
}

/// The record as JSON text, keys in a fixed order, ending in a line feed.
///
/// # Panics
///
/// Never: a record holds nothing that JSON cannot say.
pub fn json(record: &SectionRecord) -> String {
    let mut text =
        serde_json::to_string_pretty(record).expect("a record has text keys and plain values only");
    text.push('\n');
    text
}

/// The figures as a table for the terminal, ending in a line feed.
pub fn table(record: &SectionRecord) -> String {
    let mut out = String::new();
    // a string takes everything that is written to it
    let _ = write_table(record, &mut out);
    out
}

fn write_table(record: &SectionRecord, out: &mut String) -> std::fmt::Result {
    writeln!(out, "{}", heading(record))?;
    writeln!(out)?;
    let rows = rows(record);
    let width = rows
        .iter()
        .map(|(name, _)| name.chars().count())
        .max()
        .unwrap_or(0);
    for (name, value) in &rows {
        let indent = " ".repeat(width + 4);
        writeln!(out, "  {name:<width$}  {}", folded(value, 110 - width, &indent))?;
    }
    if !record.notes.is_empty() {
        writeln!(out)?;
        writeln!(out, "Notes")?;
        for note in &record.notes {
            writeln!(out, "  - {}", folded(note, 112, "    "))?;
        }
    }
    if !record.files.is_empty() {
        writeln!(out)?;
        let names: Vec<&str> = record.files.values().map(String::as_str).collect();
        writeln!(out, "Written: {}", names.join(", "))?;
    }
    Ok(())
}

fn heading(record: &SectionRecord) -> String {
    let title = (record.title.as_ref()).filter(|title| **title != record.name);
    let text = match title {
        Some(title) => format!("{}: {title}", record.name),
        None => record.name.clone(),
    };
    text.chars()
        .map(|c| if c.is_control() { ' ' } else { c })
        .take(200)
        .collect()
}

fn percent(value: f64) -> String {
    format!("{} %", figure(100.0 * value))
}

/// Name and value of every figure.
fn rows(record: &SectionRecord) -> Vec<(&'static str, String)> {
    let at = |place: &AtX| format!("{} at x {}", percent(place.value), percent(place.x));
    let [x, y] = record.centroid.map(percent);
    let SectionFit {
        max_deviation,
        point_deviation,
        upper_points,
        lower_points,
    } = record.fit;
    let mut fit = format!(
        "{upper_points} + {lower_points} control points, within {} of the chord",
        small(max_deviation)
    );
    if point_deviation > 0.0 {
        fit += &format!("; the given points within {}", small(point_deviation));
    }
    let waves = match record.waviness {
        Waves { upper, lower, excess } if excess > 0 => {
            format!("curvature changes sign {upper} + {lower} times, {excess} too many")
        }
        Waves { upper, lower, .. } => format!("none (curvature changes sign {upper} + {lower} times)"),
    };
    let edge = &record.trailing_edge;
    vec![
        ("thickness", at(&record.thickness)),
        ("camber", at(&record.camber)),
        ("nose radius", percent(record.nose_radius)),
        (
            "trailing edge",
            format!("{}°, base {}", figure(edge.angle), percent(edge.base)),
        ),
        ("closing", edge.closing.clone()),
        ("area", format!("{} of the chord squared", figure(record.area))),
        ("centroid", format!("x {x}, y {y}")),
        (
            "perimeter",
            format!("{} chords without the base", figure(record.perimeter)),
        ),
        (
            "zero-lift angle",
            format!("{}° by thin-aerofoil theory", figure(record.zero_lift_angle)),
        ),
        (
            "quarter-chord moment",
            format!(
                "{} (coefficient, nose up positive)",
                figure(record.quarter_chord_moment)
            ),
        ),
        (
            "ideal lift",
            format!(
                "{} (coefficient) at {}°",
                figure(record.ideal_lift),
                figure(record.ideal_angle)
            ),
        ),
        ("fit", fit),
        ("waves", waves),
    ]
}

/// The figures as lines below a drawing.
pub fn captions(record: &SectionRecord) -> Vec<String> {
    let rows = rows(record);
    let line = |names: &[&str]| {
        let parts = rows.iter().filter(|(name, _)| names.contains(name));
        let parts: Vec<String> = parts.map(|(name, value)| format!("{name} {value}")).collect();
        parts.join(" · ")
    };
    let edge = &record.trailing_edge;
    vec![
        line(&["thickness", "camber", "nose radius"]),
        line(&["trailing edge", "area", "zero-lift angle"]),
        edge.closing.clone(),
        "Camber line dashed, nose circle dotted; comb: asinh of the curvature, outwards where the side bulges.".to_owned(),
    ]
}

#[cfg(test)]
mod tests {
    use super::{AtX, Edge, SectionFit, SectionRecord, Waves, captions, json, table};
    use std::collections::BTreeMap;

    fn record() -> SectionRecord {
        SectionRecord {
            name: "x.dat".to_owned(),
            title: Some("Fell 113".to_owned()),
            area: 0.08,
            centroid: [0.42, 0.01],
            perimeter: 2.04,
            thickness: AtX { value: 0.12, x: 0.3 },
            camber: AtX { value: -0.02, x: 0.4 },
            nose_radius: 0.0158,
            trailing_edge: Edge {
                angle: 16.0,
                base: 0.0025,
                closing: "as in the file".to_owned(),
            },
            zero_lift_angle: -2.0,
            quarter_chord_moment: -0.05,
            ideal_angle: 0.5,
            ideal_lift: 0.26,
            fit: SectionFit {
                max_deviation: 9e-7,
                point_deviation: 4e-6,
                upper_points: 20,
                lower_points: 18,
            },
            waviness: Waves {
                upper: 5,
                lower: 0,
                excess: 3,
            },
            notes: vec!["one loop".to_owned()],
            points: None,
            files: BTreeMap::new(),
        }
    }

    #[test]
    fn the_table_states_every_figure_with_its_unit() {
        let text = table(&record());
        for part in [
            "x.dat: Fell 113\n",
            "thickness             12 % at x 30 %\n",
            "camber                -2 % at x 40 %\n",
            "base 0.25 %",
            "20 + 18 control points, within 9.0e-7 of the chord; the given points within 4.0e-6\n",
            "curvature changes sign 5 + 0 times, 3 too many",
            "  - one loop\n",
        ] {
            assert!(text.contains(part), "{part:?} in\n{text}");
        }
        assert_eq!(captions(&record()).len(), 4);
    }

    #[test]
    fn json_has_points_and_title_only_where_there_are_some() {
        let mut record = record();
        assert!(!json(&record).contains("\"points\""));
        record.points = Some(vec![[1.0, 0.0]]);
        record.title = None;
        let text = json(&record);
        assert!(text.contains("\"points\"") && !text.contains("\"title\""));
    }
}
