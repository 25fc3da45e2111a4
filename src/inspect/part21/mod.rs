//! ISO 10303-21 exchange structures (2002 and the parts of later editions that agree with it): one pass over the bytes
//! that checks the syntax and notes where each instance stands; instances are taken apart when they are asked for, so
//! that memory is the file's own and some bytes an instance.

mod cursor;
mod exchange;
mod text;

pub use exchange::{Entry, Exchange, Instance, Kind, Record};

use cursor::Cursor;
pub(super) use text::decode;

/// What every exchange structure begins with.
const OPENING: &str = "ISO-10303-21;";
/// What every exchange structure ends with.
const CLOSING: &str = "END-ISO-10303-21;";

/// A parameter.
#[derive(Clone, Debug, PartialEq)]
pub enum Value<'a> {
    /// A text between its apostrophes, still escaped.
    Text(&'a str),
    /// A real number; always finite.
    Real(f64),
    /// A whole number.
    Integer(i64),
    /// An enumeration's value without its points.
    Enumeration(&'a str),
    /// Digits of a binary.
    Binary(&'a str),
    /// The number of another instance.
    Reference(u64),
    /// An aggregate.
    List(Vec<Self>),
    /// A value with the name of its type.
    Typed(&'a str, Vec<Self>),
    /// `$`
    Omitted,
    /// `*`
    Derived,
}

/// True where the bytes begin as an exchange structure does, after white space and comments.
pub fn is_exchange_structure(bytes: &[u8]) -> bool {
    let mut cursor = Cursor::new(bytes);
    cursor.skip_space().is_ok() && cursor.rest().starts_with(OPENING.as_bytes())
}
