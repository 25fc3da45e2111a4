//! Faults of files and of usage: what is refused, and that nothing is left behind or overwritten by half.

use crate::refusal::{assert_refused, assert_says, refused_in, sound_but};
use crate::workdir::{Ran, WorkDir, program};
use std::fs;

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
