"""Reads binary STL files with trimesh and prints what it finds as JSON: a list with one object a file.

    python stl_read.py FILE...

Lengths are in the file's own unit, for STL names none. Corners with equal coordinates are taken as one, no others: what
is two bodies that touch in an edge or a face counts as one that is not watertight.
"""

import json
import os
import sys

import numpy
import trimesh

# A facet of which the height is less than this part of its longest side is degenerate: 32-bit coordinates cannot show it.
THIN = 1e-6

HEADER_BYTES, COUNT_BYTES = 80, 4
FACET = numpy.dtype([("normal", "<f4", 3), ("corners", "<f4", (3, 3)), ("attribute", "<u2")])


def normals_astray(path):
    """Facets of which the stated normal is not the unit normal that the order of their corners gives, to 1e-3."""
    with open(path, "rb") as stream:
        content = stream.read()
    facets = numpy.frombuffer(content, FACET, offset=HEADER_BYTES + COUNT_BYTES)
    corners = facets["corners"].astype(float)
    normals = numpy.cross(corners[:, 1] - corners[:, 0], corners[:, 2] - corners[:, 0])
    lengths = numpy.linalg.norm(normals, axis=1)
    usable = lengths > 0.0
    turned = normals[usable] / lengths[usable, None]
    gap = numpy.linalg.norm(turned - facets["normal"][usable], axis=1)
    return int((gap > 1e-3).sum() + (~usable).sum())


def look(path):
    raw = trimesh.load(path, file_type="stl", process=False)
    points, place = numpy.unique(raw.vertices, axis=0, return_inverse=True)
    mesh = trimesh.Trimesh(vertices=points, faces=place.reshape(-1)[raw.faces], process=False)
    sides = numpy.linalg.norm(mesh.triangles - numpy.roll(mesh.triangles, 1, axis=1), axis=2).max(axis=1)
    heights = numpy.divide(2.0 * mesh.area_faces, sides, out=numpy.zeros_like(sides), where=sides > 0.0)
    repeated = (mesh.faces == numpy.roll(mesh.faces, 1, axis=1)).any(axis=1)
    return {
        "file": str(path),
        "bytes": os.path.getsize(path),
        "facets": len(mesh.faces),
        "watertight": bool(mesh.is_watertight),
        "winding_consistent": bool(mesh.is_winding_consistent),
        "euler_number": int(mesh.euler_number),
        "volume": float(mesh.volume),
        "area": float(mesh.area),
        "centroid": [float(v) for v in mesh.center_mass],
        "bounds": mesh.bounds.tolist(),
        "degenerate_facets": int((repeated | (heights <= THIN * sides)).sum()),
        "normals_astray": normals_astray(path),
    }


def main():
    if len(sys.argv) < 2:
        sys.exit(__doc__)
    json.dump([look(path) for path in sys.argv[1:]], sys.stdout, indent=1)
    print()


if __name__ == "__main__":
    main()
