//! `[airfoil]`: the sections at root and tip.

use super::{Entry, Section};
use crate::spec::keys::{Key, Table};

pub(super) const TABLE: Table = Table {
    name: "airfoil",
    many: false,
    keys: &[Key::text("root"), Key::text("tip")],
};

/// The table `[airfoil]`.
#[derive(Debug)]
pub(in crate::spec) struct Airfoil {
    pub(in crate::spec) root: Entry<String>,
    pub(in crate::spec) tip: Entry<String>,
}

impl Airfoil {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            root: section.text("root"),
            tip: section.text("tip"),
        }
    }
}
