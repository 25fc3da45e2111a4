//! Every fault, provoked from a text and compared with what the user sees.

use super::{only, planform};

/// A wing that is right, for texts that go behind it.
const WING: &str = "span = 2000\nroot_chord = 300\ntip_chord = 200\n";

/// A wing with two panels; its last line is line 10.
const CRANKED: &str =
    "root_chord = 400\n[[panel]]\nspan = 600\ntip_chord = 300\n[[panel]]\nspan = 400\ntip_chord = 150\n";

/// The only fault of a wing with more lines behind it; the last of its own lines is line 6.
#[track_caller]
fn fault(more: &str) -> String {
    only(&format!("{}{more}", planform(WING)))
}

/// Checks faults of keys that are added to a wing: what is added, and how the message starts.
#[track_caller]
fn each(cases: &[(&str, &str)]) {
    for (more, start) in cases {
        let message = fault(more);
        assert!(message.starts_with(start), "{more}\n{message}");
    }
}

#[test]
fn numbers_out_of_range() {
    each(&[
        (
            "sweep = 80",
            "wing.toml:7: planform.sweep = 80: out of range; allowed: more than -80 deg, less than 80 deg\n  \
             Write an angle in that range; a bare number is in deg.",
        ),
        ("sweep = nan", "wing.toml:7: planform.sweep = nan: out of range"),
        ("sweep = -inf", "wing.toml:7: planform.sweep = -inf: out of range"),
        (
            "sweep_at = 1.5",
            "wing.toml:7: planform.sweep_at = 1.5: out of range; allowed: 0 to 1",
        ),
        (
            "sweep_at = \"140 %\"",
            "wing.toml:7: planform.sweep_at = \"140 %\": out of range",
        ),
        (
            "dihedral = 91",
            "wing.toml:7: planform.dihedral = 91: out of range; allowed: -90 deg to 90 deg",
        ),
        (
            "[setting]\nincidence = 46",
            "wing.toml:8: setting.incidence = 46: out of range; allowed: -45 deg to 45 deg",
        ),
        (
            "[setting]\ntwist = -46",
            "wing.toml:8: setting.twist = -46: out of range; allowed: -45 deg to 45 deg",
        ),
        (
            "[setting]\ntwist_axis = -0.1",
            "wing.toml:8: setting.twist_axis = -0.1: out of range; allowed: 0 to 1",
        ),
        (
            "[trailing_edge]\nthickness = -1",
            "wing.toml:8: trailing_edge.thickness = -1: out of range; allowed: 0 (sharp)",
        ),
        (
            "[facets]\ntolerance = 0",
            "wing.toml:8: facets.tolerance = 0: out of range; allowed: 0.0005 mm to 10 mm",
        ),
        (
            "[facets]\ntolerance = \"11 mm\"",
            "wing.toml:8: facets.tolerance = \"11 mm\": out of range",
        ),
    ]);
    for (line, start) in [
        (
            "taper_ratio = 0",
            "wing.toml:4: planform.taper_ratio = 0: out of range; allowed: more than 0, at most 1000\n  Give the wing a real tip chord",
        ),
        (
            "span = 0",
            "wing.toml:4: planform.span = 0: out of range; allowed: more than 0, at most 1000 m",
        ),
        (
            "span = \"1.1e6 mm\"",
            "wing.toml:4: planform.span = \"1.1e6 mm\": out of range",
        ),
        ("span = 1e999", "wing.toml:4: planform.span = 1e999: out of range"),
        (
            "area = -3",
            "wing.toml:4: planform.area = -3: out of range; allowed: more than 0, at most 1000000 m^2\n  Write an area in that range; a bare number is in mm^2.",
        ),
        (
            "root_chord = 0.5",
            "wing.toml:4: planform.root_chord = 0.5: out of range; allowed: 1 mm to 1000 m",
        ),
        (
            "tip_chord = nan",
            "wing.toml:4: planform.tip_chord = nan: out of range",
        ),
        (
            "mean_chord = -1",
            "wing.toml:4: planform.mean_chord = -1: out of range",
        ),
        (
            "aspect_ratio = 101",
            "wing.toml:4: planform.aspect_ratio = 101: out of range; allowed: 0.1 to 100",
        ),
    ] {
        // a size that is wrong is the only fault: nothing is said to be missing
        let message = only(&planform(line));
        assert!(message.starts_with(start), "{message}");
    }
}

#[test]
fn values_of_the_wrong_kind() {
    each(&[
        (
            "sweep = true",
            "wing.toml:7: planform.sweep = true: an angle is expected\n  Write a number, or \"3 deg\".",
        ),
        (
            "sweep = [1, 2]",
            "wing.toml:7: planform.sweep = [1, 2]: an angle is expected",
        ),
        (
            "sweep = 2020-01-01",
            "wing.toml:7: planform.sweep = 2020-01-01: an angle is expected",
        ),
        (
            "sweep = {at = 3}",
            "wing.toml:7: planform.sweep: an angle is expected",
        ),
        (
            "sweep = \"3 mm\"",
            "wing.toml:7: planform.sweep = \"3 mm\": mm is the unit of a length, and an angle is expected\n  \
             Units that fit: deg or rad. Write it like \"3 deg\".",
        ),
        (
            "sweep = \"3 turns\"",
            "wing.toml:7: planform.sweep = \"3 turns\": the unit \"turns\" is not known",
        ),
        (
            "sweep = \"steep\"",
            "wing.toml:7: planform.sweep = \"steep\": an angle is expected, a number and its unit",
        ),
        (
            "sweep = \"1,5 deg\"",
            "wing.toml:7: planform.sweep = \"1,5 deg\": a decimal comma is not understood",
        ),
        (
            "outline = \"oval\"",
            "wing.toml:7: planform.outline = \"oval\": not one of the words that this key knows\n  Write \"trapezoid\" or \"ellipse\".",
        ),
        (
            "[setting]\nat = \"tip\"",
            "wing.toml:8: setting.at = \"tip\": not one of the words that this key knows\n  Write \"mac\" or \"root\".",
        ),
        (
            "[setting]\nincidence = \"cruising\"",
            "wing.toml:8: setting.incidence = \"cruising\": an angle is expected, a number and its unit\n  Write it like \"3 deg\". Or write \"cruise\".",
        ),
        (
            "[setting]\ntwist_kind = \"zero lift\"",
            "wing.toml:8: setting.twist_kind = \"zero lift\": not one",
        ),
        (
            "[build]\nsurface = 3",
            "wing.toml:8: build.surface = 3: not one of the words",
        ),
        (
            "[build]\nsides = \"left\"",
            "wing.toml:8: build.sides = \"left\": not one of the words that this key knows\n  Write \"both\", \"starboard\", \"port\" or \"pair\".",
        ),
        (
            "[[build]]\nsides = \"both\"",
            "wing.toml:7: build: a table is expected\n  Write [build] once",
        ),
        (
            "[line]\nname = \"spar\"",
            "wing.toml:7: line: an array of tables is expected\n  Write [[line]] above the keys of each one.",
        ),
    ]);
    for (text, start) in [
        (
            "name = 3",
            "wing.toml:1: name = 3: a text is expected\n  Write it in double quotes",
        ),
        ("name = \" \"", "wing.toml:1: name = \" \": the text is empty"),
        (
            "name = \"a\\tb\"",
            "wing.toml:1: name = \"a\\tb\": the text has a control character in it",
        ),
        (
            "name = \"\"\"a\nb\"\"\"",
            "wing.toml:1: name = \"\"\"a…: the text has a control character in it",
        ),
        (
            "unit = \"yd\"",
            "wing.toml:1: unit = \"yd\": not one of the words that this key knows\n  Write \"mm\", \"cm\", \"m\", \"in\" or \"ft\".",
        ),
        ("line = []", "wing.toml:1: line = []: at least one line is needed"),
        ("line = [3]", "wing.toml:1: line.0 = 3: a table is expected"),
    ] {
        let message = only(&format!("{text}\n{}", planform(WING)));
        assert!(message.starts_with(start), "{message}");
    }
    let long = format!("name = \"{}\"\n{}", "ü".repeat(10_001), planform(WING));
    assert!(
        only(&long).contains("…: the text has 10001 characters; allowed: 10000"),
        "{}",
        only(&long)
    );
}

#[test]
fn unknown_keys_and_tables() {
    each(&[
        (
            "taper = 0.4",
            "wing.toml:7: planform.taper = 0.4: unknown key\n  The nearest known is planform.taper_ratio.",
        ),
        (
            "twist = 3",
            "wing.toml:7: planform.twist = 3: unknown key\n  The nearest known is setting.twist.",
        ),
        (
            "qqqq = 3",
            "wing.toml:7: planform.qqqq = 3: unknown key\n  The keys of planform are area, span,",
        ),
        (
            "[flap]\nroot = \"x\"",
            "wing.toml:7: flap: unknown table\n  The tables are planform, setting,",
        ),
        (
            "[airfoils]\nroot = \"x\"",
            "wing.toml:7: airfoils: unknown table\n  The nearest known is [airfoil].",
        ),
        (
            "[[line]]\nname = \"a\"\nchord_fraction = 0.1\nform = 0",
            "wing.toml:10: line.0.form = 0: unknown key\n  The nearest known is line.N.from.",
        ),
    ]);
    // the key that is unknown may be the size that is missing
    assert!(only(&planform("span = 3000\nroot_chord = 300\ntaper = 0.4")).contains("planform.taper_ratio"));
}

#[test]
fn what_a_misspelling_hides_is_not_missing() {
    let text = planform(WING);
    for (typed, misspelt) in [
        ("[planform]", "[plan_form]"),
        ("[airfoil]", "[aerofoil]"),
        ("root =", "roots ="),
    ] {
        let message = only(&text.replacen(typed, misspelt, 1));
        assert!(message.contains("unknown"), "{message}");
    }
    assert!(
        only("span = 2000\n[airfoil]\nroot = \"NACA 0012\"").contains("The nearest known is planform.span.")
    );
}

#[test]
fn text_that_is_not_toml() {
    for (text, start) in [
        ("[airfoil]\nroot = NACA 2412\n", "wing.toml:2: not valid TOML: "),
        (
            "a = 1\n[airfoil\nroot = 3",
            "wing.toml:2: not valid TOML: unclosed table, expected `]` in \"[airfoil\"",
        ),
        (
            "[planform]\nspan = 1\nspan = 2\n",
            "wing.toml:3: not valid TOML: duplicate key in \"span = 2\"\n  Write each key and each table once",
        ),
        ("name = \"x\n", "wing.toml:1: not valid TOML: "),
        ("name = \"\"\"x\n\n\n", "wing.toml:1: not valid TOML: "),
    ] {
        let message = only(text);
        assert!(message.starts_with(start), "{message}");
    }
}

#[test]
fn airfoils_that_are_missing_or_contradict() {
    assert_eq!(
        only("[planform]\nspan = 2000\nroot_chord = 300\ntip_chord = 200\n[airfoil]\ntip = \"NACA 0009\""),
        "wing.toml:5: airfoil.root: the section at the root is missing\n  Add to [airfoil], for example, root = \"NACA 2412\"."
    );
    let text = format!("{}airfoil = \"NACA 0006\"\n", planform(CRANKED));
    assert_eq!(
        only(&text.replace("[airfoil]", "[airfoil]\ntip = \"NACA 0009\"")),
        "wing.toml:2: airfoil.tip = \"NACA 0009\": contradicts panel.1.airfoil = \"NACA 0006\" (line 12): both are the \
         section at the tip\n  Delete one of them."
    );
}

#[test]
fn nesting_without_end() {
    let deep = 50_000;
    let dotted = format!("a{} = 1\n{}", ".a".repeat(deep), planform(WING));
    assert!(only(&dotted).starts_with("wing.toml:1: "), "{}", only(&dotted));
    for text in [
        format!("a = {}", "[".repeat(deep)),
        format!("a = {}", "{a=".repeat(deep)),
    ] {
        assert!(
            only(&text).starts_with("wing.toml:1: not valid TOML"),
            "{}",
            only(&text)
        );
    }
    let key = format!("a{}", ".a".repeat(deep));
    let found = super::messages(&super::reading_with(&planform(WING), &[(&key, "1")]));
    assert!(
        found.len() == 1 && found[0].contains("no key has so many parts"),
        "{found:?}"
    );
}

#[test]
fn a_trailing_edge_that_is_too_thick() {
    each(&[(
        "[trailing_edge]\nthickness = \"2 cm\"",
        "wing.toml:8: trailing_edge.thickness = \"2 cm\": too thick for a smallest chord of 20 cm; allowed: less than 2 cm \
         (10 %)\n  Make it thinner.",
    )]);
}

#[test]
fn lines_that_are_wrong() {
    const SPAR: &str = "[[line]]\nname = \"spar\"\nchord_fraction = 0.25\n";
    each(&[
        (
            "[[line]]\nchord_fraction = 0.2",
            "wing.toml:7: line.0: name is missing\n  Add name to this [[line]].",
        ),
        (
            "[[line]]\nname = \"a\"",
            "wing.toml:7: line.0: chord_fraction is missing",
        ),
        (
            &format!("{SPAR}to = 0"),
            "wing.toml:10: line.0.to = 0: the line ends at 0 of the semispan, where it starts at 0;",
        ),
        (
            &format!("{SPAR}from = 1"),
            "wing.toml:10: line.0.from = 1: the line ends at 1 of the semispan, where it starts at 1;",
        ),
        (
            &format!("{SPAR}{SPAR}"),
            "wing.toml:11: line.1.name = \"spar\": this name is taken (line 8)",
        ),
        (
            &format!("{SPAR}to = 1.01"),
            "wing.toml:10: line.0.to = 1.01: out of range; allowed: 0 to 1",
        ),
    ]);
}

#[test]
fn all_faults_come_together_in_the_order_of_the_file() {
    let text = "unit = \"yd\"\nname = \"\"\n[planform]\nspan = 3000\nsweep = 99\ntaper = 0.4\n[facets]\ntolerance = \"1 kg\"\n[flap]\n";
    let lines: Vec<_> = super::reading(text)
        .faults
        .iter()
        .map(|fault| fault.place.line)
        .collect();
    assert_eq!(lines, [1, 2, 5, 6, 8, 9, 0]);
}
