//! `[trailing_edge]`: how thick the trailing edge is built.

use super::{Entry, Section};
use crate::spec::SharpBy;
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Length, Ratio};

pub(super) const TABLE: Table = Table {
    name: "trailing_edge",
    many: false,
    keys: &[
        Key::detail("thickness", Length, Range::THICKNESS),
        Key::detail("proportion", Ratio, Range::PROPORTION),
        Key::choice("closing", &["coefficient", "extension"]),
    ],
};

/// The table `[trailing_edge]`.
#[derive(Debug)]
pub(in crate::spec) struct TrailingEdge {
    pub(in crate::spec) thickness: Entry<f64>,
    pub(in crate::spec) proportion: Entry<f64>,
    pub(in crate::spec) closing: Entry<SharpBy>,
}

impl TrailingEdge {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            thickness: section.number("thickness"),
            proportion: section.number("proportion"),
            closing: section.choice("closing", |word| match word {
                "coefficient" => Some(SharpBy::Coefficient),
                "extension" => Some(SharpBy::Extension),
                _ => None,
            }),
        }
    }
}
