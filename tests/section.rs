//! `spanwise section`, and sections with changes in a wing.

use crate::figures::{Figures, assert_near, assert_relative};
use crate::refusal::{assert_refused, assert_says, refused_in, sound_but};
use crate::workdir::{Ran, WorkDir, copy_from_package};

/// A directory with the package's coordinate files in `airfoils/`.
fn directory() -> WorkDir {
    let directory = WorkDir::new();
    copy_from_package("airfoils", directory.path());
    directory
}

/// Runs `section`, which must succeed without a word on standard error.
#[track_caller]
fn section(directory: &WorkDir, arguments: &[&str]) -> String {
    let Ran { code, stdout, stderr } = directory.run(&[&["section"], arguments].concat());
    assert_eq!(code, Some(0), "{arguments:?}: {stderr}");
    assert_eq!(stderr, "", "{arguments:?}");
    stdout
}

#[track_caller]
fn figures(directory: &WorkDir, arguments: &[&str]) -> Figures {
    Figures::parse(&section(directory, &[arguments, &["--json"]].concat()))
}

/// Runs `section`, which must refuse: exit code 2, nothing on standard output, no file. Gives what was said.
#[track_caller]
fn refused(directory: &WorkDir, arguments: &[&str]) -> String {
    let before = directory.files();
    let Ran { code, stdout, stderr } = directory.run(&[&["section"], arguments].concat());
    assert_eq!(code, Some(2), "{arguments:?}: {stdout}{stderr}");
    assert_eq!(stdout, "", "{arguments:?}");
    assert!(!stderr.contains("panicked"), "{stderr}");
    assert!(directory.files() == before, "{arguments:?} left files");
    stderr
}

const FILES: [&str; 3] = [
    "airfoils/fell-113.dat",
    "airfoils/moor-135.dat",
    "airfoils/skerry-100.dat",
];

#[test]
fn a_designation_has_the_figures_of_its_formula() {
    let directory = WorkDir::new();
    // 0012: t = 0.12 at x = 0.3; radius 1.1019 t²; area 10 t (2/3 0.2969 - 0.1260/2 - 0.3516/3 + 0.2843/4 - 0.1015/5)
    let found = figures(&directory, &["NACA 0012"]);
    let area = 10.0 * 0.12 * (2.0 / 3.0 * 0.2969 - 0.1260 / 2.0 - 0.3516 / 3.0 + 0.2843 / 4.0 - 0.1015 / 5.0);
    assert_near("area", found.number("area"), area, 1e-9);
    // the greatest ordinate of the polynomial is a little more than the nominal one (computed by halving on its slope)
    assert_near("thickness", found.number("thickness.value"), 0.1200345462, 1e-9);
    assert_near("its place", found.number("thickness.x"), 0.2998279, 1e-5);
    let radius = 0.5 * (0.12 * 0.2969 / 0.2_f64).powi(2);
    assert_relative("nose radius", found.number("nose_radius"), radius, 1e-6);
    assert_near("base", found.number("trailing_edge.base"), 0.00252, 1e-12);
    assert_near("zero lift", found.number("zero_lift_angle"), 0.0, 1e-12);
    // 2412: thin-aerofoil theory on two parabolas, in closed form -2.0772 deg and -0.0531 (computed)
    let found = figures(&directory, &["2412"]);
    assert_near("zero lift", found.number("zero_lift_angle"), -2.0772, 1e-3);
    assert_near("moment", found.number("quarter_chord_moment"), -0.0531, 1e-4);
    assert_near("camber", found.number("camber.value"), 0.02, 1e-12);
    assert_near("its place", found.number("camber.x"), 0.4, 1e-12);
    assert!(found.count("fit.upper_points") <= 26 && found.number("fit.max_deviation") <= 1e-6);
    let sheet = section(&directory, &["NACA 2412"]);
    assert_says(
        &sheet,
        &[
            "NACA 2412\n",
            "camber ",
            "2 % at x 40 %",
            "zero-lift angle",
            "-2.07724°",
            "open trailing edge as the family defines it, with a base of 0.252 %",
        ],
    );
    assert_eq!(section(&directory, &["NACA 2412", "--quiet"]), "");
}

#[test]
fn every_key_of_the_json_is_there() {
    let directory = directory();
    let keys = |found: &Figures, path: &str| {
        let value = found.at(path).as_object().expect("an object").clone();
        let mut keys: Vec<String> = value.keys().cloned().collect();
        keys.sort();
        keys.join(" ")
    };
    let found = figures(&directory, &["NACA 2412"]);
    assert_eq!(
        keys(&found, ""),
        "area camber centroid files fit ideal_angle ideal_lift name nose_radius notes perimeter quarter_chord_moment \
         thickness trailing_edge waviness zero_lift_angle"
    );
    assert_eq!(keys(&found, "trailing_edge"), "angle base closing");
    assert_eq!(
        keys(&found, "fit"),
        "lower_points max_deviation point_deviation upper_points"
    );
    assert_eq!(keys(&found, "waviness"), "excess lower upper");
    let found = figures(&directory, &[FILES[0], "--points", "33"]);
    assert!(found.text("title").starts_with("Fell 113"));
    assert_eq!(found.list("points").len(), 33);
    assert!(!found.list("notes").is_empty());
}

#[test]
fn each_coordinate_file_has_the_figures_of_its_header() {
    let directory = directory();
    // thickness and camber as the headers state them, to the last digit printed there
    for (file, thickness, camber, base) in [
        (FILES[0], 0.113, 0.036, 0.0),
        (FILES[1], 0.135, 0.017, 0.004),
        (FILES[2], 0.100, 0.015, 0.0),
    ] {
        let found = figures(&directory, &[file]);
        assert_near(file, found.number("thickness.value"), thickness, 5e-4);
        assert_near(file, found.number("camber.value"), camber, 5e-4);
        assert_near(file, found.number("trailing_edge.base"), base, 1e-7);
        assert_eq!(found.count("waviness.excess"), 0);
        assert!(found.number("fit.point_deviation") <= 1e-6, "{file}");
    }
}

#[test]
fn points_read_back_give_the_same_figures() {
    let directory = directory();
    for (airfoil, layout) in [
        ("NACA 2412", "loop"),
        ("NACA 4415", "blocks"),
        ("NACA 23012", "loop"),
        ("NACA 0012-64", "blocks"),
        (FILES[0], "blocks"),
        (FILES[1], "loop"),
        (FILES[2], "blocks"),
    ] {
        let of_source = figures(&directory, &[airfoil]);
        let text = section(&directory, &[airfoil, "--points", "161", "--layout", layout]);
        directory.write("again.dat", text);
        let again = figures(&directory, &["again.dat"]);
        for (key, allowed) in [
            ("area", 1e-5),
            ("zero_lift_angle", 0.02),
            ("thickness.value", 1e-5),
            ("camber.value", 5e-5),
            ("trailing_edge.base", 1e-7),
        ] {
            let what = format!("{airfoil}: {key}");
            assert_near(&what, again.number(key), of_source.number(key), allowed);
        }
    }
}

#[test]
fn changes_are_made_as_asked() {
    let directory = directory();
    for airfoil in ["NACA 2412", FILES[1]] {
        let found = figures(
            &directory,
            &[airfoil, "--thickness", "0.1", "--camber", "0.03", "--inverted"],
        );
        // in a formula the thickness is the ratio of its digits, laid off square to the mean line
        assert_near(airfoil, found.number("thickness.value"), 0.1, 2e-4);
        assert_near(airfoil, found.number("camber.value"), -0.03, 1e-6);
        assert!(found.number("zero_lift_angle") > 2.0);
        assert_says(
            found.text("name"),
            &[airfoil, "thickness 10 %, camber 3 %, inverted"],
        );
    }
    let found = figures(&directory, &["NACA 2412", "--sharp"]);
    assert_near("base", found.number("trailing_edge.base"), 0.0, 1e-12);
    assert_says(found.text("trailing_edge.closing"), &["-0.1036"]);
    let sheet = section(&directory, &[FILES[0], "--fairing", "2e-4"]);
    assert_says(&sheet, &["Smoothing moved no point by more than"]);
    let found = figures(&directory, &[FILES[0], "--fairing", "2e-4"]);
    assert!(found.number("fit.point_deviation") <= 2e-4);
}

#[test]
fn a_wavy_file_is_called_so_and_fairing_smooths_it() {
    let directory = WorkDir::new();
    // NACA 0012 with ripples of 2e-4 of the chord, twelve along the side: curvature to 2e-4 (24 pi)^2 = 1.1
    let points = figures(&directory, &["NACA 0012", "--points", "321"]).list("points");
    let mut text = "rippled\n".to_owned();
    for point in &points {
        let (x, y) = (point.number("0"), point.number("1"));
        let ripple = 2e-4 * (24.0 * std::f64::consts::PI * x).sin() * x.min(1.0 - x).clamp(0.0, 0.1) * 10.0;
        text += &format!("{x:.7} {:.7}\n", y + ripple);
    }
    directory.write("rippled.dat", text);
    let found = figures(&directory, &["rippled.dat"]);
    assert!(found.count("waviness.excess") > 4);
    assert_says(&found.at("notes").to_string(), &["Wavy: "]);
    let smooth = figures(&directory, &["rippled.dat", "--fairing", "5e-4"]);
    assert_eq!(smooth.count("waviness.excess"), 0);
    directory.write(
        "wing.toml",
        sound_but(&[(
            13,
            "root = \"rippled.dat\"\ntip = { file = \"rippled.dat\", fairing = 5e-4 }",
        )]),
    );
    let found = crate::figures::Figures::parse(
        &directory
            .run(&["loft", "wing.toml", "-o", "out", "--json"])
            .stdout,
    );
    assert_says(
        &found.at("notes").to_string(),
        &[
            "rippled.dat: Wavy: ",
            "rippled.dat (faired within 5.0e-4): Smoothing moved no point",
        ],
    );
}

#[test]
fn the_drawing_is_written_whole_and_has_its_parts() {
    let directory = directory();
    let sheet = section(&directory, &["NACA 4412", "--svg", "a.svg"]);
    assert_says(&sheet, &["Written: a.svg"]);
    section(
        &directory,
        &[FILES[1], "--svg", "drawings/b.svg", "--points", "61", "--quiet"],
    );
    for name in ["a.svg", "drawings/b.svg"] {
        let svg = std::fs::read_to_string(directory.join(name)).expect("the drawing");
        for id in ["contour", "camber", "nose", "comb", "chord"] {
            assert!(svg.contains(&format!("id=\"{id}\"")), "{name}: no {id}");
        }
        assert!(svg.starts_with("<svg ") && svg.ends_with("</svg>\n"), "{name}");
    }
}

#[test]
fn what_is_no_section_is_refused() {
    let directory = directory();
    directory.write("word.dat", "a title\n1 0\n0.5 high\n0 0\n");
    directory.write("empty.dat", "");
    for (arguments, words) in [
        (
            &["NACA 64A010"] as &[&str],
            &["NACA 64A010", "no designation", "give four digits"] as &[&str],
        ),
        (&["2400"], &["2400", "thickness of 0 %"]),
        (
            &["none.dat"],
            &["none.dat", "cannot be read", "give a designation"],
        ),
        (&["airfoils"], &["airfoils", "cannot be read"]),
        (&["word.dat"], &["word.dat:3", "0.5 high"]),
        (&["empty.dat"], &["empty.dat"]),
        (&["2412", "--points", "12"], &["--points", "13 to 100000"]),
        (&["2412", "--layout", "blocks"], &["--points"]),
        (&["2412", "--thickness", "12"], &["--thickness", "0.105"]),
        (&["2412", "--thickness", "0.5"], &["0.01 to 0.40"]),
        (&["0012", "--camber", "0.02"], &["symmetric"]),
        (&["2412", "--fairing", "1e-4"], &["fairing", "formula"]),
        (&[FILES[0], "--fairing", "1"], &["--fairing", "1e-6 to 0.005"]),
        (&[FILES[0], "--sharp"], &["--sharp"]),
        (&["2412", "--svg", "airfoils"], &["airfoils", "cannot be written"]),
        (
            &["2412", "--svg", "word.dat/a.svg"],
            &["word.dat", "cannot be written"],
        ),
        (&[], &["AIRFOIL"]),
    ] {
        assert_says(&refused(&directory, arguments), words);
    }
}

#[test]
fn a_wing_takes_sections_with_changes() {
    let directory = directory();
    let loft = |spec: &str, more: &[&str]| {
        directory.write("wing.toml", spec);
        let arguments = [
            &["loft", "wing.toml", "-o", "out", "--only", "json", "--json"],
            more,
        ]
        .concat();
        let Ran { code, stdout, stderr } = directory.run(&arguments);
        assert_eq!(code, Some(0), "{stderr}\n{stdout}");
        Figures::parse(&stdout)
    };
    let plain = loft(&sound_but(&[(13, "root = \"NACA 2412\"")]), &[]);
    // the volume follows the thickness, the trailing edge of 0.5 mm apart
    let thin = loft(
        &sound_but(&[(13, "root = { naca = \"2412\", thickness = 0.06 }")]),
        &[],
    );
    assert_relative(
        "volume",
        thin.number("built.volume"),
        0.5 * plain.number("built.volume"),
        0.02,
    );
    // the same by --set on the text
    let set = loft(
        &sound_but(&[(13, "root = \"NACA 2412\"")]),
        &["--set", "airfoil.root.thickness=6 %"],
    );
    assert_relative(
        "volume",
        set.number("built.volume"),
        thin.number("built.volume"),
        1e-12,
    );
    assert_says(
        &set.at("notes").to_string(),
        &["NACA 2412 (thickness 6 %): open trailing edge"],
    );
    // one text with two changes is two sections; upside down the centroid is below
    let tail = loft(
        &sound_but(&[(
            13,
            "root = { naca = \"2412\", inverted = true }\ntip = { naca = \"2412\" }",
        )]),
        &[],
    );
    assert!(tail.number("built.centroid.2") < plain.number("built.centroid.2"));
    assert_says(&tail.at("notes").to_string(), &["Sections blend"]);
    // both ways of closing say which
    for (closing, words) in [("coefficient", "-0.1036"), ("extension", "1.008930411")] {
        let line = format!("thickness = 0\nclosing = \"{closing}\"");
        let found = loft(&sound_but(&[(15, &line)]), &[]);
        assert_says(
            &found.at("notes").to_string(),
            &["Trailing edge sharp", "NACA 2412: ", words],
        );
    }
}

#[test]
fn a_wing_refuses_changes_that_cannot_be() {
    assert_refused(&[
        (
            13,
            "root = { naca = \"2412\", thicknes = 0.1 }",
            &["airfoil.root.thicknes", "unknown key", "thickness"],
        ),
        (
            13,
            "root = { naca = \"0012\", camber = 0.02 }",
            &["airfoil.root.naca", "symmetric"],
        ),
        (
            13,
            "root = { naca = \"2412\", fairing = 1e-4 }",
            &["airfoil.root.naca", "fairing"],
        ),
        (
            13,
            "root = { file = \"2412\" }",
            &["airfoil.root.file", "cannot be read"],
        ),
        (
            13,
            "root = { naca = \"fell.dat\" }",
            &["airfoil.root.naca", "no designation"],
        ),
    ]);
    let directory = WorkDir::new();
    directory.write("wing.toml", sound_but(&[]));
    let said = refused_in(&directory, &["--set", "airfoil.root.thickness=2"]);
    assert_says(&said, &["--set", "airfoil.root.thickness = 2", "0.01 to 0.4"]);
}
