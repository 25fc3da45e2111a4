//! Wings sized by what they carry, from the spec to the figures and the proof sheet; what contradicts is refused.

use crate::figures::{assert_near, assert_relative, loft};
use crate::refusal::{assert_refused, assert_says, refused, sound_but};
use crate::workdir::WorkDir;

/// A spec sized by a load; the planform's lines are added.
fn sized(planform: &str) -> String {
    format!(
        "name = \"Sized\"\nunit = \"cm\"\n[load]\nmass = \"6.2 kg\"\nwing_loading = \"84 N/m^2\"\n[airfoil]\n\
         root = \"NACA 2412\"\n[planform]\ntaper_ratio = 0.5\n{planform}\n"
    )
}

#[test]
fn the_chain_of_results_by_hand_is_in_the_figures_and_the_wing() {
    // W = 6.2 · 9.80665 = 60.80123 N; S = 60.80123 / 84 = 0.72382417 m²; b = sqrt(8 S) = 2.40636517 m
    let figures = loft(&WorkDir::new(), &sized("aspect_ratio = 8"));
    let steps: Vec<(String, f64, String)> = (figures.list("sizing").iter())
        .map(|step| {
            (
                step.text("name").to_owned(),
                step.number("value"),
                step.text("unit").to_owned(),
            )
        })
        .collect();
    let expected = [
        ("mass", 6.2, "kg"),
        ("weight", 60.801_23, "N"),
        ("wing loading", 84.0, "N/m²"),
        ("area", 0.723_824_17, "m²"),
        ("aspect ratio", 8.0, ""),
        ("span", 2.406_365_17, "m"),
    ];
    assert_eq!(steps.len(), expected.len(), "{steps:?}");
    for ((name, value, unit), step) in expected.iter().zip(&steps) {
        assert_eq!((*name, *unit), (step.0.as_str(), step.2.as_str()));
        assert_relative(name, step.1, *value, 1e-8);
    }
    assert_relative("area", figures.number("reference.area"), 7_238.241_7, 1e-8);
    assert_relative("span measured", figures.number("built.span"), 240.636_517, 1e-8);
}

#[test]
fn the_sheet_shows_the_chain_and_what_a_limit_costs() {
    let directory = WorkDir::new();
    directory.write("wing.toml", sized("aspect_ratio = 8\nspan_limit = \"2 m\""));
    let ran = directory.run(&["loft", "wing.toml", "-o", "out"]);
    assert_eq!(ran.code, Some(0), "{}", ran.stderr);
    assert_says(
        &ran.stdout,
        &[
            "\nSizing\n  mass                      6.2 kg  as asked\n",
            "  weight                60.80123 N  W = m g, g = 9.80665 m/s²\n",
            "  span built                   2 m  span_limit of [planform]\n",
            "aspect ratio falls from 8 to",
            "rises by 44.76 %",
        ],
    );
    // without a load there is no such section
    directory.write("wing.toml", sound_but(&[]));
    let ran = directory.run(&["loft", "wing.toml", "-o", "out"]);
    assert!(!ran.stdout.contains("Sizing"), "{}", ran.stdout);
}

#[test]
fn twist_counts_in_the_incidence_for_cruise() {
    // straight elements, taper 0.45, tip -2.5°: c θ runs linearly, so its mean is λ ε / (1 + λ) = -0.77586°, and the section at
    // the mean chord (η = 0.436782) has η λ ε / (1 - (1 - λ) η) = -0.64675°: the wing's zero-lift angle is the sections',
    // -2.07724° for NACA 2412 by thin-aerofoil theory (computed), + 0.12911° (small angles: within 2e-4 of it)
    // C_L = 60.80123 / (0.5 · 1.225 · 20² · 0.72382417) = 0.342857; a by Helmbold, A = 8: 8π / (sqrt(17) + 1)
    let spec = sized("aspect_ratio = 8\nsweep_at = 0.5\n[setting]\nincidence = \"cruise\"\ntwist = -2.5\n[cruise]\nspeed = 20")
        .replace("taper_ratio = 0.5", "taper_ratio = 0.45");
    let figures = loft(&WorkDir::new(), &spec);
    let step = |name: &str| {
        let steps = figures.list("sizing");
        let step = steps.iter().find(|step| step.text("name") == name);
        step.unwrap_or_else(|| panic!("no {name}")).number("value")
    };
    let zero_lift = -2.077_24 + 0.129_11;
    assert_near(
        "zero lift",
        step("zero-lift angle at the mean aerodynamic chord"),
        zero_lift,
        2e-4,
    );
    let slope = 8.0 * std::f64::consts::PI / (17_f64.sqrt() + 1.0);
    let incidence = (0.342_857_143 / slope).to_degrees() + zero_lift;
    assert_near(
        "incidence",
        step("incidence at the mean aerodynamic chord"),
        incidence,
        2e-4,
    );
    // the built section has it: measured back from the solid
    let checks = figures.list("checks");
    let measured = checks
        .iter()
        .find(|check| check.text("quantity") == "incidence at the mean aerodynamic chord");
    assert_near(
        "measured",
        measured.expect("a check").number("built"),
        incidence,
        3e-4,
    );
}

#[test]
fn asks_that_contradict_each_other_are_refused() {
    assert_refused(&[(
        10,
        "incidence = \"cruise\"",
        &["setting.incidence", "weight", "speed"],
    )]);
    for (more, words) in [
        (
            "[cruise]\naltitude = \"1 km\"",
            ["wing.toml:18", "cruise", "speed is missing"],
        ),
        (
            "[body]\nwidth = \"1.7 m\"",
            ["wing.toml:19", "body.width", "85 %"],
        ),
        (
            "[body]\ncarry_through = true",
            ["wing.toml:18", "body", "width is missing"],
        ),
        (
            "[load]\nwing_loading = 84",
            ["wing.toml:18", "load", "mass or weight is missing"],
        ),
    ] {
        assert_says(&refused(&format!("{}{more}\n", sound_but(&[]))), &words);
    }
    let said = refused(&sized("aspect_ratio = 8\nspan = \"2 m\""));
    assert_says(
        &said,
        &[
            "wing.toml:11",
            "aspect_ratio",
            "area from [load]",
            "planform.span",
        ],
    );
    let said = refused(&sized("aspect_ratio = 8\narea = \"0.8 m^2\""));
    assert_says(&said, &["wing.toml:11", "area", "[load]", "-9.52 %"]);
    let said = refused(&sized(
        "aspect_ratio = 8\n[place]\naerodynamic_centre = [80, 33, 9]",
    ));
    assert_says(&said, &["wing.toml:12", "aerodynamic_centre", "y = 33 cm"]);
}
