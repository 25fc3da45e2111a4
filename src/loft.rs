//! Exact faces of a wing and the edges they share.
//!
//! A [`Loft`] is the starboard side: sections on shared knots at the stations, joined panel by panel by straight
//! elements. Its port side is the mirror image (see [`Loft::mirrored`]).

use nalgebra::Point3;
use thiserror::Error;

use crate::airfoil::{Profile, Profiles};
use crate::planform::{Planform, Station};
use crate::spline::{Curve, Knots, Surface};

/// Least trailing-edge thickness that is built where some station's is blunt \[mm\]: readers merge what is finer.
pub const LEAST_BASE: f64 = 0.01;
/// Trailing edges no thicker than this count as sharp \[mm\].
const SHARP: f64 = 1e-7;

/// What can be wrong with a loft.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Error {
    /// The planes of a panel's two sections cross inside the section.
    #[error(
        "panel {panel}: its sections are too thick for its length: their planes cross {excess:.3} mm inside the wing; make the panel longer than {least:.1} mm, its chord smaller or its turn of dihedral gentler"
    )]
    TooThick {
        /// Panel, counted from 1.
        panel: usize,
        /// How far the planes cross \[mm\].
        excess: f64,
        /// Length from which they would not \[mm\].
        least: f64,
    },
}

/// The starboard side (or, mirrored, the port side) of a wing as exact geometry.
#[derive(Clone, Debug, PartialEq)]
pub struct Loft {
    /// Knots of the upper sides, nose to trailing edge.
    pub upper_knots: Knots,
    /// Knots of the lower sides, nose to trailing edge.
    pub lower_knots: Knots,
    /// Sections from the root outwards.
    pub sections: Vec<Section>,
    /// Whether the trailing edge has a base, so that it needs faces.
    pub blunt: bool,
    /// True for the port side.
    pub port: bool,
    /// Whether some sharp trailing edges were opened to [`LEAST_BASE`] because others are blunt.
    pub opened: bool,
}

/// A section placed in space.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// Control points of the upper side \[mm\].
    pub upper: Vec<Point3<f64>>,
    /// Control points of the lower side \[mm\].
    pub lower: Vec<Point3<f64>>,
}

impl Section {
    fn at(station: &Station, profile: &Profile) -> Self {
        let place = |points: &[[f64; 2]]| points.iter().map(|point| station.place(*point)).collect();
        let mut section = Self {
            upper: place(&profile.upper),
            lower: place(&profile.lower),
        };
        section.lower[0] = section.upper[0];
        section
    }

    /// The chord line's front end: where upper and lower side meet \[mm\].
    pub fn nose(&self) -> Point3<f64> {
        self.upper[0]
    }

    /// Upper edge of the base \[mm\].
    pub fn upper_tail(&self) -> Point3<f64> {
        self.upper[self.upper.len() - 1]
    }

    /// Lower edge of the base; where the trailing edge is sharp the same as the upper \[mm\].
    pub fn lower_tail(&self) -> Point3<f64> {
        self.lower[self.lower.len() - 1]
    }
}

impl Loft {
    /// Lofts `profiles` (the index of each station's in `chosen`) over a planform, with the trailing edge at least
    /// `trailing_edge` \[mm\] thick: `None` as the sections define it, 0 sharp.
    ///
    /// # Errors
    ///
    /// [`Error::TooThick`] where a panel's sections cross each other.
    pub fn new(
        planform: &Planform,
        profiles: &Profiles,
        chosen: &[usize],
        trailing_edge: Option<f64>,
    ) -> Result<Self, Error> {
        let base = |station: &Station, profile: &Profile| match trailing_edge {
            None => profile.base(),
            Some(0.0) => 0.0,
            Some(least) => profile.base().max(least / (station.chord * station.mitre)),
        };
        let stations = planform.stations.iter().zip(chosen);
        let bases: Vec<f64> = stations
            .map(|(station, k)| base(station, &profiles.profiles[*k]))
            .collect();
        let length = |k: usize| bases[k] * planform.stations[k].chord;
        let blunt = (0..bases.len()).any(|k| length(k) > SHARP);
        let opened = blunt && (0..bases.len()).any(|k| length(k) < LEAST_BASE);
        let sections = (planform.stations.iter().zip(chosen).zip(&bases))
            .map(|((station, k), base)| {
                let base = if blunt {
                    base.max(LEAST_BASE / station.chord)
                } else {
                    0.0
                };
                Section::at(station, &profiles.profiles[*k].with_base(base))
            })
            .collect();
        let loft = Self {
            upper_knots: profiles.upper.clone(),
            lower_knots: profiles.lower.clone(),
            sections,
            blunt,
            port: false,
            opened,
        };
        loft.check(planform)?;
        Ok(loft)
    }

    /// Every straight element must lead outwards along its panel.
    fn check(&self, planform: &Planform) -> Result<(), Error> {
        for (k, pair) in self.sections.windows(2).enumerate() {
            let dihedral = planform.panels[k].dihedral;
            let outwards = nalgebra::Vector3::new(0.0, dihedral.cos(), dihedral.sin());
            let whole = (planform.stations[k + 1].axis - planform.stations[k].axis).dot(&outwards);
            let elements = pair[0]
                .upper
                .iter()
                .zip(&pair[1].upper)
                .chain(pair[0].lower.iter().zip(&pair[1].lower));
            let shortest = elements
                .map(|(a, b)| (b - a).dot(&outwards))
                .fold(f64::INFINITY, f64::min);
            if shortest < 1e-3 * whole {
                return Err(Error::TooThick {
                    panel: k + 1,
                    excess: -shortest,
                    least: whole - shortest,
                });
            }
        }
        Ok(())
    }

    /// The mirror image on the other side of the plane of symmetry.
    pub fn mirrored(&self) -> Self {
        let mirror = |points: &[Point3<f64>]| points.iter().map(|p| Point3::new(p.x, -p.y, p.z)).collect();
        let sections = (self.sections.iter())
            .map(|section| Section {
                upper: mirror(&section.upper),
                lower: mirror(&section.lower),
            })
            .collect();
        Self {
            sections,
            port: !self.port,
            ..self.clone()
        }
    }

    /// Number of panels.
    pub fn panels(&self) -> usize {
        self.sections.len() - 1
    }

    /// Upper skin of panel `k`: u from the nose to the trailing edge, v outwards.
    pub fn upper(&self, k: usize) -> Surface {
        Surface::ruled(
            self.upper_knots.clone(),
            self.sections[k].upper.clone(),
            self.sections[k + 1].upper.clone(),
        )
    }

    /// Lower skin of panel `k`: u from the nose to the trailing edge, v outwards.
    pub fn lower(&self, k: usize) -> Surface {
        Surface::ruled(
            self.lower_knots.clone(),
            self.sections[k].lower.clone(),
            self.sections[k + 1].lower.clone(),
        )
    }

    /// Base of the trailing edge of panel `k`: u from the upper edge to the lower, v outwards; `None` where it is sharp.
    pub fn base(&self, k: usize) -> Option<Surface> {
        let row = |section: &Section| vec![section.upper_tail(), section.lower_tail()];
        self.blunt.then(|| {
            Surface::ruled(
                Knots::bezier(1),
                row(&self.sections[k]),
                row(&self.sections[k + 1]),
            )
        })
    }

    /// Upper side of section `k` as a curve.
    pub fn upper_curve(&self, k: usize) -> Curve {
        Curve {
            knots: self.upper_knots.clone(),
            points: self.sections[k].upper.clone(),
        }
    }

    /// Lower side of section `k` as a curve.
    pub fn lower_curve(&self, k: usize) -> Curve {
        Curve {
            knots: self.lower_knots.clone(),
            points: self.sections[k].lower.clone(),
        }
    }
}
