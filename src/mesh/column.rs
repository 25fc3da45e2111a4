//! A face between two neighbouring lines of constant u, and how far edges across it are from the surface.

use nalgebra::{Point3, Vector3};

use super::zip::{Zipped, zip};
use crate::spline::{Knots, Surface};

/// A ruled face between the straight elements at two parameters u.
#[derive(Debug)]
pub(super) struct Column {
    /// Ends of the two elements, `[element][inner, outer]`.
    ends: [[Point3<f64>; 2]; 2],
    /// At a quarter, a half and three quarters of the way: the inner and the outer row.
    between: [[Probe; 2]; 3],
}

/// By what edges' distances are taken larger than measured: for what lies between the places, and inside facets, where the
/// surface bends a little even along straight elements.
const MARGIN: f64 = 1.01;
/// A point of a row of control points, with its first and second derivative along u \[mm\].
#[derive(Clone, Copy, Debug)]
struct Probe {
    point: Vector3<f64>,
    slope: Vector3<f64>,
    bend: Vector3<f64>,
}

const QUARTERS: [f64; 3] = [0.25, 0.5, 0.75];

impl Column {
    /// The part of a ruled surface between two parameters u.
    pub(super) fn new(surface: &Surface, from: f64, to: f64) -> Self {
        let rows = [&surface.rows[0], &surface.rows[1]];
        Self {
            ends: [from, to].map(|u| rows.map(|row| point(&surface.u, row, u))),
            between: QUARTERS.map(|q| {
                let u = from + q * (to - from);
                rows.map(|row| Probe::at(&surface.u, row, u))
            }),
        }
    }

    /// Point of the first (0) or second (1) element at a fraction v of its length.
    pub(super) fn at(&self, element: usize, v: f64) -> Point3<f64> {
        let [inner, outer] = self.ends[element];
        inner + (outer - inner) * v
    }

    /// Largest distance \[mm\] between the surface and an edge from `a`, at `va` on the first element, to `b`, at `vb` on
    /// the second.
    ///
    /// It is taken at three places and followed between them as t (1 - t) times a parabola, which meets them and is zero at
    /// both ends; [`MARGIN`] covers what is still missed.
    pub(super) fn edge(&self, [va, vb]: [f64; 2], [a, b]: [Point3<f64>; 2]) -> f64 {
        let mut shape = [0.0; 3];
        for ((q, [inner, outer]), shape) in QUARTERS.iter().zip(&self.between).zip(&mut shape) {
            let v = va + q * (vb - va);
            let on_edge = a.coords.lerp(&b.coords, *q);
            *shape = distance([inner, outer], v, &on_edge) / (q * (1.0 - q));
        }
        let [low, middle, high] = shape;
        let (slope, bend) = (2.0 * (high - low), 8.0 * (low - 2.0 * middle + high));
        (1..16_u32)
            .map(|i| {
                let t = f64::from(i) / 16.0;
                let s = t - 0.5;
                (t * (1.0 - t) * (middle + s * (slope + s * bend))).abs()
            })
            .fold(0.0, |most, off| f64::max(most, MARGIN * off))
    }

    /// The facets between points that divide the two elements evenly, and their largest distance from the surface
    /// \[mm\]. `corner` gives the points: element, place, and fraction v of that place.
    pub(super) fn zip(
        &self,
        divisions: [u32; 2],
        aim: f64,
        corner: impl Fn(usize, usize, f64) -> Point3<f64>,
    ) -> (Zipped, f64) {
        let last = divisions.map(|n| n as usize);
        let edge = |left: usize, right: usize| {
            let [va, vb] = [left as f64 / last[0] as f64, right as f64 / last[1] as f64];
            let apart = self.edge([va, vb], [corner(0, left, va), corner(1, right, vb)]);
            (apart, (va - vb).abs())
        };
        let (first, _) = edge(0, 0);
        let zipped = zip((0, 0), (last[0], last[1]), |_, (left, right)| {
            let (apart, oblique) = edge(left, right);
            // within the aim the straighter edge is the better one
            let key = if apart <= aim {
                aim * oblique + 1e-3 * apart
            } else {
                apart + aim
            };
            Some([key, apart])
        })
        .expect("every facet of a column is allowed");
        let most = first.max(zipped.most);
        (zipped, most)
    }
}

fn point(knots: &Knots, row: &[Point3<f64>], u: f64) -> Point3<f64> {
    let (first, basis) = knots.basis(u);
    (0..=knots.degree()).fold(Point3::origin(), |sum, i| sum + row[first + i].coords * basis[i])
}

impl Probe {
    fn at(knots: &Knots, row: &[Point3<f64>], u: f64) -> Self {
        let d = knots.derivatives(u);
        let mut sums = [Vector3::zeros(); 3];
        for i in 0..=knots.degree() {
            for (sum, derivative) in sums.iter_mut().zip(&d.rows) {
                *sum += row[d.first + i].coords * derivative[i];
            }
        }
        let [point, slope, bend] = sums;
        Self { point, slope, bend }
    }
}

/// Distance \[mm\] of a point from the surface between two rows, near its place at v; with the sign of the normal.
///
/// The point's place in the parameters is a first guess of the nearest place. For what the point lies off sideways,
///
/// ```text
/// r = δu S_u + δv S_v + e n,
/// ```
///
/// the surface has moved along its normal n by the time it is under the point, and the distance is
///
/// ```text
/// e - (S_uu·n δu² + 2 S_uv·n δu δv) / 2.
/// ```
fn distance([inner, outer]: [&Probe; 2], v: f64, point: &Vector3<f64>) -> f64 {
    let across = outer.point - inner.point;
    let slope = inner.slope.lerp(&outer.slope, v);
    let apart = point - inner.point.lerp(&outer.point, v);
    let cross = slope.cross(&across);
    let square = cross.norm_squared();
    if square <= 0.0 {
        return 0.0;
    }
    let normal = cross / square.sqrt();
    // S_v x n and n x S_u over |S_u x S_v| are the dual directions of u and v
    let along_u = apart.cross(&across).dot(&cross) / square;
    let along_v = slope.cross(&apart).dot(&cross) / square;
    let bend = inner.bend.lerp(&outer.bend, v).dot(&normal);
    let warp = (outer.slope - inner.slope).dot(&normal);
    apart.dot(&normal) - along_u * (0.5 * bend * along_u + warp * along_v)
}
