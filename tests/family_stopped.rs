//! Families that are stopped: killed, interrupted, run twice at once, and gone on with.
#![cfg(unix)]

use crate::family::{assert_same, family, folder, rows, workshop};
use crate::workdir::{Ran, WorkDir, program};
use std::fs;
use std::process::{Child, Command, Stdio};
use std::time::{Duration, Instant};

/// Some 200 wings.
const MANY: [&str; 6] = [
    "--vary",
    "planform.aspect_ratio=6..12/20",
    "--vary",
    "planform.taper_ratio=0.3..0.6/10",
    "-o",
    "out",
];
/// More than are built before a test is over.
const ENDLESS: [&str; 8] = [
    "--vary",
    "planform.aspect_ratio=6..12/1000",
    "--vary",
    "planform.taper_ratio=0.3..0.6/500",
    "--only",
    "json",
    "-o",
    "out",
];

fn start(directory: &WorkDir, arguments: &[&str]) -> Child {
    program(directory.path())
        .args(["family", "wing.toml"])
        .args(arguments)
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts")
}

fn end(child: Child) -> Ran {
    child.wait_with_output().expect("the program ends").into()
}

/// Waits until a run has noted some variants.
fn wait_for_work(directory: &WorkDir) {
    let begun = Instant::now();
    let journal = directory.join("out/family.partial.jsonl");
    while fs::metadata(&journal).map_or(0, |data| data.len()) < 10_000 {
        assert!(begun.elapsed() < Duration::from_secs(60), "nothing is built");
        std::thread::sleep(Duration::from_millis(5));
    }
}

fn signal(child: &Child, name: &str) {
    let sent = Command::new("kill")
        .args([name, &child.id().to_string()])
        .status();
    assert!(sent.expect("kill on the path").success());
}

#[test]
fn killed_ten_times_and_resumed_the_folder_is_that_of_one_run() {
    let directory = workshop();
    family(&directory, &MANY, 0);
    let whole = folder(&directory, "out");
    fs::remove_dir_all(directory.join("out")).expect("to remove the folder");
    let mut killed = 0;
    let mut seed = 20_u64;
    for _ in 0..10 {
        // a linear congruential generator (Knuth, MMIX): the moments differ and are the same in every run of the test
        seed = seed
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        let pause = Duration::from_millis(10 + (seed >> 33) % 150);
        let mut child = start(&directory, &[&MANY[..], &["--resume"]].concat());
        std::thread::sleep(pause);
        // SIGKILL; a run that is over already is no kill
        let _ = child.kill();
        killed += usize::from(end(child).code.is_none());
    }
    assert!(killed >= 5, "only {killed} of ten runs were killed");
    family(&directory, &[&MANY[..], &["--resume"]].concat(), 0);
    assert_same(&whole, &folder(&directory, "out"));
}

#[test]
fn resuming_makes_anew_what_is_not_whole_or_not_of_these_inputs() {
    let directory = workshop();
    let table = |sweep: &str| format!("name,planform.sweep\na,1\nb,{sweep}\nc,3\nd,gone\n");
    directory.write("table.csv", table("2"));
    let arguments = ["--table", "table.csv", "-o", "out"];
    let resume = [&arguments[..], &["--resume"]].concat();
    family(&directory, &arguments, 1);
    let first = folder(&directory, "out");
    let written = |name: &str| {
        let data = fs::metadata(directory.join("out").join(name)).expect("a file");
        std::os::unix::fs::MetadataExt::ino(&data)
    };
    let before = ["a.step", "b.step", "c.step"].map(written);

    family(&directory, &resume, 1);
    assert_same(&first, &folder(&directory, "out"));
    assert_eq!(
        ["a.step", "b.step", "c.step"].map(written),
        before,
        "all are kept"
    );

    // a file that was cut short, one that is gone, a value that is another
    fs::write(directory.join("out/a.step"), "ISO-10303-21;").expect("to write");
    fs::remove_file(directory.join("out/c.stl")).expect("to remove");
    family(&directory, &resume, 1);
    assert_same(&first, &folder(&directory, "out"));
    let now = ["a.step", "b.step", "c.step"].map(written);
    assert!(now[0] != before[0] && now[1] == before[1] && now[2] != before[2]);

    directory.write(
        "table.csv",
        table("2.5").replace("name,planform.sweep\na", "name,planform.sweep\nz,0\na"),
    );
    family(&directory, &resume, 1);
    let moved = folder(&directory, "out");
    let again = ["a.step", "b.step", "c.step"].map(written);
    assert!(again[0] == now[0] && again[1] != now[1] && again[2] == now[2]);
    let names: Vec<String> = rows(&moved).iter().map(|row| row["name"].clone()).collect();
    assert_eq!(names, ["z", "a", "b", "c", "d"]);
    family(&directory, &["--table", "table.csv", "-o", "fresh"], 1);
    assert_same(&folder(&directory, "fresh"), &moved);

    // another spec makes all anew
    let spec = fs::read_to_string(directory.join("wing.toml")).expect("the spec");
    directory.write("wing.toml", spec.replace("dihedral = 4.0", "dihedral = 5.0"));
    family(&directory, &resume, 1);
    let last = ["a.step", "b.step", "c.step"].map(written);
    assert!((0..3).all(|i| last[i] != again[i]));
}

#[test]
fn a_coordinate_file_that_changed_makes_its_variants_anew() {
    let directory = workshop();
    let name = fs::read_dir(directory.join("airfoils"))
        .expect("coordinate files")
        .map(|entry| {
            entry
                .expect("an entry")
                .file_name()
                .into_string()
                .expect("a plain name")
        })
        .min()
        .expect("at least one");
    let table = format!("name,airfoil.root\nfile,airfoils/{name}\nplain,NACA 2412\n");
    directory.write("table.csv", table);
    let arguments = ["--table", "table.csv", "-o", "out", "--resume"];
    family(&directory, &arguments, 0);
    let before = folder(&directory, "out");
    let mut text = fs::read(directory.join("airfoils").join(&name)).expect("a file");
    text.push(b'\n');
    directory.write(&format!("airfoils/{name}"), text);
    family(&directory, &arguments, 0);
    let hash = |files: &std::collections::BTreeMap<String, Vec<u8>>, i: usize| {
        crate::family::lines(files)[i].text("hash").to_owned()
    };
    let after = folder(&directory, "out");
    assert_ne!(hash(&before, 0), hash(&after, 0));
    assert_eq!(hash(&before, 1), hash(&after, 1));
}

#[test]
fn files_of_an_earlier_run_do_not_stay_beside_an_error() {
    let directory = workshop();
    let run = |row: &str, code: i32| {
        directory.write("table.csv", format!("name,planform.sweep,build.sides\na,{row}\n"));
        family(&directory, &["--table", "table.csv", "-o", "out"], code);
        folder(&directory, "out").into_keys().collect::<Vec<_>>()
    };
    assert!(run("1,pair", 0).contains(&"a-port.stl".to_owned()));
    assert_eq!(
        run("1,both", 0),
        ["a.json", "a.step", "a.stl", "family.csv", "family.jsonl"]
    );
    assert_eq!(run("99,both", 1), ["family.csv", "family.jsonl"]);
}

#[test]
fn a_second_run_into_the_same_folder_is_refused() {
    let directory = workshop();
    let first = start(&directory, &ENDLESS);
    wait_for_work(&directory);
    let ran = family(&directory, &["--vary", "planform.sweep=1,2", "-o", "out"], 2);
    assert!(
        ran.stderr
            .contains("out: another run is writing into this directory"),
        "{}",
        ran.stderr
    );
    signal(&first, "-INT");
    assert_eq!(end(first).code, Some(130));
    family(&directory, &["--vary", "planform.sweep=1,2", "-o", "out"], 0);
}

#[test]
fn an_interrupted_run_leaves_whole_files_and_its_rows() {
    for name in ["-INT", "-TERM"] {
        let directory = workshop();
        let child = start(&directory, &ENDLESS);
        wait_for_work(&directory);
        signal(&child, name);
        let ran = end(child);
        assert_eq!(ran.code, Some(130), "{}", ran.stderr);
        assert!(
            ran.stderr.contains("stopped after ") && ran.stderr.contains("of 500000 variants"),
            "{}",
            ran.stderr
        );
        let files = folder(&directory, "out");
        let journal = String::from_utf8(files["family.partial.jsonl"].clone()).expect("UTF-8");
        assert!(journal.ends_with('\n'));
        // a file of figures for each line, the journal, and nothing else: no lock, nothing unfinished
        assert_eq!(files.len(), journal.lines().count() + 1);
        assert!(
            ran.stderr
                .contains(&format!("stopped after {} ", journal.lines().count()))
        );
    }
}
