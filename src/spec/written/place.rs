//! `[place]`: where the wing goes.

use super::{Entry, Section};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::Length;

pub(super) const TABLE: Table = Table {
    name: "place",
    many: false,
    keys: &[
        Key::detail("x", Length, Range::PLACE),
        Key::detail("y", Length, Range::PLACE),
        Key::detail("z", Length, Range::PLACE),
        Key::point("aerodynamic_centre", Range::PLACE),
    ],
};

/// The table `[place]`.
#[derive(Debug)]
pub(in crate::spec) struct Place {
    pub(in crate::spec) x: Entry<f64>,
    pub(in crate::spec) y: Entry<f64>,
    pub(in crate::spec) z: Entry<f64>,
    pub(in crate::spec) aerodynamic_centre: Entry<[f64; 3]>,
}

impl Place {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            x: section.number("x"),
            y: section.number("y"),
            z: section.number("z"),
            aerodynamic_centre: section.point("aerodynamic_centre"),
        }
    }
}
