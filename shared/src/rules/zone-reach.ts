import type { BendZone } from '../bending/development';
import { loopExtent } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { dot, scale } from '../geometry/vector';

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

/** How near a loop comes to the centre of a bend zone; null when no part of it lies beside the bend's own length. */
export function zoneReach(loop: Loop, zone: BendZone): ZoneReach | null {
  const beside = loopExtent(loop, zone.along);
  const bend = loopExtent(zone.outer, zone.along);
  if (beside.high <= bend.low || beside.low >= bend.high) return null;
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
