//! Whether a solid is sound, in topology and in geometry.

use std::collections::HashMap;
use std::fmt;

use truck_modeling::{
    BSplineSurface, BoundedCurve, Curve, EdgeID, EuclideanSpace, InnerSpace, MetricSpace, ParametricCurve,
    Point3, Surface, Vector4, topology::ShellCondition,
};

use super::Solid;

/// Largest distance between a vertex and its curve's end, an edge and its surface \[mm\]: the kernel's own tolerance.
const TOLERANCE: f64 = 1e-6;

/// Why a solid is not sound.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Finding {
    /// Not exactly one shell.
    Shells(usize),
    /// The shell is not closed by the kernel's count.
    NotClosed,
    /// The shell falls apart.
    NotConnected,
    /// Shells touch in a vertex only.
    SingularVertex,
    /// An edge is not used exactly twice in opposite senses.
    EdgeUse {
        /// How often it is used.
        uses: usize,
    },
    /// Labels and faces differ in number.
    Labels,
    /// A vertex is off its edge's end \[mm\].
    VertexOffCurve(f64),
    /// An edge is off its face's surface \[mm\]; the face counted from 0.
    EdgeOffSurface(usize, f64),
    /// An edge is shorter than readers can tell \[mm\].
    ShortEdge(f64),
}

impl fmt::Display for Finding {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Shells(n) => write!(f, "{n} shells instead of one"),
            Self::NotClosed => write!(f, "its shell is not closed"),
            Self::NotConnected => write!(f, "its shell falls apart"),
            Self::SingularVertex => write!(f, "its shell touches itself in a vertex"),
            Self::EdgeUse { uses } => write!(f, "an edge is used {uses} times or twice in the same sense"),
            Self::Labels => write!(f, "its faces are not all labelled"),
            Self::VertexOffCurve(d) => write!(f, "a vertex is {d:e} mm off its edge's end"),
            Self::EdgeOffSurface(k, d) => write!(f, "an edge of face {k} is {d:e} mm off the surface"),
            Self::ShortEdge(d) => write!(f, "an edge is only {d:e} mm long"),
        }
    }
}

/// Checks a solid: one closed connected shell, each edge used twice in opposite senses, vertices on the ends of their
/// curves, every edge on the surfaces of both its faces.
///
/// # Errors
///
/// The first [`Finding`].
pub fn check(solid: &Solid) -> Result<(), Finding> {
    let [shell] = solid.shape.boundaries().as_slice() else {
        return Err(Finding::Shells(solid.shape.boundaries().len()));
    };
    if shell.shell_condition() != ShellCondition::Closed {
        return Err(Finding::NotClosed);
    }
    if !shell.is_connected() {
        return Err(Finding::NotConnected);
    }
    if !shell.singular_vertices().is_empty() {
        return Err(Finding::SingularVertex);
    }
    if shell.len() != solid.faces.len() {
        return Err(Finding::Labels);
    }
    let mut uses: HashMap<EdgeID, (usize, i32)> = HashMap::new();
    for (k, face) in shell.face_iter().enumerate() {
        let surface = face.surface();
        for edge in face.boundaries().into_iter().flatten() {
            let entry = uses.entry(edge.id()).or_default();
            entry.0 += 1;
            entry.1 += if edge.orientation() { 1 } else { -1 };
            let curve = edge.curve();
            let length = edge.front().point().distance(edge.back().point());
            if length < 1e3 * TOLERANCE {
                return Err(Finding::ShortEdge(length));
            }
            let (start, end) = curve_ends(&curve);
            let off = start
                .distance(edge.absolute_front().point())
                .max(end.distance(edge.absolute_back().point()));
            if off > TOLERANCE {
                return Err(Finding::VertexOffCurve(off));
            }
            let off = distance_to_surface(&curve, &surface);
            if off > TOLERANCE {
                return Err(Finding::EdgeOffSurface(k, off));
            }
        }
    }
    match uses.values().find(|(count, sum)| *count != 2 || *sum != 0) {
        Some((uses, _)) => Err(Finding::EdgeUse { uses: *uses }),
        None => Ok(()),
    }
}

fn curve_ends(curve: &Curve) -> (Point3, Point3) {
    match curve {
        Curve::Line(line) => (line.0, line.1),
        Curve::BSplineCurve(spline) => {
            let points = spline.control_points();
            (points[0], points[points.len() - 1])
        }
        other => {
            let (start, end) = other.range_tuple();
            (other.subs(start), other.subs(end))
        }
    }
}

fn control_points(curve: &Curve) -> Vec<Point3> {
    match curve {
        Curve::BSplineCurve(spline) => spline.control_points().clone(),
        Curve::NurbsCurve(arc) => {
            let weighted = arc.control_points();
            weighted
                .iter()
                .map(|p| Point3::new(p.x / p.w, p.y / p.w, p.z / p.w))
                .collect()
        }
        other => {
            let (start, end) = curve_ends(other);
            vec![start, end]
        }
    }
}

/// How far a boundary curve is from its surface \[mm\]: from a plane by its control points, from a spline surface by the
/// control row it has to be equal to.
fn distance_to_surface(curve: &Curve, surface: &Surface) -> f64 {
    let points = control_points(curve);
    match surface {
        Surface::Plane(plane) => {
            let (origin, normal) = (plane.origin(), plane.normal());
            points
                .iter()
                .map(|p| (p - origin).dot(normal).abs())
                .fold(0.0, f64::max)
        }
        Surface::BSplineSurface(spline) => boundary_rows(spline)
            .into_iter()
            .map(|row| row_distance(&points, &row))
            .fold(f64::INFINITY, f64::min),
        Surface::NurbsSurface(spline) => {
            // a row that is an edge has to have the edge's points and weights
            let points: Vec<Vector4> = match curve {
                Curve::NurbsCurve(arc) => arc.control_points().clone(),
                _ => points.iter().map(|p| p.to_vec().extend(1.0)).collect(),
            };
            let net = spline.control_points();
            let rows = [
                net[net.len() - 1].clone(),
                net.iter().map(|row| row[0]).collect(),
                net.iter().map(|row| row[row.len() - 1]).collect(),
            ];
            let distance = |row: &Vec<Vector4>| {
                if row.len() != points.len() {
                    return f64::INFINITY;
                }
                row.iter()
                    .zip(&points)
                    .map(|(a, b)| (a - b).magnitude())
                    .fold(0.0, f64::max)
            };
            rows.iter().map(distance).fold(f64::INFINITY, f64::min)
        }
        _ => f64::INFINITY,
    }
}

fn boundary_rows(surface: &BSplineSurface<Point3>) -> [Vec<Point3>; 4] {
    let net = surface.control_points();
    let last = |row: &Vec<Point3>| row[row.len() - 1];
    [
        net[0].clone(),
        net[net.len() - 1].clone(),
        net.iter().map(|row| row[0]).collect(),
        net.iter().map(last).collect(),
    ]
}

fn row_distance(points: &[Point3], row: &[Point3]) -> f64 {
    if points.len() != row.len() {
        return f64::INFINITY;
    }
    let distance = |reversed: bool| -> f64 {
        let pairs = points.iter().enumerate();
        pairs
            .map(|(i, p)| p.distance(row[if reversed { row.len() - 1 - i } else { i }]))
            .fold(0.0, f64::max)
    };
    distance(false).min(distance(true))
}
