import { loopReach } from '../geometry/loop';
import type { LineSegment } from '../geometry/path';
import type { Point, Point3 } from '../geometry/point';
import { pointAt } from '../geometry/segment';
import { dot, subtract } from '../geometry/vector';
import { dot3 } from '../geometry/vector3';
import type { BendZone, FormedBox, Panel } from './development';
import { direction3, panelPoses, placeInZone } from './fold';
import type { Pose } from './fold';

const AXES: readonly Point3[] = [
  { x: 1, y: 0, z: 0 },
  { x: 0, y: 1, z: 0 },
  { x: 0, y: 0, z: 1 },
];

/** Samples along the side of a bend zone before the farthest point is narrowed down. */
const SIDE_SAMPLES = 32;
const NARROWING_STEPS = 60;

/**
 * Outer box of the fully formed part along the base panel's axes, mm: z = 0 on face B of the base. Panels by their exact
 * outlines, bends by the farthest points of their cylinders, which lie on the sides of the zones.
 */
export function formedBox(panels: readonly Panel[], zones: readonly BendZone[], thicknessMm: number): FormedBox {
  const poses = panelPoses(panels, zones, thicknessMm, 1);
  const reach = (axis: Point3): number => {
    const ofPanels = panels.map((panel) => panelReach(panel, poses[panel.index], axis, thicknessMm));
    const ofZones = zones.map((zone) => zoneReach(zone, poses[zone.parentIndex], axis, thicknessMm));
    return Math.max(...ofPanels, ...ofZones);
  };
  const [maxX, maxY, maxZ] = AXES.map(reach);
  const [minX, minY, minZ] = AXES.map(({ x, y, z }) => 0 - reach({ x: -x, y: -y, z: -z }));
  return {
    min: { x: minX ?? 0, y: minY ?? 0, z: minZ ?? 0 },
    max: { x: maxX ?? 0, y: maxY ?? 0, z: maxZ ?? 0 },
  };
}

function panelReach(panel: Panel, pose: Pose | undefined, axis: Point3, thicknessMm: number): number {
  if (pose === undefined) return -Infinity;
  const inPlane = loopReach(panel.outer, { x: dot3(pose.ux, axis), y: dot3(pose.uy, axis) });
  return dot3(pose.origin, axis) + inPlane + Math.max(0, dot3(pose.uz, axis) * thicknessMm);
}

function zoneReach(zone: BendZone, parent: Pose | undefined, axis: Point3, thicknessMm: number): number {
  if (parent === undefined) return -Infinity;
  let best = -Infinity;
  for (const segment of zone.outer) {
    for (const height of [0, thicknessMm]) {
      const reach = (t: number): number =>
        dot3(placeInZone(zone, parent, thicknessMm, 1, pointAt(segment, t), height).at, axis);
      if (segment.kind === 'arc') best = Math.max(best, largest(reach));
      else
        for (const t of turningFractions(zone, parent, axis, segment, height, thicknessMm))
          best = Math.max(best, reach(t));
    }
  }
  return best;
}

/**
 * Fractions of a straight edge of a zone at which it can lie farthest along an axis: its ends, and where its image on the
 * cylinder runs across the axis. On the image the height over the axis is linear in the turn plus a sine of it.
 */
function turningFractions(
  zone: BendZone,
  parent: Pose,
  axis: Point3,
  edge: LineSegment,
  heightMm: number,
  thicknessMm: number,
): readonly number[] {
  const turnAt = (point: Point): number =>
    (dot(subtract(point, zone.origin), zone.towardsChild) / zone.bendAllowanceMm) *
    ((zone.bendAngleDeg * Math.PI) / 180);
  const start = turnAt(edge.from);
  const turned = turnAt(edge.to) - start;
  if (turned === 0) return [0, 1];
  const isTowards = zone.direction === 'towards';
  const radius = zone.insideRadiusMm + (isTowards ? thicknessMm - heightMm : heightMm);
  const sine = (isTowards ? 1 : -1) * dot3(parent.uz, axis);
  const cosine = dot3(direction3(parent, zone.towardsChild), axis);
  const size = Math.hypot(sine, cosine) * radius * turned;
  const drift = dot3(direction3(parent, zone.along), axis) * dot(subtract(edge.to, edge.from), zone.along);
  const fractions = [0, 1];
  if (Math.abs(drift) > Math.abs(size)) return fractions;
  const middle = Math.atan2(sine, cosine);
  const half = size === 0 ? 0 : Math.acos(-drift / size);
  for (const turn of [middle - half, middle + half]) {
    for (const whole of [-1, 0, 1]) {
      const t = (turn + 2 * Math.PI * whole - start) / turned;
      if (t > 0 && t < 1) fractions.push(t);
    }
  }
  return fractions;
}

/** Largest value of a smooth function on 0..1: samples, then thirds around the best. */
function largest(valueAt: (t: number) => number): number {
  let bestAt = 0;
  let best = -Infinity;
  for (let sample = 0; sample <= SIDE_SAMPLES; sample += 1) {
    const value = valueAt(sample / SIDE_SAMPLES);
    if (value > best) {
      best = value;
      bestAt = sample / SIDE_SAMPLES;
    }
  }
  let low = Math.max(0, bestAt - 1 / SIDE_SAMPLES);
  let high = Math.min(1, bestAt + 1 / SIDE_SAMPLES);
  for (let step = 0; step < NARROWING_STEPS; step += 1) {
    const third = (high - low) / 3;
    if (valueAt(low + third) < valueAt(high - third)) low += third;
    else high -= third;
  }
  return Math.max(best, valueAt((low + high) / 2));
}
