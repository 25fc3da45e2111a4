//! What is refused, how it is said, and that nothing is left behind.

use crate::workdir::{Ran, WorkDir, program};
use std::fs;

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
fn sound_but(changes: &[(usize, &str)]) -> String {
    let mut lines = SOUND.map(str::to_owned);
    for (line, text) in changes {
        (*text).clone_into(&mut lines[line - 1]);
    }
    lines.join("\n") + "\n"
}

/// A sound spec of panels: `planform` in lines 1 to 5, then `panels` from line 6.
fn sound_panels(panels: &[&str]) -> String {
    let head = "unit = \"mm\"\n[planform]\nroot_chord = 300\n[airfoil]\nroot = \"NACA 0012\"\n";
    head.to_owned() + &panels.join("\n") + "\n"
}

/// Runs `loft wing.toml -o out` and whatever else, which must be refused: exit code 2, the fault on standard error only,
/// no file written. Gives what was said.
#[track_caller]
fn refused_in(directory: &WorkDir, more: &[&str]) -> String {
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
fn refused(spec: &str) -> String {
    let directory = WorkDir::new();
    directory.write("wing.toml", spec);
    refused_in(&directory, &[])
}

#[track_caller]
fn assert_says(said: &str, parts: &[&str]) {
    for part in parts {
        assert!(said.contains(part), "no {part:?} in\n{said}");
    }
}

/// Each change must be refused with its line and words.
#[track_caller]
fn assert_refused(cases: &[(usize, &str, &[&str])]) {
    for (line, text, words) in cases {
        let said = refused(&sound_but(&[(*line, text)]));
        assert_says(&said, &[&format!("wing.toml:{line}")]);
        assert_says(&said, words);
    }
}

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
fn a_missing_file_is_named() {
    assert_refused(&[(13, "root = \"none.dat\"", &["airfoil.root", "none.dat"])]);
    let directory = WorkDir::new();
    let said = refused_in(&directory, &[]);
    assert_says(&said, &["wing.toml"]);
}

/// A coordinate file in the loop layout, 41 points, which `change` may spoil; line 1 is the title.
fn coordinates(change: impl Fn(&mut Vec<String>)) -> String {
    let side = |sign: f64| {
        (0..=20).map(move |i| {
            let s = f64::from(i) / 20.0;
            let x = s * s;
            format!("{x:.7} {:.7}", sign * 0.17 * s * (1.0 - x))
        })
    };
    let upper: Vec<String> = side(1.0).collect();
    let mut lines = vec!["a symmetric section".to_owned()];
    lines.extend(upper.into_iter().rev());
    lines.extend(side(-1.0).skip(1));
    change(&mut lines);
    lines.join("\n") + "\n"
}

#[test]
fn a_malformed_coordinate_file_is_refused_with_its_line() {
    let cases: [(&str, String, &[&str]); 7] = [
        (
            "a word",
            coordinates(|lines| lines[6] = "0.5 high".to_owned()),
            &["section.dat:7", "high"],
        ),
        (
            "one number",
            coordinates(|lines| lines[6] = "0.5".to_owned()),
            &["section.dat:7", "0.5"],
        ),
        (
            "three numbers",
            coordinates(|lines| lines[6] = "0.5 0.05 0.1".to_owned()),
            &["section.dat:7", "0.5 0.05 0.1"],
        ),
        (
            "no number",
            coordinates(|lines| lines[6] = "0.5 nan".to_owned()),
            &["section.dat:7", "nan"],
        ),
        (
            "title alone",
            coordinates(|lines| lines.truncate(1)),
            &["section.dat"],
        ),
        ("nothing", String::new(), &["section.dat"]),
        (
            "counts",
            "title\n 20. 20.\n\n 0 0\n 0.5 0.05\n 1 0\n\n 0 0\n 0.5 -0.05\n 1 0\n".to_owned(),
            &["section.dat", "20"],
        ),
    ];
    for (what, content, words) in cases {
        let directory = WorkDir::new();
        directory.write("wing.toml", sound_but(&[(13, "root = \"section.dat\"")]));
        directory.write("section.dat", content);
        let said = refused_in(&directory, &[]);
        for word in words {
            assert!(said.contains(word), "{what}: no {word:?} in\n{said}");
        }
    }
}

#[test]
fn the_coordinate_file_that_the_cases_spoil_is_sound() {
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[(13, "root = \"section.dat\"")]));
    directory.write("section.dat", coordinates(|_| ()));
    let ran = directory.run(&["loft", "wing.toml", "-o", "out"]);
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
}

#[test]
fn an_unreadable_coordinate_file_is_refused() {
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[(13, "root = \"folder.dat\"")]));
    fs::create_dir(directory.join("folder.dat")).expect("a directory in the file's place");
    assert_says(&refused_in(&directory, &[]), &["wing.toml:13", "folder.dat"]);
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[(13, "root = \"bytes.dat\"")]));
    directory.write("bytes.dat", [b't', b'\n', 0xff, 0xfe, 0x00, b'\n']);
    assert_says(&refused_in(&directory, &[]), &["bytes.dat"]);
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

#[test]
fn wrong_usage_ends_with_2() {
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[]));
    assert_says(
        &refused_in(&directory, &["--only", "picture"]),
        &["picture", "step", "stl"],
    );
    assert_says(&refused_in(&directory, &["--sideways"]), &["--sideways"]);
    for arguments in [vec!["loft"], vec!["fly"], vec![]] {
        let ran = directory.run(&arguments);
        assert_eq!(ran.code, Some(2), "{arguments:?}: {}", ran.stderr);
    }
}

#[test]
fn an_output_directory_that_cannot_be_is_named() {
    // a file stands where the directory would: that stops even a user whom no permission stops
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[]));
    directory.write("taken", "a file\n");
    let before = directory.files();
    for out in ["taken", "taken/out"] {
        let ran = directory.run(&["loft", "wing.toml", "-o", out]);
        assert_eq!(ran.code, Some(2), "{}", ran.stderr);
        assert_says(&ran.stderr, &["taken"]);
        assert_eq!(directory.files(), before);
    }
}

#[test]
fn a_fault_leaves_the_files_of_an_earlier_run_alone() {
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[(7, "sweep = 85")]));
    for end in ["step", "stl", "json"] {
        directory.write(&format!("out/wing.{end}"), "of an earlier run\n");
    }
    refused_in(&directory, &[]);
}

/// Files may grow to 4 KiB (8 blocks of 512 bytes) and the system says so instead of ending the program: to it, a full disk.
#[cfg(unix)]
#[test]
fn a_full_disk_is_said_and_leaves_every_file_whole() {
    use std::process::Command;
    for earlier in [false, true] {
        let directory = WorkDir::new();
        directory.write("wing.toml", sound_but(&[]));
        if earlier {
            for end in ["step", "stl", "json"] {
                directory.write(&format!("out/wing.{end}"), "of an earlier run\n");
            }
        }
        let before = directory.files();
        let limited = "trap '' XFSZ; ulimit -f 8; exec \"$@\"";
        let ran: Ran = Command::new("sh")
            .args(["-c", limited, "sh"])
            .arg(program(directory.path()).get_program())
            .args(["loft", "wing.toml", "-o", "out"])
            .current_dir(directory.path())
            .output()
            .expect("a shell")
            .into();
        assert_eq!(ran.code, Some(2), "{}", ran.stderr);
        assert_says(&ran.stderr, &["wing."]);
        let after = directory.files();
        let names: Vec<_> = after.iter().map(|(name, _)| name).collect();
        assert!(after == before, "files were left or changed: {names:?}");
    }
}
