//! The closed B-rep of a wing and its check.

use truck_modeling::Solid as Shape;

/// A closed solid: the kernel's shape and what each of its faces is.
#[derive(Clone, Debug)]
pub struct Solid {
    /// The part's name, such as `wing` or `wing starboard`.
    pub name: String,
    /// The shape: one closed shell. Surfaces are planes or B-spline surfaces (non-rational), edge curves lines or B-splines,
    /// each running from the edge's first vertex to its second.
    pub shape: Shape,
    /// What each face is, in the order of `shape.boundaries()[0]`.
    pub faces: Vec<FaceLabel>,
}

/// What a face of the wing is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct FaceLabel {
    /// Its part in the wing.
    pub kind: FaceKind,
    /// Panel, counted from the root from 1; the end panel's number for a cap.
    pub panel: usize,
    /// The side it is on.
    pub side: Side,
}

/// The parts of a wing's surface.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum FaceKind {
    /// Upper skin of a panel.
    Upper,
    /// Lower skin of a panel.
    Lower,
    /// Base of a blunt trailing edge.
    TrailingEdge,
    /// Root cap.
    Root,
    /// Tip cap.
    Tip,
}

/// A side of the aircraft.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// y > 0.
    Starboard,
    /// y < 0.
    Port,
}
