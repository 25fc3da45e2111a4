//! Each refusal, provoked.

use crate::airfoil::coordinates::forms::{Form, PLAIN, file, stations};
use crate::airfoil::coordinates::{Error, MAX_BYTES, read, write_blocks, write_loop};

const FORM: Form = Form {
    thickness: 0.12,
    camber: 0.02,
    camber_at: 0.4,
    open: true,
};

fn points(n: usize) -> Vec<[f64; 2]> {
    FORM.contour(&stations(n, &[0.0]), &stations(n, &[0.0]))
}

fn fault(text: &str) -> Error {
    read(text.as_bytes(), "name").unwrap_err()
}

/// The plain file with one line changed; line 1 is the title, 2 to 44 the points, 23 the nose.
fn with_line(number: usize, line: &str) -> String {
    let text = String::from_utf8(file(&points(20), 21, &PLAIN)).unwrap();
    let mut lines: Vec<&str> = text.lines().collect();
    lines[number - 1] = line;
    lines.join("\n")
}

#[test]
fn what_cannot_be_a_section_is_refused_with_its_line() {
    assert!(matches!(fault(""), Error::Empty { .. }));
    assert!(matches!(fault(" \r\n\t"), Error::Empty { .. }));
    assert!(
        matches!(read(&vec![b' '; MAX_BYTES + 1], "name"), Err(Error::TooLarge { bytes, .. }) if bytes > MAX_BYTES)
    );
    let error = fault("title\nab\u{0}c\n");
    assert!(matches!(error, Error::Binary { .. }) && error.line() == 2);
    assert!(matches!(fault("no\nnumbers\nhere"), Error::NoPoints { .. }));
    assert!(matches!(fault("1\n2\n3\n"), Error::NoPoints { .. }));

    let cases = [
        (10, "0.5 0.0x6"),
        (10, "middle"),
        (10, "0.5"),
        (10, "0.5 0.05 0.0 7"),
        (10, "NaN 0.05"),
        (10, "1e999 0.05"),
        (10, "0.5 ****"),
        (10, "-7.5 0.05"),
        (10, "0.6 -0.4"),
        (10, "0.8 0.05"),
    ];
    for (line, text) in cases {
        let error = fault(&with_line(line, text));
        assert_eq!((error.line(), error.text()), (line, text), "{error}");
        let fits = match &error {
            Error::Words { .. } => text.contains(['x', 'm']),
            Error::Columns { found, usual: 2, .. } => *found == text.split(' ').count(),
            Error::NotFinite { .. } => text.contains(['N', '*']) || text.starts_with("1e999"),
            Error::Spike { .. } => text.contains('.'),
            _ => false,
        };
        assert!(fits, "{text}: {error}");
    }
    // a last number cut short
    let error = fault(&with_line(44, "0.99 -0.1"));
    assert!(
        matches!(error, Error::Spike { .. }) && error.line() == 44,
        "{error}"
    );
    let error = fault(&with_line(2, "1.0000 0.0x12"));
    assert!(
        matches!(error, Error::Words { .. }) && error.line() == 2,
        "{error}"
    );
}

#[test]
fn wrong_counts_are_refused() {
    let text = write_blocks("Plover 12", &points(20), 21, 6);
    for counts in ["21. 22.", "22. 23.", "21. 23.", "30 30"] {
        let wrong = text.replacen("       22.        22.", counts, 1);
        assert_ne!(wrong, text);
        let error = fault(&wrong);
        assert!(
            matches!(error, Error::Counts { .. }) && error.line() == 2,
            "{counts}: {error}"
        );
    }
}

#[test]
fn too_few_or_too_many_points_are_refused() {
    let few = write_loop("t", &points(4), 6);
    assert!(matches!(
        fault(&few),
        Error::TooFewPoints {
            upper: 6,
            lower: 6,
            ..
        }
    ));
    assert!(read(write_loop("t", &points(5), 6).as_bytes(), "name").is_ok_and(|c| c.points.len() == 13));
    let many = write_loop("t", &points(50_000), 9);
    let error = fault(&many);
    assert!(matches!(error, Error::TooManyPoints { .. }) && error.line() == 100_002);
}

#[test]
fn parts_and_heaps_of_points_are_refused() {
    let given = points(20);
    assert!(matches!(
        fault(&write_loop("t", &given[..22], 6)),
        Error::NotOneContour { .. }
    ));
    assert!(matches!(
        fault(&write_loop("t", &given[..40], 6)),
        Error::NotOneContour { .. }
    ));
    assert!(matches!(
        fault(&write_loop("t", &given[1..], 6)),
        Error::NotOneContour { .. }
    ));
    let twice = [
        given.clone(),
        given.iter().rev().copied().collect(),
        given.clone(),
    ]
    .concat();
    let error = fault(&write_loop("t", &twice, 6));
    assert!(
        matches!(error, Error::Spike { .. } | Error::CrossesItself { .. }),
        "{error}"
    );
    let text = write_blocks("t", &given, 21, 6);
    let short: Vec<&str> = text
        .lines()
        .take(40)
        .filter(|line| !line.contains("22."))
        .collect();
    assert!(matches!(fault(&short.join("\n")), Error::NotOneContour { .. }));
    assert!(matches!(fault(&"0.5 0.5\n".repeat(20)), Error::NoChord { .. }));
}

#[test]
fn impossible_shapes_are_refused() {
    let scaled = |f: f64| -> Vec<[f64; 2]> { points(20).iter().map(|p| [p[0], p[1] * f]).collect() };
    assert!(
        matches!(fault(&write_loop("t", &scaled(6.0), 6)), Error::Thickness { thickness, .. } if thickness > 0.6)
    );
    let flat = fault(&write_loop("t", &scaled(1e-7), 12));
    assert!(matches!(flat, Error::Thickness { .. }), "{flat}");
    let mirrored: Vec<[f64; 2]> = points(20).iter().map(|p| [1.0 - p[0], p[1]]).collect();
    assert!(matches!(
        fault(&write_loop("t", &mirrored, 6)),
        Error::NoseAft { .. }
    ));

    let mut crossed = points(20);
    crossed[0][1] = -0.003;
    let error = fault(&write_loop("t", &crossed, 6));
    assert!(
        matches!(error, Error::CrossedTrailingEdge { overlap, .. } if (overlap - 0.00174).abs() < 2e-5),
        "{error}"
    );
    // the upper side dips below the lower one at mid chord
    let mut dipped = points(60);
    for p in &mut dipped[..60] {
        p[1] -= 0.16 * (-((p[0] - 0.6) / 0.08).powi(2)).exp();
    }
    let error = fault(&write_loop("t", &dipped, 6));
    assert!(
        matches!(error, Error::CrossesItself { other, .. } if other < 62 && error.line() > 62),
        "{error}"
    );
}

#[test]
fn a_message_names_line_text_reason_and_remedy() {
    let error = fault(&with_line(10, "NaN 0.05"));
    assert_eq!(
        error.to_string(),
        "line 10 (NaN 0.05): a coordinate that is not a finite number; correct the number"
    );
}
