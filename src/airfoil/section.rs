//! A section as an exact curve, whatever it came from.

use super::Error;
use super::coordinates::Contour;
use super::formula::Formula;
use super::points::{self, Closeness};
use super::side::Side;

/// An exact section of unit chord: the nose at (0, 0), the middle of the trailing edge at (1, 0).
#[derive(Clone, Debug)]
pub struct Section {
    /// What it is called.
    pub name: String,
    /// Largest distance of a given point from the section's curve \[chord\]; 0 for formulas.
    pub deviation: f64,
    pub(super) upper: Side,
    pub(super) lower: Side,
    /// The formula, where one defines it.
    pub(super) formula: Option<Formula>,
}

/// Points of a section in the order of the coordinate files.
#[derive(Clone, Debug, PartialEq)]
pub struct Outline {
    /// From the upper trailing edge over the top to the nose and back under the bottom \[chord\].
    pub points: Vec<[f64; 2]>,
    /// Index of the nose, (0, 0).
    pub nose: usize,
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
        let parameters: Vec<f64> = (1..80).map(|i| f64::from(i) / 80.0).collect();
        let apart = (upper.sample(&parameters).iter().zip(lower.sample(&parameters))).all(|(u, l)| *u > l);
        if !apart {
            return Err(crosses());
        }
        Ok(Self {
            name: name.to_owned(),
            deviation: 0.0,
            upper,
            lower,
            formula: Some(formula),
        })
    }

    /// The section through the points of a coordinate file, within 1e-5 of the chord of each, and closer where the
    /// file is printed finely.
    ///
    /// # Errors
    ///
    /// [`Error::Rough`] where no smooth curve passes all points within 1e-5 of the chord.
    pub fn from_contour(name: &str, contour: &Contour) -> Result<Self, Error> {
        Self::fitted(name, contour, Closeness::of_print(contour))
    }

    /// The section through the points of a coordinate file, smoothed: as few knots as keep every point within
    /// `fairing` \[chord\]. [`Section::deviation`] says how far a point moved at most.
    ///
    /// # Errors
    ///
    /// [`Error::Rough`] where no smooth curve passes all points within `fairing`.
    pub fn faired(name: &str, contour: &Contour, fairing: f64) -> Result<Self, Error> {
        Self::fitted(name, contour, Closeness::within(fairing))
    }

    pub(super) fn fitted(name: &str, contour: &Contour, closeness: Closeness) -> Result<Self, Error> {
        let smooth = points::smooth(contour, closeness).ok_or_else(|| Error::Rough {
            name: name.to_owned(),
            within: closeness.limit,
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
            formula: None,
        })
    }

    /// The formula that defines the section, if it is not given by points.
    pub const fn formula(&self) -> Option<&Formula> {
        self.formula.as_ref()
    }

    /// `count` points around the section (at least 13), at even steps of an angle on either side (cosine spacing), the
    /// nose being one of them. With an even count the upper side has one point more.
    pub fn points(&self, count: usize) -> Outline {
        let count = count.max(13);
        let nose = count / 2;
        let steps = |n: usize| -> Vec<f64> {
            // x = (1 - cos φ)/2 is s² for s = sin φ/2
            (0..=n)
                .map(|i| (std::f64::consts::FRAC_PI_2 * i as f64 / n as f64).sin())
                .collect()
        };
        let along = |side: &Side, n: usize| -> Vec<[f64; 2]> {
            let steps = steps(n);
            let y = side.sample(&steps);
            steps.iter().zip(y).map(|(s, y)| [side.x(*s), y]).collect()
        };
        let mut points = along(&self.upper, nose);
        points[0] = [0.0, 0.0];
        points.reverse();
        points.extend(along(&self.lower, count - 1 - nose).into_iter().skip(1));
        Outline { points, nose }
    }
}
