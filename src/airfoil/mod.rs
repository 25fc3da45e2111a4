//! Airfoil sections: from a designation or a coordinate file to fitted profiles of unit chord.
//!
//! A [`Section`] is exact: a formula, or a smooth curve through the points of a file. [`fit`] puts all sections of a
//! wing on shared knots.

mod camber_line;
mod changes;
pub mod coordinates;
mod designation;
mod drawing;
mod figures;
mod fit;
mod formula;
mod points;
mod section;
mod side;
mod taylor;
mod thickness;
mod waviness;

pub use camber_line::CamberLine;
pub use changes::Changes;
pub use designation::{UnknownDesignation, is_designation, parse};
pub use drawing::Curvature;
pub use figures::{Figures, Greatest};
pub use fit::{Profile, Profiles, TOLERANCE, fit};
pub use formula::{Camber, Formula};
pub use section::{Outline, Section};
pub use thickness::{Closing, Form, Thickness};
pub use waviness::Waviness;

use thiserror::Error;

/// What can be wrong with a section.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Error {
    /// The designation names no section.
    #[error(transparent)]
    Designation(#[from] UnknownDesignation),
    /// The formula gives a section that crosses itself.
    #[error(
        "{name} crosses itself near the nose: its mean line is too steep for its thickness; take less camber, or put its greatest value further aft"
    )]
    Crosses {
        /// The section.
        name: String,
    },
    /// The coordinate file cannot be read as a section.
    #[error(transparent)]
    Coordinates(#[from] coordinates::Error),
    /// No smooth curve passes the file's points closely enough.
    #[error(
        "{name}: no smooth curve passes all its points within {within:e} of the chord; check for a point out of line, or allow more fairing"
    )]
    Rough {
        /// The section.
        name: String,
        /// How close it should pass \[chord\].
        within: f64,
    },
    /// The surface has a corner.
    #[error(
        "{name}: its mean line bends so sharply at {percent:.0} % of the chord that the surface has a corner of {degrees:.1} degrees there, which a smooth surface cannot follow; take less camber, or put its greatest value further forward"
    )]
    Corner {
        /// The section.
        name: String,
        /// Where on the mean line, per cent of the chord.
        percent: f64,
        /// Its angle \[°\].
        degrees: f64,
    },
    /// A change that the section cannot have.
    #[error("{name}: {reason}")]
    Change {
        /// The section.
        name: String,
        /// What stands against it, and what to do.
        reason: String,
    },
    /// No reasonable number of control points reaches the tolerance.
    #[error(
        "the sections {sections} could not be fitted together within {tolerance:e} of the chord; smooth the coordinates or use fewer different sections"
    )]
    Fit {
        /// The sections' names.
        sections: String,
        /// The tolerance \[chord\].
        tolerance: f64,
    },
}

#[cfg(test)]
mod tests;
