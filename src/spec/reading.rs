//! From a text to a resolved wing, or to every fault of the text.

use std::path::Path;

use super::fault::{Fault, sort_faults};
use super::identity::identity;
use super::written::{Entry, Reader, Written};
use super::{AirfoilSource, Spec, document, resolve, unknown};

/// A spec to be read.
#[derive(Clone, Copy, Debug)]
pub struct Source<'a> {
    /// The text, TOML.
    pub text: &'a str,
    /// The file as the user named it, for messages; its stem is the wing's name where the text has none.
    pub file: &'a str,
    /// Keys and values that override or add to the text, as in `--set planform.span=2.4 m`.
    pub set: &'a [(String, String)],
}

/// What was read.
#[derive(Clone, Debug, PartialEq)]
pub struct Reading {
    /// The wing; only where there are no faults.
    pub spec: Option<Spec>,
    /// Every fault, in the order of the file.
    pub faults: Vec<Fault>,
    /// Every airfoil text, also where there are faults, so that those of the airfoils can join them.
    pub airfoils: Vec<AirfoilSource>,
    /// Every key with its value, one a line, `--set` values put in: equal for specs that say the same, however they are
    /// laid out. Empty for a text that is not TOML.
    pub identity: String,
}

/// Reads a spec. A text that is not TOML has one fault; otherwise all faults are found at once.
pub fn read(source: &Source<'_>) -> Reading {
    let mut root = match document::parse(source.text, source.file) {
        Ok(root) => root,
        Err(fault) => {
            return Reading {
                spec: None,
                faults: vec![*fault],
                airfoils: Vec::new(),
                identity: String::new(),
            };
        }
    };
    let mut reader = Reader::new();
    for (key, value) in source.set {
        reader
            .faults
            .extend(document::set(&mut root, key, value).err().map(|fault| *fault));
    }
    reader.faults.extend(unknown::unknown_keys(&root));
    let written = Written::read(&root, &mut reader);
    let name = match &written.top.name {
        Entry::Given(given) => given.value.clone(),
        Entry::Absent | Entry::Unreadable => stem(source.file),
    };
    let spec = resolve::resolve(&written, &root, name, &mut reader);
    let mut faults = reader.faults;
    sort_faults(&mut faults);
    Reading {
        spec,
        faults,
        airfoils: resolve::airfoils(&written),
        identity: identity(&root),
    }
}

/// The file's name without folder and extension; `wing` where nothing is left of it.
fn stem(file: &str) -> String {
    let stem = Path::new(file)
        .file_stem()
        .map(|stem| stem.to_string_lossy())
        .unwrap_or_default();
    let stem: String = stem.chars().filter(|c| !c.is_control()).collect();
    if stem.trim().is_empty() {
        "wing".to_owned()
    } else {
        stem
    }
}

/// A spec to start from, with a comment on every key.
pub fn starter() -> &'static str {
    include_str!("starter.toml")
}
