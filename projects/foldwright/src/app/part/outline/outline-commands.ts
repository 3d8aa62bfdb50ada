import type { Layout } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { pointAt } from '@foldwright/shared/geometry/segment';
import { distance, subtract } from '@foldwright/shared/geometry/vector';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { EntityRef } from '../drawing-board/geometry/entity';
import { findEdge } from '../drawing-board/geometry/layout-edges';
import { moveHandleTo } from '../drawing-board/tools/drag-commands';

/** Puts a corner into the middle of an edge. */
export function splitCommands(layout: Layout, edgeId: string, newId: string): readonly PartCommand[] {
  const placed = findEdge(layout, edgeId);
  if (placed === null) return [];
  const start = pointAt(placed.segment, 0.5);
  return [{ kind: 'insertVertex', edgeId, newEdge: { id: newId, start, bulge: 0 } }];
}

/** Turns a nearly level or plumb edge exactly so, by moving its end; the edge's start stays. */
export function squareUpCommands(layout: Layout, edgeId: string): readonly PartCommand[] {
  const placed = findEdge(layout, edgeId);
  if (placed === null || placed.segment.kind !== 'line') return [];
  const { from, to } = placed.segment;
  const by = subtract(to, from);
  const isLevel = Math.abs(by.x) >= Math.abs(by.y);
  const target: Point = isLevel ? { x: to.x, y: from.y } : { x: from.x, y: to.y };
  return distance(target, to) === 0 ? [] : [{ kind: 'moveVertex', edgeId: placed.next.id, to: target }];
}

/**
 * Gives an arc a radius; its ends stay and so does the side it bulges to.
 * @returns none when the radius cannot span the ends (less than half their distance)
 */
export function arcRadiusCommands(layout: Layout, edgeId: string, radiusMm: number): readonly PartCommand[] {
  const placed = findEdge(layout, edgeId);
  if (placed === null || placed.segment.kind !== 'arc') return [];
  const half = distance(placed.segment.from, placed.segment.to) / 2;
  if (radiusMm < half) return [];
  const { bulge } = placed.edge;
  const quarterSweep = Math.asin(half / radiusMm) / 2;
  // More than a half circle takes the long way round.
  const size = Math.abs(bulge) > 1 ? 1 / Math.tan(quarterSweep) : Math.tan(quarterSweep);
  return [{ kind: 'setEdgeBulge', edgeId, bulge: Math.sign(bulge) * size }];
}

/** Puts a corner, hole or slot at typed coordinates. */
export function placeCommands(layout: Layout, ref: EntityRef, to: Point): readonly PartCommand[] {
  return moveHandleTo(layout, ref, to);
}
