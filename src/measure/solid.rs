//! Volume, area and centroid by the divergence theorem on the exact faces.

use nalgebra::{Point3, Vector3};

use crate::loft::{Loft, RoundTip};
use crate::spline::quadrature::{four, ten};
use crate::spline::{Curve, Surface};

/// Figures of a closed solid.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Figures {
    /// Volume \[mm³\].
    pub volume: f64,
    /// Area of all faces \[mm²\].
    pub surface_area: f64,
    /// Area of all faces but the root cap, which lies against something \[mm²\].
    pub wetted_area: f64,
    /// Centroid of the volume \[mm\].
    pub centroid: Point3<f64>,
    /// Least corner of the box about vertices and edges \[mm\].
    pub least: Point3<f64>,
    /// Greatest corner of that box \[mm\].
    pub greatest: Point3<f64>,
}

/// Sums of surface integrals.
#[derive(Default)]
struct Sums {
    area: f64,
    volume: f64,
    moment: Vector3<f64>,
}

/// Measures the solid that is made of a loft, or of two that meet in their root section.
///
/// Volume and centroid are exact for the polynomial faces up to rounding; the area is a quadrature, good to about 1e-8.
pub fn figures(lofts: &[&Loft]) -> Figures {
    let joined = lofts.len() > 1;
    // moments about a point inside keep rounding small
    let origin = lofts[0].sections[0].nose();
    let (mut sums, mut root_area) = (Sums::default(), 0.0);
    let mut least = Point3::from(Vector3::repeat(f64::INFINITY));
    let mut greatest = -least;
    for loft in lofts {
        let sense = if loft.port { -1.0 } else { 1.0 };
        for k in 0..loft.panels() {
            sums.face(&loft.upper(k), origin, sense);
            sums.face(&loft.lower(k), origin, -sense);
            if let Some(base) = loft.base(k) {
                sums.face(&base, origin, sense);
            }
            // the edges along the span bulge too where a panel is not straight
            for surface in [loft.upper(k), loft.lower(k)] {
                for point in [false, true]
                    .iter()
                    .flat_map(|last| dense(&surface.column_curve(*last)))
                {
                    least = least.inf(&point);
                    greatest = greatest.sup(&point);
                }
            }
        }
        let last = loft.panels();
        match &loft.round {
            Some(tip) => sums.round_tip(tip, loft.blunt, origin, sense),
            None => {
                sums.cap(&loft.upper_curve(last), &loft.lower_curve(last), origin, sense);
            }
        }
        if !joined {
            root_area = sums.cap(&loft.upper_curve(0), &loft.lower_curve(0), origin, -sense);
        }
        if let Some(tip) = loft.round.as_ref().filter(|_| loft.blunt) {
            for i in 0..=64_u32 {
                let point = tip.surface.at(1.0, f64::from(i) / 64.0);
                least = least.inf(&point);
                greatest = greatest.sup(&point);
            }
        }
        for k in 0..=loft.panels() {
            for curve in [loft.upper_curve(k), loft.lower_curve(k)] {
                for point in dense(&curve) {
                    least = least.inf(&point);
                    greatest = greatest.sup(&point);
                }
            }
        }
    }
    Figures {
        volume: sums.volume,
        surface_area: sums.area,
        wetted_area: sums.area - root_area,
        centroid: origin + sums.moment / sums.volume,
        least,
        greatest,
    }
}

impl Sums {
    /// Adds a face; `sense` is 1 where u x v points outwards, else -1.
    fn face(&mut self, surface: &Surface, origin: Point3<f64>, sense: f64) {
        for u in surface.u.corners().windows(2) {
            for v in surface.v.corners().windows(2) {
                let straight = surface.v.degree() == 1;
                let rule: Vec<(f64, f64)> = if straight {
                    four(v[0], v[1]).collect()
                } else {
                    ten(v[0], v[1]).collect()
                };
                for (s, weight_u) in ten(u[0], u[1]) {
                    for (t, weight_v) in &rule {
                        let d = surface.derivative(s, *t);
                        self.element(d.point - origin, d.u.cross(&d.v) * (sense * weight_u * weight_v));
                    }
                }
            }
        }
    }

    /// Adds a round tip, and the half disc behind it where the trailing edge is blunt.
    fn round_tip(&mut self, tip: &RoundTip, blunt: bool, origin: Point3<f64>, sense: f64) {
        let surface = &tip.surface;
        for u in surface.surface.u.corners().windows(2) {
            for v in surface.surface.v.corners().windows(2) {
                for (s, weight_u) in ten(u[0], u[1]) {
                    for (t, weight_v) in ten(v[0], v[1]) {
                        let d = surface.derivative(s, t);
                        self.element(d.point - origin, d.u.cross(&d.v) * (sense * weight_u * weight_v));
                    }
                }
            }
        }
        if blunt {
            // a fan from the middle of the base to the arc
            let middle = nalgebra::center(&surface.at(1.0, 0.0), &surface.at(1.0, 1.0));
            for v in surface.surface.v.corners().windows(2) {
                for (t, weight_v) in ten(v[0], v[1]) {
                    let d = surface.derivative(1.0, t);
                    let spoke = d.point - middle;
                    for (share, weight) in four(0.0, 1.0) {
                        let area = spoke.cross(&(d.v * share)) * (-sense * weight * weight_v);
                        self.element(middle + spoke * share - origin, area);
                    }
                }
            }
        }
    }

    /// One element of surface: position and outward area vector.
    fn element(&mut self, r: Vector3<f64>, area: Vector3<f64>) {
        self.area += area.norm();
        self.volume += r.dot(&area) / 3.0;
        self.moment += r.component_mul(&r).component_mul(&area) * 0.5;
    }

    /// Adds the plane cap between an upper and a lower curve as the ruled surface between points of equal parameter,
    /// which covers it once; returns its area. `sense` is 1 where the outward side is starboard.
    fn cap(&mut self, upper: &Curve, lower: &Curve, origin: Point3<f64>, sense: f64) -> f64 {
        let mut corners = upper.knots.corners();
        corners.extend(lower.knots.corners());
        corners.sort_by(f64::total_cmp);
        corners.dedup();
        let mut sum = Vector3::zeros();
        for span in corners.windows(2) {
            for (s, weight_u) in ten(span[0], span[1]) {
                let (top, top_slope) = at(upper, s);
                let (bottom, bottom_slope) = at(lower, s);
                for (t, weight_v) in four(0.0, 1.0) {
                    let slope = top_slope * (1.0 - t) + bottom_slope * t;
                    let across = bottom - top;
                    let point = top + across * t;
                    // x aft, then down: to starboard
                    let area = slope.cross(&across) * (sense * weight_u * weight_v);
                    sum += area;
                    let r = point - origin;
                    self.volume += r.dot(&area) / 3.0;
                    self.moment += r.component_mul(&r).component_mul(&area) * 0.5;
                }
            }
        }
        self.area += sum.norm();
        sum.norm()
    }
}

fn at(curve: &Curve, s: f64) -> (Point3<f64>, Vector3<f64>) {
    let d = curve.knots.derivatives(s);
    let mut sums = [Vector3::zeros(); 2];
    for i in 0..=curve.knots.degree() {
        sums[0] += curve.points[d.first + i].coords * d.rows[0][i];
        sums[1] += curve.points[d.first + i].coords * d.rows[1][i];
    }
    (Point3::from(sums[0]), sums[1])
}

/// Points along a curve, close enough for a bounding box that is 1e-4 of the chord wrong at most; ends included.
fn dense(curve: &Curve) -> Vec<Point3<f64>> {
    let (start, end) = curve.knots.range();
    (0..=64_u32)
        .map(|i| curve.at(start + (end - start) * f64::from(i) / 64.0))
        .collect()
}
