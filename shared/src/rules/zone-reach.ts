import type { BendZone, Development } from '../bending/development';
import { loopExtent } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { dot, scale } from '../geometry/vector';

/** A bend between two panels as one, however many openings part it. Flat-pattern coordinates. */
export interface WholeBend {
  /** Its first zone; all share their lines and sizes. */
  readonly zone: BendZone;
  /** From its first to its last end along itself. */
  readonly low: number;
  readonly high: number;
}

/** Every bend of a development once for each pair of panels that it joins. */
export function wholeBends({ zones }: Development): readonly WholeBend[] {
  const bends = new Map<string, WholeBend>();
  for (const zone of zones) {
    const key = `${zone.bendId} ${String(zone.parentIndex)} ${String(zone.childIndex)}`;
    const known = bends.get(key) ?? { zone, low: Infinity, high: -Infinity };
    const { low, high } = loopExtent(zone.outer, known.zone.along);
    bends.set(key, { zone: known.zone, low: Math.min(known.low, low), high: Math.max(known.high, high) });
  }
  return [...bends.values()];
}

/** How a loop lies to a bend it lies beside. Flat-pattern coordinates. */
export interface ZoneReach {
  /** Extent across the bend from its centre, mm, positive on the child's side. */
  readonly lowMm: number;
  readonly highMm: number;
  /** From the centre to the near rim, mm; negative when the loop lies over the centre. */
  readonly rimFromCentreMm: number;
  /** Unit vector away from the bend, on the side where most of the loop lies. */
  readonly away: Point;
}

/** How near a loop comes to the centre of a bend; null when no part of it lies beside the bend's own length. */
export function zoneReach(loop: Loop, { zone, low: first, high: last }: WholeBend): ZoneReach | null {
  const beside = loopExtent(loop, zone.along);
  if (beside.high <= first || beside.low >= last) return null;
  const centre = dot(zone.origin, zone.towardsChild) + zone.bendAllowanceMm / 2;
  const { low, high } = loopExtent(loop, zone.towardsChild);
  const isOnChildSide = (low + high) / 2 >= centre;
  return {
    lowMm: low - centre,
    highMm: high - centre,
    rimFromCentreMm: isOnChildSide ? low - centre : centre - high,
    away: isOnChildSide ? zone.towardsChild : scale(zone.towardsChild, -1),
  };
}
