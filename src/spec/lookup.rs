//! Keys that are typed outside of a spec: as a column's header or on the command line.

use super::fault::{Fault, excerpt};
use super::keys::{self, Table};
use super::reading::Source;
use super::{document, unknown};

/// Finds the key of a dotted path such as `planform.taper_ratio` or `panel.0.sweep`.
///
/// # Errors
///
/// The advice for whoever typed it: the nearest known key, or what a path looks like.
pub fn known(path: &str) -> Result<(), String> {
    let parts: Vec<&str> = path.split('.').collect();
    let (table, name) = match parts.as_slice() {
        [name] => (find("", false), *name),
        [table, name] => (find(table, false), *name),
        [table, place, name] if place.parse::<u16>().is_ok() => (find(table, true), *name),
        _ => (None, ""),
    };
    if table.is_some_and(|table| keys::key(table, name).is_some()) {
        return Ok(());
    }
    let (within, last) = match parts.as_slice() {
        [] => ("", ""),
        [only] => ("", *only),
        [first, .., last] => (*first, *last),
    };
    // a table that is misspelt is found by its own name where the key's name leads nowhere
    let near = keys::nearest(within, last).or_else(|| keys::nearest("", within));
    Err(match near {
        Some(near) => format!("the nearest known is {near}"),
        None => "keys are dotted paths, such as planform.taper_ratio or panel.0.sweep".to_owned(),
    })
}

fn find(name: &str, many: bool) -> Option<&'static Table> {
    keys::table(name).filter(|table| table.many == many)
}

/// The faults of a spec's text that no value set from outside can mend: it is not TOML, or has unknown keys.
pub fn lasting_faults(source: &Source<'_>) -> Vec<Fault> {
    match document::parse(source.text, source.file) {
        Ok(root) => unknown::unknown_keys(&root),
        Err(fault) => vec![*fault],
    }
}

/// The start of a typed text, on one line and short enough for a message.
pub fn shortened(text: &str) -> String {
    excerpt(text)
}

#[cfg(test)]
mod tests {
    use super::known;

    #[test]
    fn keys_are_known_or_the_nearest_is_named() {
        for path in [
            "name",
            "unit",
            "planform.taper_ratio",
            "panel.0.sweep",
            "panel.12.airfoil",
            "airfoil.root",
        ] {
            assert_eq!(known(path), Ok(()), "{path}");
        }
        for (path, near) in [
            ("planform.taper", "planform.taper_ratio"),
            ("taper_ratio", "planform.taper_ratio"),
            ("panel.sweep", "panel.N.sweep"),
            ("panel.0.sweeep", "panel.N.sweep"),
            ("planfrom.span", "planform.span"),
            ("planform.0.span", "planform.span"),
            ("", "dotted paths"),
            ("planform", "[planform]"),
            ("zzz.qqq", "dotted paths"),
        ] {
            let advice = known(path).unwrap_err();
            assert!(advice.contains(near), "{path}: {advice}");
        }
    }
}
