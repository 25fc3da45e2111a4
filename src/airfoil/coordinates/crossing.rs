//! Whether a run of points crosses itself.
//!
//! A binary tree of bounding boxes over the run; pieces whose boxes are apart are never compared. On a section that
//! takes a number of comparisons proportional to its points.

/// Segments in a leaf of the tree.
const LEAF: usize = 8;
/// Comparisons of boxes after which a run counts as tangled.
const MOST: usize = 40_000_000;

#[derive(Clone, Copy)]
struct Box2 {
    low: [f64; 2],
    high: [f64; 2],
}

impl Box2 {
    fn apart(&self, other: &Self) -> bool {
        (0..2).any(|k| self.high[k] < other.low[k] || other.high[k] < self.low[k])
    }
}

/// A piece of the run: a node of the tree and its segments.
#[derive(Clone, Copy, PartialEq)]
struct Piece {
    node: usize,
    from: usize,
    to: usize,
}

impl Piece {
    fn halves(self) -> [Self; 2] {
        let middle = self.from + (self.to - self.from) / 2;
        [
            Self {
                node: 2 * self.node + 1,
                from: self.from,
                to: middle,
            },
            Self {
                node: 2 * self.node + 2,
                from: middle,
                to: self.to,
            },
        ]
    }

    fn is_leaf(self) -> bool {
        self.to - self.from <= LEAF
    }
}

/// Two segments (by the index of their first point) where the run crosses or touches itself, such that the loop between
/// them is wider than `unit` on average; sides that only touch within the print rounding do not count.
pub(super) fn find(points: &[[f64; 2]], unit: f64) -> Option<(usize, usize)> {
    let segments = points.len().checked_sub(1).filter(|&n| n > 2)?;
    let root = Piece {
        node: 0,
        from: 0,
        to: segments,
    };
    let mut boxes = vec![
        Box2 {
            low: [0.0; 2],
            high: [0.0; 2]
        };
        4 * segments
    ];
    enclose(points, root, &mut boxes);
    let loops = Loops::new(points);
    let mut pending = vec![(root, root)];
    let mut compared = 0;
    while let Some((a, b)) = pending.pop() {
        compared += 1;
        if compared > MOST {
            return Some((a.from, b.from));
        }
        if a != b && boxes[a.node].apart(&boxes[b.node]) {
            continue;
        }
        if a.is_leaf() && b.is_leaf() {
            if let Some(pair) = leaf_pair(points, a, b, &loops, unit) {
                return Some(pair);
            }
        } else if a == b {
            let [l, r] = a.halves();
            pending.extend([(l, l), (r, r), (l, r)]);
        } else if b.is_leaf() || (!a.is_leaf() && a.to - a.from >= b.to - b.from) {
            pending.extend(a.halves().map(|half| (half, b)));
        } else {
            pending.extend(b.halves().map(|half| (a, half)));
        }
    }
    None
}

fn enclose(points: &[[f64; 2]], piece: Piece, boxes: &mut [Box2]) -> Box2 {
    let all = if piece.is_leaf() {
        let mut all = Box2 {
            low: [f64::INFINITY; 2],
            high: [f64::NEG_INFINITY; 2],
        };
        for p in &points[piece.from..=piece.to] {
            all.low = [all.low[0].min(p[0]), all.low[1].min(p[1])];
            all.high = [all.high[0].max(p[0]), all.high[1].max(p[1])];
        }
        all
    } else {
        let [l, r] = piece.halves().map(|half| enclose(points, half, boxes));
        Box2 {
            low: [l.low[0].min(r.low[0]), l.low[1].min(r.low[1])],
            high: [l.high[0].max(r.high[0]), l.high[1].max(r.high[1])],
        }
    };
    boxes[piece.node] = all;
    all
}

fn leaf_pair(points: &[[f64; 2]], a: Piece, b: Piece, loops: &Loops, unit: f64) -> Option<(usize, usize)> {
    let last = points.len() - 2;
    let closed = apart(points[0], points[last + 1]) <= 0.0;
    for i in a.from..a.to {
        for j in b.from.max(i + 2)..b.to {
            if i == 0 && j == last && closed {
                continue;
            }
            if meet(points[i], points[i + 1], points[j], points[j + 1]) && loops.width(points, i, j) > unit {
                return Some((i, j));
            }
        }
    }
    None
}

fn apart(p: [f64; 2], q: [f64; 2]) -> f64 {
    (p[0] - q[0]).hypot(p[1] - q[1])
}

/// Twice the area of the triangle p, q, r.
fn turn(p: [f64; 2], q: [f64; 2], r: [f64; 2]) -> f64 {
    (q[0] - p[0]) * (r[1] - p[1]) - (q[1] - p[1]) * (r[0] - p[0])
}

/// Whether the segments p-q and r-s have a point in common.
fn meet(p: [f64; 2], q: [f64; 2], r: [f64; 2], s: [f64; 2]) -> bool {
    let overlap = |k: usize| p[k].min(q[k]) <= r[k].max(s[k]) && r[k].min(s[k]) <= p[k].max(q[k]);
    overlap(0) && overlap(1) && turn(p, q, r) * turn(p, q, s) <= 0.0 && turn(r, s, p) * turn(r, s, q) <= 0.0
}

/// Areas and lengths of the loops that a crossing cuts off, from sums along the run.
struct Loops {
    length: Vec<f64>,
    area: Vec<f64>,
}

impl Loops {
    fn new(points: &[[f64; 2]]) -> Self {
        let (mut length, mut area) = (vec![0.0], vec![0.0]);
        let (mut l, mut a) = (0.0, 0.0);
        for pair in points.windows(2) {
            l += apart(pair[0], pair[1]);
            a += pair[0][0] * pair[1][1] - pair[1][0] * pair[0][1];
            length.push(l);
            area.push(a);
        }
        Self { length, area }
    }

    /// Mean width of the narrower of the two loops at a crossing of the segments `i` < `j`.
    fn width(&self, points: &[[f64; 2]], i: usize, j: usize) -> f64 {
        let end = points.len() - 1;
        let cross = |p: [f64; 2], q: [f64; 2]| p[0] * q[1] - q[0] * p[1];
        let inner = self.area[j] - self.area[i + 1] + cross(points[j], points[i + 1]);
        let outer = self.area[i] + cross(points[i], points[j + 1]) + self.area[end] - self.area[j + 1]
            + cross(points[end], points[0]);
        let inner_length = self.length[j] - self.length[i + 1];
        let outer_length =
            self.length[i] + self.length[end] - self.length[j + 1] + apart(points[0], points[end]);
        let mean = |area: f64, length: f64| if length > 0.0 { area.abs() / length } else { 0.0 };
        mean(inner, inner_length).min(mean(outer, outer_length))
    }
}
