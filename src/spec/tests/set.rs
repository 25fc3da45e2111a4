//! `--set KEY=VALUE`.

use super::{messages, near, planform, reading_with};

const WING: &str =
    "span = 2000\nroot_chord = 300\ntip_chord = 200\n[[line]]\nname = \"spar\"\nchord_fraction = 0.25\n";

fn set(pairs: &[(&str, &str)]) -> crate::spec::Reading {
    reading_with(&planform(WING), pairs)
}

#[test]
fn values_need_no_quotes() {
    let spec = set(&[
        ("airfoil.root", "NACA 2412"),
        ("planform.span", "2.4 m"),
        ("planform.sweep", "3"),
        ("line.0.to", "0.5"),
        ("line.1.name", "hinge"),
        ("line.1.chord_fraction", "75 %"),
        ("setting.at", "root"),
        ("build.sides", "\"pair\""),
        ("name", "42"),
    ])
    .spec
    .unwrap();
    assert_eq!(
        (
            spec.root_airfoil.text.as_str(),
            spec.root_airfoil.place.file.as_str()
        ),
        ("NACA 2412", "--set")
    );
    near(spec.panels[0].span, 1200.0, 1e-15);
    near(spec.panels[0].sweep.to_degrees(), 3.0, 1e-15);
    assert_eq!(
        (
            spec.lines[0].to,
            spec.lines[1].name.as_str(),
            spec.lines[1].chord_fraction
        ),
        (0.5, "hinge", 0.75)
    );
    assert_eq!((spec.name.as_str(), spec.sides), ("42", crate::spec::Sides::Pair));
}

#[test]
fn panels_can_be_added() {
    let text = planform("root_chord = 300\n");
    let spec = reading_with(&text, &[("panel.0.span", "400"), ("panel.0.tip_chord", "200")])
        .spec
        .unwrap();
    assert_eq!((spec.panels.len(), spec.panels[0].tip_chord), (1, 200.0));
}

#[test]
fn the_last_of_a_key_counts() {
    let spec = set(&[("planform.sweep", "3"), ("planform.sweep", "4")])
        .spec
        .unwrap();
    near(spec.panels[0].sweep.to_degrees(), 4.0, 1e-15);
}

#[test]
fn faults_say_where_they_come_from() {
    for (key, value, start) in [
        ("panel", "[]", "--set: panel = []: at least one panel is needed"),
        (
            "planform.sweep",
            "95",
            "--set: planform.sweep = 95: out of range; allowed: more than -80 deg, less than 80 deg",
        ),
        (
            "planform.taper",
            "0.5",
            "--set: planform.taper = 0.5: unknown key\n  The nearest known is planform.taper_ratio.",
        ),
        ("planform.span", "nan", "--set: planform.span = nan: out of range"),
        (
            "planform.span",
            "3 deg",
            "--set: planform.span = 3 deg: deg is the unit of an angle, and a length is expected",
        ),
        (
            "planform..span",
            "3",
            "--set: planform..span = 3: the key is not complete",
        ),
        (
            "planform.span.x",
            "3",
            "--set: planform.span.x = 3: planform.span holds a value, so there is no \"x\" in it",
        ),
        (
            "line.4.to",
            "1",
            "--set: line.4.to = 1: line has 1 entries, counted from 0, and \"4\" is none of them",
        ),
        (
            "panel.x.to",
            "1",
            "--set: panel.x.to = 1: panel has 0 entries, counted from 0, and \"x\" is none of them",
        ),
        ("planform", "3", "--set: planform = 3: a table is expected"),
        ("airfoil.root", "", "--set: airfoil.root: the text is empty"),
        (
            "planform.area",
            "0.9 m^2",
            "--set: planform.area = 0.9 m^2: contradicts span = 2000 mm (line 4), root_chord = 300 mm (line 5) and \
             tip_chord = 200 mm (line 6):\n  area, root_chord and tip_chord make span 3600 mm, not 2000 mm (+1600 mm, +80 %)\n  \
             span, root_chord and tip_chord make area 0.5 m^2, not 0.9 m^2 (-0.4 m^2, -44.44 %)",
        ),
    ] {
        let messages = messages(&set(&[(key, value)]));
        assert!(
            messages.iter().any(|message| message.starts_with(start)),
            "{key}={value}: {messages:#?}"
        );
    }
}
