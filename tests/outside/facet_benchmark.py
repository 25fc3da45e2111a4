"""Facets and time of spanwise beside those of Open CASCADE's incremental mesher, on the same wing.

    cargo build --release
    python tests/outside/facet_benchmark.py target/release/spanwise

Needs the packages of tests/outside/requirements.txt. The wing: half span 1000 mm, chords 300 and 150 mm, NACA 2412,
2 degrees at the root, -1 at the tip. Open CASCADE is asked for 0.05 mm; spanwise for the deviation that was measured on
Open CASCADE's facets, so that it may be no farther off. The deviation of both results is measured here alike: points all over the facets of the curved faces are projected onto the exact surfaces of the STEP file. Open
CASCADE's time is that of its mesher alone, spanwise's that of the whole program, from reading the spec to the STL file.
"""

import json
import pathlib
import random
import subprocess
import sys
import tempfile
import time

import numpy
import trimesh
from OCP.BRep import BRep_Tool
from OCP.BRepMesh import BRepMesh_IncrementalMesh
from OCP.BRepTools import BRepTools
from OCP.GeomAbs import GeomAbs_Plane
from OCP.GeomAdaptor import GeomAdaptor_Surface
from OCP.gp import gp_Pnt
from OCP.ShapeAnalysis import ShapeAnalysis_Surface
from OCP.STEPControl import STEPControl_Reader
from OCP.TopAbs import TopAbs_FACE, TopAbs_SOLID
from OCP.TopExp import TopExp_Explorer
from OCP.TopLoc import TopLoc_Location
from OCP.TopoDS import TopoDS

TOLERANCE = 0.05
RUNS = 5
# points projected for each mesh, at most
POINTS = 30000
SPEC = """
name = "Facet benchmark"
planform = { span = 2000, root_chord = 300, tip_chord = 150 }
setting = { incidence = 2, at = "root", twist = -3 }
airfoil = { root = "NACA 2412" }
build = { sides = "starboard" }
"""


def parts(shape, kind):
    found, explorer = [], TopExp_Explorer(shape, kind)
    while explorer.More():
        found.append(explorer.Current())
        explorer.Next()
    return found


def read(path):
    reader = STEPControl_Reader()
    reader.ReadFile(str(path))
    reader.TransferRoots()
    return parts(reader.OneShape(), TopAbs_SOLID)[0]


def surfaces(solid):
    """The curved surfaces of a solid; plane caps are exact in any mesh."""
    found = [BRep_Tool.Surface_s(TopoDS.Face(face)) for face in parts(solid, TopAbs_FACE)]
    return [s for s in found if GeomAdaptor_Surface(s).GetType() != GeomAbs_Plane]


def kernel_mesh(solid):
    """Facets of Open CASCADE's mesher, (n, 3, 3), and its least time of some runs."""
    times = []
    for _ in range(RUNS):
        BRepTools.Clean_s(solid)
        start = time.perf_counter()
        BRepMesh_IncrementalMesh(solid, TOLERANCE, False, 0.5, False)
        times.append(time.perf_counter() - start)
    facets = []
    for face in parts(solid, TopAbs_FACE):
        mesh = BRep_Tool.Triangulation_s(TopoDS.Face(face), TopLoc_Location())
        nodes = [mesh.Node(i + 1) for i in range(mesh.NbNodes())]
        points = numpy.array([(p.X(), p.Y(), p.Z()) for p in nodes])
        corners = [mesh.Triangle(i + 1).Get() for i in range(mesh.NbTriangles())]
        facets.append(points[numpy.array(corners) - 1])
    return numpy.concatenate(facets), min(times)


def deviation(facets, exact):
    """Largest distance of points of the facets from the exact surfaces."""
    y = facets[:, :, 1]
    curved = facets[numpy.ptp(y, axis=1) > 1e-6]
    shares = [(i / 8, j / 8, 1 - (i + j) / 8) for i in range(9) for j in range(9 - i) if max(i, j, 8 - i - j) < 8]
    each = [(k, s) for k in range(len(curved)) for s in shares]
    random.seed(1)
    if len(each) > POINTS:
        each = random.sample(each, POINTS)
    analyses = [ShapeAnalysis_Surface(surface) for surface in exact]
    worst = 0.0
    for k, share in each:
        point = gp_Pnt(*(numpy.array(share) @ curved[k]))
        nearest = float("inf")
        for analysis in analyses:
            analysis.ValueOfUV(point, 1e-9)
            nearest = min(nearest, analysis.Gap())
        worst = max(worst, nearest)
    return worst


def main():
    if len(sys.argv) != 2:
        sys.exit(__doc__)
    program = str(pathlib.Path(sys.argv[1]).resolve())
    with tempfile.TemporaryDirectory() as folder:
        folder = pathlib.Path(folder)
        (folder / "wing.toml").write_text(SPEC)
        command = [program, "--quiet", "loft", "wing.toml"]
        subprocess.run(command, cwd=folder, check=True)
        solid = read(folder / "wing.step")
        exact = surfaces(solid)
        other, other_time = kernel_mesh(solid)
        other_off = deviation(other, exact)
        command += ["--set", f"facets.tolerance={min(TOLERANCE, other_off):.6f}"]
        times = []
        for _ in range(4 * RUNS):
            start = time.perf_counter()
            subprocess.run(command + ["--only", "stl"], cwd=folder, check=True)
            times.append(time.perf_counter() - start)
        subprocess.run(command, cwd=folder, check=True)
        own = trimesh.load(folder / "wing.stl", process=False).triangles
        stated = json.loads((folder / "wing.json").read_text())["mesh"]["max_deviation"]
    own_off = deviation(own, exact)
    print(f"Open CASCADE was asked for {TOLERANCE} mm; spanwise states {stated:.5f} mm of its own facets")
    for name, count, off, seconds in [
        ("spanwise", len(own), own_off, min(times)),
        ("Open CASCADE", len(other), other_off, other_time),
    ]:
        print(f"{name:14} {count:8} facets, measured deviation {off:.5f} mm, {1000 * seconds:9.2f} ms")
    print(f"facets 1 : {len(other) / len(own):.1f}, time 1 : {other_time / min(times):.1f}")


if __name__ == "__main__":
    main()
