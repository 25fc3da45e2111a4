//! `spanwise inspect` as it is typed: tables, JSON, exit codes.

use crate::figures::{Figures, assert_relative};
use crate::workdir::{Ran, WorkDir, copy_from_package};

/// A directory with an example's STEP file, `dunlin.step`.
fn lofted() -> (WorkDir, Figures) {
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    let ran = directory.run(&["loft", "examples/dunlin.toml", "--json"]);
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    (directory, Figures::parse(&ran.stdout))
}

#[test]
fn a_good_file_is_shown_and_ends_with_0() {
    let (directory, _) = lofted();
    let Ran { code, stdout, stderr } = directory.run(&["inspect", "dunlin.step"]);
    assert_eq!((code, stderr.as_str()), (Some(0), ""), "{stdout}");
    for part in [
        "dunlin.step\n",
        "AP242",
        "Solid starboard wing: 4 faces, 6 edges, 4 vertices; each edge used twice, once each way",
        "quarter-chord line, starboard",
        "spec hash, SHA-256",
        "The file agrees with itself.",
    ] {
        assert!(stdout.contains(part), "no {part:?} in\n{stdout}");
    }
    let quiet = directory.run(&["inspect", "dunlin.step", "--quiet"]);
    assert_eq!((quiet.code, quiet.stdout.as_str()), (Some(0), ""));
}

#[test]
fn the_json_has_the_figures_of_the_wing() {
    let (directory, wing) = lofted();
    let ran = directory.run(&["inspect", "dunlin.step", "--json"]);
    let found = Figures::parse(&ran.stdout);
    assert_eq!(ran.code, Some(0));
    assert_eq!(found.text("0.report.format"), "step");
    let volume = found.number("0.report.solids.0.measured.volume");
    assert_relative("volume", volume, wing.number("built.volume"), 1e-10);
    let mac = found
        .list("0.report.lines")
        .into_iter()
        .find(|line| line.text("name").starts_with("mean aero"));
    let mac = mac.expect("the mean aerodynamic chord");
    assert_eq!(mac.text("kind"), "mean aerodynamic chord");
    assert_relative(
        "mean aerodynamic chord",
        mac.number("length"),
        wing.number("reference.mac.length"),
        1e-12,
    );
    assert!(found.list("0.report.findings").is_empty());
}

#[test]
fn a_file_that_disagrees_with_itself_ends_with_1_and_says_where() {
    let (directory, _) = lofted();
    let text = std::fs::read_to_string(directory.join("dunlin.step")).expect("the file");
    let line = text
        .lines()
        .position(|line| line.contains("=ORIENTED_EDGE("))
        .expect("an edge")
        + 1;
    let turned = text.replacen(".T.);\n#", ".F.);\n#", 1);
    assert_ne!(turned, text);
    directory.write("turned.step", turned);
    let lost: String = text
        .lines()
        .enumerate()
        .filter(|(i, _)| i + 1 != line)
        .map(|(_, line)| format!("{line}\n"))
        .collect();
    directory.write("lost.step", lost);
    for file in ["turned.step", "lost.step"] {
        let ran = directory.run(&["inspect", "dunlin.step", file]);
        assert_eq!(ran.code, Some(1), "{}", ran.stdout);
        assert!(
            ran.stdout.contains("The file agrees with itself.") && ran.stdout.contains("\n    line "),
            "{}",
            ran.stdout
        );
    }
}

#[test]
fn a_file_that_cannot_be_read_ends_with_2_after_the_others() {
    let (directory, _) = lofted();
    let text = std::fs::read_to_string(directory.join("dunlin.step")).expect("the file");
    directory.write("short.step", &text[..text.len() / 2]);
    directory.write("hello.step", "hello\n");
    for (file, reason) in [
        ("short.step", "is cut off"),
        ("hello.step", "line 1: a STEP file begins with ISO-10303-21;"),
        ("missing.step", "cannot be read"),
    ] {
        let ran = directory.run(&["inspect", file, "dunlin.step"]);
        assert_eq!(ran.code, Some(2), "{}", ran.stdout);
        assert!(
            ran.stderr.contains(file) && ran.stderr.contains(reason),
            "{}",
            ran.stderr
        );
        assert!(
            ran.stdout.contains("The file agrees with itself."),
            "{}",
            ran.stdout
        );
    }
}
