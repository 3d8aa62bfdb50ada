import type { Point3 } from './point';
import { COINCIDENT_MM, NO_PLANE_SHARE, NO_PROGRESS_SHARE } from './tolerance';
import { along3, cross3, dot3, length3, subtract3, unit3 } from './vector3';

/** The shortest way between two convex bodies: 0 where they touch or overlap. mm. */
export interface ConvexGap {
  readonly distanceMm: number;
  /** Its ends, on the first and on the second body. */
  readonly from: Point3;
  readonly to: Point3;
}

/** A corner of the difference of two bodies, with the corners that it came from. */
interface Corner {
  readonly at: Point3;
  readonly from: Point3;
  readonly to: Point3;
}

/** A point of a simplex nearest to the origin, and what it is a mixture of. */
interface Nearest {
  readonly at: Point3;
  readonly of: readonly { readonly corner: Corner; readonly share: number }[];
}

const MOST_STEPS = 100;

/**
 * Distance of the convex hulls of two sets of points, at least one each. The difference of both bodies is searched for its point
 * nearest to the origin with simplices of its corners.
 * Source: E. G. Gilbert, D. W. Johnson, S. S. Keerthi 1988.
 */
export function convexGap(first: readonly Point3[], second: readonly Point3[]): ConvexGap {
  const corner = (direction: Point3): Corner => {
    const from = farthest(first, direction);
    const to = farthest(second, { x: -direction.x, y: -direction.y, z: -direction.z });
    return { at: subtract3(from, to), from, to };
  };
  const start = corner({ x: 1, y: 0, z: 0 });
  let nearest: Nearest = { at: start.at, of: [{ corner: start, share: 1 }] };
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const { x, y, z } = nearest.at;
    const squared = dot3(nearest.at, nearest.at);
    if (squared <= COINCIDENT_MM * COINCIDENT_MM) break;
    const next = corner({ x: -x, y: -y, z: -z });
    if (squared - dot3(nearest.at, next.at) <= NO_PROGRESS_SHARE * squared) break;
    const closer = nearestOf([...nearest.of.map((one) => one.corner), next]);
    // Rounding can keep a simplex from getting closer: then it is as near as it gets.
    if (dot3(closer.at, closer.at) >= squared) break;
    nearest = closer;
    if (nearest.of.length > 3) break;
  }
  const mixed = (end: 'from' | 'to'): Point3 =>
    nearest.of.reduce((sum, { corner: one, share }) => along3(sum, one[end], share), { x: 0, y: 0, z: 0 });
  const distanceMm = nearest.of.length > 3 ? 0 : length3(nearest.at);
  return { distanceMm: distanceMm <= COINCIDENT_MM ? 0 : distanceMm, from: mixed('from'), to: mixed('to') };
}

/**
 * By how much the second of two overlapping bodies would have to move to come free, mm: the least over the directions given. At most 0
 * when one of them parts the bodies already.
 * @param directions unit vectors, each of which counts both ways
 */
export function convexDepthMm(
  first: readonly Point3[],
  second: readonly Point3[],
  directions: readonly Point3[],
): number {
  let depthMm = Infinity;
  for (const direction of directions) {
    const [a, b] = [extent(first, direction), extent(second, direction)];
    depthMm = Math.min(depthMm, a.high - b.low, b.high - a.low);
  }
  return depthMm;
}

/** How far points reach along a direction. */
export function extent(points: readonly Point3[], direction: Point3): { readonly low: number; readonly high: number } {
  let [low, high] = [Infinity, -Infinity];
  for (const point of points) {
    const reach = dot3(point, direction);
    low = Math.min(low, reach);
    high = Math.max(high, reach);
  }
  return { low, high };
}

function farthest(points: readonly Point3[], direction: Point3): Point3 {
  let [best, reach] = [points[0] ?? { x: 0, y: 0, z: 0 }, -Infinity];
  for (const point of points) {
    const at = dot3(point, direction);
    if (at > reach) [best, reach] = [point, at];
  }
  return best;
}

/** Point nearest to the origin of the hull of one to four corners: the nearest of all its corners, edges and faces. */
function nearestOf(corners: readonly Corner[]): Nearest {
  if (corners.length === 4 && holdsOrigin(corners)) {
    return { at: { x: 0, y: 0, z: 0 }, of: corners.map((corner) => ({ corner, share: 0.25 })) };
  }
  const tries = corners.flatMap((a, i) => [
    mixture([a], [1]),
    ...corners.slice(i + 1).flatMap((b, j) => [onEdge(a, b), ...corners.slice(i + j + 2).map((c) => onFace(a, b, c))]),
  ]);
  const [first, ...rest] = tries.flatMap((one) => one ?? []);
  if (first === undefined) return { at: { x: 0, y: 0, z: 0 }, of: [] };
  return rest.reduce((best, one) => (dot3(one.at, one.at) < dot3(best.at, best.at) ? one : best), first);
}

function mixture(corners: readonly Corner[], shares: readonly number[]): Nearest {
  const of = corners.map((corner, index) => ({ corner, share: shares[index] ?? 0 }));
  return { at: of.reduce((sum, { corner, share }) => along3(sum, corner.at, share), { x: 0, y: 0, z: 0 }), of };
}

/** Foot of the perpendicular on the line through two corners; null outside them. */
function onEdge(a: Corner, b: Corner): Nearest | null {
  const edge = subtract3(b.at, a.at);
  const size = dot3(edge, edge);
  const t = -dot3(a.at, edge) / size;
  return size > 0 && t > 0 && t < 1 ? mixture([a, b], [1 - t, t]) : null;
}

/** The same on the plane through three. */
function onFace(a: Corner, b: Corner, c: Corner): Nearest | null {
  const [u, v] = [subtract3(b.at, a.at), subtract3(c.at, a.at)];
  const [uu, uv, vv] = [dot3(u, u), dot3(u, v), dot3(v, v)];
  const size = uu * vv - uv * uv;
  if (!(size > NO_PLANE_SHARE * uu * vv)) return null;
  const [ua, va] = [-dot3(u, a.at), -dot3(v, a.at)];
  const [s, t] = [(vv * ua - uv * va) / size, (uu * va - uv * ua) / size];
  return s > 0 && t > 0 && s + t < 1 ? mixture([a, b, c], [1 - s - t, s, t]) : null;
}

function holdsOrigin(corners: readonly Corner[]): boolean {
  return corners.every((apex, index) => {
    const [a, b, c] = corners.filter((_, at) => at !== index);
    if (a === undefined || b === undefined || c === undefined) return false;
    const normal = unit3(cross3(subtract3(b.at, a.at), subtract3(c.at, a.at)));
    const [inside, origin] = [dot3(normal, subtract3(apex.at, a.at)), -dot3(normal, a.at)];
    return Math.abs(inside) > COINCIDENT_MM && inside * origin >= 0;
  });
}
