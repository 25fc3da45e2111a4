//! `[load]`: what the wing carries, and how its area is sized. Bare numbers are SI.

use super::{Entry, Section};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Density, Force, Length, Loading, Mass, Ratio, Speed};

pub(super) const TABLE: Table = Table {
    name: "load",
    many: false,
    keys: &[
        Key::detail("mass", Mass, Range::MASS),
        Key::detail("weight", Force, Range::WEIGHT),
        Key::detail("wing_loading", Loading, Range::LOADING),
        Key::detail("stall_speed", Speed, Range::SPEED),
        Key::detail("max_lift_coefficient", Ratio, Range::LIFT),
        Key::detail("altitude", Length, Range::ALTITUDE),
        Key::detail("density", Density, Range::DENSITY),
    ],
};

/// The table `[load]`.
#[derive(Debug)]
pub(in crate::spec) struct Load {
    /// \[kg\]
    pub(in crate::spec) mass: Entry<f64>,
    /// \[N\]
    pub(in crate::spec) weight: Entry<f64>,
    /// \[N/m²\]
    pub(in crate::spec) wing_loading: Entry<f64>,
    /// \[m/s\]
    pub(in crate::spec) stall_speed: Entry<f64>,
    /// \[-\]
    pub(in crate::spec) max_lift_coefficient: Entry<f64>,
    /// \[mm\]
    pub(in crate::spec) altitude: Entry<f64>,
    /// \[kg/m³\]
    pub(in crate::spec) density: Entry<f64>,
}

impl Load {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            mass: section.number("mass"),
            weight: section.number("weight"),
            wing_loading: section.number("wing_loading"),
            stall_speed: section.number("stall_speed"),
            max_lift_coefficient: section.number("max_lift_coefficient"),
            altitude: section.altitude("altitude"),
            density: section.number("density"),
        }
    }

    /// Its entries, in the order of the list of keys.
    pub(in crate::spec) fn entries(&self) -> [&Entry<f64>; 7] {
        [
            &self.mass,
            &self.weight,
            &self.wing_loading,
            &self.stall_speed,
            &self.max_lift_coefficient,
            &self.altitude,
            &self.density,
        ]
    }
}
