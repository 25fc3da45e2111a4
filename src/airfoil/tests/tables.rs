//! Published ordinate tables.

use crate::airfoil::{Section, parse};

/// Stations of the tables, per cent of the chord.
const STATIONS: [f64; 17] = [
    1.25, 2.5, 5.0, 7.5, 10.0, 15.0, 20.0, 25.0, 30.0, 40.0, 50.0, 60.0, 70.0, 80.0, 90.0, 95.0, 100.0,
];

/// Half thickness, per cent. Source: NACA Report 460 and Report 824, appendix I, from memory.
const SYMMETRIC: [(&str, [f64; 17]); 7] = [
    (
        "0006",
        [
            0.947, 1.307, 1.777, 2.1, 2.341, 2.673, 2.869, 2.971, 3.001, 2.902, 2.647, 2.282, 1.832, 1.312,
            0.724, 0.403, 0.063,
        ],
    ),
    (
        "0009",
        [
            1.42, 1.961, 2.666, 3.15, 3.512, 4.009, 4.303, 4.456, 4.501, 4.352, 3.971, 3.423, 2.748, 1.967,
            1.086, 0.605, 0.095,
        ],
    ),
    (
        "0012",
        [
            1.894, 2.615, 3.555, 4.2, 4.683, 5.345, 5.737, 5.941, 6.002, 5.803, 5.294, 4.563, 3.664, 2.623,
            1.448, 0.807, 0.126,
        ],
    ),
    (
        "0015",
        [
            2.367, 3.268, 4.443, 5.25, 5.853, 6.682, 7.172, 7.427, 7.502, 7.254, 6.617, 5.704, 4.58, 3.279,
            1.81, 1.008, 0.158,
        ],
    ),
    (
        "0018",
        [
            2.841, 3.922, 5.332, 6.3, 7.024, 8.018, 8.606, 8.912, 9.003, 8.705, 7.941, 6.845, 5.496, 3.935,
            2.172, 1.21, 0.189,
        ],
    ),
    (
        "0021",
        [
            3.315, 4.576, 6.221, 7.35, 8.195, 9.354, 10.04, 10.397, 10.504, 10.156, 9.265, 7.986, 6.412,
            4.591, 2.534, 1.412, 0.221,
        ],
    ),
    (
        "0024",
        [
            3.788, 5.229, 7.109, 8.4, 9.365, 10.691, 11.475, 11.883, 12.004, 11.607, 10.588, 9.127, 7.328,
            5.247, 2.896, 1.613, 0.252,
        ],
    ),
];

/// Upper and lower ordinates at the same stations, per cent. Source: NACA Report 460 and Report 824, appendix II; 23012
/// from memory. These tables are faired: up to 0.03 % of the chord from the formula.
const CAMBERED: [(&str, [f64; 17], [f64; 17]); 4] = [
    (
        "2412",
        [
            2.15, 2.99, 4.13, 4.96, 5.63, 6.61, 7.26, 7.67, 7.88, 7.8, 7.24, 6.36, 5.18, 3.75, 2.08, 1.14,
            0.13,
        ],
        [
            -1.65, -2.27, -3.01, -3.46, -3.75, -4.1, -4.23, -4.22, -4.12, -3.8, -3.34, -2.76, -2.14, -1.5,
            -0.82, -0.48, -0.13,
        ],
    ),
    (
        "4412",
        [
            2.44, 3.39, 4.73, 5.76, 6.59, 7.89, 8.8, 9.41, 9.76, 9.8, 9.19, 8.14, 6.69, 4.89, 2.71, 1.47,
            0.13,
        ],
        [
            -1.43, -1.95, -2.49, -2.74, -2.86, -2.88, -2.74, -2.5, -2.26, -1.8, -1.4, -1.0, -0.65, -0.39,
            -0.22, -0.16, -0.13,
        ],
    ),
    (
        "23012",
        [
            2.67, 3.61, 4.91, 5.8, 6.43, 7.19, 7.5, 7.6, 7.55, 7.14, 6.41, 5.47, 4.36, 3.08, 1.68, 0.92, 0.13,
        ],
        [
            -1.23, -1.71, -2.26, -2.61, -2.92, -3.5, -3.97, -4.28, -4.46, -4.48, -4.17, -3.67, -3.0, -2.16,
            -1.23, -0.7, -0.13,
        ],
    ),
    (
        "23015",
        [
            3.34, 4.44, 5.89, 6.9, 7.64, 8.52, 8.92, 9.08, 9.05, 8.59, 7.74, 6.61, 5.25, 3.73, 2.04, 1.12,
            0.16,
        ],
        [
            -1.54, -2.25, -3.04, -3.61, -4.09, -4.84, -5.41, -5.78, -5.96, -5.92, -5.5, -4.81, -3.91, -2.83,
            -1.59, -0.9, -0.16,
        ],
    ),
];

/// Half thickness of 0012-64 and 0012-34, per cent, worked out from the constants of NACA Report 492 apart from this
/// program (computed, not published).
const MODIFIED: [(&str, [f64; 18]); 2] = [
    (
        "0012-64",
        [
            1.186, 1.808, 2.453, 3.267, 3.82, 4.241, 4.86, 5.297, 5.611, 5.828, 6.0, 5.827, 5.316, 4.478,
            3.324, 1.868, 1.03, 0.12,
        ],
    ),
    (
        "0012-34",
        [
            0.687, 1.136, 1.678, 2.49, 3.128, 3.658, 4.493, 5.098, 5.524, 5.801, 6.0, 5.827, 5.316, 4.478,
            3.324, 1.868, 1.03, 0.12,
        ],
    ),
];
const MODIFIED_STATIONS: [f64; 18] = [
    0.5, 1.25, 2.5, 5.0, 7.5, 10.0, 15.0, 20.0, 25.0, 30.0, 40.0, 50.0, 60.0, 70.0, 80.0, 90.0, 95.0, 100.0,
];

fn section(text: &str) -> Section {
    Section::from_formula(text, parse(text).unwrap()).unwrap()
}

#[test]
fn symmetric_sections_are_within_a_thousandth_of_a_per_cent_of_the_tables() {
    for (name, table) in SYMMETRIC {
        let section = section(name);
        for (x, y) in STATIONS.into_iter().zip(table) {
            // and the last printed digit, 0.0005
            let found = 100.0 * section.upper.y_at(x / 100.0);
            assert!((found - y).abs() <= 0.0010, "{name} at {x}: {found} {y}");
            assert!((100.0 * section.lower.y_at(x / 100.0) + y).abs() <= 0.0010);
        }
    }
}

#[test]
fn cambered_sections_are_within_three_hundredths_of_a_per_cent_of_the_tables() {
    for (name, upper, lower) in CAMBERED {
        let section = section(name);
        for (i, x) in STATIONS.into_iter().enumerate() {
            let found = [&section.upper, &section.lower].map(|side| 100.0 * side.y_at(x / 100.0));
            for (found, y) in found.into_iter().zip([upper[i], lower[i]]) {
                assert!((found - y).abs() <= 0.0305, "{name} at {x}: {found} {y}");
            }
        }
    }
}

#[test]
fn modified_sections_are_those_of_the_constants() {
    for (name, table) in MODIFIED {
        let section = section(name);
        for (x, y) in MODIFIED_STATIONS.into_iter().zip(table) {
            let found = 100.0 * section.upper.y_at(x / 100.0);
            assert!((found - y).abs() <= 0.000_501, "{name} at {x}: {found} {y}");
        }
    }
}
