//! Every form of a file conforms to the published schema.

use std::collections::BTreeSet;

use crate::solid::Side;
use crate::spec::Unit;
use crate::write::step::entity::ENTITIES;
use crate::write::step::{Document, ReferenceForm, Schema as Protocol};

use super::fixture::{Half, Parts, text};
use super::reader::{File, Read};
use super::schema::faults;
use crate::write::step::schema::{ROOTS, Schema};

const UNITS: [Unit; 5] = [
    Unit::Millimetre,
    Unit::Centimetre,
    Unit::Metre,
    Unit::Inch,
    Unit::Foot,
];
const FORMS: [ReferenceForm; 5] = [
    ReferenceForm::Both,
    ReferenceForm::Construction,
    ReferenceForm::Wireframe,
    ReferenceForm::Parts,
    ReferenceForm::None,
];

/// Calls `check` with every combination of solids, unit, reference form and protocol.
fn for_every_form(mut check: impl FnMut(&Document<'_>, &File)) {
    let twisted = |side, rational| {
        Half {
            side,
            twist: -0.05,
            rational,
        }
        .build()
    };
    let one = |solid| Parts {
        solids: vec![solid],
        ..Parts::new()
    };
    let sets = [
        Parts::new(),
        Parts::pair(),
        one(twisted(Side::Port, false)),
        one(twisted(Side::Starboard, true)),
    ];
    for parts in &sets {
        for unit in UNITS {
            for reference_form in FORMS {
                for schema in [Protocol::Ap242, Protocol::Ap214] {
                    let document = Document {
                        unit,
                        reference_form,
                        schema,
                        ..parts.document()
                    };
                    let text = text(&document).unwrap();
                    assert!(text.is_ascii() && !text.contains('\r'));
                    check(&document, &File::read(&text).unwrap());
                }
            }
        }
    }
}

#[test]
fn every_file_conforms_to_the_schema() {
    let schema = Schema::excerpt();
    for_every_form(|document, file| {
        assert_eq!(
            faults(&schema, file),
            [""; 0],
            "{:?} {:?}",
            document.unit,
            document.reference_form
        );
    });
}

#[test]
fn every_entity_of_the_writer_is_in_the_schema_and_is_tried() {
    let schema = Schema::excerpt();
    let mut written = BTreeSet::new();
    for_every_form(|_, file| {
        written.extend(
            file.instances
                .iter()
                .map(|i| i.records.iter().map(|r| r.0.clone()).collect::<BTreeSet<_>>()),
        );
    });
    for keywords in ENTITIES {
        for keyword in *keywords {
            assert!(schema.has(keyword), "{keyword}");
        }
        // a face has one outer bound here: the wing has no holes
        let names = keywords.iter().map(|&keyword| keyword.to_owned()).collect();
        assert!(
            written.contains(&names) || *keywords == ["FACE_BOUND"],
            "{keywords:?} is never written"
        );
    }
}

#[test]
fn nothing_is_written_that_nothing_needs() {
    for_every_form(|document, file| {
        let mut used = BTreeSet::new();
        for instance in &file.instances {
            instance
                .records
                .iter()
                .flat_map(|record| &record.1)
                .for_each(|value| gather(value, &mut used));
        }
        for instance in &file.instances {
            let name = &instance.records[0].0[..];
            assert!(
                used.contains(&instance.id) || ROOTS.contains(&name),
                "#{} {name} {:?}",
                instance.id,
                document.reference_form
            );
        }
    });
}

fn gather(value: &Read, used: &mut BTreeSet<usize>) {
    match value {
        Read::Reference(id) => drop(used.insert(*id)),
        Read::List(values) | Read::Typed(_, values) => values.iter().for_each(|value| gather(value, used)),
        _ => {}
    }
}

#[test]
fn each_edge_is_used_once_each_way_and_vertices_have_points_of_their_own() {
    for_every_form(|_, file| {
        let reference = |value: &Read| {
            if let Read::Reference(id) = value {
                *id
            } else {
                panic!("{value:?}")
            }
        };
        let mut uses: Vec<(usize, bool)> = Vec::new();
        for edge in file.all("ORIENTED_EDGE") {
            uses.push((reference(&edge[3]), edge[4] == Read::Enumeration("T".to_owned())));
        }
        uses.sort_unstable();
        assert_eq!(uses.len(), 2 * file.all("EDGE_CURVE").len());
        for pair in uses.chunks(2) {
            assert_eq!((pair[0].0, pair[0].1, pair[1].1), (pair[1].0, false, true));
        }
        let mut users: Vec<usize> = Vec::new();
        for instance in &file.instances {
            let mut used = BTreeSet::new();
            instance
                .records
                .iter()
                .flat_map(|record| &record.1)
                .for_each(|value| gather(value, &mut used));
            users.extend(used);
        }
        for vertex in file.all("VERTEX_POINT") {
            let point = reference(&vertex[1]);
            assert_eq!(users.iter().filter(|&&id| id == point).count(), 1, "#{point}");
        }
    });
}

#[test]
fn the_check_finds_faults() {
    let text = text(&Parts::new().document()).unwrap();
    let schema = Schema::excerpt();
    let edits = [
        ("CLOSED_SHELL('',(#", "CLOSED_SHELL('',(#9"),
        ("VECTOR('',", "VECTOR($,"),
        (",1.);", ",1);"),
        (".UNSPECIFIED.", ".UNSPECIFIC."),
        ("VOLUME_MEASURE(", "MASS_MEASURE("),
        ("NAMED_UNIT(*)", "NAMED_UNIT($)"),
        ("(LENGTH_UNIT()NAMED_UNIT(*)", "(NAMED_UNIT(*)LENGTH_UNIT()"),
        ("NAMED_UNIT(*)", ""),
        ("FACE_OUTER_BOUND(", "FACE_OUTER_BORDER("),
        ("EDGE_LOOP('',", "EDGE_LOOP('','',"),
        ("\n#12=", "\n#11="),
    ];
    for (from, to) in edits {
        let edited = text.replacen(from, to, 1);
        assert_ne!(edited, text, "{from}");
        assert!(
            !faults(&schema, &File::read(&edited).unwrap()).is_empty(),
            "{from} -> {to}"
        );
    }
    for (from, to) in [
        ("1.E-05", "1e-05"),
        ("'", "'\\"),
        ("ENDSEC;", ""),
        ("=", ":"),
        ("(*)", "(*"),
    ] {
        assert!(File::read(&text.replacen(from, to, 1)).is_err(), "{from} -> {to}");
    }
}
