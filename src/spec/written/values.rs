//! Values that are more than a number, a text or a word.

use super::reader::{Entry, Given, Section, given};
use crate::spec::document::Value;
use crate::spec::keys::Kind;
use crate::spec::quantity::Dimension;

/// A number, or the word that its key takes in the place of one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::spec) enum Worded {
    /// The number: mm, mm², rad, SI or a ratio.
    Number(f64),
    /// The word.
    Word,
}

impl Section<'_> {
    /// The number under a key, or its word.
    pub(super) fn number_or(&mut self, key: &str) -> Entry<Worded> {
        let Kind::NumberOr(dimension, range, word) = self.known(key).kind else {
            unreachable!("{key} is read as the number or word that the table's list says it is")
        };
        let Some(node) = self.member(key) else {
            return Entry::Absent;
        };
        if matches!(&node.value, Value::Text(text) if text.trim() == word) {
            return Entry::Given(given(node, Worded::Word));
        }
        let entry = self.quantity(node, dimension, &range);
        self.state(&entry);
        match entry {
            Entry::Given(number) => Entry::Given(Given {
                value: Worded::Number(number.value),
                place: number.place,
                text: number.text,
                scale: number.scale,
            }),
            Entry::Absent | Entry::Unreadable => {
                self.advise(&format!(" Or write \"{word}\"."));
                Entry::Unreadable
            }
        }
    }

    /// The altitude under a key \[mm\]. It has to come with its unit: bare lengths are in the wing's, bare speeds and
    /// densities beside it in SI, so that a bare altitude could be either.
    pub(super) fn altitude(&mut self, key: &str) -> Entry<f64> {
        let bare = match self.member(key).map(|node| (node, &node.value)) {
            Some((node, Value::Number(number))) if *number != 0.0 => Some(node),
            Some((node, Value::Text(text))) if text.trim().parse::<f64>().is_ok() => Some(node),
            _ => None,
        };
        match bare {
            Some(node) => self.wrong(
                node,
                "an altitude needs its unit: a bare one could be in the unit of the wing's lengths or in metres"
                    .to_owned(),
                "Write it like \"120 m\" or \"400 ft\".".to_owned(),
            ),
            None => self.number(key),
        }
    }

    /// The point under a key \[mm\].
    pub(super) fn point(&mut self, key: &str) -> Entry<[f64; 3]> {
        let Kind::Point(range) = self.known(key).kind else {
            unreachable!("{key} is read as the point that the table's list says it is")
        };
        let Some(node) = self.member(key) else {
            return Entry::Absent;
        };
        let Value::List(items) = &node.value else {
            return self.wrong(
                node,
                "a point is expected: three lengths".to_owned(),
                format!("Write it like {key} = [820, 0, 95]."),
            );
        };
        let [x, y, z] = items.as_slice() else {
            let problem = format!("a point is expected: three lengths, not {}", items.len());
            return self.wrong(node, problem, format!("Write it like {key} = [820, 0, 95]."));
        };
        let read = [x, y, z].map(|item| self.quantity(item, Dimension::Length, &range));
        let [Entry::Given(x), Entry::Given(y), Entry::Given(z)] = read else {
            return Entry::Unreadable;
        };
        Entry::Given(Given {
            scale: y.scale,
            ..given(node, [x.value, y.value, z.value])
        })
    }

    /// The truth value under a key.
    pub(super) fn flag(&mut self, key: &str) -> Entry<bool> {
        self.known(key);
        let Some(node) = self.member(key) else {
            return Entry::Absent;
        };
        match node.value {
            Value::Truth(truth) => Entry::Given(given(node, truth)),
            _ => self.wrong(
                node,
                "true or false is expected".to_owned(),
                format!("Write {key} = true or {key} = false, without quotes."),
            ),
        }
    }
}
