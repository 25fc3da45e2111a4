//! The text as a tree of values that know where they were typed, with `--set` values put in.

use std::collections::BTreeMap;
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::fault::{Fault, Place, excerpt};
use super::keys::{self, Kind};
use super::written::CHANGED;

/// A value of the document.
#[derive(Clone, Debug)]
pub(super) struct Node {
    /// Where it was typed; a table's place is its header's.
    pub(super) place: Place,
    /// The text as typed, shortened for messages; empty for a table.
    pub(super) text: String,
    /// The value.
    pub(super) value: Value,
    /// The text that stood here before `--set` gave it changes and so made it a table.
    pub(super) plain: Option<Box<Self>>,
}

impl Node {
    /// True for an empty table or list that a `--set` made on its way to a place that does not exist; it has a fault.
    pub(super) fn is_left_by_failed_set(&self) -> bool {
        self.place.file == Place::SET && self.text.is_empty()
    }

    /// The value under a name, if this is a table.
    pub(super) fn member(&self, name: &str) -> Option<&Self> {
        match &self.value {
            Value::Table(members) => members.get(name),
            _ => None,
        }
    }
}

/// What a node holds.
#[derive(Clone, Debug)]
pub(super) enum Value {
    /// Integer or float; may be infinite or not a number.
    Number(f64),
    /// A text.
    Text(String),
    /// True or false.
    Truth(bool),
    /// A date: nothing in a spec is one.
    Other,
    /// An array.
    List(Vec<Node>),
    /// A table.
    Table(BTreeMap<String, Node>),
}

/// Reads TOML; `file` is the name for messages.
///
/// # Errors
/// One [`Fault`] with the line, if the text is not TOML.
pub(super) fn parse(text: &str, file: &str) -> Result<Node, Box<Fault>> {
    let origin = Origin {
        text,
        file,
        lines: line_starts(text),
    };
    match DeTable::parse(text) {
        Ok(table) => Ok(origin.table(table.get_ref(), "", 0..0)),
        Err(error) => Err(Box::new(origin.syntax_fault(&error))),
    }
}

/// A text that nodes come from.
struct Origin<'a> {
    text: &'a str,
    file: &'a str,
    /// Where each line starts; empty for a text without lines.
    lines: Vec<usize>,
}

fn line_starts(text: &str) -> Vec<usize> {
    std::iter::once(0)
        .chain(text.match_indices('\n').map(|(i, _)| i + 1))
        .collect()
}

impl Origin<'_> {
    fn line(&self, at: usize) -> usize {
        self.lines.partition_point(|&start| start <= at)
    }

    fn syntax_fault(&self, error: &toml::de::Error) -> Fault {
        let at = error.span().map_or(0, |span| span.start).min(self.text.len());
        // the end of the text belongs to the last line that has something on it
        let at = if at == self.text.len() {
            self.text.trim_end().len()
        } else {
            at
        };
        let line = self.line(at);
        let typed = self.text.lines().nth(line.saturating_sub(1)).unwrap_or("").trim();
        Fault {
            place: Place {
                file: self.file.to_owned(),
                line,
                key: String::new(),
            },
            text: excerpt(typed),
            problem: format!("not valid TOML: {} in {:?}", error.message(), excerpt(typed)),
            remedy: if error.message().starts_with("duplicate") {
                "Write each key and each table once; delete one of the two.".to_owned()
            } else {
                "A line is [table], [[table]] or key = value; texts stand in double quotes.".to_owned()
            },
        }
    }

    fn place(&self, key: &str, at: usize) -> Place {
        Place {
            file: self.file.to_owned(),
            line: self.line(at),
            key: key.to_owned(),
        }
    }

    fn table(&self, table: &DeTable<'_>, path: &str, header: Range<usize>) -> Node {
        let mut members = BTreeMap::new();
        for (key, value) in table {
            let name = key.get_ref().to_string();
            let path = join(path, &name);
            members.insert(name, self.node(value, &path, &key.span()));
        }
        Node {
            place: self.place(path, header.start),
            text: String::new(),
            value: Value::Table(members),
            plain: None,
        }
    }

    /// `header` is where the key stands that names the value.
    fn node(&self, value: &Spanned<DeValue<'_>>, path: &str, header: &Range<usize>) -> Node {
        let span = value.span();
        let typed = self.text.get(span.clone()).unwrap_or("");
        let parsed = match value.get_ref() {
            DeValue::Table(table) => return self.table(table, path, header.clone()),
            DeValue::String(text) => Value::Text(text.to_string()),
            DeValue::Integer(integer) => Value::Number(number(integer.as_str(), integer.radix())),
            DeValue::Float(float) => Value::Number(float.as_str().parse().unwrap_or(f64::NAN)),
            DeValue::Boolean(truth) => Value::Truth(*truth),
            DeValue::Datetime(_) => Value::Other,
            DeValue::Array(array) => {
                let items = array.iter().enumerate();
                Value::List(
                    items
                        .map(|(i, v)| self.node(v, &join(path, &i.to_string()), &v.span()))
                        .collect(),
                )
            }
        };
        let at = if matches!(parsed, Value::List(_)) {
            header.start
        } else {
            span.start
        };
        // what [[table]] makes has no text of its own either
        let text = if typed.starts_with("[[") {
            String::new()
        } else {
            excerpt(typed)
        };
        Node {
            place: self.place(path, at),
            text,
            value: parsed,
            plain: None,
        }
    }
}

/// An integer in a base; not a number where it has more than 38 digits in a base other than ten.
fn number(digits: &str, radix: u32) -> f64 {
    if radix == 10 {
        return digits.parse().unwrap_or(f64::NAN);
    }
    u64::from_str_radix(digits, radix).map_or(f64::NAN, |n| n as f64)
}

fn join(path: &str, name: &str) -> String {
    if path.is_empty() {
        name.to_owned()
    } else {
        format!("{path}.{name}")
    }
}

/// How many parts the longest dotted key has, as in `panel.0.airfoil.camber`.
const DEEPEST: usize = 4;

/// Puts a `--set` value into the tree: overrides, or adds.
///
/// # Errors
/// A [`Fault`], if the path leads nowhere. Whether the key is known is checked with the rest of the document.
pub(super) fn set(root: &mut Node, key: &str, value: &str) -> Result<(), Box<Fault>> {
    let text = value.trim();
    let parts: Vec<&str> = key.trim().split('.').map(str::trim).collect();
    let place = |key: String| Place {
        file: Place::SET.to_owned(),
        line: 0,
        key,
    };
    let fault = |problem: String, remedy: &str| {
        let (place, text) = (place(excerpt(key)), excerpt(text));
        Box::new(Fault {
            place,
            text,
            problem,
            remedy: remedy.to_owned(),
        })
    };
    if parts.iter().any(|part| part.is_empty()) {
        return Err(fault(
            "the key is not complete".to_owned(),
            "Write --set KEY=VALUE with a dotted key, such as planform.taper_ratio=0.5 or panel.0.sweep=3.",
        ));
    }
    if parts.len() > DEEPEST {
        return Err(fault(
            "no key has so many parts".to_owned(),
            "The longest are like panel.0.airfoil.camber.",
        ));
    }
    let mut node = root;
    let mut path = String::new();
    for (depth, part) in parts.iter().enumerate() {
        let empty = || Node {
            place: place(join(&path, part)),
            text: String::new(),
            value: match keys::table(part) {
                Some(table) if table.many && depth == 0 => Value::List(Vec::new()),
                _ => Value::Table(BTreeMap::new()),
            },
            plain: None,
        };
        if is_airfoil(&parts[..depth]) && matches!(node.value, Value::Text(_)) {
            let table = Node {
                place: place(path.clone()),
                text: String::new(),
                value: Value::Table(BTreeMap::new()),
                plain: None,
            };
            let plain = std::mem::replace(node, table);
            node.plain = Some(Box::new(plain));
        }
        node = match &mut node.value {
            Value::Table(members) => members.entry((*part).to_owned()).or_insert_with(empty),
            Value::List(items) => {
                let count = items.len();
                match part.parse::<usize>() {
                    Ok(i) if i < count => &mut items[i],
                    Ok(i) if i == count => {
                        items.push(empty());
                        &mut items[i]
                    }
                    _ => {
                        let problem = format!(
                            "{path} has {count} entries, counted from 0, and {part:?} is none of them"
                        );
                        return Err(fault(
                            problem,
                            "Count the entries from 0; the next number adds one.",
                        ));
                    }
                }
            }
            _ => {
                let problem = format!("{path} holds a value, so there is no {part:?} in it");
                return Err(fault(problem, "Set the value itself."));
            }
        };
        path = join(&path, part);
    }
    *node = typed(&parts, text, place(path));
    Ok(())
}

/// What the value at a dotted path is.
fn kind(parts: &[&str]) -> Option<Kind> {
    let (table, name) = match *parts {
        [name] => ("", name),
        [table, name] | [table, _, name] => (table, name),
        _ => return None,
    };
    keys::key(keys::table(table)?, name).map(|key| key.kind)
}

fn is_airfoil(parts: &[&str]) -> bool {
    matches!(kind(parts), Some(Kind::Airfoil))
}

/// The node for a `--set` value: TOML where it is TOML, otherwise the bare text. A key that wants text takes digits too.
fn typed(parts: &[&str], text: &str, place: Place) -> Node {
    let kind = match parts {
        [before @ .., name] if is_airfoil(before) => keys::key(&CHANGED, name).map(|key| key.kind),
        _ => kind(parts),
    };
    let wants_text = matches!(kind, Some(Kind::Text | Kind::Choice(_) | Kind::Airfoil));
    let bare = Value::Text(text.to_owned());
    let origin = Origin {
        text,
        file: Place::SET,
        lines: Vec::new(),
    };
    let parsed = DeValue::parse(text)
        .ok()
        .map(|value| origin.node(&value, &place.key, &(0..0)).value);
    let value = match parsed {
        Some(value @ Value::Text(_)) => value,
        Some(value @ Value::Table(_)) if matches!(kind, Some(Kind::Airfoil)) => value,
        Some(value) if !wants_text => value,
        _ => bare,
    };
    Node {
        place,
        text: excerpt(text),
        value,
        plain: None,
    }
}
