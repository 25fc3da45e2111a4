//! Specs without faults, and what they mean.

use super::{near, planform, reading, spec};
use crate::spec::{IncidenceAt, Sides, Unit, starter};

#[test]
fn starter_is_a_wing() {
    let spec = spec(starter());
    assert_eq!(spec.name, "Dunlin survey wing");
    // c_r = 2 b / (A (1 + λ)) = 2 · 2400 / (9.5 · 1.45)
    near(spec.root_chord, 348.457_350_272_232_3, 1e-12);
    assert_eq!(spec.lines[0].name, "aileron hinge");
}

/// A line of the starter; without its `#` where it is a key or a table.
fn uncommented(line: &str) -> String {
    let key = |text: &str| text.starts_with('[') || !text.split(" = ").next().unwrap_or(text).contains(' ');
    match line.strip_prefix("# ") {
        Some(text) if key(text) => format!("{text}\n"),
        _ => format!("{line}\n"),
    }
}

#[test]
fn everything_that_the_starter_comments_out_is_right_too() {
    let reading = reading(
        &starter()
            .split("# Wings with a crank")
            .next()
            .expect("text before the panels")
            .lines()
            .map(uncommented)
            .collect::<String>(),
    );
    assert_eq!(reading.faults, []);
    let panels: String = starter()
        .lines()
        .filter(|line| {
            !line.starts_with("taper")
                && !line.starts_with("tip")
                && !line.starts_with("sweep")
                && !line.starts_with("twist")
                && !line.starts_with("# wing_loading")
        })
        .filter(|line| {
            !line.starts_with("dihedral") && !line.starts_with("aspect") && !line.starts_with("span")
        })
        .map(uncommented)
        .collect();
    let panels = panels.replace("\n[setting]", "\nroot_chord = 400\n[setting]");
    let spec = spec(&panels);
    assert_eq!(
        (spec.panels.len(), spec.panels[0].airfoil.text.as_str()),
        (1, "NACA 2414")
    );
}

#[test]
fn area_aspect_ratio_and_taper_settle_a_wing() {
    // S = 20 m², A = 8, λ = 0.6: b = sqrt(A S), c_r = 2 S / (b (1 + λ)), c_t = λ c_r
    let spec = spec(&planform(
        "area = \"20 m^2\"\naspect_ratio = 8\ntaper_ratio = 0.6",
    ));
    near(2.0 * spec.panels[0].span, 12_649.110_640_673_518, 1e-12);
    near(spec.root_chord, 1_976.423_537_605_237, 1e-12);
    near(spec.panels[0].tip_chord, 1_185.854_122_563_142_2, 1e-12);
}

#[test]
fn onera_m6_from_its_report() {
    // AGARD AR-138, chapter B1: A 3.8, taper 0.562, semispan 1.1963 m; half area 0.7532 m² as printed
    let lines = "span = \"2.3926 m\"\naspect_ratio = 3.8\ntaper_ratio = 0.562\narea = \"1.5064 m^2\"";
    let spec = spec(&planform(lines));
    let (root, tip, semispan) = (spec.root_chord, spec.panels[0].tip_chord, spec.panels[0].span);
    near(0.5 * semispan * (root + tip), 753_200.0, 1e-4);
    // MAC = 2/3 c_r (1 + λ + λ²) / (1 + λ): 0.64607 m as printed
    let taper: f64 = tip / root;
    near(
        2.0 / 3.0 * root * (1.0 + taper + taper * taper) / (1.0 + taper),
        646.07,
        1e-4,
    );
}

#[test]
fn defaults() {
    let spec = spec(&planform("span = 2000\nroot_chord = 300\ntip_chord = 200"));
    assert_eq!((spec.name.as_str(), spec.unit), ("wing", Unit::Millimetre));
    let panel = &spec.panels[0];
    assert_eq!(
        (panel.span, panel.tip_chord, panel.sweep, panel.sweep_at),
        (1000.0, 200.0, 0.0, 0.25)
    );
    assert_eq!(
        (panel.dihedral, panel.twist, panel.airfoil.text.as_str()),
        (0.0, 0.0, "NACA 0012")
    );
    assert_eq!(
        (spec.setting.incidence, spec.setting.at, spec.setting.twist_axis),
        (0.0, IncidenceAt::Mac, 0.25)
    );
    assert_eq!(
        (spec.trailing_edge, spec.facet_tolerance, spec.sides),
        (None, 0.05, Sides::Both)
    );
    assert!(spec.lines.is_empty());
}

#[test]
fn units_of_bare_and_typed_lengths() {
    let text = format!(
        "unit = \"m\"\n{}\n[trailing_edge]\nthickness = \"0.5 mm\"",
        planform("span = 2.4\nroot_chord = \"12 in\"\narea = 0.5\nsweep = \"0.1 rad\"\nsweep_at = \"40 %\"")
    );
    let spec = spec(&text);
    assert_eq!(spec.unit, Unit::Metre);
    near(spec.root_chord, 304.8, 1e-15);
    // c_t = 2 S / b - c_r
    near(spec.panels[0].tip_chord, 2.0 * 5e5 / 2400.0 - 304.8, 1e-12);
    assert_eq!((spec.panels[0].sweep, spec.trailing_edge), (0.1, Some(0.5)));
    near(spec.panels[0].sweep_at, 0.4, 1e-15);
    let stated: Vec<_> = spec.stated.iter().map(|stated| stated.key.as_str()).collect();
    assert_eq!(
        stated,
        [
            "planform.area",
            "planform.span",
            "planform.root_chord",
            "planform.sweep"
        ]
    );
    near(spec.stated[0].value, 5e5, 1e-15);
}

#[test]
fn rounded_sizes_agree_and_are_kept_as_stated() {
    // 2 · 3000 / 7 = 857.14: typed as 857
    let spec = spec(&planform(
        "span = 3000\narea = \"1.2857 m^2\"\naspect_ratio = 7\ntaper_ratio = 1",
    ));
    near(spec.root_chord, 1_285_700.0 / 3000.0, 1e-12);
    assert_eq!(spec.stated[2].key, "planform.aspect_ratio");
    near(spec.stated[2].value, 7.0, 1e-15);
}

#[test]
fn dihedral_lengthens_the_panel() {
    let spec = spec(&planform(
        "span = 2000\nroot_chord = 300\ntaper_ratio = 1\ndihedral = 60",
    ));
    near(spec.panels[0].span, 2000.0, 1e-12); // 1000 / cos 60°
}

const CRANKED: &str = "
[[panel]]
span = 600
tip_chord = 300
sweep = 5
twist = -1
airfoil = \"NACA 2412\"
[[panel]]
span = 400
tip_chord = 150
dihedral = 60
";

#[test]
fn panels_with_a_root_chord() {
    let spec = spec(&format!(
        "{}\nroot_chord = 400\nsweep_at = 0.5\n{CRANKED}sweep_at = 0\n",
        planform("")
    ));
    assert_eq!((spec.root_chord, spec.panels.len()), (400.0, 2));
    let (inner, outer) = (&spec.panels[0], &spec.panels[1]);
    assert_eq!((inner.sweep_at, outer.sweep_at, outer.sweep), (0.5, 0.0, 0.0));
    assert_eq!(
        (outer.twist, outer.airfoil.text.as_str()),
        (inner.twist, "NACA 2412")
    );
    assert_eq!(
        spec.stated.last().map(|stated| stated.key.as_str()),
        Some("panel.1.dihedral")
    );
}

#[test]
fn panels_take_the_root_chord_from_area_mean_chord_or_aspect_ratio() {
    // semispan 600 + 400 cos 60° = 800; half area 600 (400 + 300) / 2 + 200 (300 + 150) / 2 = 255,000
    for size in [
        "area = 510000",
        "mean_chord = 318.75",
        "aspect_ratio = 5.01960784313725",
        "area = \"51 dm^2\"\nspan = 1600",
    ] {
        near(
            spec(&format!("{}{CRANKED}", planform(size))).root_chord,
            400.0,
            1e-12,
        );
    }
}

#[test]
fn the_tip_airfoil_is_that_of_the_last_panel() {
    let text = format!("{}{CRANKED}", planform("root_chord = 400"));
    let text = text.replace("[airfoil]", "[airfoil]\ntip = \"NACA 0009\"");
    let spec = spec(&text);
    let airfoils: Vec<_> = spec
        .panels
        .iter()
        .map(|panel| panel.airfoil.text.as_str())
        .collect();
    assert_eq!(airfoils, ["NACA 2412", "NACA 0009"]);
}

#[test]
fn a_steep_surface_is_a_fin() {
    let text =
        planform("root_chord = 300\narea = 200000\n[[panel]]\nspan = 400\ntip_chord = 200\ndihedral = 90\n");
    let spec = spec(&text);
    // S = 2 · 400 · (300 + 200) / 2
    assert_eq!((spec.sides, spec.root_chord), (Sides::Starboard, 300.0));
    let one = super::spec(&planform(
        "span = 800\nroot_chord = 300\ntip_chord = 200\ndihedral = -70\n[build]\nsides = \"port\"",
    ));
    assert_eq!(one.sides, Sides::Port);
    near(one.panels[0].span, 400.0 / 70_f64.to_radians().sin(), 1e-12);
}

#[test]
fn airfoils_are_listed_with_their_places_even_beside_faults() {
    let text = format!("{}{CRANKED}", planform("root_chord = -4"));
    let reading = reading(&text);
    assert!(reading.spec.is_none());
    let all: Vec<_> = reading
        .airfoils
        .iter()
        .map(|a| (a.text.as_str(), a.place.line, a.place.key.as_str()))
        .collect();
    assert_eq!(
        all,
        [
            ("NACA 0012", 2, "airfoil.root"),
            ("NACA 2412", 10, "panel.0.airfoil")
        ]
    );
}

#[test]
fn names_may_be_in_any_script() {
    let text = format!(
        "name = \"Крыло 翼 🪶\"\n{}",
        planform("span = 2000\nroot_chord = 300\ntip_chord = 200")
    );
    assert_eq!(spec(&text).name, "Крыло 翼 🪶");
}

#[test]
fn windows_line_ends_and_byte_order_mark() {
    let text = format!(
        "\u{feff}{}",
        planform("span = 2000\nroot_chord = 300\ntip_chord = 200").replace('\n', "\r\n")
    );
    near(spec(&text).root_chord, 300.0, 1e-15);
}
