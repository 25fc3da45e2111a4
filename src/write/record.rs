//! The figures of a wing as scripts read them: `<stem>.json`.

use std::collections::BTreeMap;

use serde::Serialize;

/// All figures of one wing; lengths in the wing's unit, angles in degrees.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Record {
    /// The wing's name.
    pub name: String,
    /// Unit of all lengths; areas and volumes are in its square and cube.
    pub unit: String,
    /// The reference wing: to the centreline, square tip, both sides counted.
    pub reference: ReferenceFigures,
    /// The wing as built.
    pub built: BuiltFigures,
    /// What was asked for beside what was measured on the solid.
    pub checks: Vec<CheckFigures>,
    /// How closely the sections were fitted.
    pub section_fit: SectionFit,
    /// The facets.
    pub mesh: MeshFigures,
    /// How load and cruise led to the area and the incidence, step by step; empty without either. In SI units and degrees,
    /// whatever the wing's unit.
    pub sizing: Vec<SizingStep>,
    /// Cautions and guidance, each with its ground.
    pub notes: Vec<String>,
    /// Names of the files written, by kind.
    pub files: BTreeMap<String, String>,
}

/// Figures of the reference wing.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct ReferenceFigures {
    /// Area.
    pub area: f64,
    /// Span.
    pub span: f64,
    /// Span² / area.
    pub aspect_ratio: f64,
    /// Tip chord / root chord.
    pub taper_ratio: f64,
    /// Chord on the centreline.
    pub root_chord: f64,
    /// Chord at the tip.
    pub tip_chord: f64,
    /// Area / span.
    pub mean_chord: f64,
    /// Mean aerodynamic chord.
    pub mac: MacFigures,
    /// Quarter point of the mean aerodynamic chord of one side: the starboard one, where both are built.
    pub aerodynamic_centre: [f64; 3],
}

/// The mean aerodynamic chord: its length, the place of its leading edge, its incidence.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct MacFigures {
    /// Length.
    pub length: f64,
    /// y of its leading edge.
    pub y: f64,
    /// x of its leading edge.
    pub x_le: f64,
    /// z of its leading edge.
    pub z_le: f64,
    /// Incidence of the built section there.
    pub incidence: f64,
}

/// Figures of the solid, measured on its faces.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct BuiltFigures {
    /// Volume of all solids.
    pub volume: f64,
    /// Area of all faces but the root caps.
    pub wetted_area: f64,
    /// Area of all faces.
    pub surface_area: f64,
    /// Area between leading and trailing edge, chords taken at their true length, of the sides that are built.
    pub planform_area: f64,
    /// Distance between the tips, or from root to tip where one side is built.
    pub span: f64,
    /// Centroid of the volume.
    pub centroid: [f64; 3],
    /// Number of solids.
    pub solids: usize,
    /// Number of faces of all solids.
    pub faces: usize,
}

/// A figure asked for and found.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct CheckFigures {
    /// What it is.
    pub quantity: String,
    /// Value asked for.
    pub asked: f64,
    /// Value measured on the solid.
    pub built: f64,
    /// `built - asked`.
    pub deviation: f64,
    /// Largest deviation allowed.
    pub allowed: f64,
    /// Whether it is allowed.
    pub ok: bool,
    /// Its unit: that of the wing, its square, `deg`, or nothing.
    pub unit: String,
}

/// One step of a chain of results.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct SizingStep {
    /// What it is.
    pub name: String,
    /// Its value.
    pub value: f64,
    /// Its unit: SI, `deg`, or nothing.
    pub unit: String,
    /// The law or formula it comes from; `as asked` where it was given.
    pub ground: String,
}

/// How closely the sections were fitted.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct SectionFit {
    /// Largest distance between a section and its fit, of the chord.
    pub max_deviation: f64,
    /// Control points of each upper side.
    pub upper_points: usize,
    /// Control points of each lower side.
    pub lower_points: usize,
}

/// Figures of the facets.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct MeshFigures {
    /// Their number.
    pub facets: usize,
    /// Largest distance between a facet and the surface.
    pub max_deviation: f64,
    /// Whether they are closed, also in 32-bit numbers.
    pub watertight: bool,
}

/// The record as JSON text, keys in a fixed order, ending in a line feed.
///
/// # Panics
///
/// Never: a record holds nothing that JSON cannot say.
pub fn json(record: &Record) -> String {
    let mut text =
        serde_json::to_string_pretty(record).expect("a record has text keys and plain values only");
    text.push('\n');
    text
}
