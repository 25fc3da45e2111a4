//! A solid: its vertices, edges, faces and shell.

use std::collections::HashMap;
use std::io::Write;

use truck_modeling::{Edge, EdgeID, Face, Vertex, VertexID, Wire};

use crate::solid::{FaceKind, FaceLabel, Side, Solid};

use super::error::Error;
use super::geometry::{write_curve, write_point, write_surface};
use super::part21::{Exchange, Id};
use super::presentation::Presentation;
use super::style::{SOLID_COLOUR, SOLID_LAYER, face_colour};
use super::units::Units;

/// Writes a solid, its faces in their order, each with name and colour, and gives the solid's instance.
pub(super) fn write_solid<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    solid: &Solid,
    presentation: &mut Presentation,
) -> Result<Id, Error> {
    let [shell] = &solid.shape.boundaries()[..] else {
        let shells = solid.shape.boundaries().len();
        return Err(Error::Shells {
            solid: solid.name.clone(),
            shells,
        });
    };
    if shell.len() != solid.faces.len() {
        let (faces, labels) = (shell.len(), solid.faces.len());
        return Err(Error::Labels {
            solid: solid.name.clone(),
            faces,
            labels,
        });
    }
    let mut topology = Topology {
        out,
        units,
        vertices: HashMap::new(),
        edges: HashMap::new(),
    };
    let mut faces = Vec::with_capacity(shell.len());
    for (face, label) in shell.iter().zip(&solid.faces) {
        faces.push(topology.face(face, *label)?);
    }
    let shell = out.closed_shell(&faces)?;
    let id = out.solid(&solid.name, shell)?;
    presentation.surface(out, &solid.name, SOLID_COLOUR, id)?;
    for (face, label) in faces.into_iter().zip(&solid.faces) {
        presentation.surface(out, &face_name(*label), face_colour(label.kind), face)?;
    }
    presentation.put_on(SOLID_LAYER, id);
    Ok(id)
}

/// A face's name, such as `upper surface, panel 1, starboard`.
pub(super) fn face_name(label: FaceLabel) -> String {
    let kind = match label.kind {
        FaceKind::Upper => "upper surface",
        FaceKind::Lower => "lower surface",
        FaceKind::TrailingEdge => "trailing edge",
        FaceKind::Root => "root",
        FaceKind::Tip => "tip",
        FaceKind::TipEnd => "tip end",
    };
    let side = match label.side {
        Side::Starboard => "starboard",
        Side::Port => "port",
    };
    format!("{kind}, panel {}, {side}", label.panel)
}

/// The vertices and edges written so far: each is written once, where the first face needs it. The maps are only
/// looked up, so their order never shows.
struct Topology<'a, W> {
    out: &'a mut Exchange<W>,
    units: Units,
    vertices: HashMap<VertexID, Id>,
    edges: HashMap<EdgeID, Id>,
}

impl<W: Write> Topology<'_, W> {
    fn face(&mut self, face: &Face, label: FaceLabel) -> Result<Id, Error> {
        let name = || face_name(label);
        let surface = write_surface(self.out, self.units, &face.surface(), &name)?;
        let mut bounds = Vec::new();
        for wire in face.boundaries() {
            let edges = self.edge_loop(&wire, &name)?;
            bounds.push(match bounds[..] {
                [] => self.out.outer_bound(edges)?,
                _ => self.out.inner_bound(edges)?,
            });
        }
        self.out.face(&name(), &bounds, surface, face.orientation())
    }

    fn edge_loop(&mut self, wire: &Wire, face: &dyn Fn() -> String) -> Result<Id, Error> {
        let mut oriented = Vec::with_capacity(wire.len());
        for edge in wire.edge_iter() {
            let id = self.edge(edge, face)?;
            oriented.push(self.out.oriented_edge(id, edge.orientation())?);
        }
        self.out.edge_loop(&oriented)
    }

    fn edge(&mut self, edge: &Edge, face: &dyn Fn() -> String) -> Result<Id, Error> {
        if let Some(&id) = self.edges.get(&edge.id()) {
            return Ok(id);
        }
        let start = self.vertex(edge.absolute_front())?;
        let end = self.vertex(edge.absolute_back())?;
        let curve = write_curve(self.out, self.units, &edge.curve(), face)?;
        let id = self.out.edge_curve(start, end, curve)?;
        self.edges.insert(edge.id(), id);
        Ok(id)
    }

    fn vertex(&mut self, vertex: &Vertex) -> Result<Id, Error> {
        if let Some(&id) = self.vertices.get(&vertex.id()) {
            return Ok(id);
        }
        let point = write_point(self.out, self.units, vertex.point())?;
        let id = self.out.vertex_point(point)?;
        self.vertices.insert(vertex.id(), id);
        Ok(id)
    }
}
