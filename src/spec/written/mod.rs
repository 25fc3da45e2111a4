//! The spec as the file says it: every value optional, each with its place. One file a table.
//!
//! To add a table: a file here with its `TABLE` and its type, an entry in [`TABLES`], a field in [`Written`].

mod airfoil;
mod build;
mod facets;
mod line;
mod panel;
mod planform;
mod reader;
mod setting;
mod top;
mod trailing_edge;

pub(super) use airfoil::Airfoil;
pub(super) use build::Build;
pub(super) use facets::Facets;
pub(super) use line::Line;
pub(super) use panel::Panel;
pub(super) use planform::Planform;
pub(super) use reader::{Entry, Given, Reader, Section};
pub(super) use setting::Setting;
pub(super) use top::Top;
pub(super) use trailing_edge::TrailingEdge;

use super::document::Node;
use super::keys::Table;

/// Every table of a spec; the top level first.
pub(super) const TABLES: &[&Table] = &[
    &top::TABLE,
    &planform::TABLE,
    &setting::TABLE,
    &airfoil::TABLE,
    &panel::TABLE,
    &trailing_edge::TABLE,
    &facets::TABLE,
    &build::TABLE,
    &line::TABLE,
];

/// What the file says.
#[derive(Debug)]
pub(super) struct Written {
    /// Keys of the top level.
    pub(super) top: Top,
    /// Sizes and angles of the whole wing.
    pub(super) planform: Planform,
    /// Incidence and twist.
    pub(super) setting: Setting,
    /// Sections at root and tip.
    pub(super) airfoil: Airfoil,
    /// Panels from the root outwards.
    pub(super) panels: Vec<Panel>,
    /// The trailing edge.
    pub(super) trailing_edge: TrailingEdge,
    /// The facets.
    pub(super) facets: Facets,
    /// What is built.
    pub(super) build: Build,
    /// Extra construction lines.
    pub(super) lines: Vec<Line>,
}

impl Written {
    /// Reads a document; faults go to the reader.
    pub(super) fn read(root: &Node, reader: &mut Reader) -> Self {
        // the unit first: bare lengths are in it
        let top = Top::read(&mut reader.top(root));
        reader.bare_in(&top.unit);
        Self {
            top,
            planform: Planform::read(&mut reader.section(root, &planform::TABLE)),
            setting: Setting::read(&mut reader.section(root, &setting::TABLE)),
            airfoil: Airfoil::read(&mut reader.section(root, &airfoil::TABLE)),
            panels: reader.each(root, &panel::TABLE, Panel::read),
            trailing_edge: TrailingEdge::read(&mut reader.section(root, &trailing_edge::TABLE)),
            facets: Facets::read(&mut reader.section(root, &facets::TABLE)),
            build: Build::read(&mut reader.section(root, &build::TABLE)),
            lines: reader.each(root, &line::TABLE, Line::read),
        }
    }
}
