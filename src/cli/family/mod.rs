//! `spanwise family`

mod build;
mod finish;
mod folder;
mod gather;
mod journal;
mod options;
mod progress;
mod signal;
mod trouble;

pub(super) use options::FamilyOptions;
pub(super) use trouble::Trouble;

use super::failure::Failure;
use super::output::Output;

/// Builds a family, or gathers the tables of its shards.
pub(super) fn run(options: &FamilyOptions, output: &Output) -> Result<bool, Failure> {
    match &options.spec {
        Some(spec) => build::run(spec, options, output),
        None => gather::run(&options.gather, &options.output, output),
    }
}
