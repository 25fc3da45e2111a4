//! `[load]`, `[cruise]`, the limit of the span, and the area that follows.

use super::{faults, near, only, planform, spec};
use crate::spec::Spec;

/// A planform of which the area is open; its last line is line 5.
const OPEN: &str = "aspect_ratio = 8\ntaper_ratio = 0.5\n";

fn loaded(load: &str) -> String {
    format!("{}[load]\n{load}", planform(OPEN))
}

fn area(spec: &Spec) -> f64 {
    spec.panels[0].span * (spec.root_chord + spec.panels[0].tip_chord)
}

fn step(spec: &Spec, name: &str) -> (f64, &'static str) {
    let chain = &spec.load.as_ref().expect("a load").chain;
    let step = chain.iter().find(|step| step.name == name);
    let step = step.unwrap_or_else(|| panic!("no {name} in {chain:#?}"));
    (step.value, step.unit)
}

#[test]
fn mass_and_wing_loading_size_the_area_by_hand() {
    // W = 6.2 · 9.80665 = 60.80123 N; S = 60.80123 / 84 = 0.7238242 m²; b = sqrt(8 S) = 2.4063652 m
    let spec = spec(&loaded("mass = \"6.2 kg\"\nwing_loading = \"84 N/m^2\""));
    near(area(&spec), 723_824.166_666_667, 1e-12);
    near(2.0 * spec.panels[0].span, 2_406.365_170_4, 5e-9);
    let load = spec.load.as_ref().expect("a load");
    near(load.weight, 60.801_23, 1e-14);
    let names: Vec<_> = load.chain.iter().map(|step| step.name.as_str()).collect();
    assert_eq!(
        names,
        ["mass", "weight", "wing loading", "area", "aspect ratio", "span"]
    );
    assert_eq!(step(&spec, "weight").1, "N");
    near(step(&spec, "area").0, 0.723_824_166_666_667, 1e-12);
    near(step(&spec, "span").0, 2.406_365_170_4, 5e-9);
    assert_eq!(load.chain[2].ground, "as asked");
    assert_eq!(load.chain[5].ground, "b = sqrt(A S)");
    // Raymer, Aircraft Design, ch. 4: S = W / (W/S), b = sqrt(A S), c_r = 2 S / (b (1 + λ))
    near(
        spec.root_chord,
        2.0 * 723_824.166_666_667 / (2_406.365_170_4 * 1.5),
        1e-8,
    );
}

#[test]
fn stall_speed_makes_the_wing_loading_by_hand() {
    // W/S = 1.225 · 11² · 1.35 / 2 = 100.051875 N/m² at sea level; S = 61 / 100.051875
    let at_sea_level = spec(&loaded(
        "weight = \"61 N\"\nstall_speed = \"11 m/s\"\nmax_lift_coefficient = 1.35",
    ));
    near(step(&at_sea_level, "wing loading").0, 100.051_875, 2e-8);
    near(area(&at_sea_level), 61.0 / 100.051_875 * 1e6, 2e-8);
    assert_eq!(step(&at_sea_level, "altitude"), (0.0, "m"));
    // the same by a density
    let dense = spec(&loaded(
        "weight = 61\nstall_speed = 11\nmax_lift_coefficient = 1.35\ndensity = 1.225",
    ));
    near(area(&dense), 61.0 / 100.051_875 * 1e6, 1e-14);
    // at 5000 m, ρ = 0.73612 kg/m³ as printed in the standard atmosphere (five digits)
    let high = spec(&loaded(
        "weight = 61\nstall_speed = \"39.6 km/h\"\nmax_lift_coefficient = 1.35\naltitude = \"5 km\"",
    ));
    near(step(&high, "wing loading").0, 0.736_12 * 121.0 * 1.35 / 2.0, 1e-5);
}

#[test]
fn loads_in_any_unit() {
    // 1 lb = 0.45359237 kg, g = 9.80665 m/s², 1 ft = 0.3048 m, all exact: 1 lb/ft² = 47.880259 N/m²
    for (load, square_metres) in [
        ("mass = 6.2\nwing_loading = 84", 0.723_824_166_666_667),
        (
            "mass = \"6200 g\"\nwing_loading = \"84 Pa\"",
            0.723_824_166_666_667,
        ),
        ("mass = \"1000 kg\"\nwing_loading = \"0.980665 kPa\"", 10.0),
        ("mass = \"12 kg\"\nwing_loading = \"60 g/dm^2\"", 2.0),
        ("mass = \"300 kg\"\nwing_loading = \"30 kg/m²\"", 10.0),
        (
            "mass = \"2400 lb\"\nwing_loading = \"16 lb/ft^2\"",
            150.0 * 0.092_903_04,
        ),
        (
            "mass = \"48 oz\"\nwing_loading = \"12 oz/ft^2\"",
            4.0 * 0.092_903_04,
        ),
        ("weight = \"1 kN\"\nwing_loading = \"100 N/m^2\"", 10.0),
        (
            "weight = \"160 lbf\"\nwing_loading = \"16 lb/ft^2\"",
            10.0 * 0.092_903_04,
        ),
        // 2 · 1000 / (1 · V²): V = 100 kn = 51.444 m/s, 100 mph = 44.704 m/s, 100 ft/s = 30.48 m/s
        (
            "weight = 1000\nstall_speed = \"100 kn\"\nmax_lift_coefficient = 1\ndensity = \"0.001 g/cm^3\"",
            2000.0 / (51.444_444_444_444_44 * 51.444_444_444_444_44),
        ),
        (
            "weight = 1000\nstall_speed = \"100 mph\"\nmax_lift_coefficient = 1\ndensity = 1",
            2000.0 / (44.704 * 44.704),
        ),
        // 1 slug/ft³ = 515.378818 kg/m³
        (
            "weight = 1000\nstall_speed = \"100 ft/s\"\nmax_lift_coefficient = 1\ndensity = \"0.002 slug/ft^3\"",
            2000.0 / (2e-3 * 515.378_818_39 * 30.48 * 30.48),
        ),
    ] {
        near(area(&spec(&loaded(load))), square_metres * 1e6, 1e-10);
    }
}

#[test]
fn a_weight_alone_sizes_nothing_and_is_shown() {
    let text = format!(
        "{}\n[load]\nmass = 5",
        planform("span = 2000\nroot_chord = 300\ntip_chord = 200")
    );
    let spec = spec(&text);
    // 5 · 9.80665 / 0.5
    near(step(&spec, "wing loading").0, 98.0665, 1e-12);
    near(step(&spec, "aspect ratio").0, 8.0, 1e-12);
    assert_eq!(spec.notes, [""; 0]);
}

#[test]
fn loads_that_are_wrong() {
    for (load, message) in [
        (
            "wing_loading = 84",
            "wing.toml:6: load: mass or weight is missing\n  Add to [load], for example, mass = \"6.2 kg\".",
        ),
        (
            "mass = 6.2\nweight = \"70 N\"\nwing_loading = 84",
            "wing.toml:8: load.weight = \"70 N\": contradicts mass = 6.2 (line 7), which weighs 60.8012 N\n  Delete one of the two.",
        ),
        (
            "mass = 6.2\nwing_loading = 84\nstall_speed = 11\nmax_lift_coefficient = 1.35",
            "wing.toml:8: load.wing_loading = 84: contradicts stall_speed = 11 (line 9), which with max_lift_coefficient and \
             density makes it 100.052 N/m^2\n  Delete one of them.",
        ),
        (
            "mass = 6.2\nstall_speed = 11",
            "wing.toml:8: load.stall_speed = 11: sizes nothing without max_lift_coefficient\n  Add max_lift_coefficient to [load], or delete the line.",
        ),
        (
            "mass = 6.2\nwing_loading = 84\naltitude = \"1 km\"",
            "wing.toml:9: load.altitude = \"1 km\": sizes nothing without stall_speed\n  Add stall_speed to [load], or delete the line.",
        ),
        (
            "mass = 6.2\nstall_speed = 11\nmax_lift_coefficient = 1.35\naltitude = \"1 km\"\ndensity = 1.2",
            "wing.toml:11: load.density = 1.2: contradicts altitude = \"1 km\" (line 10): both say how dense the air is\n  Delete one of the two.",
        ),
        (
            "mass = 6.2\nstall_speed = 11\nmax_lift_coefficient = 1.35\naltitude = 1000",
            "wing.toml:10: load.altitude = 1000: an altitude needs its unit: a bare one could be in the unit of the wing's \
             lengths or in metres\n  Write it like \"120 m\" or \"400 ft\".",
        ),
        (
            "mass = 6.2\nstall_speed = 11\nmax_lift_coefficient = 1.35\naltitude = \"21 km\"",
            "wing.toml:10: load.altitude = \"21 km\": out of range; allowed: -5000 m to 20000 m (troposphere and lower \
             stratosphere)\n  Write a length in that range.",
        ),
        (
            "mass = \"6.2 N\"\nwing_loading = 84",
            "wing.toml:7: load.mass = \"6.2 N\": N is the unit of a force, and a mass is expected\n  Units that fit: kg, g, lb or oz. Write it like \"6.2 kg\".",
        ),
        (
            "mass = 0\nwing_loading = 84",
            "wing.toml:7: load.mass = 0: out of range; allowed: more than 0, at most 1000000 kg\n  Write a mass in that range; a bare number is in kg.",
        ),
        (
            "weight = 1e7\nwing_loading = 1e-6",
            "wing.toml:8: load.wing_loading = 1e-6: a weight of 10000000 N makes an area of 1.0000e13 m^2; allowed: more than 0, at most \
             1000000 m^2\n  Change the weight or the loading.",
        ),
        (
            "mass = 6.2\nwing_lading = 84",
            "wing.toml:8: load.wing_lading = 84: unknown key\n  The nearest known is load.wing_loading.",
        ),
    ] {
        assert_eq!(only(&loaded(load)), message);
    }
}

#[test]
fn an_area_from_the_load_takes_its_part_in_contradictions() {
    let load = "[load]\nmass = 6.2\nwing_loading = \"84 N/m^2\"\n";
    let with = |lines: &str| format!("{load}{}", planform(lines));
    assert_eq!(
        only(&with("area = \"0.8 m^2\"\naspect_ratio = 8\ntaper_ratio = 0.5")),
        "wing.toml:7: planform.area = \"0.8 m^2\": contradicts the area from [load], 0.723824 m^2 (line 3; -0.0761758 m^2, \
         -9.52 %)\n  Delete the area, or what sizes it in [load]."
    );
    let message = only(&with("span = \"2 m\"\naspect_ratio = 8\ntaper_ratio = 0.5"));
    assert!(
        message.starts_with(
            "wing.toml:8: planform.aspect_ratio = 8: contradicts span = 2 m (line 7) and area from [load] = 0.723824 m^2 (line 3):\n  \
             area from [load] and aspect_ratio make span 2.40637 m, not 2 m"
        ),
        "{message}"
    );
    // one more size is needed, and the load's area is among what there is
    let message = only(&with("aspect_ratio = 8"));
    assert!(
        message.contains("beside area from [load] and aspect_ratio"),
        "{message}"
    );
    // an area that agrees within rounding is no contradiction
    assert_eq!(
        faults(&with(
            "area = \"0.7238 m^2\"\naspect_ratio = 8\ntaper_ratio = 0.5"
        )),
        [""; 0]
    );
}

#[test]
fn a_limit_cuts_the_span_and_says_what_it_costs() {
    // S = 0.7238242 m² stays, b 2406.37 -> 2000 mm: A = 4 / 0.7238242 = 5.5262; (2406.3652 / 2000)² - 1 = 44.76 %
    let text = loaded("mass = 6.2\nwing_loading = 84").replace("taper", "span_limit = \"2 m\"\ntaper");
    let limited = spec(&text);
    near(2.0 * limited.panels[0].span, 2000.0, 1e-15);
    near(area(&limited), 723_824.166_666_667, 1e-12);
    near(limited.panels[0].tip_chord / limited.root_chord, 0.5, 1e-12);
    assert_eq!(
        limited.notes,
        [
            "span_limit: the span is 2 m in place of 2.40637 m with the area kept, so the aspect ratio falls from 8 to 5.5262, \
             and the induced drag at the same lift and speed rises by 44.76 % (D_i = L² / (q π b² e): (b / b_limit)² - 1)."
        ]
    );
    near(step(&limited, "span built").0, 2.0, 1e-15);
    near(step(&limited, "aspect ratio built").0, 5.526_204, 1e-7);
    assert!(
        limited
            .stated
            .iter()
            .all(|stated| stated.key != "planform.aspect_ratio")
    );
    // a limit that is not reached changes nothing
    let free = spec(&text.replace("\"2 m\"", "\"2.5 m\""));
    assert_eq!((free.notes.len(), free.stated.len()), (0, 2));
    near(2.0 * free.panels[0].span, 2_406.365_170_4, 5e-9);
}

#[test]
fn limits_that_cannot_be_kept() {
    for (lines, message) in [
        (
            "span = 2400\nspan_limit = 2000\nroot_chord = 300\ntaper_ratio = 0.5",
            "wing.toml:5: planform.span_limit = 2000: span = 2400 (line 4) is asked for, which is more\n  Lower the span, or raise the limit.",
        ),
        (
            "span_limit = 2000\nroot_chord = 300\ntip_chord = 200\naspect_ratio = 10",
            "wing.toml:4: planform.span_limit = 2000: the span would be 2500 mm; cutting it to the limit with the area of \
             625000 mm^2 kept contradicts root_chord and tip_chord\n  Give taper_ratio and the area in place of chords, lower \
             the aspect ratio, or raise the limit.",
        ),
        (
            // c_m = 625000 / 100 = 6250 mm: A = 0.016
            "span_limit = 100\ntaper_ratio = 0.5\narea = 625000\naspect_ratio = 10",
            "wing.toml:4: planform.span_limit = 100: with the span cut to it, span and area = 625000 mm^2 (line 6) make aspect_ratio 0.016; allowed: 0.1 to \
             100\n  Raise the limit, or change one of them.",
        ),
        (
            "span_limit = 1800\nroot_chord = 300\n[[panel]]\nspan = 1000\ntip_chord = 200",
            "wing.toml:4: planform.span_limit = 1800: the panels make the span 2000 mm, which is more\n  Shorten the panels, or raise the limit.",
        ),
    ] {
        assert_eq!(only(&planform(lines)), message);
    }
}

#[test]
fn cruise_has_speed_and_air() {
    let wing = planform("span = 2000\nroot_chord = 300\ntip_chord = 200");
    let cruise = |lines: &str| {
        spec(&format!("{wing}\n[cruise]\n{lines}"))
            .cruise
            .expect("cruise")
    };
    let given = cruise("speed = \"24 m/s\"\ndensity = \"1.2 kg/m^3\"");
    assert_eq!((given.speed, given.density, given.mach), (24.0, 1.2, 0.0));
    // standard atmosphere at 11 km as printed: 0.36392 kg/m³, 295.069 m/s
    let high = cruise("speed = 250\naltitude = \"11 km\"");
    near(high.density, 0.363_92, 1.4e-5);
    near(high.mach, 250.0 / 295.069, 4e-6);
    near(cruise("speed = 24").density, 1.225, 2e-8);
}

#[test]
fn incidence_for_cruise_needs_weight_and_speed() {
    let wing = planform("span = 2000\nroot_chord = 300\ntip_chord = 200");
    let text = |more: &str| format!("{wing}\n[setting]\nincidence = \"cruise\"\n{more}");
    let whole = spec(&text("[load]\nmass = 5\n[cruise]\nspeed = 20"));
    assert!(whole.setting.for_cruise && whole.load.is_some() && whole.cruise.is_some());
    for (more, message) in [
        (
            "[cruise]\nspeed = 20",
            "wing.toml:8: setting.incidence = \"cruise\": the incidence for cruise needs the weight\n  Add to [load], for example, \
             mass = \"6.2 kg\", or give the incidence as an angle.",
        ),
        (
            "[load]\nmass = 5",
            "wing.toml:8: setting.incidence = \"cruise\": the incidence for cruise needs the speed\n  Add to [cruise], for example, \
             speed = \"24 m/s\", or give the incidence as an angle.",
        ),
        (
            "[load]\nmass = 5\n[cruise]\naltitude = \"1 km\"",
            "wing.toml:11: cruise: speed is missing\n  Add speed to [cruise].",
        ),
        (
            "at = \"root\"\n[load]\nmass = 5\n[cruise]\nspeed = 20",
            "wing.toml:9: setting.at = \"root\": contradicts incidence = \"cruise\" (line 8), which is laid out at the mean \
             aerodynamic chord\n  Delete the line, or give the incidence as an angle.",
        ),
        (
            "[load]\nmass = 5\n[cruise]\nspeed = 400",
            "wing.toml:12: cruise.speed = 400: a Mach number of 1.17545 is too high for the incidence for cruise, of which the \
             formulas hold below 1\n  Lower the speed, or give the incidence as an angle.",
        ),
        (
            "[load]\nmass = 5\n[cruise]\nspeed = 20\naltitude = \"1 km\"\ndensity = 1",
            "wing.toml:14: cruise.density = 1: contradicts altitude = \"1 km\" (line 13): both say how dense the air is\n  Delete one of the two.",
        ),
        (
            "[load]\nmass = -5\n[cruise]\nspeed = 20",
            "wing.toml:10: load.mass = -5: out of range; allowed: more than 0, at most 1000000 kg\n  Write a mass in that range; a bare number is in kg.",
        ),
    ] {
        assert_eq!(only(&text(more)), message);
    }
    let fin =
        text("[load]\nmass = 5\n[cruise]\nspeed = 20").replace("span = 2000", "dihedral = 90\nspan = 2000");
    assert!(only(&fin).contains("a fin carries no weight"), "{}", only(&fin));
}
