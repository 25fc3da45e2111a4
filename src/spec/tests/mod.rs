//! Specs as a user types them, read from beginning to end.

mod accepted;
mod airfoils;
mod contradictions;
mod faults;
mod identity;
mod load;
mod random;
mod set;
mod shape;

use super::{Reading, Source, Spec, read};

/// Reads a text as the file `wing.toml`.
fn reading(text: &str) -> Reading {
    reading_with(text, &[])
}

/// As [`reading`], with `--set` pairs.
fn reading_with(text: &str, set: &[(&str, &str)]) -> Reading {
    let set: Vec<_> = set
        .iter()
        .map(|&(key, value)| (key.to_owned(), value.to_owned()))
        .collect();
    read(&Source {
        text,
        file: "wing.toml",
        set: &set,
    })
}

/// The wing that a text without faults means.
fn spec(text: &str) -> Spec {
    let reading = reading(text);
    let faults: Vec<_> = reading.faults.iter().map(ToString::to_string).collect();
    reading.spec.unwrap_or_else(|| panic!("{}", faults.join("\n")))
}

/// The faults of a text, as the user sees them.
fn faults(text: &str) -> Vec<String> {
    messages(&reading(text))
}

/// The only fault of a text.
#[track_caller]
fn only(text: &str) -> String {
    let faults = faults(text);
    assert_eq!(faults.len(), 1, "{faults:#?}");
    faults[0].clone()
}

fn messages(reading: &Reading) -> Vec<String> {
    assert_eq!(reading.spec.is_none(), !reading.faults.is_empty());
    reading.faults.iter().map(ToString::to_string).collect()
}

/// A planform with these lines and an airfoil.
fn planform(lines: &str) -> String {
    format!("[airfoil]\nroot = \"NACA 0012\"\n[planform]\n{lines}")
}

#[track_caller]
fn near(found: f64, expected: f64, relative: f64) {
    assert!(
        (found - expected).abs() <= relative * expected.abs(),
        "{found} is not {expected}"
    );
}
