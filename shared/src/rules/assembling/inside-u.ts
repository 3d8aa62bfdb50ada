import type { BendZone, Development } from '../../bending/development';
import { isInRegion } from '../../geometry/loop';
import type { Point } from '../../geometry/point';
import { cross, dot } from '../../geometry/vector';
import { INSIDE_U } from './limits';

/** Bends count as parallel within this sine, 3 degrees. */
const PARALLEL_SINE = 0.05;

/**
 * Panels of a channel: a web with two flanges that stand up from opposite edges to the same side and so face each other, by index.
 */
export function panelsInsideU({ zones }: Development): ReadonlySet<number> {
  const inside = new Set<number>();
  zones.forEach((first, index) => {
    for (const second of zones.slice(index + 1)) {
      const web = [first.parentIndex, first.childIndex].find((panel) => joins(second, panel));
      if (web === undefined || !facesAcross(first, second, web)) continue;
      for (const zone of [first, second]) inside.add(zone.parentIndex).add(zone.childIndex);
    }
  });
  return inside;
}

function joins(zone: BendZone, panel: number): boolean {
  return zone.parentIndex === panel || zone.childIndex === panel;
}

function facesAcross(first: BendZone, second: BendZone, web: number): boolean {
  if (first.bendId === second.bendId || first.direction !== second.direction) return false;
  if (Math.min(first.bendAngleDeg, second.bendAngleDeg) < INSIDE_U.fromDeg) return false;
  const outwards = (zone: BendZone) => (zone.parentIndex === web ? 1 : -1);
  const { towardsChild: a } = first;
  const { towardsChild: b } = second;
  return Math.abs(cross(a, b)) < PARALLEL_SINE && dot(a, b) * outwards(first) * outwards(second) < 0;
}

/** Index of the panel a point of the flat pattern lies on; null in bend zones and off the sheet. */
export function panelIndexAt({ panels }: Development, flat: Point): number | null {
  return panels.find(({ outer }) => isInRegion(flat, outer, [], 0))?.index ?? null;
}
