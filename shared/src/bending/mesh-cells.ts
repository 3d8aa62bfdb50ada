import { flattenLoop } from '../geometry/flatten';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { dot, subtract } from '../geometry/vector';
import type { BendZone, Development } from './development';
import { mayMeet, panelRegions, zoneRegions } from './flat-regions';
import type { FlatRegion } from './flat-regions';

/** A piece of the flat pattern that is folded as one: a panel, or a strip of a bend zone. Corners counter-clockwise, openings clockwise. */
export interface MeshCell {
  /** Index of the panel, or of the zone. */
  readonly of: { readonly kind: 'panel' | 'zone'; readonly index: number };
  readonly outer: readonly Point[];
  readonly openings: readonly (readonly Point[])[];
}

/**
 * Cuts a development into the cells its mesh is made of. Cells meet corner to corner along tangent lines and strip lines, so that
 * the mesh closes. Arcs in the plane and bends are within `chordErrorMm`.
 */
export function cutMeshCells(development: Development, chordErrorMm: number): readonly MeshCell[] {
  const { panels, zones } = development;
  const openings = panels.flatMap((panel) => panel.openings);
  const zoneCells = zones.flatMap((zone, index) => zoneCellsOf(zone, index, development, openings, chordErrorMm));
  const panelCells = panels.flatMap((panel) =>
    panelRegions(panel, zones, openings).map(cellOf({ kind: 'panel', index: panel.index }, chordErrorMm)),
  );
  const ofZones = zones.map((zone, index) =>
    onTangents(
      zone,
      zoneCells.filter(({ of }) => of.index === index),
    ),
  );
  const ofPanels = zones.map((zone) => onTangents(zone, panelCells));
  return [
    ...panelCells.map((cell) => withCorners(cell, zones, ofZones)),
    ...zoneCells.map((cell) => withCorners(cell, pick(zones, cell.of.index), pick(ofPanels, cell.of.index))),
  ];
}

function pick<T>(items: readonly T[], index: number): readonly T[] {
  return items.slice(index, index + 1);
}

/** Corners of cells that lie on a zone's tangent lines. */
function onTangents(zone: BendZone, cells: readonly MeshCell[]): readonly Point[] {
  return cells.flatMap(({ outer }) =>
    outer.filter((point) => isOnLine(point, zone, 0) || isOnLine(point, zone, zone.bendAllowanceMm)),
  );
}

/** How many flat strips stand for a bend so that its outer face is within the chord error. */
export function stripCount(zone: BendZone, thicknessMm: number, chordErrorMm: number): number {
  const radius = zone.insideRadiusMm + thicknessMm;
  const stepRad = chordErrorMm >= radius ? Math.PI / 2 : 2 * Math.acos(1 - chordErrorMm / radius);
  return Math.max(2, Math.ceil((zone.bendAngleDeg * Math.PI) / 180 / stepRad));
}

function zoneCellsOf(
  zone: BendZone,
  index: number,
  development: Development,
  openings: readonly Loop[],
  chordErrorMm: number,
): readonly MeshCell[] {
  const count = stripCount(zone, development.stock.thicknessMm, chordErrorMm);
  const near = openings.filter((opening) => mayMeet(opening, zone.outer));
  return Array.from({ length: count }, (_, strip) => strip).flatMap((strip) =>
    zoneRegions(zone, near, (zone.bendAllowanceMm * strip) / count, (zone.bendAllowanceMm * (strip + 1)) / count).map(
      cellOf({ kind: 'zone', index }, chordErrorMm),
    ),
  );
}

function cellOf(of: MeshCell['of'], chordErrorMm: number): (region: FlatRegion) => MeshCell {
  return ({ outer, openings }) => ({
    of,
    outer: flattenLoop(outer, chordErrorMm),
    openings: openings.map((loop) => flattenLoop(loop, chordErrorMm)),
  });
}

/** Adds the corners of neighbouring cells that lie on this cell's edges along tangent lines. `corners` are given for each zone. */
function withCorners(cell: MeshCell, zones: readonly BendZone[], corners: readonly (readonly Point[])[]): MeshCell {
  const outer = cell.outer.flatMap((from, index) => {
    const to = cell.outer[(index + 1) % cell.outer.length] ?? from;
    const beside = zones.flatMap((zone, at) =>
      [0, zone.bendAllowanceMm].some((level) => isOnLine(from, zone, level) && isOnLine(to, zone, level))
        ? (corners[at] ?? [])
        : [],
    );
    if (beside.length === 0) return [from];
    const length = Math.hypot(to.x - from.x, to.y - from.y);
    const direction = { x: (to.x - from.x) / length, y: (to.y - from.y) / length };
    const between = beside
      .map((point) => ({
        point,
        at: dot(subtract(point, from), direction),
        off: Math.abs(dot(subtract(point, from), { x: -direction.y, y: direction.x })),
      }))
      .filter(({ at, off }) => off <= 2 * COINCIDENT_MM && at > 4 * COINCIDENT_MM && at < length - 4 * COINCIDENT_MM)
      .sort((a, b) => a.at - b.at)
      .filter(({ at }, place, all) => place === 0 || at - (all[place - 1]?.at ?? 0) > 4 * COINCIDENT_MM);
    return [from, ...between.map(({ point }) => point)];
  });
  return { ...cell, outer };
}

/** Whether a point lies on the line across a zone at a distance from its parent's tangent line. */
export function isOnLine(point: Point, zone: BendZone, levelMm: number): boolean {
  return Math.abs(dot(subtract(point, zone.origin), zone.towardsChild) - levelMm) <= 2 * COINCIDENT_MM;
}
