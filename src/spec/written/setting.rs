//! `[setting]`: incidence, twist, and the axis that sections turn about.

use super::values::Worded;
use super::{Entry, Section};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Angle, Ratio};
use crate::spec::{IncidenceAt, TwistKind, TwistLaw};

pub(super) const TABLE: Table = Table {
    name: "setting",
    many: false,
    keys: &[
        Key::size_or("incidence", Angle, Range::TURN, "cruise"),
        Key::choice("at", &["mac", "root"]),
        Key::size("twist", Angle, Range::TURN),
        Key::choice("twist_kind", &["geometric", "aerodynamic"]),
        Key::choice("twist_law", &["straight", "linear"]),
        Key::detail("twist_axis", Ratio, Range::FRACTION),
    ],
};

/// The table `[setting]`.
#[derive(Debug)]
pub(in crate::spec) struct Setting {
    /// An angle, or the word for the one that carries the weight in cruise.
    pub(in crate::spec) incidence: Entry<Worded>,
    pub(in crate::spec) at: Entry<IncidenceAt>,
    pub(in crate::spec) twist: Entry<f64>,
    pub(in crate::spec) twist_kind: Entry<TwistKind>,
    pub(in crate::spec) twist_law: Entry<TwistLaw>,
    pub(in crate::spec) twist_axis: Entry<f64>,
}

impl Setting {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            incidence: section.number_or("incidence"),
            at: section.choice("at", |word| match word {
                "mac" => Some(IncidenceAt::Mac),
                "root" => Some(IncidenceAt::Root),
                _ => None,
            }),
            twist: section.number("twist"),
            twist_kind: section.choice("twist_kind", |word| match word {
                "geometric" => Some(TwistKind::Geometric),
                "aerodynamic" => Some(TwistKind::Aerodynamic),
                _ => None,
            }),
            twist_law: section.choice("twist_law", |word| match word {
                "straight" => Some(TwistLaw::Straight),
                "linear" => Some(TwistLaw::Linear),
                _ => None,
            }),
            twist_axis: section.number("twist_axis"),
        }
    }
}
