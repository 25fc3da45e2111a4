//! The report: one self-contained HTML page with drawing, picture, proof, chains, sections and notes.
//!
//! It needs no script, no font and no network, and says so to the browser (content security policy).

mod page;

pub use page::page;

use super::drawing::{SectionShape, Sheet};
use super::record::Record;
use crate::mesh::Mesh;
use crate::planform::Reference;

/// What the report shows.
#[derive(Clone, Debug)]
pub struct Report<'a> {
    /// All figures.
    pub record: &'a Record,
    /// Millimetres in one of the record's units.
    pub unit: f64,
    /// The dimensioned drawing.
    pub drawing: &'a Sheet,
    /// Facets for the picture.
    pub meshes: &'a [Mesh],
    /// Construction lines for the picture.
    pub reference: &'a Reference,
    /// The sections at the root, the mean aerodynamic chord and the tip.
    pub sections: &'a [SectionShape],
    /// How figures follow from each other, chain by chain.
    pub chains: Vec<Chain>,
    /// The date, where one was given.
    pub date: Option<&'a str>,
}

/// Figures that follow from each other.
#[derive(Clone, Debug, PartialEq)]
pub struct Chain {
    /// What they lead to, such as `Incidence`.
    pub title: &'static str,
    /// The steps, in order.
    pub steps: Vec<Step>,
}

/// One figure of a chain.
#[derive(Clone, Debug, PartialEq)]
pub struct Step {
    /// What it is.
    pub name: String,
    /// Its value with its unit.
    pub value: String,
    /// The law or formula that it comes from.
    pub ground: String,
}
