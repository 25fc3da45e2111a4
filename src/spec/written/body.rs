//! `[body]`: the fuselage at the wing.

use super::{Entry, Section};
use crate::spec::Position;
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::Length;

pub(super) const TABLE: Table = Table {
    name: "body",
    many: false,
    keys: &[
        Key::detail("width", Length, Range::LENGTH),
        Key::choice("position", &["high", "mid", "low"]),
        Key::flag("carry_through"),
    ],
};

/// The table `[body]`.
#[derive(Debug)]
pub(in crate::spec) struct Body {
    pub(in crate::spec) width: Entry<f64>,
    pub(in crate::spec) position: Entry<Position>,
    pub(in crate::spec) carry_through: Entry<bool>,
}

impl Body {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            width: section.needed_number("width"),
            position: section.choice("position", |word| match word {
                "high" => Some(Position::High),
                "mid" => Some(Position::Mid),
                "low" => Some(Position::Low),
                _ => None,
            }),
            carry_through: section.flag("carry_through"),
        }
    }
}
