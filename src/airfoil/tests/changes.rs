//! Changed sections have what was asked for.

use crate::airfoil::{Camber, Changes, Closing, Section, coordinates, parse};

fn formula(text: &str) -> Section {
    Section::from_formula(text, parse(text).unwrap()).unwrap()
}

/// A section of points, sampled from a formula.
fn file(text: &str) -> Section {
    let outline = formula(text).points(161);
    let written = coordinates::write_loop(text, &outline.points, 8);
    let contour = coordinates::read(written.as_bytes(), text).unwrap();
    Section::from_contour(text, &contour).unwrap()
}

fn own(name: &str) -> Section {
    let bytes = std::fs::read(format!("airfoils/{name}.dat")).unwrap();
    Section::from_contour(name, &coordinates::read(&bytes, name).unwrap()).unwrap()
}

#[track_caller]
fn near(what: &str, found: f64, known: f64, allowed: f64) {
    assert!((found - known).abs() <= allowed, "{what}: {found}, known {known}");
}

#[test]
fn a_formula_is_changed_in_its_constants() {
    let changes = Changes {
        thickness: Some(0.105),
        camber: Some(0.03),
        ..Changes::default()
    };
    let changed = formula("2412").with(&changes).unwrap();
    let formula_of = changed.formula().unwrap();
    near("ratio", formula_of.thickness.ratio, 0.105, 1e-15);
    let Camber::Parabolas { m, p } = formula_of.camber else {
        panic!("two parabolas")
    };
    near("camber", m, 0.03, 1e-15);
    near("place", p, 0.4, 0.0);
    let changed = formula("23112")
        .with(&Changes {
            camber: Some(0.01),
            ..Changes::default()
        })
        .unwrap();
    near("camber", changed.figures().camber.value, 0.01, 1e-12);
    let straight = formula("2412")
        .with(&Changes {
            camber: Some(0.0),
            ..Changes::default()
        })
        .unwrap();
    near(
        "area",
        straight.figures().area,
        formula("0012").figures().area,
        1e-12,
    );
}

#[test]
fn a_section_of_points_has_the_thickness_and_camber_asked_for() {
    for name in ["fell-113", "moor-135", "skerry-100"] {
        let section = own(name);
        let before = section.figures();
        let asked = Changes {
            thickness: Some(0.09),
            camber: Some(0.025),
            ..Changes::default()
        };
        let after = section.with(&asked).unwrap().figures();
        near(name, after.thickness.value, 0.09, 2e-6);
        near(name, after.camber.value.abs(), 0.025, 2e-6);
        near(name, after.thickness.x, before.thickness.x, 2e-3);
        // the area scales with the thickness
        near(
            name,
            after.area,
            before.area * 0.09 / before.thickness.value,
            1e-5,
        );
        let same = Changes {
            thickness: Some(before.thickness.value),
            camber: Some(before.camber.value.abs()),
            ..Changes::default()
        };
        let same = section.with(&same).unwrap().figures();
        near(name, same.area, before.area, 1e-7);
        near(name, same.zero_lift_angle, before.zero_lift_angle, 2e-5);
        let flat = section
            .with(&Changes {
                camber: Some(0.0),
                ..Changes::default()
            })
            .unwrap()
            .figures();
        near(name, flat.camber.value, 0.0, 1e-6);
        near(name, flat.zero_lift_angle, 0.0, 1e-5);
    }
}

#[test]
fn a_mirrored_section_has_the_opposite_camber_and_mirrored_twice_is_itself() {
    let inverted = Changes {
        inverted: true,
        ..Changes::default()
    };
    for section in [
        formula("2412"),
        formula("23112-63"),
        file("4412"),
        own("moor-135"),
    ] {
        let (a, mirrored) = (section.figures(), section.with(&inverted).unwrap());
        let b = mirrored.figures();
        near("area", b.area, a.area, 1e-14);
        near("centroid", b.centroid[1], -a.centroid[1], 1e-13);
        near("zero lift", b.zero_lift_angle, -a.zero_lift_angle, 1e-9);
        near("camber", b.camber.value, -a.camber.value, 1e-9);
        near("nose", b.nose_radius, a.nose_radius, 1e-10);
        let (points, twice) = (section.points(80), mirrored.with(&inverted).unwrap().points(80));
        let (mut last, once) = (mirrored.points(81).points, section.points(81).points);
        last.reverse();
        for (i, (p, q)) in points.points.iter().zip(&twice.points).enumerate() {
            near("point", p[1], q[1], 1e-14);
            near("mirrored", last[i][1], -once[i][1], 1e-14);
        }
    }
}

#[test]
fn each_closing_is_said_and_made() {
    let close = |closing| {
        let changes = Changes {
            closing: Some(closing),
            ..Changes::default()
        };
        formula("2412").with(&changes).unwrap()
    };
    for (closing, words, base) in [
        (Closing::Open, "base of 0.252 %", 0.00252),
        (Closing::Coefficient, "-0.1036", 0.0),
        (Closing::Extension, "1.008930411365", 0.0),
    ] {
        let section = close(closing);
        assert!(
            section.closing_note().contains(words),
            "{}",
            section.closing_note()
        );
        near(words, section.figures().base, base, 1e-14);
    }
    assert!(own("fell-113").closing_note().contains("sharp"));
    assert!(own("moor-135").closing_note().contains("0.4"));
}

#[test]
fn what_a_section_cannot_have_is_refused() {
    for (section, changes, part) in [
        (
            formula("0012"),
            Changes {
                camber: Some(0.02),
                ..Changes::default()
            },
            "symmetric",
        ),
        (
            formula("0012"),
            Changes {
                thickness: Some(0.5),
                ..Changes::default()
            },
            "0.01 to 0.40",
        ),
        (
            formula("2412"),
            Changes {
                camber: Some(-0.02),
                ..Changes::default()
            },
            "inverted",
        ),
        (
            file("0012"),
            Changes {
                camber: Some(0.02),
                ..Changes::default()
            },
            "symmetric",
        ),
        (
            own("moor-135"),
            Changes {
                closing: Some(Closing::Coefficient),
                ..Changes::default()
            },
            "trailing-edge thickness",
        ),
    ] {
        let error = section.with(&changes).unwrap_err().to_string();
        assert!(error.contains(part), "{error}");
    }
}
