import type { BendZone, Development, Panel } from '../bending/development';
import type { OutlineLoop } from '../bending/layout';
import type { Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { nearestOnSegment, pointAt } from '../geometry/segment';
import { invert, movePoint } from '../geometry/transform';
import { along, dot, scale, subtract } from '../geometry/vector';
import { chainSegments } from '../part/outline-edge-sizes';
import { wholeBends } from './zone-reach';

/** One side of a bend: the panel there, and its boundary as seen from the tangent line. Flat-pattern coordinates. */
export interface BendFront {
  readonly bendId: string;
  readonly side: 'child' | 'parent';
  readonly panel: Panel;
  readonly zone: BendZone;
  /** Unit vector away from the bend, into the panel. */
  readonly outward: Point;
  /** Unit vector along the bend. */
  readonly along: Point;
  /** Stretches of the bend along itself; openings part them. */
  readonly stretches: readonly { readonly low: number; readonly high: number }[];
  /** Boundary of the panel from one end of the bend to the next, in the panel's running direction. */
  readonly runs: readonly Loop[];
  /** How far a point lies from the tangent line into the panel, mm. */
  readonly heightOf: (point: Point) => number;
}

/** Both sides of every bend. A bend that opens several tabs has a pair for each. */
export function bendFronts(development: Development): readonly BendFront[] {
  return wholeBends(development).flatMap(({ zone }) =>
    (['child', 'parent'] as const).flatMap((side) => frontOf(development, zone, side) ?? []),
  );
}

function frontOf(development: Development, zone: BendZone, side: 'child' | 'parent'): BendFront | null {
  const panel = development.panels[side === 'child' ? zone.childIndex : zone.parentIndex];
  if (panel === undefined) return null;
  const outward = side === 'child' ? zone.towardsChild : scale(zone.towardsChild, -1);
  const origin = side === 'child' ? along(zone.origin, zone.towardsChild, zone.bendAllowanceMm) : zone.origin;
  const heightOf = (point: Point): number => dot(subtract(point, origin), outward);
  const isTangent = (segment: Segment): boolean =>
    segment.kind === 'line' &&
    Math.abs(heightOf(segment.from)) <= ON_LINE_MM &&
    Math.abs(heightOf(segment.to)) <= ON_LINE_MM;
  const first = panel.outer.findIndex(isTangent);
  if (first < 0) return null;
  const runs: Segment[][] = [];
  const stretches: { readonly low: number; readonly high: number }[] = [];
  for (const segment of [...panel.outer.slice(first), ...panel.outer.slice(0, first)]) {
    if (isTangent(segment)) {
      const ends = [dot(segment.from, zone.along), dot(segment.to, zone.along)];
      stretches.push({ low: Math.min(...ends), high: Math.max(...ends) });
      runs.push([]);
    } else runs.at(-1)?.push(segment);
  }
  return { bendId: zone.bendId, side, panel, zone, outward, along: zone.along, stretches, runs, heightOf };
}

/** Points of a tangent line carry rounding from being moved into the flat pattern. */
const ON_LINE_MM = 1e-4;

/** Edge of these outlines that a piece of a panel's boundary came from; null for everything else. */
export function outlineEdgeOf(outlines: readonly OutlineLoop[], { panel }: BendFront, segment: Segment): string | null {
  const middle = movePoint(invert(panel.placement), pointAt(segment, 0.5));
  for (const outline of outlines) {
    const index = chainSegments(outline).findIndex(
      (edge) => nearestOnSegment(edge, middle).distanceMm <= BOUNDARY_MATCH_MM,
    );
    if (index >= 0) return outline.edges[index]?.id ?? null;
  }
  return null;
}

/** Boundaries were moved into the flat pattern unchanged; they come back to within rounding. */
export const BOUNDARY_MATCH_MM = 0.001;
