import type { Layout } from '@foldwright/shared/bending/layout';
import { line, pointAt } from '@foldwright/shared/geometry/segment';
import type { EntityRef } from '../geometry/entity';
import { edgesOfLayout, featureCentre, findEdge } from '../geometry/layout-edges';
import { type SnapCandidates, type SnapPoint, type SnapRay, squareRays } from './snap';

/**
 * Everything of a layout that a point can be drawn to.
 * @param moving what is being dragged: it must not snap to itself
 */
export function snapCandidates(layout: Layout, moving: EntityRef | null): SnapCandidates {
  const points: SnapPoint[] = [];
  const touching = touchingEdges(layout, moving);
  const edges = edgesOfLayout(layout);
  for (const { edge, segment } of edges) {
    const isMoving = moving?.kind === 'vertex' && moving.id === edge.id;
    if (!isMoving) points.push({ kind: 'endpoint', point: edge.start });
    if (!touching.includes(edge.id)) points.push({ kind: 'midpoint', point: pointAt(segment, 0.5) });
  }
  for (const feature of layout.features) {
    if (feature.id !== moving?.id) points.push({ kind: 'centre', point: featureCentre(feature) });
  }
  for (const bend of layout.bends) {
    if (bend.id === moving?.id) continue;
    points.push({ kind: 'endpoint', point: bend.line.from }, { kind: 'endpoint', point: bend.line.to });
  }
  const segments = edges.filter(({ edge }) => !touching.includes(edge.id)).map(({ segment }) => segment);
  const bendLines = layout.bends
    .filter(({ id }) => id !== moving?.id)
    .map((bend) => line(bend.line.from, bend.line.to));
  return { points, edges: [...segments, ...bendLines], rays: vertexRays(layout, moving) };
}

function touchingEdges(layout: Layout, moving: EntityRef | null): readonly string[] {
  if (moving?.kind === 'edge') return [moving.id];
  if (moving?.kind !== 'vertex') return [];
  const placed = findEdge(layout, moving.id);
  return placed === null ? [] : [placed.edge.id, placed.previous.id];
}

/** A dragged vertex may square its two edges to the ones beyond its neighbours. */
function vertexRays(layout: Layout, moving: EntityRef | null): readonly SnapRay[] {
  if (moving?.kind !== 'vertex') return [];
  const placed = findEdge(layout, moving.id);
  if (placed === null) return [];
  const before = findEdge(layout, placed.previous.id);
  const after = findEdge(layout, placed.next.id);
  if (before === null || after === null) return [];
  return [...squareRays(before.edge.start, before.previous.start), ...squareRays(after.edge.start, after.next.start)];
}
