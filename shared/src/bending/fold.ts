import type { Point, Point3 } from '../geometry/point';
import { dot, subtract } from '../geometry/vector';
import { along3 } from '../geometry/vector3';
import type { BendZone, Panel } from './development';

/**
 * Where a piece of the flat pattern is in space: a point of it at height `h` above face B comes to
 * `origin + ux * x + uy * y + uz * h`. The axes are unit vectors at right angles.
 */
export interface Pose {
  readonly origin: Point3;
  readonly ux: Point3;
  readonly uy: Point3;
  readonly uz: Point3;
}

/** A place of a piece in space and the direction that face A looks in there. */
export interface Place {
  readonly at: Point3;
  readonly faceA: Point3;
}

/** The flat pattern lying with face B on the ground: the base panel's pose at every fold fraction. */
export const LYING_FLAT: Pose = {
  origin: { x: 0, y: 0, z: 0 },
  ux: { x: 1, y: 0, z: 0 },
  uy: { x: 0, y: 1, z: 0 },
  uz: { x: 0, y: 0, z: 1 },
};

/** Where a pose takes a point of the flat pattern at a height above face B. */
export function placeIn(pose: Pose, point: Point, heightMm: number): Place {
  const inPlane = along3(along3(pose.origin, pose.ux, point.x), pose.uy, point.y);
  return { at: along3(inPlane, pose.uz, heightMm), faceA: pose.uz };
}

function turnedRad(zone: BendZone, foldFraction: number): number {
  return (zone.bendAngleDeg * foldFraction * Math.PI) / 180;
}

/** Below this turn the sheet counts as flat; the error is far below the coincidence tolerance. */
const FLAT_RAD = 1 / 1_000_000_000;

/**
 * Where a point of a bend zone comes to. On the way the neutral line keeps its length: the zone bends evenly over its whole
 * allowance, its radius shrinking from infinity to the inside radius.
 * @param parent pose of the zone's parent panel at the same fold fraction.
 */
export function placeInZone(
  zone: BendZone,
  parent: Pose,
  thicknessMm: number,
  foldFraction: number,
  point: Point,
  heightMm: number,
): Place {
  const offset = subtract(point, zone.origin);
  const acrossMm = dot(offset, zone.towardsChild);
  const theta = turnedRad(zone, foldFraction);
  if (theta < FLAT_RAD) return placeIn(parent, point, heightMm);
  const foot = { x: point.x - zone.towardsChild.x * acrossMm, y: point.y - zone.towardsChild.y * acrossMm };
  const neutralRadius = zone.bendAllowanceMm / theta;
  const turn = (theta * acrossMm) / zone.bendAllowanceMm;
  const isTowards = zone.direction === 'towards';
  const side = isTowards ? 1 : -1;
  const neutralHeight = isTowards ? thicknessMm * (1 - zone.kFactor) : thicknessMm * zone.kFactor;
  const centreHeight = neutralHeight + side * neutralRadius;
  const radius = side * (centreHeight - heightMm);
  const normal = direction3(parent, zone.towardsChild);
  const base = placeIn(parent, foot, centreHeight - side * radius * Math.cos(turn)).at;
  const at = along3(base, normal, radius * Math.sin(turn));
  const faceA = along3(scaled(parent.uz, Math.cos(turn)), normal, -side * Math.sin(turn));
  return { at, faceA };
}

/** Pose of the panel behind a bend zone, from its parent's. */
export function poseBehind(zone: BendZone, parent: Pose, thicknessMm: number, foldFraction: number): Pose {
  const theta = turnedRad(zone, foldFraction);
  const side = zone.direction === 'towards' ? 1 : -1;
  const corner = {
    x: zone.origin.x + zone.towardsChild.x * zone.bendAllowanceMm,
    y: zone.origin.y + zone.towardsChild.y * zone.bendAllowanceMm,
  };
  const normal = direction3(parent, zone.towardsChild);
  const alongBend = direction3(parent, zone.along);
  const forward = along3(scaled(normal, Math.cos(theta)), parent.uz, side * Math.sin(theta));
  const uz = along3(scaled(parent.uz, Math.cos(theta)), normal, -side * Math.sin(theta));
  const axis = (alongPart: number, acrossPart: number): Point3 =>
    along3(scaled(alongBend, alongPart), forward, acrossPart);
  const ux = axis(zone.along.x, zone.towardsChild.x);
  const uy = axis(zone.along.y, zone.towardsChild.y);
  const start = placeInZone(zone, parent, thicknessMm, foldFraction, corner, 0).at;
  return { origin: along3(along3(start, ux, -corner.x), uy, -corner.y), ux, uy, uz };
}

/**
 * Pose of every panel at a fold fraction, 0 flat to 1 formed, all bends turning together. Indexed like the panels.
 * @throws RangeError for a fraction outside 0..1.
 */
export function panelPoses(
  panels: readonly Panel[],
  zones: readonly BendZone[],
  thicknessMm: number,
  foldFraction: number,
): readonly Pose[] {
  if (!(foldFraction >= 0 && foldFraction <= 1))
    throw new RangeError(`Fold fraction must be 0 to 1, got ${String(foldFraction)}`);
  const poses: Pose[] = [];
  for (const panel of panels) {
    const zone = zones.find(({ childIndex }) => childIndex === panel.index);
    const parent = zone === undefined ? undefined : poses[zone.parentIndex];
    poses[panel.index] =
      zone === undefined || parent === undefined ? LYING_FLAT : poseBehind(zone, parent, thicknessMm, foldFraction);
  }
  return poses;
}

/** A direction of the flat pattern carried into space by a pose. */
export function direction3(pose: Pose, direction: Point): Point3 {
  return along3(scaled(pose.ux, direction.x), pose.uy, direction.y);
}

function scaled(a: Point3, factor: number): Point3 {
  return { x: a.x * factor, y: a.y * factor, z: a.z * factor };
}
