"""Reads an SVG file with the Python library svgelements and prints it as JSON.

ppi is set to the resolution at which one pixel is one unit of the file, so that
its numbers come out in that unit, y down.
"""
import json
import sys

from svgelements import SVG, Arc, Circle, Close, Line, Move, Path

svg = SVG.parse(sys.argv[1], ppi=float(sys.argv[2]), reify=True)
paths, circles = [], []
for e in svg.elements():
    if isinstance(e, Circle):
        circles.append([e.cx, e.cy, e.rx, e.ry])
    elif isinstance(e, Path):
        pieces = []
        for s in e:
            if isinstance(s, Arc):
                pieces.append(["A", s.start.x, s.start.y, s.end.x, s.end.y, s.rx, s.ry, s.sweep])
            elif isinstance(s, (Line, Close)):
                pieces.append([type(s).__name__[0], s.start.x, s.start.y, s.end.x, s.end.y])
            elif not isinstance(s, Move):
                raise SystemExit("unexpected " + type(s).__name__)
        paths.append({"pieces": pieces, "box": list(e.bbox())})
json.dump({"width": svg.width, "height": svg.height, "paths": paths, "circles": circles}, sys.stdout)
