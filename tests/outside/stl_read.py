"""Reads STL files with trimesh and prints what it finds as JSON: a list with one object a file.

    python stl_read.py FILE...

Lengths are in the file's own unit, for STL names none. Corners with equal coordinates are taken as one, no others.
"""

import json
import os
import sys

import numpy
import trimesh

# A facet of which the height is less than this part of its longest side is degenerate: 32-bit coordinates cannot show it.
THIN = 1e-6


def look(path):
    raw = trimesh.load(path, file_type="stl", process=False)
    mesh = trimesh.Trimesh(vertices=raw.vertices, faces=raw.faces, process=False)
    mesh.merge_vertices(digits_vertex=12)
    corners = mesh.triangles
    sides = numpy.linalg.norm(corners - numpy.roll(corners, 1, axis=1), axis=2).max(axis=1)
    heights = numpy.divide(2.0 * mesh.area_faces, sides, out=numpy.zeros_like(sides), where=sides > 0.0)
    repeated = (mesh.faces == numpy.roll(mesh.faces, 1, axis=1)).any(axis=1)
    # the normals that the file states, against the turn of its corners
    turned = numpy.einsum("ij,ij->i", raw.face_normals, numpy.cross(
        raw.triangles[:, 1] - raw.triangles[:, 0], raw.triangles[:, 2] - raw.triangles[:, 0]))
    return {
        "file": str(path),
        "bytes": os.path.getsize(path),
        "facets": len(mesh.faces),
        "watertight": bool(mesh.is_watertight),
        "winding_consistent": bool(mesh.is_winding_consistent),
        "bodies": int(mesh.body_count),
        "euler_number": int(mesh.euler_number),
        "volume": float(mesh.volume),
        "area": float(mesh.area),
        "centroid": [float(v) for v in mesh.center_mass],
        "bounds": mesh.bounds.tolist(),
        "degenerate_facets": int((repeated | (heights <= THIN * sides)).sum()),
        "normals_against_winding": int((turned < 0.0).sum()),
    }


def main():
    if len(sys.argv) < 2:
        sys.exit(__doc__)
    json.dump([look(path) for path in sys.argv[1:]], sys.stdout, indent=1)
    print()


if __name__ == "__main__":
    main()
