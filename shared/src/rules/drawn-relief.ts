import type { Development } from '../bending/development';
import { edgeCrossings } from '../geometry/clip';
import type { Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { extremePoint, nearestOnSegment, pointAt, reverseSegment } from '../geometry/segment';
import { along, distance, dot, scale, subtract } from '../geometry/vector';
import { type BendFront, bendFronts } from './bend-front';
import { LIMIT_SLACK_MM, RELIEF } from './limits';

/** A notch that somebody drew beside the end of a bend, or an opening across it. Flat-pattern coordinates. */
export interface DrawnRelief {
  readonly bendId: string;
  readonly front: BendFront;
  /** End of the tangent line. */
  readonly end: Point;
  readonly widthMm: number;
  /** How far it reaches past the tangent line. */
  readonly depthMm: number;
  /** Its deepest piece of boundary. */
  readonly bottom: Segment;
  /** Whether it is an opening that the bend runs across, and not a notch at its end. */
  readonly isAcross: boolean;
}

/**
 * Notches drawn at the ends of bends, and openings across them: the boundary leads away from the bend and comes back to the
 * tangent line beside it. A notch wider than `RELIEF.widestOverT` is the shape of the panel and no relief; where reliefs are cut by the settings it is none either.
 */
export function drawnReliefs(development: Development): readonly DrawnRelief[] {
  return bendFronts(development).flatMap((front) => {
    const ends = front.runs.flatMap((run) => [
      notchAt(front, run, development),
      notchAt(front, [...run].reverse().map(reverseSegment), development),
    ]);
    return ends.flatMap((notch) => notch ?? []);
  });
}

/** @param run boundary from the end of the bend on, either way round */
function notchAt(front: BendFront, run: Loop, development: Development): DrawnRelief | null {
  const end = run[0]?.from;
  const last = run.at(-1)?.to;
  if (end === undefined || last === undefined) return null;
  const isCut = development.reliefs.some(
    ({ bendId, flat }) => bendId === front.bendId && distance(flat, end) <= NEAR_MM,
  );
  if (isCut) return null;
  const level = dot(end, front.along);
  const isHigh = front.stretches.some(({ high }) => Math.abs(high - level) <= NEAR_MM);
  const sideways = scale(front.along, isHigh ? 1 : -1);
  let depthMm = 0;
  let bottom = run[0];
  for (const segment of run) {
    depthMm = Math.max(depthMm, front.heightOf(extremePoint(segment, front.outward)));
    if (bottom === undefined || middleOf(front, segment) > middleOf(front, bottom)) bottom = segment;
    const back = backAtTangent(front, segment);
    if (back === null) continue;
    const widthMm = dot(subtract(back, end), sideways);
    // Beside one end it comes back to the other from the wrong side; between two stretches of the bend it is an opening.
    const isAcross = distance(back, last) <= NEAR_MM;
    const isRelief =
      widthMm > LIMIT_SLACK_MM && (isAcross || widthMm <= RELIEF.widestOverT * development.stock.thicknessMm);
    return isRelief ? { bendId: front.bendId, front, end, widthMm, depthMm, bottom, isAcross } : null;
  }
  return null;
}

/** Moving into the flat pattern leaves rounding. */
const NEAR_MM = 0.001;

function middleOf(front: BendFront, segment: Segment): number {
  return front.heightOf(pointAt(segment, 0.5));
}

/** Where a segment that starts past the tangent line comes back to it. */
function backAtTangent(front: BendFront, segment: Segment): Point | null {
  if (front.heightOf(segment.from) <= NEAR_MM) return null;
  const origin = along(segment.from, front.outward, -front.heightOf(segment.from));
  const crossings = edgeCrossings(segment, { origin, inward: front.outward }, NEAR_MM);
  return crossings.find((point) => nearestOnSegment(segment, point).distanceMm <= NEAR_MM) ?? null;
}
