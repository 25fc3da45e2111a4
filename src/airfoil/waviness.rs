//! Waviness: changes of sign of the curvature that a section should not have.
//!
//! A side bulges outwards from the nose to the trailing edge; a cambered or rear-loaded one turns hollow towards the
//! trailing edge, and the lower side of a reflexed one bulges again. Each further change of sign is a wave. Curvature counts as bulging or hollow above a
//! threshold, so that a flat side is not called wavy, nor the lower side of NACA 4412, which is alternately hollow and
//! bulging by less than that.

use super::section::Section;
use super::side::Side;

/// Curvature above which a side counts as bulging or hollow \[1/chord\]: a wave of a tenth of the chord and of that
/// curvature is 5e-5 of the chord high, one of a fiftieth 2e-6.
const THRESHOLD: f64 = 0.2;
/// Changes of sign a side may have.
const ALLOWED: usize = 2;

/// Changes of sign of the curvature.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Waviness {
    /// Of the upper side, all of them.
    pub upper: usize,
    /// Of the lower side, all of them.
    pub lower: usize,
}

impl Waviness {
    /// Those that a section should not have: beyond two a side.
    pub const fn excess(&self) -> usize {
        self.upper.saturating_sub(ALLOWED) + self.lower.saturating_sub(ALLOWED)
    }
}

impl Section {
    /// Counts the changes of sign of the curvature of either side.
    pub fn waviness(&self) -> Waviness {
        Waviness {
            upper: changes(&self.upper),
            lower: changes(&self.lower),
        }
    }
}

fn changes(side: &Side) -> usize {
    let (mut count, mut last) = (0, 0.0_f64);
    for [from, to] in side.pieces() {
        for i in 0..=24 {
            let curvature = side
                .local(from + (to - from) * (f64::from(i) + 0.5) / 25.0)
                .curvature();
            if curvature.abs() > THRESHOLD {
                count += usize::from(last * curvature < 0.0);
                last = curvature;
            }
        }
    }
    count
}
