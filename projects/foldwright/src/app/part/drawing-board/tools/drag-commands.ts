import type { Layout } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { tangentAt } from '@foldwright/shared/geometry/segment';
import { add, along, distance, dot, subtract, turnLeft, turnRight, unit } from '@foldwright/shared/geometry/vector';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { creaseAcross } from '../geometry/crease';
import type { EntityRef } from '../geometry/entity';
import { featureCentre, findBend, findEdge, findFeature } from '../geometry/layout-edges';

/**
 * The place a thing is dragged by: a corner, a centre, the middle of an edge or of a bend.
 * @returns null when the layout has no such thing
 */
export function handleOf(layout: Layout, target: EntityRef): Point | null {
  switch (target.kind) {
    case 'vertex':
      return findEdge(layout, target.id)?.edge.start ?? null;
    case 'edge': {
      const placed = findEdge(layout, target.id);
      if (placed === null) return null;
      const { from, to } = placed.segment;
      return { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
    }
    case 'hole':
    case 'slot': {
      const feature = findFeature(layout, target.id);
      return feature === null ? null : featureCentre(feature);
    }
    case 'bend': {
      const bend = findBend(layout, target.id);
      return bend === null ? null : middleOf(bend.line);
    }
  }
}

/**
 * Commands that bring a thing's handle to a place. Edges and bends only move square to themselves.
 * @returns none when it is there already, or when it cannot go there
 */
export function moveHandleTo(layout: Layout, target: EntityRef, to: Point): readonly PartCommand[] {
  const handle = handleOf(layout, target);
  if (handle === null) return [];
  const by = subtract(to, handle);
  if (Math.hypot(by.x, by.y) < 1e-9) return [];
  switch (target.kind) {
    case 'vertex':
      return [{ kind: 'moveVertex', edgeId: target.id, to }];
    case 'hole':
    case 'slot':
      return [{ kind: 'moveFeature', featureId: target.id, by }];
    case 'edge':
      return slideCommands(layout, target.id, by);
    case 'bend':
      return moveBendCommands(layout, target.id, by);
  }
}

/** Moves a thing by a vector, as the arrow keys do. */
export function nudgeCommands(layout: Layout, target: EntityRef, by: Point): readonly PartCommand[] {
  const handle = handleOf(layout, target);
  return handle === null ? [] : moveHandleTo(layout, target, add(handle, by));
}

function slideCommands(layout: Layout, edgeId: string, by: Point): readonly PartCommand[] {
  const placed = findEdge(layout, edgeId);
  if (placed === null || placed.segment.kind !== 'line') return [];
  if (distance(placed.segment.from, placed.segment.to) === 0) return [];
  // The metal is on the left of the outline and, because openings run the other way, on the left of them too.
  const outward = turnRight(tangentAt(placed.segment, 0.5));
  const byMm = roundMm(dot(by, outward));
  return byMm === 0 ? [] : [{ kind: 'slideEdge', edgeId, byMm }];
}

/** A bend slides parallel to itself and is cut to the sheet anew, so that it still runs from edge to edge. */
function moveBendCommands(layout: Layout, bendId: string, by: Point): readonly PartCommand[] {
  const bend = findBend(layout, bendId);
  if (bend === null || distance(bend.line.from, bend.line.to) === 0) return [];
  const direction = unit(subtract(bend.line.to, bend.line.from));
  const normal = turnLeft(direction);
  const byMm = roundMm(dot(by, normal));
  if (byMm === 0) return [];
  const crease = creaseAcross(layout, along(middleOf(bend.line), normal, byMm), direction);
  return crease === null ? [] : [{ kind: 'changeBend', bendId, bend: { ...bend, line: crease } }];
}

function middleOf(ends: { readonly from: Point; readonly to: Point }): Point {
  return { x: (ends.from.x + ends.to.x) / 2, y: (ends.from.y + ends.to.y) / 2 };
}

// A micron is finer than anything that is drawn or cut; it keeps binary dust out of the document.
function roundMm(value: number): number {
  const rounded = Math.round(value * 1000) / 1000;
  return rounded === 0 ? 0 : rounded;
}
