//! What can be wrong with a table of variants.

use thiserror::Error;

use super::table::MOST_ROWS;

/// What can be wrong with a table. Rows are counted as a spreadsheet does, the header being row 1.
#[derive(Clone, Debug, Error, PartialEq, Eq)]
#[non_exhaustive]
pub enum TableError {
    /// Nothing in it.
    #[error("the table is empty: row 1 has the header, spec keys such as planform.aspect_ratio")]
    Empty,
    /// A header and nothing else.
    #[error("the table has a header and no rows: each row below it is a variant")]
    NoRows,
    /// Too many rows.
    #[error("the table has more than {MOST_ROWS} rows: divide it")]
    TooLong,
    /// Row 1 is no header.
    #[error(
        "row 1, column {column}: {text:?} is a value, and row 1 has the header: spec keys such as planform.aspect_ratio, with an optional first column `name`"
    )]
    NoHeader {
        /// Counted from 1.
        column: usize,
        /// As typed.
        text: String,
    },
    /// Divided by something else than commas.
    #[error("row 1: columns are divided by commas, not by {0}")]
    Divider(&'static str),
    /// A column without a header.
    #[error("row 1, column {column}: the header is empty; write a spec key, or delete the column")]
    NoKey {
        /// Counted from 1.
        column: usize,
    },
    /// A header that is no key.
    #[error("row 1, column {column}: {key:?} is no key of a spec; {advice}")]
    Key {
        /// Counted from 1.
        column: usize,
        /// As typed.
        key: String,
        /// The nearest known key.
        advice: String,
    },
    /// A key twice.
    #[error("row 1, columns {first} and {column}: both are {key}; delete one of the two")]
    Twice {
        /// The first, counted from 1.
        first: usize,
        /// The second, counted from 1.
        column: usize,
        /// The key.
        key: String,
    },
    /// The column of names is not the first, or nothing is varied.
    #[error(
        "row 1: `name` is the variants' names, in the first column; at least one more column is a spec key"
    )]
    Names,
    /// A row with too few or too many fields.
    #[error("row {row}: {found} fields, and the header has {expected}{}", if found > expected { "; a value with a comma in it stands in double quotes" } else { "" })]
    Ragged {
        /// The row.
        row: u64,
        /// Its fields.
        found: usize,
        /// Columns.
        expected: usize,
    },
    /// Text that is not UTF-8.
    #[error("row {row}, column {column}: not UTF-8 text; save the table as CSV in UTF-8")]
    NoText {
        /// The row.
        row: u64,
        /// Counted from 1.
        column: usize,
    },
    /// A line break inside a value.
    #[error("row {row}, column {column}: a line break inside a value; is a double quote left open?")]
    LineBreak {
        /// The row.
        row: u64,
        /// Counted from 1.
        column: usize,
    },
    /// A name that can't name files.
    #[error("row {row}, column 1 (name): {name:?}: {reason}")]
    Name {
        /// The row.
        row: u64,
        /// As typed.
        name: String,
        /// Why.
        reason: String,
    },
    /// Two names whose files would be the same.
    #[error(
        "row {row}, column 1 (name): the files of {name:?} would have the same names as those of {other:?} in row {first}"
    )]
    Clash {
        /// The row.
        row: u64,
        /// Its name.
        name: String,
        /// The other row.
        first: u64,
        /// The other's name.
        other: String,
    },
}
