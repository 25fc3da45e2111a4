//! Closed forms and published wings. Each value names where it was read, or says that it was computed or recalled.

use crate::figures::{Figures, assert_near, assert_relative, loft};
use crate::python::outside;
use crate::workdir::WorkDir;

/// Area of a sharp 4-digit section over t c²: 10 (2 a0/3 + a1/2 + a2/3 + a3/4 + a4/5) with a4 = -0.1036; exact, computed.
const SHARP: f64 = 0.680_883_333_333_333_3;
/// The same for the section as published, with its base: a4 = -0.1015; exact, computed.
const OPEN: f64 = 0.685_083_333_333_333_3;

/// A straight tapered wing without twist or incidence, in metres.
fn tapered(span: f64, root: f64, tip: f64, sweep: f64, sides: &str, trailing_edge: &str) -> Figures {
    let spec = format!(
        "name = \"tapered\"\nunit = \"m\"\n[planform]\nspan = {span}\nroot_chord = {root}\ntip_chord = {tip}\n\
         sweep = {sweep}\n[airfoil]\nroot = \"NACA 0012\"\n{trailing_edge}\n[build]\nsides = \"{sides}\"\n\
         [facets]\ntolerance = \"1 mm\"\n"
    );
    loft(&WorkDir::new(), &spec)
}

const SHARP_EDGE: &str = "[trailing_edge]\nthickness = 0";

/// Slope angle \[deg\] of the line at a chord fraction, from the root and the MAC of the figures (no twist, no incidence).
fn sweep_at(fraction: f64, root_chord: f64, figures: &Figures) -> f64 {
    let x = figures.number("reference.mac.x_le")
        + fraction * (figures.number("reference.mac.length") - root_chord);
    (x / figures.number("reference.mac.y")).atan().to_degrees()
}

#[test]
fn a_straight_tapered_wing_has_the_volume_of_a_frustum() {
    // V = k t b c_r² (1 + λ + λ²) / 3, exact for a ruled loft of similar sections; k as above
    for (span, root, taper, sweep) in [
        (8.0, 1.0, 0.5, 0.0),
        (2.6, 0.38, 0.45, 3.0),
        (10.0, 2.0, 1.0, 35.0),
    ] {
        let whole = 0.12 * span * root * root * (1.0 + taper + taper * taper) / 3.0;
        let sharp = tapered(span, root, root * taper, sweep, "both", SHARP_EDGE);
        assert_relative("volume, sharp", sharp.number("built.volume"), SHARP * whole, 1e-6);
        let open = tapered(span, root, root * taper, sweep, "both", "");
        assert_relative(
            "volume, as published",
            open.number("built.volume"),
            OPEN * whole,
            1e-6,
        );
        let half = tapered(span, root, root * taper, sweep, "starboard", SHARP_EDGE);
        assert_relative(
            "volume of a half",
            half.number("built.volume"),
            SHARP * whole / 2.0,
            1e-6,
        );
        let pair = tapered(span, root, root * taper, sweep, "pair", SHARP_EDGE);
        assert_relative(
            "volume of a pair",
            pair.number("built.volume"),
            SHARP * whole,
            1e-6,
        );
    }
}

#[test]
fn the_centroid_of_a_half_wing_lies_where_the_closed_form_puts_it() {
    // y = (s/4) (1 + 2λ + 3λ²) / (1 + λ + λ²): exact, computed
    let (semispan, taper) = (4.0, 0.4);
    let y = semispan / 4.0 * (1.0 + 2.0 * taper + 3.0 * taper * taper) / (1.0 + taper + taper * taper);
    let starboard = tapered(2.0 * semispan, 1.5, 1.5 * taper, 20.0, "starboard", SHARP_EDGE);
    assert_relative("y of the centroid", starboard.number("built.centroid.1"), y, 1e-6);
    let port = tapered(2.0 * semispan, 1.5, 1.5 * taper, 20.0, "port", SHARP_EDGE);
    assert_relative(
        "y of the centroid, port",
        port.number("built.centroid.1"),
        -y,
        1e-6,
    );
    let both = tapered(2.0 * semispan, 1.5, 1.5 * taper, 20.0, "both", SHARP_EDGE);
    assert_near(
        "y of the centroid, both",
        both.number("built.centroid.1"),
        0.0,
        1e-9,
    );
}

#[test]
fn a_published_volume_ratio_of_two_trailing_edges_is_met() {
    // S = 10, A = 8, taper 0.5, t = 0.12: 0.9531778 with the base, 0.9473342 sharp; computed from the closed form
    let root = 2.0 * 10.0 / (80.0_f64.sqrt() * 1.5);
    let open = tapered(80.0_f64.sqrt(), root, root / 2.0, 0.0, "both", "");
    assert_near(
        "volume with the base [m3]",
        open.number("built.volume"),
        0.953_177_8,
        1e-6,
    );
    let sharp = tapered(80.0_f64.sqrt(), root, root / 2.0, 0.0, "both", SHARP_EDGE);
    assert_near(
        "volume, sharp [m3]",
        sharp.number("built.volume"),
        0.947_334_2,
        1e-6,
    );
}

#[test]
fn between_unlike_sections_the_thickness_is_linear_along_the_span() {
    // 15 % at the root to 12 % at the tip, S = 10, A = 8, taper 0.5, as published: 1.1233881 m³ where the thickness is
    // linear, 1.0978566 m³ where the ratio is; exact integrals, computed
    let spec = "name = \"unlike\"\nunit = \"m\"\n[planform]\narea = 10\naspect_ratio = 8\ntaper_ratio = 0.5\n\
                [airfoil]\nroot = \"NACA 0015\"\ntip = \"NACA 0012\"\n[build]\nsides = \"both\"\n\
                [facets]\ntolerance = \"1 mm\"\n";
    let figures = loft(&WorkDir::new(), spec);
    assert_near("volume [m3]", figures.number("built.volume"), 1.123_388_1, 1e-6);
}

#[test]
fn a_wing_of_three_stations_has_the_mac_of_the_exact_integration() {
    // y = (0, 2, 6), c = (3, 2, 1), x of the leading edge = (0, 1, 3): half area 11, MAC 2, at y = 82/33, x = 41/33; by hand
    let sweep = 0.5_f64.atan().to_degrees();
    let spec = format!(
        "name = \"three stations\"\nunit = \"m\"\n[planform]\nroot_chord = 3\nsweep_at = 0\n[airfoil]\nroot = \"NACA 0012\"\n\
         [trailing_edge]\nthickness = 0\n[build]\nsides = \"starboard\"\n[facets]\ntolerance = \"1 mm\"\n\
         [[panel]]\nspan = 2\ntip_chord = 2\nsweep = {sweep}\n[[panel]]\nspan = 4\ntip_chord = 1\nsweep = {sweep}\n"
    );
    let figures = loft(&WorkDir::new(), &spec);
    assert_relative("area", figures.number("reference.area"), 22.0, 1e-9);
    assert_relative("span", figures.number("reference.span"), 12.0, 1e-9);
    assert_relative("MAC", figures.number("reference.mac.length"), 2.0, 1e-9);
    assert_relative(
        "y of the MAC",
        figures.number("reference.mac.y"),
        82.0 / 33.0,
        1e-9,
    );
    assert_relative(
        "x of the MAC",
        figures.number("reference.mac.x_le"),
        41.0 / 33.0,
        1e-9,
    );
    // two frusta
    let frusta = 2.0 * (9.0 + 6.0 + 4.0) / 3.0 + 4.0 * (4.0 + 2.0 + 1.0) / 3.0;
    assert_relative(
        "volume",
        figures.number("built.volume"),
        SHARP * 0.12 * frusta,
        1e-6,
    );
}

#[test]
fn the_onera_m6_wing_has_its_printed_figures() {
    // AGARD AR-138, section B1 (Schmitt and Charpin 1979): aspect ratio 3.8, taper 0.562, semispan 1.1963 m, leading edge
    // 30°; MAC 0.64607 m, half area 0.7532 m², trailing edge 15.8°
    let spec = "name = \"M6\"\nunit = \"m\"\n[planform]\naspect_ratio = 3.8\ntaper_ratio = 0.562\nspan = 2.3926\n\
                sweep = 30\nsweep_at = 0\n[airfoil]\nroot = \"NACA 0010\"\n[build]\nsides = \"starboard\"\n";
    let figures = loft(&WorkDir::new(), spec);
    // the exact consequence of the four inputs
    let mean = 2.3926 / 3.8;
    let mac = mean * 4.0 / 3.0 * (1.0 + 0.562 + 0.562_f64.powi(2)) / 1.562_f64.powi(2);
    assert_relative(
        "MAC by formula",
        figures.number("reference.mac.length"),
        mac,
        1e-9,
    );
    // the print's rounding: taper to 0.0005 moves the MAC by 8e-5 of itself, aspect ratio to 4e-4 (3.8 for 3.8002 and the
    // like) by more; the printed half area is to 5e-5
    assert_near("MAC [m]", figures.number("reference.mac.length"), 0.646_07, 1e-4);
    assert_near(
        "half area [m2]",
        figures.number("reference.area") / 2.0,
        0.7532,
        5e-5,
    );
    let root = figures.number("reference.root_chord");
    assert_near("leading edge [deg]", sweep_at(0.0, root, &figures), 30.0, 1e-9);
    assert_near("trailing edge [deg]", sweep_at(1.0, root, &figures), 15.8, 0.05);
}

#[test]
fn the_agard_b_wing_has_its_printed_figures() {
    // AGARD Memorandum AG-4/M3 (1955): in body diameters S = 4√3, b = 4, c_r = 2√3, MAC = 4√3/3, leading edge 60°. The delta
    // runs out in a point; here the tip has a chord of 1/1000 diameter, which adds that part of 2 b to the area.
    let root3 = 3.0_f64.sqrt();
    let spec = format!(
        "name = \"AGARD-B\"\nunit = \"mm\"\n[planform]\nspan = 4000\nroot_chord = {}\ntip_chord = 1\nsweep = 60\n\
         sweep_at = 0\n[airfoil]\nroot = \"NACA 0004\"\n[trailing_edge]\nthickness = 0\n[build]\nsides = \"both\"\n",
        2000.0 * root3
    );
    let figures = loft(&WorkDir::new(), &spec);
    let area = figures.number("reference.area") / 1e6;
    assert_relative("area [D2]", area, 4.0 * root3 + 0.5 * 4.0 * 1e-3, 1e-9);
    // MAC (2/3) c_r (1 + λ + λ²)/(1 + λ): λ = 2.9e-4 adds λ²
    let mac = figures.number("reference.mac.length") / 1000.0;
    assert_relative("MAC [D]", mac, 4.0 * root3 / 3.0, 1e-7);
}

#[test]
fn the_agard_445_6_wing_has_the_listed_sweep_at_mid_chord() {
    // NASA TM-100492 (Yates), figure 1: semispan 2.5 ft, root 1.833 ft, tip 1.208 ft, quarter chord 45°; mid-chord 43.15°
    let spec = "name = \"445.6\"\nunit = \"ft\"\n[planform]\nspan = 5\nroot_chord = 1.833\ntip_chord = 1.208\nsweep = 45\n\
                [airfoil]\nroot = \"NACA 0004\"\n[build]\nsides = \"starboard\"\n";
    let figures = loft(&WorkDir::new(), spec);
    assert_near(
        "mid-chord line [deg]",
        sweep_at(0.5, 1.833, &figures),
        43.15,
        0.005,
    );
    assert_near(
        "quarter-chord line [deg]",
        sweep_at(0.25, 1.833, &figures),
        45.0,
        1e-9,
    );
}

#[test]
fn a_worked_trapezoid_has_its_figures() {
    // S = 20 m², A = 8, taper 0.6, mid-chord unswept; computed from the plain formulas, six figures
    let spec = "name = \"worked\"\nunit = \"m\"\n[planform]\narea = 20\naspect_ratio = 8\ntaper_ratio = 0.6\nsweep = 0\n\
                sweep_at = 0.5\n[airfoil]\nroot = \"NACA 2412\"\n[build]\nsides = \"starboard\"\n[facets]\ntolerance = \"1 mm\"\n";
    let figures = loft(&WorkDir::new(), spec);
    let near = |key: &str, wanted: f64, tolerance: f64| {
        assert_near(
            key,
            figures.number(&format!("reference.{key}")),
            wanted,
            tolerance,
        );
    };
    near("span", 12.6491, 5e-5);
    near("root_chord", 1.97642, 5e-6);
    near("tip_chord", 1.18585, 5e-6);
    near("mac.length", 1.61408, 5e-6);
    near("mac.y", 2.89875, 5e-6);
    assert_near(
        "leading edge [deg]",
        sweep_at(0.0, figures.number("reference.root_chord"), &figures),
        3.576_33,
        5e-6,
    );
    assert_near(
        "trailing edge [deg]",
        sweep_at(1.0, figures.number("reference.root_chord"), &figures),
        -3.576_33,
        5e-6,
    );
}

#[test]
fn sections_have_their_computed_areas() {
    // Areas over c², thickness laid off perpendicular to the camber line: computed from polygons of 40 000 points, as
    // published and with the sharp trailing edge (a4 = -0.1036); seven decimals
    let areas = [
        ("NACA 0012", 0.082_21, 0.081_706),
        ("NACA 2412", 0.082_282_1, 0.081_777_4),
        ("NACA 4412", 0.082_497_4, 0.081_990_9),
        ("NACA 23012", 0.082_313_6, 0.081_809_4),
        ("NACA 23112", 0.082_350_7, 0.081_846_6),
    ];
    for (section, open, sharp) in areas {
        for (edge, area) in [("", open), (SHARP_EDGE, sharp)] {
            // a straight wing of chord 1 and semispan 1: its volume is the section's area
            let spec = format!(
                "name = \"straight\"\nunit = \"m\"\n[planform]\nspan = 2\nroot_chord = 1\ntip_chord = 1\n\
                 [airfoil]\nroot = \"{section}\"\n{edge}\n[build]\nsides = \"starboard\"\n[facets]\ntolerance = \"1 mm\"\n"
            );
            let figures = loft(&WorkDir::new(), &spec);
            // the print's half unit and a fit within 1e-6 of the chord on both sides
            assert_near(
                &format!("{section} {edge}"),
                figures.number("built.volume"),
                area,
                5e-7,
            );
            assert!(
                figures.number("section_fit.max_deviation") <= 1e-6,
                "{section}: fitted within 1e-6 of the chord"
            );
        }
    }
}

#[test]
fn twist_follows_the_chords_in_a_ruled_panel_as_open_cascade_cuts_it() {
    // tan θ = η c_t sin θ_t / ((1-η) c_r + η c_t cos θ_t) relative to the root: taper 0.5, tip -2°: -1.2000° at η = 0.75, not
    // -1.5°; geometry, computed
    let directory = WorkDir::new();
    let spec = "name = \"twisted\"\nunit = \"mm\"\n[planform]\nspan = 4000\nroot_chord = 1000\ntip_chord = 500\nsweep = 10\n\
                [setting]\ntwist = -2\nincidence = 0\nat = \"root\"\n[airfoil]\nroot = \"NACA 0012\"\n[trailing_edge]\n\
                thickness = 0\n[build]\nsides = \"starboard\"\n";
    loft(&directory, spec);
    let step = directory.join("out").join("wing.step");
    let positions = [500.0, 1000.0, 1500.0];
    let mut arguments = vec![step.into_os_string(), "y".into()];
    arguments.extend(positions.map(|y: f64| y.to_string().into()));
    let cuts = outside("section_slice.py", &arguments).list("");
    assert_eq!(cuts.len(), positions.len());
    let tip = (-2.0_f64).to_radians();
    for (cut, y) in cuts.iter().zip(positions) {
        let eta = y / 2000.0;
        let (along, down) = (
            (1.0 - eta) * 1000.0 + eta * 500.0 * tip.cos(),
            eta * 500.0 * tip.sin(),
        );
        assert_near("position [mm]", cut.number("position"), y, 0.0);
        assert_near(
            "incidence [deg]",
            cut.number("incidence"),
            down.atan2(along).to_degrees(),
            1e-6,
        );
        assert_near("chord [mm]", cut.number("chord"), along.hypot(down), 1e-5);
        assert_near("base [mm]", cut.number("base"), 0.0, 1e-6);
        // the quarter-chord point stays on the line of the planform, x = 250 + y tan 10°
        let nose = cut.point("leading_edge");
        let tail = cut.point("trailing_edge");
        let quarter = nose[0] + 0.25 * (tail[0] - nose[0]);
        assert_near(
            "quarter chord [mm]",
            quarter,
            250.0 + y * 10.0_f64.to_radians().tan(),
            1e-5,
        );
    }
}

#[test]
fn open_cascade_cuts_a_section_of_the_thickness_and_base_asked_for() {
    // NACA 2412, straight wing of chord 1000 mm: 12 % thick as published (the form's own maximum is 1.000288 t, computed),
    // 2 % camber at 40 % (NACA Report 460); the base is set to 3 mm
    let directory = WorkDir::new();
    let spec = "name = \"straight\"\nunit = \"mm\"\n[planform]\nspan = 2000\nroot_chord = 1000\ntip_chord = 1000\n\
                [airfoil]\nroot = \"NACA 2412\"\n[trailing_edge]\nthickness = 3\n[build]\nsides = \"starboard\"\n";
    loft(&directory, spec);
    let step = directory.join("out").join("wing.step");
    let cut = outside(
        "section_slice.py",
        &[step.as_os_str(), "y".as_ref(), "400".as_ref()],
    )
    .list("")
    .remove(0);
    assert_near("chord [mm]", cut.number("chord"), 1000.0, 1e-5);
    assert_near("incidence [deg]", cut.number("incidence"), 0.0, 1e-6);
    assert_near("base [mm]", cut.number("base"), 3.0, 1e-4);
    // 1.000288 x 120 mm (the form's own maximum) + 0.3 x 0.48 mm (the base opened from 2.52 to 3 mm in proportion to x) +
    // what cutting upright adds where the mean line rises by 2 m (p - x)/p² = 0.025: 120 mm x 0.025²/2 (computed)
    assert_near(
        "thickness [mm]",
        cut.number("thickness"),
        120.035 + 0.144 + 0.037,
        0.01,
    );
    assert_near("camber [mm]", cut.number("camber"), 20.0, 0.05);
    assert_near("position of the camber [-]", cut.number("camber_at"), 0.4, 0.02);
}
