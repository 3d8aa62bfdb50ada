import { loopReach } from '../geometry/loop';
import type { Point3 } from '../geometry/point';
import { pointAt } from '../geometry/segment';
import { dot3 } from '../geometry/vector3';
import type { BendZone, FormedBox, Panel } from './development';
import { panelPoses, placeInZone } from './fold';
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
      best = Math.max(best, largest(reach));
    }
  }
  return best;
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
