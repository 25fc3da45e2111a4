//! Reads files back and measures what is in them, from their own numbers alone.
//!
//! A format is a module with a `read` from bytes to a report of its own, an entry in [`Report`] and a line in
//! [`inspect`], which tells formats apart by what the file begins with, not by its name.

mod error;
mod finding;
pub mod part21;
pub mod step;

pub use error::Error;
pub use finding::Finding;

use serde::Serialize;

/// What was found in a file.
#[derive(Clone, Debug, Serialize)]
#[serde(tag = "format", rename_all = "lowercase")]
#[non_exhaustive]
pub enum Report {
    /// A STEP file.
    Step(Box<step::StepReport>),
}

impl Report {
    /// Where the file disagrees with itself; empty where it agrees.
    pub fn findings(&self) -> &[Finding] {
        match self {
            Self::Step(report) => &report.findings,
        }
    }

    /// The report as text for a terminal, ending in a line feed.
    pub fn sheet(&self) -> String {
        match self {
            Self::Step(report) => step::sheet(report),
        }
    }
}

/// Reads and measures a file. `name` is only used to tell in messages what was expected of the file.
///
/// # Errors
///
/// [`Error`] with line and reason where the file cannot be read. A file that can be read but disagrees with itself is
/// no error: see [`Report::findings`].
pub fn inspect(bytes: &[u8], name: &str) -> Result<Report, Error> {
    if part21::is_exchange_structure(bytes) {
        return Ok(Report::Step(Box::new(step::read(bytes)?)));
    }
    Err(Error::unknown(bytes, name))
}
