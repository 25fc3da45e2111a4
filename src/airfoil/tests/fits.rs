//! How many control points the fit takes, and how close it is.

use crate::airfoil::{Error, Profiles, Section, TOLERANCE, coordinates, fit, parse};

fn section(text: &str) -> Section {
    Section::from_formula(text, parse(text).unwrap()).unwrap()
}

/// Fits sections together and measures the deviation again, at other parameters and square to the section.
#[track_caller]
fn fitted(sections: &[&Section]) -> Profiles {
    let profiles = fit(sections, TOLERANCE).unwrap();
    assert!(profiles.deviation <= TOLERANCE);
    for (section, profile) in sections.iter().zip(&profiles.profiles) {
        let sides = [
            (&section.upper, &profiles.upper, &profile.upper),
            (&section.lower, &profiles.lower, &profile.lower),
        ];
        for (side, knots, points) in sides {
            for i in 0..=1777 {
                let s = f64::from(i) / 1777.0;
                let (first, basis) = knots.basis(s);
                let at = |k: usize| -> f64 { (0..=5).map(|i| basis[i] * points[first + i][k]).sum() };
                assert!((at(0) - side.x(s)).abs() < 1e-14, "{}", section.name);
                assert!((at(1) - side.y(s)).abs() <= TOLERANCE, "{} at {s}", section.name);
            }
        }
    }
    profiles
}

fn counts(text: &str) -> usize {
    let section = section(text);
    let profiles = fitted(&[&section]);
    profiles.upper.count().max(profiles.lower.count())
}

#[test]
fn symmetric_4_digit_sections_take_at_most_14_control_points_a_side() {
    for text in [
        "0001", "0006", "0009", "0012", "0015", "0018", "0021", "0024", "0030", "0040",
    ] {
        assert!(counts(text) <= 14, "{text}");
    }
}

#[test]
fn sections_of_up_to_4_percent_camber_take_at_most_26() {
    for text in [
        "1106", "1408", "2106", "2412", "2415", "2421", "2901", "3312", "4212", "4412", "4418", "4706",
        "4430", "23012", "23018", "23112", "21012", "22012", "24112", "25012", "43018", "2412-63", "4412-34",
        "23012-64",
    ] {
        assert!(counts(text) <= 26, "{text}");
    }
}

#[test]
fn any_section_takes_at_most_40() {
    for text in [
        "6409", "6106", "9315", "9440", "9130", "9512", "9606", "6712", "63012", "93012", "91012", "0012-93",
        "16-012", "0012-14", "9412-36",
    ] {
        let Ok(section) = Section::from_formula(text, parse(text).unwrap()) else {
            continue;
        };
        let profiles = fitted(&[&section]);
        assert!(profiles.upper.count().max(profiles.lower.count()) <= 40, "{text}");
    }
}

#[test]
fn sections_fitted_together_share_knots() {
    let sections = ["2415", "2412", "23012"].map(section);
    let profiles = fitted(&[&sections[0], &sections[1], &sections[2]]);
    assert!(profiles.upper.count().max(profiles.lower.count()) <= 26);
    for profile in &profiles.profiles {
        assert_eq!(profile.upper.len(), profiles.upper.count());
        assert_eq!(profile.lower.len(), profiles.lower.count());
    }
}

#[test]
fn both_sides_have_one_slope_and_curvature_at_the_nose() {
    for text in ["0012", "2412", "4412", "23012", "0012-34"] {
        let section = section(text);
        let profiles = fit(&[&section], TOLERANCE).unwrap();
        let at = |knots: &crate::spline::Knots, points: &[[f64; 2]]| {
            let d = knots.derivatives(0.0);
            let sum = |row: usize, k: usize| -> f64 { (0..=5).map(|i| d.rows[row][i] * points[i][k]).sum() };
            let (x, y, a, b) = (sum(1, 0), sum(1, 1), sum(2, 0), sum(2, 1));
            (y.atan2(x), (x * b - y * a) / x.hypot(y).powi(3))
        };
        let profile = &profiles.profiles[0];
        let (upper, lower) = (
            at(&profiles.upper, &profile.upper),
            at(&profiles.lower, &profile.lower),
        );
        let turn = upper.0 - lower.0 - std::f64::consts::PI;
        assert!(turn.abs() < 1e-9, "{text}: {turn}");
        // the path of the lower side runs the other way round the nose
        assert!(
            (upper.1 / lower.1 + 1.0).abs() < 1e-6,
            "{text}: {} {}",
            upper.1,
            lower.1
        );
    }
}

#[test]
fn a_corner_is_refused_with_its_place() {
    let error = fit(&[&section("9912")], TOLERANCE).unwrap_err();
    assert!(
        matches!(&error, Error::Corner { percent, .. } if (percent - 90.0).abs() < 1e-9),
        "{error}"
    );
}

#[test]
fn own_coordinate_files_are_fitted_closely() {
    for entry in std::fs::read_dir("airfoils").unwrap() {
        let path = entry.unwrap().path();
        let contour = coordinates::read(&std::fs::read(&path).unwrap(), "file").unwrap();
        let section = Section::from_contour("file", &contour).unwrap();
        let profiles = fitted(&[&section]);
        assert!(section.deviation <= TOLERANCE);
        assert!(profiles.upper.count().max(profiles.lower.count()) <= 14);
    }
}
