//! Waviness and fairing.

use crate::airfoil::{Section, TOLERANCE, coordinates, fit, parse};

fn formula(text: &str) -> Section {
    Section::from_formula(text, parse(text).unwrap()).unwrap()
}

/// A section of points: a formula's, each moved up and down in turn by `size`.
fn rough(text: &str, size: f64) -> coordinates::Contour {
    let outline = formula(text).points(121);
    let points: Vec<[f64; 2]> = (outline.points.iter().enumerate())
        .map(|(i, [x, y])| {
            let turn = [0.0, 1.0, -0.6, 0.3, -1.0, 0.7][i * i % 6];
            [
                *x,
                y + if i.abs_diff(60) > 8 && (2..119).contains(&i) {
                    turn * size
                } else {
                    0.0
                },
            ]
        })
        .collect();
    coordinates::read(coordinates::write_loop(text, &points, 7).as_bytes(), text).unwrap()
}

#[test]
fn formulas_and_own_files_are_not_wavy() {
    for text in [
        "0012", "2412", "4412", "23012", "23112", "0012-64", "2412-63", "6409",
    ] {
        let waviness = formula(text).waviness();
        assert_eq!(waviness.excess(), 0, "{text}: {waviness:?}");
    }
    for text in ["0012", "2412", "4412", "23012", "23112-64", "6409"] {
        let section = Section::from_contour(text, &rough(text, 0.0)).unwrap();
        assert_eq!(
            section.waviness().excess(),
            0,
            "file of {text}: {:?}",
            section.waviness()
        );
    }
    for name in ["fell-113", "moor-135", "skerry-100"] {
        let bytes = std::fs::read(format!("airfoils/{name}.dat")).unwrap();
        let section = Section::from_contour(name, &coordinates::read(&bytes, name).unwrap()).unwrap();
        assert_eq!(section.waviness().excess(), 0, "{name}: {:?}", section.waviness());
    }
}

#[test]
fn a_rough_file_is_wavy_and_fairing_smooths_it_within_its_bound() {
    let contour = rough("2412", 8e-5);
    let as_given = Section::from_contour("rough", &contour);
    let faired = Section::faired("rough", &contour, 2e-4).unwrap();
    assert!(faired.deviation <= 2e-4 && faired.deviation > 2e-5);
    assert_eq!(faired.waviness().excess(), 0);
    let waviness = as_given.unwrap().waviness();
    assert!(waviness.excess() > 40);
    let (a, b) = (faired.figures(), formula("2412").figures());
    assert!((a.area - b.area).abs() < 2e-4 && (a.zero_lift_angle - b.zero_lift_angle).abs() < 2e-3);
    assert!(fit(&[&faired], TOLERANCE).is_ok());
}

#[test]
fn a_file_that_no_smooth_curve_passes_is_refused_and_can_be_faired() {
    let mut contour = rough("0012", 0.0);
    contour.points[30][1] += 1e-3;
    assert!(
        Section::from_contour("bump", &contour).is_err() || {
            Section::from_contour("bump", &contour)
                .unwrap()
                .waviness()
                .excess()
                > 0
        }
    );
    assert!(Section::faired("bump", &contour, 2e-3).is_ok());
}
