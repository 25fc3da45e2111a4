//! Families of wings: tables, files and figures that belong together, whatever the number of threads.

use crate::figures::{Figures, assert_relative};
use crate::workdir::{Ran, WorkDir, copy_from_package, package, program};
use std::collections::BTreeMap;
use std::fs;
use std::io;
use std::ops::ControlFlow;
use std::sync::Mutex;

use spanwise::family::{Family, Plan, Status, Table};
use spanwise::wing::{Kind, Library};

/// A directory with the examples, and the plain one as `wing.toml`.
pub(crate) fn workshop() -> WorkDir {
    let directory = WorkDir::new();
    copy_from_package("airfoils", directory.path());
    let plain = fs::read_to_string(package().join("examples/dunlin.toml")).expect("an example");
    directory.write("wing.toml", plain);
    directory
}

/// Runs `family wing.toml` with some arguments, which must end with the code.
#[track_caller]
pub(crate) fn family(directory: &WorkDir, arguments: &[&str], code: i32) -> Ran {
    let ran = directory.run(&[&["family", "wing.toml"], arguments].concat());
    assert_eq!(ran.code, Some(code), "{}\n{}", ran.stdout, ran.stderr);
    assert!(!ran.stderr.contains("panicked"), "{}", ran.stderr);
    ran
}

/// The files of a folder by their names.
pub(crate) fn folder(directory: &WorkDir, name: &str) -> BTreeMap<String, Vec<u8>> {
    fs::read_dir(directory.join(name))
        .expect("a folder")
        .map(|entry| entry.expect("an entry").path())
        .map(|path| {
            let name = path.file_name().expect("a name").to_string_lossy().into_owned();
            (name, fs::read(&path).expect("a file"))
        })
        .collect()
}

/// Fails unless two folders hold the same names with the same bytes.
#[track_caller]
pub(crate) fn assert_same(left: &BTreeMap<String, Vec<u8>>, right: &BTreeMap<String, Vec<u8>>) {
    let names = |files: &BTreeMap<String, Vec<u8>>| files.keys().cloned().collect::<Vec<_>>();
    assert_eq!(names(left), names(right));
    for (name, bytes) in left {
        assert!(*bytes == right[name], "{name} differs");
    }
}

/// The rows of a table, each by its headers.
#[track_caller]
pub(crate) fn rows(files: &BTreeMap<String, Vec<u8>>) -> Vec<BTreeMap<String, String>> {
    let mut reader = csv::Reader::from_reader(files["family.csv"].as_slice());
    reader
        .deserialize()
        .map(|row| row.expect("a row with a field for each header"))
        .collect()
}

/// The lines of figures.
pub(crate) fn lines(files: &BTreeMap<String, Vec<u8>>) -> Vec<Figures> {
    let text = String::from_utf8(files["family.jsonl"].clone()).expect("UTF-8");
    text.lines().map(Figures::parse).collect()
}

const VARIED: [&str; 4] = [
    "--vary",
    "planform.aspect_ratio=6..12/4",
    "--vary",
    "planform.taper_ratio=0.3..0.6/4",
];

#[test]
fn the_files_are_the_same_whatever_the_number_of_threads() {
    let directory = workshop();
    let with = |out: &str, jobs: &str| {
        let plot = ["--plot", "built.volume", "--plot", "mesh.facets"];
        family(
            &directory,
            &[&VARIED[..], &plot, &["-o", out, "--jobs", jobs]].concat(),
            0,
        );
        folder(&directory, out)
    };
    let one = with("one", "1");
    assert_same(&one, &with("two", "2"));
    assert_same(&one, &with("many", "9"));
    // three files a wing, two tables, two drawings, and nothing else
    assert_eq!(one.len(), 16 * 3 + 4, "{:?}", one.keys());
}

#[test]
fn a_variant_is_what_loft_makes_of_its_values() {
    let directory = workshop();
    family(&directory, &[&VARIED[..], &["-o", "out"]].concat(), 0);
    let files = folder(&directory, "out");
    directory.write(
        "0007.toml",
        fs::read(directory.join("wing.toml")).expect("the spec"),
    );
    let set = [
        "--set",
        "planform.aspect_ratio=8",
        "--set",
        "planform.taper_ratio=0.5",
    ];
    let ran = directory.run(&[&["loft", "0007.toml", "-o", "alone"], &set[..]].concat());
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    for (name, bytes) in folder(&directory, "alone") {
        assert!(bytes == files[&name], "{name} differs");
    }
}

#[test]
fn the_table_has_each_variant_with_its_figures_in_input_order() {
    let directory = workshop();
    family(
        &directory,
        &[&VARIED[..], &["-o", "out", "--only", "json"]].concat(),
        0,
    );
    let files = folder(&directory, "out");
    assert!(
        files
            .keys()
            .all(|name| !name.ends_with("step") && !name.ends_with("stl"))
    );
    let (rows, lines) = (rows(&files), lines(&files));
    assert_eq!((rows.len(), lines.len()), (16, 16));
    for (i, (row, line)) in rows.iter().zip(&lines).enumerate() {
        assert_eq!(row["name"], format!("{:04}", i + 1));
        assert_eq!(line.text("name"), row["name"]);
        assert_eq!(row["planform.aspect_ratio"], ["6", "8", "10", "12"][i / 4]);
        assert_eq!(row["planform.taper_ratio"], ["0.3", "0.4", "0.5", "0.6"][i % 4]);
        assert_eq!((row["status"].as_str(), row["error"].as_str()), ("ok", ""));
        let own = String::from_utf8(files[&format!("{}.json", row["name"])].clone()).expect("UTF-8");
        assert_eq!(line.at("figures"), &Figures::parse(&own).0);
        for key in [
            "reference.area",
            "reference.mac.x_le",
            "built.volume",
            "mesh.max_deviation",
        ] {
            let field: f64 = row[key].parse().expect("a number");
            assert_relative(key, field, line.number(&format!("figures.{key}")), 1e-15);
        }
        // span² = aspect ratio times area
        let number = |key: &str| row[key].parse::<f64>().expect("a number");
        assert_relative(
            "aspect ratio",
            number("reference.span").powi(2) / number("reference.area"),
            number("planform.aspect_ratio"),
            1e-12,
        );
        let incidence = number("root_incidence");
        assert!(
            (1.5..3.0).contains(&incidence),
            "washout puts the root above the MAC's 1.5 degrees: {incidence}"
        );
        assert!((0.0..=1.0).contains(&number("worst_check")));
    }
}

#[test]
fn json_lines_are_streamed_in_input_order() {
    let directory = workshop();
    let ran = family(
        &directory,
        &[
            &VARIED[..],
            &["-o", "out", "--only", "json", "--json", "--jobs", "2"],
        ]
        .concat(),
        0,
    );
    assert_eq!(ran.stdout.as_bytes(), folder(&directory, "out")["family.jsonl"]);
}

#[test]
fn quiet_runs_say_nothing() {
    let directory = workshop();
    let ran = family(&directory, &[&VARIED[..], &["-o", "out", "--quiet"]].concat(), 0);
    assert_eq!((ran.stdout.as_str(), ran.stderr.as_str()), ("", ""));
}

#[test]
fn a_bad_row_is_its_own_error_and_nobody_elses() {
    let directory = workshop();
    directory.write(
        "table.csv",
        "name,planform.taper_ratio,airfoil.root\ngood,0.4,NACA 2412\nnone,wide,\nworse,0,NACA 2412\nlost,0.4,gone.dat\nlast,,\n",
    );
    let ran = family(&directory, &["--table", "table.csv", "-o", "out"], 1);
    assert!(
        ran.stdout.starts_with("5 wings: 2 ok, 3 not built\n"),
        "{}",
        ran.stdout
    );
    let files = folder(&directory, "out");
    let rows = rows(&files);
    let status: Vec<&str> = rows.iter().map(|row| row["status"].as_str()).collect();
    assert_eq!(status, ["ok", "error", "error", "error", "ok"]);
    for (row, words) in [
        (1, "table.csv: row 3, column 2: planform.taper_ratio = wide"),
        (2, "table.csv: row 4, column 2: planform.taper_ratio = 0"),
        (3, "table.csv: row 5, column 3: airfoil.root = \"gone.dat\""),
    ] {
        assert!(rows[row]["error"].contains(words), "{}", rows[row]["error"]);
        assert!(ran.stderr.contains(words), "{}", ran.stderr);
        assert_eq!(rows[row]["built.volume"], "");
    }
    assert_eq!(files.len(), 2 * 3 + 2, "{:?}", files.keys());
    assert_eq!(lines(&files)[1].text("status"), "error");
}

#[test]
fn a_panic_is_a_variants_error() {
    let table = Table::read(b"name,airfoil.root\na,NACA 2412\nb,boom.dat\nc,NACA 0012\n").expect("a table");
    let family = Family {
        plan: Plan::of_table(table),
        text: fs::read_to_string(package().join("examples/dunlin.toml")).expect("an example"),
        file: "dunlin.toml".to_owned(),
        table: "table.csv".to_owned(),
        kinds: vec![Kind::Json],
        time_stamp: "2025-01-01T00:00:00".to_owned(),
        library: Library::new(|name: &str| -> io::Result<Vec<u8>> { panic!("no reading of {name} today") }),
    };
    let ended = Mutex::new(Vec::new());
    family
        .run(
            &[0, 1, 2],
            2,
            |ready| ControlFlow::Continue(Some(ready)),
            |outcome| {
                ended.lock().unwrap().push(outcome.line);
                ControlFlow::Continue(())
            },
        )
        .expect("two threads");
    let mut ended = ended.into_inner().unwrap();
    ended.sort_by_key(|line| line.index);
    let status: Vec<Status> = ended.iter().map(|line| line.status).collect();
    assert_eq!(status, [Status::Ok, Status::Error, Status::Ok]);
    let error = ended[1].error.as_deref().expect("an error");
    assert!(error.contains("no reading of boom.dat today"), "{error}");
}

#[test]
fn shards_gathered_are_the_whole_family() {
    let directory = workshop();
    let more = ["--only", "json", "-o"];
    family(&directory, &[&VARIED[..], &more, &["whole"]].concat(), 0);
    for shard in ["1", "2", "3"] {
        let (out, part) = (format!("part{shard}"), format!("{shard}/3"));
        family(
            &directory,
            &[&VARIED[..], &more, &[&out, "--shard", &part]].concat(),
            0,
        );
    }
    let gather = |parts: &[&str], code: i32| {
        let ran = directory.run(&[&["family", "--gather"], parts, &["-o", "all"]].concat());
        assert_eq!(ran.code, Some(code), "{}\n{}", ran.stdout, ran.stderr);
        ran.stderr
    };
    gather(&["part3", "part1", "part2"], 0);
    let (whole, all) = (folder(&directory, "whole"), folder(&directory, "all"));
    assert_eq!(whole["family.jsonl"], all["family.jsonl"]);
    let (mut expected, gathered) = (rows(&whole), rows(&all));
    for (i, row) in expected.iter_mut().enumerate() {
        row.insert("folder".to_owned(), format!("part{}", i % 3 + 1));
    }
    assert_eq!(gathered, expected);

    assert!(gather(&["part1", "part3"], 1).contains("5 of 16 wings are missing, the first is number 2"));
    assert!(gather(&["part1", "part1"], 2).contains("variant 1 is in part1 too"));
    assert!(gather(&["part1", "all"], 2).contains("take the place of these"));
    family(
        &directory,
        &["--vary", "planform.span=2,3", "--only", "json", "-o", "other"],
        1,
    );
    assert!(gather(&["part1", "other"], 2).contains("gather shards of one family"));
}

#[test]
fn drawings_are_made_of_figures_only() {
    let directory = workshop();
    let ran = family(
        &directory,
        &[&VARIED[..], &["-o", "out", "--plot", "built.volum"]].concat(),
        2,
    );
    assert!(
        ran.stderr.contains("the nearest is built.volume"),
        "{}",
        ran.stderr
    );
    assert!(!directory.join("out").exists(), "refused before work");
    family(
        &directory,
        &[
            &VARIED[..],
            &["-o", "out", "--only", "json", "--plot", "built.volume"],
        ]
        .concat(),
        0,
    );
    let svg = String::from_utf8(folder(&directory, "out")["family-built.volume.svg"].clone()).expect("UTF-8");
    // two panels of sixteen wings, with four lines each
    assert_eq!(
        (svg.matches("<circle").count(), svg.matches("<polyline").count()),
        (32, 8)
    );
    assert!(svg.contains("built.volume [mm³]") && svg.contains("planform.taper_ratio"));
}

#[test]
fn a_spec_that_is_not_there_is_no_family() {
    let directory = WorkDir::new();
    let ran: Ran = program(directory.path())
        .args(["family", "gone.toml", "--vary", "planform.span=1,2", "-o", "out"])
        .output()
        .expect("the program starts")
        .into();
    assert_eq!(ran.code, Some(2));
    assert!(ran.stderr.contains("gone.toml: cannot be read"), "{}", ran.stderr);
    assert!(!directory.join("out").exists());
}
