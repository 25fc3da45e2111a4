//! From exact faces to the kernel's solid.

use nalgebra::Point3;
use truck_modeling as kernel;
use truck_modeling::{
    BSplineCurve, BSplineSurface, Edge, Face, KnotVec, NurbsCurve, NurbsSurface, Plane, Shell, Vertex, Wire,
};

use super::{Error, FaceKind, FaceLabel, Side, Solid, check};
use crate::loft::{Loft, RoundTip};
use crate::spline::{Curve, Surface, WeightedSurface};

/// Builds one closed solid from a loft, or from two that meet in their root section (the first starboard, the second its
/// mirror image).
///
/// # Errors
///
/// [`Error::Topology`] where the kernel refuses a face or the shell, [`Error::Unsound`] where the result fails [`check`].
pub fn build(name: &str, lofts: &[&Loft]) -> Result<Solid, Error> {
    let mut shell = ShellInProgress::default();
    let joined = lofts.len() > 1;
    let mut root: Option<SectionEdges> = None;
    for loft in lofts {
        let first = match &root {
            Some(edges) if joined => edges.clone(),
            _ => SectionEdges::new(loft, 0),
        };
        if !joined {
            shell.cap(loft, &first, FaceKind::Root)?;
        }
        root = Some(first.clone());
        let mut inner = first;
        for panel in 0..loft.panels() {
            let outer = SectionEdges::new(loft, panel + 1);
            shell.panel(loft, panel, &inner, &outer)?;
            inner = outer;
        }
        match &loft.round {
            Some(tip) => shell.round_tip(loft, &inner, tip)?,
            None => shell.cap(loft, &inner, FaceKind::Tip)?,
        }
    }
    let ShellInProgress { faces, labels } = shell;
    let shell: Shell = faces.into_iter().collect();
    let shape = kernel::Solid::try_new(vec![shell]).map_err(|source| Error::Topology {
        what: format!("closed shell of {name}"),
        source: source.into(),
    })?;
    let solid = Solid {
        name: name.to_owned(),
        shape,
        faces: labels,
    };
    check(&solid).map_err(Error::Unsound)?;
    Ok(solid)
}

/// Vertices and edges of one section; on a sharp trailing edge the two tails are one and there is no base.
#[derive(Clone)]
struct SectionEdges {
    nose: Vertex,
    upper_tail: Vertex,
    lower_tail: Vertex,
    /// Nose to upper tail.
    upper: Edge,
    /// Nose to lower tail.
    lower: Edge,
    /// Upper tail to lower tail.
    base: Option<Edge>,
}

impl SectionEdges {
    fn new(loft: &Loft, k: usize) -> Self {
        let section = &loft.sections[k];
        let nose = Vertex::new(point(section.nose()));
        let upper_tail = Vertex::new(point(section.upper_tail()));
        let lower_tail = if loft.blunt {
            Vertex::new(point(section.lower_tail()))
        } else {
            upper_tail.clone()
        };
        let upper = Edge::new(&nose, &upper_tail, curve(&loft.upper_curve(k)));
        let lower = Edge::new(&nose, &lower_tail, curve(&loft.lower_curve(k)));
        let base = loft.blunt.then(|| line(&upper_tail, &lower_tail));
        Self {
            nose,
            upper_tail,
            lower_tail,
            upper,
            lower,
            base,
        }
    }
}

#[derive(Default)]
struct ShellInProgress {
    faces: Vec<Face>,
    labels: Vec<FaceLabel>,
}

impl ShellInProgress {
    /// The faces of one panel between two sections.
    ///
    /// Seen from outside, u x v points up on both skins of the starboard side, and aft on the base; so the lower skin
    /// is turned, and on the port side all are.
    fn panel(
        &mut self,
        loft: &Loft,
        k: usize,
        inner: &SectionEdges,
        outer: &SectionEdges,
    ) -> Result<(), Error> {
        let (upper_skin, lower_skin) = (loft.upper(k), loft.lower(k));
        let front = spanwise(&inner.nose, &outer.nose, &upper_skin.column_curve(false));
        let upper_rear = spanwise(
            &inner.upper_tail,
            &outer.upper_tail,
            &upper_skin.column_curve(true),
        );
        let lower_rear = if loft.blunt {
            spanwise(
                &inner.lower_tail,
                &outer.lower_tail,
                &lower_skin.column_curve(true),
            )
        } else {
            upper_rear.clone()
        };
        let loop_of = |first: &Edge, right: &Edge, last: &Edge, left: &Edge| -> Wire {
            [first.clone(), right.clone(), last.inverse(), left.inverse()]
                .into_iter()
                .collect()
        };
        let upper = loop_of(&inner.upper, &upper_rear, &outer.upper, &front);
        let lower = loop_of(&inner.lower, &lower_rear, &outer.lower, &front);
        self.add(
            loft,
            FaceKind::Upper,
            k,
            upper,
            surface(&loft.upper(k)),
            loft.port,
        )?;
        self.add(
            loft,
            FaceKind::Lower,
            k,
            lower,
            surface(&loft.lower(k)),
            !loft.port,
        )?;
        if let (Some(base), Some(a), Some(b)) = (loft.base(k), &inner.base, &outer.base) {
            let wire = loop_of(a, &lower_rear, b, &upper_rear);
            self.add(loft, FaceKind::TrailingEdge, k, wire, surface(&base), loft.port)?;
        }
        Ok(())
    }

    /// The plane cap of an end section, its normal pointing outwards.
    fn cap(&mut self, loft: &Loft, edges: &SectionEdges, kind: FaceKind) -> Result<(), Error> {
        let tip = kind == FaceKind::Tip;
        // from nose over the upper side, the base, and back under the lower side
        let mut around: Wire = std::iter::once(edges.upper.clone())
            .chain(edges.base.clone())
            .chain(std::iter::once(edges.lower.inverse()))
            .collect();
        let (section, panel) = if tip {
            (&loft.sections[loft.panels()], loft.panels() - 1)
        } else {
            (&loft.sections[0], 0)
        };
        // that way round is clockwise as seen from port: the loop's normal points to starboard
        let outwards_starboard = tip != loft.port;
        if !outwards_starboard {
            around = around.inverse();
        }
        let plane = section_plane(section, outwards_starboard);
        self.add(loft, kind, panel, around, kernel::Surface::Plane(plane), false)
    }

    /// The round tip on the last section; on a blunt trailing edge also the half disc that closes it behind.
    fn round_tip(&mut self, loft: &Loft, edges: &SectionEdges, tip: &RoundTip) -> Result<(), Error> {
        let last = loft.panels() - 1;
        let mut around: Vec<Edge> = vec![edges.upper.clone()];
        if let Some(base) = &edges.base {
            let arc = Edge::new(&edges.upper_tail, &edges.lower_tail, rear_arc(tip));
            around.push(arc.clone());
            let [upper, lower] = [edges.upper_tail.point(), edges.lower_tail.point()];
            let middle = upper + (lower - upper) / 2.0;
            let outwards = point(tip.rear()[2]) - middle;
            // down, then outwards: behind on the starboard side, ahead on its mirror image
            let (first, second) = if loft.port {
                (outwards, lower - upper)
            } else {
                (lower - upper, outwards)
            };
            let plane = Plane::new(upper, upper + first, upper + second);
            let mut disc: Wire = [base.clone(), arc.inverse()].into_iter().collect();
            if loft.port {
                disc = disc.inverse();
            }
            self.add(
                loft,
                FaceKind::TipEnd,
                last,
                disc,
                kernel::Surface::Plane(plane),
                false,
            )?;
        }
        around.push(edges.lower.inverse());
        let wire: Wire = around.into_iter().collect();
        self.add(loft, FaceKind::Tip, last, wire, weighted(&tip.surface), loft.port)
    }

    fn add(
        &mut self,
        loft: &Loft,
        kind: FaceKind,
        panel: usize,
        wire: Wire,
        surface: kernel::Surface,
        turned: bool,
    ) -> Result<(), Error> {
        let side = if loft.port { Side::Port } else { Side::Starboard };
        let label = FaceLabel {
            kind,
            panel: panel + 1,
            side,
        };
        let mut face = Face::try_new(vec![wire], surface).map_err(|source| Error::Topology {
            what: format!("{kind:?} face, panel {}, {side}", panel + 1),
            source: source.into(),
        })?;
        if turned {
            face.invert();
        }
        self.faces.push(face);
        self.labels.push(label);
        Ok(())
    }
}

/// The plane of a section: through its nose, x along the chord, its normal to starboard or to port.
fn section_plane(section: &crate::loft::Section, starboard: bool) -> Plane {
    let nose = section.nose();
    let tail = nalgebra::center(&section.upper_tail(), &section.lower_tail());
    let chord = (tail - nose).normalize();
    // the section's plane holds the x direction and its lean; the upper control point after the nose lies above it
    let above = section.upper[1] - nose;
    let up = (above - chord * above.dot(&chord)).normalize();
    let (first, second) = if starboard { (up, chord) } else { (chord, up) };
    Plane::new(point(nose), point(nose + first), point(nose + second))
}

fn point(p: Point3<f64>) -> kernel::Point3 {
    kernel::Point3::new(p.x, p.y, p.z)
}

fn line(a: &Vertex, b: &Vertex) -> Edge {
    Edge::new(a, b, kernel::Curve::Line(kernel::Line(a.point(), b.point())))
}

/// An edge along the span: a line where the curve is straight.
fn spanwise(a: &Vertex, b: &Vertex, along: &Curve) -> Edge {
    if along.knots.degree() == 1 {
        line(a, b)
    } else {
        Edge::new(a, b, curve(along))
    }
}

/// The half ellipse behind a round tip.
fn rear_arc(tip: &RoundTip) -> kernel::Curve {
    let knots = KnotVec::from(tip.surface.surface.v.values().to_vec());
    let points = tip
        .rear()
        .into_iter()
        .zip(&tip.surface.weights)
        .map(|(p, w)| homogeneous(&p, *w))
        .collect();
    kernel::Curve::NurbsCurve(NurbsCurve::new(BSplineCurve::new_unchecked(knots, points)))
}

fn weighted(s: &WeightedSurface) -> kernel::Surface {
    let (u, v) = (&s.surface.u, &s.surface.v);
    let knots = (
        KnotVec::from(u.values().to_vec()),
        KnotVec::from(v.values().to_vec()),
    );
    let columns = (0..u.count())
        .map(|i| {
            s.surface
                .rows
                .iter()
                .zip(&s.weights)
                .map(|(row, w)| homogeneous(&row[i], *w))
                .collect()
        })
        .collect();
    kernel::Surface::NurbsSurface(NurbsSurface::new(BSplineSurface::new_unchecked(knots, columns)))
}

fn homogeneous(p: &Point3<f64>, weight: f64) -> kernel::Vector4 {
    kernel::Vector4::new(p.x * weight, p.y * weight, p.z * weight, weight)
}

fn curve(c: &Curve) -> kernel::Curve {
    let knots = KnotVec::from(c.knots.values().to_vec());
    kernel::Curve::BSplineCurve(BSplineCurve::new_unchecked(
        knots,
        c.points.iter().copied().map(point).collect(),
    ))
}

fn surface(s: &Surface) -> kernel::Surface {
    let knots = (
        KnotVec::from(s.u.values().to_vec()),
        KnotVec::from(s.v.values().to_vec()),
    );
    let columns = (0..s.u.count())
        .map(|i| s.rows.iter().map(|row| point(row[i])).collect())
        .collect();
    kernel::Surface::BSplineSurface(BSplineSurface::new_unchecked(knots, columns))
}
