import { intersectSegments } from './intersect';
import type { Loop, Segment } from './path';
import type { Point } from './point';
import { extremePoint, nearestOnSegment, segmentBounds } from './segment';
import { COINCIDENT_MM } from './tolerance';
import { subtract } from './vector';

/** The shortest way between two things: its length and both ends. */
export interface Clearance {
  readonly distanceMm: number;
  readonly from: Point;
  readonly to: Point;
}

/** Distance from a point to the nearest place of a loop's boundary; `null` for an empty loop. */
export function pointToLoop(point: Point, loop: Loop): Clearance | null {
  let best: Clearance | null = null;
  for (const segment of loop) {
    const near = nearestOnSegment(segment, point);
    if (best === null || near.distanceMm < best.distanceMm)
      best = { distanceMm: near.distanceMm, from: point, to: near.point };
  }
  return best;
}

/**
 * Shortest way between two segments, 0 where they meet. Exact: the ends, the feet of perpendiculars, the points of arcs
 * facing the other piece and crossings are all tried.
 */
export function segmentClearance(a: Segment, b: Segment): Clearance {
  const met = intersectSegments(a, b, COINCIDENT_MM);
  if (met.kind === 'point') {
    const at = met.points[0] ?? a.from;
    return { distanceMm: 0, from: at, to: at };
  }
  if (met.kind === 'overlap') {
    const at = met.stretches[0]?.from ?? a.from;
    return { distanceMm: 0, from: at, to: at };
  }
  const tries: Clearance[] = [];
  for (const point of candidatePoints(a, b)) {
    const near = nearestOnSegment(b, point);
    tries.push({ distanceMm: near.distanceMm, from: point, to: near.point });
  }
  for (const point of candidatePoints(b, a)) {
    const near = nearestOnSegment(a, point);
    tries.push({ distanceMm: near.distanceMm, from: near.point, to: point });
  }
  return tries.reduce((best, one) => (one.distanceMm < best.distanceMm ? one : best), {
    distanceMm: Infinity,
    from: a.from,
    to: b.from,
  });
}

/** Points of `a` that can be the nearest to `b`: its ends, and for arcs the points facing the other's centre, ends or line. */
function candidatePoints(a: Segment, b: Segment): readonly Point[] {
  const points: Point[] = [a.from, a.to];
  if (a.kind === 'line') return points;
  if (b.kind === 'arc') {
    const towards = subtract(b.centre, a.centre);
    points.push(extremePoint(a, towards), extremePoint(a, { x: 0 - towards.x, y: 0 - towards.y }));
    return points;
  }
  const normal = { x: b.from.y - b.to.y, y: b.to.x - b.from.x };
  points.push(extremePoint(a, normal), extremePoint(a, { x: 0 - normal.x, y: 0 - normal.y }));
  return points;
}

/** Shortest way between the boundaries of two loops; `null` when one is empty. Boxes that are too far apart are not looked into. */
export function loopClearance(a: Loop, b: Loop): Clearance | null {
  let best: Clearance | null = null;
  const boxes = b.map((segment) => ({ segment, bounds: segmentBounds(segment) }));
  for (const segment of a) {
    const own = segmentBounds(segment);
    for (const other of boxes) {
      const gapX = Math.max(own.min.x - other.bounds.max.x, other.bounds.min.x - own.max.x, 0);
      const gapY = Math.max(own.min.y - other.bounds.max.y, other.bounds.min.y - own.max.y, 0);
      if (best !== null && Math.hypot(gapX, gapY) >= best.distanceMm) continue;
      const found = segmentClearance(segment, other.segment);
      if (best === null || found.distanceMm < best.distanceMm) best = found;
    }
  }
  return best;
}
