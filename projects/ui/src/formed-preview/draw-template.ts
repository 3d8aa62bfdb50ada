import type { Layout, OutlineLoop } from '@foldwright/shared/bending/layout';
import { flattenLoop } from '@foldwright/shared/geometry/flatten';
import { circleLoop, clockwise, counterClockwise, loopFromBulges, slotLoop } from '@foldwright/shared/geometry/loop';
import type { Loop } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import { project, throwOnGround } from '@foldwright/shared/drawing/axonometry';
import { extent, polygonPath, rounded } from './draw-solid';
import type { PartDrawing } from './part-drawing';

/** Finer than a pixel at any scale of a list. */
const CHORD_MM = 0.2;
const TOP_SHADE = 6;
const EDGE_SHADE = 2;

/** Draws a layout lying flat, as a sheet of its thickness with its creases dashed: what a template looks like on the bench. */
export function drawTemplate(layout: Layout, thicknessMm: number): PartDrawing {
  const outer = points(counterClockwise(loopOf(layout.outer)));
  const openings = [
    ...layout.cutouts.map((cutout) => loopOf(cutout)),
    ...layout.features.flatMap((feature) => {
      if (feature.kind === 'slot') return [slotLoop(feature.from, feature.to, feature.widthMm)];
      const diameterMm = findHoleDiameterMm(feature.purpose);
      return diameterMm === null ? [] : [circleLoop(feature.centre, diameterMm / 2)];
    }),
  ].map((loop) => points(clockwise(loop)));
  const loops = [outer, ...openings];
  const outline = (heightMm: number): string =>
    loops.map((loop) => polygonPath(loop.map((point) => project({ ...point, z: heightMm })))).join('');
  const creases = layout.bends
    .map(({ line }) => [line.from, line.to].map((end) => project({ ...end, z: thicknessMm })))
    .map(([from, to]) => (from && to ? `M${rounded(from.x)} ${rounded(from.y)}L${rounded(to.x)} ${rounded(to.y)}` : ''))
    .join('');
  // The edge is what shows below the top face: the sheet drawn at a few heights, the lowest first.
  const layers = [0, 0.25, 0.5, 0.75].map((share) => outline(thicknessMm * share));
  return {
    pieces: [
      ...layers.map((d) => ({ kind: 'faces', shade: EDGE_SHADE, d }) as const),
      { kind: 'faces', shade: TOP_SHADE, d: outline(thicknessMm) },
      { kind: 'creases', d: creases },
    ],
    shadow: polygonPath(outer.map((point) => project(throwOnGround({ ...point, z: thicknessMm }, -thicknessMm / 2)))),
    ...extent(outer.flatMap((point) => [project({ ...point, z: 0 }), project({ ...point, z: thicknessMm })])),
  };
}

function loopOf(outline: OutlineLoop): Loop {
  return loopFromBulges(outline.edges);
}

function points(loop: Loop): readonly Point[] {
  return flattenLoop(loop, CHORD_MM);
}
