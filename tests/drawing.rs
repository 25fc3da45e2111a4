//! The dimensioned drawing: labels keep apart, dimensions are the JSON's figures, names are text and nothing else.

use crate::workdir::{WorkDir, copy_from_package, package};
use proptest::prelude::{ProptestConfig, Strategy, any, prop_assert, prop_oneof, proptest};
use proptest::test_runner::TestCaseError;
use serde_json::Value;
use spanwise::spec::Source;
use spanwise::wing::{Wing, prepare};
use spanwise::write::drawing::{Rect, Sheet};
use std::fs;

/// Builds the wing of a spec that lies in `examples`.
fn wing(text: &str) -> Result<Wing, String> {
    let source = Source {
        text,
        file: "test.toml",
        set: &[],
    };
    let open = |name: &str| fs::read(package().join("examples").join(name));
    let prepared = prepare(&source, &open).map_err(|faults| format!("{faults:?}"))?;
    Wing::build(&prepared).map_err(|error| error.to_string())
}

fn examples() -> Vec<(String, String)> {
    let entries = fs::read_dir(package().join("examples")).expect("the examples");
    let paths = entries.map(|entry| entry.expect("an entry").path());
    let mut found: Vec<(String, String)> = paths
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .map(|path| {
            let name = path.file_stem().expect("a name").to_string_lossy().into_owned();
            (name, fs::read_to_string(path).expect("the spec"))
        })
        .collect();
    found.sort();
    found
}

/// What is wrong with the places of a sheet's labels.
fn faults(sheet: &Sheet) -> Vec<String> {
    let boxes: Vec<(&str, Rect)> = (sheet.labels.iter())
        .map(|label| (label.text.as_str(), label.rect()))
        .collect();
    let mut found = Vec::new();
    for (k, (text, rect)) in boxes.iter().enumerate() {
        if !rect.is_inside(&sheet.frame) {
            found.push(format!("`{text}` leaves the frame"));
        }
        for (other, another) in &boxes[..k] {
            if rect.overlaps(another) {
                found.push(format!("`{text}` and `{other}` overlap"));
            }
        }
    }
    for line in &sheet.lines {
        let around = Rect::around(line.points.iter().copied());
        let paper = Rect {
            left: 0.0,
            top: 0.0,
            right: sheet.size[0],
            bottom: sheet.size[1],
        };
        if !around.is_inside(&paper) {
            found.push(format!("a line leaves the paper: {line:?}"));
        }
    }
    found
}

#[test]
fn no_labels_of_the_examples_overlap_or_leave_the_frame() {
    for (name, text) in examples() {
        let sheet = wing(&text).expect("an example").sheet(None);
        assert!(sheet.labels.len() > 40, "{name}: {} labels", sheet.labels.len());
        assert_eq!(faults(&sheet), Vec::<String>::new(), "{name}");
    }
}

/// Finds `reference.mac.y`, `reference.aerodynamic_centre.0` or `checks.dihedral` in the figures.
fn figure(figures: &Value, quantity: &str) -> Option<f64> {
    if let Some(check) = quantity.strip_prefix("checks.") {
        let checks = figures["checks"].as_array()?;
        return checks.iter().find(|entry| entry["quantity"] == check)?["asked"].as_f64();
    }
    let found = quantity.split('.').try_fold(figures, |value, key| match value {
        Value::Array(list) => list.get(key.parse::<usize>().ok()?),
        _ => value.get(key),
    });
    found?.as_f64()
}

#[test]
fn every_dimension_is_the_figure_of_the_json_and_says_it() {
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    for (name, _) in examples() {
        let ran = directory.run(&[
            "loft",
            &format!("examples/{name}.toml"),
            "--only",
            "json,drawing",
            "--quiet",
        ]);
        assert_eq!(ran.code, Some(0), "{name}: {}", ran.stderr);
        let json = fs::read_to_string(directory.join(format!("{name}.json"))).expect("the figures");
        let figures: Value = serde_json::from_str(&json).expect("JSON");
        assert_eq!(figures["files"]["drawing"], format!("{name}.svg"));
        let svg = fs::read_to_string(directory.join(format!("{name}.svg"))).expect("the drawing");
        let page = roxmltree::Document::parse(&svg).expect("XML");
        let mut seen = Vec::new();
        for node in page
            .descendants()
            .filter(|node| node.has_attribute("data-quantity"))
        {
            let quantity = node.attribute("data-quantity").expect("as filtered");
            let value: f64 = node
                .attribute("data-value")
                .expect("a value")
                .parse()
                .expect("a number");
            let asked = figure(&figures, quantity).unwrap_or_else(|| panic!("{name}: no figure {quantity}"));
            assert!(
                (value - asked).abs() <= 1e-12 * asked.abs(),
                "{name}: {quantity} {value} and not {asked}"
            );
            // the digits that are written are the value's, rounded
            let text = node.text().expect("a text").replace('−', "-").replace('°', " ");
            let written = (text.split_whitespace())
                .find_map(|word| word.parse::<f64>().ok())
                .unwrap_or_else(|| panic!("{name}: no number in `{text}`"));
            // lengths to a hundredth of a millimetre, angles to a hundredth of a degree, areas to seven digits
            let rounded = (1e-6 * value.abs()).max(0.005_001);
            assert!(
                (written.abs() - value.abs()).abs() <= rounded,
                "{name}: {quantity} is {value} and says `{text}`"
            );
            seen.push(quantity.to_owned());
        }
        for needed in [
            "reference.root_chord",
            "reference.tip_chord",
            "reference.mac.length",
            "reference.mac.x_le",
        ] {
            let count = seen.iter().filter(|quantity| *quantity == needed).count();
            assert!(count >= 1, "{name}: no dimension {needed}");
        }
        for needed in ["span", "sweep", "dihedral", "twist"] {
            assert!(
                seen.iter().any(|quantity| quantity.contains(needed)),
                "{name}: no {needed}"
            );
        }
    }
}

#[test]
fn hostile_names_stay_text() {
    let names = [
        r#"</text><script>alert("1")</script>&amp;"'"#.to_owned(),
        "x".repeat(10_000),
        "جناح الطائر \u{202e}gnirts".to_owned(),
        "two\nlines\tand \u{1}\u{7f}\u{fffe} controls".to_owned(),
        "翼".repeat(300),
    ];
    for name in names {
        let spec = toml::Table::from_iter([
            ("name".to_owned(), toml::Value::from(name.clone())),
            (
                "planform".to_owned(),
                toml::Table::from_iter([
                    ("span".to_owned(), 1000.into()),
                    ("root_chord".to_owned(), 200.into()),
                    ("tip_chord".to_owned(), 120.into()),
                ])
                .into(),
            ),
            (
                "airfoil".to_owned(),
                toml::Table::from_iter([("root".to_owned(), "NACA 2412".into())]).into(),
            ),
            (
                "line".to_owned(),
                vec![toml::Value::from(toml::Table::from_iter([
                    ("name".to_owned(), toml::Value::from(name.clone())),
                    ("chord_fraction".to_owned(), 0.3.into()),
                    ("from".to_owned(), 0.1.into()),
                    ("to".to_owned(), 0.9.into()),
                ]))]
                .into(),
            ),
        ]);
        let wing = match wing(&spec.to_string()) {
            Ok(wing) => wing,
            // the spec may refuse a name: then there is nothing to draw
            Err(refusal) => {
                assert!(refusal.contains("name"), "{refusal}");
                continue;
            }
        };
        assert_eq!(faults(&wing.sheet(None)), Vec::<String>::new());
        let svg = String::from_utf8(wing.drawing(Some("2001-09-09"))).expect("UTF-8");
        let page = roxmltree::Document::parse(&svg).expect("XML");
        let title = page
            .descendants()
            .find(|node| node.has_tag_name(("http://www.w3.org/2000/svg", "title")));
        let title = title.and_then(|node| node.text()).expect("a title");
        let plain: String = (name.chars())
            .map(|c| match c {
                '\n' | '\t' => ' ',
                '\u{1}' | '\u{7f}' | '\u{fffe}' => '\u{fffd}',
                c => c,
            })
            .collect();
        assert!(title.ends_with(&plain), "{title}");
        assert!(
            page.descendants()
                .all(|node| !node.tag_name().name().contains("script"))
        );
        assert!(svg.contains("2001-09-09"));
    }
}

/// A wing of some panels that the layout has not seen.
fn specs() -> impl Strategy<Value = String> {
    let panel = (
        50.0..2000.0_f64,
        0.3..1.3_f64,
        -30.0..40.0_f64,
        -10.0..25.0_f64,
        -3.0..3.0_f64,
    );
    let panels = proptest::collection::vec(panel, 1..6);
    let sides = prop_oneof!["both", "starboard", "port", "pair"];
    (panels, sides, 40.0..900.0_f64, 0_usize..4, any::<bool>()).prop_map(|(panels, sides, root, lines, inch)| {
        let mut text = format!(
            "name = \"random\"\nunit = \"{}\"\nplanform = {{ root_chord = \"{root} mm\" }}\nairfoil = {{ root = \"NACA 2412\" }}\nbuild = {{ sides = \"{sides}\" }}\n",
            if inch { "in" } else { "mm" }
        );
        let mut chord = root;
        for (span, taper, sweep, dihedral, twist) in panels {
            chord = (chord * taper).clamp(20.0, 1500.0);
            text += &format!(
                "[[panel]]\nspan = \"{} mm\"\ntip_chord = \"{chord} mm\"\nsweep = {sweep}\ndihedral = {dihedral}\ntwist = {twist}\n",
                span.max(0.5 * chord)
            );
        }
        for line in 0..lines {
            text += &format!(
                "[[line]]\nname = \"a line with a name {line}\"\nchord_fraction = 0.{}\nfrom = 0.1\nto = 0.9\n",
                2 + 2 * line
            );
        }
        text
    })
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 32, ..ProptestConfig::default() })]
    #[test]
    fn no_labels_of_any_wing_overlap_or_leave_the_frame(text in specs()) {
        match wing(&text) {
            Ok(wing) => {
                let found = faults(&wing.sheet(None));
                prop_assert!(found.is_empty(), "{found:?}\n{text}");
            }
            // some are no wings: too thick for their panels, or too swept
            Err(_) => return Err(TestCaseError::reject("no wing")),
        }
    }
}
