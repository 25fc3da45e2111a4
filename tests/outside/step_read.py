"""Reads STEP files with Open CASCADE and prints what it finds as JSON: a list with one object a file.

    python step_read.py FILE...

Every file is read by a process of its own, so that a crash of the reader is a finding ("readable": false) and not the
end of the run. Lengths are millimetres whatever the file's unit, areas mm^2, volumes mm^3: the reader converts.

A verdict of "valid" proves little, for Open CASCADE repairs silently: it replaces edges that lie off their surface and
widens their tolerance. So every message of the translation, the largest tolerances, the number of solids, the use of
every edge and the volume are reported beside it.
"""

import json
import os
import subprocess
import sys
import tempfile

# Relative error asked of every integral. Without it Open CASCADE takes a fixed number of points a face, which is wrong
# by parts in a thousand on a wing's skin.
ACCURACY = 1e-9


def read_shapes(path):
    """The free shapes of a STEP file with the document they live in, and every message of reading and translating it."""
    from OCP.IFSelect import IFSelect_RetDone
    from OCP.STEPCAFControl import STEPCAFControl_Reader
    from OCP.TCollection import TCollection_ExtendedString
    from OCP.TDocStd import TDocStd_Document
    from OCP.XCAFDoc import XCAFDoc_DocumentTool
    from OCP.collections import Sequence_TDF_Label

    reader = STEPCAFControl_Reader()
    for mode in ("SetNameMode", "SetColorMode", "SetLayerMode", "SetPropsMode"):
        getattr(reader, mode)(True)
    status = reader.ReadFile(str(path))
    if status != IFSelect_RetDone:
        return [], None, [f"read: {str(status).split('.')[-1]}"]
    document = TDocStd_Document(TCollection_ExtendedString("outside"))
    messages = []
    if not reader.Transfer(document):
        messages.append("transfer: nothing was translated")
    session = reader.Reader().WS()
    for phase, checks in (
        ("read", session.ModelCheckList()),
        ("transfer", session.TransferReader().TransientProcess().CheckList(False)),
    ):
        checks.Start()
        while checks.More():
            check = checks.Value()
            for i in range(1, check.NbFails() + 1):
                messages.append(f"{phase} fail, entity {checks.Number()}: {check.CFail(i)}")
            for i in range(1, check.NbWarnings() + 1):
                messages.append(f"{phase} warning, entity {checks.Number()}: {check.CWarning(i)}")
            checks.Next()
    labels = Sequence_TDF_Label()
    tool = XCAFDoc_DocumentTool.ShapeTool_s(document.Main())
    tool.GetFreeShapes(labels)
    shapes = [tool.GetShape_s(labels.Value(i)) for i in range(1, labels.Length() + 1)]
    return shapes, document, messages


def explore(shape, kind, avoid=None):
    """Sub-shapes of a kind, each use of it, those inside a shape of the kind `avoid` left out."""
    from OCP.TopAbs import TopAbs_SHAPE
    from OCP.TopExp import TopExp_Explorer

    found = TopExp_Explorer(shape, kind, TopAbs_SHAPE if avoid is None else avoid)
    while found.More():
        yield found.Current()
        found.Next()


def distinct(shape, kind):
    """Sub-shapes of a kind, each one once, as the reader's indexed map."""
    from OCP.TopExp import TopExp
    from OCP.collections import IndexedMap_TopoDS_Shape_TopTools_ShapeMapHasher as ShapeMap

    shapes = ShapeMap()
    TopExp.MapShapes_s(shape, kind, shapes)
    return shapes


def triple(point):
    return [point.X(), point.Y(), point.Z()]


def open_edges(solid):
    """Number of edges that are not used exactly twice, once each way."""
    from OCP.TopAbs import TopAbs_EDGE, TopAbs_FACE, TopAbs_REVERSED

    edges = distinct(solid, TopAbs_EDGE)
    uses = [[0, 0] for _ in range(edges.Extent() + 1)]
    for face in explore(solid, TopAbs_FACE):
        for edge in explore(face, TopAbs_EDGE):
            uses[edges.FindIndex(edge)][edge.Orientation() == TopAbs_REVERSED] += 1
    return sum(use != [1, 1] for use in uses[1:])


def measure_solid(solid):
    from OCP.BRepAdaptor import BRepAdaptor_Surface
    from OCP.BRepBndLib import BRepBndLib
    from OCP.BRepCheck import BRepCheck_Analyzer
    from OCP.BRepClass3d import BRepClass3d_SolidClassifier
    from OCP.BRepGProp import BRepGProp
    from OCP.Bnd import Bnd_Box
    from OCP.GProp import GProp_GProps
    from OCP.TopAbs import TopAbs_EDGE, TopAbs_FACE, TopAbs_OUT, TopAbs_SHELL, TopAbs_VERTEX
    from OCP.TopoDS import TopoDS
    from OCP.BRep import BRep_Tool

    whole = GProp_GProps()
    error = BRepGProp.VolumeProperties_s(solid, whole, ACCURACY, False, False)
    skin = GProp_GProps()
    BRepGProp.SurfaceProperties_s(solid, skin, ACCURACY, False)
    box = Bnd_Box()
    BRepBndLib.AddOptimal_s(solid, box, False, False)
    outside = BRepClass3d_SolidClassifier(solid)
    outside.PerformInfinitePoint(1e-7)
    faces = []
    for shape in explore(solid, TopAbs_FACE):
        face = TopoDS.Face_s(shape) if hasattr(TopoDS, "Face_s") else TopoDS.Face(shape)
        area = GProp_GProps()
        BRepGProp.SurfaceProperties_s(face, area, ACCURACY, False)
        kind = str(BRepAdaptor_Surface(face).GetType()).split("_")[-1]
        faces.append({"surface": kind, "area": area.Mass(), "centroid": triple(area.CentreOfMass())})
    shells = [
        bool(BRep_Tool.IsClosed_s(TopoDS.Shell_s(shell) if hasattr(TopoDS, "Shell_s") else TopoDS.Shell(shell)))
        for shell in explore(solid, TopAbs_SHELL)
    ]
    broken = open_edges(solid)
    return {
        "valid": BRepCheck_Analyzer(solid).IsValid(),
        "closed": broken == 0 and shells == [True],
        "open_edges": broken,
        "outward": outside.State() == TopAbs_OUT,
        "volume": whole.Mass(),
        "volume_error": error,
        "centroid": triple(whole.CentreOfMass()),
        "area": skin.Mass(),
        "bounds": [triple(box.CornerMin()), triple(box.CornerMax())],
        "faces": faces,
        "edges": distinct(solid, TopAbs_EDGE).Extent(),
        "vertices": distinct(solid, TopAbs_VERTEX).Extent(),
    }


def largest_tolerance(shapes):
    from OCP.BRep import BRep_Tool
    from OCP.TopAbs import TopAbs_EDGE, TopAbs_FACE, TopAbs_VERTEX
    from OCP.TopoDS import TopoDS

    largest = 0.0
    for kind, name in ((TopAbs_FACE, "Face"), (TopAbs_EDGE, "Edge"), (TopAbs_VERTEX, "Vertex")):
        cast = getattr(TopoDS, name + "_s", None) or getattr(TopoDS, name)
        for shape in shapes:
            found = distinct(shape, kind)
            for i in range(1, found.Extent() + 1):
                largest = max(largest, BRep_Tool.Tolerance_s(cast(found.FindKey(i))))
    return largest


def wireframe(shapes):
    """Edges that no face uses, with their ends, and points that no edge uses."""
    from OCP.BRep import BRep_Tool
    from OCP.BRepAdaptor import BRepAdaptor_Curve
    from OCP.GCPnts import GCPnts_AbscissaPoint
    from OCP.TopAbs import TopAbs_EDGE, TopAbs_FACE, TopAbs_VERTEX
    from OCP.TopoDS import TopoDS

    as_edge = getattr(TopoDS, "Edge_s", None) or TopoDS.Edge
    as_vertex = getattr(TopoDS, "Vertex_s", None) or TopoDS.Vertex
    edges, points = [], []
    for shape in shapes:
        for found in explore(shape, TopAbs_EDGE, TopAbs_FACE):
            curve = BRepAdaptor_Curve(as_edge(found))
            edges.append(
                {
                    "curve": str(curve.GetType()).split("_")[-1],
                    "start": triple(curve.Value(curve.FirstParameter())),
                    "end": triple(curve.Value(curve.LastParameter())),
                    "length": GCPnts_AbscissaPoint.Length_s(curve),
                }
            )
        for found in explore(shape, TopAbs_VERTEX, TopAbs_EDGE):
            points.append(triple(BRep_Tool.Pnt_s(as_vertex(found))))
    return edges, points


def labels_used(document):
    """Numbers of colours and of layers that the document holds."""
    from OCP.XCAFDoc import XCAFDoc_DocumentTool
    from OCP.collections import Sequence_TDF_Label

    colours, layers = Sequence_TDF_Label(), Sequence_TDF_Label()
    XCAFDoc_DocumentTool.ColorTool_s(document.Main()).GetColors(colours)
    XCAFDoc_DocumentTool.LayerTool_s(document.Main()).GetLayerLabels(layers)
    return colours.Length(), layers.Length()


def look(path):
    """All that is asked of one file; to be called in a process of its own."""
    from OCP.BRepCheck import BRepCheck_Analyzer
    from OCP.TopAbs import TopAbs_FACE, TopAbs_SOLID

    shapes, document, messages = read_shapes(path)
    found = {"file": str(path), "readable": bool(shapes), "messages": messages}
    if not shapes:
        return found
    solids = [measure_solid(solid) for shape in shapes for solid in explore(shape, TopAbs_SOLID)]
    edges, points = wireframe(shapes)
    colours, layers = labels_used(document)
    found.update(
        valid=all(BRepCheck_Analyzer(shape).IsValid() for shape in shapes),
        solids=solids,
        faces_outside_solids=sum(1 for s in shapes for _ in explore(s, TopAbs_FACE, TopAbs_SOLID)),
        max_tolerance=largest_tolerance(shapes),
        free_edges=edges,
        free_points=points,
        colours=colours,
        layers=layers,
    )
    if solids:
        volume = sum(s["volume"] for s in solids)
        found["volume"] = volume
        found["centroid"] = [sum(s["volume"] * s["centroid"][k] for s in solids) / volume for k in range(3)]
    return found


def in_child(script, arguments, seconds=600):
    """Runs `script --child OUT arguments...` and gives the JSON that it left in OUT, or what became of it."""
    handle, out = tempfile.mkstemp(suffix=".json")
    os.close(handle)
    try:
        command = [sys.executable, script, "--child", out] + [str(a) for a in arguments]
        done = subprocess.run(command, stdout=subprocess.PIPE, stderr=subprocess.PIPE, timeout=seconds)
        with open(out, encoding="utf-8") as text:
            content = text.read()
        if content:
            return json.loads(content)
        tail = done.stderr.decode("utf-8", "replace")[-2000:]
        return {"readable": False, "messages": [f"the reader ended with {done.returncode}: {tail}"]}
    except subprocess.TimeoutExpired:
        return {"readable": False, "messages": [f"the reader took more than {seconds} s"]}
    finally:
        os.unlink(out)


def leave(out, found):
    """Writes the finding and ends the process at once: tearing the reader down can crash after all is done."""
    with open(out, "w", encoding="utf-8") as text:
        json.dump(found, text)
    os._exit(0)


def main():
    arguments = sys.argv[1:]
    if arguments[:1] == ["--child"]:
        leave(arguments[1], look(arguments[2]))
    if not arguments:
        sys.exit(__doc__)
    findings = []
    for path in arguments:
        found = in_child(os.path.abspath(__file__), [path])
        found.setdefault("file", path)
        findings.append(found)
    json.dump(findings, sys.stdout, indent=1)
    print()


if __name__ == "__main__":
    main()
