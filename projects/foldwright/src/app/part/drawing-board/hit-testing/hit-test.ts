import type { Feature, Layout } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { line, nearestOnSegment, segmentLength } from '@foldwright/shared/geometry/segment';
import { distance } from '@foldwright/shared/geometry/vector';
import { holeDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import type { EntityKind, EntityRef } from '../geometry/entity';
import { edgesOfLayout } from '../geometry/layout-edges';

/** How near a pointer must come, px: a finger covers what a mouse points at. */
export const HIT_TOLERANCE_PX = { mouse: 7, pen: 10, touch: 20 } as const;

/** What may be hit; all kinds unless named. */
export interface HitOptions {
  readonly kinds?: readonly EntityKind[];
}

interface Candidate {
  readonly ref: EntityRef;
  readonly rank: number;
  readonly distanceMm: number;
}

/**
 * What lies under a pointer. Small things win over the lines that run through them: vertices, then holes and slots, then
 * edges and bends; within a rank the nearest, then the first drawn.
 * @param toleranceMm how near counts, mm: pixels divided by the zoom
 * @returns null over bare sheet or bench
 */
export function hitTest(layout: Layout, at: Point, toleranceMm: number, options: HitOptions = {}): EntityRef | null {
  const isWanted = (kind: EntityKind): boolean => options.kinds?.includes(kind) ?? true;
  const found: Candidate[] = [];
  const offer = (kind: EntityKind, id: string, rank: number, distanceMm: number, reachMm: number): void => {
    if (isWanted(kind) && distanceMm <= reachMm) found.push({ ref: { kind, id }, rank, distanceMm });
  };
  for (const { edge, segment } of edgesOfLayout(layout)) {
    // A short edge keeps its middle for itself, or its vertices would hide it under a finger.
    const vertexReachMm = Math.min(toleranceMm, Math.max(segmentLength(segment) / 3, toleranceMm / 3));
    offer('vertex', edge.id, 0, distance(edge.start, at), vertexReachMm);
    offer('edge', edge.id, 2, nearestOnSegment(segment, at).distanceMm, toleranceMm);
  }
  for (const feature of layout.features) {
    offer(feature.kind, feature.id, 1, distanceToFeature(feature, at), toleranceMm / 2);
  }
  for (const bend of layout.bends) {
    offer('bend', bend.id, 2, nearestOnSegment(line(bend.line.from, bend.line.to), at).distanceMm, toleranceMm);
  }
  let best: Candidate | null = null;
  for (const candidate of found) {
    if (
      best === null ||
      candidate.rank < best.rank ||
      (candidate.rank === best.rank && candidate.distanceMm < best.distanceMm)
    ) {
      best = candidate;
    }
  }
  return best?.ref ?? null;
}

/** Distance to the rim from outside; 0 anywhere inside. */
function distanceToFeature(feature: Feature, at: Point): number {
  const fromAxis =
    feature.kind === 'hole'
      ? distance(feature.centre, at) - holeDiameterMm(feature.purpose) / 2
      : nearestOnSegment(line(feature.from, feature.to), at).distanceMm - feature.widthMm / 2;
  return Math.max(0, fromAxis);
}
