//! `[build]`: what is built.

use super::{Entry, Section};
use crate::spec::Sides;
use crate::spec::keys::{Key, Table};

pub(super) const TABLE: Table = Table {
    name: "build",
    many: false,
    keys: &[
        Key::choice("sides", &["both", "starboard", "port", "pair"]),
        Key::choice("surface", &["ruled"]),
    ],
};

/// The table `[build]`.
#[derive(Debug)]
pub(in crate::spec) struct Build {
    pub(in crate::spec) sides: Entry<Sides>,
}

impl Build {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        section.choice("surface", |_| Some(()));
        Self {
            sides: section.choice("sides", |word| match word {
                "both" => Some(Sides::Both),
                "starboard" => Some(Sides::Starboard),
                "port" => Some(Sides::Port),
                "pair" => Some(Sides::Pair),
                _ => None,
            }),
        }
    }
}
