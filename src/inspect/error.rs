//! Why a file can't be read.

use thiserror::Error;

/// Why a file can't be read.
#[derive(Clone, Debug, Error, PartialEq, Eq)]
#[non_exhaustive]
pub enum Error {
    /// Not a format that is known.
    #[error("line 1: {reason}")]
    Unknown {
        /// Why.
        reason: String,
    },
    /// The text is not what its format demands, or ends early.
    #[error("line {line}: {reason}")]
    Syntax {
        /// Line, counted from 1.
        line: u32,
        /// What was expected and what was found.
        reason: String,
    },
    /// More than this program takes.
    #[error("{bytes} bytes are too many: files are read up to {limit} bytes")]
    TooLarge {
        /// The file's size.
        bytes: usize,
        /// The largest size that is read.
        limit: usize,
    },
}

impl Error {
    /// For a file that begins like none of the known formats.
    pub(super) fn unknown(bytes: &[u8], name: &str) -> Self {
        let reason = if bytes.is_empty() {
            "the file is empty".to_owned()
        } else {
            let start: String = String::from_utf8_lossy(&bytes[..bytes.len().min(40)])
                .chars()
                .take_while(|c| *c != '\n' && *c != '\r')
                .take(30)
                .collect();
            let step = name
                .rsplit_once('.')
                .is_some_and(|(_, ending)| ["step", "stp", "p21"].contains(&ending.to_lowercase().as_str()));
            let known = if step {
                "a STEP file"
            } else {
                "a file that is read here"
            };
            format!("{known} begins with ISO-10303-21; and this begins with {start:?}")
        };
        Self::Unknown { reason }
    }
}
