//! Edges: their ends, and the way from one to the other.

use nalgebra::{Point3, Vector3};

use super::access::{Args, Read, finding};
use super::nurbs::Curve;
use super::shape::{Path, path, point};
use crate::inspect::Finding;
use crate::inspect::part21::Exchange;

/// An edge.
#[derive(Clone, Debug)]
pub(super) struct Edge {
    /// Its line in the file.
    pub(super) line: u32,
    /// Numbers of its vertices, start and end.
    pub(super) vertices: [u64; 2],
    /// Where those are.
    pub(super) ends: [Point3<f64>; 2],
    /// Its curve from start to end; `None` where the curve is not read.
    pub(super) way: Option<Way>,
    /// Entity of a curve that is not read.
    pub(super) unread: Option<String>,
}

/// The way along an edge.
#[derive(Clone, Debug)]
pub(super) enum Way {
    /// Straight.
    Straight([Point3<f64>; 2]),
    /// Along a curve, backwards where the flag says so.
    Curved(Curve, bool),
}

impl Way {
    /// Point and derivative at a fraction of the way, 0 to 1.
    pub(super) fn at(&self, fraction: f64) -> (Point3<f64>, Vector3<f64>) {
        match self {
            Self::Straight([a, b]) => (a + (b - a) * fraction, b - a),
            Self::Curved(curve, back) => {
                let (start, end) = curve.knots.range();
                let scale = end - start;
                let along = if *back { 1.0 - fraction } else { fraction };
                let (point, slope) = curve.at(start + scale * along);
                (point, slope * if *back { -scale } else { scale })
            }
        }
    }

    /// Fractions between which the way is one polynomial (or rational) piece.
    pub(super) fn corners(&self) -> Vec<f64> {
        match self {
            Self::Straight(_) => vec![0.0, 1.0],
            Self::Curved(curve, back) => {
                let (start, end) = curve.knots.range();
                let mut corners: Vec<f64> = (curve.knots.corners().iter())
                    .map(|knot| (knot - start) / (end - start))
                    .collect();
                if *back {
                    corners = corners.iter().rev().map(|t| 1.0 - t).collect();
                }
                corners
            }
        }
    }

    /// Points of a Gauss rule that integrates polynomials of four times the degree on each piece.
    pub(super) fn order(&self) -> usize {
        match self {
            Self::Straight(_) => 3,
            Self::Curved(curve, _) if curve.rational => 24,
            Self::Curved(curve, _) => 2 * curve.knots.degree(),
        }
    }

    /// Fractions to compare places at: some on each piece, ends included.
    pub(super) fn samples(&self) -> Vec<f64> {
        let Self::Curved(curve, _) = self else {
            return vec![0.0, 0.5, 1.0];
        };
        // as many as a piece of this degree has degrees of freedom
        let each = curve.knots.degree() + 1;
        let corners = self.corners();
        let mut samples: Vec<f64> = (corners.windows(2))
            .flat_map(|span| (0..each).map(move |k| span[0] + (span[1] - span[0]) * k as f64 / each as f64))
            .collect();
        samples.push(1.0);
        samples
    }
}

impl Edge {
    /// Reads an edge and checks that its curve goes from its start to its end within `tolerance`.
    pub(super) fn read<'a>(
        file: &Exchange<'a>,
        record: &Args<'a>,
        tolerance: f64,
        faults: &mut Vec<Finding>,
    ) -> Read<Self> {
        let vertices = [record.reference(1)?, record.reference(2)?];
        let place = |id| {
            let vertex = record.record_of(file, id, "VERTEX_POINT")?;
            point(&vertex, file, vertex.reference(1)?)
        };
        let ends = [place(vertices[0])?, place(vertices[1])?];
        let forward = record.flag(4)?;
        let mut edge = Self {
            line: record.line,
            vertices,
            ends,
            way: None,
            unread: None,
        };
        let found = path(file, record.named(file, record.reference(3)?)?)
            .map_err(|fault| finding(fault.line.unwrap_or(record.line), fault.what))?;
        match found {
            Path::Unread(entity) => edge.unread = Some(entity),
            Path::Line(origin, along) => {
                for (end, which) in ends.iter().zip(["start", "end"]) {
                    let away = end - origin;
                    let off = (away - along * away.dot(&along)).norm();
                    if off > tolerance {
                        let what = format!("#{}: the edge's {which} is {off:.3e} off its line", record.id);
                        faults.push(finding(record.line, what));
                    }
                }
                let sense = (ends[1] - ends[0]).dot(&along);
                if (sense > 0.0) != forward || sense.abs() <= tolerance {
                    let what = format!(
                        "#{}: the edge runs against the sense that it states along its line",
                        record.id
                    );
                    faults.push(finding(record.line, what));
                }
                edge.way = Some(Way::Straight(ends));
            }
            Path::Spline(curve) => {
                let way = Way::Curved(curve, !forward);
                let stated = [way.at(0.0).0, way.at(1.0).0];
                let off = |i: usize, j: usize| (stated[i] - ends[j]).norm();
                if off(0, 0).max(off(1, 1)) > tolerance {
                    let turned = off(0, 1).max(off(1, 0)) <= tolerance;
                    let what = if turned {
                        format!(
                            "#{}: the edge runs against the sense that it states along its curve",
                            record.id
                        )
                    } else {
                        let worst = off(0, 0).max(off(1, 1));
                        format!(
                            "#{}: the edge's vertices are up to {worst:.3e} from its curve's ends",
                            record.id
                        )
                    };
                    faults.push(finding(record.line, what));
                }
                edge.way = Some(way);
            }
        }
        Ok(edge)
    }
}
