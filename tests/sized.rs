//! Wings sized by what they carry, from the spec to the figures and the proof sheet; what contradicts is refused.

use crate::figures::{assert_relative, loft};
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
