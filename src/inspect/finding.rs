//! What is wrong with a file that can be read.

use std::fmt;

use serde::Serialize;

/// A place where a file disagrees with itself.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Finding {
    /// Line of the file, counted from 1; `None` where it is about the whole file.
    pub line: Option<u32>,
    /// What disagrees, with the numbers.
    pub what: String,
}

impl fmt::Display for Finding {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.line {
            Some(line) => write!(f, "line {line}: {}", self.what),
            None => f.write_str(&self.what),
        }
    }
}
