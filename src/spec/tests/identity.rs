//! When two specs say the same.

use super::{planform, reading, reading_with};
use crate::spec::{StepReference, StepSchema};

const SIZES: &str = "span = 2000\nroot_chord = 300\ntip_chord = 200";

#[test]
fn a_spec_is_the_same_however_it_is_laid_out() {
    let one = reading(&planform(SIZES)).identity;
    let other = "# a comment\nplanform.tip_chord = 2e2\n[planform]\n root_chord = 300.0\nspan = 2_000\n";
    let other =
        other.replace("planform.tip_chord = 2e2\n", "") + "tip_chord = 2e2\n[airfoil]\nroot = 'NACA 0012'";
    assert_eq!(one, reading(&other).identity);
    let set = reading_with(
        &planform("span = 1\nroot_chord = 300\ntip_chord = 200"),
        &[("planform.span", "2000")],
    );
    assert_eq!(one, set.identity);
}

#[test]
fn any_other_value_makes_another_spec() {
    let one = reading(&planform(SIZES)).identity;
    for set in [
        ("planform.span", "2000.0000000000002"),
        ("planform.sweep", "1"),
        ("name", "Dunlin"),
        ("airfoil.root", "NACA 0013"),
        ("step.schema", "AP214"),
    ] {
        assert_ne!(one, reading_with(&planform(SIZES), &[set]).identity, "{set:?}");
    }
    // a text that holds what could be the next line is no such line
    let one = reading_with(&planform(SIZES), &[("name", "'a\"\nunit = \"mm'")]).identity;
    let two = reading_with(&planform(SIZES), &[("name", "a"), ("unit", "mm")]).identity;
    assert!(
        one != two && one.lines().count() + 1 == two.lines().count(),
        "{one}{two}"
    );
}

#[test]
fn the_step_file_is_as_asked() {
    let step = |lines: &str| {
        reading(&format!("{}\n[step]\n{lines}", planform(SIZES)))
            .spec
            .unwrap()
            .step
    };
    assert_eq!(step("").reference, StepReference::Both);
    assert_eq!(step("").schema, StepSchema::Ap242);
    for (word, form) in [
        ("both", StepReference::Both),
        ("construction", StepReference::Construction),
        ("wireframe", StepReference::Wireframe),
        ("parts", StepReference::Parts),
        ("none", StepReference::None),
    ] {
        assert_eq!(step(&format!("reference = \"{word}\"")).reference, form);
    }
    assert_eq!(step("schema = \"AP214\"").schema, StepSchema::Ap214);
}

#[test]
fn a_form_of_the_step_file_that_is_none_is_a_fault() {
    let faults = super::faults(&format!(
        "{}\n[step]\nreference = \"lines\"\nschema = \"AP203\"",
        planform(SIZES)
    ));
    assert_eq!(faults.len(), 2, "{faults:#?}");
    assert!(
        faults[0].contains("construction") && faults[1].contains("AP214"),
        "{faults:#?}"
    );
}

#[test]
fn a_description_is_kept() {
    let spec = super::spec(&format!(
        "description = \"A wing, \\\"clean\\\".\"\n{}",
        planform(SIZES)
    ));
    assert_eq!(spec.description.as_deref(), Some("A wing, \"clean\"."));
}
