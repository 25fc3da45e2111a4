//! Families that are refused before work: bad tables, values, names, and specs.

use crate::family::{family, folder, workshop};
use crate::refusal::assert_says;

/// Runs a family with a table, which must be refused; gives what was said.
#[track_caller]
fn refused(table: impl AsRef<[u8]>) -> String {
    let directory = workshop();
    directory.write("table.csv", table);
    let ran = family(&directory, &["--table", "table.csv", "-o", "out"], 2);
    assert_eq!(ran.stdout, "");
    assert!(!directory.join("out").exists(), "refused before work");
    ran.stderr
}

#[test]
fn bad_tables_are_refused_with_row_and_column() {
    for (table, words) in [
        ("", "table.csv: the table is empty"),
        ("planform.span\r\n", "no rows"),
        (
            "0.4,0.5\n0.5,0.6\n",
            "row 1, column 1: \"0.4\" is a value, and row 1 has the header",
        ),
        (
            "name,planform.taper\na,0.4\n",
            "row 1, column 2: \"planform.taper\" is no key of a spec; the nearest known is planform.taper_ratio",
        ),
        (
            "\u{feff}name,sweeep\na,1\n",
            "the nearest known is planform.sweep",
        ),
        (
            "name,planform.sweep\na,1\nb,1,2\n",
            "row 3: 3 fields, and the header has 2",
        ),
        (
            "name,planform.sweep\r\na,1\r\nb\r\n",
            "row 3: 1 fields, and the header has 2",
        ),
        (
            "planform.sweep\n\"1\n2\n3\n",
            "row 2, column 1: a line break inside a value",
        ),
        ("name,planform.sweep\na,1\na,2\n", "row 3, column 1 (name)"),
        ("name,planform.sweep\nb,1\nc,2\nB,3\n", "those of \"b\" in row 2"),
        (
            "name,planform.sweep\n../a,1\n",
            "row 2, column 1 (name): \"../a\"",
        ),
        ("name,planform.sweep\nnul,1\n", "keep this name for a device"),
        ("name,planform.sweep\nfamily,1\n", "kept for the tables"),
        ("name;planform.sweep\na;1\n", "not by semicolons"),
    ] {
        assert_says(&refused(table), &[words]);
    }
    assert_says(
        &refused(b"planform.sweep\n\xff\n"),
        &["row 2, column 1: not UTF-8"],
    );
}

#[test]
fn a_fault_in_the_last_of_200_000_rows_is_found_before_work() {
    let mut table = "name,planform.sweep\n".to_owned();
    for i in 0..200_000 {
        table += &format!("v{i},{}\n", i % 20);
    }
    assert_says(
        &refused(table.clone() + "v7,1\n"),
        &["row 200002", "\"v7\" in row 9"],
    );
    assert_says(&refused(table + "w\n"), &["row 200002: 1 fields"]);
}

#[test]
fn tables_of_other_makings_give_the_same_family() {
    let directory = workshop();
    let plain = "name,planform.sweep,airfoil.root\na,1,NACA 2412\nb,2,NACA 0012\n";
    let quoted = "\"name\",\"planform.sweep\",\"airfoil.root\"\r\n\"a\",\"1\",\"NACA 2412\"\r\n\"b\",\"2\",\"NACA 0012\"";
    directory.write("plain.csv", plain);
    directory.write("made.csv", format!("\u{feff}{quoted}"));
    for name in ["plain", "made"] {
        let table = format!("{name}.csv");
        family(&directory, &["--table", &table, "-o", name], 0);
    }
    crate::family::assert_same(&folder(&directory, "plain"), &folder(&directory, "made"));
}

#[test]
fn bad_sweeps_and_usage_are_refused() {
    let directory = workshop();
    let span = "planform.span=2000,2100";
    for (arguments, words) in [
        (
            vec!["--vary", "planform.taper=0.3,0.4"],
            "the nearest known is planform.taper_ratio",
        ),
        (vec!["--vary", "planform.span=2..3"], "how many?"),
        (vec!["--vary", "planform.span=2 m..3 ft/4"], "both in one unit"),
        (
            vec!["--vary", span, "--vary", span],
            "planform.span is varied twice",
        ),
        (
            vec![
                "--vary",
                "planform.span=1..2/5000",
                "--vary",
                "planform.sweep=1..2/5000",
            ],
            "25000000 combinations are more than",
        ),
        (
            vec!["--vary", span, "--table", "table.csv"],
            "cannot be used with",
        ),
        (vec!["--vary", span, "--shard", "3/2"], "K from 1 to N"),
        (vec!["--vary", span, "--jobs", "0"], "--jobs"),
        (vec!["--vary", span, "--only", "png"], "choose from"),
        (vec!["--table", "gone.csv"], "gone.csv: cannot be read"),
        (vec![], "--vary"),
    ] {
        let ran = family(&directory, &[&arguments[..], &["-o", "out"]].concat(), 2);
        assert_says(&ran.stderr, &[words]);
        assert!(!directory.join("out").exists(), "refused before work");
    }
}

#[test]
fn a_spec_that_no_value_can_mend_is_refused() {
    let directory = workshop();
    for (text, words) in [
        ("[planform\nspan = 1\n", "not valid TOML"),
        ("[planform]\nspam = 1\n", "unknown key"),
    ] {
        directory.write("wing.toml", text);
        let ran = family(&directory, &["--vary", "planform.span=2000,2100", "-o", "out"], 2);
        assert_says(&ran.stderr, &["wing.toml:", words]);
        assert!(!directory.join("out").exists(), "refused before work");
    }
}

#[test]
fn a_folder_that_cannot_be_written_stops_at_once() {
    let directory = workshop();
    directory.write("file", "in the way");
    directory.write("full/family.csv/file", "in the way");
    for (out, words) in [
        ("file", "file: cannot be written"),
        ("file/out", "cannot be written"),
        ("full", "a directory has this name"),
    ] {
        let before = directory.files();
        let ran = family(&directory, &["--vary", "planform.sweep=1,2", "-o", out], 2);
        assert_says(&ran.stderr, &[words]);
        assert!(directory.files() == before, "files were left or changed");
    }
}
