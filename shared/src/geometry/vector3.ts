import type { Point3 } from './point';

/** `a + b * factor` in space, mm. */
export function along3(a: Point3, b: Point3, factor: number): Point3 {
  return { x: a.x + b.x * factor, y: a.y + b.y * factor, z: a.z + b.z * factor };
}

/** Scalar product in space. */
export function dot3(a: Point3, b: Point3): number {
  return a.x * b.x + a.y * b.y + a.z * b.z;
}

/** Cross product in space, right-handed. */
export function cross3(a: Point3, b: Point3): Point3 {
  return { x: a.y * b.z - a.z * b.y, y: a.z * b.x - a.x * b.z, z: a.x * b.y - a.y * b.x };
}

/** Vector from `b` to `a`. */
export function subtract3(a: Point3, b: Point3): Point3 {
  return { x: a.x - b.x, y: a.y - b.y, z: a.z - b.z };
}

/** Length of a vector. */
export function length3(a: Point3): number {
  return Math.hypot(a.x, a.y, a.z);
}

/** Vector of length 1 in the same direction; the zero vector stays zero, for faces that have collapsed. */
export function unit3(a: Point3): Point3 {
  const size = length3(a);
  return size > 0 ? { x: a.x / size, y: a.y / size, z: a.z / size } : a;
}
