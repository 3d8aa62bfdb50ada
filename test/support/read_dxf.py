"""Reads a cut file with ezdxf (an unrelated library) and prints what it holds as JSON.

Areas and extents are worked out here from the entities, exactly with their arcs, so that they are a second opinion.
"""

import json
import math
import sys

import ezdxf
from ezdxf.math import bulge_to_arc


def arc_extents(centre, radius, start, end):
    """Extents of a counter-clockwise arc, angles in radians."""
    turn = (end - start) % (2 * math.pi) or 2 * math.pi
    points = [start, start + turn]
    quarter = math.ceil(start / (math.pi / 2))
    while quarter * math.pi / 2 < start + turn:
        points.append(quarter * math.pi / 2)
        quarter += 1
    xs = [centre[0] + radius * math.cos(a) for a in points]
    ys = [centre[1] + radius * math.sin(a) for a in points]
    return min(xs), min(ys), max(xs), max(ys)


def polyline(entity):
    points = [(p[0], p[1], p[4]) for p in entity.get_points()]
    doubled, boxes, length = 0.0, [], 0.0
    for index, (x, y, bulge) in enumerate(points):
        nx, ny, _ = points[(index + 1) % len(points)]
        doubled += x * ny - nx * y
        boxes.append((min(x, nx), min(y, ny), max(x, nx), max(y, ny)))
        if bulge == 0:
            length += math.hypot(nx - x, ny - y)
            continue
        centre, start, end, radius = bulge_to_arc((x, y), (nx, ny), bulge)
        sweep = 4 * math.atan(bulge)
        doubled += radius * radius * (sweep - math.sin(sweep))
        length += radius * abs(sweep)
        boxes.append(arc_extents(centre, radius, start, end))
    return doubled / 2, boxes, length


def main(path):
    document = ezdxf.readfile(path)
    auditor = document.audit()
    result = {
        "version": document.dxfversion,
        "insunits": document.header.get("$INSUNITS"),
        "errors": [str(error.message) for error in auditor.errors],
        "fixes": [str(fix.message) for fix in auditor.fixes],
        "entities": [],
    }
    for entity in document.modelspace():
        kind, layer = entity.dxftype(), entity.dxf.layer
        row = {"kind": kind, "layer": layer}
        if kind == "LWPOLYLINE":
            area, boxes, length = polyline(entity)
            row.update(closed=bool(entity.closed), areaMm2=abs(area), lengthMm=length, corners=len(entity))
            row["extents"] = [min(b[0] for b in boxes), min(b[1] for b in boxes), max(b[2] for b in boxes), max(b[3] for b in boxes)]
        elif kind == "CIRCLE":
            (x, y, _), r = entity.dxf.center, entity.dxf.radius
            row.update(closed=True, areaMm2=math.pi * r * r, lengthMm=2 * math.pi * r, extents=[x - r, y - r, x + r, y + r])
        elif kind == "LINE":
            a, b = entity.dxf.start, entity.dxf.end
            row.update(closed=False, lengthMm=math.dist(a, b), extents=[min(a[0], b[0]), min(a[1], b[1]), max(a[0], b[0]), max(a[1], b[1])])
        result["entities"].append(row)
    print(json.dumps(result))


main(sys.argv[1])
