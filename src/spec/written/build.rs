//! `[build]`: what is built.

use super::{Entry, Section};
use crate::spec::keys::{Key, Table};
use crate::spec::{Sides, SurfaceKind};

pub(super) const TABLE: Table = Table {
    name: "build",
    many: false,
    keys: &[
        Key::choice("sides", &["both", "starboard", "port", "pair"]),
        Key::choice("surface", &["ruled", "smooth"]),
    ],
};

/// The table `[build]`.
#[derive(Debug)]
pub(in crate::spec) struct Build {
    pub(in crate::spec) sides: Entry<Sides>,
    pub(in crate::spec) surface: Entry<SurfaceKind>,
}

impl Build {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            sides: section.choice("sides", |word| match word {
                "both" => Some(Sides::Both),
                "starboard" => Some(Sides::Starboard),
                "port" => Some(Sides::Port),
                "pair" => Some(Sides::Pair),
                _ => None,
            }),
            surface: section.choice("surface", |word| match word {
                "ruled" => Some(SurfaceKind::Ruled),
                "smooth" => Some(SurfaceKind::Smooth),
                _ => None,
            }),
        }
    }
}
