//! What the faces of a wing are called.

use std::fmt;

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
    /// Tip: a plane cap, or half ellipses.
    Tip,
    /// Half disc behind a round tip on a blunt trailing edge.
    TipEnd,
}

/// A side of the aircraft.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// y > 0.
    Starboard,
    /// y < 0.
    Port,
}

impl fmt::Display for Side {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::Starboard => "starboard",
            Self::Port => "port",
        })
    }
}
