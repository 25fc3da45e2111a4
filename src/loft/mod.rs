//! Exact faces of a wing and the edges they share.
//!
//! A [`Loft`] is the starboard side: sections on shared knots at the stations, joined panel by panel by straight
//! elements, or all by one spline that is curvature-continuous along the span. Its port side is the mirror image (see [`Loft::mirrored`]).

mod round_tip;
mod rows;
mod section;
mod straight;
mod trailing_edge;

pub use round_tip::RoundTip;
pub use section::Section;
pub use trailing_edge::TrailingEdge;

use nalgebra::{Point3, Vector3};
use thiserror::Error;

use crate::airfoil::{Profile, Profiles};
use crate::planform::{Planform, SpanLaw};
use crate::spline::{Curve, Knots, Surface};
use rows::{cut, through};

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
    /// Sections that faces meet in, from the root outwards.
    pub sections: Vec<Section>,
    /// What lies between each pair of them.
    pub strips: Vec<Strip>,
    /// Where the layout's stations lie: strip and its spanwise parameter.
    pub places: Vec<(usize, f64)>,
    /// Whether the trailing edge has a base, so that it needs faces.
    pub blunt: bool,
    /// True for the port side.
    pub port: bool,
    /// The round tip beyond the last section, where there is one.
    pub round: Option<RoundTip>,
    /// Whether some sharp trailing edges were opened to [`LEAST_BASE`] because others are blunt.
    pub opened: bool,
}

/// The way from one section to the next.
#[derive(Clone, Debug, PartialEq)]
pub struct Strip {
    /// Spanwise knots.
    pub knots: Knots,
    /// Control rows between the two sections, not counting them: none where elements are straight.
    pub rows: Vec<Section>,
}

impl Loft {
    /// Lofts `profiles` (the index of each of the spec's stations' in `chosen`) over a planform, with the trailing edge at
    /// least as thick as `trailing_edge` says.
    ///
    /// # Errors
    ///
    /// [`Error::TooThick`] where a panel's sections cross each other.
    ///
    /// # Panics
    ///
    /// Where a smooth law has no control rows, which none has.
    pub fn new(
        planform: &Planform,
        profiles: &Profiles,
        chosen: &[usize],
        trailing_edge: TrailingEdge,
    ) -> Result<Self, Error> {
        let shapes: Vec<Profile> = (planform.stations.iter())
            .map(|station| {
                let [inner, outer] =
                    [station.blend.inner, station.blend.outer].map(|k| &profiles.profiles[chosen[k]]);
                inner.blended(outer, station.blend.share)
            })
            .collect();
        let bases: Vec<f64> = planform
            .stations
            .iter()
            .zip(&shapes)
            .map(|(station, shape)| trailing_edge.base(station, shape))
            .collect();
        let length = |k: usize| bases[k] * planform.stations[k].chord;
        let blunt = (0..bases.len()).any(|k| length(k) > SHARP);
        let opened = blunt && (0..bases.len()).any(|k| length(k) < LEAST_BASE);
        let sections: Vec<Section> = (planform.stations.iter().zip(&shapes).zip(&bases))
            .map(|((station, shape), base)| {
                let base = if blunt {
                    base.max(LEAST_BASE / station.chord)
                } else {
                    0.0
                };
                Section::at(station, &shape.with_base(base))
            })
            .collect();
        check(&sections, planform)?;
        let (upper_knots, lower_knots) = (profiles.upper.clone(), profiles.lower.clone());
        let loft = match &planform.law {
            SpanLaw::Straight => Self {
                upper_knots,
                lower_knots,
                strips: vec![
                    Strip {
                        knots: Knots::bezier(1),
                        rows: Vec::new()
                    };
                    sections.len() - 1
                ],
                places: (0..sections.len())
                    .map(|k| {
                        if k + 1 == sections.len() {
                            (k - 1, 1.0)
                        } else {
                            (k, 0.0)
                        }
                    })
                    .collect(),
                sections,
                blunt,
                port: false,
                round: None,
                opened,
            },
            SpanLaw::Smooth(spline, parameters) => {
                let mut rows = through(spline, &sections);
                let last = rows.pop().expect("a spline has at least two control rows");
                let first = rows.remove(0);
                Self {
                    upper_knots,
                    lower_knots,
                    sections: vec![first, last],
                    strips: vec![Strip {
                        knots: spline.knots.clone(),
                        rows,
                    }],
                    places: parameters.iter().map(|v| (0, *v)).collect(),
                    blunt,
                    port: false,
                    round: None,
                    opened,
                }
            }
        };
        Ok(loft.from(planform))
    }

    /// The loft without what lies inside the fuselage.
    fn from(mut self, planform: &Planform) -> Self {
        let start = planform.start;
        if start <= 0.0 {
            return self;
        }
        let whole = (0..self.places.len() - 1)
            .rev()
            .find(|k| *k as f64 <= start)
            .unwrap_or(0);
        let at_station = start - (whole as f64) < 1e-12;
        if let SpanLaw::Smooth(_, parameters) = &planform.law {
            let v = planform.law.parameter(parameters, start);
            let rows: Vec<Section> = (std::iter::once(self.sections[0].clone()))
                .chain(self.strips[0].rows.iter().cloned())
                .chain(std::iter::once(self.sections[1].clone()))
                .collect();
            if let Some((knots, mut rows)) = cut(&self.strips[0].knots, &rows, v) {
                let last = rows.pop().expect("a cut spline has at least two control rows");
                let first = rows.remove(0);
                self.sections = vec![first, last];
                self.strips = vec![Strip { knots, rows }];
                self.places.drain(..=whole);
                self.places.insert(0, (0, v));
            }
            return self;
        }
        let side = self.sections[whole].towards(&self.sections[whole + 1], start - whole as f64);
        self.sections.drain(..whole);
        self.strips.drain(..whole);
        self.places.drain(..whole);
        self.places.iter_mut().for_each(|place| place.0 -= whole);
        if !at_station {
            self.sections[0] = side;
        }
        self
    }

    /// The mirror image on the other side of the plane of symmetry.
    pub fn mirrored(&self) -> Self {
        self.moved(|p| Point3::new(p.x, -p.y, p.z), !self.port)
    }

    /// The same, moved by `shift` \[mm\].
    pub fn shifted(&self, shift: &Vector3<f64>) -> Self {
        self.moved(|p| p + shift, self.port)
    }

    fn moved(&self, to: impl Fn(&Point3<f64>) -> Point3<f64>, port: bool) -> Self {
        let section = |section: &Section| Section {
            upper: section.upper.iter().map(&to).collect(),
            lower: section.lower.iter().map(&to).collect(),
        };
        let strips = (self.strips.iter())
            .map(|strip| Strip {
                knots: strip.knots.clone(),
                rows: strip.rows.iter().map(section).collect(),
            })
            .collect();
        Self {
            round: self.round.as_ref().map(|tip| tip.moved(&to)),
            sections: self.sections.iter().map(section).collect(),
            strips,
            port,
            ..self.clone()
        }
    }

    /// The same with a round tip, where upper and lower side are on the same knots (else unchanged).
    pub fn with_round_tip(mut self, planform: &Planform) -> Self {
        if self.upper_knots == self.lower_knots {
            let up = planform.stations[planform.stations.len() - 1].up;
            let outwards = up.cross(&Vector3::x());
            let last = &self.sections[self.sections.len() - 1];
            self.round = Some(RoundTip::on(last, &self.upper_knots, &outwards));
        }
        self
    }

    /// Number of panels.
    pub fn panels(&self) -> usize {
        self.sections.len() - 1
    }

    /// The control rows of panel `k`, from its inner to its outer section.
    fn rows(&self, k: usize) -> impl Iterator<Item = &Section> {
        std::iter::once(&self.sections[k])
            .chain(&self.strips[k].rows)
            .chain(std::iter::once(&self.sections[k + 1]))
    }

    /// Upper skin of panel `k`: u from the nose to the trailing edge, v outwards.
    pub fn upper(&self, k: usize) -> Surface {
        let rows = self.rows(k).map(|section| section.upper.clone()).collect();
        Surface {
            u: self.upper_knots.clone(),
            v: self.strips[k].knots.clone(),
            rows,
        }
    }

    /// Lower skin of panel `k`: u from the nose to the trailing edge, v outwards.
    pub fn lower(&self, k: usize) -> Surface {
        let rows = self.rows(k).map(|section| section.lower.clone()).collect();
        Surface {
            u: self.lower_knots.clone(),
            v: self.strips[k].knots.clone(),
            rows,
        }
    }

    /// Base of the trailing edge of panel `k`: u from the upper edge to the lower, v outwards; `None` where it is sharp.
    pub fn base(&self, k: usize) -> Option<Surface> {
        let rows = self
            .rows(k)
            .map(|section| vec![section.upper_tail(), section.lower_tail()])
            .collect();
        self.blunt.then(|| Surface {
            u: Knots::bezier(1),
            v: self.strips[k].knots.clone(),
            rows,
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

/// Every straight element must lead outwards along its panel.
fn check(sections: &[Section], planform: &Planform) -> Result<(), Error> {
    for (k, pair) in sections.windows(2).enumerate() {
        let whole = planform.stations[k + 1].axis - planform.stations[k].axis;
        let outwards = Vector3::new(0.0, whole.y, whole.z).normalize();
        let whole = whole.dot(&outwards);
        let elements = pair[0]
            .upper
            .iter()
            .zip(&pair[1].upper)
            .chain(pair[0].lower.iter().zip(&pair[1].lower));
        let shortest = elements
            .map(|(a, b)| (b - a).dot(&outwards))
            .fold(f64::INFINITY, f64::min);
        if shortest < 1e-3 * whole {
            let panel = planform
                .marks
                .iter()
                .position(|mark| *mark > k)
                .unwrap_or(planform.marks.len() - 1);
            return Err(Error::TooThick {
                panel,
                excess: -shortest,
                least: whole - shortest,
            });
        }
    }
    Ok(())
}
