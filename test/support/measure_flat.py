"""Measures flat patterns with Shapely, a geometry library that is not ours.

Reads a JSON list from stdin: {"outer": [[x, y], ...], "openings": [[[x, y], ...], ...]}, arcs already cut into chords.
Writes for each: is it valid, its area, its perimeter, the smallest distance between its openings and from them to the
outline, and its area once every edge has moved inwards by a millimetre.
"""

import json
import sys
from itertools import combinations

from shapely.geometry import LinearRing, Polygon

measured = []
for part in json.load(sys.stdin):
    sheet = Polygon(part["outer"], part["openings"])
    rings = [LinearRing(part["outer"])] + [LinearRing(opening) for opening in part["openings"]]
    gaps = [a.distance(b) for a, b in combinations(rings, 2)]
    measured.append(
        {
            "isValid": sheet.is_valid,
            "areaMm2": sheet.area,
            "perimeterMm": sheet.length,
            "smallestGapMm": min(gaps) if gaps else None,
            "areaInsideMm2": sheet.buffer(-1, resolution=64).area,
            "bounds": sheet.bounds,
        }
    )
json.dump(measured, sys.stdout)
