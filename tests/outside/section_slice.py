"""Cuts the solids of a STEP file with planes across the span by Open CASCADE and measures the sections.

    python section_slice.py FILE AXIS POSITION...

AXIS is x, y or z, the normal of the planes; POSITION is where they cut it [mm]. Prints a JSON list with one object a
position. The chord runs from the foremost corner of the section (where the skins meet at the leading edge) to the middle
of the other corners (the two ends of a blunt trailing edge, or the one of a sharp one). Lengths in mm, angles in degrees,
leading edge up positive; the third axis of the cut is z, or y where the planes are normal to z.
"""

import json
import math
import os
import sys

import numpy

from step_read import explore, in_child, leave, read_shapes

POINTS_A_CURVE = 2001


def curves_of_cut(solid, axis, position):
    """The curves in which a plane cuts a solid: arrays of points (POINTS_A_CURVE, 3)."""
    from OCP.BRepAdaptor import BRepAdaptor_Curve
    from OCP.BRepAlgoAPI import BRepAlgoAPI_Section
    from OCP.TopAbs import TopAbs_EDGE
    from OCP.TopoDS import TopoDS
    from OCP.gp import gp_Dir, gp_Pln, gp_Pnt

    normal = [float(name == axis) for name in "xyz"]
    plane = gp_Pln(gp_Pnt(*[position * n for n in normal]), gp_Dir(*normal))
    cut = BRepAlgoAPI_Section(solid, plane, False)
    cut.ComputePCurveOn1(True)
    cut.Approximation(False)
    cut.Build()
    as_edge = getattr(TopoDS, "Edge_s", None) or TopoDS.Edge
    curves = []
    for edge in explore(cut.Shape(), TopAbs_EDGE):
        curve = BRepAdaptor_Curve(as_edge(edge))
        # points close up at both ends of the range, where the section is roundest
        steps = 0.5 - 0.5 * numpy.cos(numpy.linspace(0.0, math.pi, POINTS_A_CURVE))
        first, last = curve.FirstParameter(), curve.LastParameter()
        found = [curve.Value(first + (last - first) * step) for step in steps]
        curves.append(numpy.array([[p.X(), p.Y(), p.Z()] for p in found]))
    return curves


def corners_of(curves, near=1e-5):
    """Ends of the curves [mm], those that coincide as one, foremost first."""
    ends = []
    for curve in curves:
        for end in (curve[0], curve[-1]):
            if all(numpy.linalg.norm(end - other) > near for other in ends):
                ends.append(end)
    return sorted(ends, key=lambda end: end[0])


def enclosed_area(curves, across):
    """Area that closed chains of curves enclose [mm^2], by the sum over signed trapezia of the chained points."""
    chain, rest = [curves[0]], list(curves[1:])
    while rest:
        tail = chain[-1][-1]
        gaps = [min(numpy.linalg.norm(c[0] - tail), numpy.linalg.norm(c[-1] - tail)) for c in rest]
        following = rest.pop(int(numpy.argmin(gaps)))
        if numpy.linalg.norm(following[0] - tail) > numpy.linalg.norm(following[-1] - tail):
            following = following[::-1]
        chain.append(following)
    loop = numpy.concatenate(chain)
    x, h = loop[:, 0], loop[:, across]
    return abs(0.5 * float(numpy.sum(x * numpy.roll(h, -1) - numpy.roll(x, -1) * h)))


def measure(curves, axis):
    across = 1 if axis == "z" else 2
    corners = corners_of(curves)
    nose = corners[0]
    base = [c for c in corners[1:] if c[0] > nose[0] + 0.9 * (corners[-1][0] - nose[0])]
    tail = numpy.mean(base, axis=0)
    chord = tail - nose
    length = float(numpy.linalg.norm(chord))
    along = chord / length
    upward = numpy.zeros(3)
    upward[0], upward[across] = -along[across], along[0]
    upper, lower = [], []
    for curve in curves:
        fraction = (curve - nose) @ along / length
        height = (curve - nose) @ upward
        if fraction.max() - fraction.min() > 0.5:
            order = numpy.argsort(fraction)
            (upper if numpy.interp(0.4, fraction[order], height[order]) > 0.0 else lower).append(
                (fraction[order], height[order]))
    found = {
        "curves": len(curves),
        "corners": [c.tolist() for c in corners],
        "leading_edge": nose.tolist(),
        "trailing_edge": tail.tolist(),
        "chord": length,
        "incidence": math.degrees(math.atan2(-chord[across], chord[0])),
        "base": float(numpy.linalg.norm(base[-1] - base[0])) if len(base) == 2 else 0.0,
        "area": enclosed_area(curves, across),
        "upper": [numpy.column_stack(u).tolist() for u in upper],
        "lower": [numpy.column_stack(l).tolist() for l in lower],
    }
    if len(upper) == len(lower) == 1:
        at = numpy.linspace(0.001, 0.999, 9981)
        top, bottom = numpy.interp(at, *upper[0]), numpy.interp(at, *lower[0])
        k = int(numpy.argmax(top - bottom))
        found.update(thickness=float(top[k] - bottom[k]), thickness_at=float(at[k]))
        k = int(numpy.argmax(numpy.abs(top + bottom)))
        found.update(camber=float(0.5 * (top[k] + bottom[k])), camber_at=float(at[k]))
    return found


def look(path, axis, positions):
    from OCP.TopAbs import TopAbs_SOLID

    shapes, _document, messages = read_shapes(path)
    solids = [solid for shape in shapes for solid in explore(shape, TopAbs_SOLID)]
    sections = []
    for position in positions:
        for number, solid in enumerate(solids):
            curves = curves_of_cut(solid, axis, position)
            if curves:
                sections.append({"position": position, "solid": number, **measure(curves, axis)})
    return {"readable": bool(solids), "messages": messages, "sections": sections}


def main():
    arguments = sys.argv[1:]
    if arguments[:1] == ["--child"]:
        leave(arguments[1], look(arguments[2], arguments[3], [float(p) for p in arguments[4:]]))
    if len(arguments) < 3 or arguments[1] not in ("x", "y", "z"):
        sys.exit(__doc__)
    found = in_child(os.path.abspath(__file__), arguments)
    if not found["readable"]:
        sys.exit("\n".join(found["messages"]))
    json.dump(found["sections"], sys.stdout)
    print()


if __name__ == "__main__":
    main()
