//! Bytes to lines of text.

use crate::airfoil::coordinates::MAX_BYTES;
use crate::airfoil::coordinates::error::{Error, Place};
use crate::airfoil::coordinates::number::{self, Number};

/// What a line is.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Kind {
    /// Nothing on it.
    Blank,
    /// A remark; its text.
    Remark(String),
    /// Text that is no row of numbers.
    Words,
    /// A row of numbers.
    Numbers(Vec<Number>),
}

/// A line of the file; line `i` of the file is element `i - 1`.
#[derive(Clone, Debug)]
pub(super) struct Line<'a> {
    /// As typed.
    pub(super) text: &'a str,
    /// What it is.
    pub(super) kind: Kind,
}

/// The place of line `number` (from 1).
pub(super) fn place(lines: &[Line<'_>], number: usize) -> Place {
    let text = number
        .checked_sub(1)
        .and_then(|i| lines.get(i))
        .map_or("", |line| line.text);
    Place::new(number, text)
}

/// The file's text, whatever its encoding: UTF-8 or UTF-16 with a byte-order mark, UTF-8, else Latin-1.
pub(super) fn decode(bytes: &[u8], notes: &mut Vec<String>) -> Result<String, Error> {
    if bytes.len() > MAX_BYTES {
        return Err(Error::TooLarge {
            at: Place::new(1, ""),
            bytes: bytes.len(),
        });
    }
    let text = match bytes {
        [0xef, 0xbb, 0xbf, rest @ ..] => {
            notes.push("Byte-order mark (UTF-8) left out.".to_owned());
            eight_bit(rest)
        }
        [0xff, 0xfe, rest @ ..] => sixteen_bit(rest, u16::from_le_bytes, notes),
        [0xfe, 0xff, rest @ ..] => sixteen_bit(rest, u16::from_be_bytes, notes),
        _ => eight_bit(bytes),
    };
    let text = text.trim_end_matches(['\u{1a}', '\0']).to_owned();
    if text.chars().all(char::is_whitespace) {
        return Err(Error::Empty {
            at: Place::new(1, ""),
        });
    }
    let foreign =
        |c: char| (c < ' ' && !matches!(c, '\t' | '\n' | '\r' | '\u{b}' | '\u{c}')) || c == '\u{7f}';
    let spoiled = split(&text).zip(1..).find(|(line, _)| line.contains(foreign));
    if let Some((line, number)) = spoiled {
        return Err(Error::Binary {
            at: Place::new(number, line),
        });
    }
    Ok(text)
}

fn eight_bit(bytes: &[u8]) -> String {
    match std::str::from_utf8(bytes) {
        Ok(text) => text.to_owned(),
        Err(_) => bytes.iter().map(|&b| char::from(b)).collect(),
    }
}

fn sixteen_bit(bytes: &[u8], unit: fn([u8; 2]) -> u16, notes: &mut Vec<String>) -> String {
    notes.push("Encoded as UTF-16.".to_owned());
    let (pairs, odd) = bytes.as_chunks::<2>();
    let units = pairs.iter().map(|&pair| unit(pair));
    let mut text: String = char::decode_utf16(units).map(|c| c.unwrap_or('\0')).collect();
    if !odd.is_empty() {
        text.push('\0');
        text.push(' ');
    }
    text
}

/// Lines ended by LF, CR LF or CR.
fn split(text: &str) -> impl Iterator<Item = &str> {
    text.split('\n')
        .flat_map(|line| line.strip_suffix('\r').unwrap_or(line).split('\r'))
}

/// All lines of the text with what they are.
pub(super) fn lines(text: &str) -> Vec<Line<'_>> {
    let comma = number::decimal_comma(split(text));
    split(text)
        .map(|text| Line {
            text,
            kind: kind(text, comma),
        })
        .collect()
}

/// What a line is, with a decimal comma or not.
fn kind(text: &str, comma: bool) -> Kind {
    let text = text.trim_matches(|c: char| c.is_whitespace() || c == '\u{feff}');
    if text.is_empty() {
        return Kind::Blank;
    }
    let remark = ["#", "!", "%", ";", "//"]
        .iter()
        .find_map(|mark| text.strip_prefix(mark));
    if let Some(remark) = remark {
        return Kind::Remark(
            remark
                .trim_matches(|c: char| c.is_whitespace() || "#!%;/*-=".contains(c))
                .to_owned(),
        );
    }
    if let Some(numbers) = number::row(text, comma) {
        return Kind::Numbers(numbers);
    }
    // a remark behind the numbers
    let begins = text
        .char_indices()
        .zip(text.chars().skip(1))
        .find_map(|((i, c), next)| {
            (c.is_whitespace() && matches!(next, '#' | '!' | '%' | '/' | ';')).then_some(i)
        });
    match begins.and_then(|i| number::row(&text[..i], comma)) {
        Some(numbers) if numbers.len() > 1 => Kind::Numbers(numbers),
        _ => Kind::Words,
    }
}
