import type { ArcSegment, LineSegment, Segment } from './path';
import type { Bounds, Point } from './point';
import { COINCIDENT_MM, FLAT_ARC_MM, FULL_CIRCLE_MM } from './tolerance';
import {
  add,
  between,
  boundsOfPoints,
  cosSinDeg,
  directionDeg,
  distance,
  subtract,
  turn,
  turnLeft,
  turnRight,
  unit,
} from './vector';

/** A straight segment. */
export function line(from: Point, to: Point): LineSegment {
  return { kind: 'line', from, to };
}

/**
 * A segment from its ends and bulge = tan(sweep / 4): 0 is straight, positive a counter-clockwise arc, 1 a half circle.
 * Degenerate: coincident ends give a line of no length whatever the bulge; an arc that rises less than `FLAT_ARC_MM` over its
 * chord is straight, because its centre would be too far away to calculate with.
 */
export function segmentFromBulge(from: Point, to: Point, bulge: number): Segment {
  const chord = distance(from, to);
  if (chord <= COINCIDENT_MM || Math.abs(bulge) * chord <= 2 * FLAT_ARC_MM) return line(from, to);
  // Centre lies off the chord's middle by chord/4 * (1/bulge - bulge), to the left for a positive value.
  const offset = (chord / 4) * (1 / bulge - bulge);
  const direction = { x: (to.x - from.x) / chord, y: (to.y - from.y) / chord };
  const middle = between(from, to, 0.5);
  const left = turnLeft(direction);
  const centre = { x: middle.x + left.x * offset, y: middle.y + left.y * offset };
  return { kind: 'arc', from, to, centre, clockwise: bulge < 0 };
}

/** Bulge of a segment (see `segmentFromBulge`); a full circle has none and answers infinity with the arc's sign. */
export function bulgeOf(segment: Segment): number {
  if (segment.kind === 'line') return 0;
  const sweepDeg = arcSweepDeg(segment);
  if (Math.abs(sweepDeg) >= 360) return sweepDeg > 0 ? Infinity : -Infinity;
  return Math.tan((sweepDeg * Math.PI) / 720);
}

/** Radius of an arc, mm: the mean of the distances of both ends, which differ by rounding only. */
export function arcRadius(arc: ArcSegment): number {
  return (distance(arc.from, arc.centre) + distance(arc.to, arc.centre)) / 2;
}

/** Signed sweep of an arc, degrees: positive counter-clockwise, 360 or -360 when both ends are the same point. */
export function arcSweepDeg(arc: ArcSegment): number {
  if (distance(arc.from, arc.to) <= FULL_CIRCLE_MM) return arc.clockwise ? -360 : 360;
  const turned = directionDeg(subtract(arc.to, arc.centre)) - directionDeg(subtract(arc.from, arc.centre));
  const positive = ((turned % 360) + 360) % 360;
  return arc.clockwise ? positive - 360 : positive;
}

/** Length along the segment, mm. */
export function segmentLength(segment: Segment): number {
  if (segment.kind === 'line') return distance(segment.from, segment.to);
  return (arcRadius(segment) * Math.abs(arcSweepDeg(segment)) * Math.PI) / 180;
}

/** Point at fraction `t` (0..1) of the segment's length. The ends are returned exactly. */
export function pointAt(segment: Segment, t: number): Point {
  if (t <= 0) return segment.from;
  if (t >= 1) return segment.to;
  if (segment.kind === 'line') return between(segment.from, segment.to, t);
  return add(segment.centre, turn(subtract(segment.from, segment.centre), arcSweepDeg(segment) * t));
}

/**
 * Unit direction of travel at fraction `t`.
 * @throws RangeError for a segment of no length.
 */
export function tangentAt(segment: Segment, t: number): Point {
  if (segment.kind === 'line') return unit(subtract(segment.to, segment.from));
  const radial = unit(subtract(pointAt(segment, t), segment.centre));
  return segment.clockwise ? turnRight(radial) : turnLeft(radial);
}

/** The same segment travelled the other way. */
export function reverseSegment(segment: Segment): Segment {
  if (segment.kind === 'line') return line(segment.to, segment.from);
  return { ...segment, from: segment.to, to: segment.from, clockwise: !segment.clockwise };
}

/** The piece between fractions `t0` < `t1`. The original ends are kept exactly. */
export function subSegment(segment: Segment, t0: number, t1: number): Segment {
  const from = pointAt(segment, t0);
  const to = pointAt(segment, t1);
  return segment.kind === 'line' ? line(from, to) : { ...segment, from, to };
}

/** Fraction (not limited to 0..1 on lines) at which the segment is nearest to a direction or point, for points on it. */
export function fractionOf(segment: Segment, point: Point): number {
  if (segment.kind === 'line') {
    const chord = subtract(segment.to, segment.from);
    const squared = chord.x * chord.x + chord.y * chord.y;
    if (squared === 0) return 0;
    return ((point.x - segment.from.x) * chord.x + (point.y - segment.from.y) * chord.y) / squared;
  }
  if (distance(point, segment.from) <= COINCIDENT_MM) return 0;
  if (distance(point, segment.to) <= COINCIDENT_MM) return 1;
  const sweepDeg = arcSweepDeg(segment);
  const turned = directionDeg(subtract(point, segment.centre)) - directionDeg(subtract(segment.from, segment.centre));
  const positive = ((turned % 360) + 360) % 360;
  return segment.clockwise ? (360 - positive) / -sweepDeg : positive / sweepDeg;
}

/** Point of the arc's circle at a direction in degrees, and whether the arc passes through it. */
function arcPointAtDirection(arc: ArcSegment, angleDeg: number): Point | null {
  const [cosine, sine] = cosSinDeg(angleDeg);
  const radius = arcRadius(arc);
  const point = { x: arc.centre.x + radius * cosine, y: arc.centre.y + radius * sine };
  const t = fractionOf(arc, point);
  return t >= 0 && t <= 1 ? point : null;
}

/** The point of the segment that lies farthest in a direction. For arcs the extreme of the circle counts when it is on the arc. */
export function extremePoint(segment: Segment, direction: Point): Point {
  const reach = (point: Point): number => point.x * direction.x + point.y * direction.y;
  let best = reach(segment.to) > reach(segment.from) ? segment.to : segment.from;
  if (segment.kind === 'arc') {
    const extreme = arcPointAtDirection(segment, directionDeg(direction));
    if (extreme !== null && reach(extreme) > reach(best)) best = extreme;
  }
  return best;
}

/** Axis-aligned bounds; those of arcs include their extremes. */
export function segmentBounds(segment: Segment): Bounds {
  const points: Point[] = [segment.from, segment.to];
  if (segment.kind === 'arc') {
    for (const angleDeg of [0, 90, 180, 270]) {
      const extreme = arcPointAtDirection(segment, angleDeg);
      if (extreme !== null) points.push(extreme);
    }
  }
  return boundsOfPoints(points) ?? { min: segment.from, max: segment.from };
}

/** Distance from a point to the segment and the nearest point on it, mm. */
export function nearestOnSegment(
  segment: Segment,
  point: Point,
): { readonly distanceMm: number; readonly point: Point } {
  if (segment.kind === 'line') {
    const t = Math.min(1, Math.max(0, fractionOf(segment, point)));
    const foot = t === 0 ? segment.from : t === 1 ? segment.to : between(segment.from, segment.to, t);
    return { distanceMm: distance(foot, point), point: foot };
  }
  const candidates: Point[] = [segment.from, segment.to];
  if (distance(point, segment.centre) > 0) {
    const foot = arcPointAtDirection(segment, directionDeg(subtract(point, segment.centre)));
    if (foot !== null) candidates.push(foot);
  }
  let best = { distanceMm: Infinity, point: segment.from };
  for (const candidate of candidates) {
    const distanceMm = distance(candidate, point);
    if (distanceMm < best.distanceMm) best = { distanceMm, point: candidate };
  }
  return best;
}
