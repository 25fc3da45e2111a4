//! The closed B-rep of a wing and its check.
//!
//! Topology and shared edges are the kernel's (truck): a vertex or edge is one object wherever it is used, so a shell
//! that is closed by the kernel's count really is closed.

mod build;
mod check;
mod label;

pub use build::build;
pub use check::{Finding, check};
pub use label::{FaceKind, FaceLabel, Side};

use thiserror::Error;
use truck_modeling::Solid as Shape;

/// A closed solid: the kernel's shape and what each of its faces is.
#[derive(Clone, Debug)]
pub struct Solid {
    /// The part's name, such as `wing` or `wing starboard`.
    pub name: String,
    /// The shape: one closed shell. Surfaces are planes or B-spline surfaces, edge curves lines or B-splines, each
    /// running from the edge's first vertex to its second.
    pub shape: Shape,
    /// What each face is, in the order of `shape.boundaries()[0]`.
    pub faces: Vec<FaceLabel>,
}

/// Faults of a solid. Each is a fault of this program and not of its input.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Error {
    /// The kernel refused a face or the shell.
    #[error("the solid could not be put together: {what} ({source})")]
    Topology {
        /// What was being made.
        what: String,
        /// The kernel's reason.
        source: truck_modeling::errors::Error,
    },
    /// The finished solid failed its check.
    #[error("the finished solid is not sound: {0}")]
    Unsound(Finding),
}
