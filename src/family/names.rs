//! Names of variants: what is a safe name of files everywhere.

use std::collections::HashSet;

/// Longest name \[bytes\].
pub const LONGEST_NAME: usize = 100;

/// Why a name can't name files; `None` where it can.
///
/// A safe name has ASCII letters, digits, `-`, `_`, `+`, `=` and `.` only, begins with a letter or a digit, does not end with a
/// full stop, has at most [`LONGEST_NAME`] characters, is none of the names that some systems keep for devices, and does not
/// begin with `family`, as the tables do.
pub fn unsafe_name(name: &str) -> Option<String> {
    let allowed = |c: char| c.is_ascii_alphanumeric() || "-_+=.".contains(c);
    if name.is_empty() {
        return Some("the name is empty".to_owned());
    }
    if let Some(c) = name.chars().find(|c| !allowed(*c)) {
        let what = if c == ' ' {
            "a space".to_owned()
        } else {
            format!("{c:?}")
        };
        return Some(format!(
            "a name has letters a to z, digits and - _ + = . only, because files are named after it; {what} is none of these"
        ));
    }
    if name.len() > LONGEST_NAME {
        return Some(format!(
            "a name has at most {LONGEST_NAME} characters, and this has {}",
            name.len()
        ));
    }
    if !name.starts_with(|c: char| c.is_ascii_alphanumeric()) || name.ends_with('.') {
        return Some("a name begins with a letter or a digit and does not end with a full stop".to_owned());
    }
    let lower = name.to_ascii_lowercase();
    if lower.starts_with("family") {
        return Some("names that begin with `family` are kept for the tables".to_owned());
    }
    let stem = lower.split('.').next().unwrap_or_default();
    let numbered = stem.len() == 4
        && (stem.starts_with("com") || stem.starts_with("lpt"))
        && stem.ends_with(|c: char| c.is_ascii_digit());
    if numbered || ["con", "prn", "aux", "nul"].contains(&stem) {
        return Some("some systems keep this name for a device".to_owned());
    }
    None
}

/// Endings that a name gets where a wing has two files of a kind, one a side.
const SIDES: [&str; 2] = ["-starboard", "-port"];

/// The first name whose files would have the same names as another's, case aside, with the place of both in the list.
pub(super) fn clash<'a>(names: impl Iterator<Item = &'a str> + Clone) -> Option<(usize, usize)> {
    let mut seen: HashSet<String> = HashSet::new();
    let place = |wanted: &str| names.clone().position(|name| name.eq_ignore_ascii_case(wanted));
    for (i, name) in names.clone().enumerate() {
        let lower = name.to_ascii_lowercase();
        if seen.contains(&lower) {
            return place(&lower).map(|first| (first, i));
        }
        seen.insert(lower);
    }
    for (i, name) in names.clone().enumerate() {
        let lower = name.to_ascii_lowercase();
        let stem = SIDES.iter().find_map(|side| lower.strip_suffix(side));
        if let Some(stem) = stem.filter(|stem| seen.contains(*stem)) {
            return place(stem).map(|first| (first, i));
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::{clash, unsafe_name};

    #[test]
    fn safe_and_unsafe_names() {
        for name in [
            "a",
            "0007",
            "AR-9.5_t0.45",
            "x+y=2",
            "company",
            "com10",
            "console",
        ] {
            assert_eq!(unsafe_name(name), None, "{name}");
        }
        for name in [
            "", "a b", "a/b", "a\\b", "..", ".a", "-a", "a.", "a:b", "a\n", "é", "con", "NUL.txt", "com1",
            "family", "Family-2", "a*", "$(x)",
        ] {
            assert!(unsafe_name(name).is_some(), "{name}");
        }
        assert!(unsafe_name(&"x".repeat(101)).is_some());
    }

    #[test]
    fn names_that_clash() {
        let clash = |names: &[&str]| clash(names.iter().copied());
        assert_eq!(clash(&["a", "b", "a-low"]), None);
        assert_eq!(clash(&["a", "b", "A"]), Some((0, 2)));
        assert_eq!(clash(&["a-port", "b", "a"]), Some((2, 0)));
    }
}
