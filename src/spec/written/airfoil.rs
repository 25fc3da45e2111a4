//! `[airfoil]`: the sections at root and tip, each a text, or a table with changes.

use super::reader::{Entry, Given, Section};
use crate::spec::document::{Node, Value};
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::Ratio;
use crate::spec::{AirfoilChanges, AirfoilForm};

pub(super) const TABLE: Table = Table {
    name: "airfoil",
    many: false,
    keys: &[Key::airfoil("root"), Key::airfoil("tip")],
};

/// Keys of a table in the place of an airfoil's text.
pub(in crate::spec) const CHANGED: Table = Table {
    name: "",
    many: false,
    keys: &[
        Key::text("naca"),
        Key::text("file"),
        Key::detail("thickness", Ratio, Range::SECTION_THICKNESS),
        Key::detail("camber", Ratio, Range::SECTION_CAMBER),
        Key::flag("inverted"),
        Key::detail("fairing", Ratio, Range::FAIRING),
    ],
};

/// An airfoil as written.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::spec) struct Source {
    pub(in crate::spec) text: String,
    pub(in crate::spec) form: AirfoilForm,
    pub(in crate::spec) changes: AirfoilChanges,
}

/// The table `[airfoil]`.
#[derive(Debug)]
pub(in crate::spec) struct Airfoil {
    pub(in crate::spec) root: Entry<Source>,
    pub(in crate::spec) tip: Entry<Source>,
}

impl Airfoil {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            root: section.airfoil("root"),
            tip: section.airfoil("tip"),
        }
    }
}

impl Section<'_> {
    /// The airfoil under a key: a text, or a table with `naca` or `file` and changes. Its place is the text's.
    pub(super) fn airfoil(&mut self, key: &str) -> Entry<Source> {
        self.known(key);
        match self.member(key) {
            None => Entry::Absent,
            Some(node) if matches!(node.value, Value::Table(_)) => self.within(node, &CHANGED).changed(node),
            Some(Node {
                value: Value::Text(_),
                ..
            }) => with_text(self.text(key), AirfoilForm::Either, AirfoilChanges::default()),
            Some(node) => {
                let remedy = format!(
                    "Write {key} = \"NACA 2412\", or {key} = {{ naca = \"2412\", thickness = 0.105 }}."
                );
                self.wrong(
                    node,
                    "a text is expected, or a table with changes".to_owned(),
                    remedy,
                )
            }
        }
    }

    fn changed(&mut self, node: &Node) -> Entry<Source> {
        let (naca, file) = (self.text("naca"), self.text("file"));
        let changes = [
            self.number("thickness"),
            self.number("camber"),
            self.number("fairing"),
        ];
        let inverted = self.flag("inverted");
        let unreadable = inverted.is_unreadable() || changes.iter().any(Entry::is_unreadable);
        let [thickness, camber, fairing] = changes.map(|entry| entry.given().map(|given| given.value));
        let changes = AirfoilChanges {
            thickness,
            camber,
            inverted: inverted.or(false),
            fairing,
        };
        let (text, form) = match (naca, file) {
            (Entry::Unreadable, _) | (_, Entry::Unreadable) => return Entry::Unreadable,
            (Entry::Given(naca), Entry::Given(_)) => {
                let problem = format!(
                    "contradicts naca = {} ({}): a section comes from one of the two",
                    naca.text,
                    naca.place.short()
                );
                let at = node.member("file").unwrap_or(node);
                return self.wrong(at, problem, "Delete one of them.".to_owned());
            }
            (naca @ Entry::Given(_), Entry::Absent) => (naca, AirfoilForm::Designation),
            (Entry::Absent, file @ Entry::Given(_)) => (file, AirfoilForm::File),
            (Entry::Absent, Entry::Absent) => match &node.plain {
                Some(plain) => (self.text_of(plain, "root"), AirfoilForm::Either),
                None => {
                    return self.wrong(
                        node,
                        "naca or file is missing: what section is changed".to_owned(),
                        "Add naca = \"2412\", or file = \"…\" with a coordinate file's path.".to_owned(),
                    );
                }
            },
        };
        if unreadable {
            return Entry::Unreadable;
        }
        with_text(text, form, changes)
    }
}

fn with_text(text: Entry<String>, form: AirfoilForm, changes: AirfoilChanges) -> Entry<Source> {
    match text {
        Entry::Absent => Entry::Absent,
        Entry::Unreadable => Entry::Unreadable,
        Entry::Given(Given {
            value,
            place,
            text,
            scale,
        }) => Entry::Given(Given {
            value: Source {
                text: value,
                form,
                changes,
            },
            place,
            text,
            scale,
        }),
    }
}
