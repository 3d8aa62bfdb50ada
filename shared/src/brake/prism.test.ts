import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import type { Pose } from '../bending/fold';
import { LYING_FLAT } from '../bending/fold';
import { runs } from '../bending/testing/runs';
import type { Point3 } from '../geometry/point';
import { along3, cross3, subtract3, unit3 } from '../geometry/vector3';
import { convexHull, prism, prismsOverlap } from './prism';
import type { Prism } from './prism';

const square = (sizeMm: number) => [
  { x: 0, y: 0 },
  { x: sizeMm, y: 0 },
  { x: sizeMm, y: sizeMm },
  { x: 0, y: sizeMm },
];
const plate = prism(LYING_FLAT, square(100), 0, 2);
const at = (origin: Point3): Pose => ({ ...LYING_FLAT, origin });

const number = (limit: number) => fc.double({ min: -limit, max: limit, noNaN: true });
const vector = (limit: number) => fc.record({ x: number(limit), y: number(limit), z: number(limit) });
const anyPose = fc
  .record({ origin: vector(30), first: vector(1), second: vector(1) })
  .filter(({ first, second }) => {
    const across = cross3(first, second);
    return Math.hypot(across.x, across.y, across.z) > 0.05;
  })
  .map(({ origin, first, second }): Pose => {
    const [ux, uz] = [unit3(first), unit3(cross3(first, second))];
    return { origin, ux, uy: cross3(uz, ux), uz };
  });
/** Between 10 and 40 in every direction. */
const anyPrism = fc
  .record({
    pose: anyPose,
    corners: fc.array(fc.record({ x: number(20), y: number(20) }), { maxLength: 5 }),
    highMm: fc.double({ min: 10, max: 30, noNaN: true }),
  })
  .map(({ pose, corners, highMm }) => prism(pose, convexHull([...square(10), ...corners]), 0, highMm));

/** The prism shrunk towards its middle. */
function shrunk({ pose, polygon, low, high, middle }: Prism, factor: number): Prism {
  const towards = (from: number, value: number): number => from + (value - from) * factor;
  const smaller = polygon.map(({ x, y }) => ({ x: towards(middle.x, x), y: towards(middle.y, y) }));
  return prism(pose, smaller, towards(middle.z, low), towards(middle.z, high));
}

/** Whether a point of space lies well inside a prism. */
function holds({ pose, polygon, low, high }: Prism, point: Point3): boolean {
  const off = { x: point.x - pose.origin.x, y: point.y - pose.origin.y, z: point.z - pose.origin.z };
  const along = (axis: Point3): number => axis.x * off.x + axis.y * off.y + axis.z * off.z;
  const [x, y, z] = [along(pose.ux), along(pose.uy), along(pose.uz)];
  if (z < low + 1 || z > high - 1) return false;
  return polygon.every((from, index) => {
    const to = polygon[(index + 1) % polygon.length] ?? from;
    const [ex, ey] = [to.x - from.x, to.y - from.y];
    return ex * (y - from.y) - ey * (x - from.x) >= Math.hypot(ex, ey);
  });
}

describe('overlap of prisms', () => {
  it('lets two plates touch by 0.02 mm and no more', () => {
    expect(prismsOverlap(plate, prism(at({ x: 0, y: 0, z: 1.99 }), square(50), 0, 2))).toBe(false);
    expect(prismsOverlap(plate, prism(at({ x: 0, y: 0, z: 1.97 }), square(50), 0, 2))).toBe(true);
    expect(prismsOverlap(plate, prism(at({ x: 99.99, y: 0, z: 0 }), square(50), 0, 2))).toBe(false);
    expect(prismsOverlap(plate, prism(at({ x: 99.97, y: 0, z: 0 }), square(50), 0, 2))).toBe(true);
  });

  it('finds a plate that stands in another although no corner of either lies in the other', () => {
    const upright: Pose = { ...LYING_FLAT, origin: { x: 50, y: 50, z: -20 }, uy: LYING_FLAT.uz, uz: LYING_FLAT.uy };
    expect(prismsOverlap(plate, prism(upright, square(40), 0, 2))).toBe(true);
  });

  it('is the same seen from either, but for a touch', () => {
    fc.assert(
      fc.property(anyPrism, anyPrism, (a, b) => {
        if (prismsOverlap(a, shrunk(b, 0.9))) expect(prismsOverlap(b, a)).toBe(true);
        if (prismsOverlap(shrunk(b, 0.9), a)) expect(prismsOverlap(a, b)).toBe(true);
      }),
      { numRuns: runs() },
    );
  });

  it('never misses a point that lies well inside both', () => {
    let shared = 0;
    fc.assert(
      fc.property(anyPrism, anyPrism, fc.double({ min: 0, max: 1, noNaN: true }), (a, b, share) => {
        const point = along3(a.centre, subtract3(b.centre, a.centre), share);
        if (!holds(a, point) || !holds(b, point)) return;
        shared += 1;
        expect(prismsOverlap(a, b)).toBe(true);
      }),
      { numRuns: runs() },
    );
    expect(shared).toBeGreaterThan(0);
  });
});
