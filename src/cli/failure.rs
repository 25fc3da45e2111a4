//! Why a command could not be done.

use std::io;
use std::path::PathBuf;

use thiserror::Error;

use super::family::Trouble;
use crate::inspect;
use crate::spec::Fault;
use crate::wing::{self, Refused};

/// A failure that ends a command.
#[derive(Debug, Error)]
pub(super) enum Failure {
    /// A file that was named cannot be read.
    #[error("{}: cannot be read: {source}", path.display())]
    Read {
        /// The file.
        path: PathBuf,
        /// Why.
        source: io::Error,
    },
    /// A spec that is not text.
    #[error("{}: is no text: byte {at} is not UTF-8; save the spec as UTF-8", path.display())]
    NoText {
        /// The file.
        path: PathBuf,
        /// Offset of the first bad byte.
        at: usize,
    },
    /// A spec with faults.
    #[error("{}", list(.0))]
    Faults(Vec<Fault>),
    /// A wing that cannot be built.
    #[error("{}: {source}", path.display())]
    Wing {
        /// The spec.
        path: PathBuf,
        /// Why.
        source: wing::Error,
    },
    /// A file that cannot be read back.
    #[error("{}: {source}", path.display())]
    Inspect {
        /// The file.
        path: PathBuf,
        /// Why.
        source: inspect::Error,
    },
    /// A section that is none.
    #[error("{airfoil}: {refused}{}", advice(.refused))]
    Section {
        /// The section as typed.
        airfoil: String,
        /// Why.
        refused: Refused,
    },
    /// A file that cannot be written.
    #[error("{}: cannot be written: {source}", path.display())]
    Write {
        /// The file or directory.
        path: PathBuf,
        /// Why.
        source: io::Error,
    },
    /// Standard output that cannot be written.
    #[error("standard output: {0}")]
    Print(io::Error),
    /// A time stamp that is none.
    #[error("SOURCE_DATE_EPOCH = {0}: not a number of seconds between 0 and 253402300799")]
    Epoch(String),
    /// A family of wings that was not built, or not to its end.
    #[error(transparent)]
    Family(#[from] Trouble),
}

fn list(faults: &[Fault]) -> String {
    faults
        .iter()
        .map(ToString::to_string)
        .collect::<Vec<_>>()
        .join("\n")
}

fn advice(refused: &Refused) -> String {
    match refused.remedy() {
        "" => String::new(),
        remedy => format!("\n  {remedy}"),
    }
}
