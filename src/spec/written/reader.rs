//! Reads values of the tables by their keys and gathers every fault.

use crate::spec::document::{Node, Value};
use crate::spec::fault::{Fault, Place};
use crate::spec::keys::{self, Kind, Range, Table};
use crate::spec::quantity::{self, Dimension, Scale, one_of};
use crate::spec::{Stated, Unit};

/// A value as the file has it.
#[derive(Clone, Debug)]
pub(in crate::spec) enum Entry<T> {
    /// Not in the file.
    Absent,
    /// In the file (or needed and missing), and a fault says what is wrong with it.
    Unreadable,
    /// In the file, and right by itself.
    Given(Given<T>),
}

/// A value that was given.
#[derive(Clone, Debug)]
pub(in crate::spec) struct Given<T> {
    /// The value: mm, mm², rad, a ratio, a word or a text.
    pub(in crate::spec) value: T,
    /// Where it was typed.
    pub(in crate::spec) place: Place,
    /// The text as typed.
    pub(in crate::spec) text: String,
    /// The unit it was typed in.
    pub(in crate::spec) scale: Scale,
}

impl<T> Entry<T> {
    /// The value and its place, if it was given.
    pub(in crate::spec) fn given(&self) -> Option<&Given<T>> {
        match self {
            Self::Given(given) => Some(given),
            Self::Absent | Self::Unreadable => None,
        }
    }

    /// True where a fault has been reported for it.
    pub(in crate::spec) fn is_unreadable(&self) -> bool {
        matches!(self, Self::Unreadable)
    }
}

impl<T: Clone> Entry<T> {
    /// The value, or `default` where none was given.
    pub(in crate::spec) fn or(&self, default: T) -> T {
        self.given().map_or(default, |given| given.value.clone())
    }
}

impl<T: Clone + Default> Entry<T> {
    /// The value, or its type's default where none was given.
    pub(in crate::spec) fn or_default(&self) -> T {
        self.or(T::default())
    }
}

/// Reads a document and gathers faults.
#[derive(Debug)]
pub(in crate::spec) struct Reader {
    /// Unit of bare lengths; `None` while it is not known, because its own text is wrong.
    unit: Option<Unit>,
    /// Every fault so far.
    pub(in crate::spec) faults: Vec<Fault>,
    /// Every size so far that the built wing is compared with.
    pub(in crate::spec) stated: Vec<Stated>,
}

impl Reader {
    /// A reader without faults; bare lengths are in mm.
    pub(in crate::spec) fn new() -> Self {
        Self {
            unit: Some(Unit::default()),
            faults: Vec::new(),
            stated: Vec::new(),
        }
    }

    /// From here on, bare lengths are in this unit.
    pub(super) fn bare_in(&mut self, unit: &Entry<Unit>) {
        self.unit = if unit.is_unreadable() {
            None
        } else {
            Some(unit.or(Unit::default()))
        };
    }

    /// The keys of the top level.
    pub(super) fn top<'a>(&'a mut self, root: &'a Node) -> Section<'a> {
        Section {
            reader: self,
            node: Some(root),
            table: keys::table("").expect("the top level is in the list"),
        }
    }

    /// The table of this name.
    pub(super) fn section<'a>(&'a mut self, root: &'a Node, table: &'static Table) -> Section<'a> {
        let node = root.member(table.name);
        match node.map(|node| &node.value) {
            None | Some(Value::Table(_)) => Section {
                reader: self,
                node,
                table,
            },
            Some(_) => {
                let remedy = format!("Write [{}] once, with its keys below it.", table.name);
                self.fault(node, "a table is expected".to_owned(), remedy);
                Section {
                    reader: self,
                    node: None,
                    table,
                }
            }
        }
    }

    /// Every table of an array of tables.
    pub(super) fn each<T>(
        &mut self,
        root: &Node,
        table: &'static Table,
        read: fn(&mut Section<'_>) -> T,
    ) -> Vec<T> {
        let node = root.member(table.name);
        let remedy = format!("Write [[{}]] above the keys of each one.", table.name);
        let items = match node.map(|node| &node.value) {
            None => return Vec::new(),
            Some(Value::List(items)) => items,
            Some(_) => {
                self.fault(node, "an array of tables is expected".to_owned(), remedy);
                return Vec::new();
            }
        };
        if items.is_empty() && !node.is_some_and(Node::is_left_by_failed_set) {
            self.fault(node, format!("at least one {} is needed", table.name), remedy);
            return Vec::new();
        }
        let mut all = Vec::new();
        for item in items {
            if matches!(item.value, Value::Table(_)) {
                all.push(read(&mut Section {
                    reader: self,
                    node: Some(item),
                    table,
                }));
            } else {
                self.fault(Some(item), "a table is expected".to_owned(), remedy.clone());
            }
        }
        all
    }

    fn fault(&mut self, node: Option<&Node>, problem: String, remedy: String) {
        if let Some(node) = node {
            self.faults.push(Fault {
                place: node.place.clone(),
                text: node.text.clone(),
                problem,
                remedy,
            });
        }
    }
}

/// One table of the document being read; absent tables read as empty.
#[derive(Debug)]
pub(in crate::spec) struct Section<'a> {
    reader: &'a mut Reader,
    node: Option<&'a Node>,
    table: &'static Table,
}

impl<'a> Section<'a> {
    /// Where the table stands.
    pub(super) fn place(&self) -> Place {
        self.node.map_or_else(Place::default, |node| node.place.clone())
    }

    /// As [`Section::number`], and a fault where the key is missing.
    pub(super) fn needed_number(&mut self, key: &str) -> Entry<f64> {
        if self.node.is_none() {
            Entry::Absent
        } else if self.is_there(key) {
            self.number(key)
        } else {
            Entry::Unreadable
        }
    }

    /// As [`Section::text`], and a fault where the key is missing.
    pub(super) fn needed_text(&mut self, key: &str) -> Entry<String> {
        if self.is_there(key) {
            self.text(key)
        } else {
            Entry::Unreadable
        }
    }

    fn is_there(&mut self, key: &str) -> bool {
        let there = self.member(key).is_some();
        if !there {
            let name = self.table.name;
            let remedy = if self.table.many {
                format!("Add {key} to this [[{name}]].")
            } else {
                format!("Add {key} to [{name}].")
            };
            self.reader.fault(self.node, format!("{key} is missing"), remedy);
        }
        there
    }

    /// The number under a key of the table's list.
    pub(super) fn number(&mut self, key: &str) -> Entry<f64> {
        let known = self.known(key);
        let Kind::Number(dimension, range) = known.kind else {
            unreachable!("{key} is read as the number that the table's list says it is")
        };
        let Some(node) = self.member(key) else {
            return Entry::Absent;
        };
        let entry = self.quantity(node, dimension, &range);
        if known.stated {
            self.state(&entry);
        }
        entry
    }

    /// Keeps a size for the comparison with the built wing.
    pub(super) fn state(&mut self, entry: &Entry<f64>) {
        if let Entry::Given(given) = entry {
            self.reader.stated.push(Stated {
                key: given.place.key.clone(),
                value: given.value,
            });
        }
    }

    /// Adds to what the last fault advises.
    pub(super) fn advise(&mut self, more: &str) {
        if let Some(fault) = self.reader.faults.last_mut() {
            fault.remedy += more;
        }
    }

    /// The text under a key: not empty, at most 10,000 characters, none of them a control character.
    pub(super) fn text(&mut self, key: &str) -> Entry<String> {
        self.known(key);
        self.member(key)
            .map_or(Entry::Absent, |node| self.text_of(node, key))
    }

    /// The text that a node holds, which stands under a key.
    pub(super) fn text_of(&mut self, node: &Node, key: &str) -> Entry<String> {
        const LONGEST: usize = 10_000;
        let Value::Text(text) = &node.value else {
            let remedy = format!("Write it in double quotes: {key} = \"…\".");
            return self.wrong(node, "a text is expected".to_owned(), remedy);
        };
        let (problem, remedy) = if text.trim().is_empty() {
            (
                "the text is empty".to_owned(),
                "Write something, or delete the line.",
            )
        } else if text.chars().any(char::is_control) {
            (
                "the text has a control character in it".to_owned(),
                "Write it on one line, without tabs.",
            )
        } else if text.chars().count() > LONGEST {
            (
                format!(
                    "the text has {} characters; allowed: {LONGEST}",
                    text.chars().count()
                ),
                "Shorten it.",
            )
        } else {
            return Entry::Given(given(node, text.clone()));
        };
        self.wrong(node, problem, remedy.to_owned())
    }

    /// The word under a key, turned into what it means. `meaning` knows every word of the key's list.
    pub(super) fn choice<T>(&mut self, key: &str, meaning: impl Fn(&str) -> Option<T>) -> Entry<T> {
        let Kind::Choice(words) = self.known(key).kind else {
            unreachable!("{key} is read as the choice that the table's list says it is")
        };
        let Some(node) = self.member(key) else {
            return Entry::Absent;
        };
        if let Value::Text(text) = &node.value
            && words.contains(&text.as_str())
            && let Some(value) = meaning(text)
        {
            return Entry::Given(given(node, value));
        }
        let quoted: Vec<_> = words.iter().map(|word| format!("\"{word}\"")).collect();
        let allowed = one_of(&quoted.iter().map(String::as_str).collect::<Vec<_>>());
        self.wrong(
            node,
            "not one of the words that this key knows".to_owned(),
            format!("Write {allowed}."),
        )
    }

    /// A table in the place of a value, to be read with its own list of keys.
    pub(super) fn within<'b>(&'b mut self, node: &'b Node, table: &'static Table) -> Section<'b> {
        Section {
            reader: self.reader,
            node: Some(node),
            table,
        }
    }

    pub(super) fn known(&self, key: &str) -> &'static keys::Key {
        keys::key(self.table, key).expect("every key that is read is in its table's list")
    }

    pub(super) fn member(&self, key: &str) -> Option<&'a Node> {
        self.node.and_then(|node| node.member(key))
    }

    pub(super) fn wrong<T>(&mut self, node: &Node, problem: String, remedy: String) -> Entry<T> {
        self.reader.fault(Some(node), problem, remedy);
        Entry::Unreadable
    }

    pub(super) fn quantity(&mut self, node: &Node, dimension: Dimension, range: &Range) -> Entry<f64> {
        let bare = match (self.reader.unit, dimension) {
            // what a bare length means is not known, and the fault is the unit's
            (None, Dimension::Length | Dimension::Area) if matches!(node.value, Value::Number(_)) => {
                return Entry::Unreadable;
            }
            (unit, _) => dimension.bare(unit.unwrap_or_default()),
        };
        let (value, scale) = match &node.value {
            Value::Number(number) => (number * bare.factor, bare),
            Value::Text(text) => match quantity::parse(text, dimension, bare) {
                Ok(found) => found,
                Err(error) => return self.wrong(node, error.to_string(), error.remedy()),
            },
            _ => {
                let remedy = format!("Write a number, or {}.", dimension.example());
                return self.wrong(node, format!("{} is expected", dimension.noun()), remedy);
            }
        };
        if range.holds(value) {
            return Entry::Given(Given {
                scale,
                ..given(node, value)
            });
        }
        let mut remedy = range.remedy.to_owned();
        if remedy.is_empty() {
            remedy = format!("Write {} in that range", dimension.noun());
            let bare_length = matches!(node.value, Value::Number(_)) && !scale.symbol.is_empty();
            remedy += &if bare_length {
                format!("; a bare number is in {}.", scale.symbol)
            } else {
                ".".to_owned()
            };
        }
        self.wrong(node, format!("out of range; allowed: {}", range.words), remedy)
    }
}

pub(super) fn given<T>(node: &Node, value: T) -> Given<T> {
    Given {
        value,
        place: node.place.clone(),
        text: node.text.clone(),
        scale: Scale::ONE,
    }
}
