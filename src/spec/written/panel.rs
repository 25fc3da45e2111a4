//! `[[panel]]`: one panel between two stations, root outwards.

use super::{AirfoilText, Entry, Section};
use crate::spec::Place;
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Angle, Length, Ratio};

pub(super) const TABLE: Table = Table {
    name: "panel",
    many: true,
    keys: &[
        Key::size("span", Length, Range::LENGTH),
        Key::size("tip_chord", Length, Range::CHORD),
        Key::size("sweep", Angle, Range::SWEEP),
        Key::detail("sweep_at", Ratio, Range::FRACTION),
        Key::size("dihedral", Angle, Range::DIHEDRAL),
        Key::size("twist", Angle, Range::TURN),
        Key::airfoil("airfoil"),
    ],
};

/// A table `[[panel]]`.
#[derive(Debug)]
pub(in crate::spec) struct Panel {
    pub(in crate::spec) place: Place,
    pub(in crate::spec) span: Entry<f64>,
    pub(in crate::spec) tip_chord: Entry<f64>,
    pub(in crate::spec) sweep: Entry<f64>,
    pub(in crate::spec) sweep_at: Entry<f64>,
    pub(in crate::spec) dihedral: Entry<f64>,
    pub(in crate::spec) twist: Entry<f64>,
    pub(in crate::spec) airfoil: Entry<AirfoilText>,
}

impl Panel {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            place: section.place(),
            span: section.needed_number("span"),
            tip_chord: section.needed_number("tip_chord"),
            sweep: section.number("sweep"),
            sweep_at: section.number("sweep_at"),
            dihedral: section.number("dihedral"),
            twist: section.number("twist"),
            airfoil: section.airfoil("airfoil"),
        }
    }
}
