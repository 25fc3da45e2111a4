//! Exact faces of a wing and the edges they share.
//!
//! A [`Loft`] is the starboard side: sections on shared knots at the stations, joined panel by panel by straight
//! elements, or all by one spline that is curvature-continuous along the span. Its port side is the mirror image (see [`Loft::mirrored`]).

use nalgebra::{Point3, Vector3};
use thiserror::Error;

use crate::airfoil::{Profile, Profiles};
use crate::planform::{Planform, SpanLaw, Station};
use crate::spline::{Curve, Interpolation, Knots, Surface, WeightedSurface, part_from};

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

/// A tip of half ellipses on the last section.
///
/// Upper and lower side are on the same knots then. For each pair of their control points U and L, with r = |U - L|/2 and
/// the outward direction d, the control points are U, U + r d, (U + L)/2 + r d, L + r d, L with weights 1, √½, 1, √½, 1: at
/// every chord station half an ellipse from the upper to the lower side.
#[derive(Clone, Debug, PartialEq)]
pub struct RoundTip {
    /// The surface: u from the nose to the trailing edge, v from the upper side to the lower.
    pub surface: WeightedSurface,
    /// How far it stands out \[mm\].
    pub reach: f64,
}

impl RoundTip {
    fn on(section: &Section, knots: &Knots, outwards: &Vector3<f64>) -> Self {
        let mut rows = vec![section.upper.clone()];
        let radius = |i: usize| 0.5 * (section.upper[i] - section.lower[i]).norm();
        let count = section.upper.len();
        let out = |points: &dyn Fn(usize) -> Point3<f64>| {
            (0..count).map(|i| points(i) + outwards * radius(i)).collect()
        };
        rows.push(out(&|i| section.upper[i]));
        rows.push(out(&|i| nalgebra::center(&section.upper[i], &section.lower[i])));
        rows.push(out(&|i| section.lower[i]));
        rows.push(section.lower.clone());
        let across =
            Knots::clamped(2, 0.0, 1.0, &[0.5, 0.5]).expect("a double knot in a parabola is allowed");
        let half = std::f64::consts::FRAC_1_SQRT_2;
        Self {
            surface: WeightedSurface {
                surface: Surface {
                    u: knots.clone(),
                    v: across,
                    rows,
                },
                weights: vec![1.0, half, 1.0, half, 1.0],
            },
            reach: (0..count).map(radius).fold(0.0, f64::max),
        }
    }

    /// The half ellipse at the trailing edge, from the upper edge of the base to the lower: control points.
    pub fn rear(&self) -> Vec<Point3<f64>> {
        self.surface.surface.column_curve(true).points
    }

    fn moved(&self, to: impl Fn(&Point3<f64>) -> Point3<f64>) -> Self {
        let mut tip = self.clone();
        for point in tip.surface.surface.rows.iter_mut().flatten() {
            *point = to(point);
        }
        tip
    }
}

/// The way from one section to the next.
#[derive(Clone, Debug, PartialEq)]
pub struct Strip {
    /// Spanwise knots.
    pub knots: Knots,
    /// Control rows between the two sections, not counting them: none where elements are straight.
    pub rows: Vec<Section>,
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

    /// The section a share of the way along straight elements to another.
    fn towards(&self, other: &Self, share: f64) -> Self {
        let mix = |a: &[Point3<f64>], b: &[Point3<f64>]| {
            a.iter().zip(b).map(|(a, b)| a + (b - a) * share).collect()
        };
        Self {
            upper: mix(&self.upper, &other.upper),
            lower: mix(&self.lower, &other.lower),
        }
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

    /// A loft with straight elements only that is within `tolerance` \[mm\] of this one, and how far it is from it.
    ///
    /// Strips that are curved along the span are cut into as many straight ones as that takes.
    pub fn straightened(&self, tolerance: f64) -> (Self, f64) {
        let mut loft = Self {
            sections: vec![self.sections[0].clone()],
            strips: Vec::new(),
            ..self.clone()
        };
        let mut worst = 0.0_f64;
        for k in 0..self.panels() {
            if self.strips[k].knots.degree() > 1 {
                let skins = [self.upper(k), self.lower(k)];
                let mut parts = 4_u32;
                let mut deviation = sag(&skins, parts);
                while deviation > tolerance && parts < 2000 {
                    parts = (parts + 1).max(parts * 6 / 5);
                    deviation = sag(&skins, parts);
                }
                worst = worst.max(deviation);
                let (from, to) = self.strips[k].knots.range();
                for j in 1..parts {
                    let v = from + (to - from) * f64::from(j) / f64::from(parts);
                    loft.sections.push(self.section_at(k, v));
                }
            }
            loft.sections.push(self.sections[k + 1].clone());
        }
        loft.strips = vec![
            Strip {
                knots: Knots::bezier(1),
                rows: Vec::new()
            };
            loft.sections.len() - 1
        ];
        loft.places.clear();
        (loft, worst)
    }

    /// The section of panel `k` at the spanwise parameter `v`, as control points.
    pub fn section_at(&self, k: usize, v: f64) -> Section {
        let knots = &self.strips[k].knots;
        let (first, basis) = knots.basis(v);
        let rows: Vec<&Section> = self.rows(k).skip(first).take(knots.degree() + 1).collect();
        let mix = |pick: fn(&Section) -> &Vec<Point3<f64>>| -> Vec<Point3<f64>> {
            (0..pick(rows[0]).len())
                .map(|i| {
                    let weighted = rows.iter().zip(&basis);
                    Point3::from(
                        weighted.fold(Vector3::zeros(), |sum, (row, b)| sum + pick(row)[i].coords * *b),
                    )
                })
                .collect()
        };
        let mut section = Section {
            upper: mix(|s| &s.upper),
            lower: mix(|s| &s.lower),
        };
        section.lower[0] = section.upper[0];
        section
    }
}

/// How thick the trailing edge is to be.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TrailingEdge {
    /// At least this \[mm\]: `None` as the sections define it, 0 sharp.
    pub thickness: Option<f64>,
    /// At least this part of the chord \[-\].
    pub ratio: Option<f64>,
}

impl TrailingEdge {
    /// Thickness of the base at a station \[chord\].
    fn base(self, station: &Station, profile: &Profile) -> f64 {
        let ratio = self.ratio.unwrap_or(0.0) / station.mitre;
        match self.thickness {
            None => profile.base().max(ratio),
            Some(0.0) => ratio,
            Some(least) => profile
                .base()
                .max(least / (station.chord * station.mitre))
                .max(ratio),
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

/// Control rows of the spline through sections.
fn through(spline: &Interpolation, sections: &[Section]) -> Vec<Section> {
    let column = |pick: fn(&Section) -> &Vec<Point3<f64>>, i: usize| -> Vec<Point3<f64>> {
        spline.through(
            &sections
                .iter()
                .map(|section| pick(section)[i])
                .collect::<Vec<_>>(),
        )
    };
    let columns = |pick: fn(&Section) -> &Vec<Point3<f64>>| -> Vec<Vec<Point3<f64>>> {
        (0..pick(&sections[0]).len()).map(|i| column(pick, i)).collect()
    };
    transposed(&columns(|s| &s.upper), &columns(|s| &s.lower))
}

/// The part of a spline of control rows from `v` on.
fn cut(knots: &Knots, rows: &[Section], v: f64) -> Option<(Knots, Vec<Section>)> {
    let mut kept = None;
    let mut columns = |pick: fn(&Section) -> &Vec<Point3<f64>>| -> Option<Vec<Vec<Point3<f64>>>> {
        (0..pick(&rows[0]).len())
            .map(|i| {
                let column: Vec<Point3<f64>> = rows.iter().map(|row| pick(row)[i]).collect();
                let (knots, control) = part_from(knots, &column, v)?;
                kept = Some(knots);
                Some(control)
            })
            .collect()
    };
    let (upper, lower) = (columns(|s| &s.upper)?, columns(|s| &s.lower)?);
    Some((kept?, transposed(&upper, &lower)))
}

fn transposed(upper: &[Vec<Point3<f64>>], lower: &[Vec<Point3<f64>>]) -> Vec<Section> {
    (0..upper[0].len())
        .map(|row| {
            let mut section = Section {
                upper: upper.iter().map(|column| column[row]).collect(),
                lower: lower.iter().map(|column| column[row]).collect(),
            };
            section.lower[0] = section.upper[0];
            section
        })
        .collect()
}

/// Largest distance between a strip's skins and straight elements between `parts` equal parts of it \[mm\].
fn sag(skins: &[Surface; 2], parts: u32) -> f64 {
    let mut worst = 0.0_f64;
    for skin in skins {
        let (from, to) = skin.v.range();
        for u in [0.0, 0.05, 0.15, 0.3, 0.5, 0.7, 0.85, 1.0] {
            for j in 0..parts {
                let v = |share: f64| from + (to - from) * (f64::from(j) + share) / f64::from(parts);
                let (a, b) = (skin.at(u, v(0.0)), skin.at(u, v(1.0)));
                for share in [0.25, 0.5, 0.75] {
                    let off = skin.at(u, v(share)) - a;
                    // what matters is the distance from the element, not the place along it
                    worst = worst.max(off.cross(&(b - a)).norm() / (b - a).norm());
                }
            }
        }
    }
    worst
}
