//! `[cruise]`: speed and air in cruise. Bare numbers are SI.

use super::{Entry, Section};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Density, Length, Speed};

pub(super) const TABLE: Table = Table {
    name: "cruise",
    many: false,
    keys: &[
        Key::detail("speed", Speed, Range::SPEED),
        Key::detail("altitude", Length, Range::ALTITUDE),
        Key::detail("density", Density, Range::DENSITY),
    ],
};

/// The table `[cruise]`.
#[derive(Debug)]
pub(in crate::spec) struct Cruise {
    /// \[m/s\]
    pub(in crate::spec) speed: Entry<f64>,
    /// \[mm\]
    pub(in crate::spec) altitude: Entry<f64>,
    /// \[kg/m³\]
    pub(in crate::spec) density: Entry<f64>,
}

impl Cruise {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            speed: section.needed_number("speed"),
            altitude: section.altitude("altitude"),
            density: section.number("density"),
        }
    }
}
