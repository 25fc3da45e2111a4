//! Changes to a section: thickness, camber, mirrored, closing of the trailing edge.

use super::Error;
use super::coordinates::Contour;
use super::points::{Closeness, EXACT, WORST};
use super::section::Section;
use super::thickness::Closing;

/// What to change in a section.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Changes {
    /// Greatest thickness \[chord\]. In a formula it is the thickness ratio, which the digits give in per cent.
    pub thickness: Option<f64>,
    /// Greatest camber in size \[chord\]; 0 makes the section symmetric.
    pub camber: Option<f64>,
    /// Turned upside down, as for a tail that lifts downwards.
    pub inverted: bool,
    /// Closing of the trailing edge, for formulas.
    pub closing: Option<Closing>,
}

/// A section of points of less camber than this has none that could be scaled \[chord\].
const STRAIGHT: f64 = 1e-5;
/// Points a contour is sampled at before it is scaled.
const SAMPLES: usize = 401;

impl Section {
    /// The section with changes. A formula is changed in its constants, so that the result is exact. Of a section of
    /// points the middle and the half distance between the sides at equal x are scaled apart; mirroring is exact.
    ///
    /// # Errors
    ///
    /// [`Error::Change`] where the section cannot have what is asked for, [`Error::Crosses`] or [`Error::Rough`] where
    /// the changed section is none.
    pub fn with(&self, changes: &Changes) -> Result<Self, Error> {
        let refuse = |reason: String| Error::Change {
            name: self.name.clone(),
            reason,
        };
        if let Some(thickness) = changes.thickness
            && !(0.01..=0.40).contains(&thickness)
        {
            return Err(refuse(format!(
                "a thickness of {thickness} of the chord is asked for, and 0.01 to 0.40 can be built"
            )));
        }
        if let Some(camber) = changes.camber
            && !(0.0..=0.15).contains(&camber)
        {
            return Err(refuse(format!(
                "a camber of {camber} of the chord is asked for, and 0 to 0.15 can be built; mirror it with `inverted`"
            )));
        }
        let own = self.camber_line().greatest().value;
        let camber = match changes.camber {
            Some(asked) if own.abs() < STRAIGHT && asked > 0.0 => {
                return Err(refuse(format!(
                    "it is symmetric, so there is no camber line to scale to {asked}; choose a cambered section"
                )));
            }
            Some(_) if own.abs() < STRAIGHT => 1.0,
            Some(asked) => asked / own.abs(),
            None => 1.0,
        };
        match self.formula {
            Some(mut formula) => {
                formula.thickness.ratio = changes.thickness.unwrap_or(formula.thickness.ratio);
                formula.thickness.closing = changes.closing.unwrap_or(formula.thickness.closing);
                let sign = if changes.inverted { -1.0 } else { 1.0 };
                formula.camber = formula.camber.scaled(camber * sign);
                Self::from_formula(&self.name, formula)
            }
            None if changes.closing.is_some() => Err(refuse(
                "its trailing edge is as its points give it, so there is no formula to close; give the wing a trailing-edge thickness"
                    .to_owned(),
            )),
            None => {
                let mut section = self.clone();
                if changes.thickness.is_some() || changes.camber.is_some() {
                    let mut thickness = changes.thickness.map_or(1.0, |asked| asked / self.thickness().value);
                    let mut camber = camber;
                    // each changes the other's measure a little, so the factors are corrected by what came out
                    for _ in 0..3 {
                        section = self.scaled(thickness, camber)?;
                        thickness *= changes.thickness.map_or(1.0, |asked| asked / section.thickness().value);
                        let found = section.camber_line().greatest().value.abs();
                        camber *= changes.camber.map_or(1.0, |asked| if asked > 0.0 { asked / found } else { 1.0 });
                    }
                }
                if changes.inverted {
                    (section.upper, section.lower) = (section.lower.mirrored(), section.upper.mirrored());
                }
                Ok(section)
            }
        }
    }

    /// A section of points with its thickness and camber at equal x multiplied by factors.
    fn scaled(&self, thickness: f64, camber: f64) -> Result<Self, Error> {
        let Some((least, low, high)) = self.upper.root_range(&self.lower) else {
            return Ok(self.clone());
        };
        // y(σ) of the whole contour: its even part is the middle between the sides, its odd part half their distance
        let reach = high.min(-low);
        let mut points: Vec<[f64; 2]> = (0..SAMPLES)
            .map(|i| {
                let angle = std::f64::consts::PI * (i as f64 / (SAMPLES - 1) as f64 - 0.5);
                let sigma = -reach * angle.sin();
                let [above, below] = [
                    self.upper.y_by_root(sigma.abs()),
                    self.lower.y_by_root(-sigma.abs()),
                ];
                let half = 0.5 * (above - below) * sigma.signum();
                [
                    least + sigma * sigma,
                    0.5 * (above + below) * camber + half * thickness,
                ]
            })
            .collect();
        // into the chord frame again: the nose stays the foremost point's, the trailing edge's middle goes to (1, 0)
        let (first, last) = (points[0], points[SAMPLES - 1]);
        let end = [0.5 * (first[0] + last[0]), 0.5 * (first[1] + last[1])];
        let nose = crossing(&points, SAMPLES / 2);
        let chord = [end[0] - nose[0], end[1] - nose[1]];
        let square = chord[0] * chord[0] + chord[1] * chord[1];
        for [x, y] in &mut points {
            let (dx, dy) = (*x - nose[0], *y - nose[1]);
            *x = (dx * chord[0] + dy * chord[1]) / square;
            *y = (dy * chord[0] - dx * chord[1]) / square;
        }
        let nose = (0..SAMPLES)
            .min_by(|a, b| points[*a][0].total_cmp(&points[*b][0]))
            .unwrap_or(SAMPLES / 2);
        let contour = Contour {
            title: self.name.clone(),
            points,
            nose,
            decimals: 12,
            notes: Vec::new(),
            moved: None,
        };
        let closeness = Closeness {
            aim: EXACT,
            limit: WORST,
        };
        let mut section = Self::fitted(&self.name, &contour, closeness)?;
        section.deviation += self.deviation * thickness.abs().max(camber.abs());
        Ok(section)
    }

    /// How the trailing edge is closed, in words.
    pub fn closing_note(&self) -> String {
        let Some(formula) = &self.formula else {
            let base = self.figures().base;
            return if base > 0.0 {
                format!(
                    "trailing edge as in the file, with a base of {:.3} % of the chord",
                    100.0 * base
                )
            } else {
                "trailing edge as in the file, sharp".to_owned()
            };
        };
        formula.thickness.closing_note()
    }
}

/// Where the contour crosses y = 0 nearest to an index, else the point of that index.
fn crossing(points: &[[f64; 2]], index: usize) -> [f64; 2] {
    (points.windows(2).enumerate())
        .filter(|(_, pair)| pair[0][1] >= 0.0 && pair[1][1] < 0.0)
        .min_by_key(|(i, _)| i.abs_diff(index))
        .map_or(points[index], |(_, pair)| {
            let (a, b) = (pair[0], pair[1]);
            let share = a[1] / (a[1] - b[1]);
            [a[0] + share * (b[0] - a[0]), 0.0]
        })
}
