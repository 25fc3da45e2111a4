//! The whole path: a spec's text in, a wing with all its figures and files out.
//!
//! Nothing here touches the disk: coordinate files are read by a function that the caller gives, and files are handed
//! back as bytes.

mod asks;
mod contents;
mod cut;
mod drawing;
mod files;
mod library;
mod notes;
mod prepare;
mod record;
mod report;
mod section;
mod shape;
mod source;
#[cfg(test)]
mod tests;

pub use contents::Contents;
pub use cut::{Cut, Outside};
pub use files::{Kind, Options};
pub use library::Library;
pub use prepare::{Prepared, prepare, prepare_with};
pub use section::{section_drawing, section_record};
pub use shape::Wing;
pub use source::{LoadedSection, Refused, SectionAsk};

use thiserror::Error;

use crate::{airfoil, loft, mesh, planform, solid, write::step};

/// What can go wrong after the spec has been read.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Error {
    /// The sections cannot be fitted together.
    #[error(transparent)]
    Airfoil(#[from] airfoil::Error),
    /// The wing cannot be laid out.
    #[error(transparent)]
    Planform(#[from] planform::Error),
    /// The sections cannot be joined to a wing.
    #[error(transparent)]
    Loft(#[from] loft::Error),
    /// The solid is not sound: a fault of this program.
    #[error("{0}; this is a fault of spanwise itself: please report it with the spec file")]
    Solid(#[from] solid::Error),
    /// The facets are not sound.
    #[error(
        "the facets are not sound: {0}; take a larger `[facets] tolerance` or a larger `unit` number: the STL format's 32-bit numbers are too coarse for facets this small"
    )]
    Mesh(mesh::Finding),
    /// The STEP file cannot be written.
    #[error(transparent)]
    Step(#[from] step::Error),
}
