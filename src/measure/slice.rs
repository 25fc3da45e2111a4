//! Chord lines cut out of the faces by planes.

use nalgebra::{Point3, Vector3};

use super::quadrature::ten;
use crate::loft::Loft;

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
        chord
            .y
            .hypot(chord.z)
            .copysign(-chord.dot(&self.up))
            .atan2(chord.x)
    }

    /// Point at a chord fraction \[mm\].
    pub fn at(&self, fraction: f64) -> Point3<f64> {
        self.front + (self.rear - self.front) * fraction
    }
}

/// The edges of one side that chords are found between: nose, upper and lower rear edge of each panel.
#[derive(Clone, Debug)]
pub struct Slices {
    /// Corners along the span: (nose, middle of the trailing edge, a point on the upper side).
    corners: Vec<[Point3<f64>; 3]>,
    /// Chord fraction of the points that a section's place along the span is counted by.
    fraction: f64,
    /// Component that counts as spanwise: 1 (y) or, for a fin, 2 (z).
    axis: usize,
    /// -1 on the port side, else 1.
    sense: f64,
}

impl Slices {
    /// Takes the edges of the faces of one side. Sections are placed along the span by their points at the chord
    /// `fraction`; `fin` where the surface stands along z.
    pub fn of(loft: &Loft, fraction: f64, fin: bool) -> Self {
        let mut corners = Vec::with_capacity(loft.panels() + 1);
        for k in 0..=loft.panels() {
            // the faces' own boundaries: inner ends of each panel, then the outer end of the last
            let panel = k.min(loft.panels() - 1);
            let v = if k == panel { 0.0 } else { 1.0 };
            let (upper, lower) = (loft.upper(panel), loft.lower(panel));
            let rear = nalgebra::center(&upper.at(1.0, v), &lower.at(1.0, v));
            corners.push([upper.at(0.0, v), rear, upper.at(0.3, v)]);
        }
        Self {
            corners,
            fraction,
            axis: if fin { 2 } else { 1 },
            sense: if loft.port { -1.0 } else { 1.0 },
        }
    }

    /// Number of sections between panels, ends included.
    pub fn stations(&self) -> usize {
        self.corners.len()
    }

    /// The chord at the end of a panel: station 0 is the root.
    pub fn at_station(&self, station: usize) -> Chord {
        let [front, rear, above] = self.corners[station];
        chord(front, rear, above)
    }

    /// Distance of a point from the plane that the span is counted from, outwards \[mm\].
    pub fn offset(&self, point: &Point3<f64>) -> f64 {
        match self.axis {
            2 => point.z.abs(),
            _ => point.y * self.sense,
        }
    }

    /// The chord of the section whose point at the chord fraction lies `offset` from the centreline \[mm\]: all edges
    /// are cut at the same share of their panel, in the plane at that offset where the panel's end sections are
    /// parallel. `None` where there is no panel.
    pub fn at_offset(&self, offset: f64) -> Option<Chord> {
        self.corners.windows(2).rev().find_map(|pair| {
            let (from, to) = (self.place(&pair[0]), self.place(&pair[1]));
            let t = (offset - from) / (to - from);
            (-1e-9..=1.0 + 1e-9).contains(&t).then(|| {
                let [front, rear, above] = [0, 1, 2].map(|k| pair[0][k] + (pair[1][k] - pair[0][k]) * t);
                chord(front, rear, above)
            })
        })
    }

    /// Offset of a section's point at the chord fraction.
    fn place(&self, [front, rear, _]: &[Point3<f64>; 3]) -> f64 {
        self.offset(&(front + (rear - front) * self.fraction))
    }

    /// Area, mean aerodynamic chord and its offset, by quadrature over chords cut panel by panel.
    pub fn planform(&self) -> Planform {
        let (mut area, mut square, mut moment) = (0.0, 0.0, 0.0);
        for pair in self.corners.windows(2) {
            let (from, to) = (self.place(&pair[0]), self.place(&pair[1]));
            for (t, weight) in ten(0.0, 1.0) {
                let blend = |which: usize| pair[0][which] + (pair[1][which] - pair[0][which]) * t;
                let chord = (blend(1) - blend(0)).norm();
                let width = weight * (to - from);
                area += chord * width;
                square += chord * chord * width;
                moment += (from + (to - from) * t) * chord * width;
            }
        }
        Planform {
            area,
            mac: square / area,
            offset: moment / area,
        }
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
