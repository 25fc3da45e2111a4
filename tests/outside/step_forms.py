"""Reads many STEP files with Open CASCADE and prints what it finds of their structure as JSON: a list, one object a file.

    python step_forms.py FILE...

Two processes share the files. For each: messages of reading and translating, largest tolerance, number of solids and
whether they are valid, names, colours, layers, the validation properties as the reader knows them, and the wireframe.
Lengths are millimetres, areas mm^2, volumes mm^3: the reader converts.
"""

import json
import os
import sys
import tempfile
from concurrent.futures import ThreadPoolExecutor

from step_read import distinct, explore, in_child, largest_tolerance, leave, read_shapes, wireframe


def labels_of(document):
    """Every label of the shapes: free shapes, their components and sub-shapes, and what components refer to."""
    from OCP.XCAFDoc import XCAFDoc_DocumentTool
    from OCP.collections import Sequence_TDF_Label

    tool = XCAFDoc_DocumentTool.ShapeTool_s(document.Main())
    labels = Sequence_TDF_Label()
    tool.GetShapes(labels)
    found = []
    for i in range(1, labels.Length() + 1):
        found.append(labels.Value(i))
        below = Sequence_TDF_Label()
        tool.GetComponents_s(labels.Value(i), below)
        found.extend(below.Value(k) for k in range(1, below.Length() + 1))
    return found


def names(labels):
    from OCP.TDataStd import TDataStd_Name

    found = []
    for label in labels:
        if label.IsAttribute(TDataStd_Name.GetID_s()):
            name = TDataStd_Name()
            label.FindAttribute(TDataStd_Name.GetID_s(), name)
            KEPT.append(name)
            found.append(name.Get().ToExtString())
    return sorted(set(found))


def colours(document):
    """sRGB colours in thousandths."""
    from OCP.Quantity import Quantity_Color, Quantity_TOC_sRGB
    from OCP.XCAFDoc import XCAFDoc_DocumentTool
    from OCP.collections import Sequence_TDF_Label

    tool = XCAFDoc_DocumentTool.ColorTool_s(document.Main())
    labels = Sequence_TDF_Label()
    tool.GetColors(labels)
    found = []
    for i in range(1, labels.Length() + 1):
        colour = Quantity_Color()
        tool.GetColor_s(labels.Value(i), colour)
        found.append([round(1000 * part) for part in colour.Values(Quantity_TOC_sRGB)])
    return sorted(found)


def layers(document):
    from OCP.TCollection import TCollection_ExtendedString
    from OCP.XCAFDoc import XCAFDoc_DocumentTool
    from OCP.collections import Sequence_TDF_Label

    tool = XCAFDoc_DocumentTool.LayerTool_s(document.Main())
    labels = Sequence_TDF_Label()
    tool.GetLayerLabels(labels)
    return names(labels.Value(i) for i in range(1, labels.Length() + 1))


def validation(labels):
    """Volumes, areas and centroids that the file states."""
    from OCP.XCAFDoc import XCAFDoc_Area, XCAFDoc_Centroid, XCAFDoc_Volume

    found = {"volumes": [], "areas": [], "centroids": []}
    for label in labels:
        for key, kind in (("volumes", XCAFDoc_Volume), ("areas", XCAFDoc_Area), ("centroids", XCAFDoc_Centroid)):
            if not label.IsAttribute(kind.GetID_s()):
                continue
            value = kind()
            label.FindAttribute(kind.GetID_s(), value)
            KEPT.append(value)
            value = value.Get()
            found[key].append([value.X(), value.Y(), value.Z()] if key == "centroids" else value)
    return found


# handles that the binding must not let go while the document lives
KEPT = []


def look(path):
    from OCP.BRepCheck import BRepCheck_Analyzer
    from OCP.TopAbs import TopAbs_EDGE, TopAbs_FACE, TopAbs_SOLID

    shapes, document, messages = read_shapes(path)
    found = {"file": str(path), "readable": bool(shapes), "messages": messages}
    if not shapes:
        return found
    KEPT.append(document)
    labels = labels_of(document)
    edges, points = wireframe(shapes)
    solids = [solid for shape in shapes for solid in explore(shape, TopAbs_SOLID)]
    found.update(
        valid=all(BRepCheck_Analyzer(shape).IsValid() for shape in shapes),
        solids=len(solids),
        faces=sum(distinct(solid, TopAbs_FACE).Extent() for solid in solids),
        edges=sum(distinct(solid, TopAbs_EDGE).Extent() for solid in solids),
        max_tolerance=largest_tolerance(shapes),
        names=names(labels),
        colours=colours(document),
        layers=layers(document),
        lengths=[edge["length"] for edge in edges],
        points=len(points),
        **validation(labels),
    )
    return found


def main():
    arguments = sys.argv[1:]
    if arguments[:1] == ["--child"]:
        with open(arguments[2], encoding="utf-8") as text:
            leave(arguments[1], [look(path) for path in json.load(text)])
    if not arguments:
        sys.exit(__doc__)
    halves = [arguments[::2], arguments[1::2]]

    def half(paths):
        with tempfile.NamedTemporaryFile("w", suffix=".json", delete=False, encoding="utf-8") as text:
            json.dump(paths, text)
        try:
            return in_child(os.path.abspath(__file__), [text.name])
        finally:
            os.unlink(text.name)

    with ThreadPoolExecutor(2) as pool:
        both = list(pool.map(half, halves))
    findings = [found for half in both for found in (half if isinstance(half, list) else [half])]
    json.dump(findings, sys.stdout, indent=1)
    print()


if __name__ == "__main__":
    main()
