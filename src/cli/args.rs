//! What may be typed.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand};

use super::family::FamilyOptions;
use crate::wing::Kind;

/// Turns the numbers of a wing into an exact solid, and shows that the solid has those numbers.
#[derive(Debug, Parser)]
#[command(name = "spanwise", version, max_term_width = 110)]
pub(super) struct Arguments {
    #[command(subcommand)]
    pub(super) command: Command,
    /// Print machine-readable JSON on standard output
    #[arg(long, global = true)]
    pub(super) json: bool,
    /// Print nothing but errors
    #[arg(long, global = true, conflicts_with = "json")]
    pub(super) quiet: bool,
}

/// The commands.
#[derive(Debug, Subcommand)]
pub(super) enum Command {
    /// Print a commented spec to start from
    Begin,
    /// Build one wing: STEP, STL and figures, and a proof sheet of what was asked for beside what was measured
    Loft(LoftOptions),
    /// Build many variants of one wing, and a table of their figures
    Family(FamilyOptions),
    /// Read files back: what is in them, measured from their own numbers beside what they state, and where they disagree
    Inspect(InspectOptions),
}

/// Options of `inspect`.
#[derive(Args, Debug)]
pub(super) struct InspectOptions {
    /// The files (STEP)
    #[arg(required = true, value_name = "FILE")]
    pub(super) files: Vec<PathBuf>,
}

/// Options of `loft`.
#[derive(Args, Debug)]
pub(super) struct LoftOptions {
    /// The spec file (TOML)
    pub(super) spec: PathBuf,
    /// Directory for the files, made where there is none
    #[arg(short, long, value_name = "DIR", default_value = ".")]
    pub(super) output: PathBuf,
    /// Override or add a key of the spec, as in `--set planform.taper_ratio=0.5`; may be repeated
    #[arg(long, value_name = "KEY=VALUE", value_parser = setting)]
    pub(super) set: Vec<(String, String)>,
    /// Write these files only, separated by commas
    #[arg(long, value_name = "KIND,…", value_delimiter = ',', value_parser = kind)]
    pub(super) only: Vec<Kind>,
}

fn setting(text: &str) -> Result<(String, String), String> {
    match text.split_once('=') {
        Some((key, value)) if !key.trim().is_empty() => Ok((key.trim().to_owned(), value.trim().to_owned())),
        _ => Err("write KEY=VALUE, such as planform.taper_ratio=0.5".to_owned()),
    }
}

pub(super) fn kind(text: &str) -> Result<Kind, String> {
    let known = || Kind::ALL.map(Kind::name).join(", ");
    Kind::ALL
        .into_iter()
        .find(|kind| kind.name() == text)
        .ok_or_else(|| format!("choose from {}", known()))
}
