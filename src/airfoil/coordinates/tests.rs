//! Each layout and each irregularity, one by one.

use crate::airfoil::coordinates::forms::{Form, Layout, PLAIN, Style, file, stations};
use crate::airfoil::coordinates::{Contour, read, write_blocks, write_loop};

const FORM: Form = Form {
    thickness: 0.12,
    camber: 0.02,
    camber_at: 0.4,
    open: true,
};

fn points(n: usize) -> Vec<[f64; 2]> {
    FORM.contour(&stations(n, &[0.0]), &stations(n, &[0.0]))
}

fn styled(style: Style) -> Vec<u8> {
    file(&points(20), 21, &style)
}

fn contour(bytes: &[u8]) -> Contour {
    read(bytes, "name").unwrap()
}

fn noted(contour: &Contour, text: &str) -> bool {
    contour.notes.iter().any(|note| note.contains(text))
}

/// Largest distance of the points from those of the formula.
fn off(contour: &Contour) -> f64 {
    assert_eq!(contour.points.len(), 43);
    let pairs = contour.points.iter().zip(points(20));
    pairs
        .map(|(p, q)| (p[0] - q[0]).hypot(p[1] - q[1]))
        .fold(0.0, f64::max)
}

#[test]
fn a_plain_loop_is_kept_as_it_is() {
    let contour = contour(&styled(PLAIN));
    assert_eq!(contour.title, "Plover 12");
    assert!(off(&contour) < 1e-8);
    assert_eq!((contour.decimals, contour.nose, contour.moved), (8, 21, None));
    assert_eq!(
        contour.notes,
        ["Layout: one loop from the trailing edge, 43 points."]
    );
    assert_eq!((contour.upper().len(), contour.lower().len()), (22, 22));
}

#[test]
fn both_public_layouts_written_are_read_back() {
    let given = points(20);
    for text in [
        write_loop("Plover 12", &given, 7),
        write_blocks("Plover 12", &given, 21, 7),
    ] {
        let contour = contour(text.as_bytes());
        assert_eq!(contour.title, "Plover 12");
        assert!(off(&contour) < 1e-7);
        assert_eq!(contour.decimals, 7);
    }
    let text = write_blocks("two\nlines", &given, 21, 5);
    assert!(
        text.starts_with("two lines\n      22.       22.\n\n  0.00000   0.00000\n"),
        "{text}"
    );
    assert!(!text.contains("-0.00000"));
    assert!(noted(&contour(text.as_bytes()), "The nose is given twice"));
    assert!(write_loop("", &[], 3).starts_with("section\n"));
}

#[test]
fn layouts_are_recognised_and_named() {
    let cases = [
        (Layout::Loop, "one loop from the trailing edge"),
        (Layout::LoopFromNose, "one loop from the nose"),
        (Layout::Counted, "two sides from the nose"),
        (Layout::Blocks, "two sides from the nose"),
        (Layout::BlocksFromEdge, "two sides from the trailing edge"),
    ];
    for (layout, name) in cases {
        for lower_first in [false, true] {
            let contour = contour(&styled(Style {
                layout,
                lower_first,
                ..PLAIN
            }));
            assert!(off(&contour) < 1e-8);
            assert!(noted(&contour, name), "{layout:?}: {:?}", contour.notes);
            assert_eq!(noted(&contour, "order reversed"), lower_first);
        }
    }
}

#[test]
fn tables_with_both_sides_in_a_row_are_read() {
    let form = Form { camber: 0.0, ..FORM };
    let stations = stations(20, &[0.0]);
    let expected = form.contour(&stations, &stations);
    let rows = |four: bool| -> String {
        let xs = std::iter::once(0.0).chain(stations.iter().copied()).chain([1.0]);
        xs.map(|s| {
            let [x, y] = form.point(s);
            if four {
                format!("{x:.6} {y:.6} {x:.6} {:.6}\n", -y)
            } else {
                format!("{x:.6} {y:.6} {:.6}\n", -y)
            }
        })
        .collect()
    };
    for four in [false, true] {
        let contour = contour(rows(four).as_bytes());
        assert!(noted(&contour, "a table of"));
        for (p, q) in contour.points.iter().zip(&expected) {
            assert!((p[0] - q[0]).hypot(p[1] - q[1]) < 1e-6);
        }
    }
}

#[test]
fn any_scale_is_brought_to_the_chord() {
    for (scale, decimals) in [(100.0, 10), (1000.0, 11), (250.0, 10), (0.5, 7)] {
        let contour = contour(&styled(Style { scale, ..PLAIN }));
        assert!(off(&contour) < 2e-8);
        assert_eq!((contour.decimals, contour.moved), (decimals, None), "{scale}");
        assert!(
            noted(&contour, &format!("Scale: chord {scale} to 1.")),
            "{:?}",
            contour.notes
        );
    }
}

#[test]
fn turned_and_shifted_points_come_back_and_say_so() {
    let contour = contour(&styled(Style {
        turn: 0.1,
        shift: [3.0, -1.0],
        scale: 100.0,
        ..PLAIN
    }));
    let moved = contour.moved.unwrap();
    let lead = FORM.farthest();
    let turned = [
        3.0 + lead[0] * 0.1_f64.cos() - lead[1] * 0.1_f64.sin(),
        -1.0 + lead[0] * 0.1_f64.sin() + lead[1] * 0.1_f64.cos(),
    ];
    assert!(
        (moved.leading_edge[0] / 100.0 - turned[0]).abs() < 1e-5,
        "{moved:?} {turned:?}"
    );
    assert!(
        (moved.leading_edge[1] / 100.0 - turned[1]).abs() < 4e-5,
        "{moved:?} {turned:?}"
    );
    assert!((moved.angle - 0.1 - (-lead[1]).atan2(1.0 - lead[0])).abs() < 4e-5);
    assert!(noted(&contour, "Shifted by (-29"), "{:?}", contour.notes);
}

#[test]
fn points_shifted_along_their_chord_line_keep_its_direction() {
    let contour = contour(&styled(Style {
        shift: [-0.25, 0.0],
        ..PLAIN
    }));
    assert!(off(&contour) < 2e-8);
    assert!(
        contour
            .moved
            .is_some_and(|m| m.angle.abs() <= 1e-8 && (m.leading_edge[0] + 0.25).abs() < 1e-8)
    );
}

#[test]
fn titles_of_numbers_are_titles() {
    let bytes = |title| {
        styled(Style {
            title: Some(title),
            ..PLAIN
        })
    };
    for title in [
        "0012",
        "23012 12%",
        "2412 12",
        "0012 64",
        "2411.5 sharp",
        "12",
        "1.5 m model",
        "4412, 12",
    ] {
        let contour = contour(&bytes(title));
        assert_eq!(contour.title, title);
        assert!(off(&contour) < 1e-8, "{title}");
    }
    assert_eq!(contour(&styled(Style { title: None, ..PLAIN })).title, "name");
    assert_eq!(contour(&bytes("# Plover 12")).title, "Plover 12");
    let counted = styled(Style {
        title: Some("0012 64"),
        layout: Layout::Counted,
        ..PLAIN
    });
    assert_eq!(contour(&counted).title, "0012 64");
    assert!(off(&contour(&counted)) < 1e-8);
}

#[test]
fn labels_and_footers_are_passed_over() {
    let text = write_blocks("Plover 12", &points(20), 21, 8);
    let labelled = text
        .replacen("\n\n", "\nUpper surface\n", 1)
        .replacen("\n\n", "\nLower surface\n", 1)
        + "end\n";
    let contour = contour(labelled.as_bytes());
    assert!(off(&contour) < 1e-8);
    assert!(noted(&contour, "Words behind"));
}

#[test]
fn the_line_across_a_blunt_edge_is_no_part_of_the_sides() {
    let mut given = points(20);
    given.push(given[0]);
    assert!(off(&contour(write_loop("t", &given, 8).as_bytes())) < 1e-8);
    given.pop();
    given.push([1.0, 0.0]);
    given.insert(0, [1.0, 0.0]);
    let contour = contour(write_loop("t", &given, 8).as_bytes());
    assert!(off(&contour) < 1e-8);
    assert!(noted(&contour, "across the blunt trailing edge"));
}

#[test]
fn edges_crossed_within_the_rounding_are_closed() {
    let mut given = Form { open: false, ..FORM }.contour(&stations(20, &[0.0]), &stations(20, &[0.0]));
    given[0] = [1.0, -1e-5];
    let contour = contour(write_loop("t", &given, 5).as_bytes());
    assert!(noted(&contour, "closed"));
    assert!(contour.points.first() == contour.points.last());
}

#[test]
fn a_nose_that_is_not_given_is_found() {
    // [-]: points a side, and how far the leading edge may be off (found: about half of it)
    for (n, within) in [(30, 6e-5), (60, 5e-6), (200, 3e-7)] {
        let mut given = points(n);
        given.remove(n + 1);
        let contour = contour(write_loop("t", &given, 8).as_bytes());
        let at = contour.moved.map_or(0.0, |m| m.leading_edge[0].abs());
        assert!(at < within, "{n}: {at}");
    }
}

#[test]
fn a_misprint_is_noted_and_a_sound_file_has_none() {
    let mut given = points(40);
    let clean = contour(write_loop("t", &given, 6).as_bytes());
    assert!(!noted(&clean, "misprint"), "{:?}", clean.notes);
    given[15][1] += 0.01;
    let contour = contour(write_loop("t", &given, 6).as_bytes());
    let notes: Vec<&String> = contour
        .notes
        .iter()
        .filter(|note| note.contains("misprint"))
        .collect();
    assert!(
        notes.len() == 1 && notes[0].starts_with("Line 17 lies 0.0"),
        "{notes:?}"
    );
}

#[test]
fn rounding_is_no_fault_however_close_the_points() {
    for (n, decimals) in [
        (30, 3),
        (60, 4),
        (100, 4),
        (1000, 5),
        (10_000, 5),
        (10_000, 6),
        (49_000, 6),
        (49_000, 7),
    ] {
        for open in [false, true] {
            let form = Form { open, ..FORM };
            let given = form.contour(&stations(n, &[0.2, 0.0, -0.1]), &stations(n, &[0.0, 0.1]));
            let contour = contour(write_loop("t", &given, decimals).as_bytes());
            assert_eq!(contour.decimals, decimals);
            let unit = 10_f64.powf(-(decimals as f64));
            assert!(
                contour.moved.is_none_or(|m| m.leading_edge[0].abs() < 3.0 * unit),
                "{n}: {:?}",
                contour.moved
            );
        }
    }
}

#[test]
fn slender_thick_and_strongly_cambered_sections_are_read() {
    for thickness in [0.01, 0.03, 0.06, 0.3, 0.5] {
        for camber in [0.0, 0.05, 0.12] {
            for camber_at in [0.15, 0.5, 0.7] {
                for open in [false, true] {
                    let form = Form {
                        thickness,
                        camber,
                        camber_at,
                        open,
                    };
                    if thickness > 0.3 && camber > 0.05 {
                        // the formula's own contour crosses itself at the nose
                        continue;
                    }
                    let given = form.contour(&stations(40, &[0.0]), &stations(40, &[0.0]));
                    let read = contour(write_loop("t", &given, 7).as_bytes());
                    assert_eq!(read.points.len(), given.len());
                    for (p, q) in read.points.iter().zip(&given) {
                        assert!((p[0] - q[0]).hypot(p[1] - q[1]) < 3e-7, "{form:?}");
                    }
                }
            }
        }
    }
}

#[test]
fn a_hundred_thousand_points_are_read() {
    let given = points(49_998);
    for layout in [Layout::Loop, Layout::Counted] {
        let bytes = file(
            &given,
            49_999,
            &Style {
                layout,
                print: 3,
                separator: ", ",
                third: 1,
                ..PLAIN
            },
        );
        let contour = contour(&bytes);
        assert_eq!(contour.points.len(), given.len());
    }
}
