//! One edit of a good STEP file: `inspect` finds it, or it is harmless.
//!
//! Harmless is an edit after which everything that is read is the same: every count, every length, place, area and
//! volume of solids, lines and attributes, to 1e-6 mm or 1e-9 of itself. Texts, colours and fonts are not geometry, and an
//! edit of those is harmless too.

use serde_json::Value;
use spanwise::inspect::{Error, inspect};
use spanwise::spec::Source;
use spanwise::wing::{Options, Wing, prepare};

use crate::workdir::package;

/// Edits of each kind and file.
const EDITS: usize = 34;
/// Share that has to be found or harmless.
const SHARE: f64 = 0.95;

/// The STEP file of an example, with keys of its spec set.
fn step_of(example: &str, set: &[(&str, &str)]) -> Vec<u8> {
    let folder = package().join("examples");
    let text = std::fs::read_to_string(folder.join(example)).expect("an example");
    let set: Vec<(String, String)> = (set.iter())
        .map(|(key, value)| ((*key).into(), (*value).into()))
        .collect();
    let source = Source {
        text: &text,
        file: example,
        set: &set,
    };
    let prepared = prepare(&source, &|name| std::fs::read(folder.join(name))).expect("a sound spec");
    let options = Options {
        time_stamp: "2025-01-01T00:00:00",
        id: "edited",
    };
    Wing::build(&prepared)
        .and_then(|wing| wing.step(options))
        .expect("a wing")
}

/// Whole numbers in an order that looks random and is always the same (Marsaglia's xorshift, 2003).
struct Dice(u64);

impl Dice {
    fn below(&mut self, n: usize) -> usize {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        usize::try_from(self.0 % n as u64).expect("a small number")
    }
}

/// What an edit changes.
#[derive(Clone, Copy, Debug)]
enum Edit {
    Digit,
    Reference,
    Flag,
    Line,
}

impl Edit {
    /// The file with one edit.
    fn of(self, file: &str, dice: &mut Dice) -> String {
        match self {
            Self::Digit => {
                let digits: Vec<usize> = (file.match_indices(|c: char| c.is_ascii_digit()))
                    .map(|(at, _)| at)
                    .collect();
                let at = digits[dice.below(digits.len())];
                let old = file[at..=at].parse::<usize>().expect("a digit");
                let new = (old + 1 + dice.below(9)) % 10;
                format!("{}{new}{}", &file[..at], &file[at + 1..])
            }
            Self::Reference => {
                let references: Vec<(usize, usize)> = (file.match_indices('#'))
                    .map(|(at, _)| {
                        (
                            at,
                            file[at + 1..]
                                .find(|c: char| !c.is_ascii_digit())
                                .expect("an end"),
                        )
                    })
                    .filter(|(at, length)| *length > 0 && !file[at + 1 + length..].starts_with('='))
                    .collect();
                let last = file.matches("\n#").count();
                let (at, length) = references[dice.below(references.len())];
                let old = &file[at + 1..at + 1 + length];
                let mut new = old.to_owned();
                while new == old {
                    new = (1 + dice.below(last)).to_string();
                }
                format!("{}{new}{}", &file[..=at], &file[at + 1 + length..])
            }
            Self::Flag => {
                let flags: Vec<usize> = [".T.", ".F."]
                    .iter()
                    .flat_map(|flag| file.match_indices(flag))
                    .map(|(at, _)| at)
                    .collect();
                let at = flags[dice.below(flags.len())];
                let new = if &file[at..at + 3] == ".T." { ".F." } else { ".T." };
                format!("{}{new}{}", &file[..at], &file[at + 3..])
            }
            Self::Line => {
                let lines: Vec<&str> = file.split_inclusive('\n').collect();
                let lost = dice.below(lines.len());
                lines
                    .iter()
                    .enumerate()
                    .filter(|(i, _)| *i != lost)
                    .map(|(_, line)| *line)
                    .collect()
            }
        }
    }
}

/// True where two reports have the same numbers; texts and colours aside.
fn same(a: &Value, b: &Value, millimetres: f64) -> bool {
    match (a, b) {
        (Value::Number(a), Value::Number(b)) => {
            let (a, b) = (a.as_f64().expect("a number"), b.as_f64().expect("a number"));
            (a - b).abs() <= (1e-9 * a.abs()).max(1e-6 / millimetres)
        }
        (Value::Array(a), Value::Array(b)) => {
            a.len() == b.len() && a.iter().zip(b).all(|(a, b)| same(a, b, millimetres))
        }
        (Value::Object(a), Value::Object(b)) => (a.iter()).all(|(key, value)| {
            ["colour", "colours", "font", "uncertainty"].contains(&key.as_str())
                || b.get(key).is_some_and(|other| same(value, other, millimetres))
        }),
        (Value::String(_), Value::String(_)) => true,
        _ => a == b,
    }
}

#[test]
fn single_edits_are_found_or_harmless() {
    let files = [
        ("a half wing", 1.0, step_of("dunlin.toml", &[])),
        (
            "a pair in inches, lines as parts",
            25.4,
            step_of(
                "dunlin.toml",
                &[
                    ("build.sides", "pair"),
                    ("unit", "in"),
                    ("step.reference", "parts"),
                ],
            ),
        ),
        (
            "a cranked wing in metres after AP214",
            1000.0,
            step_of("corrie.toml", &[("step.schema", "AP214")]),
        ),
    ];
    let mut all = [0; 3];
    for (what, millimetres, bytes) in &files {
        let file = std::str::from_utf8(bytes).expect("ASCII");
        let report = inspect(bytes, "good.step").expect("a good file");
        assert!(report.findings().is_empty(), "{what}: {:?}", report.findings());
        let good = serde_json::to_value(&report).expect("JSON");
        let mut dice = Dice(0x9e37_79b9_7f4a_7c15);
        for edit in [Edit::Digit, Edit::Reference, Edit::Flag, Edit::Line] {
            let mut counts = [0; 3];
            for _ in 0..EDITS {
                let edited = edit.of(file, &mut dice);
                assert_ne!(edited, file);
                let kind = match inspect(edited.as_bytes(), "edited.step") {
                    Err(_) => 0,
                    Ok(report) if !report.findings().is_empty() => 0,
                    Ok(report)
                        if same(&good, &serde_json::to_value(&report).expect("JSON"), *millimetres) =>
                    {
                        1
                    }
                    Ok(_) => 2,
                };
                counts[kind] += 1;
                all[kind] += 1;
                if kind == 2 {
                    let (old, new) = (file.lines().zip(edited.lines()))
                        .find(|(old, new)| old != new)
                        .unwrap_or_default();
                    println!("missed: {old}\n     -> {new}");
                }
            }
            println!(
                "{what}: {edit:?}: {} found, {} harmless, {} missed",
                counts[0], counts[1], counts[2]
            );
        }
    }
    let share = f64::from(all[0] + all[1]) / f64::from(all.iter().sum::<i32>());
    println!(
        "{} found, {} harmless, {} missed: {share}",
        all[0], all[1], all[2]
    );
    assert!(share >= SHARE, "only {share} found or harmless");
}

#[test]
fn files_that_end_early_are_refused_with_the_line() {
    let bytes = step_of("dunlin.toml", &[]);
    let whole = bytes.len() - 1;
    for end in (0..whole).step_by(97).chain([whole - 1]) {
        match inspect(&bytes[..end], "short.step") {
            Err(Error::Syntax { line, reason }) => {
                let lines = bytes[..end].iter().filter(|byte| **byte == b'\n').count() + 1;
                assert!(
                    line as usize <= lines && line > 0,
                    "{end}: line {line} of {lines}"
                );
                assert!(!reason.is_empty());
            }
            Err(Error::Unknown { .. }) => assert!(end < "ISO-10303-21;".len(), "{end}"),
            other => panic!("{end}: {other:?}"),
        }
    }
}

#[test]
fn files_of_random_bytes_in_them_never_panic() {
    let bytes = step_of("dunlin.toml", &[]);
    let mut dice = Dice(7);
    for _ in 0..200 {
        let mut spoilt = bytes.clone();
        for _ in 0..1 + dice.below(20) {
            let at = dice.below(spoilt.len());
            spoilt[at] = u8::try_from(dice.below(256)).expect("a byte");
        }
        // the outcome is either; what counts is that there is one
        let _ = inspect(&spoilt, "spoilt.step");
    }
}

#[test]
fn what_is_no_step_file_is_refused_with_the_reason() {
    for (bytes, reason) in [
        (&b""[..], "empty"),
        (
            b"hello\n",
            "begins with ISO-10303-21; and this begins with \"hello\"",
        ),
        (
            b"ISO-10303-21;\nHEADER;\nFILE_NAME('a\nb');",
            "not closed on its line",
        ),
        (
            b"ISO-10303-21;\nHEADER;\nENDSEC;\nDATA;\n#1=LINE('',(1,#2);\n",
            "`,` or `)`",
        ),
        (
            b"ISO-10303-21;\nHEADER;\nENDSEC;\nDATA;\n#1=A(1.E+999);\n",
            "1.7E+308",
        ),
        (
            b"ISO-10303-21;\nHEADER;\nENDSEC;\nDATA;\n#1=A(1e-7);\n",
            "`,` or `)`",
        ),
        (b"ISO-10303-21;\nHEADER;\nENDSEC;\nANCHOR;\n", "`DATA;`"),
        (b"ISO-10303-21; /* never closed", "comment"),
    ] {
        let error = inspect(bytes, "file.step").expect_err("no STEP file").to_string();
        assert!(error.starts_with("line ") && error.contains(reason), "{error}");
    }
    let deep = format!("ISO-10303-21;HEADER;ENDSEC;DATA;#1=A{}", "(".repeat(100_000));
    assert!(
        inspect(deep.as_bytes(), "deep.step")
            .expect_err("too deep")
            .to_string()
            .contains("nested")
    );
}
