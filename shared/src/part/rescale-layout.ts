import type { Feature, Layout, OutlineEdge, OutlineLoop } from '../bending/layout';
import type { Point } from '../geometry/point';
import { edgeAt } from './outline-edge-sizes';

/**
 * Stretches a layout by one factor per axis about the origin: a calliper size overruling the photo's scale.
 * Positions scale; holes and slots keep their sizes, since those come from tables or were measured; an arc stays an arc,
 * its height over the chord scaled (exact for equal factors, and within the square of their difference otherwise).
 */
export function rescaleLayout(layout: Layout, factor: Point): Layout {
  if (factor.x === 1 && factor.y === 1) return layout;
  const stretch = (point: Point): Point => ({ x: point.x * factor.x, y: point.y * factor.y });
  return {
    ...layout,
    outer: stretchLoop(layout.outer, stretch),
    cutouts: layout.cutouts.map((loop) => stretchLoop(loop, stretch)),
    features: layout.features.map((feature): Feature =>
      feature.kind === 'hole'
        ? { ...feature, centre: stretch(feature.centre) }
        : { ...feature, from: stretch(feature.from), to: stretch(feature.to) },
    ),
    bends: layout.bends.map((bend) => ({
      ...bend,
      line: { from: stretch(bend.line.from), to: stretch(bend.line.to) },
    })),
    baseAnchor: stretch(layout.baseAnchor),
  };
}

function stretchLoop(loop: OutlineLoop, stretch: (point: Point) => Point): OutlineLoop {
  return {
    ...loop,
    edges: loop.edges.map((edge, index): OutlineEdge => {
      const start = stretch(edge.start);
      if (edge.bulge === 0) return { ...edge, start };
      const end = edgeAt(loop.edges, index + 1).start;
      const chord = { x: end.x - edge.start.x, y: end.y - edge.start.y };
      // Height of the arc over its chord as a vector to the right, bulge * chord / 2, and what is left of it upright.
      const height = stretch({ x: (chord.y * edge.bulge) / 2, y: (-chord.x * edge.bulge) / 2 });
      const stretched = stretch(chord);
      const lengthSquared = stretched.x * stretched.x + stretched.y * stretched.y;
      if (lengthSquared === 0) return { ...edge, start };
      const bulge = (2 * (height.x * stretched.y - height.y * stretched.x)) / lengthSquared;
      return { ...edge, start, bulge };
    }),
  };
}
