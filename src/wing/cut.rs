//! Plane sections of the exact skins.

use nalgebra::{Point3, Vector3};
use thiserror::Error;

use super::Wing;
use crate::spline::Surface;

/// A section of one side in a plane that holds the x direction: its points are exactly on the skins, x aft, y up.
#[derive(Clone, Debug, PartialEq)]
pub struct Cut {
    /// The plane's origin: the point of the chord line that sections turn about \[mm\].
    pub origin: Point3<f64>,
    /// The section's upward direction, square to x.
    pub up: Vector3<f64>,
    /// Upper side from the nose to the trailing edge \[mm\].
    pub upper: Vec<[f64; 2]>,
    /// Lower side, likewise.
    pub lower: Vec<[f64; 2]>,
}

/// A plane does not cut the wing from nose to trailing edge.
#[derive(Clone, Copy, Debug, Error, PartialEq)]
#[error(
    "the plane of the section at {offset:.3} mm from the centreline leaves the built wing; take a station further inside it"
)]
pub struct Outside {
    /// Distance of the station from the centreline in the reference plane \[mm\].
    pub offset: f64,
}

/// Camber below this counts as none \[chord\].
const LEAST_CAMBER: f64 = 5e-4;

impl Cut {
    /// The chord line's ends: where the sides meet, and the middle of the trailing edge.
    pub fn chord_line(&self) -> [[f64; 2]; 2] {
        let (front, upper, lower) = (
            self.upper[0],
            self.upper[self.upper.len() - 1],
            self.lower[self.lower.len() - 1],
        );
        [front, [0.5 * (upper[0] + lower[0]), 0.5 * (upper[1] + lower[1])]]
    }

    /// Length of the chord \[mm\].
    pub fn chord(&self) -> f64 {
        let [front, rear] = self.chord_line();
        (rear[0] - front[0]).hypot(rear[1] - front[1])
    }

    /// Turn of the chord against the x axis, leading edge up \[rad\].
    pub fn incidence(&self) -> f64 {
        let [front, rear] = self.chord_line();
        (front[1] - rear[1]).atan2(rear[0] - front[0])
    }

    /// Greatest thickness and greatest camber, each with its place, square to the chord \[chord\].
    pub fn thickness_and_camber(&self) -> [[f64; 2]; 2] {
        let [front, rear] = self.chord_line();
        let chord = [rear[0] - front[0], rear[1] - front[1]];
        let square = chord[0] * chord[0] + chord[1] * chord[1];
        let local = |side: &[[f64; 2]]| -> Vec<[f64; 2]> {
            let place = |p: &[f64; 2]| {
                let d = [p[0] - front[0], p[1] - front[1]];
                [
                    (d[0] * chord[0] + d[1] * chord[1]) / square,
                    (d[1] * chord[0] - d[0] * chord[1]) / square,
                ]
            };
            side.iter().map(place).collect()
        };
        let (upper, lower) = (local(&self.upper), local(&self.lower));
        let (mut thickness, mut camber) = ([0.0; 2], [0.0_f64; 2]);
        // the ends are left out: in a leaning plane the sides do not meet quite at the foremost point
        for k in 20..1980_u32 {
            let x = f64::from(k) / 2000.0;
            let (Some(high), Some(low)) = (height(&upper, x), height(&lower, x)) else {
                continue;
            };
            if high - low > thickness[0] {
                thickness = [high - low, x];
            }
            let middle = 0.5 * (high + low);
            // less than this is no camber that anyone asked for
            if middle.abs() > camber[0].abs().max(LEAST_CAMBER) {
                camber = [middle, x];
            }
        }
        [thickness, camber]
    }
}

/// Ordinate of a side at x, between its points.
fn height(side: &[[f64; 2]], x: f64) -> Option<f64> {
    let after = side.partition_point(|p| p[0] < x);
    let (a, b) = (side.get(after.checked_sub(1)?)?, side.get(after)?);
    Some(a[1] + (b[1] - a[1]) * (x - a[0]) / (b[0] - a[0]).max(1e-300))
}

impl Wing {
    /// Cuts the starboard skins in the section plane at a place along the span (see
    /// [`SpanLaw`](crate::planform::SpanLaw)): points as close together as it takes for straight lines between them to
    /// stay within `tolerance` \[mm\] of the skin.
    ///
    /// # Errors
    ///
    /// [`Outside`] where the plane leaves the wing, as it may within a leaning end section of a steep panel, or lies
    /// inside the fuselage.
    pub fn cut(&self, place: f64, tolerance: f64) -> Result<Cut, Outside> {
        let line = self.planform.chord(place);
        let origin = line.at(self.spec.setting.twist_axis);
        let up = line.up;
        let plane = Plane {
            origin,
            normal: Vector3::x().cross(&up).normalize(),
        };
        let side = |upper: bool| {
            let skins: Vec<Surface> = (0..self.loft.panels())
                .map(|k| {
                    if upper {
                        self.loft.upper(k)
                    } else {
                        self.loft.lower(k)
                    }
                })
                .collect();
            let nearest = (0..skins.len())
                .find(|k| plane.passes(&skins[*k], 0.0))
                .unwrap_or(0);
            let at = |u: f64| -> Option<[f64; 2]> {
                let neighbours = [Some(nearest), nearest.checked_add(1), nearest.checked_sub(1)];
                let mut near = neighbours.into_iter().flatten().filter_map(|k| skins.get(k));
                let point = near.find_map(|skin| plane.meets(skin, u))?;
                Some([point.x - origin.x, (point - origin).dot(&up)])
            };
            refined(&at, tolerance)
        };
        let outside = || Outside {
            offset: self.planform.offset(place),
        };
        Ok(Cut {
            origin,
            up,
            upper: side(true).ok_or_else(outside)?,
            lower: side(false).ok_or_else(outside)?,
        })
    }
}

struct Plane {
    origin: Point3<f64>,
    normal: Vector3<f64>,
}

impl Plane {
    /// A spanwise element's ends and their distances from the plane.
    fn ends(&self, skin: &Surface, u: f64) -> [(f64, f64); 2] {
        let (from, to) = skin.v.range();
        [from, to].map(|v| (v, self.off(skin, u, v)))
    }

    fn off(&self, skin: &Surface, u: f64, v: f64) -> f64 {
        (skin.at(u, v) - self.origin).dot(&self.normal)
    }

    fn passes(&self, skin: &Surface, u: f64) -> bool {
        const END: f64 = 1e-9;
        let [low, high] = self.ends(skin, u);
        let rounding = END * (high.1 - low.1).abs();
        low.1.min(high.1) <= rounding && low.1.max(high.1) >= -rounding
    }

    /// Where the spanwise element at `u` meets the plane.
    fn meets(&self, skin: &Surface, u: f64) -> Option<Point3<f64>> {
        if !self.passes(skin, u) {
            return None;
        }
        let [mut low, mut high] = self.ends(skin, u);
        let (from, to, size) = (low.0, high.0, (high.1 - low.1).abs());
        let mut v = from;
        for _ in 0..60 {
            v = (low.0 - low.1 * (high.0 - low.0) / (high.1 - low.1)).clamp(from, to);
            let here = self.off(skin, u, v);
            if here.abs() <= 1e-12 * size {
                break;
            }
            if (here > 0.0) == (high.1 > 0.0) {
                high = (v, here);
                low.1 *= 0.5; // the end that stays counts for less each time (Illinois)
            } else {
                low = (v, here);
                high.1 *= 0.5;
            }
        }
        Some(skin.at(u, v))
    }
}

/// Points of a curve over \[0, 1\], closer together where it bends, so that chords stay within `tolerance` of it.
fn refined(at: &dyn Fn(f64) -> Option<[f64; 2]>, tolerance: f64) -> Option<Vec<[f64; 2]>> {
    const START: u32 = 12;
    const DEEPEST: u32 = 14;
    let mut points = vec![at(0.0)?];
    let mut open: Vec<(f64, f64, u32)> = (0..START)
        .rev()
        .map(|k| {
            (
                f64::from(k) / f64::from(START),
                f64::from(k + 1) / f64::from(START),
                0,
            )
        })
        .collect();
    while let Some((from, to, depth)) = open.pop() {
        let (a, b) = (points[points.len() - 1], at(to)?);
        let middle = 0.5 * (from + to);
        let mut bend = 0.0_f64;
        for share in [0.25, 0.5, 0.75] {
            bend = bend.max(aside(at(from + share * (to - from))?, a, b));
        }
        if bend > 0.5 * tolerance && depth < DEEPEST {
            open.push((middle, to, depth + 1));
            open.push((from, middle, depth + 1));
        } else {
            points.push(b);
        }
    }
    Some(points)
}

/// Distance of a point from the straight line between two others.
fn aside(p: [f64; 2], a: [f64; 2], b: [f64; 2]) -> f64 {
    let way = [b[0] - a[0], b[1] - a[1]];
    let length = way[0].hypot(way[1]).max(1e-300);
    ((p[0] - a[0]) * way[1] - (p[1] - a[1]) * way[0]).abs() / length
}
