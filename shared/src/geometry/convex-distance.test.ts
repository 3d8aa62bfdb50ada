import fc from 'fast-check';
import { runs } from '../bending/testing/runs';
import { convexDepthMm, convexGap } from './convex-distance';
import type { Point3 } from './point';
import { dot3, length3, subtract3 } from './vector3';

function box(min: readonly [number, number, number], max: readonly [number, number, number]): readonly Point3[] {
  return [min[0], max[0]].flatMap((x) => [min[1], max[1]].flatMap((y) => [min[2], max[2]].map((z) => ({ x, y, z }))));
}

const AXES: readonly Point3[] = [
  { x: 1, y: 0, z: 0 },
  { x: 0, y: 1, z: 0 },
  { x: 0, y: 0, z: 1 },
];
const UNIT = box([0, 0, 0], [1, 1, 1]);

it.each([
  ['face to face', box([3, 0, 0], [4, 1, 1]), 2],
  ['edge to edge', box([4, 5, 0], [6, 6, 1]), 5],
  ['corner to corner', box([3, 3, 2], [4, 4, 4]), 3],
  ['face to a corner', [{ x: 0.3, y: 0.2, z: -7 }], 7],
  ['touching', box([1, 0, 0], [2, 1, 1]), 0],
  ['overlapping', box([0.5, 0.5, 0.5], [2, 2, 2]), 0],
  ['one within the other', box([0.4, 0.4, 0.4], [0.6, 0.6, 0.6]), 0],
] as const)('measures bodies %s', (_, other, expected) => {
  expect(convexGap(UNIT, other).distanceMm).toBeCloseTo(expected, 9);
  expect(convexGap(other, UNIT).distanceMm).toBeCloseTo(expected, 9);
});

it('measures two edges that cross in the air', () => {
  const first = [
    { x: -5, y: 0, z: 0 },
    { x: 5, y: 0, z: 0 },
  ];
  const second = [
    { x: 1, y: -4, z: 2.5 },
    { x: 1, y: 4, z: 2.5 },
  ];
  const gap = convexGap(first, second);
  expect(gap.distanceMm).toBeCloseTo(2.5, 9);
  expect(gap.from.x).toBeCloseTo(1, 9);
  expect(gap.to.z).toBeCloseTo(2.5, 9);
});

const coordinate = fc.double({ min: -50, max: 50, noNaN: true });
const body = fc.array(fc.record({ x: coordinate, y: coordinate, z: coordinate }), { minLength: 1, maxLength: 12 });

// The shortest way is proven by itself: no corner of either body lies nearer along it.
it('finds a way that nothing undercuts', () => {
  fc.assert(
    fc.property(body, body, fc.double({ min: 0, max: 120, noNaN: true }), (first, near, offMm) => {
      const second = near.map(({ x, y, z }) => ({ x: x + offMm, y, z }));
      const { distanceMm, from, to } = convexGap(first, second);
      // Bodies that as good as touch have no way worth a direction.
      if (distanceMm < 0.001) return;
      const way = subtract3(from, to);
      expect(length3(way)).toBeCloseTo(distanceMm, 6);
      const least = Math.min(...first.map((a) => dot3(a, way))) - Math.max(...second.map((b) => dot3(b, way)));
      expect(least / distanceMm).toBeGreaterThan(distanceMm - 1e-4);
    }),
    { numRuns: runs() },
  );
});

it('tells how deep bodies overlap, the shortest way out', () => {
  expect(convexDepthMm(UNIT, box([0.9, -1, -1], [3, 3, 3]), AXES)).toBeCloseTo(0.1, 12);
  expect(convexDepthMm(UNIT, box([0.3, 0.8, -1], [3, 3, 3]), AXES)).toBeCloseTo(0.2, 12);
  expect(convexDepthMm(UNIT, box([1.5, 0, 0], [3, 3, 3]), AXES)).toBeCloseTo(-0.5, 12);
});
