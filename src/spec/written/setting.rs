//! `[setting]`: incidence, twist, and the axis that sections turn about.

use super::{Entry, Section};
use crate::spec::IncidenceAt;
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Angle, Ratio};

pub(super) const TABLE: Table = Table {
    name: "setting",
    many: false,
    keys: &[
        Key::size("incidence", Angle, Range::TURN),
        Key::choice("at", &["mac", "root"]),
        Key::size("twist", Angle, Range::TURN),
        Key::choice("twist_kind", &["geometric"]),
        Key::detail("twist_axis", Ratio, Range::FRACTION),
    ],
};

/// The table `[setting]`.
#[derive(Debug)]
pub(in crate::spec) struct Setting {
    pub(in crate::spec) incidence: Entry<f64>,
    pub(in crate::spec) at: Entry<IncidenceAt>,
    pub(in crate::spec) twist: Entry<f64>,
    pub(in crate::spec) twist_axis: Entry<f64>,
}

impl Setting {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        section.choice("twist_kind", |_| Some(()));
        Self {
            incidence: section.number("incidence"),
            at: section.choice("at", |word| match word {
                "mac" => Some(IncidenceAt::Mac),
                "root" => Some(IncidenceAt::Root),
                _ => None,
            }),
            twist: section.number("twist"),
            twist_axis: section.number("twist_axis"),
        }
    }
}
