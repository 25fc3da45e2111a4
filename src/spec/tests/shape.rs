//! Outline, tip, trailing edge, body and place.

use super::{near, only, planform, spec};
use crate::spec::{Body, Outline, Placing, Position, SurfaceKind, TipForm, TwistKind, TwistLaw};

/// A wing that is right; its last line is line 6.
const WING: &str = "span = 2000\nroot_chord = 300\ntip_chord = 200\n";

fn with(more: &str) -> String {
    format!("{}{more}", planform(WING))
}

#[test]
fn choices_are_what_they_say() {
    let plain = spec(&with(""));
    assert_eq!(
        (plain.outline, plain.surface, plain.tip, plain.body, plain.placing),
        (
            Outline::Trapezoid,
            SurfaceKind::Ruled,
            TipForm::Square,
            None,
            Placing::RootLeadingEdge([0.0; 3])
        )
    );
    assert_eq!(
        (
            plain.setting.twist_kind,
            plain.setting.twist_law,
            plain.setting.for_cruise,
            plain.trailing_edge_ratio
        ),
        (TwistKind::Geometric, TwistLaw::Straight, false, None)
    );
    let rich = spec(&with(
        "[setting]\nincidence = 2\ntwist_kind = \"aerodynamic\"\ntwist_law = \"linear\"\n[build]\nsurface = \"smooth\"\n\
         [tip]\nform = \"round\"\n[trailing_edge]\nthickness = 0.6\nproportion = \"0.3 %\"\n\
         [body]\nwidth = \"16 cm\"\nposition = \"high\"\ncarry_through = true\n[place]\nx = 800\ny = -1\nz = \"9 cm\"",
    ));
    assert_eq!((rich.surface, rich.tip), (SurfaceKind::Smooth, TipForm::Round));
    assert_eq!(
        (rich.setting.twist_kind, rich.setting.twist_law),
        (TwistKind::Aerodynamic, TwistLaw::Linear)
    );
    near(rich.setting.incidence.to_degrees(), 2.0, 1e-15);
    assert_eq!(rich.trailing_edge, Some(0.6));
    near(rich.trailing_edge_ratio.expect("a proportion"), 0.003, 1e-15);
    let body = Body {
        width: 160.0,
        position: Position::High,
        carry_through: true,
    };
    assert_eq!(
        (rich.body, rich.placing),
        (Some(body), Placing::RootLeadingEdge([800.0, -1.0, 90.0]))
    );
}

#[test]
fn ellipses_have_the_area_of_the_full_ellipse() {
    // S = π/4 b c_r: b = 2000, S = 500,000: c_r = 1000/π; at 99 % of the semispan sqrt(1 - 0.99²) of it
    for sizes in [
        "span = 2000\narea = 500000",
        "span = 2000\naspect_ratio = 8",
        "area = 500000\naspect_ratio = 8",
        "span = 2000\nroot_chord = 318.3098861837907",
        "aspect_ratio = 8\nmean_chord = 250",
    ] {
        let spec = spec(&planform(&format!("outline = \"ellipse\"\n{sizes}")));
        assert_eq!((spec.outline, spec.panels.len()), (Outline::Ellipse, 1));
        near(2.0 * spec.panels[0].span, 2000.0, 1e-12);
        near(spec.root_chord, 1000.0 / std::f64::consts::PI, 1e-12);
        near(
            spec.panels[0].tip_chord,
            spec.root_chord * 0.019_9_f64.sqrt(),
            1e-12,
        );
    }
    let loaded = "[load]\nmass = \"4.8 kg\"\nwing_loading = \"9.6 kg/m^2\"";
    let spec = spec(&format!(
        "{}\n{loaded}",
        planform("outline = \"ellipse\"\naspect_ratio = 8")
    ));
    near(spec.root_chord, 1000.0 / std::f64::consts::PI, 1e-12);
}

#[test]
fn ellipses_that_are_wrong() {
    for (lines, message) in [
        (
            "outline = \"ellipse\"\nspan = 2000\nroot_chord = 300\ntaper_ratio = 0.5",
            "wing.toml:7: planform.taper_ratio = 0.5: does not go with outline = \"ellipse\", of which the chord runs out at the \
             tip\n  Delete the line: an ellipse is settled by two of area, span, aspect_ratio and root_chord.",
        ),
        (
            "outline = \"ellipse\"\nspan = 2000\nroot_chord = 300\ntip_chord = 50",
            "wing.toml:7: planform.tip_chord = 50: does not go with outline = \"ellipse\", of which the chord runs out at the \
             tip\n  Delete the line: an ellipse is settled by two of area, span, aspect_ratio and root_chord.",
        ),
        (
            "outline = \"ellipse\"\nroot_chord = 300\n[[panel]]\nspan = 1000\ntip_chord = 200",
            "wing.toml:4: planform.outline = \"ellipse\": does not go with [[panel]]: panels are an outline of their own\n  \
             Delete this line, or the panels.",
        ),
        (
            "outline = \"ellipse\"\nspan = 2000",
            "wing.toml:3: planform: the planform is not settled: one more size is needed beside span\n  \
             Add area, aspect_ratio, mean_chord or root_chord to [planform].",
        ),
        (
            "outline = \"ellipse\"",
            "wing.toml:3: planform: the planform is not settled: two more sizes are needed\n  \
             Add to [planform], for example, span and root_chord.",
        ),
    ] {
        assert_eq!(only(&planform(lines)), message);
    }
    // π/4 · 2000 · 300 = 471,239 mm²
    let message = only(&planform(
        "outline = \"ellipse\"\nspan = 2000\nroot_chord = 300\narea = 500000",
    ));
    assert!(
        message.contains("span and root_chord make area 471239 mm^2, not 500000 mm^2"),
        "{message}"
    );
}

#[test]
fn bodies_and_places_that_are_wrong() {
    for (more, message) in [
        (
            "[body]\nwidth = 1700",
            "wing.toml:8: body.width = 1700: the body is 85 % as wide as the span of 2000 mm; allowed: at most 80 %\n  \
             Make the body narrower, or the span larger.",
        ),
        (
            "[body]\ncarry_through = true",
            "wing.toml:7: body: width is missing\n  Add width to [body].",
        ),
        (
            "[body]\nwidth = 160\ncarry_through = \"yes\"",
            "wing.toml:9: body.carry_through = \"yes\": true or false is expected\n  Write carry_through = true or carry_through = \
             false, without quotes.",
        ),
        (
            "[body]\nwidth = 160\nposition = \"top\"",
            "wing.toml:9: body.position = \"top\": not one of the words that this key knows\n  Write \"high\", \"mid\" or \"low\".",
        ),
        (
            "[place]\nz = 4\naerodynamic_centre = [820, 0, 95]",
            "wing.toml:8: place.z = 4: contradicts aerodynamic_centre = [820, 0, 95] (line 9): both say where the wing goes in z\n  \
             Delete one of the two.",
        ),
        (
            // y = b/6 (1 + 2λ)/(1 + λ) = 2000/6 · (7/3)/(5/3)
            "[place]\naerodynamic_centre = [820, 500, 95]",
            "wing.toml:8: place.aerodynamic_centre = [820, 500, 95]: y = 500 mm is not the wing's own: its aerodynamic centre lies at \
             y = 466.667 mm, and a place moves it in x and z\n  Write 0, the plane of symmetry, for y.",
        ),
        (
            "[place]\naerodynamic_centre = [820, 95]",
            "wing.toml:8: place.aerodynamic_centre = [820, 95]: a point is expected: three lengths, not 2\n  \
             Write it like aerodynamic_centre = [820, 0, 95].",
        ),
        (
            "[place]\naerodynamic_centre = 820",
            "wing.toml:8: place.aerodynamic_centre = 820: a point is expected: three lengths\n  \
             Write it like aerodynamic_centre = [820, 0, 95].",
        ),
        (
            "[place]\naerodynamic_centre = [820, 0, \"9 deg\"]",
            "wing.toml:8: place.aerodynamic_centre.2 = \"9 deg\": deg is the unit of an angle, and a length is expected\n  \
             Units that fit: um, mm, cm, dm, m, km, in or ft. Write it like \"300 mm\".",
        ),
        (
            "[place]\nx = \"1.1 km\"",
            "wing.toml:8: place.x = \"1.1 km\": out of range; allowed: -1000 m to 1000 m\n  Write a length in that range.",
        ),
        (
            "[trailing_edge]\nthickness = 0\nproportion = 0.003",
            "wing.toml:9: trailing_edge.proportion = 0.003: contradicts thickness = 0 (line 8), a sharp edge\n  Delete one of the two.",
        ),
        (
            "[trailing_edge]\nproportion = \"12 %\"",
            "wing.toml:8: trailing_edge.proportion = \"12 %\": out of range; allowed: more than 0, less than 10 %\n  \
             Write a ratio in that range.",
        ),
        (
            "[tip]\nform = \"raked\"",
            "wing.toml:8: tip.form = \"raked\": not one of the words that this key knows\n  Write \"square\" or \"round\".",
        ),
    ] {
        assert_eq!(only(&with(more)), message);
    }
    let fin = with("[body]\nwidth = 100").replace("span = ", "dihedral = 90\nspan = ");
    assert!(only(&fin).contains("a fin starts at its root"), "{}", only(&fin));
}

#[test]
fn the_aerodynamic_centre_goes_where_it_is_asked() {
    for (place, y) in [
        ("[820, 0, 95]", 0.0),
        ("[820, 466.7, 95]", 466.7),
        ("[820, -466.6, 95]", -466.6),
    ] {
        let found = spec(&with(&format!("[place]\naerodynamic_centre = {place}"))).placing;
        assert_eq!(found, Placing::AerodynamicCentre([820.0, y, 95.0]));
    }
    // three stations y = (0, 2, 6) m, c = (3, 2, 1) m: 82/33 m (exact, by hand)
    let cranked = "unit = \"m\"\n[airfoil]\nroot = \"NACA 0012\"\n[planform]\nroot_chord = 3\n[place]\naerodynamic_centre = [9, 2.4848, 0]\n\
                   [[panel]]\nspan = 2\ntip_chord = 2\n[[panel]]\nspan = 4\ntip_chord = 1\n";
    assert!(matches!(spec(cranked).placing, Placing::AerodynamicCentre(_)));
    assert!(only(&cranked.replace("2.4848", "2.3")).contains("lies at y = 2.48485 m"));
    // an ellipse: 4/(3π) of the semispan
    let ellipse =
        "outline = \"ellipse\"\nspan = 2000\narea = 500000\n[place]\naerodynamic_centre = [9, 1, 0]";
    assert!(only(&planform(ellipse)).contains("lies at y = 424.413 mm"));
    // steep panels have it at their own y: 466.667 of the span in the reference plane, along a panel of 60°
    let steep = with("dihedral = 60\n[place]\naerodynamic_centre = [9, 466.7, 0]");
    assert!(matches!(spec(&steep).placing, Placing::AerodynamicCentre(_)));
}
