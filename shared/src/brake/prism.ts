import type { Pose } from '../bending/fold';
import type { Point, Point3 } from '../geometry/point';
import { along3, dot3, subtract3 } from '../geometry/vector3';
import { cross, subtract } from '../geometry/vector';

/**
 * A convex polygon (counter-clockwise, mm) in the x-y plane of a pose, filled between two heights along its z. Plates, strips of
 * bends, tools and the machine's beams are all of this kind, so that one test of overlap serves for everything. The pose may be
 * left-handed: only the overlap counts.
 */
export interface Prism {
  readonly pose: Pose;
  readonly polygon: readonly Point[];
  readonly low: number;
  readonly high: number;
  /** Middle of its box and half the box's size in its own axes, and half its diagonal, mm. */
  readonly middle: { readonly x: number; readonly y: number; readonly z: number };
  readonly half: { readonly x: number; readonly y: number; readonly z: number };
  readonly radius: number;
  /** Its middle in space. */
  readonly centre: Point3;
}

/** Bodies that dip into each other by no more than this count as touching, mm. */
export const TOUCHING_MM = 0.02;

/** A prism over a convex polygon. */
export function prism(pose: Pose, polygon: readonly Point[], low: number, high: number): Prism {
  let [minX, minY, maxX, maxY] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const { x, y } of polygon) {
    minX = Math.min(minX, x);
    maxX = Math.max(maxX, x);
    minY = Math.min(minY, y);
    maxY = Math.max(maxY, y);
  }
  const half = { x: (maxX - minX) / 2, y: (maxY - minY) / 2, z: (high - low) / 2 };
  const middle = { x: (minX + maxX) / 2, y: (minY + maxY) / 2, z: (low + high) / 2 };
  const radius = Math.sqrt(half.x * half.x + half.y * half.y + half.z * half.z);
  return { pose, polygon, low, high, middle, half, radius, centre: placed(middle, pose) };
}

/** The same prism somewhere else. */
export function posed({ polygon, low, high, middle, half, radius }: Prism, pose: Pose): Prism {
  return { pose, polygon, low, high, middle, half, radius, centre: placed(middle, pose) };
}

function placed({ x, y, z }: Point3, { origin, ux, uy, uz }: Pose): Point3 {
  return {
    x: origin.x + ux.x * x + uy.x * y + uz.x * z,
    y: origin.y + ux.y * x + uy.y * y + uz.y * z,
    z: origin.z + ux.z * x + uy.z * y + uz.z * z,
  };
}

/**
 * Whether two prisms share more than a touch: there is no plane between them, even when either is let into the other by
 * `TOUCHING_MM`. Exact but for that: `b` is cut to the heights of `a`, and its shadow along `a`'s axis compared with `a`'s polygon.
 */
export function prismsOverlap(a: Prism, b: Prism): boolean {
  if (areFarApart(a, b)) return false;
  const shadow = shadowOf(a.pose, b, a.low + TOUCHING_MM, a.high - TOUCHING_MM);
  if (shadow.length === 0 || isBeside(a.polygon, shadow)) return false;
  return !isBeside(convexHull(shadow), a.polygon);
}

/** What a prism leaves between two heights of a pose, seen along the pose's z: points whose hull it is. Empty where nothing is left. */
export function shadowOf(pose: Pose, b: Prism, low: number, high: number): readonly Point[] {
  const origin = subtract3(b.pose.origin, pose.origin);
  const ends = [b.low, b.high].map((height) => {
    const inSpace = along3(origin, b.pose.uz, height);
    return { x: dot3(pose.ux, inSpace), y: dot3(pose.uy, inSpace), z: dot3(pose.uz, inSpace) };
  });
  const { ux, uy } = b.pose;
  const [xx, xy] = [dot3(pose.ux, ux), dot3(pose.ux, uy)];
  const [yx, yy] = [dot3(pose.uy, ux), dot3(pose.uy, uy)];
  const [zx, zy] = [dot3(pose.uz, ux), dot3(pose.uz, uy)];
  const corners = ends.map((foot) =>
    b.polygon.map(({ x, y }): Corner => ({
      x: foot.x + xx * x + xy * y,
      y: foot.y + yx * x + yy * y,
      z: foot.z + zx * x + zy * y,
    })),
  );
  return shadowBetween(corners, low, high);
}

/** Whether the ball around `b` lies beside the box of `a`, or one box beside a face of the other: settles nearly every test. */
function areFarApart({ pose, middle, half }: Prism, b: Prism): boolean {
  const { origin, ux, uy, uz } = pose;
  const { centre, radius } = b;
  const [x, y, z] = [centre.x - origin.x, centre.y - origin.y, centre.z - origin.z];
  const offX = ux.x * x + ux.y * y + ux.z * z - middle.x;
  if (Math.abs(offX) >= half.x + radius) return true;
  const offY = uy.x * x + uy.y * y + uy.z * z - middle.y;
  if (Math.abs(offY) >= half.y + radius) return true;
  const offZ = uz.x * x + uz.y * y + uz.z * z - middle.z;
  if (Math.abs(offZ) >= half.z + radius) return true;

  const { ux: bx, uy: by, uz: bz } = b.pose;
  const size = b.half;
  const [xx, xy, xz] = [dot3(ux, bx), dot3(ux, by), dot3(ux, bz)];
  const [yx, yy, yz] = [dot3(uy, bx), dot3(uy, by), dot3(uy, bz)];
  const [zx, zy, zz] = [dot3(uz, bx), dot3(uz, by), dot3(uz, bz)];
  const gap = (off: number, own: number, p: number, q: number, r: number, of: Point3): boolean =>
    Math.abs(off) >= own + Math.abs(p) * of.x + Math.abs(q) * of.y + Math.abs(r) * of.z - TOUCHING_MM;
  return (
    gap(offX, half.x, xx, xy, xz, size) ||
    gap(offY, half.y, yx, yy, yz, size) ||
    gap(offZ, half.z, zx, zy, zz, size) ||
    gap(offX * xx + offY * yx + offZ * zx, size.x, xx, yx, zx, half) ||
    gap(offX * xy + offY * yy + offZ * zy, size.y, xy, yy, zy, half) ||
    gap(offX * xz + offY * yz + offZ * zz, size.z, xz, yz, zz, half)
  );
}

interface Corner extends Point {
  readonly z: number;
}

/** Corners, seen along z, of what a prism's two ends and sides leave between two heights. */
function shadowBetween(ends: readonly (readonly Corner[])[], low: number, high: number): readonly Point[] {
  const [bottom = [], top = []] = ends;
  const shadow: Point[] = [];
  const cut = (from: Corner, to: Corner, height: number): void => {
    if (from.z < height === to.z < height) return;
    const t = (height - from.z) / (to.z - from.z);
    shadow.push({ x: from.x + (to.x - from.x) * t, y: from.y + (to.y - from.y) * t });
  };
  const side = (from: Corner, to: Corner): void => {
    cut(from, to, low);
    cut(from, to, high);
  };
  for (let index = 0; index < bottom.length; index += 1) {
    const next = (index + 1) % bottom.length;
    const [b, t, b2, t2] = [bottom[index], top[index], bottom[next], top[next]];
    if (b === undefined || t === undefined || b2 === undefined || t2 === undefined) continue;
    if (b.z >= low && b.z <= high) shadow.push(b);
    if (t.z >= low && t.z <= high) shadow.push(t);
    side(b, t);
    side(b, b2);
    side(t, t2);
  }
  return shadow;
}

/** Whether all points lie beyond one edge of a convex polygon, but for a touch. */
function isBeside(polygon: readonly Point[], points: readonly Point[]): boolean {
  for (let index = 0; index < polygon.length; index += 1) {
    const from = polygon[index];
    const to = polygon[(index + 1) % polygon.length];
    if (from === undefined || to === undefined) continue;
    const [ex, ey] = [to.x - from.x, to.y - from.y];
    const limit = TOUCHING_MM * Math.sqrt(ex * ex + ey * ey);
    if (limit > 0 && points.every(({ x, y }) => ex * (y - from.y) - ey * (x - from.x) <= limit)) return true;
  }
  // A shadow of no width, a plate seen from its edge where nothing of it is left, takes up no room.
  return polygon.length < 3;
}

/** Corners of the smallest convex polygon around points, counter-clockwise, without corners on straight runs. */
export function convexHull(points: readonly Point[]): readonly Point[] {
  const sorted = [...points].sort((a, b) => a.x - b.x || a.y - b.y);
  const half = (ordered: readonly Point[]): Point[] => {
    const chain: Point[] = [];
    for (const point of ordered) {
      for (;;) {
        const last = chain.at(-1);
        const before = chain.at(-2);
        if (last === undefined || before === undefined) break;
        if (cross(subtract(last, before), subtract(point, before)) > 0) break;
        chain.pop();
      }
      chain.push(point);
    }
    chain.pop();
    return chain;
  };
  return [...half(sorted), ...half(sorted.reverse())];
}
