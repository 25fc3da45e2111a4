//! `[[line]]`: an extra construction line, such as a spar or a hinge line.

use super::{Entry, Section};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::Ratio;

pub(super) const TABLE: Table = Table {
    name: "line",
    many: true,
    keys: &[
        Key::text("name"),
        Key::detail("chord_fraction", Ratio, Range::FRACTION),
        Key::detail("from", Ratio, Range::FRACTION),
        Key::detail("to", Ratio, Range::FRACTION),
    ],
};

/// A table `[[line]]`.
#[derive(Debug)]
pub(in crate::spec) struct Line {
    pub(in crate::spec) name: Entry<String>,
    pub(in crate::spec) chord_fraction: Entry<f64>,
    pub(in crate::spec) from: Entry<f64>,
    pub(in crate::spec) to: Entry<f64>,
}

impl Line {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            name: section.needed_text("name"),
            chord_fraction: section.needed_number("chord_fraction"),
            from: section.number("from"),
            to: section.number("to"),
        }
    }
}
