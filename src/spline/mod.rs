//! B-splines: knot vectors, curves, surfaces and least squares on them.
//!
//! Everything here is clamped and of degree 5 at most; only [`WeightedSurface`] is rational.

mod banded;
mod curve;
mod interpolate;
mod knots;
mod least_squares;
pub mod quadrature;
mod rational;
mod surface;

pub use curve::{Curve, Function};
pub use interpolate::{Ends, Interpolation, part_from, refined};
pub use knots::{Derivatives, Knots, MAX_DEGREE};
pub use least_squares::{Fit, LeastSquares};
pub use rational::WeightedSurface;
pub use surface::{Derivative, Surface};
