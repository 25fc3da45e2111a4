//! The style sheet: layers, colours and line fonts.
//!
//! Kinds of lines differ in lightness as well as in hue, and in their fonts, so that they can be told apart with any
//! colour vision and in black and white. Red and green are never the only difference.

use crate::planform::LineKind;
use crate::solid::FaceKind;

/// A layer: its name and what is on it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Layer {
    pub(super) name: &'static str,
    pub(super) description: &'static str,
}

/// How a kind of line is drawn.
#[derive(Clone, Copy, Debug)]
pub(super) struct LineStyle {
    pub(super) layer: Layer,
    /// sRGB, 0 to 1.
    pub(super) colour: [f64; 3],
    /// A font that ISO 10303-46 defines: continuous, dashed, dotted, chain or chain double dash.
    pub(super) font: &'static str,
    /// \[mm\]
    pub(super) width: f64,
}

/// The solids' layer.
pub(super) const SOLID_LAYER: Layer = Layer {
    name: "WING_SOLID",
    description: "the solid of the built wing",
};

/// Colour of a solid, for readers that show no colours of faces; sRGB.
pub(super) const SOLID_COLOUR: [f64; 3] = [0.72, 0.78, 0.84];

/// The layer of reference points.
pub(super) const POINT_LAYER: Layer = Layer {
    name: "REFERENCE_POINT",
    description: "named points such as the aerodynamic centre",
};

/// Colour of reference points, sRGB.
pub(super) const POINT_COLOUR: [f64; 3] = [0.55, 0.05, 0.40];

/// Size of the marker of a reference point \[mm\].
pub(super) const POINT_SIZE: f64 = 4.0;

/// Colour of a kind of face, sRGB.
pub(super) const fn face_colour(kind: FaceKind) -> [f64; 3] {
    match kind {
        FaceKind::Upper => [0.80, 0.86, 0.91],
        FaceKind::Lower => [0.55, 0.63, 0.71],
        FaceKind::TrailingEdge => [0.93, 0.76, 0.38],
        FaceKind::Root => [0.36, 0.42, 0.50],
        FaceKind::Tip => [0.45, 0.52, 0.60],
    }
}

/// How a kind of line is drawn.
pub(super) const fn line_style(kind: LineKind) -> LineStyle {
    let (name, description, colour, font, width) = match kind {
        LineKind::Outline => (
            "REFERENCE_OUTLINE",
            "outline of the reference wing",
            [0.10, 0.22, 0.45],
            "continuous",
            0.35,
        ),
        LineKind::QuarterChord => (
            "QUARTER_CHORD_LINE",
            "quarter-chord lines",
            [0.85, 0.45, 0.05],
            "chain",
            0.25,
        ),
        LineKind::MeanAerodynamicChord => (
            "MEAN_AERODYNAMIC_CHORD",
            "mean aerodynamic chords",
            [0.55, 0.05, 0.40],
            "continuous",
            0.5,
        ),
        LineKind::Chord => (
            "CHORD_LINE",
            "root and tip chord lines",
            [0.35, 0.60, 0.80],
            "dashed",
            0.25,
        ),
        LineKind::Centreline => (
            "CENTRELINE",
            "centreline of the aircraft",
            [0.20, 0.20, 0.20],
            "chain double dash",
            0.25,
        ),
        LineKind::TwistAxis => (
            "TWIST_AXIS",
            "line that the sections turn about",
            [0.05, 0.45, 0.45],
            "dotted",
            0.25,
        ),
        LineKind::Custom => (
            "CONSTRUCTION_LINE",
            "spars, hinge lines and the like",
            [0.70, 0.58, 0.10],
            "dashed",
            0.35,
        ),
    };
    LineStyle {
        layer: Layer { name, description },
        colour,
        font,
        width,
    }
}
