//! The curve through the points next to the nose, and where it crosses the chord line or lies foremost.
//!
//! A blunt nose is to first order the parabola x = u², y = a u; sections are smooth in u, and far less so in x, y or the
//! length along the curve. The points are interpolated by polynomials x(u) and y(u), with u taken from the length l of
//! the polygon through the points as if it were the length along the parabola:
//!
//! ```text
//! l(u) = u/2 sqrt(4 u² + a²) + a²/4 asinh(2 u / a)
//! ```

/// Points on either side of the foremost that are interpolated.
const REACH: usize = 3;

/// The curve next to the nose, by polynomials through given points.
#[derive(Debug)]
struct Nose {
    /// Parameters \[square root of the file's unit\], falling from the upper side to the lower.
    u: Vec<f64>,
    points: Vec<[f64; 2]>,
}

impl Nose {
    /// Through the points next to index `m`, the foremost, where x is along the chord. Points closer than `least` to
    /// the one before them, where print rounding would be magnified, are passed over.
    ///
    /// Where the curve is foremost well off the given point, u is counted anew from there.
    fn new(points: &[[f64; 2]], m: usize, least: f64) -> Option<Self> {
        let mut nose = Self::about(points[m], true, [&points[..m], &points[m + 1..]], least)?;
        for _ in 0..3 {
            let foremost = nose.least(|p| p[0]);
            let beside = distance(points[m - 1], points[m]).max(distance(points[m], points[m + 1]));
            let off = distance(foremost, points[m]);
            if off < 0.3 * beside || off > beside {
                break;
            }
            let above = if foremost[1] < points[m][1] { m + 1 } else { m };
            match Self::about(foremost, false, [&points[..above], &points[above..]], least) {
                Some(better) => nose = better,
                None => break,
            }
        }
        Some(nose)
    }

    /// u counted from `origin`, a given point or not, with the points above and below it.
    fn about(origin: [f64; 2], given: bool, [above, below]: [&[[f64; 2]]; 2], least: f64) -> Option<Self> {
        let above = walk(origin, &mut above.iter().rev(), least);
        let below = walk(origin, &mut below.iter(), least);
        let (&(_, p), &(_, q)) = (above.first()?, below.first()?);
        let root = |p: [f64; 2]| (p[0] - origin[0]).max(0.0).sqrt();
        let a = (p[1] - q[1]) / (root(p) + root(q));
        if !(a > 0.0 && a.is_finite()) {
            return None;
        }
        let mut knots: Vec<(f64, [f64; 2])> =
            above.iter().rev().map(|&(l, p)| (parameter(l, a), p)).collect();
        if given {
            knots.push((0.0, origin));
        }
        knots.extend(below.iter().map(|&(l, p)| (-parameter(l, a), p)));
        let (u, points) = knots.into_iter().unzip();
        Some(Self { u, points })
    }

    /// The point between the neighbours of u = 0 where `of` is least.
    fn least(&self, of: impl Fn([f64; 2]) -> f64) -> [f64; 2] {
        let mut high = self.u.iter().rev().copied().find(|&u| u > 0.0).unwrap_or(0.0);
        let mut low = self.u.iter().copied().find(|&u| u < 0.0).unwrap_or(0.0);
        for _ in 0..80 {
            let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
            if of(self.at(a)) < of(self.at(b)) {
                high = b;
            } else {
                low = a;
            }
        }
        self.at(0.5 * (low + high))
    }

    /// The point at `u`, by Neville's scheme.
    fn at(&self, u: f64) -> [f64; 2] {
        let mut column = self.points.clone();
        for width in 1..column.len() {
            for i in 0..column.len() - width {
                let (a, b) = (self.u[i], self.u[i + width]);
                let (p, q) = (column[i], column[i + 1]);
                column[i] = [0, 1].map(|k: usize| ((u - a) * q[k] - (u - b) * p[k]) / (b - a));
            }
        }
        column[0]
    }

    /// Parameter of the given point `p`.
    fn parameter_of(&self, p: [f64; 2]) -> Option<f64> {
        let same = |q: &[f64; 2]| (p[0] - q[0]).hypot(p[1] - q[1]) <= 0.0;
        self.points.iter().position(same).map(|i| self.u[i])
    }
}

fn distance(p: [f64; 2], q: [f64; 2]) -> f64 {
    (p[0] - q[0]).hypot(p[1] - q[1])
}

/// The next points of a side with their lengths from `origin`.
fn walk(origin: [f64; 2], side: &mut dyn Iterator<Item = &[f64; 2]>, least: f64) -> Vec<(f64, [f64; 2])> {
    let mut kept = Vec::with_capacity(REACH);
    let (mut length, mut last) = (0.0, origin);
    for &p in side {
        let step = distance(last, p);
        if step >= least {
            length += step;
            last = p;
            kept.push((length, p));
            if kept.len() == REACH {
                break;
            }
        }
    }
    kept
}

/// u at the length `l` > 0 along the parabola; Newton's method from a point beyond, where it cannot overshoot.
fn parameter(l: f64, a: f64) -> f64 {
    let length = |u: f64| 0.5 * u * (4.0 * u * u + a * a).sqrt() + 0.25 * a * a * (2.0 * u / a).asinh();
    let mut u = (l / a).min(l.sqrt());
    for _ in 0..50 {
        let step = (length(u) - l) / (4.0 * u * u + a * a).sqrt();
        u -= step;
        if step.abs() <= 1e-15 * u {
            break;
        }
    }
    u
}

/// Where the run crosses y = 0 at its nose, going down; `size` is the chord, `unit` the print rounding.
pub(super) fn crossing(points: &[[f64; 2]], size: f64, unit: f64) -> Option<f64> {
    let mut foremost = 0;
    for i in 1..points.len() {
        if points[i][0] < points[foremost][0] {
            foremost = i;
        }
    }
    let near = |p: [f64; 2], share: f64| p[0] < points[foremost][0] + share * size;
    // a given point on the axis, even where the curve does not cross it there (thin sections with much camber)
    if let Some(on_axis) = points.iter().find(|p| p[1].abs() <= 0.0 && near(**p, 0.05)) {
        return Some(on_axis[0]);
    }
    let k = (0..points.len().checked_sub(1)?).find(|&i| {
        let (p, q) = (points[i], points[i + 1]);
        p[1] > 0.0 && q[1] < 0.0 && near(p, 0.05) && near(q, 0.05)
    })?;
    let (p, q) = (points[k], points[k + 1]);
    // both points must be among those interpolated
    let centre = foremost.clamp(k.max(2) - 1, (k + 2).min(points.len() - 2));
    let straight = p[0] + (q[0] - p[0]) * p[1] / (p[1] - q[1]);
    let curved = Nose::new(points, centre, 100.0 * unit).and_then(|nose| {
        let (mut high, mut low) = (nose.parameter_of(p)?, nose.parameter_of(q)?);
        for _ in 0..60 {
            let middle = 0.5 * (high + low);
            if nose.at(middle)[1] > 0.0 {
                high = middle;
            } else {
                low = middle;
            }
        }
        Some(nose.at(0.5 * (high + low))[0])
    });
    // a polynomial that runs wild is no curve through the points
    Some(
        curved
            .filter(|x| (x - straight).abs() < distance(p, q))
            .unwrap_or(straight),
    )
}

/// The point of the curve farthest from `from`, the middle of the trailing edge; `unit` is the print rounding.
pub(super) fn farthest(points: &[[f64; 2]], from: [f64; 2], unit: f64) -> [f64; 2] {
    let mut m = 0;
    for i in 1..points.len() {
        if distance(points[i], from) > distance(points[m], from) {
            m = i;
        }
    }
    let given = points[m];
    if m == 0 || m + 1 >= points.len() {
        return given;
    }
    // axes along and across the line from the farthest given point to the trailing edge
    let chord = distance(given, from);
    let (c, s) = ((from[0] - given[0]) / chord, (from[1] - given[1]) / chord);
    let turned: Vec<[f64; 2]> = points
        .iter()
        .map(|p| {
            let d = [p[0] - given[0], p[1] - given[1]];
            [d[0] * c + d[1] * s, d[1] * c - d[0] * s]
        })
        .collect();
    let Some(nose) = Nose::new(&turned, m, 100.0 * unit) else {
        return given;
    };
    let [x, y] = nose.least(|p| -distance(p, [chord, 0.0]));
    let gap = distance(turned[m - 1], turned[m])
        .max(distance(turned[m], turned[m + 1]))
        .max(100.0 * unit);
    if distance([x, y], [chord, 0.0]) < chord || x.hypot(y) > gap {
        return given;
    }
    [given[0] + x * c - y * s, given[1] + x * s + y * c]
}
