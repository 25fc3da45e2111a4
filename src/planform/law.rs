//! How the wing runs between its stations.

use super::{ChordLine, Station};
use crate::spline::{Ends, Interpolation};

/// How faces and chord lines run between stations.
///
/// A place along the span is a number t: the station counted from the root plus the fraction of the way to the next.
#[derive(Clone, Debug)]
pub enum SpanLaw {
    /// Straight elements between neighbours.
    Straight,
    /// One curvature-continuous spline through all stations, which stand at these of its parameters.
    Smooth(Interpolation, Vec<f64>),
}

impl SpanLaw {
    /// The smooth law through stations at ascending parameters from 0 to 1; straight for fewer than three stations.
    pub(super) fn smooth(parameters: Vec<f64>, ends: Ends) -> Self {
        if parameters.len() < 3 {
            return Self::Straight;
        }
        Interpolation::new(&parameters, ends)
            .map_or(Self::Straight, |spline| Self::Smooth(spline, parameters))
    }

    /// The spline's parameter at a place.
    pub fn parameter(&self, parameters: &[f64], t: f64) -> f64 {
        let (k, fraction) = split(t, parameters.len() - 1);
        parameters[k] + fraction * (parameters[k + 1] - parameters[k])
    }

    /// The chord line at place `t`.
    pub(super) fn chord(&self, stations: &[Station], t: f64) -> ChordLine {
        match self {
            Self::Straight => {
                let (k, fraction) = split(t, stations.len() - 1);
                ChordLine::of([(&stations[k], 1.0 - fraction), (&stations[k + 1], fraction)].into_iter())
            }
            Self::Smooth(spline, parameters) => {
                let weights = spline.weights(self.parameter(parameters, t));
                ChordLine::of(stations.iter().zip(weights))
            }
        }
    }
}

/// Station and fraction of a place.
pub(super) fn split(t: f64, last: usize) -> (usize, f64) {
    let k = (0..last).rev().find(|k| *k as f64 <= t).unwrap_or(0);
    (k, t - k as f64)
}
