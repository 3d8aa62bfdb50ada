import type { FlatPattern } from '../bending/development';
import type { ArcSegment, Loop } from '../geometry/path';
import type { Point } from '../geometry/point';

/**
 * Layers of a cut file, named by what the cutter does with them. Only OUTLINE and OPENING are cut; SCRIBE is marked;
 * the two FOLD layers show where the brake bends, seen with face A up.
 */
export const CUT_LAYERS = ['OUTLINE', 'OPENING', 'FOLD-TOWARD', 'FOLD-AWAY', 'SCRIBE'] as const;
export type CutLayer = (typeof CUT_LAYERS)[number];

/** A corner of a closed contour; `bulge` = tan(sweep/4) of the piece that starts here, positive counter-clockwise. */
export interface ContourCorner {
  readonly at: Point;
  readonly bulge: number;
}

export type CutEntity =
  | { readonly kind: 'contour'; readonly layer: CutLayer; readonly corners: readonly ContourCorner[] }
  | { readonly kind: 'circle'; readonly layer: CutLayer; readonly centre: Point; readonly diameterMm: number }
  | { readonly kind: 'line'; readonly layer: CutLayer; readonly from: Point; readonly to: Point };

/** tan(sweep/4) of an arc, signed: positive when it runs counter-clockwise. Not for full circles. */
function arcBulge(arc: ArcSegment): number {
  const start = Math.atan2(arc.from.y - arc.centre.y, arc.from.x - arc.centre.x);
  const end = Math.atan2(arc.to.y - arc.centre.y, arc.to.x - arc.centre.x);
  const turn = arc.clockwise ? start - end : end - start;
  const sweep = ((turn % (2 * Math.PI)) + 2 * Math.PI) % (2 * Math.PI);
  const bulge = Math.tan(sweep / 4);
  return arc.clockwise ? -bulge : bulge;
}

const isFullCircle = (arc: ArcSegment): boolean => arc.from.x === arc.to.x && arc.from.y === arc.to.y;

function loopEntity(loop: Loop, layer: CutLayer): CutEntity {
  const only = loop.length === 1 ? loop[0] : undefined;
  if (only?.kind === 'arc' && isFullCircle(only)) {
    const radius = Math.hypot(only.from.x - only.centre.x, only.from.y - only.centre.y);
    return { kind: 'circle', layer, centre: only.centre, diameterMm: 2 * radius };
  }
  return {
    kind: 'contour',
    layer,
    corners: loop.map((segment) => ({ at: segment.from, bulge: segment.kind === 'arc' ? arcBulge(segment) : 0 })),
  };
}

/** Closed contour of an obround whose end radii sit at `from` and `to`. */
function slotEntity(from: Point, to: Point, widthMm: number): CutEntity {
  const length = Math.hypot(to.x - from.x, to.y - from.y);
  if (length === 0) return { kind: 'circle', layer: 'OPENING', centre: from, diameterMm: widthMm };
  const side = { x: (-(to.y - from.y) / length) * (widthMm / 2), y: ((to.x - from.x) / length) * (widthMm / 2) };
  const corner = (at: Point, sign: 1 | -1, bulge: number): ContourCorner => ({
    at: { x: at.x + sign * side.x, y: at.y + sign * side.y },
    bulge,
  });
  return {
    kind: 'contour',
    layer: 'OPENING',
    corners: [corner(from, -1, 0), corner(to, -1, 1), corner(to, 1, 0), corner(from, 1, 1)],
  };
}

/**
 * What a cut file of a flat pattern contains, in mm, face A up. Arcs stay arcs; holes stay circles.
 * Contours come first, then openings, then fold lines, in document order, so that the same part gives the same file.
 */
export function planCutFile(flat: FlatPattern): readonly CutEntity[] {
  return [
    loopEntity(flat.outer, 'OUTLINE'),
    ...flat.cutouts.map((loop) => loopEntity(loop, 'OPENING')),
    ...flat.holes.map((hole): CutEntity => ({
      kind: 'circle',
      layer: 'OPENING',
      centre: hole.centre,
      diameterMm: hole.diameterMm,
    })),
    ...flat.slots.map((slot) => slotEntity(slot.from, slot.to, slot.widthMm)),
    ...flat.bends.flatMap((bend) =>
      bend.centreLines.map((line): CutEntity => ({
        kind: 'line',
        layer: bend.direction === 'towards' ? 'FOLD-TOWARD' : 'FOLD-AWAY',
        from: line.from,
        to: line.to,
      })),
    ),
  ];
}
