//! Bad input to be refused: sound specs to spoil, and the demands on every refusal.

use crate::workdir::{Ran, WorkDir};

/// A sound spec, of which the cases change single lines (counted from 1).
const SOUND: [&str; 17] = [
    "name = \"Sound\"",
    "unit = \"mm\"",
    "[planform]",
    "span = 2000",
    "root_chord = 300",
    "tip_chord = 200",
    "sweep = 5",
    "dihedral = 3",
    "[setting]",
    "incidence = 1",
    "twist = -1",
    "[airfoil]",
    "root = \"NACA 2412\"",
    "[trailing_edge]",
    "thickness = 0.5",
    "[build]",
    "sides = \"starboard\"",
];

/// The sound spec with some lines replaced.
pub(crate) fn sound_but(changes: &[(usize, &str)]) -> String {
    let mut lines = SOUND.map(str::to_owned);
    for (line, text) in changes {
        (*text).clone_into(&mut lines[line - 1]);
    }
    lines.join("\n") + "\n"
}

/// A sound spec of panels: `planform` in lines 1 to 5, then `panels` from line 6.
pub(crate) fn sound_panels(panels: &[&str]) -> String {
    let head = "unit = \"mm\"\n[planform]\nroot_chord = 300\n[airfoil]\nroot = \"NACA 0012\"\n";
    head.to_owned() + &panels.join("\n") + "\n"
}

/// Runs `loft wing.toml -o out` and whatever else, which must be refused: exit code 2, the fault on standard error only,
/// no file written. Gives what was said.
#[track_caller]
pub(crate) fn refused_in(directory: &WorkDir, more: &[&str]) -> String {
    let before = directory.files();
    let mut arguments = vec!["loft", "wing.toml", "-o", "out"];
    arguments.extend(more);
    let Ran { code, stdout, stderr } = directory.run(&arguments);
    assert_eq!(code, Some(2), "exit code\n{stdout}\n{stderr}");
    assert_eq!(stdout, "", "a fault is said on standard error");
    assert!(!stderr.contains("panicked"), "{stderr}");
    let after = directory.files();
    let names: Vec<_> = after.iter().map(|(name, _)| name).collect();
    assert!(after == before, "files were left or changed: {names:?}");
    stderr
}

/// The same for a spec alone.
#[track_caller]
pub(crate) fn refused(spec: &str) -> String {
    let directory = WorkDir::new();
    directory.write("wing.toml", spec);
    refused_in(&directory, &[])
}

#[track_caller]
pub(crate) fn assert_says(said: &str, parts: &[&str]) {
    for part in parts {
        assert!(said.contains(part), "no {part:?} in\n{said}");
    }
}

/// Each change must be refused with its line and words.
#[track_caller]
pub(crate) fn assert_refused(cases: &[(usize, &str, &[&str])]) {
    for (line, text, words) in cases {
        let said = refused(&sound_but(&[(*line, text)]));
        assert_says(&said, &[&format!("wing.toml:{line}")]);
        assert_says(&said, words);
    }
}
