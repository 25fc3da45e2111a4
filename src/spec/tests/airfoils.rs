//! Airfoils as tables: changes, faults, `--set`.

use super::{messages, planform, reading_with};
use crate::spec::{AirfoilChanges, AirfoilForm, AirfoilSource, Reading, SharpBy};

const WING: &str = "span = 2000\nroot_chord = 300\ntip_chord = 200\n";

fn wing(airfoil: &str, set: &[(&str, &str)]) -> Reading {
    reading_with(&format!("[airfoil]\n{airfoil}\n[planform]\n{WING}"), set)
}

fn root(reading: &Reading) -> AirfoilSource {
    let spec = reading.spec.as_ref();
    spec.unwrap_or_else(|| panic!("{:#?}", messages(reading)))
        .root_airfoil
        .clone()
}

#[test]
fn a_table_changes_a_section() {
    let all = AirfoilChanges {
        thickness: Some(0.105),
        camber: Some(0.03),
        inverted: true,
        fairing: None,
    };
    for text in [
        "root = { naca = \"2412\", thickness = 0.105, camber = \"3 %\", inverted = true }",
        "[airfoil.root]\nnaca = \"2412\"\nthickness = \"10.5 %\"\ncamber = 0.03\ninverted = true",
    ] {
        let found = root(&wing(text, &[]));
        assert_eq!(
            (found.text.as_str(), found.form),
            ("2412", AirfoilForm::Designation)
        );
        assert!((found.changes.thickness.unwrap() - 0.105).abs() < 1e-15);
        assert_eq!((found.changes.camber, found.changes.inverted), (all.camber, true));
    }
    let found = root(&wing("root = { file = \"a.dat\", fairing = 2e-4 }", &[]));
    assert_eq!((found.text.as_str(), found.form), ("a.dat", AirfoilForm::File));
    assert_eq!(found.changes.fairing, Some(2e-4));
    assert_eq!(
        (found.place.line, found.place.key.as_str()),
        (2, "airfoil.root.file")
    );
}

#[test]
fn settings_reach_into_a_table_and_make_a_text_one() {
    for text in [
        "root = \"NACA 2412\"",
        "root = { naca = \"NACA 2412\", thickness = 0.2 }",
    ] {
        let reading = wing(
            text,
            &[
                ("airfoil.root.thickness", "10 %"),
                ("airfoil.root.inverted", "true"),
            ],
        );
        let found = root(&reading);
        assert_eq!(found.text, "NACA 2412");
        assert_eq!(
            (found.changes.thickness, found.changes.inverted),
            (Some(0.1), true)
        );
    }
    // a digit text stays a text, a table may be given whole, and the last one counts
    let found = root(&wing("root = \"a.dat\"", &[("airfoil.root.naca", "0012")]));
    assert_eq!(
        (found.text.as_str(), found.form),
        ("0012", AirfoilForm::Designation)
    );
    let found = root(&wing(
        "root = \"a.dat\"",
        &[("airfoil.root", "{ naca = \"2412\", camber = 0.01 }")],
    ));
    assert_eq!((found.text.as_str(), found.changes.camber), ("2412", Some(0.01)));
    let found = root(&wing("root = { naca = \"2412\" }", &[("airfoil.root", "0009")]));
    assert_eq!((found.text.as_str(), found.form), ("0009", AirfoilForm::Either));
    let panels =
        planform("root_chord = 300\n[[panel]]\nspan = 400\ntip_chord = 200\nairfoil = \"NACA 0009\"\n");
    let spec = reading_with(&panels, &[("panel.0.airfoil.thickness", "0.08")])
        .spec
        .unwrap();
    assert_eq!(spec.panels[0].airfoil.changes.thickness, Some(0.08));
    assert!(spec.panels[0].airfoil.name() == "NACA 0009 (thickness 8 %)");
}

#[test]
fn faults_of_changes_say_what_to_write() {
    for (text, set, start) in [
        (
            "root = 3",
            ("name", "a"),
            "wing.toml:2: airfoil.root = 3: a text is expected, or a table with changes\n  Write root = \"NACA 2412\", or",
        ),
        (
            "root = { thickness = 0.1 }",
            ("name", "a"),
            "wing.toml:2: airfoil.root: naca or file is missing",
        ),
        (
            "root = { naca = \"2412\", file = \"a.dat\" }",
            ("name", "a"),
            "wing.toml:2: airfoil.root.file = \"a.dat\": contradicts naca = \"2412\" (line 2)",
        ),
        (
            "root = { naca = \"2412\", thickness = 12 }",
            ("name", "a"),
            "wing.toml:2: airfoil.root.thickness = 12: out of range; allowed: 0.01 to 0.4 (1 % to 40 % of the chord)",
        ),
        (
            "root = { naca = \"2412\", camber = -0.02 }",
            ("name", "a"),
            "wing.toml:2: airfoil.root.camber = -0.02: out of range; allowed: 0 to 0.15 (0 % to 15 % of the chord)\n  \
             Write a camber in that range; inverted = true",
        ),
        (
            "root = { naca = \"2412\", inverted = 1 }",
            ("name", "a"),
            "wing.toml:2: airfoil.root.inverted = 1: true or false is expected",
        ),
        (
            "root = { naca = \"2412\", thicknes = 0.1 }",
            ("name", "a"),
            "wing.toml:2: airfoil.root.thicknes = 0.1: unknown key\n  The nearest known is thickness.",
        ),
        (
            "root = { naca = \"2412\", zzz = 0.1 }",
            ("name", "a"),
            "wing.toml:2: airfoil.root.zzz = 0.1: unknown key\n  The keys of an airfoil are naca, file, thickness,",
        ),
        (
            "root = \"NACA 2412\"",
            ("airfoil.root.fairing", "1"),
            "--set: airfoil.root.fairing = 1: out of range; allowed: 1e-6 to 0.005 of the chord",
        ),
        (
            "root = \"NACA 2412\"",
            ("trailing_edge.closing", "extension"),
            "--set: trailing_edge.closing = extension: says how a formula is closed to a sharp edge, and the edge is not",
        ),
        (
            "root = \"NACA 2412\"",
            ("a.b.c.d.e", "1"),
            "--set: a.b.c.d.e = 1: no key has so many parts",
        ),
    ] {
        let messages = messages(&wing(text, &[set]));
        assert!(
            messages.len() == 1 && messages[0].starts_with(start),
            "{text}: {messages:#?}"
        );
    }
}

#[test]
fn a_sharp_edge_may_say_how_formulas_are_closed() {
    let sharp = |closing: &[(&str, &str)]| {
        let set = [&[("trailing_edge.thickness", "0")], closing].concat();
        wing("root = \"NACA 2412\"", &set).spec.unwrap().sharp_by
    };
    assert_eq!(sharp(&[]), SharpBy::Coefficient);
    assert_eq!(
        sharp(&[("trailing_edge.closing", "extension")]),
        SharpBy::Extension
    );
}
