//! Parameters by place and type; what is not as expected is a finding with its line.

use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange, Record, Value, decode};

/// What was read, or the finding why not.
pub(super) type Read<T> = Result<T, Finding>;

/// One record of an instance.
#[derive(Clone, Debug)]
pub(super) struct Args<'a> {
    /// The instance's number.
    pub(super) id: u64,
    /// Its line.
    pub(super) line: u32,
    /// The entity.
    pub(super) keyword: &'a str,
    values: Vec<Value<'a>>,
}

/// A finding at a line.
pub(super) fn finding(line: u32, what: impl Into<String>) -> Finding {
    Finding {
        line: Some(line),
        what: what.into(),
    }
}

/// An instance's record of an entity.
pub(super) fn args<'a>(file: &Exchange<'a>, entry: Entry, keyword: &str) -> Read<Args<'a>> {
    let kind = file.kind_of(entry);
    match file.instance_at(entry).record(keyword) {
        Some(Record { keyword, values }) => Ok(Args {
            id: entry.id,
            line: entry.line,
            keyword,
            values,
        }),
        None => {
            let is = kind.keywords.join(" ");
            Err(finding(
                entry.line,
                format!("#{} is {is} where {keyword} is expected", entry.id),
            ))
        }
    }
}

impl<'a> Args<'a> {
    fn wrong<T>(&self, i: usize, wanted: &str) -> Read<T> {
        let found = match self.values.get(i) {
            None => "nothing".to_owned(),
            Some(Value::Text(_)) => "a text".to_owned(),
            Some(Value::List(list)) => format!("a list of {}", list.len()),
            Some(Value::Reference(id)) => format!("#{id}"),
            Some(Value::Enumeration(value)) => format!(".{value}."),
            Some(Value::Real(x)) => format!("{x:?}"),
            Some(Value::Integer(x)) => format!("{x}"),
            Some(Value::Typed(name, _)) => (*name).to_owned(),
            Some(Value::Binary(_)) => "a binary".to_owned(),
            Some(Value::Omitted) => "$".to_owned(),
            Some(Value::Derived) => "*".to_owned(),
        };
        Err(finding(
            self.line,
            format!(
                "#{} {}: parameter {} is {found} where {wanted} is expected",
                self.id,
                self.keyword,
                i + 1
            ),
        ))
    }

    pub(super) fn value(&self, i: usize) -> Option<&Value<'a>> {
        self.values.get(i)
    }

    pub(super) fn text(&self, i: usize) -> Read<String> {
        match self.values.get(i) {
            Some(Value::Text(text)) => {
                decode(text).map_err(|what| finding(self.line, format!("#{}: {what}", self.id)))
            }
            Some(Value::Omitted) => Ok(String::new()),
            _ => self.wrong(i, "a text"),
        }
    }

    pub(super) fn real(&self, i: usize) -> Read<f64> {
        match self.values.get(i).and_then(number) {
            Some(x) => Ok(x),
            None => self.wrong(i, "a number"),
        }
    }

    pub(super) fn count(&self, i: usize) -> Read<usize> {
        match self.values.get(i) {
            Some(Value::Integer(n)) if (0..1 << 20).contains(n) => Ok(usize::try_from(*n).unwrap_or(0)),
            _ => self.wrong(i, "a small whole number"),
        }
    }

    pub(super) fn flag(&self, i: usize) -> Read<bool> {
        match self.values.get(i) {
            Some(Value::Enumeration("T")) => Ok(true),
            Some(Value::Enumeration("F")) => Ok(false),
            _ => self.wrong(i, ".T. or .F."),
        }
    }

    /// True where a logical is `.T.`; `.U.` and `.F.` say nothing.
    pub(super) fn says_true(&self, i: usize) -> bool {
        self.values.get(i) == Some(&Value::Enumeration("T"))
    }

    pub(super) fn list(&self, i: usize) -> Read<&[Value<'a>]> {
        match self.values.get(i) {
            Some(Value::List(list)) => Ok(list),
            _ => self.wrong(i, "a list"),
        }
    }

    pub(super) fn reals(&self, i: usize) -> Read<Vec<f64>> {
        match self.list(i)?.iter().map(number).collect() {
            Some(numbers) => Ok(numbers),
            None => self.wrong(i, "a list of numbers"),
        }
    }

    pub(super) fn counts(&self, i: usize) -> Read<Vec<usize>> {
        let count = |value: &Value<'_>| match value {
            Value::Integer(n) if (0..1 << 20).contains(n) => usize::try_from(*n).ok(),
            _ => None,
        };
        match self.list(i)?.iter().map(count).collect() {
            Some(counts) => Ok(counts),
            None => self.wrong(i, "a list of small whole numbers"),
        }
    }

    pub(super) fn reference(&self, i: usize) -> Read<u64> {
        match self.values.get(i) {
            Some(Value::Reference(id)) => Ok(*id),
            _ => self.wrong(i, "a reference"),
        }
    }

    pub(super) fn references(&self, i: usize) -> Read<Vec<u64>> {
        match references_of(self.list(i)?) {
            Some(ids) => Ok(ids),
            None => self.wrong(i, "a list of references"),
        }
    }

    /// A list of lists of references.
    pub(super) fn net(&self, i: usize) -> Read<Vec<Vec<u64>>> {
        let row = |value: &Value<'_>| match value {
            Value::List(list) => references_of(list),
            _ => None,
        };
        match self.list(i)?.iter().map(row).collect() {
            Some(rows) => Ok(rows),
            None => self.wrong(i, "a list of lists of references"),
        }
    }

    /// A list of lists of numbers.
    pub(super) fn real_net(&self, i: usize) -> Read<Vec<Vec<f64>>> {
        let row = |value: &Value<'_>| match value {
            Value::List(list) => list.iter().map(number).collect(),
            _ => None,
        };
        match self.list(i)?.iter().map(row).collect() {
            Some(rows) => Ok(rows),
            None => self.wrong(i, "a list of lists of numbers"),
        }
    }

    /// Where an instance stands that this one names.
    pub(super) fn named(&self, file: &Exchange<'a>, id: u64) -> Read<Entry> {
        let missing = || {
            finding(
                self.line,
                format!("#{} {}: there is no #{id}", self.id, self.keyword),
            )
        };
        file.entry(id).ok_or_else(missing)
    }

    /// The record of an entity in an instance that this one names.
    pub(super) fn record_of(&self, file: &Exchange<'a>, id: u64, keyword: &str) -> Read<Self> {
        args(file, self.named(file, id)?, keyword).map_err(|fault| {
            finding(
                self.line,
                format!("#{} {}: {}", self.id, self.keyword, fault.what),
            )
        })
    }

    /// The record of an entity in the instance that a parameter names.
    pub(super) fn follow(&self, file: &Exchange<'a>, i: usize, keyword: &str) -> Read<Self> {
        self.record_of(file, self.reference(i)?, keyword)
    }
}

/// A real or whole number.
pub(super) fn number(value: &Value<'_>) -> Option<f64> {
    match value {
        Value::Real(x) => Some(*x),
        Value::Integer(n) => Some(*n as f64),
        _ => None,
    }
}

fn references_of(list: &[Value<'_>]) -> Option<Vec<u64>> {
    let reference = |value: &Value<'_>| match value {
        Value::Reference(id) => Some(*id),
        _ => None,
    };
    list.iter().map(reference).collect()
}
