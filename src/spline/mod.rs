//! B-splines: knot vectors, curves, surfaces and least squares on them.
//!
//! Everything here is non-rational, clamped, and of degree 5 at most.

mod banded;
mod curve;
mod interpolate;
mod knots;
mod least_squares;
pub mod quadrature;
mod surface;

pub use curve::{Curve, Function};
pub use interpolate::{Ends, Interpolation, part_from};
pub use knots::{Derivatives, Knots, MAX_DEGREE};
pub use least_squares::{Fit, LeastSquares};
pub use surface::{Derivative, Surface};
