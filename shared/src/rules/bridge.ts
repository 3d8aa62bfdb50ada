import type { OutlineEdge } from '../bending/layout';
import { clockwise, counterClockwise, signedArea } from '../geometry/loop';
import { findCrossings } from '../geometry/loop-crossings';
import { intersectSegments } from '../geometry/intersect';
import type { Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { bulgeOf, fractionOf, line, pointAt, segmentLength, subSegment, tangentAt } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { along, distance, dot, subtract, turnLeft } from '../geometry/vector';

/** A place on a loop. */
interface Place {
  readonly index: number;
  readonly t: number;
  readonly point: Point;
  /** Distance along the line that met the loop there, mm. */
  readonly farMm: number;
}

/**
 * Outline of the gap between an opening and a piece inside it when a straight bridge holds the piece: one loop, counter-clockwise,
 * that runs round the opening, along the bridge, round the piece and back. The bridge starts in the middle of an edge of the
 * piece, square to it, where the gap is narrowest, so that it meets no corner.
 * @param outer the opening
 * @param inner the piece inside it; the two do not meet
 * @returns null where no edge leaves room for a bridge of this width
 */
export function bridgedGap(outer: Loop, inner: Loop, widthMm: number): Loop | null {
  const around = counterClockwise(outer);
  // The piece lies to the right of a loop that runs clockwise, so its left is out.
  const piece = clockwise(inner);
  const spots = piece
    .map((segment, index) => ({ index, point: pointAt(segment, 0.5), outward: outwardAt(segment) }))
    .flatMap((spot) => {
      const gapMm = meet(around, spot.point, spot.outward)?.farMm;
      return gapMm === undefined ? [] : [{ ...spot, gapMm }];
    })
    .sort((a, b) => a.gapMm - b.gapMm);
  for (const { index, point, outward } of spots) {
    const gap = bridgeAt(around, piece, index, point, outward, widthMm);
    if (gap !== null) return gap;
  }
  return null;
}

/** Square to a segment in its middle, to the left of its travel. */
function outwardAt(segment: Segment): Point {
  return turnLeft(tangentAt(segment, 0.5));
}

/** Longest way a bridge is looked for, mm; twice the reach of any document. */
const FAR_MM = 20_000;

/** The first place where a line from a point meets a loop. */
function meet(loop: Loop, from: Point, direction: Point): Place | null {
  const ray = line(from, along(from, direction, FAR_MM));
  let best: Place | null = null;
  loop.forEach((segment, index) => {
    const met = intersectSegments(ray, segment, COINCIDENT_MM);
    for (const point of met.kind === 'point' ? met.points : []) {
      const farMm = dot(subtract(point, from), direction);
      if (best === null || farMm < best.farMm) best = { index, t: fractionOf(segment, point), point, farMm };
    }
  });
  return best;
}

function bridgeAt(
  around: Loop,
  piece: Loop,
  index: number,
  point: Point,
  outward: Point,
  widthMm: number,
): Loop | null {
  const sideways = turnLeft(outward);
  const foot = piece[index];
  if (foot === undefined) return null;
  // Each side of the bridge starts on the edge whose middle it stands on, which may be curved.
  const side = (offsetMm: number): { readonly near: Place; readonly far: Place } | null => {
    const start = along(along(point, sideways, offsetMm), outward, -widthMm);
    const near = meet([foot], start, outward);
    const far = near === null ? null : meet(around, near.point, outward);
    return near === null || far === null ? null : { near: { ...near, index }, far };
  };
  const left = side(widthMm / 2);
  const right = side(-widthMm / 2);
  if (left === null || right === null) return null;
  const gap = [
    ...wayRound(around, left.far, right.far),
    line(right.far.point, right.near.point),
    ...wayRound(piece, right.near, left.near),
    line(left.near.point, left.far.point),
  ].filter((segment) => segmentLength(segment) > COINCIDENT_MM);
  const isSimple = findCrossings([gap], COINCIDENT_MM).length === 0;
  const areaMm2 = signedArea(gap);
  const wholeMm2 = signedArea(around) + signedArea(piece);
  return isSimple && areaMm2 > 0 && areaMm2 < wholeMm2 ? gap : null;
}

/** The loop from one place on, all the way round to another. */
function wayRound(loop: Loop, from: Place, to: Place): readonly Segment[] {
  const first = loop[from.index];
  const last = loop[to.index];
  if (first === undefined || last === undefined) return [];
  if (from.index === to.index && from.t < to.t) return [subSegment(first, from.t, to.t)];
  const between: Segment[] = [];
  for (let step = 1; step <= loop.length; step += 1) {
    const index = (from.index + step) % loop.length;
    const segment = loop[index];
    if (index === to.index || segment === undefined) break;
    between.push(segment);
  }
  return [
    { ...subSegment(first, from.t, 1), from: from.point },
    ...between,
    { ...subSegment(last, 0, to.t), to: to.point },
  ];
}

/** The loop as edges of an outline, with ids made from a prefix. */
export function outlineEdges(loop: Loop, prefix: string): readonly OutlineEdge[] {
  return loop
    .filter((segment) => distance(segment.from, segment.to) > COINCIDENT_MM)
    .map((segment, index) => ({ id: `${prefix}-${String(index + 1)}`, start: segment.from, bulge: bulgeOf(segment) }));
}
