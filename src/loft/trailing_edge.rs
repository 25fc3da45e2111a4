//! How thick the trailing edge is.

use crate::airfoil::Profile;
use crate::planform::Station;

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
    pub(super) fn base(self, station: &Station, profile: &Profile) -> f64 {
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
