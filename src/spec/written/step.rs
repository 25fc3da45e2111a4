//! `[step]`: how the STEP file is written.

use super::{Entry, Section};
use crate::spec::keys::{Key, Table};
use crate::spec::{StepReference, StepSchema};

pub(super) const TABLE: Table = Table {
    name: "step",
    many: false,
    keys: &[
        Key::choice(
            "reference",
            &["both", "construction", "wireframe", "parts", "none"],
        ),
        Key::choice("schema", &["AP242", "AP214"]),
    ],
};

/// The table `[step]`.
#[derive(Debug)]
pub(in crate::spec) struct Step {
    pub(in crate::spec) reference: Entry<StepReference>,
    pub(in crate::spec) schema: Entry<StepSchema>,
}

impl Step {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            reference: section.choice("reference", |word| match word {
                "both" => Some(StepReference::Both),
                "construction" => Some(StepReference::Construction),
                "wireframe" => Some(StepReference::Wireframe),
                "parts" => Some(StepReference::Parts),
                "none" => Some(StepReference::None),
                _ => None,
            }),
            schema: section.choice("schema", |word| match word {
                "AP242" => Some(StepSchema::Ap242),
                "AP214" => Some(StepSchema::Ap214),
                _ => None,
            }),
        }
    }
}
