//! The spec as the file says it: every value optional, each with its place. One file a table.
//!
//! To add a table: a file here with its `TABLE` and its type, an entry in [`TABLES`], a field in [`Written`].

mod airfoil;
mod body;
mod build;
mod cruise;
mod facets;
mod line;
mod load;
mod panel;
mod place;
mod planform;
mod reader;
mod setting;
mod step;
mod tip;
mod top;
mod trailing_edge;
mod values;

pub(super) use airfoil::{Airfoil, CHANGED, Source as AirfoilText};
pub(super) use body::Body;
pub(super) use build::Build;
pub(super) use cruise::Cruise;
pub(super) use facets::Facets;
pub(super) use line::Line;
pub(super) use load::Load;
pub(super) use panel::Panel;
pub(super) use place::Place;
pub(super) use planform::Planform;
pub(super) use reader::{Entry, Given, Reader, Section};
pub(super) use setting::Setting;
pub(super) use step::Step;
pub(super) use tip::Tip;
pub(super) use top::Top;
pub(super) use trailing_edge::TrailingEdge;
pub(super) use values::Worded;

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
    &step::TABLE,
    &line::TABLE,
    &load::TABLE,
    &cruise::TABLE,
    &body::TABLE,
    &place::TABLE,
    &tip::TABLE,
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
    /// The STEP file.
    pub(super) step: Step,
    /// Extra construction lines.
    pub(super) lines: Vec<Line>,
    /// What the wing carries.
    pub(super) load: Load,
    /// Speed and air in cruise.
    pub(super) cruise: Cruise,
    /// The fuselage.
    pub(super) body: Body,
    /// Where the wing goes.
    pub(super) place: Place,
    /// How it ends.
    pub(super) tip: Tip,
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
            step: Step::read(&mut reader.section(root, &step::TABLE)),
            lines: reader.each(root, &line::TABLE, Line::read),
            load: Load::read(&mut reader.section(root, &load::TABLE)),
            cruise: Cruise::read(&mut reader.section(root, &cruise::TABLE)),
            body: Body::read(&mut reader.section(root, &body::TABLE)),
            place: Place::read(&mut reader.section(root, &place::TABLE)),
            tip: Tip::read(&mut reader.section(root, &tip::TABLE)),
        }
    }
}
