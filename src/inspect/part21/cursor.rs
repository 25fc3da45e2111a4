//! A place in an exchange structure, and the tokens from there on.

use super::{CLOSING, Record, Value};
use crate::inspect::Error;

/// How deep aggregates may be nested.
const DEEPEST: usize = 32;

/// A place in the bytes, with its line.
#[derive(Clone, Debug)]
pub(super) struct Cursor<'a> {
    bytes: &'a [u8],
    /// Offset of the next byte.
    pub(super) at: usize,
    /// Its line, counted from 1.
    pub(super) line: u32,
}

impl<'a> Cursor<'a> {
    pub(super) const fn new(bytes: &'a [u8]) -> Self {
        Self {
            bytes,
            at: 0,
            line: 1,
        }
    }

    /// A cursor at a known place.
    pub(super) const fn at(bytes: &'a [u8], at: usize, line: u32) -> Self {
        Self { bytes, at, line }
    }

    pub(super) fn rest(&self) -> &'a [u8] {
        &self.bytes[self.at..]
    }

    fn peek(&self) -> Option<u8> {
        self.bytes.get(self.at).copied()
    }

    /// The error that something else was expected here.
    pub(super) fn wanted<T>(&self, wanted: &str) -> Result<T, Error> {
        let rest = self.rest();
        let reason = if rest.is_empty() {
            format!(
                "the file ends where {wanted} is expected: it is cut off, for a whole file ends with {CLOSING}"
            )
        } else {
            let found = String::from_utf8_lossy(&rest[..rest.len().min(40)]);
            let found: String = found.chars().take_while(|c| !c.is_control()).take(24).collect();
            format!("{wanted} is expected, found {found:?}")
        };
        Err(self.error(reason))
    }

    pub(super) fn error(&self, reason: String) -> Error {
        Error::Syntax {
            line: self.line,
            reason,
        }
    }

    /// Skips white space and comments.
    pub(super) fn skip_space(&mut self) -> Result<(), Error> {
        while let Some(byte) = self.peek() {
            match byte {
                b'\n' => self.line += 1,
                b' ' | b'\t' | b'\r' => {}
                b'/' if self.rest().starts_with(b"/*") => {
                    let start = self.clone();
                    self.at += 2;
                    while !self.rest().starts_with(b"*/") {
                        match self.peek() {
                            None => return Err(start.error("a comment is never closed".to_owned())),
                            Some(b'\n') => self.line += 1,
                            Some(_) => {}
                        }
                        self.at += 1;
                    }
                    self.at += 1;
                }
                _ => break,
            }
            self.at += 1;
        }
        Ok(())
    }

    /// Takes a sign or word if it is next.
    pub(super) fn take(&mut self, word: &str) -> Result<bool, Error> {
        self.skip_space()?;
        let found = self.rest().starts_with(word.as_bytes());
        if found {
            self.at += word.len();
        }
        Ok(found)
    }

    /// Takes a sign or word that has to be next.
    pub(super) fn need(&mut self, word: &str) -> Result<(), Error> {
        if self.take(word)? {
            Ok(())
        } else {
            self.wanted(&format!("`{word}`"))
        }
    }

    fn run(&mut self, which: impl Fn(u8) -> bool) -> &'a str {
        let rest = self.rest();
        let length = rest.iter().position(|&byte| !which(byte)).unwrap_or(rest.len());
        self.at += length;
        // only ASCII is ever asked for
        std::str::from_utf8(&rest[..length]).unwrap_or("")
    }

    /// The number of an instance, after its `#`.
    pub(super) fn number(&mut self) -> Result<u64, Error> {
        let start = self.clone();
        let digits = self.run(|b| b.is_ascii_digit());
        match digits.parse() {
            Ok(number) => Ok(number),
            Err(_) => start.wanted("the number of an instance"),
        }
    }

    /// A keyword and its parameters; the parameters' places are given back for reuse by `list`.
    pub(super) fn record(&mut self) -> Result<Record<'a>, Error> {
        self.record_at(0)
    }

    fn record_at(&mut self, depth: usize) -> Result<Record<'a>, Error> {
        self.skip_space()?;
        let start = self.clone();
        if self.peek() == Some(b'!') {
            self.at += 1;
        }
        let keyword = self.run(|b| b.is_ascii_uppercase() || b.is_ascii_digit() || b == b'_' || b == b'-');
        if keyword.is_empty() || keyword.starts_with(|c: char| c.is_ascii_digit()) {
            return start.wanted("a keyword in capitals");
        }
        Ok(Record {
            keyword,
            values: self.list(depth)?,
        })
    }

    fn list(&mut self, depth: usize) -> Result<Vec<Value<'a>>, Error> {
        self.need("(")?;
        if depth > DEEPEST {
            return Err(self.error(format!("parentheses are nested more than {DEEPEST} deep")));
        }
        let mut values = Vec::new();
        if self.take(")")? {
            return Ok(values);
        }
        loop {
            values.push(self.value(depth + 1)?);
            if self.take(")")? {
                return Ok(values);
            }
            if !self.take(",")? {
                return self.wanted("`,` or `)`");
            }
        }
    }

    fn value(&mut self, depth: usize) -> Result<Value<'a>, Error> {
        self.skip_space()?;
        let Some(byte) = self.peek() else {
            return self.wanted("a parameter");
        };
        match byte {
            b'$' | b'*' => {
                self.at += 1;
                Ok(if byte == b'$' {
                    Value::Omitted
                } else {
                    Value::Derived
                })
            }
            b'#' => {
                self.at += 1;
                self.number().map(Value::Reference)
            }
            b'\'' => self.text().map(Value::Text),
            b'(' => self.list(depth).map(Value::List),
            b'.' => {
                let start = self.clone();
                self.at += 1;
                let value = self.run(|b| b.is_ascii_uppercase() || b.is_ascii_digit() || b == b'_');
                if value.is_empty() || self.peek() != Some(b'.') {
                    return start.wanted("an enumeration's value between points");
                }
                self.at += 1;
                Ok(Value::Enumeration(value))
            }
            b'"' => {
                let start = self.clone();
                self.at += 1;
                let digits = self.run(|b| b.is_ascii_hexdigit());
                if self.peek() != Some(b'"') {
                    return start.wanted("a binary in double quotes");
                }
                self.at += 1;
                Ok(Value::Binary(digits))
            }
            b'A'..=b'Z' | b'!' => {
                let record = self.record_at(depth)?;
                Ok(Value::Typed(record.keyword, record.values))
            }
            _ => self.numeral(),
        }
    }

    /// An integer, or a real: sign, digits, point, digits, and an exponent with `E`.
    fn numeral(&mut self) -> Result<Value<'a>, Error> {
        let start = self.clone();
        if matches!(self.peek(), Some(b'+' | b'-')) {
            self.at += 1;
        }
        if self.run(|b| b.is_ascii_digit()).is_empty() {
            return start.wanted("a parameter");
        }
        let real = self.peek() == Some(b'.');
        if real {
            self.at += 1;
            self.run(|b| b.is_ascii_digit());
            if self.peek() == Some(b'E') {
                self.at += 1;
                if matches!(self.peek(), Some(b'+' | b'-')) {
                    self.at += 1;
                }
                if self.run(|b| b.is_ascii_digit()).is_empty() {
                    return start.wanted("a real number with an exponent");
                }
            }
        }
        let text = std::str::from_utf8(&self.bytes[start.at..self.at]).unwrap_or("");
        if real {
            match text.parse::<f64>() {
                Ok(number) if number.is_finite() => Ok(Value::Real(number)),
                _ => start.wanted("a real number of at most 1.7E+308"),
            }
        } else {
            match text.parse() {
                Ok(number) => Ok(Value::Integer(number)),
                Err(_) => start.wanted("an integer of at most 64 bits"),
            }
        }
    }

    /// A text, still escaped.
    fn text(&mut self) -> Result<&'a str, Error> {
        let start = self.clone();
        self.at += 1;
        let from = self.at;
        loop {
            match self.peek() {
                None => return Err(start.error("a text is never closed".to_owned())),
                Some(b'\'') if self.bytes.get(self.at + 1) == Some(&b'\'') => self.at += 2,
                Some(b'\'') => break,
                Some(byte) if byte < b' ' => {
                    return Err(start.error("a text is not closed on its line".to_owned()));
                }
                Some(_) => self.at += 1,
            }
        }
        let text = std::str::from_utf8(&self.bytes[from..self.at]);
        self.at += 1;
        text.map_err(|_| start.error("a text is neither ASCII nor UTF-8".to_owned()))
    }
}
