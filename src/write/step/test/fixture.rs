//! A small wing half built by hand, and documents of it.

use nalgebra::Point3;
use truck_modeling::{BSplineCurve, BSplineSurface, Curve, Edge, Face, KnotVec, Line, Plane, Shell, Surface};
use truck_modeling::{NurbsCurve, NurbsSurface, Point3 as Corner, Vector4, Vertex, Wire};

use crate::planform::{LineKind, Reference, ReferenceLine, ReferencePoint};
use crate::solid::{FaceKind, FaceLabel, Side, Solid};
use crate::spec::Unit;
use crate::write::step::{Attribute, Document, Error, Properties, ReferenceForm, Schema, Value, write};

/// Half of a plain tapered wing: two skins of degree 5 by 1 with 20 by 2 control points, a base and two caps.
pub(crate) struct Half {
    /// The side it is on.
    pub(crate) side: Side,
    /// Twist at the tip \[rad\]: with twist, the base is not flat.
    pub(crate) twist: f64,
    /// Skins and their edges as rational splines with weights from 1 to 1.5.
    pub(crate) rational: bool,
}

impl Half {
    /// Control columns from nose to trailing edge.
    const COLUMNS: usize = 20;

    /// The starboard half without twist.
    pub(crate) const PLAIN: Self = Self {
        side: Side::Starboard,
        twist: 0.0,
        rational: false,
    };

    /// A control point: column from the nose, +1 above and −1 below the chord, 0 at the root and 1 at the tip.
    fn point(&self, column: usize, up: f64, tip: bool) -> Corner {
        let x = column as f64 / (Self::COLUMNS - 1) as f64;
        let z = up * (0.13 * x.sqrt() * (1.0 - x) + 0.004 * x);
        let (chord, nose, twist) = if tip {
            (150.0, 80.0, self.twist)
        } else {
            (300.0, 0.0, 0.0)
        };
        let y = if tip { 400.0 } else { 0.0 };
        let y = if self.side == Side::Port { -y } else { y };
        let (sin, cos) = twist.sin_cos();
        Corner::new(nose + chord * (x * cos + z * sin), y, chord * (z * cos - x * sin))
    }

    fn knots() -> KnotVec {
        KnotVec::uniform_knot(5, Self::COLUMNS - 5)
    }

    fn curve(&self, up: f64, tip: bool) -> Curve {
        if self.rational {
            let points = (0..Self::COLUMNS)
                .map(|i| weighted(self.point(i, up, tip), i))
                .collect();
            return Curve::NurbsCurve(NurbsCurve::new(BSplineCurve::new(Self::knots(), points)));
        }
        let points = (0..Self::COLUMNS).map(|i| self.point(i, up, tip)).collect();
        Curve::BSplineCurve(BSplineCurve::new(Self::knots(), points))
    }

    fn skin(&self, up: f64) -> Surface {
        let knots = (Self::knots(), KnotVec::bezier_knot(1));
        let row = |i| [false, true].map(|tip| self.point(i, up, tip));
        if self.rational {
            let net = (0..Self::COLUMNS)
                .map(|i| row(i).map(|p| weighted(p, i)).to_vec())
                .collect();
            return Surface::NurbsSurface(NurbsSurface::new(BSplineSurface::new(knots, net)));
        }
        let net = (0..Self::COLUMNS).map(|i| row(i).to_vec()).collect();
        Surface::BSplineSurface(BSplineSurface::new(knots, net))
    }

    /// The solid.
    pub(crate) fn build(&self) -> Solid {
        let last = Self::COLUMNS - 1;
        let ends = |column, up| [false, true].map(|tip| Vertex::new(self.point(column, up, tip)));
        let (nose, upper, lower) = (ends(0, 0.0), ends(last, 1.0), ends(last, -1.0));
        let line = |a: &Vertex, b: &Vertex| Edge::new(a, b, Curve::Line(Line(a.point(), b.point())));
        let tops = [0, 1].map(|i| Edge::new(&nose[i], &upper[i], self.curve(1.0, i == 1)));
        let bottoms = [0, 1].map(|i| Edge::new(&nose[i], &lower[i], self.curve(-1.0, i == 1)));
        let bases = [0, 1].map(|i| line(&upper[i], &lower[i]));
        let [nose_line, upper_line, lower_line] = [&nose, &upper, &lower].map(|v| line(&v[0], &v[1]));
        let face = |edges: Vec<Edge>, surface| Face::try_new(vec![Wire::from(edges)], surface).unwrap();
        let p = |i: usize, v: &[Vertex; 2]| v[i].point();
        let base_net = vec![vec![p(0, &upper), p(1, &upper)], vec![p(0, &lower), p(1, &lower)]];
        let linear = || KnotVec::bezier_knot(1);
        let base = Surface::BSplineSurface(BSplineSurface::new((linear(), linear()), base_net));
        let cap = |o: Corner, u: [f64; 3], v: [f64; 3]| {
            let add = |d: [f64; 3]| Corner::new(o.x + d[0], o.y + d[1], o.z + d[2]);
            Surface::Plane(Plane::new(o, add(u), add(v)))
        };
        let (x, z) = ([1.0, 0.0, 0.0], [0.0, 0.0, 1.0]);
        let around_cap = |i: usize, reverse: bool| {
            let (top, base, bottom) = (tops[i].clone(), bases[i].clone(), bottoms[i].inverse());
            let edges = vec![top, base, bottom];
            if reverse {
                edges.iter().rev().map(Edge::inverse).collect()
            } else {
                edges
            }
        };
        let around = |a: &[Edge; 2], out: &Edge, home: &Edge| {
            vec![a[0].clone(), out.clone(), a[1].inverse(), home.inverse()]
        };
        // as seen on the starboard side: the lower skin's normal points inward
        let mut faces = vec![
            face(around(&tops, &upper_line, &nose_line), self.skin(1.0)),
            face(around(&bottoms, &lower_line, &nose_line), self.skin(-1.0)).inverse(),
            face(around(&bases, &lower_line, &upper_line), base),
            face(around_cap(0, true), cap(p(0, &nose), x, z)),
            face(around_cap(1, false), cap(p(1, &nose), z, x)),
        ];
        if self.side == Side::Port {
            // mirroring turns every parametric normal inward; the caps' axes are not mirrored, but exchange their parts
            for face in &mut faces[..3] {
                face.invert();
            }
            faces[3] = face(around_cap(0, false), cap(p(0, &nose), z, x));
            faces[4] = face(around_cap(1, true), cap(p(1, &nose), x, z));
        }
        let kinds = [
            FaceKind::Upper,
            FaceKind::Lower,
            FaceKind::TrailingEdge,
            FaceKind::Root,
            FaceKind::Tip,
        ];
        let shape = truck_modeling::Solid::try_new(vec![Shell::from(faces)]).unwrap();
        let name = if self.side == Side::Port {
            "wing port"
        } else {
            "wing starboard"
        };
        let faces = kinds
            .map(|kind| FaceLabel {
                kind,
                panel: 1,
                side: self.side,
            })
            .to_vec();
        Solid {
            name: name.to_owned(),
            shape,
            faces,
        }
    }
}

/// A control point with a weight that grows towards the trailing edge.
fn weighted(p: Corner, column: usize) -> Vector4 {
    let w = 1.0 + column as f64 / 40.0;
    Vector4::new(p.x * w, p.y * w, p.z * w, w)
}

/// Everything that a [`Document`] borrows.
pub(crate) struct Parts {
    pub(crate) name: String,
    pub(crate) solids: Vec<Solid>,
    pub(crate) properties: Vec<Properties>,
    pub(crate) reference: Reference,
    pub(crate) attributes: Vec<Attribute>,
}

impl Parts {
    /// One half wing with reference geometry and attributes of every kind.
    pub(crate) fn new() -> Self {
        let solids = vec![Half::PLAIN.build()];
        let properties = vec![properties()];
        Self {
            name: "Dunlin test wing".to_owned(),
            solids,
            properties,
            reference: reference(),
            attributes: attributes(),
        }
    }

    /// Both halves, a part each, twisted.
    pub(crate) fn pair() -> Self {
        let half = |side| {
            Half {
                side,
                twist: -0.05,
                rational: false,
            }
            .build()
        };
        Self {
            solids: vec![half(Side::Starboard), half(Side::Port)],
            properties: vec![properties(); 2],
            ..Self::new()
        }
    }

    /// The document in millimetres after AP242.
    pub(crate) fn document(&self) -> Document<'_> {
        Document {
            id: "DUNLIN-TEST",
            name: &self.name,
            description: "half wing for tests",
            unit: Unit::Millimetre,
            schema: Schema::Ap242,
            reference_form: ReferenceForm::Both,
            solids: &self.solids,
            properties: &self.properties,
            reference: &self.reference,
            attributes: &self.attributes,
            time_stamp: "2026-01-31T12:00:00",
        }
    }
}

/// The text of a document.
pub(crate) fn text(document: &Document<'_>) -> Result<String, Error> {
    let mut bytes = Vec::new();
    write(document, &mut bytes)?;
    Ok(String::from_utf8(bytes).expect("the file is ASCII"))
}

/// Figures that are only written, never compared with the solid here.
fn properties() -> Properties {
    Properties {
        volume: 1_234_567.25,
        area: 187_654.5,
        centroid: Point3::new(140.5, 170.25, 0.125),
        corners: [Point3::new(0.0, 0.0, -9.5), Point3::new(300.0, 400.0, 9.5)],
    }
}

fn reference() -> Reference {
    let line = |name: &str, kind, points: &[[f64; 3]]| ReferenceLine {
        name: name.to_owned(),
        kind,
        points: points.iter().map(|&p| Point3::from(p)).collect(),
    };
    let (root, tip) = ([300.0, 0.0, 0.0], [230.0, 400.0, 0.0]);
    let (nose, tip_nose) = ([0.0, 0.0, 0.0], [80.0, 400.0, 0.0]);
    let lines = vec![
        line(
            "reference outline, leading edge",
            LineKind::Outline,
            &[nose, tip_nose],
        ),
        line("reference outline, tip", LineKind::Outline, &[tip_nose, tip]),
        line(
            "reference outline, trailing edge",
            LineKind::Outline,
            &[tip, root],
        ),
        line(
            "quarter-chord line",
            LineKind::QuarterChord,
            &[[75.0, 0.0, 0.0], [117.5, 400.0, 0.0]],
        ),
        line(
            "mean aerodynamic chord",
            LineKind::MeanAerodynamicChord,
            &[
                [35.555555555555564, 177.7777777777778, 0.0],
                [268.8888888888889, 177.7777777777778, 0.0],
            ],
        ),
        line("root chord", LineKind::Chord, &[nose, root]),
        line("tip chord", LineKind::Chord, &[tip_nose, tip]),
        line(
            "centreline",
            LineKind::Centreline,
            &[[-30.0, 0.0, 0.0], [330.0, 0.0, 0.0]],
        ),
        line(
            "twist axis",
            LineKind::TwistAxis,
            &[[75.0, 0.0, 0.0], [117.5, 400.0, 0.0]],
        ),
        line(
            "front spar",
            LineKind::Custom,
            &[[60.0, 0.0, 0.0], [84.0, 180.0, 0.0], [110.0, 400.0, 12.0]],
        ),
        line(
            "rear spar",
            LineKind::Custom,
            &[[200.0, 0.0, 0.0], [180.0, 400.0, 0.0]],
        ),
        line(
            "aileron hinge λ = 0.72",
            LineKind::Custom,
            &[[205.0, 220.0, 0.0], [190.0, 380.0, 0.0]],
        ),
    ];
    let point = Point3::new(93.8888888888889, 177.7777777777778, 0.0);
    Reference {
        lines,
        points: vec![ReferencePoint {
            name: "aerodynamic centre".to_owned(),
            point,
        }],
    }
}

fn attributes() -> Vec<Attribute> {
    let values = [
        ("span", Value::Length(400.0)),
        ("reference area", Value::Area(90_000.0)),
        ("aspect ratio", Value::Ratio(32.0 / 9.0)),
        ("taper ratio", Value::Ratio(0.5)),
        ("root chord", Value::Length(300.0)),
        ("tip chord", Value::Length(150.0)),
        ("mean aerodynamic chord", Value::Length(700.0 / 3.0)),
        ("incidence at the mean aerodynamic chord", Value::Angle(0.02)),
        ("twist at the tip", Value::Angle(-0.05)),
        ("quarter-chord sweep", Value::Angle(0.106)),
        (
            "root section",
            Value::Text("NACA 2415, it's 15 % thick".to_owned()),
        ),
        (
            "tip section",
            Value::Text("coordinate file 'tip\\a.dat'".to_owned()),
        ),
        ("section fit deviation", Value::Ratio(3.7e-7)),
        ("panels", Value::Count(1)),
        ("spec hash", Value::Text("8f1c2a90d3".to_owned())),
    ];
    values
        .map(|(name, value)| Attribute {
            name: name.to_owned(),
            value,
        })
        .to_vec()
}
