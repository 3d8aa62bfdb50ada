import { joinPieces } from '../geometry/chain';
import { clipRegion } from '../geometry/clip';
import type { HalfPlane } from '../geometry/clip';
import { intersectSegments } from '../geometry/intersect';
import { loopBounds, loopReach, pointInLoop, reverseLoop, signedArea } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import { line } from '../geometry/segment';
import { COINCIDENT_MM, TINY_AREA_MM2 } from '../geometry/tolerance';
import { along, boundsMeet, dot, subtract } from '../geometry/vector';
import type { BendZone, Panel } from './development';

/** A connected piece of the flat pattern: its boundary counter-clockwise, its openings clockwise; lines and arcs, exact. */
export interface FlatRegion {
  readonly outer: Loop;
  readonly openings: readonly Loop[];
}

/** A panel without its openings, those that reach into its bend zones cut off at the tangent lines. */
export function panelRegions(
  panel: Panel,
  zones: readonly BendZone[],
  openings: readonly Loop[],
): readonly FlatRegion[] {
  const own = zones.filter(({ parentIndex, childIndex }) => parentIndex === panel.index || childIndex === panel.index);
  const cut = openings.flatMap((opening) => {
    if (!mayMeet(opening, panel.outer)) return [];
    const crossed = own.filter((zone) => crossesTangent(opening, zone, panel.index));
    if (crossed.length === 0) return isWithin(opening, panel.outer) ? [opening] : [];
    return crossed.reduce<readonly Loop[]>(
      (loops, zone) => loops.flatMap((loop) => clipOpening(loop, panelSide(zone, panel.index))),
      [opening],
    );
  });
  return regionsWithout(panel.outer, cut);
}

/**
 * A stretch of a bend zone without its openings.
 * @param fromMm, toMm distances from the parent's tangent line between which the stretch lies; 0 and the allowance for the whole zone
 */
export function zoneRegions(
  zone: BendZone,
  openings: readonly Loop[],
  fromMm: number,
  toMm: number,
): readonly FlatRegion[] {
  const from = { origin: along(zone.origin, zone.towardsChild, fromMm), inward: zone.towardsChild };
  const to = {
    origin: along(zone.origin, zone.towardsChild, toMm),
    inward: { x: -zone.towardsChild.x, y: -zone.towardsChild.y },
  };
  const outers = clipRegion(clipRegion([zone.outer], from, COINCIDENT_MM), to, COINCIDENT_MM);
  return outers.flatMap((outer) => {
    const cut = openings.flatMap((opening) => clipOpening(opening, from).flatMap((loop) => clipOpening(loop, to)));
    return regionsWithout(
      outer,
      cut.filter((loop) => mayMeet(loop, outer)),
    );
  });
}

/** Openings run clockwise; clipping wants counter-clockwise. */
function clipOpening(opening: Loop, half: HalfPlane): readonly Loop[] {
  return clipRegion([reverseLoop(opening)], half, COINCIDENT_MM).map(reverseLoop);
}

/** Takes openings out of a boundary. Those that reach its edge do so along a straight stretch, which vanishes. */
function regionsWithout(outer: Loop, openings: readonly Loop[]): readonly FlatRegion[] {
  const loops = openings.length === 0 ? [outer] : joinPieces([outer, ...openings], 2 * COINCIDENT_MM);
  if (loops === null) return [{ outer, openings: [] }];
  const outers = loops.filter((loop) => signedArea(loop) > TINY_AREA_MM2);
  const inner = loops.filter((loop) => signedArea(loop) < -TINY_AREA_MM2);
  return outers.map((boundary) => ({ outer: boundary, openings: inner.filter((loop) => isWithin(loop, boundary)) }));
}

function isWithin(loop: Loop, outer: Loop): boolean {
  const corner = loop[0]?.from;
  return corner !== undefined && pointInLoop(corner, outer, COINCIDENT_MM) !== 'outside';
}

/** Whether the boxes of two loops meet. */
export function mayMeet(a: Loop, b: Loop): boolean {
  const first = loopBounds(a);
  const second = loopBounds(b);
  return first !== null && second !== null && boundsMeet(first, second, COINCIDENT_MM);
}

function panelSide(zone: BendZone, panelIndex: number): HalfPlane {
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
