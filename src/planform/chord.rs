//! The chord line between two stations of a panel with straight elements.

use nalgebra::{Point3, Vector3};

use super::Station;

/// A chord line on the starboard side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ChordLine {
    /// Front end \[mm\].
    pub leading_edge: Point3<f64>,
    /// Rear end \[mm\].
    pub trailing_edge: Point3<f64>,
    /// Upward direction of the section: unit vector square to x.
    pub up: Vector3<f64>,
}

impl ChordLine {
    /// The chord line of weighted stations: between two with the weights 1 - η and η, front and rear run straight.
    ///
    /// Between equal planes its turn from the inner section is
    /// `tan θ = η c_o sin θ_o / ((1 - η) c_i + η c_o cos θ_o)`, with θ_o the outer section's.
    pub(super) fn of<'a>(weighted: impl Iterator<Item = (&'a Station, f64)>) -> Self {
        let mut sums = [Vector3::zeros(); 3];
        for (station, weight) in weighted {
            sums[0] += station.leading_edge().coords * weight;
            sums[1] += station.trailing_edge().coords * weight;
            sums[2] += station.up * weight;
        }
        Self {
            leading_edge: sums[0].into(),
            trailing_edge: sums[1].into(),
            up: sums[2].normalize(),
        }
    }

    /// Length \[mm\].
    pub fn length(&self) -> f64 {
        (self.trailing_edge - self.leading_edge).norm()
    }

    /// Unit vector from front to rear.
    pub fn direction(&self) -> Vector3<f64> {
        (self.trailing_edge - self.leading_edge).normalize()
    }

    /// Incidence in the section's plane, leading edge up \[rad\].
    pub fn incidence(&self) -> f64 {
        let chord = self.trailing_edge - self.leading_edge;
        (-chord.dot(&self.up)).atan2(chord.x)
    }

    /// Point at a chord fraction \[mm\].
    pub fn at(&self, fraction: f64) -> Point3<f64> {
        self.leading_edge + (self.trailing_edge - self.leading_edge) * fraction
    }
}
