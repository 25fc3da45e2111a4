//! Spline functions and curves in space.

use nalgebra::Point3;

use super::knots::Knots;

/// A scalar spline function.
#[derive(Clone, Debug, PartialEq)]
pub struct Function {
    /// Its knots.
    pub knots: Knots,
    /// Its coefficients, `(knots.count())`.
    pub coefficients: Vec<f64>,
}

impl Function {
    /// Value at `t`.
    pub fn at(&self, t: f64) -> f64 {
        let (first, basis) = self.knots.basis(t);
        let degree = self.knots.degree();
        (0..=degree)
            .map(|i| basis[i] * self.coefficients[first + i])
            .sum()
    }

    /// `-f(-t)`: turned half around the origin.
    pub fn mirrored(&self) -> Self {
        Self {
            knots: self.knots.mirrored(),
            coefficients: self.coefficients.iter().rev().map(|c| -c).collect(),
        }
    }

    /// Value, first and second derivative at `t`.
    pub fn derivatives(&self, t: f64) -> [f64; 3] {
        let d = self.knots.derivatives(t);
        let degree = self.knots.degree();
        d.rows.map(|row| {
            (0..=degree)
                .map(|i| row[i] * self.coefficients[d.first + i])
                .sum()
        })
    }
}

/// A spline curve in space.
#[derive(Clone, Debug, PartialEq)]
pub struct Curve {
    /// Its knots.
    pub knots: Knots,
    /// Its control points \[mm\], `(knots.count())`.
    pub points: Vec<Point3<f64>>,
}

impl Curve {
    /// Point at `t` \[mm\].
    pub fn at(&self, t: f64) -> Point3<f64> {
        let (first, basis) = self.knots.basis(t);
        let degree = self.knots.degree();
        (0..=degree).fold(Point3::origin(), |sum, i| {
            sum + self.points[first + i].coords * basis[i]
        })
    }

    /// First point \[mm\].
    pub fn start(&self) -> Point3<f64> {
        self.points[0]
    }

    /// Last point \[mm\].
    pub fn end(&self) -> Point3<f64> {
        self.points[self.points.len() - 1]
    }
}
