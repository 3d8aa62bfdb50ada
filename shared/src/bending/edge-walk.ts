import { edgeCrossings } from '../geometry/clip';
import type { Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { fractionOf, nearestOnSegment, tangentAt } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { dot, scale, subtract } from '../geometry/vector';

/** The corner where a bend meets the boundary, as seen from one of its panels. */
export interface EndFrame {
  readonly corner: Point;
  /** A point on the bend line. */
  readonly origin: Point;
  /** Unit vector along the bend line, out of the bend at this end. */
  readonly outward: Point;
  /** Unit vector away from the bend line, into the panel. */
  readonly inward: Point;
}

/** A place on a run of segments. */
export interface RunPlace {
  readonly segment: number;
  readonly t: number;
  readonly point: Point;
}

/** What the boundary does beside a bend: goes down past the tangent line, spreads out along the bend, or ends too soon. */
export type EdgeWalk =
  | { readonly kind: 'side'; readonly place: RunPlace; readonly tangent: Point }
  | { readonly kind: 'shoulder' }
  | { readonly kind: 'cut short' };

/** An edge nearer than 30 degrees to the bend line is a shoulder beside the bend and not its side: tan 60. */
const SIDE_SLOPE = Math.sqrt(3);

/**
 * Follows the boundary away from a bend until it passes the tangent line.
 * @param run boundary from the corner on, in the order of the walk.
 * @param setbackMm distance of the tangent line from the bend line, above the corner's own depth.
 * @param probeMm depth down to which the boundary has to stay near to count as a side; at least the setback.
 */
export function walkEdge(run: readonly Segment[], frame: EndFrame, setbackMm: number, probeMm: number): EdgeWalk {
  const limitMm = SIDE_SLOPE * probeMm;
  const outside = { origin: shifted(frame.corner, frame.outward, limitMm), inward: frame.outward };
  const behind = { origin: shifted(frame.origin, frame.inward, -limitMm), inward: scale(frame.inward, -1) };
  const spread = firstReach(run, outside);
  const back = firstReach(run, behind);
  const reached = firstReach(run, { origin: shifted(frame.origin, frame.inward, setbackMm), inward: frame.inward });
  const probed = firstReach(run, { origin: shifted(frame.origin, frame.inward, probeMm), inward: frame.inward });
  const limit = earlier(spread, back);
  const deep = probed ?? reached;
  if (limit !== null && (deep === null || isBefore(limit, deep))) {
    // A boundary that passes the tangent line first and spreads out below it is a relief that is deep enough by the setback only.
    return { kind: 'shoulder' };
  }
  if (reached === null) return { kind: 'cut short' };
  const segment = run[reached.segment];
  const tangent = segment === undefined ? frame.inward : tangentAt(segment, reached.t);
  return { kind: 'side', place: reached, tangent };
}

/** The first place at which a run has entered a half plane, or null when it never does. A run that starts inside is there at once. */
export function firstReach(
  run: readonly Segment[],
  half: { readonly origin: Point; readonly inward: Point },
): RunPlace | null {
  for (let index = 0; index < run.length; index += 1) {
    const segment = run[index];
    if (segment === undefined) continue;
    if (dot(subtract(segment.from, half.origin), half.inward) >= -COINCIDENT_MM)
      return { segment: index, t: 0, point: segment.from };
    const hits = edgeCrossings(segment, half, COINCIDENT_MM)
      .filter((point) => nearestOnSegment(segment, point).distanceMm <= COINCIDENT_MM)
      .map((point) => ({ segment: index, t: Math.min(1, Math.max(0, fractionOf(segment, point))), point }))
      .sort((a, b) => a.t - b.t);
    if (hits[0] !== undefined) return hits[0];
  }
  return null;
}

/** Whether one place comes before another on the same run. */
export function isBefore(a: RunPlace, b: RunPlace): boolean {
  return a.segment < b.segment || (a.segment === b.segment && a.t < b.t);
}

function earlier(a: RunPlace | null, b: RunPlace | null): RunPlace | null {
  if (a === null) return b;
  if (b === null) return a;
  return isBefore(a, b) ? a : b;
}

function shifted(point: Point, direction: Point, byMm: number): Point {
  return { x: point.x + direction.x * byMm, y: point.y + direction.y * byMm };
}

/** The rest of a run from a place on, or up to it. */
export function runBetween(run: readonly Segment[], from: RunPlace | null, to: RunPlace | null): readonly Segment[] {
  const first = from?.segment ?? 0;
  const last = to?.segment ?? run.length - 1;
  const pieces: Segment[] = [];
  for (let index = first; index <= last; index += 1) {
    const segment = run[index];
    if (segment === undefined) continue;
    const start = from !== null && index === first ? from.point : segment.from;
    const end = to !== null && index === last ? to.point : segment.to;
    if (Math.hypot(end.x - start.x, end.y - start.y) > COINCIDENT_MM) pieces.push({ ...segment, from: start, to: end });
  }
  return pieces;
}

/** The same place counted on the run travelled the other way. */
export function mirroredPlace(place: RunPlace, runSize: number): RunPlace {
  return { segment: runSize - 1 - place.segment, t: 1 - place.t, point: place.point };
}
