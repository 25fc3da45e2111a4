//! Strings and real numbers survive the file, whatever they are.

use proptest::prelude::any;
use proptest::{prop_assert, prop_assert_eq, proptest};

use crate::write::step::text::{put_real, put_string};
use crate::write::step::{Document, Error};

use super::fixture::{Parts, text};
use super::reader::{File, Read, read_parameter};

fn string(text: &str) -> String {
    let mut line = String::new();
    put_string(text, &mut line);
    line
}

fn real(x: f64) -> String {
    let mut line = String::new();
    put_real(x, &mut line);
    line
}

#[test]
fn strings_are_escaped_as_the_standard_says() {
    assert_eq!(string(""), "''");
    assert_eq!(string("plain ~ text"), "'plain ~ text'");
    assert_eq!(string("it's a \\ here"), "'it''s a \\\\ here'");
    assert_eq!(string("λ = ½"), "'\\X2\\03BB\\X0\\ = \\X2\\00BD\\X0\\'");
    assert_eq!(string("ΔΛ"), "'\\X2\\0394039B\\X0\\'");
    assert_eq!(
        string("é🛩é"),
        "'\\X2\\00E9\\X0\\\\X4\\0001F6E9\\X0\\\\X2\\00E9\\X0\\'"
    );
    assert_eq!(string("a\nb\u{7f}"), "'a\\X2\\000A\\X0\\b\\X2\\007F\\X0\\'");
}

#[test]
fn reals_have_a_point_and_the_fewest_digits() {
    let cases = [
        (0.0, "0."),
        (-0.0, "0."),
        (1.0, "1."),
        (-12.5, "-12.5"),
        (0.1 + 0.2, "0.30000000000000004"),
        (1e-5, "1.E-05"),
        (-2.5e20, "-2.5E+20"),
        (1.25e-7, "1.25E-07"),
        (1e-4, "0.0001"),
        (999_999_999_999_999.0, "999999999999999."),
        (1e15, "1.E+15"),
        (5e-324, "5.E-324"),
        (f64::MAX, "1.7976931348623157E+308"),
    ];
    for (x, text) in cases {
        assert_eq!(real(x), text);
    }
}

proptest! {
    #[test]
    fn any_string_reads_back(text in any::<String>()) {
        let line = string(&text);
        prop_assert!(line.bytes().all(|b| (b' '..=b'~').contains(&b)), "{line}");
        prop_assert_eq!(read_parameter(&line), Ok(Read::Text(text)));
    }

    #[test]
    fn any_real_reads_back_to_the_same_bits(bits in any::<u64>()) {
        let x = f64::from_bits(bits);
        if x.is_finite() {
            let line = real(x);
            let Ok(Read::Real(read)) = read_parameter(&line) else { panic!("{line}") };
            prop_assert_eq!(read.to_bits(), (x + 0.0).to_bits(), "{}", line);
        }
    }
}

#[test]
fn names_of_any_text_arrive() {
    let long = "wing ".repeat(2000);
    for name in [
        "",
        "Πτέρυγα",
        "l'aile \\X2\\ 'à' \"deux\"",
        "🛩 wing 🪶",
        "two\nlines",
        &long,
    ] {
        let mut parts = Parts::new();
        parts.name = name.to_owned();
        parts.reference.lines[0].name = name.to_owned();
        parts.solids[0].name = name.to_owned();
        parts.attributes[0].name = name.to_owned();
        let document = Document {
            id: name,
            description: name,
            ..parts.document()
        };
        let text = text(&document).unwrap();
        assert!(text.bytes().all(|b| b == b'\n' || (b' '..=b'~').contains(&b)));
        let file = File::read(&text).unwrap();
        let name = Read::Text(name.to_owned());
        let product = file.all("PRODUCT")[0];
        assert_eq!(product[..3], [name.clone(), name.clone(), name.clone()]);
        assert_eq!(file.all("TRIMMED_CURVE")[0][0], name);
        assert_eq!(file.all("MANIFOLD_SOLID_BREP")[0][0], name);
        assert!(
            file.all("GENERAL_PROPERTY")
                .iter()
                .any(|property| property[1] == name)
        );
    }
}

#[test]
fn strings_of_the_header_hold_256_characters_at_most() {
    let long = "ä".repeat(10_000);
    let parts = Parts {
        name: long.clone(),
        ..Parts::new()
    };
    let text = text(&Document {
        description: &long,
        ..parts.document()
    })
    .unwrap();
    let file = File::read(&text).unwrap();
    let Read::List(description) = &file.header[0].1[0] else {
        panic!("no description")
    };
    let mut joined = String::new();
    for part in &description[..description.len() - 1] {
        let Read::Text(part) = part else {
            panic!("{part:?} is no text")
        };
        assert!(part.chars().count() <= 256);
        joined.push_str(part);
    }
    assert_eq!(joined, long);
    assert_eq!(file.header[1].1[0], Read::Text("ä".repeat(256)));
}

#[test]
fn an_attribute_text_is_printable_ascii_or_refused_with_its_place() {
    use crate::write::step::Value;
    for (value, at) in [("NACA 2412 λ", 11), ("two\nlines", 4), ("🛩", 1)] {
        let mut parts = Parts::new();
        parts.attributes[1].value = Value::Text(value.to_owned());
        let error = text(&parts.document()).unwrap_err();
        let Error::AttributeText { name, at: found, .. } = &error else {
            panic!("{error}")
        };
        assert_eq!((&name[..], *found), ("reference area", at));
    }
    let mut parts = Parts::new();
    let long = "it's 10,000 \\ characters!".repeat(400);
    parts.attributes[1].value = Value::Text(long.clone());
    let file = File::read(&text(&parts.document()).unwrap()).unwrap();
    let texts = file.all("DESCRIPTIVE_REPRESENTATION_ITEM");
    assert_eq!(texts[0][1], Read::Text(long));
}
