//! STL, binary: facets only, in a unit that the file does not state.

use std::io::{self, Write};

use nalgebra::Vector3;
use stl_io::{Triangle, Vector};

use crate::mesh::{Mesh, single};

/// Writes a mesh with lengths in units of `unit` \[mm\], rounded to the format's 32-bit numbers.
///
/// # Errors
///
/// What `out` reports.
pub fn write(mesh: &Mesh, unit: f64, out: &mut impl Write) -> io::Result<()> {
    let corners: Vec<[f32; 3]> = mesh.corners.iter().map(|corner| single(corner, unit)).collect();
    let triangles = mesh.facets.iter().map(|facet| {
        let vertices = facet.map(|k| corners[k as usize]);
        // the normal of the rounded facet, so that the file agrees with itself
        let [a, b, c] = vertices.map(|v| Vector3::from(v.map(f64::from)));
        let normal = (b - a).cross(&(c - a)).normalize();
        Triangle {
            normal: Vector::new(narrow(normal)),
            vertices: vertices.map(Vector::new),
        }
    });
    // the writer asks for an exact size, which the map has
    stl_io::write_stl(out, triangles)
}

#[expect(
    clippy::cast_possible_truncation,
    reason = "the format's numbers have 32 bits"
)]
fn narrow(v: Vector3<f64>) -> [f32; 3] {
    [v.x as f32 + 0.0, v.y as f32 + 0.0, v.z as f32 + 0.0]
}
