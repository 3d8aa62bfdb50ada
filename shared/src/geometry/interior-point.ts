import { flattenLoop } from './flatten';
import { centreOfArea, isInRegion } from './loop';
import type { Loop } from './path';
import type { Point } from './point';
import { CHORD_MM, COINCIDENT_MM } from './tolerance';

/**
 * A point well inside a region: its centre of area when that lies in it, otherwise the middle of the widest stretch on
 * a few level lines across it.
 * @param outer boundary, either way round
 * @param openings loops that are cut out of it
 * @returns a point that lies inside with some room, or null for a region without area
 */
export function interiorPoint(outer: Loop, openings: readonly Loop[]): Point | null {
  const centre = centreOfArea(outer, openings);
  if (centre !== null && isInRegion(centre, outer, openings, COINCIDENT_MM)) return centre;
  const polygons = [outer, ...openings].map((loop) => flattenLoop(loop, CHORD_MM));
  const heights = polygons.flat().map((point) => point.y);
  const low = Math.min(...heights);
  const high = Math.max(...heights);
  let best: { readonly point: Point; readonly width: number } | null = null;
  for (let step = 1; step < LEVELS; step += 1) {
    const y = low + ((high - low) * step) / LEVELS;
    const cuts = polygons.flatMap((polygon) => levelCuts(polygon, y)).sort((a, b) => a - b);
    for (let index = 0; index + 1 < cuts.length; index += 2) {
      const left = cuts[index] ?? 0;
      const right = cuts[index + 1] ?? left;
      if (best === null || right - left > best.width) {
        best = { point: { x: (left + right) / 2, y }, width: right - left };
      }
    }
  }
  return best !== null && isInRegion(best.point, outer, openings, COINCIDENT_MM) ? best.point : null;
}

/** A prime, so that level lines rarely run along edges of a drawn part. */
const LEVELS = 23;

/** Where a polygon crosses a level line; a corner on the line counts as just above it. */
function levelCuts(polygon: readonly Point[], y: number): readonly number[] {
  const cuts: number[] = [];
  polygon.forEach((from, index) => {
    const to = polygon[(index + 1) % polygon.length];
    if (to === undefined || from.y >= y === to.y >= y) return;
    cuts.push(from.x + ((y - from.y) / (to.y - from.y)) * (to.x - from.x));
  });
  return cuts;
}
