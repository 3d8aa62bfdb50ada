import type { LineSegment, Loop, Segment } from './path';
import type { Point } from './point';
import { arcRadius, nearestOnSegment, fractionOf, segmentLength, subSegment, tangentAt } from './segment';
import { COINCIDENT_DEG, COINCIDENT_MM } from './tolerance';
import { directionDeg, distance, scale } from './vector';

/**
 * Gives the same number to points that coincide within the tolerance, in order of first sight.
 * Degenerate: a crowd of points each within the tolerance of the next may be split; keep the tolerance far below real distances.
 */
export function pointNumbers(toleranceMm: number): (point: Point) => number {
  const cellMm = 4 * toleranceMm;
  const cells = new Map<number, { readonly point: Point; readonly id: number }[]>();
  let count = 0;
  return (point) => {
    const column = Math.floor(point.x / cellMm);
    const row = Math.floor(point.y / cellMm);
    for (let dx = -1; dx <= 1; dx += 1) {
      for (let dy = -1; dy <= 1; dy += 1) {
        const known = cells
          .get(cellKey(column + dx, row + dy))
          ?.find((one) => distance(one.point, point) <= toleranceMm);
        if (known !== undefined) return known.id;
      }
    }
    const key = cellKey(column, row);
    const crowd = cells.get(key);
    const entry = { point, id: count };
    if (crowd === undefined) cells.set(key, [entry]);
    else crowd.push(entry);
    count += 1;
    return entry.id;
  };
}

/** One number for a cell of the plane. Different cells may share one; distances decide in the end. */
function cellKey(column: number, row: number): number {
  return column * CELL_STRIDE + row;
}

const CELL_STRIDE = 1_000_003;

/** Direction in which a segment leaves its start, degrees. */
function departureDeg(segment: Segment): number {
  return directionDeg(tangentAt(segment, 0));
}

/** Direction from which a segment comes at its end, seen from that end, degrees. */
function arrivalDeg(segment: Segment): number {
  return directionDeg(scale(tangentAt(segment, 1), -1));
}

/** Curvature at an end as a tie-break for equal directions: positive bends to the left when leaving. */
function leavingCurvature(segment: Segment): number {
  return segment.kind === 'line' ? 0 : (segment.clockwise ? -1 : 1) / arcRadius(segment);
}

/**
 * Follows directed segments into closed loops. Where several leave a corner, the one that keeps the inside (on the left) in
 * one piece is taken, so that the loops are the boundaries of the connected pieces. Segments of no length must be gone.
 * @returns null when a segment leads nowhere: the segments do not close.
 */
export function closeLoops<S extends Segment>(
  segments: readonly S[],
  toleranceMm: number,
): readonly (readonly (S | LineSegment)[])[] | null {
  const idOf = pointNumbers(toleranceMm);
  const leaving = new Map<number, number[]>();
  const ends = segments.map((segment, index) => {
    const from = idOf(segment.from);
    leaving.set(from, [...(leaving.get(from) ?? []), index]);
    return idOf(segment.to);
  });
  const used = new Set<number>();
  const loops: (readonly (S | LineSegment)[])[] = [];
  for (let start = 0; start < segments.length; start += 1) {
    if (used.has(start)) continue;
    const chain: S[] = [];
    let current = start;
    do {
      const segment = segments[current];
      const end = ends[current];
      if (segment === undefined || end === undefined || used.has(current)) return null;
      used.add(current);
      chain.push(segment);
      const options = (leaving.get(end) ?? []).filter((index) => index === start || !used.has(index));
      const next = firstClockwise(segment, options, segments);
      if (next === null) return null;
      current = next;
    } while (current !== start);
    loops.push(sealed(chain));
  }
  return loops;
}

/** The outgoing segment met first when turning clockwise from where the incoming one came. */
function firstClockwise(incoming: Segment, options: readonly number[], segments: readonly Segment[]): number | null {
  if (options.length === 1) return options[0] ?? null;
  const back = arrivalDeg(incoming);
  const backCurvature = incoming.kind === 'line' ? 0 : (incoming.clockwise ? 1 : -1) / arcRadius(incoming);
  let best: { readonly index: number; readonly turned: number; readonly curvature: number } | null = null;
  for (const index of options) {
    const segment = segments[index];
    if (segment === undefined) continue;
    let turned = (((back - departureDeg(segment)) % 360) + 360) % 360;
    const curvature = leavingCurvature(segment);
    // Leaving exactly backwards: a tighter left bend lies a full turn away, a right bend none at all.
    if (turned < COINCIDENT_DEG || 360 - turned < COINCIDENT_DEG) turned = curvature < backCurvature ? 0 : 360;
    const isBetter =
      best === null ||
      turned < best.turned - COINCIDENT_DEG ||
      (Math.abs(turned - best.turned) <= COINCIDENT_DEG && curvature > best.curvature);
    if (isBetter) best = { index, turned, curvature };
  }
  return best === null ? null : best.index;
}

/**
 * Makes every segment start exactly where the one before ended. Arcs too short for a sure sweep after that become lines: moved
 * ends could turn them into full circles.
 */
export function sealed<S extends Segment>(chain: readonly S[]): readonly (S | LineSegment)[] {
  return chain.map((segment, index) => {
    const from = chain[(index + chain.length - 1) % chain.length]?.to ?? segment.from;
    const isSpeck = segment.kind === 'arc' && chain.length > 1 && distance(from, segment.to) <= SPECK_MM;
    return isSpeck ? { kind: 'line', from, to: segment.to } : { ...segment, from };
  });
}

const SPECK_MM = 8 * COINCIDENT_MM;

/** Splits a segment at points that lie on it; pieces shorter than the tolerance are not made. */
export function splitSegment(segment: Segment, at: readonly Point[], toleranceMm: number): readonly Segment[] {
  const length = segmentLength(segment);
  if (length <= toleranceMm) return [];
  const gap = toleranceMm / length;
  const cuts = at
    .filter((point) => nearestOnSegment(segment, point).distanceMm <= toleranceMm)
    .map((point) => ({ t: fractionOf(segment, point), point }))
    .filter((cut) => cut.t > gap && cut.t < 1 - gap)
    .sort((a, b) => a.t - b.t)
    .filter((cut, index, all) => index === 0 || cut.t - (all[index - 1]?.t ?? 0) > gap);
  const pieces: Segment[] = [];
  let from = 0;
  let fromPoint = segment.from;
  for (const cut of [...cuts, { t: 1, point: segment.to }]) {
    pieces.push({ ...subSegment(segment, from, cut.t), from: fromPoint, to: cut.point });
    from = cut.t;
    fromPoint = cut.point;
  }
  return pieces;
}

/**
 * Boundary of pieces that touch along straight edges and do not overlap otherwise: stretches travelled both ways vanish.
 * Pieces run with their inside on the left.
 * @returns loops of the joined region (outer boundaries counter-clockwise, openings clockwise), or null when they do not close.
 */
export function joinPieces(pieces: readonly Loop[], toleranceMm: number): readonly Loop[] | null {
  const all = pieces.flat();
  const straight = all.filter((segment) => segment.kind === 'line');
  const cutPoints = straight.flatMap((segment) => [segment.from, segment.to]).sort((one, other) => one.x - other.x);
  const split = all.flatMap((segment) =>
    segment.kind === 'line'
      ? splitSegment(segment, nearbyPoints(segment, cutPoints, toleranceMm), toleranceMm)
      : [segment],
  );
  const idOf = pointNumbers(toleranceMm);
  const keyed = split.map((segment) => ({ segment, from: idOf(segment.from), to: idOf(segment.to) }));
  const waiting = new Map<string, number[]>();
  const gone = new Set<number>();
  keyed.forEach(({ segment, from, to }, index) => {
    if (from === to && segment.kind === 'line') gone.add(index);
    if (segment.kind !== 'line' || gone.has(index)) return;
    const opposite = waiting.get(`${String(to)} ${String(from)}`)?.pop();
    if (opposite !== undefined) {
      gone.add(opposite);
      gone.add(index);
      return;
    }
    const key = `${String(from)} ${String(to)}`;
    waiting.set(key, [...(waiting.get(key) ?? []), index]);
  });
  const left = keyed.filter((_, index) => !gone.has(index)).map(({ segment }) => segment);
  const loops = closeLoops(left, toleranceMm);
  return loops === null ? null : loops.map((loop) => mergeStraightRuns(loop, toleranceMm));
}

/** Points in a segment's box. @param points in rising order of x */
function nearbyPoints(segment: Segment, points: readonly Point[], toleranceMm: number): readonly Point[] {
  const minX = Math.min(segment.from.x, segment.to.x) - toleranceMm;
  const maxX = Math.max(segment.from.x, segment.to.x) + toleranceMm;
  const minY = Math.min(segment.from.y, segment.to.y) - toleranceMm;
  const maxY = Math.max(segment.from.y, segment.to.y) + toleranceMm;
  const near: Point[] = [];
  for (let index = firstFrom(points, minX); index < points.length; index += 1) {
    const point = points[index];
    if (point === undefined || point.x > maxX) break;
    if (point.y >= minY && point.y <= maxY) near.push(point);
  }
  return near;
}

/** Place of the first point whose x is at least this. */
function firstFrom(points: readonly Point[], x: number): number {
  let low = 0;
  let high = points.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((points[middle]?.x ?? Infinity) < x) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Joins consecutive straight edges on one line into one edge, so that a cut along a tangent line leaves no extra corners. */
export function mergeStraightRuns(loop: Loop, toleranceMm: number): Loop {
  const merged: Segment[] = [];
  const continues = (first: Segment | undefined, second: Segment): boolean => {
    if (first?.kind !== 'line' || second.kind !== 'line') return false;
    const isForward =
      (first.to.x - first.from.x) * (second.to.x - second.from.x) +
        (first.to.y - first.from.y) * (second.to.y - second.from.y) >
      0;
    return (
      isForward &&
      nearestOnSegment({ kind: 'line', from: first.from, to: second.to }, first.to).distanceMm <= toleranceMm
    );
  };
  for (const segment of loop) {
    const last = merged.at(-1);
    if (last !== undefined && continues(last, segment))
      merged[merged.length - 1] = { kind: 'line', from: last.from, to: segment.to };
    else merged.push(segment);
  }
  const first = merged[0];
  const last = merged.at(-1);
  if (merged.length > 2 && first !== undefined && last !== undefined && continues(last, first)) {
    return [{ kind: 'line', from: last.from, to: first.to }, ...merged.slice(1, -1)];
  }
  return merged;
}
