import type { Bounds, Point } from './point';

/** Sum of two vectors, mm. */
export function add(a: Point, b: Point): Point {
  return { x: a.x + b.x, y: a.y + b.y };
}

/** Vector from `b` to `a`, mm. */
export function subtract(a: Point, b: Point): Point {
  return { x: a.x - b.x, y: a.y - b.y };
}

/** Vector times a number. */
export function scale(a: Point, factor: number): Point {
  return { x: a.x * factor, y: a.y * factor };
}

/** `a + direction * distance`; with a unit direction the distance is in mm. */
export function along(a: Point, direction: Point, distanceMm: number): Point {
  return { x: a.x + direction.x * distanceMm, y: a.y + direction.y * distanceMm };
}

/** Point at fraction `t` of the way from `a` to `b`; not limited to 0..1. Exact at both ends. */
export function between(a: Point, b: Point, t: number): Point {
  if (t === 1) return b;
  return { x: a.x + (b.x - a.x) * t, y: a.y + (b.y - a.y) * t };
}

/** Scalar product, mm2. */
export function dot(a: Point, b: Point): number {
  return a.x * b.x + a.y * b.y;
}

/** Cross product, mm2: positive when `b` points to the left of `a`. */
export function cross(a: Point, b: Point): number {
  return a.x * b.y - a.y * b.x;
}

/** Length of a vector, mm. */
export function magnitude(a: Point): number {
  // Not Math.hypot, which is many times slower and guards against sizes that no sheet has.
  return Math.sqrt(a.x * a.x + a.y * a.y);
}

/** Distance between two points, mm. */
export function distance(a: Point, b: Point): number {
  const [x, y] = [a.x - b.x, a.y - b.y];
  return Math.sqrt(x * x + y * y);
}

/**
 * Vector of length 1 in the same direction.
 * @throws RangeError for the zero vector, which has no direction.
 */
export function unit(a: Point): Point {
  const size = magnitude(a);
  if (!(size > 0)) throw new RangeError(`A vector of length ${String(size)} has no direction`);
  return { x: a.x / size, y: a.y / size };
}

/** The vector turned by a quarter counter-clockwise (to the left). */
export function turnLeft(a: Point): Point {
  return { x: -a.y, y: a.x };
}

/** The vector turned by a quarter clockwise (to the right). */
export function turnRight(a: Point): Point {
  return { x: a.y, y: -a.x };
}

/** The vector turned by `angleDeg`, counter-clockwise positive. Quarter turns are exact. */
export function turn(a: Point, angleDeg: number): Point {
  const [cosine, sine] = cosSinDeg(angleDeg);
  return { x: a.x * cosine - a.y * sine, y: a.x * sine + a.y * cosine };
}

/** Cosine and sine of an angle in degrees, exact at multiples of 90. */
export function cosSinDeg(angleDeg: number): readonly [number, number] {
  const wrapped = ((angleDeg % 360) + 360) % 360;
  if (wrapped === 0) return [1, 0];
  if (wrapped === 90) return [0, 1];
  if (wrapped === 180) return [-1, 0];
  if (wrapped === 270) return [0, -1];
  const angleRad = (wrapped * Math.PI) / 180;
  return [Math.cos(angleRad), Math.sin(angleRad)];
}

/** Direction of a vector in degrees, -180 to 180, counter-clockwise from +x; 0 for the zero vector. */
export function directionDeg(a: Point): number {
  return (Math.atan2(a.y, a.x) * 180) / Math.PI;
}

/** Whether two points are the same within `toleranceMm`. */
export function coincide(a: Point, b: Point, toleranceMm: number): boolean {
  return distance(a, b) <= toleranceMm;
}

/** Smallest bounds around points; `null` when there are none. */
export function boundsOfPoints(points: readonly Point[]): Bounds | null {
  const first = points[0];
  if (first === undefined) return null;
  let { x: minX, y: minY } = first;
  let { x: maxX, y: maxY } = first;
  for (const point of points) {
    minX = Math.min(minX, point.x);
    minY = Math.min(minY, point.y);
    maxX = Math.max(maxX, point.x);
    maxY = Math.max(maxY, point.y);
  }
  return { min: { x: minX, y: minY }, max: { x: maxX, y: maxY } };
}

/** Whether two bounds come within `marginMm` of each other. */
export function boundsMeet(a: Bounds, b: Bounds, marginMm: number): boolean {
  return (
    a.min.x <= b.max.x + marginMm &&
    b.min.x <= a.max.x + marginMm &&
    a.min.y <= b.max.y + marginMm &&
    b.min.y <= a.max.y + marginMm
  );
}
