import { orientation } from './orientation';
import type { ArcSegment, Loop, Segment } from './path';
import type { Bounds, Point } from './point';
import {
  arcRadius,
  arcSweepDeg,
  extremePoint,
  nearestOnSegment,
  pointAt,
  reverseSegment,
  segmentBounds,
  segmentFromBulge,
  segmentLength,
} from './segment';
import { COINCIDENT_MM } from './tolerance';
import { boundsOfPoints, cross, distance } from './vector';

/** A corner of a chain and the bulge of the edge that leaves it. Outline edges have this shape. */
export interface BulgeVertex {
  readonly start: Point;
  readonly bulge: number;
}

/**
 * Loop from a chain of corners with bulges. Edges of no length are left out; the running direction is kept.
 * Degenerate: fewer than two usable edges give an empty loop.
 */
export function loopFromBulges(vertices: readonly BulgeVertex[]): Loop {
  const segments: Segment[] = [];
  vertices.forEach((vertex, index) => {
    const next = vertices[(index + 1) % vertices.length];
    if (next === undefined || distance(vertex.start, next.start) <= COINCIDENT_MM) return;
    segments.push(segmentFromBulge(vertex.start, next.start, vertex.bulge));
  });
  if (segments.length < 2) return [];
  // Dropped edges leave gaps of rounding size; close them so that each segment starts where the one before ended.
  return segments.map((segment, index) => {
    const next = segments[(index + 1) % segments.length];
    return next === undefined ? segment : { ...segment, to: next.from };
  });
}

/** A full circle as a loop, counter-clockwise, made of two half circles so that every segment has distinct ends. */
export function circleLoop(centre: Point, radiusMm: number): Loop {
  const east = { x: centre.x + radiusMm, y: centre.y };
  const west = { x: centre.x - radiusMm, y: centre.y };
  return [
    { kind: 'arc', from: east, to: west, centre, clockwise: false },
    { kind: 'arc', from: west, to: east, centre, clockwise: false },
  ];
}

/**
 * An obround as a loop, counter-clockwise. `from` and `to` are the centres of its end radii; equal centres give a circle.
 */
export function slotLoop(from: Point, to: Point, widthMm: number): Loop {
  const radius = widthMm / 2;
  const length = distance(from, to);
  if (length <= COINCIDENT_MM) return circleLoop(from, radius);
  const side = { x: (-(to.y - from.y) / length) * radius, y: ((to.x - from.x) / length) * radius };
  const a = { x: from.x - side.x, y: from.y - side.y };
  const b = { x: to.x - side.x, y: to.y - side.y };
  const c = { x: to.x + side.x, y: to.y + side.y };
  const d = { x: from.x + side.x, y: from.y + side.y };
  return [
    { kind: 'line', from: a, to: b },
    { kind: 'arc', from: b, to: c, centre: to, clockwise: false },
    { kind: 'line', from: c, to: d },
    { kind: 'arc', from: d, to: a, centre: from, clockwise: false },
  ];
}

/** Closed polygon as a loop of lines. */
export function polygonLoop(points: readonly Point[]): Loop {
  return loopFromBulges(points.map((start) => ({ start, bulge: 0 })));
}

/** Length along the loop, mm. */
export function loopLength(loop: Loop): number {
  return loop.reduce((sum, segment) => sum + segmentLength(segment), 0);
}

/**
 * Area enclosed, mm2, exact with arcs: positive for counter-clockwise loops, negative for clockwise ones.
 * Taken about the loop's first point, so that a part far from the origin loses no digits.
 */
export function signedArea(loop: Loop): number {
  const origin = loop[0]?.from;
  if (origin === undefined) return 0;
  let doubled = 0;
  for (const segment of loop) {
    doubled += cross(offsetFrom(origin, segment.from), offsetFrom(origin, segment.to));
    if (segment.kind === 'arc') doubled += 2 * arcCapArea(segment);
  }
  return doubled / 2;
}

/** Area between an arc and its chord, mm2, signed as it adds to the area on the left of the chord's travel. */
function arcCapArea(arc: ArcSegment): number {
  const sweepRad = (arcSweepDeg(arc) * Math.PI) / 180;
  const radius = arcRadius(arc);
  return ((radius * radius) / 2) * (sweepRad - Math.sin(sweepRad));
}

/** First moments of the enclosed area about the loop's own first point, mm3. */
function firstMoments(loop: Loop, origin: Point): { readonly area: number; readonly x: number; readonly y: number } {
  let area = 0;
  let x = 0;
  let y = 0;
  for (const segment of loop) {
    const from = offsetFrom(origin, segment.from);
    const to = offsetFrom(origin, segment.to);
    const triangle = cross(from, to) / 2;
    area += triangle;
    x += (triangle * (from.x + to.x)) / 3;
    y += (triangle * (from.y + to.y)) / 3;
    if (segment.kind === 'arc') {
      const cap = arcCapArea(segment);
      const sweepRad = (arcSweepDeg(segment) * Math.PI) / 180;
      const radius = arcRadius(segment);
      const centre = offsetFrom(origin, segment.centre);
      const middle = offsetFrom(segment.centre, pointAt(segment, 0.5));
      // Moment of a circular cap about the circle's centre: 2/3 r^3 sin^3(sweep/2), along the middle radius.
      const moment = (2 / 3) * radius ** 2 * Math.sin(Math.abs(sweepRad) / 2) ** 3 * Math.sign(sweepRad);
      area += cap;
      x += cap * centre.x + moment * middle.x;
      y += cap * centre.y + moment * middle.y;
    }
  }
  return { area, x, y };
}

/** Centre of area of a loop with openings, exact with arcs; `null` when nothing is enclosed. Running directions do not matter. */
export function centreOfArea(outer: Loop, openings: readonly Loop[]): Point | null {
  const origin = outer[0]?.from;
  if (origin === undefined) return null;
  let area = 0;
  let x = 0;
  let y = 0;
  [outer, ...openings].forEach((loop, index) => {
    const moments = firstMoments(loop, origin);
    const sign = (index === 0 ? 1 : -1) * (moments.area < 0 ? -1 : 1);
    area += sign * moments.area;
    x += sign * moments.x;
    y += sign * moments.y;
  });
  if (area === 0) return null;
  return { x: origin.x + x / area, y: origin.y + y / area };
}

function offsetFrom(origin: Point, point: Point): Point {
  return { x: point.x - origin.x, y: point.y - origin.y };
}

/** The loop travelled the other way. */
export function reverseLoop(loop: Loop): Loop {
  return [...loop].reverse().map(reverseSegment);
}

/** The loop running counter-clockwise. */
export function counterClockwise(loop: Loop): Loop {
  return signedArea(loop) < 0 ? reverseLoop(loop) : loop;
}

/** The loop running clockwise, as openings do. */
export function clockwise(loop: Loop): Loop {
  return signedArea(loop) > 0 ? reverseLoop(loop) : loop;
}

/** Axis-aligned bounds including the extremes of arcs; `null` for an empty loop. */
export function loopBounds(loop: Loop): Bounds | null {
  return boundsOfPoints(
    loop.flatMap((segment) => {
      const { min, max } = segmentBounds(segment);
      return [min, max];
    }),
  );
}

/** How far the loop reaches in a direction (scalar product with it), exact with arcs; minus infinity for an empty loop. */
export function loopReach(loop: Loop, direction: Point): number {
  return loop.reduce((reach, segment) => {
    const point = extremePoint(segment, direction);
    return Math.max(reach, point.x * direction.x + point.y * direction.y);
  }, -Infinity);
}

/** How far the loop reaches from and to along a direction, exact with arcs. */
export function loopExtent(loop: Loop, direction: Point): { readonly low: number; readonly high: number } {
  return { low: -loopReach(loop, { x: -direction.x, y: -direction.y }), high: loopReach(loop, direction) };
}

/** Where a point lies. `on` means within the tolerance of the boundary. */
export type PointPlace = 'inside' | 'outside' | 'on';

/**
 * Where a point lies against a loop, whichever way the loop runs.
 * @param toleranceMm width of the boundary; 0 leaves only points exactly on straight edges and the like.
 * Accuracy: away from the boundary the answer is exact for chords (robust orientation) and to rounding for arcs.
 */
export function pointInLoop(point: Point, loop: Loop, toleranceMm: number): PointPlace {
  let winding = 0;
  for (const segment of loop) {
    if (isNearBox(segment, point, toleranceMm) && nearestOnSegment(segment, point).distanceMm <= toleranceMm)
      return 'on';
    winding += chordWinding(segment, point);
    if (segment.kind === 'arc' && isInsideCap(segment, point)) winding += segment.clockwise ? -1 : 1;
  }
  return winding === 0 ? 'outside' : 'inside';
}

/** Whether a point lies in the box of a straight segment, which is quicker told than its distance; true for every arc. */
function isNearBox({ kind, from, to }: Segment, { x, y }: Point, marginMm: number): boolean {
  if (kind === 'arc') return true;
  return (
    (from.x < to.x ? from.x : to.x) - marginMm <= x &&
    (from.x < to.x ? to.x : from.x) + marginMm >= x &&
    (from.y < to.y ? from.y : to.y) - marginMm <= y &&
    (from.y < to.y ? to.y : from.y) + marginMm >= y
  );
}

/** Contribution of a chord to the winding number, by the crossing rule that counts each height once. */
function chordWinding(segment: Segment, point: Point): number {
  const { from, to } = segment;
  if (from.y <= point.y && to.y > point.y) return sideOf(from, to, point) > 0 ? 1 : 0;
  if (from.y > point.y && to.y <= point.y) return sideOf(from, to, point) < 0 ? -1 : 0;
  return 0;
}

/**
 * Side of a chord that a point lies on: 1 left, -1 right. A point exactly on the chord counts as if it lay a touch up and,
 * less, to the left, so that two arcs on one chord, as in a circle of two halves, agree about it.
 */
function sideOf(from: Point, to: Point, point: Point): 1 | -1 {
  const side = orientation(from, to, point);
  if (side !== 0) return side;
  const isUpward = to.y === from.y ? to.x > from.x : to.y > from.y;
  return isUpward ? 1 : -1;
}

/** Whether a point lies between an arc and its chord. */
function isInsideCap(arc: ArcSegment, point: Point): boolean {
  if (distance(point, arc.centre) >= arcRadius(arc)) return false;
  if (Math.abs(arcSweepDeg(arc)) >= 360) return true;
  const side = sideOf(arc.from, arc.to, point);
  // A counter-clockwise arc bulges to the right of its chord.
  return arc.clockwise ? side > 0 : side < 0;
}

/** Whether a point lies in the sheet: inside the outer loop and in none of the openings; boundaries count as sheet. */
export function isInRegion(point: Point, outer: Loop, openings: readonly Loop[], toleranceMm: number): boolean {
  if (pointInLoop(point, outer, toleranceMm) === 'outside') return false;
  return openings.every((opening) => pointInLoop(point, opening, toleranceMm) !== 'inside');
}
