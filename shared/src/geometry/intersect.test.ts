import fc from 'fast-check';
import { segmentClearance } from './clearance';
import { intersectSegments } from './intersect';
import { findCrossings } from './loop-crossings';
import { circleLoop, polygonLoop } from './loop';
import type { ArcSegment } from './path';
import { line, nearestOnSegment, segmentFromBulge } from './segment';
import { distance } from './vector';

const TOL = 0.000001;
const half: ArcSegment = {
  kind: 'arc',
  from: { x: 5, y: 0 },
  to: { x: -5, y: 0 },
  centre: { x: 0, y: 0 },
  clockwise: false,
};

describe('two segments', () => {
  it('lines cross, miss, touch at an end, or share a stretch', () => {
    const a = line({ x: 0, y: 0 }, { x: 10, y: 0 });
    expect(intersectSegments(a, line({ x: 5, y: -5 }, { x: 5, y: 5 }), TOL)).toEqual({
      kind: 'point',
      points: [{ x: 5, y: 0 }],
    });
    expect(intersectSegments(a, line({ x: 5, y: 1 }, { x: 5, y: 5 }), TOL)).toEqual({ kind: 'none' });
    expect(intersectSegments(a, line({ x: 10, y: 0 }, { x: 12, y: 3 }), TOL)).toMatchObject({ kind: 'point' });
    expect(intersectSegments(a, line({ x: 15, y: 0 }, { x: 4, y: 0 }), TOL)).toEqual({
      kind: 'overlap',
      stretches: [{ from: { x: 4, y: 0 }, to: { x: 10, y: 0 } }],
    });
    expect(intersectSegments(a, line({ x: 10, y: 0 }, { x: 20, y: 0 }), TOL)).toMatchObject({
      kind: 'point',
      points: [{ x: 10, y: 0 }],
    });
    expect(intersectSegments(a, line({ x: 11, y: 0 }, { x: 20, y: 0 }), TOL)).toEqual({ kind: 'none' });
  });

  it('a line and an arc meet twice, once, at a tangent, or not', () => {
    expect(intersectSegments(line({ x: -9, y: 3 }, { x: 9, y: 3 }), half, TOL)).toMatchObject({
      kind: 'point',
      points: [{ x: expect.closeTo(-4, 9) as unknown }, { x: expect.closeTo(4, 9) as unknown }],
    });
    expect(intersectSegments(line({ x: 0, y: 0 }, { x: 0, y: 9 }), half, TOL)).toMatchObject({
      points: [{ y: expect.closeTo(5, 9) as unknown }],
    });
    expect(intersectSegments(line({ x: -9, y: 5 }, { x: 9, y: 5 }), half, TOL)).toMatchObject({ kind: 'point' });
    expect(intersectSegments(line({ x: -9, y: -3 }, { x: 9, y: -3 }), half, TOL)).toEqual({ kind: 'none' });
  });

  it('arcs meet in points or share a stretch of one circle', () => {
    const other: ArcSegment = { ...half, from: { x: 11, y: 0 }, to: { x: 1, y: 0 }, centre: { x: 6, y: 0 } };
    expect(intersectSegments(half, other, TOL)).toMatchObject({
      points: [{ x: expect.closeTo(3, 9) as unknown, y: expect.closeTo(4, 9) as unknown }],
    });
    const turned: ArcSegment = { ...half, from: { x: 0, y: 5 }, to: { x: 0, y: -5 } };
    expect(intersectSegments(half, turned, TOL)).toMatchObject({
      kind: 'overlap',
      stretches: [{ from: { x: expect.closeTo(0, 9) as unknown } }],
    });
    expect(intersectSegments(half, { ...half, clockwise: true }, TOL)).toMatchObject({ kind: 'point' });
  });

  it('give points on both, whatever their order', () => {
    const point = fc.record({ x: fc.integer({ min: -30, max: 30 }), y: fc.integer({ min: -30, max: 30 }) });
    const segment = fc.tuple(point, point, fc.constantFrom(0, 0.4, -0.7, 1.3)).filter(([a, b]) => distance(a, b) > 1);
    fc.assert(
      fc.property(segment, segment, (first, second) => {
        const [a, b] = [segmentFromBulge(...first), segmentFromBulge(...second)];
        const met = intersectSegments(a, b, TOL);
        const back = intersectSegments(b, a, TOL);
        expect(back.kind).toBe(met.kind);
        if (met.kind !== 'point' || back.kind !== 'point') return;
        expect(back.points).toHaveLength(met.points.length);
        for (const at of met.points) {
          expect(nearestOnSegment(a, at).distanceMm).toBeLessThan(2 * TOL);
          expect(nearestOnSegment(b, at).distanceMm).toBeLessThan(2 * TOL);
        }
      }),
      { numRuns: 300 },
    );
  });

  it('have a clearance of 0 exactly where they meet', () => {
    const arc = segmentFromBulge({ x: -5, y: 8 }, { x: 5, y: 8 }, 0.5);
    expect(segmentClearance(line({ x: -9, y: 0 }, { x: 9, y: 0 }), arc).distanceMm).toBeCloseTo(8 - 2.5, 9);
    expect(
      segmentClearance(half, { ...half, centre: { x: 0, y: 20 }, from: { x: -5, y: 20 }, to: { x: 5, y: 20 } })
        .distanceMm,
    ).toBeCloseTo(10, 9);
    expect(segmentClearance(line({ x: -9, y: 3 }, { x: 9, y: 3 }), half).distanceMm).toBe(0);
  });
});

describe('crossings of loops', () => {
  const square = polygonLoop([
    { x: 0, y: 0 },
    { x: 10, y: 0 },
    { x: 10, y: 10 },
    { x: 0, y: 10 },
  ]);

  it('a simple loop with an opening has none', () => {
    expect(findCrossings([square, circleLoop({ x: 5, y: 5 }, 2)], TOL)).toEqual([]);
  });

  it('finds a bow tie, a touch, and a fold back on itself', () => {
    const bow = polygonLoop([
      { x: 0, y: 0 },
      { x: 10, y: 10 },
      { x: 10, y: 0 },
      { x: 0, y: 10 },
    ]);
    expect(findCrossings([bow], TOL)).toMatchObject([{ kind: 'crossing', at: { x: 5, y: 5 } }]);
    expect(findCrossings([square, circleLoop({ x: 5, y: 5 }, 5)], TOL).length).toBeGreaterThanOrEqual(4);
    const spike = polygonLoop([
      { x: 0, y: 0 },
      { x: 10, y: 0 },
      { x: 20, y: 0 },
      { x: 12, y: 0 },
      { x: 12, y: 5 },
    ]);
    expect(findCrossings([spike], TOL).some(({ kind }) => kind === 'overlap')).toBe(true);
  });

  it('flips within the tolerance', () => {
    expect(findCrossings([square, circleLoop({ x: 5, y: 5 }, 4.99999)], TOL)).toEqual([]);
    expect(findCrossings([square, circleLoop({ x: 5, y: 5 }, 5.00001)], TOL).length).toBeGreaterThan(0);
  });
});
