//! What may be typed.

use std::path::PathBuf;

use clap::{Args, Parser, Subcommand, ValueEnum};

use super::family::FamilyOptions;
use crate::airfoil::coordinates::MAX_POINTS;
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
    /// Show one section: figures, coordinates, a drawing
    Section(SectionOptions),
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

/// Options of `section`.
#[derive(Args, Debug)]
pub(super) struct SectionOptions {
    /// A designation such as "NACA 2412", or the path of a coordinate file
    pub(super) airfoil: String,
    /// Print this many points around the section as a coordinate file in place of the figures
    #[arg(long, value_name = "N", value_parser = count)]
    pub(super) points: Option<usize>,
    /// Layout of the points: one loop from the upper trailing edge, or two blocks from the nose
    #[arg(long, value_enum, default_value = "loop", requires = "points")]
    pub(super) layout: Layout,
    /// Draw the section with its camber line, nose circle and curvature comb
    #[arg(long, value_name = "FILE")]
    pub(super) svg: Option<PathBuf>,
    /// Change the greatest thickness to this part of the chord
    #[arg(long, value_name = "T", value_parser = part)]
    pub(super) thickness: Option<f64>,
    /// Change the greatest camber to this part of the chord
    #[arg(long, value_name = "C", value_parser = part)]
    pub(super) camber: Option<f64>,
    /// Turn the section upside down
    #[arg(long)]
    pub(super) inverted: bool,
    /// Smooth the points of a file, moving none by more than this part of the chord
    #[arg(long, value_name = "F", value_parser = fairing)]
    pub(super) fairing: Option<f64>,
    /// Close the trailing edge of a designation by the last coefficient of its formula
    #[arg(long)]
    pub(super) sharp: bool,
}

/// A public layout of coordinate files.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub(super) enum Layout {
    /// From the upper trailing edge over the nose to the lower one
    Loop,
    /// Number of points, then the upper and the lower side, each from the nose
    Blocks,
}

fn count(text: &str) -> Result<usize, String> {
    let known = text
        .parse()
        .ok()
        .filter(|count| (13..=MAX_POINTS).contains(count));
    known.ok_or_else(|| format!("write a whole number from 13 to {MAX_POINTS}"))
}

fn part(text: &str) -> Result<f64, String> {
    let known = text.parse().ok().filter(|part| (0.0..1.0).contains(part));
    known.ok_or_else(|| "write a part of the chord, such as 0.105".to_owned())
}

fn fairing(text: &str) -> Result<f64, String> {
    let known = text.parse().ok().filter(|part| (1e-6..=0.005).contains(part));
    known.ok_or_else(|| "write a part of the chord from 1e-6 to 0.005, such as 2e-4".to_owned())
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
