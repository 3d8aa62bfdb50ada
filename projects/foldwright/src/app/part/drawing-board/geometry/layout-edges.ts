import type { BendDeclaration, Feature, Layout, OutlineEdge, OutlineLoop } from '@foldwright/shared/bending/layout';
import type { Segment } from '@foldwright/shared/geometry/path';
import type { Bounds, Point } from '@foldwright/shared/geometry/point';
import { segmentBounds, segmentFromBulge } from '@foldwright/shared/geometry/segment';
import { boundsOfPoints } from '@foldwright/shared/geometry/vector';

/** An edge together with its neighbours and the line or arc it draws, mm. */
export interface PlacedEdge {
  readonly loop: OutlineLoop;
  readonly index: number;
  readonly edge: OutlineEdge;
  readonly previous: OutlineEdge;
  readonly next: OutlineEdge;
  readonly segment: Segment;
}

/** The edges of one loop in order, each closed by the start of the next. */
export function edgesOfLoop(loop: OutlineLoop): readonly PlacedEdge[] {
  const count = loop.edges.length;
  return loop.edges.flatMap((edge, index) => {
    const previous = loop.edges[(index + count - 1) % count];
    const next = loop.edges[(index + 1) % count];
    if (previous === undefined || next === undefined) return [];
    return [{ loop, index, edge, previous, next, segment: segmentFromBulge(edge.start, next.start, edge.bulge) }];
  });
}

/** Every edge of the outline and of the openings, outline first. */
export function edgesOfLayout(layout: Layout): readonly PlacedEdge[] {
  return [layout.outer, ...layout.cutouts].flatMap(edgesOfLoop);
}

/** The edge of that id, or null. */
export function findEdge(layout: Layout, edgeId: string): PlacedEdge | null {
  for (const loop of [layout.outer, ...layout.cutouts]) {
    if (loop.edges.some((edge) => edge.id === edgeId)) {
      return edgesOfLoop(loop).find((placed) => placed.edge.id === edgeId) ?? null;
    }
  }
  return null;
}

/** The hole or slot of that id, or null. */
export function findFeature(layout: Layout, featureId: string): Feature | null {
  return layout.features.find((feature) => feature.id === featureId) ?? null;
}

/** The bend of that id, or null. */
export function findBend(layout: Layout, bendId: string): BendDeclaration | null {
  return layout.bends.find((bend) => bend.id === bendId) ?? null;
}

/** Bounds of the outline, arcs included, mm; null for an outline without edges. */
export function layoutBounds(layout: Layout): Bounds | null {
  const bounds = edgesOfLoop(layout.outer).map((placed) => segmentBounds(placed.segment));
  return boundsOfPoints(bounds.flatMap(({ min, max }) => [min, max]));
}

/** Middle of a hole or slot. */
export function featureCentre(feature: Feature): Point {
  if (feature.kind === 'hole') return feature.centre;
  return { x: (feature.from.x + feature.to.x) / 2, y: (feature.from.y + feature.to.y) / 2 };
}
