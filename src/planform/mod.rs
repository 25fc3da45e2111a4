//! Stations, reference wing, mean aerodynamic chord, setting, and the construction lines that show them.
//!
//! Everything here is the starboard side (y > 0), with the reference root's leading edge at the origin; the port side is
//! its mirror image, and [`Planform::shift`] says where the wing goes.

mod chord;
mod cruise;
mod error;
mod law;
mod lift;
mod lines;
mod mac;
mod reference;
mod station;

pub use chord::ChordLine;
pub use cruise::{CruiseInput, CruiseResult, cruise_incidence};
pub use error::Error;
pub use law::SpanLaw;
pub use lift::{Strip, THIN_SECTION, datcom, geometric_twist, helmbold, lifting_line, zero_lift_angle};
pub use lines::reference_geometry;
pub use mac::{MeanAerodynamicChord, ReferenceWing};
pub use reference::{LineKind, Reference, ReferenceLine, ReferencePoint};
pub use station::{Blend, Station};

use nalgebra::Vector3;

use crate::spec::{
    Cruise, IncidenceAt, Outline, Placing, ReferencePlane, Spec, Step, SurfaceKind, TwistKind, TwistLaw,
};
use crate::spline::Ends;
use mac::{Integrals, Shape};

/// Strips between two stations, for the zero-lift angle of the wing.
const STRIPS: u32 = 40;
/// Largest difference from a twist that is linear in the span \[rad\]: 0.004°.
const TWIST: f64 = 0.004 * std::f64::consts::PI / 180.0;
/// A wing laid out: where every section stands, and the reference wing's figures.
#[derive(Clone, Debug)]
pub struct Planform {
    /// Stations from the root outwards.
    pub stations: Vec<Station>,
    /// Which of them are the spec's own: the root and the end of each panel.
    pub marks: Vec<usize>,
    /// How the wing runs between them.
    pub law: SpanLaw,
    /// Place where the built wing begins: 0 at the centreline, further out at the side of a fuselage.
    pub start: f64,
    /// The panels, as asked.
    pub panels: Vec<PanelShape>,
    /// True where the surface is a fin: its root panel is steeper than 60°, and its reference plane is x-z.
    pub fin: bool,
    /// Figures of the reference wing, both sides counted.
    pub wing: ReferenceWing,
    /// Where the wing goes: this is added to everything in the end \[mm\].
    pub shift: Vector3<f64>,
    /// Incidence asked for where the spec says, typed or found for cruise \[rad\].
    pub incidence: f64,
    /// How the incidence for cruise came about; empty where it was typed.
    pub chain: Vec<Step>,
    /// Figures of one side as the law between the stations makes it, from where the built wing begins.
    pub expected: Expected,
}

/// One panel of the reference wing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PanelShape {
    /// Extent in the reference plane, along y or, for a fin, z \[mm\]; may be 0 for an upright end plate.
    pub width: f64,
    /// Sweep of the line of twist axes, in plan view, or along the panel where it is steep \[rad\].
    pub axis_sweep: f64,
    /// Dihedral \[rad\].
    pub dihedral: f64,
}

impl Planform {
    /// Lays out a spec: stations, reference figures, and the root incidence that gives the section at the mean
    /// aerodynamic chord the incidence asked for. `zero_lift` holds the zero-lift angle of each of the spec's own
    /// stations \[rad\], used for aerodynamic twist only.
    ///
    /// # Errors
    ///
    /// [`enum@Error`] where twist or fuselage cannot be.
    pub fn of(spec: &Spec, zero_lift: &[f64]) -> Result<Self, Error> {
        let fin = spec.reference_plane() == ReferencePlane::Upright;
        let twists = twists(spec, zero_lift)?;
        let (stations, panels) = match spec.outline {
            Outline::Trapezoid => station::lay_out(spec, fin, &twists),
            Outline::Ellipse => {
                let asked = spec
                    .stated
                    .iter()
                    .any(|stated| stated.key == "planform.root_chord");
                station::lay_out_ellipse(spec, &twists, asked)
            }
        };
        let smooth = spec.surface == SurfaceKind::Smooth || spec.outline == Outline::Ellipse;
        let (stations, marks, law) = match (spec.outline, smooth) {
            (Outline::Ellipse, _) => {
                let last = stations.len() - 1;
                let parameters = (0..=last).map(|k| k as f64 / last as f64).collect();
                (
                    stations,
                    vec![0, last],
                    SpanLaw::smooth(parameters, Ends::Continued),
                )
            }
            (Outline::Trapezoid, true) => {
                let total: f64 = spec.panels.iter().map(|panel| panel.span).sum();
                let mut sum = 0.0;
                let mut parameters = vec![0.0];
                for panel in &spec.panels {
                    sum += panel.span;
                    parameters.push(if parameters.len() == spec.panels.len() {
                        1.0
                    } else {
                        sum / total
                    });
                }
                let marks = (0..stations.len()).collect();
                (stations, marks, SpanLaw::smooth(parameters, Ends::Free))
            }
            (Outline::Trapezoid, false) if spec.setting.twist_law == TwistLaw::Linear => {
                let (stations, marks) = station::with_linear_twist(&stations, TWIST);
                (stations, marks, SpanLaw::Straight)
            }
            (Outline::Trapezoid, false) => {
                let marks = (0..stations.len()).collect();
                (stations, marks, SpanLaw::Straight)
            }
        };
        let mut planform = Self {
            stations,
            marks,
            law,
            start: 0.0,
            panels,
            fin,
            wing: ReferenceWing::default(),
            shift: Vector3::zeros(),
            incidence: 0.0,
            chain: Vec::new(),
            expected: Expected::default(),
        };
        let shape = match spec.outline {
            Outline::Trapezoid => Shape::Straight,
            Outline::Ellipse => Shape::Ellipse {
                fraction: spec.panels[0].sweep_at,
                slope: spec.panels[0].sweep.tan(),
            },
        };
        let integrals = Integrals::of(&planform.stations, planform.fin, shape);
        let place = planform.place_of(integrals.offset());
        planform.incidence = spec.setting.incidence;
        if let Some((load, cruise)) = spec
            .load
            .as_ref()
            .zip(spec.cruise)
            .filter(|_| spec.setting.for_cruise)
        {
            let area = 2.0 * integrals.area;
            // the strips are cut out of the twisted wing; how it is turned as a whole makes no difference
            planform.turn(0.0);
            let result = planform.for_cruise(load.weight, cruise, area, place, zero_lift)?;
            planform.incidence = result.incidence;
            planform.chain = result.chain;
        }
        let asked = planform.incidence;
        planform.turn(asked);
        if spec.setting.at == IncidenceAt::Mac || spec.setting.for_cruise {
            // the turn of the section between two stations is not linear in the root's: a few secant steps
            let mut root = asked;
            for _ in 0..40 {
                let missing = asked - planform.chord(place).incidence();
                root += missing;
                planform.turn(root);
                if missing.abs() < 1e-15 {
                    break;
                }
            }
        }
        planform.check_smooth()?;
        planform.wing = ReferenceWing::of(&planform, &integrals, place);
        planform.start = planform.body_side(spec)?;
        planform.expected = planform.expect();
        planform.shift = planform.placing(spec);
        Ok(planform)
    }

    /// The chord line at place `t`: station counted from the root plus the fraction of the way to the next.
    pub fn chord(&self, t: f64) -> ChordLine {
        self.law.chord(&self.stations, t)
    }

    /// Distance from the centreline in the reference plane at place `t` \[mm\].
    pub fn offset(&self, t: f64) -> f64 {
        let axis = self.chord(t).at(self.stations[0].axis_fraction);
        if self.fin { axis.z.abs() } else { axis.y }
    }

    /// The place at a distance from the centreline \[mm\]; the nearest end beyond either.
    pub fn place_of(&self, offset: f64) -> f64 {
        let last = self.stations.len() - 1;
        let Some(k) = (0..last).find(|k| offset < self.offset(*k as f64 + 1.0)) else {
            return last as f64;
        };
        let (mut low, mut high) = (k as f64, k as f64 + 1.0);
        if matches!(self.law, SpanLaw::Straight) {
            let (from, to) = (self.offset(low), self.offset(high));
            return low + ((offset - from) / (to - from)).clamp(0.0, 1.0);
        }
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if self.offset(middle) < offset {
                low = middle
            } else {
                high = middle
            }
        }
        0.5 * (low + high)
    }

    fn turn(&mut self, root: f64) {
        for station in &mut self.stations {
            station.incidence = root + station.twist;
        }
    }

    /// The incidence that carries a weight in cruise: see [`cruise_incidence`]. Strips and sweep are those of the stations.
    fn for_cruise(
        &self,
        weight: f64,
        cruise: Cruise,
        area: f64,
        place: f64,
        zero_lift: &[f64],
    ) -> Result<CruiseResult, Error> {
        let section = |station: &Station| {
            let Blend { inner, outer, share } = station.blend;
            zero_lift[inner] + (zero_lift[outer] - zero_lift[inner]) * share
        };
        let at_mac = self.chord(place).incidence();
        let (mut strips, mut sweep) = (Vec::new(), 0.0);
        for (k, pair) in self.stations.windows(2).enumerate() {
            let offsets = [k as f64, k as f64 + 1.0].map(|t| self.offset(t));
            let middles =
                [&pair[0], &pair[1]].map(|station| station.nominal_leading_edge + 0.5 * station.chord);
            let width = offsets[1] - offsets[0];
            if width <= 0.0 {
                continue;
            }
            sweep +=
                ((middles[1] - middles[0]) / width).atan() * width * 0.5 * (pair[0].chord + pair[1].chord);
            for j in 0..STRIPS {
                let share = (f64::from(j) + 0.5) / f64::from(STRIPS);
                let line = self.chord(k as f64 + share);
                strips.push(Strip {
                    width: width / f64::from(STRIPS) / 1000.0,
                    chord: line.length() / 1000.0,
                    twist: line.incidence() - at_mac,
                    zero_lift: section(&pair[0]) * (1.0 - share) + section(&pair[1]) * share,
                });
            }
        }
        let span = self.panels.iter().map(|panel| panel.width).sum::<f64>() * 2.0;
        cruise_incidence(&CruiseInput {
            weight,
            cruise,
            area: area / 1e6,
            aspect_ratio: span * span / area,
            half_chord_sweep: sweep / (0.5 * area),
            section_slope: THIN_SECTION,
            strips: &strips,
        })
    }

    /// A smooth surface must not swing out between stations by more than a quarter of their chords.
    fn check_smooth(&self) -> Result<(), Error> {
        if matches!(self.law, SpanLaw::Straight) {
            return Ok(());
        }
        for k in 0..self.stations.len() - 1 {
            let (inner, outer) = (self.stations[k].chord, self.stations[k + 1].chord);
            for j in 1..16_u32 {
                let line = self.chord(k as f64 + f64::from(j) / 16.0);
                let chord = (line.trailing_edge.x - line.leading_edge.x).signum() * line.length();
                if chord < 0.75 * inner.min(outer) || chord > 1.25 * inner.max(outer) {
                    let panel = self
                        .marks
                        .iter()
                        .position(|mark| *mark > k)
                        .unwrap_or(self.panels.len());
                    return Err(Error::Overshoot {
                        panel,
                        chord,
                        inner,
                        outer,
                    });
                }
            }
        }
        Ok(())
    }

    /// Place of the fuselage side.
    fn body_side(&self, spec: &Spec) -> Result<f64, Error> {
        let Some(body) = spec.body.filter(|body| !body.carry_through && !self.fin) else {
            return Ok(0.0);
        };
        let side = 0.5 * body.width;
        let (semispan, least) = (0.5 * self.wing.span, 0.02 * 0.5 * self.wing.span);
        if side + least > semispan {
            return Err(Error::Body {
                side,
                least,
                semispan,
            });
        }
        let mut end = 0.0;
        for (k, panel) in self.panels.iter().enumerate() {
            end += panel.width;
            if side <= end {
                if spec.panels[k].is_steep() || spec.panels.get(k + 1).is_some_and(|next| next.is_steep()) {
                    return Err(Error::SteepBody { panel: k + 1 });
                }
                break;
            }
        }
        let t = self.place_of(side);
        // not a sliver beside a station
        let nearest = t.round();
        let near = (self.offset(nearest) - side).abs() < 1e-3;
        Ok(if near { nearest } else { t })
    }

    fn placing(&self, spec: &Spec) -> Vector3<f64> {
        match spec.placing {
            Placing::RootLeadingEdge(point) => Vector3::from(point),
            Placing::AerodynamicCentre([x, y, z]) => {
                let centre = self.wing.mac.aerodynamic_centre();
                // a wing stays in its plane of symmetry; a fin goes where it is put
                let across = if self.fin { y - centre.y } else { 0.0 };
                Vector3::new(x - centre.x, across, z - centre.z)
            }
        }
    }

    /// Figures of one side that straight (or smooth) elements make between the stations, by Simpson's rule: a little
    /// less area than the reference wing's where panels are twisted, because chords between stations are shorter.
    fn expect(&self) -> Expected {
        let mut sums = [0.0; 3];
        let last = self.stations.len() - 1;
        for k in 0..last {
            if (k as f64) + 1.0 <= self.start {
                continue;
            }
            let (from, to) = ((k as f64).max(self.start), k as f64 + 1.0);
            let at = |i: u32| from + (to - from) * f64::from(i) / 32.0;
            for i in (0..32).step_by(2) {
                let offsets = [0, 1, 2].map(|j| self.offset(at(i + j)));
                let chords = [0, 1, 2].map(|j| self.chord(at(i + j)).length());
                // Simpson in t, with dy/dt from the parabola through the three offsets
                let rate = [
                    -3.0 * offsets[0] + 4.0 * offsets[1] - offsets[2],
                    offsets[2] - offsets[0],
                    offsets[0] - 4.0 * offsets[1] + 3.0 * offsets[2],
                ];
                for (j, weight) in [1.0, 4.0, 1.0].into_iter().enumerate() {
                    let width = weight * rate[j] / 6.0;
                    sums[0] += chords[j] * width;
                    sums[1] += chords[j] * chords[j] * width;
                    sums[2] += offsets[j] * chords[j] * width;
                }
            }
        }
        Expected {
            area: sums[0],
            mac: sums[1] / sums[0],
            offset: sums[2] / sums[0],
        }
    }
}

/// Figures of one side as it is built.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Expected {
    /// Area \[mm²\].
    pub area: f64,
    /// Mean aerodynamic chord \[mm\].
    pub mac: f64,
    /// Its distance from the centreline \[mm\].
    pub offset: f64,
}

/// Geometric twist of the spec's own stations relative to the root.
fn twists(spec: &Spec, zero_lift: &[f64]) -> Result<Vec<f64>, Error> {
    let mut twists = vec![0.0];
    for (k, panel) in spec.panels.iter().enumerate() {
        let twist = match spec.setting.twist_kind {
            TwistKind::Geometric => panel.twist,
            TwistKind::Aerodynamic => {
                let last = k + 1 == spec.panels.len();
                let place = if last {
                    "tip".to_owned()
                } else {
                    format!("end of panel {}", k + 1)
                };
                geometric_twist(panel.twist, zero_lift[0], zero_lift[k + 1], &place)?
            }
        };
        twists.push(twist);
    }
    Ok(twists)
}

#[cfg(test)]
mod tests;
