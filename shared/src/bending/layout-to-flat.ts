import { pointInLoop, loopBounds } from '../geometry/loop';
import { pointToLoop } from '../geometry/clearance';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { add, along, dot, subtract } from '../geometry/vector';
import { COINCIDENT_MM } from '../geometry/tolerance';
import type { BendZone, Development } from './development';

/** What carries a point from the layout to the flat pattern: where each panel went, and the zones between them. */
export interface LayoutCarrier {
  readonly panels: readonly { readonly layoutOuter: Loop; readonly shift: Point }[];
  readonly zones: readonly { readonly zone: BendZone; readonly layoutSetbackMm: number }[];
}

/**
 * Where a point of the layout lies in the flat pattern. On a panel it moves with the panel; between a bend's tangent lines, where
 * the layout has an apex and the sheet an arc, distances across are stretched evenly onto the zone. Points off the sheet move with
 * the nearest panel.
 */
export function layoutToFlat(development: Development, point: Point): Point {
  return carryPoint(carrierOf(development), point);
}

function carrierOf(development: Development): LayoutCarrier {
  return {
    panels: development.panels.map(({ layoutOuter, placement }) => ({ layoutOuter, shift: placement.shift })),
    zones: development.zones.map((zone) => {
      const row = development.bendTable.find(({ bendId }) => bendId === zone.bendId);
      return { zone, layoutSetbackMm: ((row?.layoutDeductionMm ?? 0) + zone.bendAllowanceMm) / 2 };
    }),
  };
}

/** `layoutToFlat` on the bare geometry, for use while a development is being made. */
export function carryPoint(carrier: LayoutCarrier, point: Point): Point {
  for (const { zone, layoutSetbackMm } of carrier.zones) {
    const parentShift = carrier.panels[zone.parentIndex]?.shift ?? { x: 0, y: 0 };
    const offset = subtract(add(point, parentShift), zone.origin);
    const acrossMm = dot(offset, zone.towardsChild);
    const spanMm = 2 * layoutSetbackMm;
    if (spanMm <= COINCIDENT_MM || acrossMm <= 0 || acrossMm >= spanMm) continue;
    const sideways = dot(offset, zone.along);
    const reach = zone.outer.map(({ from }) => dot(subtract(from, zone.origin), zone.along));
    if (sideways < Math.min(...reach) - COINCIDENT_MM || sideways > Math.max(...reach) + COINCIDENT_MM) continue;
    const foot = along(zone.origin, zone.along, sideways);
    return along(foot, zone.towardsChild, (acrossMm / spanMm) * zone.bendAllowanceMm);
  }
  return add(point, nearestPanel(carrier, point)?.shift ?? { x: 0, y: 0 });
}

function nearestPanel(carrier: LayoutCarrier, point: Point): LayoutCarrier['panels'][number] | null {
  let best: { readonly panel: LayoutCarrier['panels'][number]; readonly distanceMm: number } | null = null;
  for (const panel of carrier.panels) {
    const bounds = loopBounds(panel.layoutOuter);
    if (bounds === null) continue;
    if (pointInLoop(point, panel.layoutOuter, 0) !== 'outside') return panel;
    const distanceMm = pointToLoop(point, panel.layoutOuter)?.distanceMm ?? Infinity;
    if (best === null || distanceMm < best.distanceMm) best = { panel, distanceMm };
  }
  return best === null ? null : best.panel;
}
