//! `[tip]`: how the wing ends.

use super::{Entry, Section};
use crate::spec::TipForm;
use crate::spec::keys::{Key, Table};

pub(super) const TABLE: Table = Table {
    name: "tip",
    many: false,
    keys: &[Key::choice("form", &["square", "round"])],
};

/// The table `[tip]`.
#[derive(Debug)]
pub(in crate::spec) struct Tip {
    pub(in crate::spec) form: Entry<TipForm>,
}

impl Tip {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            form: section.choice("form", |word| match word {
                "square" => Some(TipForm::Square),
                "round" => Some(TipForm::Round),
                _ => None,
            }),
        }
    }
}
