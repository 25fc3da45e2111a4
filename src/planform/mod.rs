//! Stations, reference wing, mean aerodynamic chord, setting, and the construction lines that show them.
//!
//! Everything here is the starboard side (y > 0); the port side is its mirror image.

mod chord;
mod lines;
mod reference;
mod station;

pub use chord::ChordLine;
pub use lines::reference_geometry;
pub use reference::{LineKind, Reference, ReferenceLine, ReferencePoint};
pub use station::Station;

use nalgebra::Point3;

use crate::spec::{IncidenceAt, ReferencePlane, Spec};
use station::lay_out;

/// A wing laid out: where every section stands, and the reference wing's figures.
#[derive(Clone, Debug, PartialEq)]
pub struct Planform {
    /// Stations from the root outwards, one more than panels.
    pub stations: Vec<Station>,
    /// The panels between them, as asked.
    pub panels: Vec<PanelShape>,
    /// True where the surface is a fin: its root panel is steeper than 60°, and its reference plane is x-z.
    pub fin: bool,
    /// Figures of the reference wing, both sides counted.
    pub wing: ReferenceWing,
}

/// One panel of the reference wing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PanelShape {
    /// Extent in the reference plane, along y or, for a fin, z \[mm\]; may be 0 for an upright end plate.
    pub width: f64,
    /// Length that its sweep is measured along: plan view, or along the panel where it is steep \[mm\].
    pub run: f64,
    /// Sweep of the line of twist axes \[rad\].
    pub axis_sweep: f64,
    /// Dihedral \[rad\].
    pub dihedral: f64,
}

/// Figures of the reference wing: to the centreline, with a square tip, both sides counted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ReferenceWing {
    /// Area in the reference plane \[mm²\].
    pub area: f64,
    /// Span in the reference plane \[mm\].
    pub span: f64,
    /// Chord on the centreline \[mm\].
    pub root_chord: f64,
    /// Chord at the outer end of the last panel \[mm\].
    pub tip_chord: f64,
    /// Mean aerodynamic chord.
    pub mac: MeanAerodynamicChord,
}

impl ReferenceWing {
    /// Span² / area \[-\].
    pub fn aspect_ratio(&self) -> f64 {
        self.span * self.span / self.area
    }

    /// Tip chord / root chord \[-\].
    pub fn taper_ratio(&self) -> f64 {
        self.tip_chord / self.root_chord
    }

    /// Area / span \[mm\].
    pub fn mean_chord(&self) -> f64 {
        self.area / self.span
    }
}

/// The mean aerodynamic chord of one side.
///
/// ```text
/// c̄ = ∫ c² dy / ∫ c dy    y = ∫ y c dy / ∫ c dy    x_LE = ∫ x_LE c dy / ∫ c dy
/// ```
///
/// Source: USAF Stability and Control DATCOM, sec. 2.2.2 (definition of the mean aerodynamic chord); formula from memory.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MeanAerodynamicChord {
    /// Length \[mm\].
    pub length: f64,
    /// Distance from the centreline in the reference plane \[mm\].
    pub offset: f64,
    /// Panel it lies on, counted from 0, and the fraction of that panel's width.
    pub place: (usize, f64),
    /// Its leading edge: at the height and with the turn of the built section at `offset` \[mm\].
    pub leading_edge: Point3<f64>,
    /// Its trailing edge, `length` away \[mm\].
    pub trailing_edge: Point3<f64>,
    /// Incidence of the built section at `offset` \[rad\].
    pub incidence: f64,
    /// Length of the built section's chord at `offset` \[mm\]: that of a panel with straight elements.
    pub local_chord: f64,
}

impl MeanAerodynamicChord {
    /// Its quarter point, the aerodynamic centre of thin-aerofoil theory \[mm\].
    pub fn aerodynamic_centre(&self) -> Point3<f64> {
        self.leading_edge + (self.trailing_edge - self.leading_edge) * 0.25
    }
}

impl Planform {
    /// Lays out a spec: stations, reference figures, and the root incidence that gives the section at the mean
    /// aerodynamic chord the incidence asked for.
    pub fn of(spec: &Spec) -> Self {
        let fin = spec.reference_plane() == ReferencePlane::Upright;
        let (mut stations, panels) = lay_out(spec, fin);
        let integrals = Integrals::of(&stations, &panels);
        let place = integrals.place(&panels);
        let turn_all = |stations: &mut [Station], root: f64| {
            for (k, station) in stations.iter_mut().enumerate() {
                let twist = if k == 0 { 0.0 } else { spec.panels[k - 1].twist };
                station.incidence = root + twist;
            }
        };
        turn_all(&mut stations, spec.setting.incidence);
        if spec.setting.at == IncidenceAt::Mac {
            // the turn of the section between two stations is not linear in the root's: a few secant steps
            let mut root = spec.setting.incidence;
            for _ in 0..40 {
                let missing = spec.setting.incidence - ChordLine::between(&stations, place).incidence();
                root += missing;
                turn_all(&mut stations, root);
                if missing.abs() < 1e-15 {
                    break;
                }
            }
        }
        let local = ChordLine::between(&stations, place);
        let length = integrals.square / integrals.area;
        let leading_edge = {
            // where the wing is cranked the mean chord lies ahead of or behind the local one
            let (panel, fraction) = place;
            let nominal = |k: usize| stations[k].nominal_leading_edge;
            let local_nominal = nominal(panel) * (1.0 - fraction) + nominal(panel + 1) * fraction;
            let mut point = local.leading_edge;
            point.x += integrals.leading_edge / integrals.area - local_nominal;
            point
        };
        let mac = MeanAerodynamicChord {
            length,
            offset: integrals.moment / integrals.area,
            place,
            leading_edge,
            trailing_edge: leading_edge + local.direction() * length,
            incidence: local.incidence(),
            local_chord: local.length(),
        };
        let wing = ReferenceWing {
            area: 2.0 * integrals.area,
            span: 2.0 * panels.iter().map(|panel| panel.width).sum::<f64>(),
            root_chord: stations[0].chord,
            tip_chord: stations[stations.len() - 1].chord,
            mac,
        };
        Self {
            stations,
            panels,
            fin,
            wing,
        }
    }

    /// Area that both sides' chords enclose in the reference plane when every panel has straight elements \[mm²\]: a
    /// little less than the reference area where panels are twisted, because chords between the stations are shorter.
    pub fn straight_element_area(&self) -> f64 {
        // Simpson's rule on 64 intervals a panel: the integrand is smooth
        let mut area = 0.0;
        for (k, panel) in self.panels.iter().enumerate() {
            let mut sum = 0.0;
            for i in 0..=64_u32 {
                let weight = if i == 0 || i == 64 {
                    1.0
                } else {
                    f64::from(2 + 2 * (i % 2))
                };
                sum += weight * ChordLine::between(&self.stations, (k, f64::from(i) / 64.0)).length();
            }
            area += sum / 192.0 * panel.width;
        }
        2.0 * area
    }
}

/// Integrals over one side of the reference wing, chord and leading edge linear between stations.
struct Integrals {
    area: f64,
    square: f64,
    moment: f64,
    leading_edge: f64,
}

impl Integrals {
    fn of(stations: &[Station], panels: &[PanelShape]) -> Self {
        let mut sums = Self {
            area: 0.0,
            square: 0.0,
            moment: 0.0,
            leading_edge: 0.0,
        };
        let mut start = 0.0;
        for (pair, panel) in stations.windows(2).zip(panels) {
            let (a, b) = (pair[0].chord, pair[1].chord);
            let (p, q) = (pair[0].nominal_leading_edge, pair[1].nominal_leading_edge);
            let w = panel.width;
            sums.area += w * (a + b) / 2.0;
            sums.square += w * (a * a + a * b + b * b) / 3.0;
            sums.moment += w * (start * (a + b) / 2.0 + w * (a + 2.0 * b) / 6.0);
            sums.leading_edge += w * (p * (2.0 * a + b) + q * (a + 2.0 * b)) / 6.0;
            start += w;
        }
        sums
    }

    /// Panel and fraction of its width at the mean aerodynamic chord.
    fn place(&self, panels: &[PanelShape]) -> (usize, f64) {
        let offset = self.moment / self.area;
        let mut start = 0.0;
        for (k, panel) in panels.iter().enumerate() {
            if offset < start + panel.width {
                return (k, (offset - start) / panel.width);
            }
            start += panel.width;
        }
        (panels.len() - 1, 1.0)
    }
}

#[cfg(test)]
mod tests;
