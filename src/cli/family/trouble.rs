//! Why a family was not built, or not to its end.

use std::path::PathBuf;

use thiserror::Error;

use crate::family::{JobsError, PlanError, PlotError, TableError};

/// A failure that ends `family`.
#[derive(Debug, Error)]
pub(in crate::cli) enum Trouble {
    /// A table that is none.
    #[error("{}: {source}", path.display())]
    Table {
        /// The file.
        path: PathBuf,
        /// Why.
        source: TableError,
    },
    /// Values that make no family.
    #[error("--vary: {0}")]
    Plan(#[from] PlanError),
    /// A figure that there is not.
    #[error("--plot: {0}")]
    Plot(#[from] PlotError),
    /// Threads that do not start.
    #[error("--jobs: {0}")]
    Jobs(#[from] JobsError),
    /// A folder that another run writes into.
    #[error("{}: another run is writing into this directory; wait for its end, or give another one with -o", .0.display())]
    Busy(PathBuf),
    /// A signal.
    #[error("stopped after {done} of {total} variants; the same command with --resume goes on from there")]
    Stopped {
        /// Variants that have ended.
        done: usize,
        /// All.
        total: usize,
    },
    /// A table to be gathered that is not as it was written.
    #[error("{}: {reason}", path.display())]
    Gather {
        /// The file or directory.
        path: PathBuf,
        /// Why.
        reason: String,
    },
}
