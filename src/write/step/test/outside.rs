//! The kernel's own STEP reader finds the solid that was written.

use truck_modeling::{
    Curve, Edge, Face, InnerSpace, ParametricSurface, ParametricSurface3D, Point3, Shell, Solid as Shape,
    Surface,
};
use truck_modeling::{Vertex, Wire};
use truck_stepio::r#in::Table;
use truck_stepio::r#in::alias::{Curve3D, ElementarySurface, Surface as ReadSurface};

use crate::solid::{Side, Solid};

use super::fixture::{Half, Parts, text};

/// The only shell of a file, as a solid of the kernel; its faces' surfaces point outward.
fn read_back(text: &str) -> Shape {
    let table = Table::from_step(text).unwrap();
    assert_eq!(table.shell.len(), 1);
    let shell = table
        .to_compressed_shell(table.shell.values().next().unwrap())
        .unwrap();
    let vertices: Vec<Vertex> = shell.vertices.into_iter().map(Vertex::new).collect();
    let edges: Vec<Edge> = shell
        .edges
        .into_iter()
        .map(|edge| {
            let (start, end) = edge.vertices;
            Edge::try_new(&vertices[start], &vertices[end], curve(edge.curve)).unwrap()
        })
        .collect();
    let faces: Shell = shell
        .faces
        .into_iter()
        .map(|face| {
            assert!(face.orientation);
            let wires = face.boundaries.into_iter().map(|wire| -> Wire {
                let edge = |i: usize, forward| {
                    if forward {
                        edges[i].clone()
                    } else {
                        edges[i].inverse()
                    }
                };
                wire.into_iter()
                    .map(|use_of| edge(use_of.index, use_of.orientation))
                    .collect()
            });
            Face::try_new(wires.collect(), surface(face.surface)).unwrap()
        })
        .collect();
    Shape::try_new(vec![faces]).unwrap()
}

fn curve(read: Curve3D) -> Curve {
    match read {
        Curve3D::Line(line) => Curve::Line(line),
        Curve3D::BSplineCurve(curve) => Curve::BSplineCurve(curve),
        Curve3D::NurbsCurve(curve) => Curve::NurbsCurve(curve),
        other => panic!("{other:?} was never written"),
    }
}

fn surface(read: ReadSurface) -> Surface {
    match read {
        ReadSurface::ElementarySurface(surface) => match *surface {
            ElementarySurface::Plane(plane) => Surface::Plane(plane),
            other => panic!("{other:?} was never written"),
        },
        ReadSurface::BSplineSurface(surface) => Surface::BSplineSurface(*surface),
        ReadSurface::NurbsSurface(surface) => Surface::NurbsSurface(*surface),
        other => panic!("{other:?} was never written"),
    }
}

fn check(solid: &Solid, read: &Shape) {
    let corners =
        |shape: &Shape| -> Vec<Point3> { shape.vertex_iter().map(|vertex| vertex.point()).collect() };
    // the order is that of the faces, their loops and edges: the same on both sides, each coordinate to the bit
    assert_eq!(corners(&solid.shape), corners(read));
    let edges = |shape: &Shape| shape.edge_iter().collect::<Vec<_>>();
    for (edge, read) in edges(&solid.shape).iter().zip(edges(read)) {
        assert_eq!(edge.orientation(), read.orientation());
        match (edge.curve(), read.curve()) {
            (Curve::BSplineCurve(curve), Curve::BSplineCurve(read)) => assert_eq!(curve, read),
            (Curve::NurbsCurve(curve), Curve::NurbsCurve(read)) => assert!(curve.near_as_curve(&read)),
            (Curve::Line(curve), Curve::Line(read)) => {
                assert!((curve.0 - read.0).magnitude() < 1e-9 && (curve.1 - read.1).magnitude() < 1e-9);
            }
            (curve, read) => panic!("{curve:?} became {read:?}"),
        }
    }
    for (face, read) in solid.shape.face_iter().zip(read.face_iter()) {
        match (face.oriented_surface(), read.surface()) {
            (Surface::BSplineSurface(surface), Surface::BSplineSurface(read)) => assert_eq!(surface, read),
            (Surface::NurbsSurface(surface), Surface::NurbsSurface(read)) => {
                assert!(surface.near_as_surface(&read));
            }
            // a flat bilinear surface is written as a plane
            (surface, Surface::Plane(read)) => {
                let (u, v) = (0.3, 0.6);
                assert!((surface.normal(u, v) - read.normal()).magnitude() < 1e-12);
                assert!((surface.subs(u, v) - read.origin()).dot(read.normal()).abs() < 1e-9);
            }
            (surface, read) => panic!("{surface:?} became {read:?}"),
        }
    }
    assert!(read.is_geometric_consistent());
}

#[test]
fn the_kernel_reads_every_solid_back() {
    for side in [Side::Starboard, Side::Port] {
        for (twist, rational) in [(0.0, false), (-0.05, false), (-0.05, true)] {
            let solid = Half {
                side,
                twist,
                rational,
            }
            .build();
            // no attributes: this reader takes a doubled apostrophe for the end of the text
            let parts = Parts {
                solids: vec![solid.clone()],
                attributes: vec![],
                ..Parts::new()
            };
            check(&solid, &read_back(&text(&parts.document()).unwrap()));
        }
    }
}
