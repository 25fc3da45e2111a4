//! What stands in a file, and what is refused.

use nalgebra::Point3;
use truck_modeling::{Curve, Edge, Line};

use crate::planform::Reference;
use crate::spec::Unit;
use crate::write::step::{Document, Error, ReferenceForm, Value, write};

use super::fixture::{Parts, text};
use super::reader::{File, Read};

fn file(document: &Document<'_>) -> File {
    File::read(&text(document).unwrap()).unwrap()
}

fn reals(value: &Read) -> Vec<f64> {
    match value {
        Read::Real(x) => vec![*x],
        Read::List(values) | Read::Typed(_, values) => values.iter().flat_map(reals).collect(),
        _ => vec![],
    }
}

fn named<'a>(file: &'a File, keyword: &str, name: &str) -> Vec<&'a [Read]> {
    let mut records = file.all(keyword);
    records.retain(|record| record[0] == Read::Text(name.to_owned()));
    records
}

#[test]
fn the_same_document_gives_the_same_bytes() {
    // the solids are built anew, so that their parts lie elsewhere in memory
    let (one, other) = (Parts::pair(), Parts::pair());
    assert_eq!(text(&one.document()).unwrap(), text(&other.document()).unwrap());
}

#[test]
fn a_plain_half_wing_takes_at_most_60_kb() {
    let parts = Parts::new();
    assert!(text(&parts.document()).unwrap().len() <= 60_000);
}

#[test]
fn the_header_names_the_program_and_its_version() {
    let parts = Parts::new();
    let file = file(&parts.document());
    let version = format!("spanwise {}", env!("CARGO_PKG_VERSION"));
    assert_eq!(file.header[1].1[1], Read::Text("2026-01-31T12:00:00".to_owned()));
    assert_eq!(file.header[1].1[4], Read::Text(version));
}

#[test]
fn figures_stand_in_the_unit_of_the_file() {
    let parts = Parts::new();
    for unit in [
        Unit::Millimetre,
        Unit::Centimetre,
        Unit::Metre,
        Unit::Inch,
        Unit::Foot,
    ] {
        let file = file(&Document {
            unit,
            ..parts.document()
        });
        let mm = unit.millimetres();
        let near = |value: &Read, truth: &[f64]| {
            let values = reals(value);
            assert_eq!(values.len(), truth.len());
            for (value, truth) in values.iter().zip(truth) {
                assert!(
                    (value - truth).abs() <= 1e-14 * truth.abs(),
                    "{value} {truth} {unit:?}"
                );
            }
        };
        let item = |name| named(&file, "MEASURE_REPRESENTATION_ITEM", name)[0];
        near(&item("volume measure")[1], &[1_234_567.25 / mm.powi(3)]);
        near(&item("surface area measure")[1], &[187_654.5 / mm.powi(2)]);
        near(&item("reference area")[1], &[90_000.0 / mm.powi(2)]);
        near(&item("span")[1], &[400.0 / mm]);
        near(&item("twist at the tip")[1], &[-0.05_f64.to_degrees()]);
        near(
            &named(&file, "CARTESIAN_POINT", "centre point")[0][1],
            &[140.5 / mm, 170.25 / mm, 0.125 / mm],
        );
        near(&file.all("UNCERTAINTY_MEASURE_WITH_UNIT")[0][0], &[1e-5 / mm]);
        let chord = named(&file, "TRIMMED_CURVE", "root chord")[0];
        near(&chord[2], &[0.0]);
        near(&chord[3], &[300.0 / mm]);
    }
}

#[test]
fn a_bent_line_is_one_straight_curve_a_piece_under_one_name() {
    let parts = Parts::new();
    let file = file(&parts.document());
    assert_eq!(named(&file, "TRIMMED_CURVE", "front spar").len(), 2);
    assert_eq!(named(&file, "STYLED_ITEM", "front spar").len(), 2);
}

#[test]
fn each_form_holds_the_reference_geometry_its_own_way() {
    for (parts, solids) in [(Parts::new(), 1), (Parts::pair(), 2)] {
        let assembly = solids > 1;
        let drawn = parts.reference.lines.len() + parts.reference.points.len();
        for (form, construction, wireframes, products) in [
            (ReferenceForm::Both, 1, 1, if assembly { solids + 2 } else { 1 }),
            (
                ReferenceForm::Construction,
                1,
                0,
                if assembly { solids + 1 } else { 1 },
            ),
            (
                ReferenceForm::Wireframe,
                0,
                1,
                if assembly { solids + 2 } else { 1 },
            ),
            (ReferenceForm::Parts, 0, drawn, solids + drawn + 1),
            (ReferenceForm::None, 0, 0, if assembly { solids + 1 } else { 1 }),
        ] {
            let file = file(&Document {
                reference_form: form,
                ..parts.document()
            });
            assert_eq!(
                file.all("CONSTRUCTIVE_GEOMETRY_REPRESENTATION").len(),
                construction,
                "{form:?}"
            );
            let sets = file.all("GEOMETRICALLY_BOUNDED_WIREFRAME_SHAPE_REPRESENTATION");
            assert_eq!(sets.len(), wireframes, "{form:?}");
            assert_eq!(file.all("PRODUCT").len(), products, "{form:?}");
            assert_eq!(file.all("TRIMMED_CURVE").is_empty(), form == ReferenceForm::None);
        }
    }
}

#[test]
fn without_reference_geometry_every_form_is_the_bare_solid() {
    let parts = Parts {
        reference: Reference::default(),
        ..Parts::new()
    };
    let bare = text(&Document {
        reference_form: ReferenceForm::None,
        ..parts.document()
    })
    .unwrap();
    for reference_form in [
        ReferenceForm::Both,
        ReferenceForm::Wireframe,
        ReferenceForm::Parts,
    ] {
        assert_eq!(
            text(&Document {
                reference_form,
                ..parts.document()
            })
            .unwrap(),
            bare
        );
    }
}

#[test]
fn the_box_stands_before_the_centroid() {
    let parts = Parts::new();
    let text = text(&parts.document()).unwrap();
    assert!(text.find("'bounding box'") < text.find("'centroid'"));
}

#[test]
fn what_can_not_be_written_is_refused() {
    let refuse = |change: &dyn Fn(&mut Parts)| {
        let mut parts = Parts::new();
        change(&mut parts);
        text(&parts.document()).unwrap_err()
    };
    assert!(matches!(refuse(&|parts| parts.solids.clear()), Error::NoSolid));
    let error = refuse(&|parts| parts.properties.clear());
    assert!(
        matches!(
            error,
            Error::Properties {
                solids: 1,
                properties: 0
            }
        ),
        "{error}"
    );
    let error = refuse(&|parts| parts.solids[0].faces.truncate(4));
    assert!(
        matches!(
            error,
            Error::Labels {
                faces: 5,
                labels: 4,
                ..
            }
        ),
        "{error}"
    );
    let error = refuse(&|parts| {
        let shell = parts.solids[0].shape.boundaries()[0].clone();
        parts.solids[0].shape = truck_modeling::Solid::new(vec![shell.clone(), shell]);
    });
    assert!(matches!(error, Error::Shells { shells: 2, .. }), "{error}");
    let error = refuse(&|parts| parts.properties[0].volume = f64::NAN);
    assert!(
        matches!(
            error,
            Error::NotFinite {
                entity: "MEASURE_REPRESENTATION_ITEM",
                ..
            }
        ),
        "{error}"
    );
    let error = refuse(&|parts| parts.attributes[0].value = Value::Ratio(f64::INFINITY));
    assert!(
        matches!(
            error,
            Error::NotFinite {
                entity: "REAL_REPRESENTATION_ITEM",
                ..
            }
        ),
        "{error}"
    );
    let error = refuse(&|parts| parts.reference.points[0].point = Point3::new(0.0, f64::NAN, 0.0));
    assert!(
        matches!(
            error,
            Error::NotFinite {
                entity: "CARTESIAN_POINT",
                ..
            }
        ),
        "{error}"
    );
    let error = refuse(&|parts| {
        let points = &mut parts.reference.lines[0].points;
        points.push(points[1]);
    });
    assert!(matches!(error, Error::NoLength { .. }), "{error}");
    let error = refuse(&|parts| {
        let edge: Edge = parts.solids[0].shape.edge_iter().next().unwrap();
        let point = edge.front().point();
        edge.set_curve(Curve::Line(Line(point, point)));
    });
    assert_eq!(
        error.to_string(),
        "an edge of face `upper surface, panel 1, starboard`: the straight piece has no length, so no direction"
    );
}

#[test]
fn a_full_output_is_an_error() {
    let parts = Parts::new();
    for room in [0, 10, 30_000] {
        let mut bytes = vec![0; room];
        assert!(matches!(
            write(&parts.document(), &mut &mut bytes[..]),
            Err(Error::Output(_))
        ));
    }
}
