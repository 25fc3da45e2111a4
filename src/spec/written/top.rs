//! The keys above the first table: the wing's name and description, and the unit of bare lengths.

use super::{Entry, Section};
use crate::spec::Unit;
use crate::spec::keys::{Key, Table};

pub(super) const TABLE: Table = Table {
    name: "",
    many: false,
    keys: &[
        Key::text("name"),
        Key::text("description"),
        Key::choice("unit", &["mm", "cm", "m", "in", "ft"]),
    ],
};

/// The keys above the first table.
#[derive(Debug)]
pub(in crate::spec) struct Top {
    pub(in crate::spec) name: Entry<String>,
    pub(in crate::spec) description: Entry<String>,
    pub(in crate::spec) unit: Entry<Unit>,
}

impl Top {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        let units = [
            Unit::Millimetre,
            Unit::Centimetre,
            Unit::Metre,
            Unit::Inch,
            Unit::Foot,
        ];
        Self {
            name: section.text("name"),
            description: section.text("description"),
            unit: section.choice("unit", |word| {
                units.into_iter().find(|unit| unit.symbol() == word)
            }),
        }
    }
}
