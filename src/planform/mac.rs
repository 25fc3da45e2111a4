//! The reference wing and its mean aerodynamic chord.

use nalgebra::Point3;

use super::{Planform, Station};

/// Figures of the reference wing: to the centreline, with a square tip, both sides counted.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
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

    pub(super) fn of(planform: &Planform, integrals: &Integrals, place: f64) -> Self {
        let stations = &planform.stations;
        let local = planform.chord(place);
        let length = integrals.square / integrals.area;
        // where the wing is cranked the mean chord lies ahead of or behind the local one
        let mut leading_edge = local.leading_edge;
        leading_edge.x += integrals.leading_edge / integrals.area - integrals.nominal_at_mac;
        let mac = MeanAerodynamicChord {
            length,
            offset: integrals.offset(),
            place,
            leading_edge,
            trailing_edge: leading_edge + local.direction() * length,
            incidence: local.incidence(),
            local_chord: local.length(),
        };
        Self {
            area: 2.0 * integrals.area,
            span: 2.0 * planform.panels.iter().map(|panel| panel.width).sum::<f64>(),
            root_chord: stations[0].chord,
            tip_chord: stations[stations.len() - 1].chord,
            mac,
        }
    }
}

/// The mean aerodynamic chord of one side.
///
/// ```text
/// c̄ = ∫ c² dy / ∫ c dy    y = ∫ y c dy / ∫ c dy    x_LE = ∫ x_LE c dy / ∫ c dy
/// ```
///
/// Source: USAF Stability and Control DATCOM, sec. 2.2.2 (definition of the mean aerodynamic chord); formula from memory.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct MeanAerodynamicChord {
    /// Length \[mm\].
    pub length: f64,
    /// Distance from the centreline in the reference plane \[mm\].
    pub offset: f64,
    /// Place along the span: station counted from the root plus the fraction of the way to the next.
    pub place: f64,
    /// Its leading edge: at the height and with the turn of the built section at `offset` \[mm\].
    pub leading_edge: Point3<f64>,
    /// Its trailing edge, `length` away \[mm\].
    pub trailing_edge: Point3<f64>,
    /// Incidence of the built section at `offset` \[rad\].
    pub incidence: f64,
    /// Length of the built section's chord at `offset` \[mm\].
    pub local_chord: f64,
}

impl MeanAerodynamicChord {
    /// Its quarter point, the aerodynamic centre of thin-aerofoil theory \[mm\].
    pub fn aerodynamic_centre(&self) -> Point3<f64> {
        self.leading_edge + (self.trailing_edge - self.leading_edge) * 0.25
    }
}

/// Integrals over one side of the reference wing.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Integrals {
    pub(super) area: f64,
    pub(super) square: f64,
    moment: f64,
    pub(super) leading_edge: f64,
    /// x of the unturned leading edge at the mean aerodynamic chord \[mm\].
    pub(super) nominal_at_mac: f64,
}

/// The outline that is integrated over.
#[derive(Clone, Copy, Debug)]
pub(super) enum Shape {
    /// Straight edges between stations.
    Straight,
    /// An ellipse, the chord line at a fraction straight with this slope dx/dy.
    Ellipse {
        /// Chord fraction \[-\].
        fraction: f64,
        /// Slope \[-\].
        slope: f64,
    },
}

impl Integrals {
    /// Over stations with straight edges between them, or over an ellipse by its own law.
    pub(super) fn of(stations: &[Station], fin: bool, shape: Shape) -> Self {
        let offset = |station: &Station| if fin { station.axis.z.abs() } else { station.axis.y };
        match shape {
            Shape::Straight => {
                let mut sums = Self::straight(stations, offset);
                let at = sums.offset();
                let pair = stations.windows(2).find(|pair| at < offset(&pair[1]));
                sums.nominal_at_mac = pair.map_or(sums.leading_edge / sums.area, |pair| {
                    let (from, to) = (offset(&pair[0]), offset(&pair[1]));
                    let share = (at - from) / (to - from);
                    pair[0].nominal_leading_edge * (1.0 - share) + pair[1].nominal_leading_edge * share
                });
                sums
            }
            Shape::Ellipse { fraction, slope } => Self::ellipse(stations, fraction, slope),
        }
    }

    /// Distance of the mean aerodynamic chord from the centreline \[mm\].
    pub(super) fn offset(&self) -> f64 {
        self.moment / self.area
    }

    fn straight(stations: &[Station], offset: impl Fn(&Station) -> f64) -> Self {
        let mut sums = Self::default();
        for pair in stations.windows(2) {
            let (a, b) = (pair[0].chord, pair[1].chord);
            let (p, q) = (pair[0].nominal_leading_edge, pair[1].nominal_leading_edge);
            let start = offset(&pair[0]);
            let w = offset(&pair[1]) - start;
            sums.area += w * (a + b) / 2.0;
            sums.square += w * (a * a + a * b + b * b) / 3.0;
            sums.moment += w * (start * (a + b) / 2.0 + w * (a + 2.0 * b) / 6.0);
            sums.leading_edge += w * (p * (2.0 * a + b) + q * (a + 2.0 * b)) / 6.0;
        }
        sums
    }

    /// c = c₀ cos φ, y = s sin φ from 0 to φ_t; x_LE = f c₀ + y tan Λ - f c.
    fn ellipse(stations: &[Station], fraction: f64, slope: f64) -> Self {
        let (first, last) = (&stations[0], &stations[stations.len() - 1]);
        let root = first.chord;
        let end = (last.chord / root).acos();
        let (sine, cosine) = end.sin_cos();
        let semi = last.axis.y / sine;
        let two = 0.5 * (end + sine * cosine); // ∫ cos² φ
        let three = sine - sine.powi(3) / 3.0; // ∫ cos³ φ
        let sine_two = (1.0 - cosine.powi(3)) / 3.0; // ∫ sin φ cos² φ
        let area = root * semi * two;
        let square = root * root * semi * three;
        let moment = root * semi * semi * sine_two;
        let leading_edge = fraction * root * area + slope * moment - fraction * square;
        let offset = moment / area;
        let chord = root * (1.0 - (offset / semi).powi(2)).sqrt();
        let nominal_at_mac = fraction * root + offset * slope - fraction * chord;
        Self {
            area,
            square,
            moment,
            leading_edge,
            nominal_at_mac,
        }
    }
}
