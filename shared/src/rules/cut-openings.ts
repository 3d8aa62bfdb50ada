import type { Layout } from '../bending/layout';
import type { Loop } from '../geometry/path';
import { circleLoop, loopFromBulges, pointInLoop, slotLoop } from '../geometry/loop';
import type { Point } from '../geometry/point';
import { findHoleDiameterMm } from '../stock/hole-diameter';
import { copyIds } from './copies';
import { placeOfLayout, type RuleContext } from './rule-context';

/** An opening as the laser cuts it. */
export interface CutOpening {
  readonly id: string;
  readonly kind: 'hole' | 'slot' | 'cutout';
  readonly loop: Loop;
  readonly centre: Point;
}

/** The sheet as it is cut: in the flat pattern, or in the layout when there is none. */
export interface CutSheet {
  readonly frame: 'flat' | 'layout';
  readonly outer: Loop;
  readonly openings: readonly CutOpening[];
}

/** Outline and openings in the flat pattern; in the layout when the part cannot be developed. */
export function cutSheet(context: RuleContext): CutSheet {
  const { document, development } = context;
  if (development === null) return drawnSheet(document.layout);
  const { flat } = development;
  return {
    frame: 'flat',
    outer: flat.outer,
    openings: [
      ...flat.holes.map(({ featureId, centre, diameterMm }) => holeOpening(featureId, centre, diameterMm)),
      ...flat.slots.map(({ featureId, from, to, widthMm }) => slotOpening(featureId, from, to, widthMm)),
      ...flat.cutouts.map((loop, index) => cutoutOpening(cutoutId(context, loop) ?? `cutout-${index}`, loop)),
    ],
  };
}

/** Outline and openings as drawn. What was drawn twice counts once. */
export function drawnSheet(layout: Layout): CutSheet {
  const copies = copyIds(layout);
  const features = layout.features.flatMap((feature): readonly CutOpening[] => {
    if (feature.kind === 'slot') return [slotOpening(feature.id, feature.from, feature.to, feature.widthMm)];
    const diameterMm = findHoleDiameterMm(feature.purpose);
    return diameterMm === null ? [] : [holeOpening(feature.id, feature.centre, diameterMm)];
  });
  const cutouts = layout.cutouts.map(({ id, edges }) => cutoutOpening(id, loopFromBulges(edges)));
  const openings = [...features, ...cutouts].filter(({ id }) => !copies.has(id));
  return { frame: 'layout', outer: loopFromBulges(layout.outer.edges), openings };
}

/** Whether one opening starts inside another; for openings that do not cross it then lies inside whole. */
export function isInsideOf(inner: CutOpening, outer: CutOpening): boolean {
  const point = inner.loop[0]?.from;
  return point !== undefined && pointInLoop(point, outer.loop, 0) === 'inside';
}

/** Layout cut-out that a loop of the flat pattern came from: one of its corners lies on the loop. */
function cutoutId(context: RuleContext, loop: Loop): string | null {
  const origin = context.document.layout.cutouts.find(({ edges }) =>
    edges.some(({ start }) => pointInLoop(placeOfLayout(context, start).flat, loop, MATCH_MM) === 'on'),
  );
  return origin?.id ?? null;
}

/** Corners that were carried into the flat pattern agree to rounding; cut-outs are further apart than this. */
const MATCH_MM = 0.001;

function holeOpening(id: string, centre: Point, diameterMm: number): CutOpening {
  return { id, kind: 'hole', loop: circleLoop(centre, diameterMm / 2), centre };
}

function slotOpening(id: string, from: Point, to: Point, widthMm: number): CutOpening {
  const centre = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
  return { id, kind: 'slot', loop: slotLoop(from, to, widthMm), centre };
}

function cutoutOpening(id: string, loop: Loop): CutOpening {
  return { id, kind: 'cutout', loop, centre: loop[0]?.from ?? { x: 0, y: 0 } };
}
