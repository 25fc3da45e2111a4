//! What may be typed after `family`.

use std::num::NonZeroUsize;
use std::path::PathBuf;

use clap::Args;

use crate::cli::args::kind;
use crate::family::{Vary, VaryError};
use crate::wing::Kind;

/// Options of `family`.
#[derive(Args, Debug)]
#[command(group = clap::ArgGroup::new("variants").args(["table", "vary", "gather"]).required(true))]
pub(in crate::cli) struct FamilyOptions {
    /// The spec file (TOML) that the variants vary
    #[arg(required_unless_present = "gather", conflicts_with = "gather")]
    pub(super) spec: Option<PathBuf>,
    /// A CSV file: spec keys as headers, a variant a row, its name in an optional first column `name`
    #[arg(long, value_name = "FILE.csv")]
    pub(super) table: Option<PathBuf>,
    /// Values of a key: KEY=6,8,10 or KEY=0.3..0.6/4 (four values evenly spaced, both ends included); may be repeated for
    /// every combination
    #[arg(long, value_name = "KEY=LIST", value_parser = vary)]
    pub(super) vary: Vec<Vary>,
    /// Directory for the files and the tables family.csv and family.jsonl, made where there is none
    #[arg(short, long, value_name = "DIR")]
    pub(super) output: PathBuf,
    /// Write these files only, separated by commas
    #[arg(long, value_name = "KIND,…", value_delimiter = ',', value_parser = kind, conflicts_with = "gather")]
    pub(super) only: Vec<Kind>,
    /// Wings to build at the same time; by default one a core
    #[arg(long, value_name = "N", conflicts_with = "gather")]
    pub(super) jobs: Option<NonZeroUsize>,
    /// Keep what an earlier run has finished, if it is whole and of the same spec, values and program version
    #[arg(long, conflicts_with = "gather")]
    pub(super) resume: bool,
    /// Build every Nth variant only, beginning with the Kth
    #[arg(long, value_name = "K/N", value_parser = shard, conflicts_with = "gather")]
    pub(super) shard: Option<Shard>,
    /// Draw a figure against what was varied, as family-KEY.svg: a key such as built.volume; may be repeated
    #[arg(long, value_name = "KEY", conflicts_with = "gather")]
    pub(super) plot: Vec<String>,
    /// Merge the tables of these directories instead, each made with another --shard
    #[arg(long, value_name = "DIR", num_args = 1.., conflicts_with_all = ["table", "vary"])]
    pub(super) gather: Vec<PathBuf>,
}

/// Every `of`-th variant, beginning with the `number`-th.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Shard {
    number: usize,
    of: usize,
}

impl Shard {
    /// All variants.
    pub(super) const WHOLE: Self = Self { number: 1, of: 1 };

    /// Its places among `count` variants, counted from 0.
    pub(super) fn places(self, count: usize) -> Vec<usize> {
        (self.number - 1..count).step_by(self.of).collect()
    }
}

fn vary(text: &str) -> Result<Vary, VaryError> {
    Vary::parse(text)
}

fn shard(text: &str) -> Result<Shard, String> {
    let numbers = text
        .split_once('/')
        .and_then(|(k, n)| Some((k.trim().parse().ok()?, n.trim().parse().ok()?)));
    match numbers {
        Some((number, of)) if 1 <= number && number <= of => Ok(Shard { number, of }),
        _ => Err("write K/N with K from 1 to N, such as 3/8".to_owned()),
    }
}

#[cfg(test)]
mod tests {
    use super::{Shard, shard};

    #[test]
    fn shards_share_all_variants() {
        let places = |text: &str| shard(text).unwrap().places(8);
        assert_eq!(places("1/3"), [0, 3, 6]);
        assert_eq!(places("2/3"), [1, 4, 7]);
        assert_eq!(places("3/3"), [2, 5]);
        assert_eq!(places("9/9"), [0_usize; 0]);
        assert_eq!(Shard::WHOLE.places(2), [0, 1]);
        for text in ["0/3", "4/3", "3", "a/b", "-1/3", "1/0", ""] {
            assert!(shard(text).is_err(), "{text}");
        }
    }
}
