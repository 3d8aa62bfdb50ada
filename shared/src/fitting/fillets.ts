import type { Point } from '../geometry/point';
import { along, cross, distance, dot, magnitude, scale, subtract, turnLeft, unit } from '../geometry/vector';
import { PrefixMoments } from './moments';
import type { Stretch } from './split-contour';

/** Longest piece, end to end, that may be a rounded corner cut short by a line, mm. */
const LONGEST_PIECE_MM = 9;
/** How far the points of a corner reach into the edges on both sides, mm. */
const REACH_MM = 6;
/** Ends of the edges that a rounding may have bent, left out when their lines are laid, mm. */
const BENT_END_MM = 2.5;
/** Roundings below are what blur makes of a sharp corner, mm. */
const SMALLEST_RADIUS_MM = 1.4;
const LARGEST_RADIUS_MM = 80;
const RADIUS_STEP = 1.08;
/** Corners that turn by less or by more than these are not rounded ones. */
const LEAST_TURN_DEG = 8;
const MOST_TURN_DEG = 165;
/** A rounding keeps to its points this well, mm (root mean square), and takes this much off the squares, in squared sigmas. */
const ROUNDED_WITHIN_MM = 0.08;
const SIGMA_MM = 0.05;
const LEAST_GAIN = 40;

interface Edge {
  /** A point of the line and its direction of travel. */
  readonly at: Point;
  readonly way: Point;
}

interface Corner {
  readonly before: Edge;
  readonly after: Edge;
  /** Where the edges, carried on, cross. */
  readonly tip: Point;
  readonly turnRad: number;
  /** Towards the middle of the rounding. */
  readonly inward: Point;
}

interface Rounding {
  readonly radiusMm: number;
  /** From the tip to where the rounding touches the edges. */
  readonly tangentMm: number;
  readonly squaresMm2: number;
}

/**
 * Corners between straight edges that are rounded become arcs, where a chord or a sharp corner was found: a rounding
 * that is short or turns little looks like either.
 * @param stretches of a closed chain, in order
 */
export function roundCorners(stretches: readonly Stretch[], points: readonly Point[]): readonly Stretch[] {
  let kept = stretches;
  for (let index = 0; index < kept.length && kept.length > 2; index++) {
    const own = kept[index];
    const next = kept[(index + 1) % kept.length];
    const afterNext = kept[(index + 2) % kept.length];
    if (own?.kind !== 'line' || next === undefined || afterNext === undefined) continue;
    if (afterNext !== own && afterNext.kind === 'line' && isShort(next, points)) {
      const three = roundedAt(own, next, afterNext, points);
      if (three !== null) {
        kept = replaced(kept, index, 3, three);
        continue;
      }
    }
    if (next.kind !== 'line' || kept.length < 3) continue;
    const three = roundedAt(own, null, next, points);
    if (three !== null) kept = replaced(kept, index, 2, three);
  }
  return kept;
}

function replaced(
  stretches: readonly Stretch[],
  index: number,
  count: number,
  by: readonly Stretch[],
): readonly Stretch[] {
  const turned = [...stretches.slice(index), ...stretches.slice(0, index)];
  const changed = [...by, ...turned.slice(count)];
  const back = Math.min(index, changed.length);
  return [...changed.slice(changed.length - back), ...changed.slice(0, changed.length - back)];
}

const pointOf = (points: readonly Point[], index: number): Point =>
  points[((index % points.length) + points.length) % points.length] ?? { x: 0, y: 0 };

function isShort({ first, count }: Stretch, points: readonly Point[]): boolean {
  return distance(pointOf(points, first), pointOf(points, first + count - 1)) <= LONGEST_PIECE_MM;
}

/** Edge, arc and edge in the place of two edges with or without a short piece between them; `null` when it isn't a rounding. */
function roundedAt(
  before: Stretch,
  between: Stretch | null,
  after: Stretch,
  points: readonly Point[],
): readonly Stretch[] | null {
  const first = edgeOf(before, 'end', points);
  const second = edgeOf(after, 'start', points);
  if (first === null || second === null) return null;
  const corner = cornerOf(first, second);
  if (corner === null) return null;
  const from = before.first;
  const to = before.first + before.count + (between?.count ?? 0) + after.count;
  const near: number[] = [];
  for (let index = from; index < to; index++) {
    const isBetween = index >= before.first + before.count && index < to - after.count;
    if (isBetween || distance(pointOf(points, index), corner.tip) <= REACH_MM) near.push(index);
  }
  const window = near.map((index) => pointOf(points, index));
  const most = Math.min(lengthOf(before, points), lengthOf(after, points)) + LONGEST_PIECE_MM / 2;
  const best = bestRounding(corner, window, most);
  if (best === null || Math.sqrt(best.squaresMm2 / window.length) > ROUNDED_WITHIN_MM) return null;
  const plain = between === null ? squaresOf(corner, 0, window) : piecewise(corner, between, window, points);
  const gain = (plain - best.squaresMm2) / (SIGMA_MM * SIGMA_MM);
  // A piece that is there already has been paid for; a new one has to earn its keep.
  if (gain < (between === null ? LEAST_GAIN : 0)) return null;
  const inside = near.filter((index) => isOnRounding(corner, best.tangentMm, pointOf(points, index)));
  const [start, end] = [inside[0], inside.at(-1)];
  if (start === undefined || end === undefined || end - start < 3) return null;
  if (start - from < 4 || to - end - 1 < 4) return null;
  return [
    { kind: 'line', first: before.first, count: start - from },
    { kind: 'arc', first: start % points.length, count: end - start + 1 },
    { kind: 'line', first: (end + 1) % points.length, count: to - end - 1 },
  ];
}

function lengthOf({ first, count }: Stretch, points: readonly Point[]): number {
  return distance(pointOf(points, first), pointOf(points, first + count - 1));
}

/** The line of an edge, laid without what a rounding at one end and the blur at the other may have bent. */
function edgeOf(stretch: Stretch, bent: 'start' | 'end', points: readonly Point[]): Edge | null {
  const own = Array.from({ length: stretch.count }, (_, index) => pointOf(points, stretch.first + index));
  const [start, end] = [own[0], own.at(-1)];
  if (start === undefined || end === undefined || distance(start, end) < 1) return null;
  const bentAt = bent === 'start' ? start : end;
  const straight = own.filter((point) => distance(point, bentAt) > BENT_END_MM);
  const used = straight.length >= Math.max(5, own.length * 0.4) ? straight : own;
  const { primitive } = new PrefixMoments(used).line(0, used.length);
  const normal = { x: primitive.nx, y: primitive.ny };
  const way = turnLeft(normal);
  const isForward = dot(subtract(end, start), way) > 0;
  return { at: scale(normal, primitive.offsetMm), way: isForward ? way : scale(way, -1) };
}

function cornerOf(before: Edge, after: Edge): Corner | null {
  const turning = cross(before.way, after.way);
  const turnRad = Math.atan2(Math.abs(turning), dot(before.way, after.way));
  const turnDeg = (turnRad * 180) / Math.PI;
  if (turnDeg < LEAST_TURN_DEG || turnDeg > MOST_TURN_DEG) return null;
  const reach = cross(subtract(after.at, before.at), after.way) / turning;
  return {
    before,
    after,
    tip: along(before.at, before.way, reach),
    turnRad,
    inward: unit(subtract(after.way, before.way)),
  };
}

function isOnRounding({ tip, before, after }: Corner, tangentMm: number, point: Point): boolean {
  const off = subtract(point, tip);
  return dot(off, before.way) > -tangentMm && dot(off, after.way) < tangentMm;
}

/** Squared distances of points to edge, rounding and edge; a radius of 0 is the sharp corner. */
function squaresOf(corner: Corner, radiusMm: number, points: readonly Point[]): number {
  const tangentMm = radiusMm * Math.tan(corner.turnRad / 2);
  const centre = along(corner.tip, corner.inward, radiusMm / Math.cos(corner.turnRad / 2));
  let sum = 0;
  for (const point of points) {
    const off = subtract(point, corner.tip);
    const missMm =
      radiusMm > 0 && isOnRounding(corner, tangentMm, point)
        ? magnitude(subtract(point, centre)) - radiusMm
        : Math.min(Math.abs(cross(corner.before.way, off)), Math.abs(cross(corner.after.way, off)));
    sum += missMm * missMm;
  }
  return sum;
}

/** The same for the edges and the piece that was found between them. */
function piecewise(corner: Corner, between: Stretch, window: readonly Point[], points: readonly Point[]): number {
  const own = Array.from({ length: between.count }, (_, index) => pointOf(points, between.first + index));
  const moments = new PrefixMoments(own);
  const circle = between.kind === 'arc' ? moments.circle(0, own.length)?.primitive : undefined;
  const chord = moments.line(0, own.length).primitive;
  let sum = 0;
  for (const point of window) {
    const off = subtract(point, corner.tip);
    const toPiece =
      circle === undefined
        ? chord.nx * point.x + chord.ny * point.y - chord.offsetMm
        : distance(point, circle.centre) - circle.radiusMm;
    const missMm = Math.min(
      Math.abs(cross(corner.before.way, off)),
      Math.abs(cross(corner.after.way, off)),
      Math.abs(toPiece),
    );
    sum += missMm * missMm;
  }
  return sum;
}

function bestRounding(corner: Corner, window: readonly Point[], mostTangentMm: number): Rounding | null {
  const largest = Math.min(LARGEST_RADIUS_MM, mostTangentMm / Math.tan(corner.turnRad / 2));
  let best: Rounding | null = null;
  for (let radiusMm = SMALLEST_RADIUS_MM / RADIUS_STEP; radiusMm <= largest; radiusMm *= RADIUS_STEP) {
    const squaresMm2 = squaresOf(corner, radiusMm, window);
    if (best === null || squaresMm2 < best.squaresMm2) {
      best = { radiusMm, tangentMm: radiusMm * Math.tan(corner.turnRad / 2), squaresMm2 };
    }
  }
  return best === null || best.radiusMm < SMALLEST_RADIUS_MM ? null : best;
}
