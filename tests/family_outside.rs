//! Families as programs see them that know nothing of this one, and the examples of their use.

use crate::family::{family, folder, lines, workshop};
use crate::figures::assert_relative;
use crate::python::outside;
use crate::workdir::{Ran, package};
use std::fs;
use std::path::PathBuf;
use std::process::Command;

#[test]
fn every_tenth_solid_of_a_mixed_family_is_valid_in_open_cascade() {
    let directory = workshop();
    let base = fs::read_to_string(package().join("examples/corrie.toml")).expect("an example");
    directory.write("wing.toml", base);
    let mut table =
        "airfoil.root,panel.1.airfoil,panel.0.sweep,panel.1.dihedral,panel.1.twist,panel.1.tip_chord,trailing_edge.thickness,build.sides,tip.form\n"
            .to_owned();
    for i in 0..60 {
        let root = ["NACA 23015", "NACA 2415", "airfoils/fell-113.dat"][i / 4 % 3];
        let row = [
            root.to_owned(),
            ["NACA 23011", "NACA 2410", "NACA 0009"][i % 3].to_owned(),
            format!("{} deg", (i * 7) % 41),
            ((i * 5) % 60).to_string(),
            format!("-{}.5", i % 5),
            format!("{}.{}", 1 + i % 2, 2 + i % 7),
            ["8 mm", "0"][i / 2 % 2].to_owned(),
            ["both", "starboard", "port", "pair"][i % 4].to_owned(),
            ["square", "round"][i / 3 % 2].to_owned(),
        ];
        table += &(row.join(",") + "\n");
    }
    directory.write("table.csv", table);
    family(&directory, &["--table", "table.csv", "-o", "out"], 0);
    let files = folder(&directory, "out");
    let tenth: Vec<usize> = (0..60).step_by(10).chain([1, 11, 31, 43]).collect();
    let paths: Vec<PathBuf> = tenth
        .iter()
        .map(|i| directory.join(format!("out/{:04}.step", i + 1)))
        .collect();
    let found = outside("step_read.py", &paths);
    for (k, i) in tenth.iter().enumerate() {
        let read = |key: &str| format!("{k}.{key}");
        assert!(
            found.truth(&read("readable")) && found.truth(&read("valid")),
            "variant {}",
            i + 1
        );
        assert!(found.list(&read("messages")).is_empty(), "variant {}", i + 1);
        let own = lines(&files)[*i].number("figures.built.volume") * 1e9; // the example is in metres
        assert_relative(
            &format!("volume of {}", i + 1),
            own,
            found.number(&read("volume")),
            1e-6,
        );
    }
}

#[test]
fn the_script_in_python_drives_the_command_and_reads_the_table() {
    let directory = workshop();
    let run = || {
        let mut command = Command::new("python3");
        command
            .arg(package().join("examples/family.py"))
            .args(["wing.toml", "study"])
            .current_dir(directory.path())
            .env("SPANWISE", env!("CARGO_BIN_EXE_spanwise"))
            .env_remove("SOURCE_DATE_EPOCH");
        Ran::from(command.output().expect("python3 on the path"))
    };
    let ran = run();
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    assert!(ran.stdout.starts_with("24 wings, "), "{}", ran.stdout);
    // thicker sections have more room, and the least aspect ratio the most volume
    let best = ran.stdout.lines().nth(2).expect("a best wing");
    assert!(best.starts_with("ar6-t30-2415"), "{best}");
    assert!(directory.join("study/wings/ar6-t30-2415.step").exists());
    assert_eq!(run().stdout, ran.stdout, "again");
}

#[test]
fn the_program_in_rust_takes_the_library() {
    let directory = workshop();
    let tests = std::env::current_exe().expect("the tests' own path");
    let example = (tests.parent().and_then(|deps| deps.parent()))
        .expect("target/PROFILE/deps")
        .join("examples/family");
    if !example.exists() {
        // a run of all tests builds the examples, a run of some does not
        let mut build = Command::new(env!("CARGO"));
        build
            .args(["build", "--quiet", "--example", "family"])
            .current_dir(package());
        if !cfg!(debug_assertions) {
            build.arg("--release");
        }
        assert!(build.status().expect("cargo").success());
    }
    let ran: Ran = Command::new(&example)
        .args(["wing.toml", "out"])
        .current_dir(directory.path())
        .output()
        .unwrap_or_else(|fault| panic!("{}: {fault}", example.display()))
        .into();
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    assert!(ran.stdout.contains(" of 52 wings: "), "{}", ran.stdout);
    let step = folder(&directory, "out");
    assert_eq!(step.len(), 1);
    // the same file as the command makes of the same family
    let varied = [
        "--vary",
        "planform.aspect_ratio=6..12/13",
        "--vary",
        "planform.taper_ratio=0.3..0.6/4",
    ];
    family(
        &directory,
        &[&varied[..], &["-o", "all", "--only", "step"]].concat(),
        0,
    );
    let all = folder(&directory, "all");
    for (name, bytes) in step {
        assert!(all[&name] == bytes, "{name} differs");
    }
}
