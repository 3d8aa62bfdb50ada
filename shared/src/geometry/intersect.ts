import type { ArcSegment, LineSegment, Segment } from './path';
import type { Point } from './point';
import { arcRadius, fractionOf, nearestOnSegment, pointAt } from './segment';
import { coincide, cross, distance, dot, subtract, unit } from './vector';

/** A stretch that two segments share. */
export interface Overlap {
  readonly from: Point;
  readonly to: Point;
}

/** How two segments meet. Sharing a stretch is not "none" and not "points". */
export type Intersection =
  | { readonly kind: 'none' }
  | { readonly kind: 'point'; readonly points: readonly Point[] }
  | { readonly kind: 'overlap'; readonly stretches: readonly Overlap[] };

const NONE: Intersection = { kind: 'none' };

/**
 * Where two segments meet, ends included. Points come in the order of `a`'s travel.
 * @param toleranceMm how far apart two curves may be and still count as touching.
 * Accuracy: points lie on both curves within the tolerance; those within it of an end are that end.
 */
export function intersectSegments(a: Segment, b: Segment, toleranceMm: number): Intersection {
  if (a.kind === 'line') return b.kind === 'line' ? lineLine(a, b, toleranceMm) : lineArc(a, b, a, toleranceMm);
  return b.kind === 'line' ? lineArc(b, a, a, toleranceMm) : arcArc(a, b, toleranceMm);
}

function lineLine(a: LineSegment, b: LineSegment, toleranceMm: number): Intersection {
  const along = subtract(a.to, a.from);
  const other = subtract(b.to, b.from);
  const lengthA = Math.hypot(along.x, along.y);
  const lengthB = Math.hypot(other.x, other.y);
  const determinant = cross(along, other);
  // Lines that drift apart by less than the tolerance over the shorter length are taken as parallel.
  if (Math.abs(determinant) <= toleranceMm * Math.max(lengthA, lengthB)) {
    return sharedStretch(a, b, toleranceMm) ?? endContacts(a, b, toleranceMm);
  }
  const offset = subtract(b.from, a.from);
  const t = cross(offset, other) / determinant;
  const crossing = { x: a.from.x + along.x * t, y: a.from.y + along.y * t };
  return onBoth([crossing], a, b, a, toleranceMm);
}

function lineArc(straight: LineSegment, arc: ArcSegment, first: Segment, toleranceMm: number): Intersection {
  const length = distance(straight.from, straight.to);
  const other = first === straight ? arc : straight;
  if (length <= toleranceMm) return endContacts(first, other, toleranceMm);
  const direction = unit(subtract(straight.to, straight.from));
  const toCentre = subtract(arc.centre, straight.from);
  const footAt = dot(toCentre, direction);
  const off = cross(direction, toCentre);
  const radius = arcRadius(arc);
  const inside = radius * radius - off * off;
  const half = inside > 0 ? Math.sqrt(inside) : 0;
  if (Math.abs(off) > radius + toleranceMm) return NONE;
  const at = (mm: number): Point => ({ x: straight.from.x + direction.x * mm, y: straight.from.y + direction.y * mm });
  return onBoth(half === 0 ? [at(footAt)] : [at(footAt - half), at(footAt + half)], straight, arc, first, toleranceMm);
}

function arcArc(a: ArcSegment, b: ArcSegment, toleranceMm: number): Intersection {
  const radiusA = arcRadius(a);
  const radiusB = arcRadius(b);
  const apart = distance(a.centre, b.centre);
  if (apart <= toleranceMm && Math.abs(radiusA - radiusB) <= toleranceMm) {
    return sharedStretch(a, b, toleranceMm) ?? endContacts(a, b, toleranceMm);
  }
  if (apart > radiusA + radiusB + toleranceMm || apart < Math.abs(radiusA - radiusB) - toleranceMm || apart === 0)
    return NONE;
  const direction = unit(subtract(b.centre, a.centre));
  const footAt = (apart * apart + radiusA * radiusA - radiusB * radiusB) / (2 * apart);
  const inside = radiusA * radiusA - footAt * footAt;
  const half = inside > 0 ? Math.sqrt(inside) : 0;
  const at = (side: number): Point => ({
    x: a.centre.x + direction.x * footAt - direction.y * side,
    y: a.centre.y + direction.y * footAt + direction.x * side,
  });
  return onBoth(half === 0 ? [at(0)] : [at(-half), at(half)], a, b, a, toleranceMm);
}

/** Keeps the candidates that lie on both segments, drawn to an end where one is near, sorted along `first`. */
function onBoth(
  candidates: readonly Point[],
  a: Segment,
  b: Segment,
  first: Segment,
  toleranceMm: number,
): Intersection {
  const found: Point[] = [];
  // Ends that touch the other curve count even where a grazing crossing is lost to rounding.
  const ends = [a.from, a.to, b.from, b.to];
  for (const candidate of [...ends, ...candidates]) {
    if (
      nearestOnSegment(a, candidate).distanceMm > toleranceMm ||
      nearestOnSegment(b, candidate).distanceMm > toleranceMm
    )
      continue;
    if (!found.some((known) => coincide(known, candidate, 2 * toleranceMm))) found.push(candidate);
  }
  return asPoints(found, first);
}

function endContacts(a: Segment, b: Segment, toleranceMm: number): Intersection {
  return onBoth([], a, b, a, toleranceMm);
}

function asPoints(found: readonly Point[], first: Segment): Intersection {
  if (found.length === 0) return NONE;
  return { kind: 'point', points: [...found].sort((p, q) => fractionOf(first, p) - fractionOf(first, q)) };
}

/** Stretches shared by two curves known to run on the same line or circle. */
function sharedStretch(a: Segment, b: Segment, toleranceMm: number): Intersection | null {
  const cuts = [0, 1];
  for (const end of [b.from, b.to]) {
    if (nearestOnSegment(a, end).distanceMm <= toleranceMm) cuts.push(Math.min(1, Math.max(0, fractionOf(a, end))));
  }
  cuts.sort((s, t) => s - t);
  const stretches: Overlap[] = [];
  for (let index = 1; index < cuts.length; index += 1) {
    const from = pointAt(a, cuts[index - 1] ?? 0);
    const to = pointAt(a, cuts[index] ?? 1);
    const middle = pointAt(a, ((cuts[index - 1] ?? 0) + (cuts[index] ?? 1)) / 2);
    const isLong = distance(from, middle) > toleranceMm;
    if (isLong && nearestOnSegment(b, middle).distanceMm <= toleranceMm) stretches.push({ from, to });
  }
  return stretches.length > 0 ? { kind: 'overlap', stretches } : null;
}
