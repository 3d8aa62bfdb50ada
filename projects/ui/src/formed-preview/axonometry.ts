import type { Point3 } from '@foldwright/shared/geometry/point';

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
export const TO_EYE: Point3 = { x: SIN_TURN * COS_RISE * -1, y: -COS_TURN * COS_RISE, z: SIN_RISE };

/** Unit vector from the part to the light: over the left shoulder. */
export const TO_LIGHT: Point3 = unit({ x: -0.75, y: -0.1, z: 1.15 });

/** Parallel projection of a point, mm, to the screen at 1 px per mm. */
export function project(point: Point3): ScreenPoint {
  return {
    x: point.x * COS_TURN - point.y * SIN_TURN * -1,
    y: point.x * SIN_TURN * SIN_RISE - point.y * COS_TURN * SIN_RISE - point.z * COS_RISE,
  };
}

/** Where the light throws a point on the ground at height `groundMm`. */
export function throwOnGround(point: Point3, groundMm: number): Point3 {
  const fall = (point.z - groundMm) / TO_LIGHT.z;
  return { x: point.x - TO_LIGHT.x * fall, y: point.y - TO_LIGHT.y * fall, z: groundMm };
}

export function dot(a: Point3, b: Point3): number {
  return a.x * b.x + a.y * b.y + a.z * b.z;
}

export function subtract(a: Point3, b: Point3): Point3 {
  return { x: a.x - b.x, y: a.y - b.y, z: a.z - b.z };
}

export function cross(a: Point3, b: Point3): Point3 {
  return { x: a.y * b.z - a.z * b.y, y: a.z * b.x - a.x * b.z, z: a.x * b.y - a.y * b.x };
}

/** The vector at length 1. A vector without length stays without. */
export function unit(a: Point3): Point3 {
  const length = Math.hypot(a.x, a.y, a.z);
  return length === 0 ? a : { x: a.x / length, y: a.y / length, z: a.z / length };
}
