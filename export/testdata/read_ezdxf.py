"""Reads DXF files with the Python library ezdxf and prints what it found as a JSON list, one item a file."""
import json
import sys
from collections import Counter

import ezdxf
from ezdxf import recover
from ezdxf.math import BoundingBox2d, ConstructionArc, ConstructionCircle


def read(path):
    doc = ezdxf.readfile(path)
    audit = doc.audit()
    _, recovered = recover.readfile(path)
    paths, circles, box = [], [], BoundingBox2d()
    for e in doc.modelspace():
        layer = e.dxf.layer
        if e.dxftype() == "LWPOLYLINE":
            paths.append({"layer": layer, "closed": bool(e.closed), "count": len(e),
                          "points": [list(p) for p in e.get_points("xyb")]})
        elif e.dxftype() == "POLYLINE":
            paths.append({"layer": layer, "closed": bool(e.is_closed), "count": len(e),
                          "points": [list(p) for p in e.points_in_wcs_xyb()] if hasattr(e, "points_in_wcs_xyb") else
                          [[v.dxf.location.x, v.dxf.location.y, v.dxf.bulge] for v in e.vertices]})
        elif e.dxftype() == "CIRCLE":
            circles.append({"layer": layer, "center": [e.dxf.center.x, e.dxf.center.y], "radius": e.dxf.radius})
        else:
            raise SystemExit("unexpected " + e.dxftype())
        # The library takes polylines apart into lines and arcs, and knows the boxes of arcs and circles.
        for part in [e] if e.dxftype() == "CIRCLE" else e.virtual_entities():
            if part.dxftype() == "LINE":
                box.extend([part.dxf.start, part.dxf.end])
                continue
            if part is e:
                shape = ConstructionCircle(e.dxf.center, e.dxf.radius)
            else:
                shape = ConstructionArc(part.dxf.center, part.dxf.radius, part.dxf.start_angle, part.dxf.end_angle)
            box.extend([shape.bounding_box.extmin, shape.bounding_box.extmax])
    return {
        "version": doc.dxfversion,
        "errors": [str(e.message) for e in audit.errors + recovered.errors],
        "fixes": [str(e.message) for e in audit.fixes + recovered.fixes],
        "kinds": Counter(e.dxftype() for e in doc.modelspace()),
        "units": doc.header.get("$INSUNITS", -1),
        "layers": {l.dxf.name: [l.dxf.color, l.dxf.linetype] for l in doc.layers},
        "paths": paths, "circles": circles,
        "header": [list(doc.header["$EXTMIN"])[:2], list(doc.header["$EXTMAX"])[:2]],
        "box": [list(box.extmin)[:2], list(box.extmax)[:2]],
    }


json.dump([read(path) for path in sys.argv[1:]], sys.stdout)
