//! Same input, same bytes: run again, from elsewhere, into another directory; and the one date that may be set.

use crate::workdir::{Ran, WorkDir, copy_from_package, program};
use std::fs;
use std::path::{Path, PathBuf};

/// Files of the plain example and of one that reads a coordinate file, lofted by `arguments` in `directory` into `out`.
fn written(directory: &Path, spec: &Path, out: &Path, date: Option<&str>) -> Vec<(PathBuf, Vec<u8>)> {
    let mut command = program(directory);
    command.arg("loft").arg(spec).arg("-o").arg(out);
    if let Some(date) = date {
        command.env("SOURCE_DATE_EPOCH", date);
    }
    let ran: Ran = command.output().expect("the program starts").into();
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    let mut files: Vec<_> = fs::read_dir(directory.join(out))
        .expect("the directory of the output")
        .map(|entry| entry.expect("an entry").path())
        .map(|path| {
            (
                PathBuf::from(path.file_name().expect("a name")),
                fs::read(&path).expect("a file"),
            )
        })
        .collect();
    files.sort();
    assert!(
        files.len() >= 3,
        "STEP, STL and figures, not {files:?}",
        files = names(&files)
    );
    files
}

fn names(files: &[(PathBuf, Vec<u8>)]) -> Vec<&Path> {
    files.iter().map(|(name, _)| name.as_path()).collect()
}

/// Fails unless both lists hold the same names with the same bytes.
#[track_caller]
fn assert_same(what: &str, a: &[(PathBuf, Vec<u8>)], b: &[(PathBuf, Vec<u8>)]) {
    assert_eq!(names(a), names(b), "{what}");
    for ((name, left), (_, right)) in a.iter().zip(b) {
        if let Some(at) = left.iter().zip(right).position(|(l, r)| l != r) {
            let line = left[..at].iter().filter(|&&byte| byte == b'\n').count() + 1;
            panic!("{what}: {} differs at byte {at}, line {line}", name.display());
        }
        assert_eq!(left.len(), right.len(), "{what}: length of {}", name.display());
    }
}

fn example_directory() -> WorkDir {
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    directory
}

#[test]
fn the_same_spec_gives_the_same_bytes_twice_and_from_another_directory() {
    let home = example_directory();
    let elsewhere = WorkDir::new();
    for spec in [
        "examples/dunlin.toml",
        "examples/fernlaw.toml",
        "examples/marram.toml",
    ] {
        let relative = Path::new(spec);
        let first = written(home.path(), relative, Path::new("first"), None);
        let again = written(home.path(), relative, Path::new("again"), None);
        assert_same("run again", &first, &again);
        let away = elsewhere.join(relative.file_stem().expect("a name"));
        let far = written(elsewhere.path(), &home.join(spec), &away, None);
        assert_same("run from another directory", &first, &far);
        fs::remove_dir_all(home.join("first")).expect("to remove what was written");
        fs::remove_dir_all(home.join("again")).expect("to remove what was written");
    }
}

#[test]
fn the_clock_zone_and_locale_change_nothing() {
    let home = example_directory();
    let spec = Path::new("examples/dunlin.toml");
    let plain = written(home.path(), spec, Path::new("plain"), None);
    let mut command = program(home.path());
    command.args(["loft", "examples/dunlin.toml", "-o", "set"]);
    command.envs([
        ("TZ", "Pacific/Kiritimati"),
        ("LC_ALL", "de_DE.UTF-8"),
        ("LANG", "de_DE.UTF-8"),
        ("COLUMNS", "40"),
    ]);
    let ran: Ran = command.output().expect("the program starts").into();
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    for (name, content) in &plain {
        let other = fs::read(home.join("set").join(name)).expect("the same file");
        assert!(other == *content, "{} differs", name.display());
    }
}

#[test]
fn the_date_in_the_step_file_is_that_of_source_date_epoch() {
    let home = example_directory();
    let spec = Path::new("examples/dunlin.toml");
    let plain = written(home.path(), spec, Path::new("plain"), None);
    // 1 000 000 000 s after 1970 is 2001-09-09T01:46:40 UTC
    let dated = written(home.path(), spec, Path::new("dated"), Some("1000000000"));
    assert_eq!(names(&plain), names(&dated));
    for ((name, without), (_, with)) in plain.iter().zip(&dated) {
        if name.extension().is_some_and(|end| end == "step") {
            let text = String::from_utf8(with.clone()).expect("STEP is ASCII");
            let differing: Vec<&str> = text
                .lines()
                .zip(String::from_utf8(without.clone()).expect("STEP is ASCII").lines())
                .filter(|(new, old)| new != old)
                .map(|(new, _)| new)
                .collect();
            assert_eq!(
                differing.len(),
                1,
                "only the time stamp's line differs, not {differing:?}"
            );
            assert!(differing[0].contains("2001-09-09T01:46:40"), "{}", differing[0]);
        } else {
            assert!(with == without, "{} holds no date", name.display());
        }
    }
}

#[test]
fn no_output_names_the_directory_it_was_made_in() {
    let home = example_directory();
    let spec = home.join("examples").join("fernlaw.toml");
    let here = home.path().to_str().expect("a plain path").to_owned();
    for (name, content) in written(home.path(), &spec, &home.join("out"), None) {
        let text = String::from_utf8_lossy(&content);
        assert!(!text.contains(&here), "{} names {here}", name.display());
    }
}
