//! The closed forms of the NACA families: thickness laid off perpendicular to the camber line.
//!
//! ```text
//! x_u = x - y_t sin θ    y_u = y_c + y_t cos θ
//! x_l = x + y_t sin θ    y_l = y_c - y_t cos θ    tan θ = dy_c/dx
//! ```
//!
//! Sources: E. N. Jacobs, K. E. Ward, R. M. Pinkerton, NACA Report 460 (1933), 4-digit sections; E. N. Jacobs,
//! R. M. Pinkerton, NACA Report 537 (1935), 5-digit mean lines; constants as in NASA TM 4741 (1996).

use super::taylor::Taylor;

/// Thickness of the 4- and 5-digit families, half thickness over the chord:
/// `y_t = t/0.20 (0.2969 √x - 0.1260 x - 0.3516 x² + 0.2843 x³ - 0.1015 x⁴)`.
///
/// Closed with the last coefficient -0.1036 in place of -0.1015, the common published variant; open it ends on a base
/// of 0.021 t.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Thickness {
    /// Thickness ratio t \[-\].
    pub ratio: f64,
    /// Whether the trailing edge is closed.
    pub closed: bool,
}

impl Thickness {
    /// Half thickness by `t` = √x, where `t` may be slightly negative.
    fn at(&self, t: Taylor) -> Taylor {
        let last = if self.closed { -0.1036 } else { -0.1015 };
        let x = t * t;
        let even = x.polynomial(&[0.0, -0.1260, -0.3516, 0.2843, last]);
        (t * 0.2969 + even) * (self.ratio / 0.20)
    }
}

/// Mean line of a section.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Camber {
    /// Straight: a symmetric section.
    None,
    /// 4-digit: two parabolas that meet at the greatest camber `m` at `p`.
    Parabolas {
        /// Greatest camber \[-\].
        m: f64,
        /// Its place \[-\].
        p: f64,
    },
    /// 5-digit: a cubic to `m`, straight (simple) or cubic (reflexed) behind.
    Cubic {
        /// Where the cubic ends \[-\].
        m: f64,
        /// Its constant k₁, in proportion to the design lift coefficient.
        k1: f64,
        /// k₂/k₁ of the reflexed mean lines; 0 for the simple ones.
        ratio: f64,
    },
}

impl Camber {
    /// Ordinate and slope of the mean line by x.
    fn at(&self, x: Taylor) -> (Taylor, Taylor) {
        match *self {
            Self::None => (Taylor::constant(0.0), Taylor::constant(0.0)),
            Self::Parabolas { m, p } => {
                let (scale, start) = if x.value() < p {
                    (m / (p * p), 0.0)
                } else {
                    (m / ((1.0 - p) * (1.0 - p)), 1.0 - 2.0 * p)
                };
                let ordinate = x.polynomial(&[start, 2.0 * p, -1.0]) * scale;
                (ordinate, x.polynomial(&[2.0 * p, -2.0]) * scale)
            }
            Self::Cubic { m, k1, ratio } => {
                // y_c = k1/6 [f (x - m)³ - (k2/k1)(1 - m)³ x - m³ x + m³], f = 1 ahead of m and k2/k1 behind
                let f = if x.value() < m { 1.0 } else { ratio };
                let linear = -ratio * (1.0 - m).powi(3) - m.powi(3);
                let shifted = x - Taylor::constant(m);
                let ordinate = shifted * shifted * shifted * f + x * linear + Taylor::constant(m.powi(3));
                let slope = shifted * shifted * (3.0 * f) + Taylor::constant(linear);
                (ordinate * (k1 / 6.0), slope * (k1 / 6.0))
            }
        }
    }

    /// Ordinate y/c and slope of the mean line at `x` \[-\].
    pub fn line(&self, x: f64) -> (f64, f64) {
        let (ordinate, slope) = self.at(Taylor::constant(x));
        (ordinate.value(), slope.value())
    }

    /// Where a derivative of the mean line jumps \[-\].
    pub const fn break_at(&self) -> Option<f64> {
        match *self {
            Self::None => None,
            Self::Parabolas { p, .. } => Some(p),
            Self::Cubic { m, .. } => Some(m),
        }
    }
}

/// A section given by formula.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Formula {
    /// Its thickness form.
    pub thickness: Thickness,
    /// Its mean line.
    pub camber: Camber,
}

impl Formula {
    /// Point of the upper (`side` = 1) or lower (-1) surface by `t` = √x of the mean line's station, as Taylor series.
    pub(super) fn surface(&self, side: f64, t: f64) -> (Taylor, Taylor) {
        let t = Taylor::variable(t);
        let x = t * t;
        let half = self.thickness.at(t) * side;
        let (ordinate, slope) = self.camber.at(x);
        if self.camber == Camber::None {
            return (x, half);
        }
        let cosine = (slope * slope + Taylor::constant(1.0)).inverse_sqrt();
        (x - half * slope * cosine, ordinate + half * cosine)
    }
}
