import type { Layout } from '@foldwright/shared/bending/layout';
import { intersectSegments } from '@foldwright/shared/geometry/intersect';
import type { Point } from '@foldwright/shared/geometry/point';
import { line, tangentAt } from '@foldwright/shared/geometry/segment';
import { COINCIDENT_MM } from '@foldwright/shared/geometry/tolerance';
import { along, distance, dot, subtract, turnLeft, unit } from '@foldwright/shared/geometry/vector';
import { edgesOfLoop, findEdge, layoutBounds } from './layout-edges';

/** A crease from edge to edge of the sheet. */
export interface Crease {
  readonly from: Point;
  readonly to: Point;
}

/**
 * The straight line through a point, taken as far as the outline on both sides.
 * @param direction any vector but zero
 * @returns the piece that holds the point, or null when the line misses the sheet or the point lies outside it
 */
export function creaseAcross(layout: Layout, through: Point, direction: Point): Crease | null {
  const axis = unit(direction);
  const bounds = layoutBounds(layout);
  if (bounds === null) return null;
  const reachMm = distance(bounds.min, bounds.max) + distance(through, bounds.min) + 1;
  const ray = line(along(through, axis, -reachMm), along(through, axis, reachMm));
  let behind: Point | null = null;
  let ahead: Point | null = null;
  let behindAt = -Infinity;
  let aheadAt = Infinity;
  const seen: number[] = [];
  for (const { segment } of edgesOfLoop(layout.outer)) {
    const meeting = intersectSegments(ray, segment, COINCIDENT_MM);
    if (meeting.kind !== 'point') continue;
    for (const point of meeting.points) {
      const at = dot(subtract(point, through), axis);
      // Two edges share each corner; it counts once.
      if (seen.some((known) => Math.abs(known - at) < 1e-4)) continue;
      seen.push(at);
      if (at <= 1e-6 && at > behindAt) [behind, behindAt] = [point, at];
      if (at > 1e-6 && at < aheadAt) [ahead, aheadAt] = [point, at];
    }
  }
  if (behind === null || ahead === null) return null;
  return { from: settled(behind), to: settled(ahead) };
}

/** Without the dust of the division: a millionth of a millimetre counts as the same point everywhere. */
function settled(point: Point): Point {
  const rounded = (value: number): number => Math.round(value * 1e6) / 1e6 + 0;
  return { x: rounded(point.x), y: rounded(point.y) };
}

/**
 * The crease parallel to a straight edge, so far inside the sheet.
 * @param distanceMm distance from the edge into the sheet, above 0
 * @returns null when there is no such straight edge or the line misses the sheet
 */
export function creaseBesideEdge(layout: Layout, edgeId: string, distanceMm: number): Crease | null {
  const placed = findEdge(layout, edgeId);
  if (placed === null || placed.segment.kind !== 'line' || !(distanceMm > 0)) return null;
  const direction = tangentAt(placed.segment, 0.5);
  const { from, to } = placed.segment;
  const middle = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
  // The outline runs counter-clockwise, so the sheet is on its left.
  return creaseAcross(layout, along(middle, turnLeft(direction), distanceMm), direction);
}
