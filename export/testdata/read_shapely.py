"""Measures the gears in DXF files with the geometry library shapely and prints a JSON list.

Arguments, three for each gear: the DXF; a file of the exact outline's points, "x,y" a
line; and the sagitta (in mm) at which arcs are cut into chords. The arcs' centers and radii are
worked out from the bulges by the library ezdxf, which reads the file.
"""
import json
import math
import sys

import ezdxf
from ezdxf.math import bulge_to_arc
from shapely.geometry import LinearRing, LineString, Point, Polygon
from shapely.validation import explain_validity


def flat(vertices, sagitta):
    """The corners of a closed polyline of (x, y, bulge), its arcs cut into chords."""
    points = []
    for (x, y, bulge), (u, v, _) in zip(vertices, vertices[1:] + vertices[:1]):
        points.append((x, y))
        if bulge == 0:
            continue
        # The library gives every arc counter-clockwise.
        center, start, end, radius = bulge_to_arc((x, y), (u, v), bulge)
        sweep = (end - start) % (2 * math.pi)
        n = math.ceil(sweep / (2 * math.acos(1 - min(1, sagitta / radius))))
        inner = [(center.x + radius * math.cos(start + sweep * i / n), center.y + radius * math.sin(start + sweep * i / n)) for i in range(1, n)]
        points += inner if bulge > 0 else inner[::-1]
    return points


def read(path, sagitta):
    """The corners of the closed polylines, and the circles, by layer."""
    lines, circles = {}, {}
    for e in ezdxf.readfile(path).modelspace():
        if e.dxftype() == "CIRCLE":
            circles.setdefault(e.dxf.layer, []).append(Point(e.dxf.center.x, e.dxf.center.y).buffer(e.dxf.radius, resolution=64))
            continue
        if e.dxftype() == "LWPOLYLINE":
            vertices, closed = [tuple(p) for p in e.get_points("xyb")], e.closed
        else:
            vertices, closed = [(v.dxf.location.x, v.dxf.location.y, v.dxf.bulge) for v in e.vertices], e.is_closed
        if not closed:
            raise SystemExit("an open polyline")
        lines.setdefault(e.dxf.layer, []).append(flat(vertices, sagitta))
    return lines, circles


def measure(path, csv, sagitta):
    """What is measured of one gear."""
    lines, circles = read(path, sagitta)
    [cut] = lines["CUT"]
    with open(csv) as f:
        exact = [tuple(map(float, line.split(","))) for line in f]
    drawn = LinearRing(cut)
    bores = [Polygon(b) for b in lines.get("BORE", [])] + circles.get("BORE", [])
    return {
        "closed": drawn.is_closed, "simple": drawn.is_simple, "ccw": drawn.is_ccw,
        "valid": explain_validity(Polygon(cut)),
        "bored": [explain_validity(b) == "Valid Geometry" and Polygon(cut).contains(b) for b in bores],
        "area": Polygon(cut).area, "length": drawn.length,
        "exactvalid": explain_validity(Polygon(exact)), "exactarea": Polygon(exact).area,
        "distance": LineString(cut + cut[:1]).hausdorff_distance(LineString(exact + exact[:1])),  # which is not right for rings
    }


arguments = iter(sys.argv[1:])
json.dump([measure(path, csv, float(sagitta)) for path, csv, sagitta in zip(arguments, arguments, arguments)], sys.stdout)
