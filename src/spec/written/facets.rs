//! `[facets]`: how close the facets are to the surface.

use super::{Entry, Section};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::Length;

pub(super) const TABLE: Table = Table {
    name: "facets",
    many: false,
    keys: &[Key::detail("tolerance", Length, Range::TOLERANCE)],
};

/// The table `[facets]`.
#[derive(Debug)]
pub(in crate::spec) struct Facets {
    pub(in crate::spec) tolerance: Entry<f64>,
}

impl Facets {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            tolerance: section.number("tolerance"),
        }
    }
}
