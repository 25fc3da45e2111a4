//! Figures of sections against closed forms, published values and each other.

use crate::airfoil::{Closing, Section, coordinates, parse};

fn section(text: &str) -> Section {
    Section::from_formula(text, parse(text).unwrap()).unwrap()
}

fn closed(text: &str, closing: Closing) -> Section {
    let mut formula = parse(text).unwrap();
    formula.thickness.closing = closing;
    Section::from_formula(text, formula).unwrap()
}

#[track_caller]
fn near(what: &str, found: f64, known: f64, allowed: f64) {
    assert!((found - known).abs() <= allowed, "{what}: {found}, known {known}");
}

#[test]
fn zero_lift_angle_moment_and_ideal_lift_are_those_of_thin_aerofoil_theory() {
    // zero-lift angle in degrees, moment, ideal lift: Glauert's integrals worked out apart from this program
    for (name, angle, moment, lift) in [
        ("1412", -1.03862, -0.02656, 0.12801),
        ("2412", -2.07724, -0.05312, 0.25602),
        ("4412", -4.15448, -0.10624, 0.51205),
        ("6409", -6.23172, -0.15936, 0.76807),
        ("21012", -0.62569, -0.00382, 0.3084),
        ("22012", -0.8823, -0.00808, 0.30188),
        ("23012", -1.09359, -0.01284, 0.30004),
        ("24012", -1.29161, -0.01825, 0.30008),
        ("25012", -1.48281, -0.02438, 0.30004),
        ("22112", -0.71502, -0.00134, 0.30499),
        ("23112", -0.75395, 0.00113, 0.30187),
        ("24112", -0.85301, 0.00006, 0.3006),
        ("25112", -0.90298, 0.0001, 0.30146),
    ] {
        let figures = section(name).figures();
        near(name, figures.zero_lift_angle.to_degrees(), angle, 6e-6);
        near(name, figures.quarter_chord_moment, moment, 6e-6);
        near(name, figures.ideal_lift, lift, 6e-6);
    }
    let figures = section("0015").figures();
    near("0015", figures.zero_lift_angle, 0.0, 1e-15);
    near("0015", figures.quarter_chord_moment, 0.0, 1e-15);
}

#[test]
fn areas_of_symmetric_sections_are_the_closed_form() {
    // 10 (2 a0/3 + a1/2 + a2/3 + a3/4 + a4/5) t
    for (text, t) in [("0006", 0.06), ("0012", 0.12), ("0030", 0.30)] {
        near(text, section(text).figures().area, 0.685_083_333_333 * t, 1e-12);
        let area = closed(text, Closing::Coefficient).figures().area;
        near(text, area, 0.680_883_333_333 * t, 1e-12);
    }
}

#[test]
fn areas_centroids_and_perimeters_are_those_of_fine_polygons() {
    // polygons of 40000 points, worked out apart from this program
    for (text, open, shut) in [
        ("0012", 0.08221, 0.081706),
        ("2412", 0.0822821, 0.0817774),
        ("4412", 0.0824974, 0.0819909),
        ("23012", 0.0823136, 0.0818094),
        ("23112", 0.0823507, 0.0818466),
    ] {
        near(text, section(text).figures().area, open, 1e-7);
        near(
            text,
            closed(text, Closing::Coefficient).figures().area,
            shut,
            1e-7,
        );
    }
    for (text, x, y, perimeter) in [
        ("0012", 0.420435, 0.0, 2.039272),
        ("2412", 0.420309, 0.015586, 2.041402),
        ("4412", 0.419934, 0.031141, 2.047766),
        ("23012", 0.420036, 0.012178, 2.042574),
    ] {
        let figures = section(text).figures();
        near(text, figures.centroid[0], x, 1e-6);
        near(text, figures.centroid[1], y, 1e-6);
        near(text, figures.perimeter, perimeter, 1e-6);
    }
}

#[test]
fn thickness_nose_radius_and_trailing_edge_follow_the_polynomial() {
    let figures = section("0012").figures();
    near("thickness", figures.thickness.value, 1.000_288 * 0.12, 1e-7);
    near("its place", figures.thickness.x, 0.299_828, 1e-6);
    // a0²/2/0.04 t² = 1.10187 t²
    near(
        "nose",
        figures.nose_radius,
        0.2969_f64.powi(2) / 0.08 * 0.0144,
        1e-12,
    );
    near("base", figures.base, 0.021 * 0.12, 1e-15);
    // slope of the half thickness at x = 1: t/0.2 (a0/2 + a1 + 2 a2 + 3 a3 + 4 a4)
    let slope: f64 = 0.6 * (0.14845 - 0.1260 - 0.7032 + 0.8529 - 0.4060);
    near("angle", figures.trailing_angle, 2.0 * (-slope).atan(), 1e-12);
    // the extended section: its thickness over its own chord, NASA Turbulence Modeling Resource, naca0012_val
    let extended = closed("0012", Closing::Extension).figures();
    near("extended", extended.thickness.value, 0.118_972, 1e-6);
    near("its base", extended.base, 0.0, 1e-14);
    // printed radii, per cent, up to 0.02 low: NACA Report 824, appendix I, from memory
    for (text, percent) in [
        ("0006", 0.40),
        ("0009", 0.89),
        ("0015", 2.48),
        ("0018", 3.56),
        ("0024", 6.33),
    ] {
        let radius = 100.0 * section(text).figures().nose_radius;
        near(text, radius, percent, 0.02);
    }
    let figures = section("23012").figures();
    near("camber", figures.camber.value, 0.018_386, 1e-6);
    near("its place", figures.camber.x, 0.1499, 1e-4);
}

#[test]
fn a_file_sampled_from_a_formula_has_the_figures_of_the_formula() {
    for text in [
        "0012", "2412", "4412", "23012", "23112", "2412-63", "0009", "6409", "4418",
    ] {
        let exact = section(text);
        let outline = exact.points(161);
        let file = coordinates::write_loop(text, &outline.points, 7);
        let contour = coordinates::read(file.as_bytes(), text).unwrap();
        let read = Section::from_contour(text, &contour).unwrap();
        let (known, found) = (exact.figures(), read.figures());
        near(text, found.area, known.area, 1e-5);
        near(text, found.perimeter, known.perimeter, 1e-5);
        near(text, found.thickness.value, known.thickness.value, 1e-5);
        near(
            text,
            found.zero_lift_angle.to_degrees(),
            known.zero_lift_angle.to_degrees(),
            0.02,
        );
        near(text, found.quarter_chord_moment, known.quarter_chord_moment, 1e-4);
    }
}

#[test]
fn points_are_as_many_as_asked_and_on_the_section() {
    let section = section("2412");
    for count in [13, 14, 81, 160] {
        let outline = section.points(count);
        assert_eq!(outline.points.len(), count);
        assert_eq!(outline.points[outline.nose].map(f64::to_bits), [0, 0]);
        for (i, [x, y]) in outline.points.iter().enumerate() {
            let side = if i <= outline.nose {
                &section.upper
            } else {
                &section.lower
            };
            if *x > 1e-3 {
                near("y", *y, side.y_at(*x), 1e-12);
            }
        }
    }
}

#[test]
fn the_nose_circle_and_the_curvature_fit_the_contour() {
    for text in ["0012", "2412", "23012"] {
        let section = section(text);
        let (centre, radius) = section.nose_circle();
        near(text, centre[0].hypot(centre[1]), radius, 1e-12);
        near(text, radius, section.figures().nose_radius, 1e-15);
        assert!(centre[0] > 0.9 * radius);
        let curvature = section.curvature(50);
        assert!(curvature.len() >= 100);
        // the radius at the nose, nearly, and outwards away from the inside
        let most = curvature.iter().map(|c| c.value).fold(0.0, f64::max);
        assert!((most * radius - 1.0).abs() < 0.2, "{text}: {most} {radius}");
        assert!(curvature[0].outwards[1] > 0.9 && curvature[curvature.len() - 1].outwards[1] < -0.9);
    }
}
