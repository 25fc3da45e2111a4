//! Airfoil sections: from a designation or a coordinate file to fitted profiles of unit chord.
//!
//! A [`Section`] is exact: a formula, or a smooth curve through the points of a file. [`fit`] puts all sections of a
//! wing on shared knots.

pub mod coordinates;
mod designation;
mod fit;
mod formula;
mod points;
mod side;
mod taylor;

pub use designation::{UnknownDesignation, is_designation, parse};
pub use fit::{Profile, Profiles, TOLERANCE, fit};
pub use formula::{Camber, Formula, Thickness};

use side::Side;
use thiserror::Error;

/// What can be wrong with a section.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Error {
    /// The designation names no section.
    #[error(transparent)]
    Designation(#[from] UnknownDesignation),
    /// The formula gives a section that crosses itself.
    #[error(
        "{name} crosses itself near the nose: its mean line is too steep for its thickness; take less camber, or put its greatest value further aft"
    )]
    Crosses {
        /// The section.
        name: String,
    },
    /// The coordinate file cannot be read as a section.
    #[error(transparent)]
    Coordinates(#[from] coordinates::Error),
    /// No smooth curve passes the file's points closely enough.
    #[error(
        "{name}: no smooth curve passes all its points within 1e-5 of the chord; check for a point out of line"
    )]
    Rough {
        /// The section.
        name: String,
    },
    /// No reasonable number of control points reaches the tolerance.
    #[error(
        "the sections {sections} could not be fitted together within {tolerance:e} of the chord; smooth the coordinates or use fewer different sections"
    )]
    Fit {
        /// The sections' names.
        sections: String,
        /// The tolerance \[chord\].
        tolerance: f64,
    },
}

/// An exact section of unit chord: the nose at (0, 0), the middle of the trailing edge at (1, 0).
#[derive(Clone, Debug)]
pub struct Section {
    /// What it is called.
    pub name: String,
    /// Largest distance of a given point from the section's curve \[chord\]; 0 for formulas.
    pub deviation: f64,
    upper: Side,
    lower: Side,
}

impl Section {
    /// The section of a formula.
    ///
    /// # Errors
    ///
    /// [`Error::Crosses`] where the formula gives no simple contour.
    pub fn from_formula(name: &str, formula: Formula) -> Result<Self, Error> {
        let crosses = || Error::Crosses {
            name: name.to_owned(),
        };
        let upper = Side::of_formula(formula, 1.0).ok_or_else(crosses)?;
        let lower = Side::of_formula(formula, -1.0).ok_or_else(crosses)?;
        let apart = (1..200).all(|i| {
            let s = f64::from(i) / 200.0;
            upper.y(s) > lower.y(s)
        });
        if !apart {
            return Err(crosses());
        }
        Ok(Self {
            name: name.to_owned(),
            deviation: 0.0,
            upper,
            lower,
        })
    }

    /// The section through the points of a coordinate file.
    ///
    /// # Errors
    ///
    /// [`Error::Rough`] where no smooth curve passes all points within 1e-5 of the chord.
    pub fn from_contour(name: &str, contour: &coordinates::Contour) -> Result<Self, Error> {
        let smooth = points::smooth(contour).ok_or_else(|| Error::Rough {
            name: name.to_owned(),
        })?;
        let points::Smooth {
            upper,
            lower,
            deviation,
        } = smooth;
        Ok(Self {
            name: name.to_owned(),
            deviation,
            upper,
            lower,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::{Section, TOLERANCE, fit, parse};

    #[test]
    fn own_coordinate_files_are_fitted_closely() {
        for entry in std::fs::read_dir("airfoils").unwrap() {
            let path = entry.unwrap().path();
            let start = std::time::Instant::now();
            let contour = super::coordinates::read(&std::fs::read(&path).unwrap(), "file").unwrap();
            let read = start.elapsed();
            let section = Section::from_contour("file", &contour).unwrap();
            let smooth = start.elapsed();
            let profiles = fit(&[&section], TOLERANCE).unwrap();
            println!(
                "{path:?}: {} points, {:.2e}, {} + {} control points, {:.2e}; {read:?} {smooth:?} {:?}",
                contour.points.len(),
                section.deviation,
                profiles.upper.count(),
                profiles.lower.count(),
                profiles.deviation,
                start.elapsed()
            );
            assert!(section.deviation <= TOLERANCE && profiles.deviation <= TOLERANCE);
        }
    }

    #[test]
    fn sections_are_fitted_with_few_control_points() {
        for text in [
            "0012", "0006", "0030", "2412", "4412", "6409", "2415", "1408", "23012", "23112", "43018",
            "21012", "9315", "9440", "6106", "2901",
        ] {
            let section = Section::from_formula(text, parse(text).unwrap()).unwrap();
            let profiles = fit(&[&section], TOLERANCE).unwrap();
            println!(
                "{text}: {} + {} control points, {:.2e}",
                profiles.upper.count(),
                profiles.lower.count(),
                profiles.deviation
            );
            assert!(profiles.deviation <= TOLERANCE);
        }
        let a = Section::from_formula("a", parse("2415").unwrap()).unwrap();
        let b = Section::from_formula("b", parse("2412").unwrap()).unwrap();
        let c = Section::from_formula("c", parse("23012").unwrap()).unwrap();
        for set in [vec![&a, &b], vec![&a, &b, &c]] {
            let start = std::time::Instant::now();
            let profiles = fit(&set, TOLERANCE).unwrap();
            println!(
                "{} + {} control points, {:.2e} {:?}",
                profiles.upper.count(),
                profiles.lower.count(),
                profiles.deviation,
                start.elapsed()
            );
        }
    }
}
