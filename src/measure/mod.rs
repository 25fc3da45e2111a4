//! Figures taken back from the exact faces, by slicing and quadrature.
//!
//! Nothing here knows how the wing was laid out: it sees faces only, and compares what it finds with numbers it is told.

mod compare;
mod slice;
mod solid;

pub use compare::{Ask, Check, Quantity, compare};
pub use slice::{Chord, Planform, Slices, Spanwise};
pub use solid::{Figures, figures};
