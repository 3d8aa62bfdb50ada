import type { Point3 } from '../geometry/point';
import { unit3 } from '../geometry/vector3';

/** A point on the screen at 1 px per mm; x to the right, y down. */
export interface ScreenPoint {
  readonly x: number;
  readonly y: number;
}

// The view of every part in a list: turned 30 degrees and seen from 33 degrees above, so that sizes can be compared.
const TURN_RAD = (30 * Math.PI) / 180;
const RISE_RAD = (33 * Math.PI) / 180;
const [COS_TURN, SIN_TURN] = [Math.cos(TURN_RAD), Math.sin(TURN_RAD)];
const [COS_RISE, SIN_RISE] = [Math.cos(RISE_RAD), Math.sin(RISE_RAD)];

/** Unit vector from the part to the eye. */
export const TO_EYE: Point3 = { x: SIN_TURN * COS_RISE, y: -COS_TURN * COS_RISE, z: SIN_RISE };

/** Unit vector from the part to the light: from the left, over the shoulder. */
export const TO_LIGHT: Point3 = unit3({ x: -0.4, y: -0.5, z: 1.1 });

/** Parallel projection of a point, mm, to the screen at 1 px per mm. x runs right and down, y right and up, z up. */
export function project(point: Point3): ScreenPoint {
  return {
    x: point.x * COS_TURN + point.y * SIN_TURN,
    y: (point.x * SIN_TURN - point.y * COS_TURN) * SIN_RISE - point.z * COS_RISE,
  };
}

/** Where the light throws a point on the ground at height `groundMm`. */
export function throwOnGround(point: Point3, groundMm: number): Point3 {
  const fall = (point.z - groundMm) / TO_LIGHT.z;
  return { x: point.x - TO_LIGHT.x * fall, y: point.y - TO_LIGHT.y * fall, z: groundMm };
}
