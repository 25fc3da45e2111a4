//! Sizes and panels that contradict each other, settle nothing, or make no wing.

use super::{faults, only, planform};

#[test]
fn sizes_that_contradict_each_other() {
    // A S = b²: 8 · 0.4 m² makes b 1.78885 m; b²/A = 0.5 m²; b²/S = 10
    assert_eq!(
        only(&planform(
            "span = 2000\naspect_ratio = 8\nroot_chord = 250\narea = \"0.4 m^2\""
        )),
        "wing.toml:7: planform.area = \"0.4 m^2\": contradicts span = 2000 mm (line 4) and aspect_ratio = 8 (line 5):\n  \
         area and aspect_ratio make span 1788.85 mm, not 2000 mm (-211.146 mm, -10.56 %)\n  \
         span and aspect_ratio make area 0.5 m^2, not 0.4 m^2 (+0.1 m^2, +25 %)\n  \
         span and area make aspect_ratio 10, not 8 (+2, +25 %)\n  \
         Delete one of them, or change one to the value that the others make of it."
    );
    // values that have no part in it are not named
    let chords = only(&planform(
        "tip_chord = 100\nspan = 2000\nroot_chord = 200\ntaper_ratio = 0.6",
    ));
    assert!(!chords.contains("span"), "{chords}");
    let tip = "root_chord and taper_ratio make tip_chord 120 mm, not 100 mm (+20 mm, +20 %)";
    assert!(chords.contains(tip), "{chords}");
    // more than one at once
    let many =
        "span = 2000\naspect_ratio = 8\narea = 600000\nroot_chord = 300\ntip_chord = 200\ntaper_ratio = 0.5";
    assert_eq!(faults(&planform(many)).len(), 3, "{:#?}", faults(&planform(many)));
}

#[test]
fn agreement_within_rounding_is_no_contradiction() {
    // b = 2000 and A = 8 make S = 500,000 mm²: 0.05 % is 250 mm²
    let text = |area: f64| {
        planform(&format!(
            "span = 2000\naspect_ratio = 8\ntaper_ratio = 0.5\narea = {area}"
        ))
    };
    assert_eq!(faults(&text(500_249.0)), [""; 0]);
    assert_eq!(faults(&text(500_251.0)).len(), 1);
}

#[test]
fn sizes_that_settle_nothing() {
    for (lines, expected) in [
        (
            "span = 2000\naspect_ratio = 8",
            "wing.toml:3: planform: the planform is not settled: one more size is needed beside span and aspect_ratio\n  \
             Add root_chord, taper_ratio or tip_chord to [planform]. For an untapered wing: taper_ratio = 1.",
        ),
        (
            "span = 2000\naspect_ratio = 8\narea = 500000\nmean_chord = 250",
            "wing.toml:3: planform: the planform is not settled: one more size is needed beside span and area\n  \
             Add root_chord, taper_ratio or tip_chord to [planform]. For an untapered wing: taper_ratio = 1.",
        ),
        (
            "root_chord = 300\ntaper_ratio = 0.5",
            "wing.toml:3: planform: the planform is not settled: one more size is needed beside root_chord and taper_ratio\n  \
             Add span, area or aspect_ratio to [planform].",
        ),
        (
            "span = 2000",
            "wing.toml:3: planform: the planform is not settled: two more sizes are needed beside span\n  \
             Add to [planform], for example, root_chord and taper_ratio.",
        ),
        (
            "sweep = 2",
            "wing.toml:3: planform: the planform is not settled: three sizes are needed\n  \
             Add to [planform], for example, span, root_chord and taper_ratio.",
        ),
    ] {
        assert_eq!(only(&planform(lines)), expected);
    }
    let nothing = only("[airfoil]\nroot = \"NACA 0012\"");
    assert!(
        nothing.starts_with("wing.toml: planform: the planform is not settled"),
        "{nothing}"
    );
}

#[test]
fn sizes_that_make_an_impossible_wing() {
    for (lines, expected) in [
        (
            "span = 2000\nmean_chord = 200\nroot_chord = 500",
            "wing.toml:6: planform.root_chord = 500: mean_chord = 200 mm (line 5) and root_chord = 500 mm (line 6) make \
             tip_chord -100 mm; allowed: 1 mm to 1000 m\n  Change one of them.",
        ),
        (
            "span = 2000\nroot_chord = 10\ntaper_ratio = 1",
            "wing.toml:6: planform.taper_ratio = 1: span = 2000 mm (line 4), root_chord = 10 mm (line 5) and \
             taper_ratio = 1 (line 6) make aspect_ratio 200; allowed: 0.1 to 100\n  Change one of them.",
        ),
        (
            "span = 20\nroot_chord = 1.5\ntaper_ratio = 0.5",
            "wing.toml:6: planform.taper_ratio = 0.5: root_chord = 1.5 mm (line 5) and taper_ratio = 0.5 (line 6) make \
             tip_chord 0.75 mm; allowed: 1 mm to 1000 m\n  Change one of them.",
        ),
    ] {
        assert_eq!(only(&planform(lines)), expected);
    }
}

/// Two panels with a semispan of 1000 mm.
const PANELS: &str = "[[panel]]\nspan = 600\ntip_chord = 300\n[[panel]]\nspan = 400\ntip_chord = 150\n";

#[test]
fn keys_that_do_not_go_with_panels() {
    let lines = "root_chord = 400\ntip_chord = 1\ntaper_ratio = 0.5\nsweep = 1\ndihedral = 1\n";
    let expected = [
        (5, "planform.tip_chord = 1", "tip_chord"),
        (6, "planform.taper_ratio = 0.5", "tip_chord"),
        (7, "planform.sweep = 1", "sweep"),
        (8, "planform.dihedral = 1", "dihedral"),
        (16, "setting.twist = -2", "twist"),
    ]
    .map(|(line, typed, key)| {
        format!(
            "wing.toml:{line}: {typed}: does not go with [[panel]]\n  \
             Delete it here, and give each [[panel]] its {key}."
        )
    });
    assert_eq!(
        faults(&format!("{}{PANELS}[setting]\ntwist = -2\n", planform(lines))),
        expected
    );
}

#[test]
fn panels_that_contradict_the_planform() {
    let text = |lines: &str| format!("{}\n{PANELS}", planform(lines));
    assert_eq!(
        only(&text("root_chord = 400\nspan = 2100")),
        "wing.toml:5: planform.span = 2100: contradicts the panels:\n  \
         the panels make span 2000 mm, not 2100 mm (-100 mm, -4.76 %)\n  Delete it, or change it or the panels."
    );
    // S = 600 (400 + 300) + 400 (300 + 150) = 600,000 mm²
    assert_eq!(
        only(&text("root_chord = 400\narea = 610000")),
        "wing.toml:5: planform.area = 610000: contradicts the panels and root_chord = 400 mm (line 4):\n  \
         the panels and root_chord make area 600000 mm^2, not 610000 mm^2 (-10000 mm^2, -1.64 %)\n  \
         the panels and area make root_chord 416.667 mm, not 400 mm (+16.6667 mm, +4.17 %)\n  \
         Delete one of them, or change one to the value that the others make of it."
    );
    // 600 (c_r + 300) + 180,000 is at least 360,000 mm²
    assert_eq!(
        only(&text("area = 300000")),
        "wing.toml:4: planform.area = 300000: the panels and area = 300000 mm^2 (line 4) make root_chord -100 mm; \
         allowed: 1 mm to 1000 m\n  Change one of them."
    );
    assert_eq!(
        only(&text("")),
        "wing.toml:3: planform: the planform is not settled: one more size is needed beside the panels\n  \
         Add area, aspect_ratio, mean_chord or root_chord to [planform]."
    );
}

#[test]
fn panels_with_missing_or_wrong_sizes() {
    let text = |panels: &str| format!("{}{panels}", planform("root_chord = 400\n"));
    assert_eq!(
        faults(&text(
            "[[panel]]\nsweep = 1\n[[panel]]\nspan = -1\ntip_chord = 3\n"
        )),
        [
            "wing.toml:5: panel.0: span is missing\n  Add span to this [[panel]].",
            "wing.toml:5: panel.0: tip_chord is missing\n  Add tip_chord to this [[panel]].",
            "wing.toml:8: panel.1.span = -1: out of range; allowed: more than 0, at most 1000 m\n  \
             Write a length in that range; a bare number is in mm.",
        ]
    );
    let empty = only(&format!("panel = []\n{}", planform("root_chord = 400\n")));
    assert!(
        empty.starts_with("wing.toml:1: panel = []: at least one panel is needed"),
        "{empty}"
    );
}

#[test]
fn panels_that_fold_back() {
    let text = |outer: &str| {
        let inner = "root_chord = 400\n[[panel]]\nspan = 600\ntip_chord = 300\ndihedral = 45\n";
        format!(
            "{}[[panel]]\nspan = 400\ntip_chord = 150\ndihedral = {outer}\n",
            planform(inner)
        )
    };
    assert_eq!(
        only(&text("-45")),
        "wing.toml:12: panel.1.dihedral = -45: the panel folds back: its dihedral differs by 90 deg from the panel \
         before; allowed: less than 90 deg\n  Put a panel with a dihedral in between before it."
    );
    assert_eq!(faults(&text("-44.9")), [""; 0]);
}

#[test]
fn a_fin_has_one_side() {
    let text = |dihedral: i32, sides: &str| {
        let wing = "span = 2000\nroot_chord = 300\ntip_chord = 200\n";
        planform(&format!(
            "{wing}dihedral = {dihedral}\n[build]\nsides = \"{sides}\""
        ))
    };
    assert_eq!(
        only(&text(61, "both")),
        "wing.toml:9: build.sides = \"both\": a first panel with a dihedral of 61 deg makes a fin, which has one side; \
         both sides need at most 60 deg\n  Write \"starboard\" or \"port\", or delete the line."
    );
    assert!(only(&text(-61, "pair")).starts_with("wing.toml:9: build.sides = \"pair\": a first panel"));
    assert_eq!(faults(&text(60, "both")), [""; 0]);
}
