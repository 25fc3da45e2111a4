//! Faults of a spec: what is refused, and that the message says where, what, and what would do.

use crate::refusal::{assert_refused, assert_says, refused, refused_in, sound_but, sound_panels};
use crate::workdir::WorkDir;

#[test]
fn the_sound_specs_are_sound() {
    let panels = [
        "[[panel]]",
        "span = 900",
        "tip_chord = 250",
        "[[panel]]",
        "span = 300",
        "tip_chord = 150",
    ];
    for spec in [sound_but(&[]), sound_panels(&panels)] {
        let directory = WorkDir::new();
        directory.write("wing.toml", spec);
        let ran = directory.run(&["loft", "wing.toml", "-o", "out"]);
        assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    }
}

#[test]
fn an_unknown_key_names_the_nearest_known_one() {
    assert_refused(&[
        (7, "swep = 5", &["swep", "sweep"]),
        (6, "tipchord = 200", &["tipchord", "tip_chord"]),
        (14, "[trailing_edges]", &["trailing_edges", "trailing_edge"]),
        (1, "nme = \"Sound\"", &["nme", "name"]),
    ]);
}

#[test]
fn a_wrong_type_is_named_with_what_was_typed() {
    assert_refused(&[
        (5, "root_chord = true", &["root_chord", "true"]),
        (7, "sweep = [5, 6]", &["sweep", "[5, 6]"]),
        (13, "root = 2412", &["airfoil.root", "2412"]),
        (1, "name = 12", &["name", "12"]),
    ]);
}

#[test]
fn a_wrong_unit_is_named_with_those_that_fit() {
    assert_refused(&[
        (
            5,
            "root_chord = \"300 furlongs\"",
            &["root_chord", "300 furlongs", "mm", "in"],
        ),
        (5, "root_chord = \"300 kg\"", &["root_chord", "300 kg", "mm"]),
        (4, "span = \"2 m^2\"", &["span", "2 m^2"]),
        (2, "unit = \"yd\"", &["unit", "yd", "mm", "cm", "ft"]),
        (
            17,
            "sides = \"left\"",
            &["sides", "left", "starboard", "port", "both", "pair"],
        ),
    ]);
}

#[test]
fn a_number_out_of_range_is_named_with_the_range() {
    assert_refused(&[
        (4, "span = nan", &["span", "nan"]),
        (4, "span = inf", &["span", "inf"]),
        (4, "span = -2000", &["span", "-2000", "0"]),
        (5, "root_chord = 0", &["root_chord", "0"]),
        (6, "taper_ratio = 0", &["taper_ratio", "0"]),
        (6, "tip_chord = 0.0", &["tip_chord", "0"]),
        (7, "sweep = 80", &["sweep", "80"]),
        (7, "sweep = -84.5", &["sweep", "-84.5", "80"]),
        (8, "dihedral = 91", &["dihedral", "91", "90"]),
        (10, "incidence = nan", &["incidence", "nan"]),
        (15, "thickness = -0.5", &["thickness", "-0.5", "0"]),
    ]);
}

#[test]
fn text_that_is_no_toml_is_refused_with_its_line() {
    assert_refused(&[
        (7, "sweep = = 5", &["wing.toml:7"]),
        (3, "[planform", &["wing.toml:3"]),
    ]);
}

#[test]
fn sizes_that_contradict_one_another_are_named_with_the_difference() {
    // root 300, tip 200, span 2000: 500 000 mm², not 600 000
    let said = refused(&sound_but(&[(8, "area = 600000")]));
    assert_says(
        &said,
        &[
            "wing.toml",
            "area",
            "600000",
            "500000",
            "span",
            "root_chord",
            "tip_chord",
        ],
    );
    let said = refused(&sound_but(&[(8, "taper_ratio = 0.5")]));
    assert_says(
        &said,
        &["wing.toml", "taper_ratio", "0.5", "root_chord", "tip_chord"],
    );
}

#[test]
fn sizes_that_leave_the_wing_open_are_answered_with_what_would_settle_it() {
    let said = refused(&sound_but(&[(6, "")]));
    assert_says(
        &said,
        &["wing.toml", "span", "root_chord", "tip_chord", "taper_ratio"],
    );
    let said = refused(&sound_but(&[(4, ""), (5, ""), (6, "")]));
    assert_says(&said, &["wing.toml", "planform"]);
}

#[test]
fn all_faults_of_a_spec_are_said_together() {
    let said = refused(&sound_but(&[
        (4, "span = -1"),
        (7, "swep = 5"),
        (10, "incidence = \"1 kg\""),
        (17, "sides = \"left\""),
    ]));
    assert_says(
        &said,
        &["wing.toml:4", "wing.toml:7", "wing.toml:10", "wing.toml:17"],
    );
}

#[test]
fn an_unknown_designation_is_refused() {
    assert_refused(&[
        (13, "root = \"NACA 24\"", &["airfoil.root", "NACA 24"]),
        (13, "root = \"NACA 2400\"", &["airfoil.root", "NACA 2400"]),
        (13, "root = \"NACA 29912\"", &["airfoil.root", "NACA 29912"]),
    ]);
}

#[test]
fn panels_that_fold_back_are_refused() {
    let up_and_down = [
        "[[panel]]",
        "span = 900",
        "tip_chord = 250",
        "dihedral = 90",
        "[[panel]]",
        "span = 300",
        "tip_chord = 150",
        "dihedral = -90",
    ];
    let said = refused(&sound_panels(&up_and_down));
    assert_says(&said, &["wing.toml", "panel", "dihedral"]);
}

#[test]
fn a_section_too_thick_for_the_mitre_of_its_panel_is_refused() {
    // the mitre at 80° takes 18 mm tan 40° = 15 mm of the tip panel on its inner side; the panel has 5 mm
    let short = [
        "[[panel]]",
        "span = 900",
        "tip_chord = 300",
        "[[panel]]",
        "span = 5",
        "tip_chord = 290",
        "dihedral = 80",
    ];
    let said = refused(&sound_panels(&short));
    assert_says(&said, &["wing.toml", "panel"]);
}

#[test]
fn a_panel_that_is_no_size_is_refused() {
    for (index, text) in [
        (1, "span = 0"),
        (1, "span = -5"),
        (2, "tip_chord = 0"),
        (2, "tip_chord = nan"),
    ] {
        let mut panels = ["[[panel]]", "span = 900", "tip_chord = 250"];
        panels[index] = text;
        let said = refused(&sound_panels(&panels));
        let (key, value) = text.split_once(" = ").expect("a key and a value");
        assert_says(&said, &[&format!("wing.toml:{}", 6 + index), key, value]);
    }
}

#[test]
fn a_line_that_runs_out_of_the_wing_is_refused() {
    let with_line = |line: &str| sound_but(&[]) + line;
    let cases = [
        (
            "[[line]]\nname = \"spar\"\nchord_fraction = 1.2\nfrom = 0\nto = 1\n",
            "wing.toml:20",
            "1.2",
        ),
        (
            "[[line]]\nname = \"spar\"\nchord_fraction = 0.2\nfrom = -0.1\nto = 1\n",
            "wing.toml:21",
            "-0.1",
        ),
        (
            "[[line]]\nname = \"spar\"\nchord_fraction = 0.2\nfrom = 0\nto = 1.5\n",
            "wing.toml:22",
            "1.5",
        ),
    ];
    for (line, place, text) in cases {
        assert_says(&refused(&with_line(line)), &[place, text, "1"]);
    }
}

#[test]
fn a_key_set_on_the_command_line_is_checked_like_one_in_the_file() {
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[]));
    assert_says(
        &refused_in(&directory, &["--set", "planform.swep=3"]),
        &["--set", "swep", "sweep"],
    );
    assert_says(
        &refused_in(&directory, &["--set", "planform.sweep=85"]),
        &["--set", "sweep", "85", "80"],
    );
    assert_says(
        &refused_in(&directory, &["--set", "planform.sweep"]),
        &["planform.sweep"],
    );
}
