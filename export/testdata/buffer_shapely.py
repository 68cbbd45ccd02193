"""Holds offset contours against the buffers of the Python library shapely.

Reads JSON: a list of {"path": points, "distance": d, "offset": points}. Prints for
each: the offset's validity and simplicity, its area, that of the buffer's outer
boundary, and the area that lies in only one of the two.
"""
import json
import sys

from shapely.geometry import LinearRing, Polygon

out = []
for case in json.load(open(sys.argv[1])):
    ring = LinearRing(case["offset"])
    mine = Polygon(case["offset"])
    theirs = Polygon(Polygon(case["path"]).buffer(case["distance"], 64).exterior)
    out.append({
        "valid": bool(mine.is_valid), "simple": bool(ring.is_simple), "left": bool(ring.is_ccw),
        "area": mine.area, "buffer": theirs.area,
        "difference": mine.symmetric_difference(theirs).area if mine.is_valid else -1,
    })
json.dump(out, sys.stdout)
