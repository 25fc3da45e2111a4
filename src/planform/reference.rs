//! Construction geometry as the files show it.

use nalgebra::Point3;

/// Construction geometry that goes into the files beside the solid \[mm\].
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Reference {
    /// Named straight or broken lines.
    pub lines: Vec<ReferenceLine>,
    /// Named points.
    pub points: Vec<ReferencePoint>,
}

/// A named straight or broken line: at least two points, none repeated.
#[derive(Clone, Debug, PartialEq)]
pub struct ReferenceLine {
    /// Unique, such as `quarter-chord line, starboard`.
    pub name: String,
    /// What it shows.
    pub kind: LineKind,
    /// Its corners \[mm\].
    pub points: Vec<Point3<f64>>,
}

/// A named point.
#[derive(Clone, Debug, PartialEq)]
pub struct ReferencePoint {
    /// Unique, such as `aerodynamic centre`.
    pub name: String,
    /// Where it is \[mm\].
    pub point: Point3<f64>,
}

/// What a reference line shows; each kind has a layer, a colour and a line type of its own.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum LineKind {
    /// Outline of the reference wing.
    Outline,
    /// Quarter-chord line.
    QuarterChord,
    /// Mean aerodynamic chord.
    MeanAerodynamicChord,
    /// Root and tip chord lines.
    Chord,
    /// The aircraft's centreline along the root.
    Centreline,
    /// Line that the sections turn about.
    TwistAxis,
    /// A line that the spec asks for.
    Custom,
}
