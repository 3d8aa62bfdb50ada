import { joinPieces } from '../geometry/chain';
import { clipRegion } from '../geometry/clip';
import { flattenLoop } from '../geometry/flatten';
import { intersectSegments } from '../geometry/intersect';
import { loopBounds, loopReach, pointInLoop, signedArea } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { line } from '../geometry/segment';
import { COINCIDENT_MM, TINY_AREA_MM2 } from '../geometry/tolerance';
import { along, boundsMeet, dot, subtract } from '../geometry/vector';
import type { BendZone, Development } from './development';

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
  const panelCells = panels.flatMap((panel): readonly MeshCell[] => {
    const own = zones.filter(
      ({ parentIndex, childIndex }) => parentIndex === panel.index || childIndex === panel.index,
    );
    const cut = openings.flatMap((opening) => {
      if (!mayMeet(opening, panel.outer)) return [];
      const crossed = own.filter((zone) => crossesTangent(opening, zone, panel.index));
      if (crossed.length === 0) return isWithin(opening, panel.outer) ? [opening] : [];
      return crossed.reduce<readonly Loop[]>(
        (loops, zone) => loops.flatMap((loop) => clipOpening(loop, panelSide(zone, panel.index))),
        [opening],
      );
    });
    return cellsFrom(panel.outer, cut, { kind: 'panel', index: panel.index }, chordErrorMm);
  });
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
  return Array.from({ length: count }, (_, strip) => strip).flatMap((strip) => {
    const from = {
      origin: along(zone.origin, zone.towardsChild, (zone.bendAllowanceMm * strip) / count),
      inward: zone.towardsChild,
    };
    const to = {
      origin: along(zone.origin, zone.towardsChild, (zone.bendAllowanceMm * (strip + 1)) / count),
      inward: { x: -zone.towardsChild.x, y: -zone.towardsChild.y },
    };
    const outers = clipRegion(clipRegion([zone.outer], from, COINCIDENT_MM), to, COINCIDENT_MM);
    return outers.flatMap((outer) => {
      const cut = near.flatMap((opening) => clipOpening(opening, from).flatMap((loop) => clipOpening(loop, to)));
      return cellsFrom(
        outer,
        cut.filter((loop) => mayMeet(loop, outer)),
        { kind: 'zone', index },
        chordErrorMm,
      );
    });
  });
}

/** Openings run clockwise; clipping wants counter-clockwise. */
function clipOpening(opening: Loop, half: { readonly origin: Point; readonly inward: Point }): readonly Loop[] {
  return clipRegion([turnedRound(opening)], half, COINCIDENT_MM).map(turnedRound);
}

function turnedRound(loop: Loop): Loop {
  return [...loop]
    .reverse()
    .map((segment) =>
      segment.kind === 'line'
        ? line(segment.to, segment.from)
        : { ...segment, from: segment.to, to: segment.from, clockwise: !segment.clockwise },
    );
}

/** Takes openings out of a boundary. Those that reach its edge do so along a straight stretch, which vanishes. */
function cellsFrom(
  outer: Loop,
  openings: readonly Loop[],
  of: MeshCell['of'],
  chordErrorMm: number,
): readonly MeshCell[] {
  const loops = openings.length === 0 ? [outer] : joinPieces([outer, ...openings], 2 * COINCIDENT_MM);
  if (loops === null) return [{ of, outer: flattenLoop(outer, chordErrorMm), openings: [] }];
  const outers = loops.filter((loop) => signedArea(loop) > TINY_AREA_MM2);
  const inner = loops.filter((loop) => signedArea(loop) < -TINY_AREA_MM2);
  return outers.map((boundary) => ({
    of,
    outer: flattenLoop(boundary, chordErrorMm),
    openings: inner.filter((loop) => isWithin(loop, boundary)).map((loop) => flattenLoop(loop, chordErrorMm)),
  }));
}

function isWithin(loop: Loop, outer: Loop): boolean {
  const corner = loop[0]?.from;
  return corner !== undefined && pointInLoop(corner, outer, COINCIDENT_MM) !== 'outside';
}

function mayMeet(a: Loop, b: Loop): boolean {
  const first = loopBounds(a);
  const second = loopBounds(b);
  return first !== null && second !== null && boundsMeet(first, second, COINCIDENT_MM);
}

function panelSide(zone: BendZone, panelIndex: number): { readonly origin: Point; readonly inward: Point } {
  if (panelIndex === zone.parentIndex)
    return { origin: zone.origin, inward: { x: -zone.towardsChild.x, y: -zone.towardsChild.y } };
  return { origin: along(zone.origin, zone.towardsChild, zone.bendAllowanceMm), inward: zone.towardsChild };
}

function crossesTangent(opening: Loop, zone: BendZone, panelIndex: number): boolean {
  const { origin, inward } = panelSide(zone, panelIndex);
  const reach = zone.outer.map(({ from }) => dot(subtract(from, zone.origin), zone.along));
  const tangent = line(along(origin, zone.along, Math.min(...reach)), along(origin, zone.along, Math.max(...reach)));
  const isBothSides = loopReach(opening, inward) - dot(origin, inward) > COINCIDENT_MM;
  return isBothSides && opening.some((segment) => intersectSegments(segment, tangent, COINCIDENT_MM).kind !== 'none');
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
