import { sealed, splitSegment } from './chain';
import type { Loop, Segment } from './path';
import type { Point } from './point';
import { arcRadius, pointAt } from './segment';
import { cross, dot, subtract, turnRight } from './vector';

/** A half of the plane: everything with a positive or zero distance from the line through `origin` in the direction of `inward`. */
export interface HalfPlane {
  readonly origin: Point;
  /** Unit normal of the edge, pointing into the half that is kept. */
  readonly inward: Point;
}

/** Signed distance of a point from the edge of a half plane, mm; positive inside. */
export function depthIn(half: HalfPlane, point: Point): number {
  return dot(subtract(point, half.origin), half.inward);
}

/** Points at which a segment crosses or touches the edge of a half plane, ends included when they lie on it. */
export function edgeCrossings(segment: Segment, half: HalfPlane, toleranceMm: number): readonly Point[] {
  const from = depthIn(half, segment.from);
  const to = depthIn(half, segment.to);
  if (segment.kind === 'line') {
    const points: Point[] = [];
    if (Math.abs(from) <= toleranceMm) points.push(segment.from);
    if (Math.abs(to) <= toleranceMm) points.push(segment.to);
    if (points.length === 0 && from * to < 0) points.push(pointAt(segment, from / (from - to)));
    return points;
  }
  const along = turnRight(half.inward);
  const centreDepth = depthIn(half, segment.centre);
  const radius = arcRadius(segment);
  const inside = radius * radius - centreDepth * centreDepth;
  const foot = {
    x: segment.centre.x - half.inward.x * centreDepth,
    y: segment.centre.y - half.inward.y * centreDepth,
  };
  const points: Point[] = [];
  if (Math.abs(from) <= toleranceMm) points.push(segment.from);
  if (Math.abs(to) <= toleranceMm) points.push(segment.to);
  if (Math.abs(centreDepth) <= radius + toleranceMm) {
    const reach = inside > 0 ? Math.sqrt(inside) : 0;
    for (const side of reach === 0 ? [0] : [-reach, reach]) {
      points.push({ x: foot.x + along.x * side, y: foot.y + along.y * side });
    }
  }
  return points;
}

/**
 * The part of a region inside a half plane; lines stay lines and arcs stay arcs, split exactly at the edge.
 * @param loops boundary of the region: outer loops counter-clockwise, openings clockwise.
 * @returns boundary of what is left, outer loops counter-clockwise; new edges run along the cut. Empty when nothing is left.
 * Degenerate: a boundary that only touches the edge is kept or dropped whole; edges lying on it belong to their region.
 */
export function clipRegion(loops: readonly Loop[], half: HalfPlane, toleranceMm: number): readonly Loop[] {
  const along = turnRight(half.inward);
  const whole: Loop[] = [];
  const chains: Segment[][] = [];
  for (const loop of loops) {
    const pieces = loop.flatMap((segment) =>
      splitSegment(segment, edgeCrossings(segment, half, toleranceMm), toleranceMm),
    );
    const isKept = pieces.map((piece) => deepest(piece, half) > toleranceMm);
    const firstDropped = isKept.indexOf(false);
    if (firstDropped === -1) {
      if (pieces.length > 0) whole.push(pieces);
      continue;
    }
    let chain: Segment[] = [];
    for (let step = 1; step <= pieces.length; step += 1) {
      const index = (firstDropped + step) % pieces.length;
      const piece = pieces[index];
      if (piece !== undefined && isKept[index] === true) chain.push(piece);
      else if (chain.length > 0) {
        chains.push(chain);
        chain = [];
      }
    }
  }
  return [...whole, ...linkChains(chains, (point) => dot(subtract(point, half.origin), along), toleranceMm)];
}

/** The depth of the point of a piece that is farthest from the edge; pieces do not cross it. */
function deepest(piece: Segment, half: HalfPlane): number {
  const depths = [0.25, 0.5, 0.75].map((t) => depthIn(half, pointAt(piece, t)));
  return depths.reduce((best, depth) => (Math.abs(depth) > Math.abs(best) ? depth : best), 0);
}

/** Closes chains along the cut: each end runs on to the next start. */
function linkChains(
  chains: readonly Segment[][],
  placeOf: (point: Point) => number,
  toleranceMm: number,
): readonly Loop[] {
  const starts = chains
    .map((chain, index) => ({ index, at: chain[0] === undefined ? 0 : placeOf(chain[0].from) }))
    .sort((a, b) => a.at - b.at);
  const ends = chains
    .map((chain, index) => ({ index, at: placeOf(chain.at(-1)?.to ?? { x: 0, y: 0 }) }))
    .sort((a, b) => a.at - b.at);
  const next = new Map<number, number>();
  const taken = new Set<number>();
  for (const end of ends) {
    const start = starts.find((candidate) => !taken.has(candidate.index) && candidate.at >= end.at - 2 * toleranceMm);
    if (start === undefined) continue;
    taken.add(start.index);
    next.set(end.index, start.index);
  }
  const loops: Loop[] = [];
  const done = new Set<number>();
  for (let first = 0; first < chains.length; first += 1) {
    if (done.has(first)) continue;
    const loop: Segment[] = [];
    let current: number | undefined = first;
    while (current !== undefined && !done.has(current)) {
      done.add(current);
      const chain: readonly Segment[] = chains[current] ?? [];
      loop.push(...chain);
      current = next.get(current);
      const from = chain.at(-1)?.to;
      const to = current === undefined ? undefined : chains[current]?.[0]?.from;
      if (from === undefined || to === undefined) continue;
      if (Math.hypot(to.x - from.x, to.y - from.y) > toleranceMm) loop.push({ kind: 'line', from, to });
    }
    loops.push(sealed(loop));
  }
  return loops;
}

/** Signed distance by which a point lies to the left of the line through `from` and `to`, mm. */
export function leftOfLine(point: Point, from: Point, to: Point): number {
  const chord = subtract(to, from);
  return cross(chord, subtract(point, from)) / Math.hypot(chord.x, chord.y);
}
