//! The style sheet: layers, colours and line fonts.
//!
//! Kinds of lines can be told apart without seeing red from green or blue from yellow: any two are at least ten units
//! of CIELAB apart without a* and without b*, and two with the same font differ by ten in lightness.

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
pub(super) const POINT_COLOUR: [f64; 3] = [0.65, 0.10, 0.48];

/// Size of the marker of a reference point \[mm\].
pub(super) const POINT_SIZE: f64 = 4.0;

/// Colour of a kind of face, sRGB.
pub(super) const fn face_colour(kind: FaceKind) -> [f64; 3] {
    match kind {
        FaceKind::Upper => [0.80, 0.86, 0.91],
        FaceKind::Lower => [0.55, 0.63, 0.71],
        FaceKind::TrailingEdge => [0.93, 0.76, 0.38],
        FaceKind::Root => [0.36, 0.42, 0.50],
        FaceKind::Tip | FaceKind::TipEnd => [0.45, 0.52, 0.60],
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
            [0.75, 0.33, 0.05],
            "chain",
            0.25,
        ),
        LineKind::MeanAerodynamicChord => (
            "MEAN_AERODYNAMIC_CHORD",
            "mean aerodynamic chords",
            [0.65, 0.10, 0.48],
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
            [0.10, 0.10, 0.10],
            "chain double dash",
            0.25,
        ),
        LineKind::TwistAxis => (
            "TWIST_AXIS",
            "line that the sections turn about",
            [0.00, 0.50, 0.45],
            "dotted",
            0.25,
        ),
        LineKind::Custom => (
            "CONSTRUCTION_LINE",
            "spars, hinge lines and the like",
            [0.80, 0.68, 0.15],
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

#[cfg(test)]
mod tests {
    use super::line_style;
    use crate::planform::LineKind;

    /// CIELAB under D65 (CIE 15) of an sRGB colour (IEC 61966-2-1).
    fn lab(rgb: [f64; 3]) -> [f64; 3] {
        let linear = |x: f64| {
            if x <= 0.04045 {
                x / 12.92
            } else {
                ((x + 0.055) / 1.055).powf(2.4)
            }
        };
        let [r, g, b] = rgb.map(linear);
        let root = |t: f64| {
            if t > 216.0 / 24389.0 {
                t.cbrt()
            } else {
                (24389.0 / 27.0 * t + 16.0) / 116.0
            }
        };
        let x = root((0.4124564 * r + 0.3575761 * g + 0.1804375 * b) / 0.95047);
        let y = root(0.2126729 * r + 0.7151522 * g + 0.0721750 * b);
        let z = root((0.0193339 * r + 0.1191920 * g + 0.9503041 * b) / 1.08883);
        [116.0 * y - 16.0, 500.0 * (x - y), 200.0 * (y - z)]
    }

    #[test]
    fn kinds_of_lines_can_be_told_apart_with_any_colour_vision() {
        use LineKind::{Centreline, Chord, Custom, MeanAerodynamicChord, Outline, QuarterChord, TwistAxis};
        let kinds = [
            Outline,
            QuarterChord,
            MeanAerodynamicChord,
            Chord,
            Centreline,
            TwistAxis,
            Custom,
        ];
        for (i, one) in kinds.into_iter().enumerate() {
            for other in kinds.into_iter().skip(i + 1) {
                let (p, q) = (line_style(one), line_style(other));
                let (a, b) = (lab(p.colour), lab(q.colour));
                let [light, red_green, yellow_blue] = [0, 1, 2].map(|k| (a[k] - b[k]).abs());
                assert!(light.hypot(yellow_blue) >= 10.0, "{one:?} {other:?} without a*");
                assert!(light.hypot(red_green) >= 10.0, "{one:?} {other:?} without b*");
                assert!(
                    p.font != q.font || light >= 10.0,
                    "{one:?} {other:?} in black and white"
                );
                assert_ne!(p.layer, q.layer);
            }
        }
    }
}
