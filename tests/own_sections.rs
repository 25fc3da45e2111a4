//! The coordinate files in `airfoils/` are what their headers say: our own, by formula.

use crate::figures::assert_near;
use crate::workdir::package;
use std::f64::consts::PI;
use std::fs;

/// The recipe of a file's header.
struct Recipe {
    file: &'static str,
    /// Half thickness: `sqrt(x) (1 - x) (t0 + t1 x + t2 x^2) + base x`.
    thickness: [f64; 3],
    base: f64,
    /// Camber: `x (1 - x) (c0 + c1 x + c2 x^2)`.
    camber: [f64; 3],
    /// Intervals a side.
    intervals: usize,
    /// Two blocks with counts, or one loop.
    blocks: bool,
    /// Parts of the header that state the numbers above.
    header: [&'static str; 3],
}

const RECIPES: [Recipe; 3] = [
    Recipe {
        file: "fell-113.dat",
        thickness: [0.1438, 0.0258, -0.0507],
        base: 0.0,
        camber: [0.19, -0.112, 0.03],
        intervals: 60,
        blocks: false,
        header: [
            "yt = sqrt(x) (1 - x) (0.1438 + 0.0258 x - 0.0507 x^2)\n",
            "yc = x (1 - x) (0.19 - 0.112 x + 0.03 x^2)\n",
            "i / 60",
        ],
    },
    Recipe {
        file: "moor-135.dat",
        thickness: [0.159, 0.065, -0.065],
        base: 0.002,
        camber: [0.085, -0.04, 0.0],
        intervals: 64,
        blocks: true,
        header: [
            "yt = sqrt(x) (1 - x) (0.159 + 0.065 x - 0.065 x^2) + 0.002 x\n",
            "yc = x (1 - x) (0.085 - 0.04 x)\n",
            "i / 64",
        ],
    },
    Recipe {
        file: "skerry-100.dat",
        thickness: [0.133, -0.006, -0.01],
        base: 0.0,
        camber: [0.13, -0.203, 0.045],
        intervals: 72,
        blocks: false,
        header: [
            "yt = sqrt(x) (1 - x) (0.133 - 0.006 x - 0.01 x^2)\n",
            "yc = x (1 - x) (0.13 - 0.203 x + 0.045 x^2)\n",
            "i / 72",
        ],
    },
];

/// Points of a file: those of the upper side, then those of the lower, both from the nose.
fn points(text: &str, recipe: &Recipe) -> [Vec<[f64; 2]>; 2] {
    let lines = text
        .lines()
        .skip(1)
        .filter(|line| !line.starts_with('#') && !line.trim().is_empty());
    let mut pairs: Vec<[f64; 2]> = lines
        .map(|line| {
            let numbers: Vec<f64> = line
                .split_whitespace()
                .map(|word| word.parse().expect("a number"))
                .collect();
            numbers.try_into().expect("two numbers a line")
        })
        .collect();
    let n = recipe.intervals;
    if recipe.blocks {
        let counts = pairs.remove(0);
        let count = f64::from(u32::try_from(n + 1).expect("small"));
        assert_near("count above", counts[0], count, 0.0);
        assert_near("count below", counts[1], count, 0.0);
        let lower = pairs.split_off(n + 1);
        [pairs, lower]
    } else {
        let lower = pairs[n..].to_vec();
        pairs.truncate(n + 1);
        pairs.reverse();
        [pairs, lower]
    }
}

#[test]
fn each_coordinate_file_follows_the_recipe_in_its_header() {
    for recipe in RECIPES {
        let text = fs::read_to_string(package().join("airfoils").join(recipe.file)).expect("the file");
        for part in recipe.header {
            assert!(text.contains(part), "{}: no {part:?} in the header", recipe.file);
        }
        for (side, sign) in points(&text, &recipe).iter().zip([1.0, -1.0]) {
            assert_eq!(side.len(), recipe.intervals + 1, "{}", recipe.file);
            for (i, [x, y]) in side.iter().enumerate() {
                let part = f64::from(u32::try_from(i).expect("small"))
                    / f64::from(u32::try_from(recipe.intervals).expect("small"));
                // half a unit of the last decimal, and what the decimal form itself costs
                let rounding = 0.5e-7 + 1e-12;
                assert_near(recipe.file, *x, (1.0 - (PI * part).cos()) / 2.0, rounding);
                let [t0, t1, t2] = recipe.thickness;
                let [c0, c1, c2] = recipe.camber;
                let half = x.sqrt() * (1.0 - x) * (t0 + t1 * x + t2 * x * x) + recipe.base * x;
                let camber = x * (1.0 - x) * (c0 + c1 * x + c2 * x * x);
                assert_near(recipe.file, *y, camber + sign * half, rounding);
            }
        }
    }
}

#[test]
fn every_coordinate_file_has_its_recipe_here() {
    let mut found: Vec<String> = fs::read_dir(package().join("airfoils"))
        .expect("the directory")
        .map(|entry| {
            entry
                .expect("an entry")
                .file_name()
                .into_string()
                .expect("a plain name")
        })
        .collect();
    found.sort();
    assert_eq!(found, RECIPES.map(|recipe| recipe.file));
}
