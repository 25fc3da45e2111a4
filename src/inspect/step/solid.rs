//! Solids: topology, integrals and bounds.

use std::collections::hash_map::Entry::Vacant;
use std::collections::{HashMap, HashSet};

use nalgebra::{Point3, Vector3};

use super::access::{Args, Read, args, finding};
use super::context::Context;
use super::edge::Edge;
use super::face::{self, Sums};
use super::report::{Face, Figures, Solid, Stated};
use super::shape::{Skin, skin};
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange};

/// Points an edge's box is taken from.
const BOX_POINTS: u32 = 64;

/// A face before it is measured.
struct Bare {
    line: u32,
    name: String,
    skin: Skin,
    same_sense: bool,
    /// Number of an edge and true where it is used forwards.
    loops: Vec<Vec<(u64, bool)>>,
}

/// Reads, checks and measures a solid.
pub(super) fn read<'a>(
    file: &Exchange<'a>,
    entry: Entry,
    context: &Context,
    faults: &mut Vec<Finding>,
    notes: &mut Vec<String>,
) -> Read<Solid> {
    let record = args(file, entry, "MANIFOLD_SOLID_BREP")?;
    let name = record.text(0)?;
    let shell = record.follow(file, 1, "CLOSED_SHELL")?;
    let mut edges: HashMap<u64, Edge> = HashMap::new();
    let mut bare = Vec::new();
    for id in shell.references(1)? {
        let face = shell.record_of(file, id, "ADVANCED_FACE")?;
        match read_face(file, &face, context.tolerance, &mut edges, faults) {
            Ok(face) => bare.push(face),
            Err(fault) => faults.push(fault),
        }
    }
    let closed = check_uses(&bare, &edges, &name, shell.line, faults);
    let vertices: HashMap<u64, Point3<f64>> = (edges.values())
        .flat_map(|edge| edge.vertices.into_iter().zip(edge.ends))
        .collect();
    let bounds = bounds(&edges, &vertices);
    let origin = Point3::from((bounds[0].coords + bounds[1].coords) * 0.5);
    let mut solid = Solid {
        name,
        product: String::new(),
        faces: Vec::new(),
        edges: edges.len(),
        vertices: vertices.len(),
        closed,
        measured: None,
        stated: Stated::default(),
    };
    let mut sums = Some(Sums::default());
    for bare in &bare {
        let found = measure(bare, &edges, origin, context.tolerance, faults, notes);
        sums = sums.zip(found).map(|(sums, face)| Sums {
            area: sums.area + face.area,
            volume: sums.volume + face.volume,
            moment: sums.moment + face.moment,
        });
        solid.faces.push(Face {
            name: bare.name.clone(),
            surface: match &bare.skin {
                Skin::Plane(..) => "plane".to_owned(),
                Skin::Spline(surface) if surface.rational => "rational B-spline".to_owned(),
                Skin::Spline(_) => "B-spline".to_owned(),
                Skin::Unread(entity) => entity.clone(),
            },
            area: found.map(|sums| sums.area),
        });
    }
    if let Some(sums) = sums.filter(|_| closed && !bare.is_empty()) {
        if sums.volume <= 0.0 {
            faults.push(finding(
                shell.line,
                format!("solid `{}`: its faces point inwards", solid.name),
            ));
        }
        solid.measured = Some(Figures {
            volume: sums.volume,
            area: sums.area,
            centroid: (origin + sums.moment / sums.volume).into(),
            bounds: bounds.map(Into::into),
        });
    }
    Ok(solid)
}

fn read_face<'a>(
    file: &Exchange<'a>,
    record: &Args<'a>,
    tolerance: f64,
    edges: &mut HashMap<u64, Edge>,
    faults: &mut Vec<Finding>,
) -> Read<Bare> {
    let name = record.text(0)?;
    let mut loops = Vec::new();
    for id in record.references(1)? {
        let entry = record.named(file, id)?;
        let outer = file.kind_of(entry).has("FACE_OUTER_BOUND");
        let bound = args(file, entry, if outer { "FACE_OUTER_BOUND" } else { "FACE_BOUND" })?;
        loops.push(read_loop(file, &bound, tolerance, edges, faults)?);
    }
    if loops.is_empty() {
        return Err(finding(record.line, format!("face `{name}` has no edges")));
    }
    let skin = skin(file, record.named(file, record.reference(2)?)?).map_err(|fault| {
        finding(
            fault.line.unwrap_or(record.line),
            format!("face `{name}`: {}", fault.what),
        )
    })?;
    Ok(Bare {
        line: record.line,
        name: if name.is_empty() {
            format!("#{}", record.id)
        } else {
            name
        },
        skin,
        same_sense: record.flag(3)?,
        loops,
    })
}

/// The edges of a loop in the order that the bound goes along them, joined head to tail.
fn read_loop<'a>(
    file: &Exchange<'a>,
    bound: &Args<'a>,
    tolerance: f64,
    edges: &mut HashMap<u64, Edge>,
    faults: &mut Vec<Finding>,
) -> Read<Vec<(u64, bool)>> {
    let ahead = bound.flag(2)?;
    let edge_loop = bound.follow(file, 1, "EDGE_LOOP")?;
    let mut uses = Vec::new();
    for id in edge_loop.references(1)? {
        let oriented = edge_loop.record_of(file, id, "ORIENTED_EDGE")?;
        let edge = oriented.follow(file, 3, "EDGE_CURVE")?;
        uses.push((edge.id, oriented.flag(4)?));
        if let Vacant(place) = edges.entry(edge.id) {
            place.insert(Edge::read(file, &edge, tolerance, faults)?);
        }
    }
    for (i, (edge, forward)) in uses.iter().enumerate() {
        let (next, next_forward) = uses[(i + 1) % uses.len()];
        let (tail, head) = (edges[edge].vertices, edges[&next].vertices);
        if tail[usize::from(*forward)] != head[usize::from(!next_forward)] {
            let what = format!(
                "#{}: the loop is not closed head to tail: #{next} does not begin where #{edge} ends",
                edge_loop.id
            );
            faults.push(finding(edge_loop.line, what));
        }
    }
    if !ahead {
        uses.reverse();
        uses.iter_mut().for_each(|(_, forward)| *forward = !*forward);
    }
    Ok(uses)
}

/// Whether every edge is used twice, once each way.
fn check_uses(
    bare: &[Bare],
    edges: &HashMap<u64, Edge>,
    solid: &str,
    line: u32,
    faults: &mut Vec<Finding>,
) -> bool {
    let mut uses: HashMap<u64, [usize; 2]> = HashMap::new();
    for (edge, forward) in bare.iter().flat_map(|face| face.loops.iter().flatten()) {
        uses.entry(*edge).or_default()[usize::from(*forward)] += 1;
    }
    let mut wrong: Vec<(u64, [usize; 2])> = uses.into_iter().filter(|(_, count)| *count != [1, 1]).collect();
    wrong.sort_unstable();
    for (edge, [back, ahead]) in &wrong {
        let what = format!(
            "solid `{solid}`: edge #{edge} is used {ahead} times forwards and {back} times backwards; a closed solid uses each once each way"
        );
        faults.push(finding(edges.get(edge).map_or(line, |edge| edge.line), what));
    }
    wrong.is_empty() && !bare.is_empty()
}

fn measure(
    bare: &Bare,
    edges: &HashMap<u64, Edge>,
    origin: Point3<f64>,
    tolerance: f64,
    faults: &mut Vec<Finding>,
    notes: &mut Vec<String>,
) -> Option<Sums> {
    let loops: Vec<Vec<(&Edge, bool)>> = (bare.loops.iter())
        .map(|uses| {
            uses.iter()
                .map(|(edge, forward)| (&edges[edge], *forward))
                .collect()
        })
        .collect();
    let unread: HashSet<&str> = (loops.iter().flatten())
        .filter_map(|(edge, _)| edge.unread.as_deref())
        .collect();
    for entity in unread {
        notes.push(format!(
            "face `{}` has an edge along {entity}, which is not read: not measured",
            bare.name
        ));
    }
    let face = face::Face {
        line: bare.line,
        name: &bare.name,
        skin: &bare.skin,
        same_sense: bare.same_sense,
        loops: &loops,
    };
    face::measure(&face, origin, tolerance, faults, notes)
}

/// The box about vertices and edges.
fn bounds(edges: &HashMap<u64, Edge>, vertices: &HashMap<u64, Point3<f64>>) -> [Point3<f64>; 2] {
    let mut bounds = [
        Point3::from(Vector3::repeat(f64::INFINITY)),
        Point3::from(Vector3::repeat(f64::NEG_INFINITY)),
    ];
    let mut add = |point: &Point3<f64>| bounds = [bounds[0].inf(point), bounds[1].sup(point)];
    vertices.values().for_each(&mut add);
    for way in edges.values().filter_map(|edge| edge.way.as_ref()) {
        (0..=BOX_POINTS).for_each(|i| add(&way.at(f64::from(i) / f64::from(BOX_POINTS)).0));
    }
    bounds
}
