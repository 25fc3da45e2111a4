//! Chord lines cut out of the faces.

use nalgebra::{Point3, Vector3};

use crate::loft::Loft;
use crate::spline::Surface;
use crate::spline::quadrature::ten;

/// A chord line found on the solid: from the edge between the skins at the nose to the middle of the trailing edge.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Chord {
    /// Front end \[mm\].
    pub front: Point3<f64>,
    /// Rear end \[mm\].
    pub rear: Point3<f64>,
    /// Direction in which the section's thickness lies: unit vector square to x.
    pub up: Vector3<f64>,
}

impl Chord {
    /// Length \[mm\].
    pub fn length(&self) -> f64 {
        (self.rear - self.front).norm()
    }

    /// Turn against the x axis, leading edge up \[rad\].
    pub fn incidence(&self) -> f64 {
        let chord = self.rear - self.front;
        (-chord.dot(&self.up)).atan2(chord.x)
    }

    /// Point at a chord fraction \[mm\].
    pub fn at(&self, fraction: f64) -> Point3<f64> {
        self.front + (self.rear - self.front) * fraction
    }
}

/// How the span is counted on the solid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spanwise {
    /// Chord fraction of the points that a section's place along the span is counted by.
    pub fraction: f64,
    /// Whether the surface is a fin, which stands along z.
    pub fin: bool,
    /// Where the reference root's leading edge is: distances count from there \[mm\].
    pub origin: Point3<f64>,
}

/// The faces of one side that chords are found on.
#[derive(Clone, Debug)]
pub struct Slices {
    /// Upper and lower skin of each panel.
    skins: Vec<[Surface; 2]>,
    /// Where the layout's stations lie: panel and spanwise parameter.
    places: Vec<(usize, f64)>,
    spanwise: Spanwise,
    /// -1 on the port side, else 1.
    sense: f64,
}

impl Slices {
    /// Takes the skins of one side.
    pub fn of(loft: &Loft, spanwise: Spanwise) -> Self {
        Self {
            skins: (0..loft.panels())
                .map(|k| [loft.upper(k), loft.lower(k)])
                .collect(),
            places: loft.places.clone(),
            spanwise,
            sense: if loft.port { -1.0 } else { 1.0 },
        }
    }

    /// Number of stations on the solid, its ends included.
    pub fn stations(&self) -> usize {
        self.places.len()
    }

    /// The chord at a station: 0 is the inner end of the solid.
    pub fn at_station(&self, station: usize) -> Chord {
        let (panel, v) = self.places[station];
        self.chord(panel, v)
    }

    /// Distance of a point from the plane that the span is counted from, outwards \[mm\].
    pub fn offset(&self, point: &Point3<f64>) -> f64 {
        let from = point - self.spanwise.origin;
        if self.spanwise.fin {
            from.z.abs()
        } else {
            from.y * self.sense
        }
    }

    /// The chord of the section whose point at the chord fraction lies `offset` from the centreline \[mm\]. `None` where
    /// the solid does not reach.
    pub fn at_offset(&self, offset: f64) -> Option<Chord> {
        (0..self.skins.len()).rev().find_map(|panel| {
            let (from, to) = self.skins[panel][0].v.range();
            let place = |v: f64| self.offset(&self.chord(panel, v).at(self.spanwise.fraction));
            let slack = 1e-9 * (place(to) - place(from)).abs();
            if offset < place(from) - slack || offset > place(to) + slack {
                return None;
            }
            // regula falsi with halving: exact at once where elements are straight
            let (mut low, mut high) = (from, to);
            let (mut below, mut above) = (place(low) - offset, place(high) - offset);
            for _ in 0..100 {
                let v = (low - below * (high - low) / (above - below)).clamp(from, to);
                let off = place(v) - offset;
                if off.abs() <= slack || high - low < 1e-14 {
                    return Some(self.chord(panel, v));
                }
                if off < 0.0 {
                    (low, below) = (v, off);
                    above *= 0.5;
                } else {
                    (high, above) = (v, off);
                    below *= 0.5;
                }
            }
            Some(self.chord(panel, 0.5 * (low + high)))
        })
    }

    /// Area, mean aerodynamic chord and its offset, by quadrature over chords along the span.
    pub fn planform(&self) -> Planform {
        let (mut area, mut square, mut moment) = (0.0, 0.0, 0.0);
        for (panel, [upper, _]) in self.skins.iter().enumerate() {
            for span in upper.v.corners().windows(2) {
                for (v, weight) in ten(span[0], span[1]) {
                    let (chord, rate) = self.chord_and_rate(panel, v);
                    let (length, width) = (chord.length(), weight * rate);
                    area += length * width;
                    square += length * length * width;
                    moment += self.offset(&chord.at(self.spanwise.fraction)) * length * width;
                }
            }
        }
        Planform {
            area,
            mac: square / area,
            offset: moment / area,
        }
    }

    /// The chord line at a panel's spanwise parameter.
    fn chord(&self, panel: usize, v: f64) -> Chord {
        let [upper, _] = &self.skins[panel];
        let here = self.raw_chord(panel, v);
        let (from, to) = upper.v.range();
        if upper.v.degree() > 1 {
            return here;
        }
        // between sections that lean differently the section's direction turns from one to the other
        let share = (v - from) / (to - from);
        let up = self.raw_chord(panel, from).up * (1.0 - share) + self.raw_chord(panel, to).up * share;
        Chord {
            up: up.normalize(),
            ..here
        }
    }

    /// The same with the direction of thickness as the section's own points show it.
    fn raw_chord(&self, panel: usize, v: f64) -> Chord {
        let [upper, lower] = &self.skins[panel];
        let rear = nalgebra::center(&upper.at(1.0, v), &lower.at(1.0, v));
        chord(upper.at(0.0, v), rear, upper.at(0.3, v))
    }

    /// The chord line, and how fast its place along the span changes with the parameter.
    fn chord_and_rate(&self, panel: usize, v: f64) -> (Chord, f64) {
        let [upper, lower] = &self.skins[panel];
        let (front, above) = (upper.derivative(0.0, v), upper.derivative(1.0, v));
        let below = lower.derivative(1.0, v);
        let rear = nalgebra::center(&above.point, &below.point);
        let rear_rate = (above.v + below.v) * 0.5;
        let rate = front.v + (rear_rate - front.v) * self.spanwise.fraction;
        let rate = if self.spanwise.fin {
            rate.z.abs()
        } else {
            rate.y * self.sense
        };
        (chord(front.point, rear, upper.at(0.3, v)), rate)
    }
}

/// Integrals over the chords of one side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Planform {
    /// Area of one side \[mm²\].
    pub area: f64,
    /// Mean aerodynamic chord \[mm\].
    pub mac: f64,
    /// Its distance from the centreline \[mm\].
    pub offset: f64,
}

fn chord(front: Point3<f64>, rear: Point3<f64>, above: Point3<f64>) -> Chord {
    // square to x, in the plane of the section, towards the upper side
    let line = (rear - front).normalize();
    let mut normal = above - front;
    normal -= line * normal.dot(&line);
    let up = (normal - Vector3::x() * normal.x).normalize();
    Chord { front, rear, up }
}
