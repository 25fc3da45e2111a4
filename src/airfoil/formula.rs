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
use super::thickness::{Curve, Thickness};

/// Mean line of a section. Negative constants give the mirrored line.
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
    fn at<const N: usize>(&self, x: Taylor<N>) -> (Taylor<N>, Taylor<N>) {
        match *self {
            Self::None => (Taylor::constant(0.0), Taylor::constant(0.0)),
            Self::Parabolas { m, p } => {
                let (scale, start) = if x.value() < p {
                    (m / (p * p), 0.0)
                } else {
                    (m / ((1.0 - p) * (1.0 - p)), 1.0 - 2.0 * p)
                };
                let ordinate = x.polynomial(&[start * scale, 2.0 * p * scale, -scale]);
                (ordinate, x.polynomial(&[2.0 * p * scale, -2.0 * scale]))
            }
            Self::Cubic { m, k1, ratio } => {
                // y_c = k1/6 [f (x - m)³ - (k2/k1)(1 - m)³ x - m³ x + m³], f = 1 ahead of m and k2/k1 behind
                let f = if x.value() < m { 1.0 } else { ratio };
                let linear = -ratio * (1.0 - m).powi(3) - m.powi(3);
                let shifted = x - Taylor::constant(m);
                let square = shifted * shifted;
                let ordinate = square * shifted * f + x * linear + Taylor::constant(m.powi(3));
                let slope = square * (3.0 * f) + Taylor::constant(linear);
                (ordinate * (k1 / 6.0), slope * (k1 / 6.0))
            }
        }
    }

    /// Ordinate y/c and slope of the mean line at `x` \[-\].
    pub fn line(&self, x: f64) -> (f64, f64) {
        let (ordinate, slope) = self.at(Taylor::<1>::constant(x));
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

    /// Greatest ordinate in size, with its sign, and its place \[-\]; zero at the nose for a straight line.
    pub fn greatest(&self) -> (f64, f64) {
        match *self {
            Self::None => (0.0, 0.0),
            Self::Parabolas { m, p } => (m, p),
            Self::Cubic { m, ratio, .. } => {
                // ahead of m: 3 (x - m)² = (k2/k1)(1 - m)³ + m³
                let x = m - ((ratio * (1.0 - m).powi(3) + m.powi(3)) / 3.0).sqrt();
                (self.line(x).0, x)
            }
        }
    }

    /// The mean line with every ordinate multiplied by `factor`.
    pub const fn scaled(self, factor: f64) -> Self {
        match self {
            Self::None => Self::None,
            Self::Parabolas { m, p } => Self::Parabolas { m: m * factor, p },
            Self::Cubic { m, k1, ratio } => Self::Cubic {
                m,
                k1: k1 * factor,
                ratio,
            },
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

/// A formula with its coefficients worked out.
#[derive(Clone, Copy, Debug)]
pub(super) struct Shape {
    thickness: Curve,
    pub(super) camber: Camber,
}

impl Formula {
    pub(super) fn shape(&self) -> Shape {
        Shape {
            thickness: self.thickness.curve(),
            camber: self.camber,
        }
    }
}

impl Shape {
    /// Point of the upper (`side` = 1) or lower (-1) surface by `t` = √x of the mean line's station, as Taylor series.
    pub(super) fn surface<const N: usize>(&self, side: f64, t: f64) -> (Taylor<N>, Taylor<N>) {
        let t = Taylor::variable(t);
        let x = t * t;
        let half = self.thickness.at(t, x) * side;
        if self.camber == Camber::None {
            return (x, half);
        }
        let (ordinate, slope) = self.camber.at(x);
        let cosine = (slope * slope + Taylor::constant(1.0)).inverse_sqrt();
        let across = half * cosine;
        (x - across * slope, ordinate + across)
    }

    /// Stations of the mean line where a derivative of the surface jumps \[-\], in order.
    pub(super) fn breaks(&self) -> Vec<f64> {
        let mut breaks: Vec<f64> = self.camber.break_at().into_iter().collect();
        breaks.extend((self.thickness.place < 1.0).then_some(self.thickness.place));
        breaks.sort_by(f64::total_cmp);
        breaks.dedup_by(|a, b| (*a - *b).abs() < 1e-9);
        breaks
    }
}
