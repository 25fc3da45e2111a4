//! The curve through the points next to the nose, and where it crosses the chord line or lies foremost.
//!
//! There x is a smooth function of y (a blunt nose is a parabola to first order), so the points are interpolated as
//! x(y) by a polynomial.

/// Points on either side of the nose that are interpolated.
const REACH: usize = 3;

/// x(y) next to the nose, as a polynomial through given points.
#[derive(Debug)]
pub(super) struct Nose {
    knots: Vec<[f64; 2]>,
}

impl Nose {
    /// Through up to `REACH` points from `k` upwards (towards index 0) and from `k + 1` downwards. Points closer in y
    /// than `least`, where print rounding would be magnified, are passed over. y falls along `points`.
    pub(super) fn new(points: &[[f64; 2]], k: usize, least: f64) -> Self {
        let mut knots: Vec<[f64; 2]> = Vec::with_capacity(2 * REACH);
        let mut add = |side: &mut dyn Iterator<Item = &[f64; 2]>, sense: f64| {
            let mut last: Option<f64> = None;
            let mut count = 0;
            for &p in side {
                let step = last.map(|y| sense * (p[1] - y));
                if step.is_some_and(|s| s < 0.0) || count == REACH {
                    break;
                }
                if step.is_none_or(|s| s >= least) {
                    knots.push(p);
                    last = Some(p[1]);
                    count += 1;
                }
            }
        };
        add(&mut points[..=k].iter().rev(), 1.0);
        add(&mut points[k + 1..].iter(), -1.0);
        Self { knots }
    }

    /// x at `y`, by Neville's scheme.
    pub(super) fn x(&self, y: f64) -> f64 {
        let mut column: Vec<f64> = self.knots.iter().map(|p| p[0]).collect();
        for width in 1..column.len() {
            for i in 0..column.len() - width {
                let (a, b) = (self.knots[i][1], self.knots[i + width][1]);
                if (b - a).abs() > 0.0 {
                    column[i] = ((y - a) * column[i + 1] - (y - b) * column[i]) / (b - a);
                }
            }
        }
        column.first().copied().unwrap_or(0.0)
    }
}

/// Where the run crosses y = 0 at its nose, going down; `size` is the chord, `unit` the print rounding.
pub(super) fn crossing(points: &[[f64; 2]], size: f64, unit: f64) -> Option<f64> {
    let foremost = points.iter().map(|p| p[0]).fold(f64::INFINITY, f64::min);
    let near = |p: [f64; 2]| p[0] < foremost + 0.05 * size;
    let k = (0..points.len().checked_sub(1)?).find(|&i| {
        let (p, q) = (points[i], points[i + 1]);
        p[1] >= 0.0 && q[1] < 0.0 && near(p) && near(q)
    })?;
    let (p, q) = (points[k], points[k + 1]);
    if p[1] <= 0.0 {
        return Some(p[0]);
    }
    let gap = (p[0] - q[0]).hypot(p[1] - q[1]);
    let straight = p[0] + (q[0] - p[0]) * p[1] / (p[1] - q[1]);
    let curved = Nose::new(points, k, 100.0 * unit).x(0.0);
    // a polynomial that runs wild is no curve through the points
    Some(if (curved - straight).abs() < gap {
        curved
    } else {
        straight
    })
}

/// The point of the curve farthest from `from`, the middle of the trailing edge.
pub(super) fn farthest(points: &[[f64; 2]], from: [f64; 2], unit: f64) -> [f64; 2] {
    let distance = |p: [f64; 2]| (p[0] - from[0]).hypot(p[1] - from[1]);
    let mut m = 0;
    for i in 1..points.len() {
        if distance(points[i]) > distance(points[m]) {
            m = i;
        }
    }
    let given = points[m];
    if m == 0 || m + 1 >= points.len() {
        return given;
    }
    // axes along and across the line from the farthest given point to the trailing edge
    let chord = distance(given);
    let (c, s) = ((from[0] - given[0]) / chord, (from[1] - given[1]) / chord);
    let local = |p: [f64; 2]| {
        let d = [p[0] - given[0], p[1] - given[1]];
        [d[0] * c + d[1] * s, d[1] * c - d[0] * s]
    };
    let turned: Vec<[f64; 2]> = points[m.saturating_sub(200)..(m + 200).min(points.len())]
        .iter()
        .map(|&p| local(p))
        .collect();
    let m = m.min(200);
    let (mut low, mut high) = (turned[m + 1][1], turned[m - 1][1]);
    if !(low < 0.0 && high > 0.0) {
        return given;
    }
    let nose = Nose::new(&turned, m, 100.0 * unit);
    let far = |y: f64| (chord - nose.x(y)).hypot(y);
    for _ in 0..60 {
        let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
        if far(a) > far(b) {
            high = b;
        } else {
            low = a;
        }
    }
    let y = 0.5 * (low + high);
    let x = nose.x(y);
    if far(y) < chord || x.abs() > (turned[m - 1][1] - turned[m + 1][1]) {
        return given;
    }
    [given[0] + x * c - y * s, given[1] + x * s + y * c]
}
