//! What a section measures, and what thin-aerofoil theory says of it.
//!
//! Reference: H. Glauert, *The Elements of Aerofoil and Airscrew Theory*, 2nd ed., Cambridge 1947, chapter VII. With
//! `x = (1 - cos φ)/2` and the camber line's slope dz/dx,
//!
//! ```text
//! α₀ = -1/π ∫₀^π dz/dx (cos φ - 1) dφ      A_n = 2/π ∫₀^π dz/dx cos nφ dφ
//! c_m,c/4 = π/4 (A₂ - A₁)                   ideal: α_i = 1/π ∫₀^π dz/dx dφ, c_l,i = π A₁
//! ```

use std::f64::consts::PI;

use super::camber_line::CamberLine;
use super::section::Section;
use super::side::{Local, Side};
use crate::spline::quadrature::ten;

/// A greatest value and its place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Greatest {
    /// The value \[chord\].
    pub value: f64,
    /// Where on the chord it is \[-\].
    pub x: f64,
}

/// Figures of a section of unit chord.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Figures {
    /// Area within the contour, the base closing it \[chord²\].
    pub area: f64,
    /// Centroid of the area \[chord\].
    pub centroid: [f64; 2],
    /// Length of both sides without the base \[chord\].
    pub perimeter: f64,
    /// Greatest thickness: distance of the sides square to the chord line.
    pub thickness: Greatest,
    /// Greatest ordinate of the camber line in size, with its sign.
    pub camber: Greatest,
    /// Radius of curvature where the section meets the chord line at the nose \[chord\].
    pub nose_radius: f64,
    /// Angle between the sides at the trailing edge \[rad\].
    pub trailing_angle: f64,
    /// Distance between the ends of the sides \[chord\].
    pub base: f64,
    /// Angle of the chord line at which there is no lift \[rad\].
    pub zero_lift_angle: f64,
    /// Moment coefficient about the quarter-chord point, nose up positive \[-\].
    pub quarter_chord_moment: f64,
    /// Angle at which the flow meets the camber line's nose smoothly \[rad\].
    pub ideal_angle: f64,
    /// Lift coefficient at the ideal angle \[-\].
    pub ideal_lift: f64,
}

/// Zero-lift angle, A₁ and A₂, ideal angle.
struct Thin {
    zero_lift_angle: f64,
    ideal_angle: f64,
    first: f64,
    second: f64,
}

impl Section {
    /// The figures of the section: of its exact curve, by Gauss-Legendre quadrature between the curve's breaks.
    ///
    /// The camber line is the formula's mean line, or for points the line whose normals meet both sides at equal
    /// distance.
    pub fn figures(&self) -> Figures {
        let (area, centroid) = self.area();
        let line = self.camber_line();
        let thin = Self::thin(&line);
        let [upper, lower] = [&self.upper, &self.lower].map(end);
        let nose = self.nose();
        Figures {
            area,
            centroid,
            perimeter: [&self.upper, &self.lower]
                .map(|side| integral(side, |at| at.first[0].hypot(at.first[1])))
                .iter()
                .sum(),
            thickness: self.thickness(),
            camber: line.greatest(),
            nose_radius: 1.0 / nose.curvature().abs(),
            trailing_angle: lower.first[1].atan2(lower.first[0]) - upper.first[1].atan2(upper.first[0]),
            base: (upper.point[0] - lower.point[0]).hypot(upper.point[1] - lower.point[1]),
            zero_lift_angle: thin.zero_lift_angle,
            quarter_chord_moment: PI / 4.0 * (thin.second - thin.first),
            ideal_angle: thin.ideal_angle,
            ideal_lift: PI * thin.first,
        }
    }

    /// The section where it meets the chord line at the nose.
    pub(super) fn nose(&self) -> Local {
        self.upper.local(self.upper.pieces()[0][0])
    }

    /// Area and its centroid, by integrals around the contour: -∮ y dx, -∮ x y dx, -∮ y²/2 dx.
    fn area(&self) -> (f64, [f64; 2]) {
        let moments = |side: &Side| {
            [
                integral(side, |at| at.point[1] * at.first[0]),
                integral(side, |at| at.point[0] * at.point[1] * at.first[0]),
                integral(side, |at| 0.5 * at.point[1] * at.point[1] * at.first[0]),
            ]
        };
        let (above, below) = (moments(&self.upper), moments(&self.lower));
        // the base, a straight line from the lower to the upper end: Simpson's rule is exact
        let (from, to) = (end(&self.lower).point, end(&self.upper).point);
        let middle = [0.5 * (from[0] + to[0]), 0.5 * (from[1] + to[1])];
        let along = |f: fn([f64; 2]) -> f64| -(to[0] - from[0]) * (f(from) + 4.0 * f(middle) + f(to)) / 6.0;
        let base = [
            along(|[_, y]| y),
            along(|[x, y]| x * y),
            along(|[_, y]| 0.5 * y * y),
        ];
        let [area, x, y] = [0, 1, 2].map(|k| above[k] - below[k] + base[k]);
        (area, [x / area, y / area])
    }

    /// Chord fraction up to which both sides reach.
    fn reach(&self) -> f64 {
        self.upper.x(1.0).min(self.lower.x(1.0)).min(1.0)
    }

    /// Greatest thickness.
    pub(super) fn thickness(&self) -> Greatest {
        greatest(self.reach(), |x| self.upper.y_at(x) - self.lower.y_at(x))
    }

    /// The camber line.
    pub fn camber_line(&self) -> CamberLine {
        CamberLine::of(self)
    }

    fn thin(line: &CamberLine) -> Thin {
        let angle = |x: f64| (1.0 - 2.0 * x).clamp(-1.0, 1.0).acos();
        let mut corners = vec![0.0];
        corners.extend(line.break_at().map(angle));
        corners.push(PI);
        let mut sums = [0.0; 3];
        for pair in corners.windows(2) {
            for (phi, weight) in cut(pair[0], pair[1], 32).flat_map(|[a, b]| ten(a, b)) {
                let (_, slope) = line.at(0.5 * (1.0 - phi.cos()));
                for (n, sum) in (0_u8..3).zip(&mut sums) {
                    *sum += weight * slope * (f64::from(n) * phi).cos();
                }
            }
        }
        Thin {
            zero_lift_angle: (sums[0] - sums[1]) / PI,
            ideal_angle: sums[0] / PI,
            first: 2.0 * sums[1] / PI,
            second: 2.0 * sums[2] / PI,
        }
    }
}

/// The end of a side at the trailing edge.
fn end(side: &Side) -> Local {
    let pieces = side.pieces();
    side.local(pieces[pieces.len() - 1][1])
}

/// An interval in equal parts.
fn cut(from: f64, to: f64, parts: u32) -> impl Iterator<Item = [f64; 2]> {
    let at = move |i: u32| from + (to - from) * f64::from(i) / f64::from(parts);
    (0..parts).map(move |i| [at(i), at(i + 1)])
}

/// Integral along a side from the nose to the trailing edge, by the law's own parameter.
fn integral(side: &Side, integrand: impl Fn(&Local) -> f64) -> f64 {
    (side.pieces().into_iter())
        .flat_map(|[a, b]| cut(a, b, 4))
        .flat_map(|[a, b]| ten(a.min(b), a.max(b)))
        .map(|(at, weight)| weight * integrand(&side.local(at)))
        .sum()
}

/// Greatest value of a function of x on \[0, `end`\] with one peak, or the highest of some.
pub(super) fn greatest(end: f64, f: impl Fn(f64) -> f64) -> Greatest {
    let at = |phi: f64| 0.5 * end * (1.0 - phi.cos());
    let steps = 96_u32;
    let phi = |i: u32| PI * f64::from(i) / f64::from(steps);
    let best = (1..steps)
        .max_by(|a, b| f(at(phi(*a))).total_cmp(&f(at(phi(*b)))))
        .unwrap_or(1);
    let ratio = 0.5 * (5.0_f64.sqrt() - 1.0);
    let (mut low, mut high) = (phi(best - 1), phi(best + 1));
    for _ in 0..42 {
        let (a, b) = (high - ratio * (high - low), low + ratio * (high - low));
        if f(at(a)) > f(at(b)) { high = b } else { low = a }
    }
    let x = at(0.5 * (low + high));
    Greatest { value: f(x), x }
}
