//! Random wings, whatever sizes they are given by, and random texts.

use proptest::prelude::{Just, Strategy, any, prop_assert, prop_assert_eq, proptest};
use proptest::sample::{Index, subsequence};
use proptest::test_runner::TestCaseError;

use super::{planform, reading, reading_with};
use crate::spec::starter;

/// The seven sizes of a trapezoid \[mm, mm²\].
fn sizes(span: f64, root: f64, taper: f64) -> [(&'static str, f64); 7] {
    let mean = 0.5 * root * (1.0 + taper);
    [
        ("area", span * mean),
        ("span", span),
        ("aspect_ratio", span / mean),
        ("mean_chord", mean),
        ("root_chord", root),
        ("taper_ratio", taper),
        ("tip_chord", taper * root),
    ]
}

const KEYS: [&str; 7] = [
    "span",
    "area",
    "aspect_ratio",
    "mean_chord",
    "root_chord",
    "taper_ratio",
    "tip_chord",
];

fn wing() -> impl Strategy<Value = [(&'static str, f64); 7]> {
    (1000.0..20_000.0, 0.05..0.3, 0.2..1.5)
        .prop_map(|(span, slender, taper)| sizes(span, slender * span, taper))
}

fn write(sizes: &[(&str, f64)]) -> String {
    planform(
        &sizes
            .iter()
            .map(|(key, value)| format!("{key} = {value:?}\n"))
            .collect::<String>(),
    )
}

/// True where these sizes settle a trapezoid: two relations link the first four, two link the last four with c_m.
fn sufficient(keys: &[&str]) -> bool {
    let count = |group: &[&str]| keys.iter().filter(|key| group.contains(key)).count();
    let span_side = count(&["area", "span", "aspect_ratio"]);
    let chord_side = count(&["root_chord", "taper_ratio", "tip_chord"]);
    let mean = count(&["mean_chord"]);
    (span_side + mean >= 2 && chord_side >= 1) || (chord_side + mean >= 2 && span_side >= 1)
}

fn check(text: &str, all: &[(&str, f64); 7]) -> Result<(), TestCaseError> {
    let reading = reading(text);
    prop_assert_eq!(&reading.faults, &[]);
    let spec = reading.spec.unwrap();
    for (found, expected) in [
        (2.0 * spec.panels[0].span, all[1].1),
        (spec.root_chord, all[4].1),
        (spec.panels[0].tip_chord, all[6].1),
    ] {
        // c_t = 2 c_m - c_r loses at most a digit here
        prop_assert!(
            (found - expected).abs() < 1e-12 * expected.max(all[4].1),
            "{found} {expected}\n{text}"
        );
    }
    Ok(())
}

proptest! {
    #[test]
    fn any_sufficient_set_of_sizes_is_the_same_wing(
        (all, some) in wing().prop_flat_map(|all| (Just(all), subsequence(all.to_vec(), 3..=7)))
    ) {
        let keys: Vec<_> = some.iter().map(|(key, _)| *key).collect();
        let text = write(&some);
        if sufficient(&keys) {
            check(&text, &all)?;
        } else {
            let faults = reading(&text).faults;
            prop_assert_eq!(faults.len(), 1);
            prop_assert!(faults[0].problem.starts_with("the planform is not settled: one more size"), "{}", faults[0]);
            // what the remedy offers would do, and what it does not offer would not
            for (key, value) in all {
                let more: Vec<_> = some.iter().copied().filter(|size| size.0 != key).chain([(key, value)]).collect();
                let offered = faults[0].remedy.split(['.', ' ', ',']).take_while(|word| *word != "to").any(|word| word == key);
                prop_assert_eq!(reading(&write(&more)).spec.is_some(), offered, "{}", key);
            }
        }
    }

    #[test]
    fn a_size_that_is_off_by_a_percent_is_a_contradiction(
        (some, which) in wing().prop_flat_map(|all| (subsequence(all.to_vec(), 4..=7), any::<Index>()))
    ) {
        let mut off = some.clone();
        let wrong = which.index(off.len());
        off[wrong].1 *= 1.01;
        let others: Vec<_> = some.iter().map(|(key, _)| *key).filter(|key| *key != some[wrong].0).collect();
        // where the others do not settle it, the one that is off may be what settles it
        if sufficient(&others) {
            let faults = reading(&write(&off)).faults;
            prop_assert!(!faults.is_empty());
            for fault in &faults {
                prop_assert!(fault.problem.starts_with("contradicts "), "{fault}");
                prop_assert!(fault.to_string().contains(some[wrong].0) || faults.len() > 1, "{fault}");
            }
        }
    }

    #[test]
    fn any_numbers_are_a_wing_or_have_a_fault(
        numbers in proptest::collection::vec((0_usize..7, any::<f64>()), 0..6),
        panels in proptest::collection::vec((any::<f64>(), any::<f64>(), -100.0..100.0), 0..4),
    ) {
        let set: Vec<_> = numbers.iter().map(|&(key, value)| (format!("planform.{}", KEYS[key]), format!("{value:e}"))).collect();
        let set: Vec<_> = set.iter().map(|(key, value)| (key.as_str(), value.as_str())).collect();
        let panels: String = panels
            .iter()
            .map(|(span, chord, dihedral)| format!("[[panel]]\nspan={span:?}\ntip_chord={chord:?}\ndihedral={dihedral:?}\n"))
            .collect();
        for text in [planform(""), planform(&panels)] {
            let reading = reading_with(&text, &set);
            prop_assert_eq!(reading.spec.is_none(), !reading.faults.is_empty());
        }
    }

    #[test]
    fn tiny_and_huge_sizes_are_a_wing_or_have_a_fault(powers in proptest::collection::vec(-320..13, 7), some in 0_usize..128) {
        let lines: String = (0..7).filter(|i| some >> i & 1 == 1).map(|i| format!("{} = 1e{}\n", KEYS[i], powers[i])).collect();
        let panel = format!("[[panel]]\nspan = 1e{}\ntip_chord = 1\n", powers[0]);
        for text in [planform(&lines), format!("{}{panel}", planform(&lines))] {
            let reading = reading(&text);
            prop_assert_eq!(reading.spec.is_none(), !reading.faults.is_empty(), "{}", text);
        }
    }

    #[test]
    fn panels_have_the_same_root_chord_whatever_size_it_follows_from(
        root in 50.0..500.0_f64,
        panels in proptest::collection::vec((100.0..2000.0_f64, 50.0..500.0_f64, -44.0..44.0_f64), 1..6),
    ) {
        let mut inner = root;
        let (mut span, mut area) = (0.0, 0.0);
        let mut text = String::new();
        for (length, chord, dihedral) in panels {
            let across = 2.0 * length * dihedral.to_radians().cos();
            span += across;
            area += 0.5 * across * (inner + chord);
            inner = chord;
            text += &format!("[[panel]]\nspan = {length:?}\ntip_chord = {chord:?}\ndihedral = {dihedral:?}\n");
        }
        let mean = area / span;
        for (key, value) in [("root_chord", root), ("area", area), ("mean_chord", mean), ("aspect_ratio", span / mean)] {
            let reading = reading(&format!("{}{text}", planform(&format!("span = {span:?}\n{key} = {value:?}\n"))));
            // slender wings have aspect ratios that are out of range
            if let Some(spec) = &reading.spec {
                // a first panel that is a small part of the wing leaves the root chord to a small difference
                prop_assert!((spec.root_chord - root).abs() < 1e-9 * root, "{} {root}", spec.root_chord);
            } else {
                prop_assert!(span / mean > 99.0, "{:?}", reading.faults);
            }
        }
    }

    #[test]
    fn any_text_is_read_without_panic(text in any::<String>(), key in any::<String>(), value in any::<String>()) {
        let reading = reading_with(&text, &[(&key, &value)]);
        prop_assert_eq!(reading.spec.is_none(), !reading.faults.is_empty());
    }

    #[test]
    fn a_damaged_spec_is_read_without_panic(
        cuts in proptest::collection::vec((any::<Index>(), 0_usize..12, "[-0-9a-z.=\"\\[\\]\\{\\}, \n]{0,6}"), 1..5),
        key in "(planform|panel|line|setting|name|unit)(\\.[0-3])?(\\.(span|sweep|to|name|dihedral))?",
        value in "[-0-9a-z.\"\\[\\]\\{\\}= ]{0,8}",
    ) {
        let panels = "\n[[panel]]\nspan = 600\ntip_chord = 300\n[[panel]]\nspan = 300\ntip_chord = 100\ndihedral = 30\n";
        let mut text: Vec<char> = format!("{}{panels}", starter()).chars().filter(|c| *c != '#').collect();
        for (at, length, new) in cuts {
            let at = at.index(text.len());
            let end = (at + length).min(text.len());
            text.splice(at..end, new.chars());
        }
        let text: String = text.into_iter().collect();
        for text in [text.as_str(), starter(), panels] {
            let reading = reading_with(text, &[(&key, &value)]);
            prop_assert_eq!(reading.spec.is_none(), !reading.faults.is_empty());
        }
    }
}
