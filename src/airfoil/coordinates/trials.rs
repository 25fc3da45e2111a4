//! Random sections through random irregularities, and random damage.

use proptest::prelude::{Strategy, any, prop, prop_assert, prop_assert_eq, proptest};
use proptest::test_runner::TestCaseError;

use crate::airfoil::coordinates::forms::{DECIMALS, Form, Layout, PLAIN, Style, file, stations};
use crate::airfoil::coordinates::{Contour, MIN_SIDE, read};

fn form() -> impl Strategy<Value = Form> {
    (0.04..0.24_f64, 0.0..0.06_f64, 0.25..0.6_f64, any::<bool>()).prop_map(
        |(thickness, camber, camber_at, open)| Form {
            thickness,
            camber,
            camber_at,
            open,
        },
    )
}

/// A section's points; shown by what they came from.
struct Case {
    form: Form,
    sides: [(usize, Vec<f64>); 2],
    points: Vec<[f64; 2]>,
    nose: usize,
}

impl std::fmt::Debug for Case {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{:?} {:?}", self.form, self.sides)
    }
}

/// Sections of at least `fewest` points a side.
fn case(fewest: usize) -> impl Strategy<Value = Case> {
    let side = || (fewest..120_usize, prop::collection::vec(-0.3..0.3_f64, 7));
    (form(), [side(), side()]).prop_map(|(form, sides)| {
        let [upper, lower] = [0, 1].map(|k: usize| stations(sides[k].0, &sides[k].1));
        Case {
            form,
            points: form.contour(&upper, &lower),
            nose: sides[0].0 + 1,
            sides,
        }
    })
}

fn style() -> impl Strategy<Value = Style> {
    let layout = prop::sample::select(vec![
        Layout::Loop,
        Layout::LoopFromNose,
        Layout::Counted,
        Layout::Blocks,
        Layout::BlocksFromEdge,
    ]);
    let separator = prop::sample::select(vec![" ", "   ", "\t", ", ", ",", "; ", ";"]);
    let title = prop::sample::select(vec![
        None,
        Some("Plover 12"),
        Some("0012"),
        Some("23012 12%"),
        Some("2412 12"),
        Some("0012 64"),
        Some("Gr\u{fc}nschenkel 9 %, ge\u{e4}ndert"),
        Some("a section, its 2nd form\nof three\nheader lines"),
        Some("# Plover 12"),
    ]);
    let end = prop::sample::select(vec!["\n", "\r\n", "\r"]);
    let scale = prop::sample::select(vec![1.0, 100.0, 1000.0, 250.0, 10.0, 0.5]);
    (
        (
            layout,
            any::<bool>(),
            scale,
            0..6_usize,
            separator,
            any::<bool>(),
            end,
            title,
        ),
        (
            0..5_usize,
            any::<bool>(),
            any::<bool>(),
            any::<bool>(),
            0..3_usize,
        ),
    )
        .prop_map(
            |((layout, lower_first, scale, print, separator, comma, end, title), rest)| {
                let (encoding, remarks, blanks, repeats, third) = rest;
                Style {
                    layout,
                    lower_first,
                    scale,
                    print,
                    separator,
                    decimal_comma: comma && separator != "," && separator != ", ",
                    end,
                    title,
                    encoding,
                    remarks,
                    blanks,
                    repeats,
                    third,
                    ..PLAIN
                }
            },
        )
}

fn apart(p: [f64; 2], q: [f64; 2]) -> f64 {
    (p[0] - q[0]).hypot(p[1] - q[1])
}

/// Every promise that a contour makes.
fn is_section(contour: &Contour) -> Result<(), TestCaseError> {
    let (points, n) = (&contour.points, contour.points.len());
    prop_assert!(points.iter().flatten().all(|v| v.is_finite() && v.abs() < 2.0));
    prop_assert!(contour.upper().len() >= MIN_SIDE && contour.lower().len() >= MIN_SIDE);
    prop_assert!(
        points.windows(2).all(|p| apart(p[0], p[1]) > 0.0),
        "a repeated point"
    );
    let edge = [
        0.5 * (points[0][0] + points[n - 1][0]) - 1.0,
        0.5 * (points[0][1] + points[n - 1][1]),
    ];
    prop_assert!(
        edge[0].abs() < 1e-15 && edge[1].abs() < 1e-15,
        "trailing edge off by {edge:?}"
    );
    prop_assert!(points[0][1] >= points[n - 1][1]);
    prop_assert!(points.iter().all(|p| p[0] >= points[contour.nose][0]));
    Ok(())
}

/// Area within the points \[chord squared\].
fn area(points: &[[f64; 2]]) -> f64 {
    let pairs = points.iter().zip(points.iter().cycle().skip(1));
    pairs.map(|(p, q)| 0.5 * (p[0] * q[1] - q[0] * p[1])).sum()
}

fn check_same(contour: &Contour, expected: &[[f64; 2]], within: f64) -> Result<(), TestCaseError> {
    is_section(contour)?;
    prop_assert_eq!(contour.points.len(), expected.len());
    for (i, (p, q)) in contour.points.iter().zip(expected).enumerate() {
        let off = (p[0] - q[0]).hypot(p[1] - q[1]);
        prop_assert!(off <= within, "point {i} {p:?}, not {q:?}: off by {off}");
    }
    Ok(())
}

proptest! {
    #[test]
    fn any_mix_of_irregularities_gives_the_same_points(case in case(10), style in style()) {
        let bytes = file(&case.points, case.nose, &style);
        let contour = read(&bytes, "name").map_err(|e| TestCaseError::fail(e.to_string()))?;
        // half a unit of the last decimal for x, y and the point at the nose or trailing edge
        let rounding = 0.5e-8 / style.scale.min(1.0);
        check_same(&contour, &case.points, 4.0 * rounding)?;
        prop_assert!(contour.notes.iter().all(|note| !note.contains("misprint")), "{:?}", contour.notes);
        let carried = contour.decimals as f64;
        prop_assert!(carried >= DECIMALS as f64 + style.scale.log10().floor() - 1.0);
    }

    #[test]
    fn turned_and_shifted_points_come_back(case in case(30), mut style in style(),
            turn in 0.02..0.7_f64, sense in any::<bool>(), shift in [-2.0..2.0_f64, -2.0..2.0_f64]) {
        style.turn = if sense { turn } else { -turn };
        style.shift = shift;
        let bytes = file(&case.points, case.nose, &style);
        let contour = read(&bytes, "name").map_err(|e| TestCaseError::fail(e.to_string()))?;
        let lead = case.form.farthest();
        let (dx, dy) = (1.0 - lead[0], -lead[1]);
        let chord = dx.hypot(dy);
        let expected: Vec<[f64; 2]> = case.points.iter().map(|p| {
            let d = [p[0] - lead[0], p[1] - lead[1]];
            [(d[0] * dx + d[1] * dy) / (chord * chord), (d[1] * dx - d[0] * dy) / (chord * chord)]
        }).collect();
        // the farthest point of the curve is between given points, up to 0.003 of the chord apart
        check_same(&contour, &expected, 2e-4)?;
        prop_assert!(contour.moved.is_some());
    }

    #[test]
    fn random_bytes_are_refused(bytes in prop::collection::vec(any::<u8>(), 0..400)) {
        prop_assert!(read(&bytes, "name").is_err());
    }

    #[test]
    fn random_rows_are_refused_or_sections(rows in prop::collection::vec((-1.5..1.5_f64, -0.5..0.5_f64), 0..80)) {
        let text: String = rows.iter().map(|(x, y)| format!("{x:.4} {y:.4}\n")).collect();
        if let Ok(contour) = read(text.as_bytes(), "name") {
            is_section(&contour)?;
        }
    }

    #[test]
    fn shuffled_rows_are_refused(case in case(10), swaps in prop::collection::vec((0..1000_usize, 0..1000_usize), 3..40)) {
        let mut mixed = case.points.clone();
        let n = mixed.len();
        for (a, b) in swaps {
            mixed.swap(a % n, b % n);
        }
        let bytes = file(&mixed, case.nose, &PLAIN);
        if let Ok(contour) = read(&bytes, "name") {
            is_section(&contour)?;
            // only what was no change, or a change of first and last, can pass
            let moved = mixed.iter().zip(&case.points).filter(|&(&p, &q)| apart(p, q) > 0.0).count();
            prop_assert!(moved <= 2, "{} of {n} rows out of order, and read", moved);
        }
    }

    #[test]
    fn cut_files_are_refused_or_nearly_whole(case in case(10), style in style(), cut in 0.0..1.0_f64) {
        let bytes = file(&case.points, case.nose, &style);
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a share of the length")]
        let kept = (bytes.len() as f64 * cut) as usize;
        if let Ok(contour) = read(&bytes[..kept], "name") {
            is_section(&contour)?;
            // up to two points missing at the nose do not show beside another side with its points as far apart; of
            // ten points on a thick side they take up to 4 % of the area; nor does a last number that is cut to one near it
            let (whole, part) = (area(&case.points), area(&contour.points));
            prop_assert!((part - whole).abs() < 0.1 * whole, "area {part}, not {whole}");
        }
    }

    #[test]
    fn damaged_files_are_refused_or_sections(case in case(10), style in style(),
            damage in prop::collection::vec((any::<prop::sample::Index>(), any::<u8>(), 0..4_usize), 1..6)) {
        let mut bytes = file(&case.points, case.nose, &style);
        for (at, value, how) in damage {
            let i = at.index(bytes.len());
            match how {
                0 => bytes[i] = value,
                1 => { bytes.remove(i); }
                2 => bytes.insert(i, b"0123456789.-+eE ,;\n\r\t#"[usize::from(value) % 22]),
                _ => { let part = bytes[i..(i + 40).min(bytes.len())].to_vec(); bytes.splice(i..i, part); }
            }
            if bytes.is_empty() { break; }
        }
        match read(&bytes, "name") {
            Ok(contour) => is_section(&contour)?,
            Err(error) => {
                prop_assert!(error.line() >= 1);
                prop_assert!(!error.reason().is_empty() && !error.remedy().is_empty());
            }
        }
    }
}
