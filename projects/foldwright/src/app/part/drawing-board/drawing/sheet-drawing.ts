import type { BendRow, Development, FlatPattern } from '@foldwright/shared/bending/development';
import type { BendDirection, Feature, Layout } from '@foldwright/shared/bending/layout';
import type { Bounds, Point } from '@foldwright/shared/geometry/point';
import { loopBounds } from '@foldwright/shared/geometry/loop';
import { along, distance, subtract, turnLeft, unit } from '@foldwright/shared/geometry/vector';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import { edgesOfLoop, layoutBounds } from '../geometry/layout-edges';
import { circlePath, loopPath, obroundPath } from '../geometry/svg-path';

/** A hole or slot as it is scribed: its rim and, for round ones, the cross through its centre. */
export interface DrawnOpening {
  readonly id: string;
  readonly kind: 'hole' | 'slot';
  readonly rim: string;
  readonly cross: string;
  readonly centre: Point;
  readonly from: Point;
  readonly to: Point;
  readonly sizeMm: number;
}

/** A bend as it is scribed: its line, the tangent lines beside it and the lit zone between them. */
export interface DrawnBend {
  readonly id: string;
  readonly direction: BendDirection;
  readonly line: string;
  readonly tangents: string;
  readonly zone: string;
  readonly from: Point;
  readonly to: Point;
}

/** A sheet ready to be drawn: path data in layout or flat coordinates, mm, y up. */
export interface SheetDrawing {
  /** The outline and the free cut-outs, one path. */
  readonly rim: string;
  /** The same with every hole and slot taken out. */
  readonly metal: string;
  readonly openings: readonly DrawnOpening[];
  readonly bends: readonly DrawnBend[];
  readonly bounds: Bounds;
}

const EMPTY_BOUNDS: Bounds = { min: { x: 0, y: 0 }, max: { x: 100, y: 60 } };

/**
 * The layout as it lies on the board. Bend zones are drawn to the tangent lines when the part could be developed: half of
 * what the bend takes up plus half of what it saves lies on each side of the crease.
 */
export function drawingOfLayout(layout: Layout, development: Development | null): SheetDrawing {
  const rows = new Map(development?.bendTable.map((row) => [row.bendId, row]));
  const loops = [layout.outer, ...layout.cutouts].map((loop) =>
    loopPath(edgesOfLoop(loop).map(({ segment }) => segment)),
  );
  const rim = loops.join('');
  const openings = layout.features.map(drawnFeature);
  return {
    rim,
    metal: rim + openings.map((opening) => opening.rim).join(''),
    openings,
    bends: layout.bends.map((bend) => {
      const row = rows.get(bend.id);
      const halfMm = row === undefined ? 0 : setbackMm(row);
      return { id: bend.id, direction: bend.direction, ...bendStrip(bend.line.from, bend.line.to, halfMm) };
    }),
    bounds: layoutBounds(layout) ?? EMPTY_BOUNDS,
  };
}

/** The blank as the laser cuts it. */
export function drawingOfFlat(flat: FlatPattern): SheetDrawing {
  const rim = [flat.outer, ...flat.cutouts].map(loopPath).join('');
  const holes = flat.holes.map((hole) => drawnHole(hole.featureId, hole.centre, hole.diameterMm));
  const slots = flat.slots.map((slot) => drawnSlot(slot.featureId, slot.from, slot.to, slot.widthMm));
  const openings = [...holes, ...slots];
  return {
    rim,
    metal: rim + openings.map((opening) => opening.rim).join(''),
    openings,
    bends: flat.bends.flatMap((bend) =>
      bend.centreLines.map(({ from, to }) => ({
        id: bend.bendId,
        direction: bend.direction,
        ...bendStrip(from, to, bend.bendAllowanceMm / 2),
      })),
    ),
    bounds: loopBounds(flat.outer) ?? EMPTY_BOUNDS,
  };
}

function setbackMm(row: BendRow): number {
  return Math.max(0, (row.layoutDeductionMm + row.bendAllowanceMm) / 2);
}

function bendStrip(from: Point, to: Point, halfMm: number): Omit<DrawnBend, 'id' | 'direction'> {
  const line = `M${from.x} ${from.y}L${to.x} ${to.y}`;
  if (halfMm === 0 || distance(from, to) === 0) return { line, tangents: '', zone: '', from, to };
  const side = turnLeft(unit(subtract(to, from)));
  const at = (point: Point, offsetMm: number): string => {
    const moved = along(point, side, offsetMm);
    return `${moved.x} ${moved.y}`;
  };
  const tangents = [halfMm, -halfMm].map((offset) => `M${at(from, offset)}L${at(to, offset)}`).join('');
  const zone = `M${at(from, halfMm)}L${at(to, halfMm)}L${at(to, -halfMm)}L${at(from, -halfMm)}Z`;
  return { line, tangents, zone, from, to };
}

function drawnFeature(feature: Feature): DrawnOpening {
  if (feature.kind === 'hole') return drawnHole(feature.id, feature.centre, findHoleDiameterMm(feature.purpose) ?? 0);
  return drawnSlot(feature.id, feature.from, feature.to, feature.widthMm);
}

function drawnHole(id: string, centre: Point, diameterMm: number): DrawnOpening {
  // The cross reaches a little past the rim, as a scriber would leave it.
  const arm = diameterMm / 2 + Math.max(0.8, diameterMm * 0.14);
  const cross = `M${centre.x - arm} ${centre.y}h${2 * arm}M${centre.x} ${centre.y - arm}v${2 * arm}`;
  const rim = circlePath(centre, diameterMm);
  return {
    id,
    kind: 'hole',
    rim,
    cross: diameterMm > 30 ? '' : cross,
    centre,
    from: centre,
    to: centre,
    sizeMm: diameterMm,
  };
}

function drawnSlot(id: string, from: Point, to: Point, widthMm: number): DrawnOpening {
  const centre = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
  return { id, kind: 'slot', rim: obroundPath(from, to, widthMm), cross: '', centre, from, to, sizeMm: widthMm };
}
