//! The dimensioned drawing: three views to one scale on a standard sheet, the sections, the figures.
//!
//! [`sheet`] lays everything out as lines and labels on paper; [`svg`] says that as SVG. Arrangement of views after
//! ISO 5456-2, line widths and types after ISO 128-2, scales after ISO 5455, sheets after ISO 5457 and ISO 216, the
//! title block after ISO 7200, dimensions after ISO 129-1, letters after ISO 3098 (all from memory).

mod arrange;
mod dimension;
mod figures;
mod frame;
mod legend;
mod main_view;
mod outline;
mod sections;
mod sheet;
mod svg;
mod view;

pub use arrange::sheet;
pub use sections::chart;
pub use sheet::{Anchor, At, Datum, Label, Line, Patch, Rect, Sheet, Stroke};
pub use svg::{Setting, svg};
pub use view::{Angle, View};

use nalgebra::Point3;

use crate::mesh::Mesh;
use crate::planform::Reference;
use crate::write::record::Record;

/// What is drawn; lengths in millimetres, angles in radians.
#[derive(Clone, Debug)]
pub struct Subject<'a> {
    /// The figures, as the figures file has them.
    pub record: &'a Record,
    /// Millimetres in one of the record's units.
    pub unit: f64,
    /// Arrangement of the views.
    pub angle: Angle,
    /// Facets of each solid, fine enough that nobody sees them.
    pub meshes: &'a [Mesh],
    /// Construction geometry.
    pub reference: &'a Reference,
    /// Stations of the sides that are built, from the root outwards.
    pub sides: Vec<Side>,
    /// The sections at the root, at the mean aerodynamic chord and at the tip.
    pub sections: Vec<SectionShape>,
    /// The names of the lines that the spec asks for, with what they are.
    pub lines: Vec<(String, String)>,
    /// Whether the planform is one trapezoid a side, so that the mean aerodynamic chord can be constructed.
    pub is_trapezoid: bool,
    /// Where the reference root's leading edge is.
    pub origin: Point3<f64>,
    /// Whether the wing is a fin: its span stands along z.
    pub fin: bool,
    /// Name of the line that sweep is measured on, as the checks have it: `quarter-chord`.
    pub sweep_line: String,
    /// Half the width of the fuselage, where it is known.
    pub body: Option<f64>,
    /// The date in the title block.
    pub date: Option<&'a str>,
}

/// One side of the wing.
#[derive(Clone, Debug, PartialEq)]
pub struct Side {
    /// 1 for starboard, -1 for port.
    pub sign: f64,
    /// Chord lines of the reference wing at the stations: front, rear, and the point that the section turns about.
    pub stations: Vec<[Point3<f64>; 3]>,
    /// The upper side of each section where panels meet.
    pub joints: Vec<Vec<Point3<f64>>>,
    /// The mean aerodynamic chord, front and rear.
    pub mac: [Point3<f64>; 2],
}

/// A section in its own plane: x aft, y up, as it stands.
#[derive(Clone, Debug, PartialEq)]
pub struct SectionShape {
    /// Where it is: `root`, `mean aerodynamic chord`, `tip`.
    pub place: String,
    /// The airfoil's name; where sections blend, both.
    pub airfoil: String,
    /// Points of the upper side from the nose to the trailing edge \[mm\].
    pub upper: Vec<[f64; 2]>,
    /// Points of the lower side, likewise.
    pub lower: Vec<[f64; 2]>,
    /// Length of the chord \[mm\].
    pub chord: f64,
    /// Turn of the chord against the x axis, leading edge up \[rad\].
    pub incidence: f64,
    /// Thickness \[chord\] and its place \[chord\].
    pub thickness: [f64; 2],
    /// Camber \[chord\] and its place \[chord\].
    pub camber: [f64; 2],
}

impl SectionShape {
    /// The chord line's ends: where the sides meet, and the middle of the trailing edge.
    pub fn chord_line(&self) -> [[f64; 2]; 2] {
        let end = |side: &[[f64; 2]]| side.last().copied().unwrap_or_default();
        let (upper, lower) = (end(&self.upper), end(&self.lower));
        let front = self.upper.first().copied().unwrap_or_default();
        [front, [0.5 * (upper[0] + lower[0]), 0.5 * (upper[1] + lower[1])]]
    }
}

/// A length as a drawing writes it: in the record's unit, to about a hundredth of a millimetre.
pub(crate) fn length_text(value: f64, unit: f64) -> String {
    let decimals = if unit < 5.0 {
        2
    } else if unit < 100.0 {
        3
    } else {
        4
    };
    trimmed(value, decimals)
}

/// An angle in degrees as a drawing writes it.
pub(crate) fn angle_text(degrees: f64) -> String {
    format!("{}°", trimmed(degrees, 2))
}

/// So many decimals, no idle zeros, a true minus sign.
pub(crate) fn trimmed(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    let text = if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.')
    } else {
        &text
    };
    match text.strip_prefix('-') {
        Some("0") => "0".into(),
        Some(digits) => format!("−{digits}"),
        None => text.to_owned(),
    }
}
