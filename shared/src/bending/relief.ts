import type { Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { line } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { along, dot, scale, subtract } from '../geometry/vector';
import { firstReach, isBefore } from './edge-walk';
import type { EndFrame, RunPlace } from './edge-walk';
import type { ReliefSettings } from './layout';

/** Narrowest slit a laser leaves clean edges in, mm. Source: common practice, no source. */
const NARROWEST_RELIEF_MM = 1;

/** Size of a relief: its width along the bend and its depth past the tangent line, mm. */
export interface ReliefSize {
  readonly widthMm: number;
  readonly depthMm: number;
}

/**
 * Size of the reliefs beside a bend: as entered, else one thickness wide (at least 1 mm) and R + T past the tangent line.
 * Source: common practice, no source.
 */
export function reliefSize(settings: ReliefSettings, insideRadiusMm: number, thicknessMm: number): ReliefSize {
  return {
    widthMm: settings.widthMm ?? Math.max(thicknessMm, NARROWEST_RELIEF_MM),
    depthMm: settings.depthMm ?? insideRadiusMm + thicknessMm,
  };
}

/**
 * The cut beside a bend that frees it from the sheet next to it.
 * @param run boundary from the bend's corner on.
 * @returns the way from the end of the tangent edge round the relief to the boundary, and where it arrives; null when the
 * boundary leaves no place for a relief.
 */
export function cutRelief(
  run: readonly Segment[],
  frame: EndFrame,
  setbackMm: number,
  size: ReliefSize,
  shape: ReliefSettings['shape'],
): { readonly path: readonly Segment[]; readonly place: RunPlace } | null {
  const bottomMm = setbackMm + size.depthMm;
  const at = (outMm: number, depthMm: number): Point =>
    along(along(onLine(frame), frame.outward, outMm), frame.inward, depthMm);
  const sideways = firstReach(run, { origin: at(size.widthMm, 0), inward: frame.outward });
  const down = firstReach(run, { origin: at(0, bottomMm), inward: frame.inward });
  const up = firstReach(run, { origin: at(0, -2 * COINCIDENT_MM), inward: scale(frame.inward, -1) });
  const place = [sideways, down, up].reduce(
    (first, one) => (one !== null && (first === null || isBefore(one, first)) ? one : first),
    null,
  );
  if (place === null) return null;
  const outMm = dot(subtract(place.point, frame.corner), frame.outward);
  const depthMm = dot(subtract(place.point, frame.origin), frame.inward);
  if (outMm <= COINCIDENT_MM) return null;
  const start = at(0, setbackMm);
  if (depthMm >= bottomMm - COINCIDENT_MM) {
    return { path: [line(start, at(0, bottomMm)), line(at(0, bottomMm), place.point)], place };
  }
  const radius = outMm / 2;
  if (shape === 'obround' && size.depthMm >= radius && bottomMm - radius >= depthMm) {
    const [left, right] = [at(0, bottomMm - radius), at(outMm, bottomMm - radius)];
    const isTurnedRight = frame.outward.x * frame.inward.y - frame.outward.y * frame.inward.x > 0;
    const round: Segment = {
      kind: 'arc',
      from: left,
      to: right,
      centre: at(radius, bottomMm - radius),
      clockwise: isTurnedRight,
    };
    return { path: [line(start, left), round, line(right, place.point)], place };
  }
  return {
    path: [
      line(start, at(0, bottomMm)),
      line(at(0, bottomMm), at(outMm, bottomMm)),
      line(at(outMm, bottomMm), place.point),
    ],
    place,
  };
}

/** Foot of the corner on the bend line. */
function onLine(frame: EndFrame): Point {
  const depth = dot(subtract(frame.corner, frame.origin), frame.inward);
  return along(frame.corner, frame.inward, -depth);
}
