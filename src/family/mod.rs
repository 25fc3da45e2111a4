//! Families of wings: variants of one spec, each built by itself, with a table of their figures.
//!
//! A [`Plan`] says which variants there are: the rows of a [`Table`], or every combination of the values of some keys
//! ([`Vary`]). A [`Family`] is a plan with the spec it varies. [`Family::run`] builds the variants on some threads and hands
//! each [`Outcome`] over as it is finished; a variant that cannot be built, or that makes the program panic, is an outcome
//! like any other. Nothing here touches the disk. An outcome depends on nothing but the spec, the values, the coordinate files
//! and this program's version: not on the number of threads, nor on the variants around it.

mod axis;
mod decimal;
mod hash;
mod line;
mod names;
mod outcome;
mod plan;
mod plot;
mod row;
mod run;
mod table;
mod table_error;
mod vary;

pub use hash::{files_hash, inputs_hash};
pub use line::{Line, Status};
pub use names::{LONGEST_NAME, unsafe_name};
pub use outcome::{Family, Outcome, Ready, is_guarded};
pub use plan::{MOST_VARIANTS, Plan, PlanError, Variant};
pub use plot::{Plot, PlotError, figure_keys};
pub use row::{header, row};
pub use run::JobsError;
pub use table::{MOST_ROWS, Table};
pub use table_error::TableError;
pub use vary::{MOST_VALUES, Vary, VaryError};
