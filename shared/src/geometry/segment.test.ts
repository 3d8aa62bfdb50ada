import fc from 'fast-check';
import { flattenSegment } from './flatten';
import type { ArcSegment } from './path';
import {
  arcRadius,
  arcSweepDeg,
  bulgeOf,
  extremePoint,
  nearestOnSegment,
  pointAt,
  reverseSegment,
  segmentBounds,
  segmentFromBulge,
  segmentLength,
  subSegment,
  tangentAt,
} from './segment';
import { distance } from './vector';

const quarter: ArcSegment = {
  kind: 'arc',
  from: { x: 10, y: 0 },
  to: { x: 0, y: 10 },
  centre: { x: 0, y: 0 },
  clockwise: false,
};
const anyBulge = fc
  .integer({ min: -300, max: 300 })
  .filter((n) => n !== 0)
  .map((n) => n / 100);
const point = fc.record({ x: fc.integer({ min: -100, max: 100 }), y: fc.integer({ min: -100, max: 100 }) });

describe('bulge and arc', () => {
  it('1 is a half circle to the right of the chord, tan(22.5) a quarter', () => {
    const halfCircle = segmentFromBulge({ x: -5, y: 0 }, { x: 5, y: 0 }, 1);
    expect(halfCircle.kind === 'arc' && halfCircle.centre).toEqual({ x: 0, y: 0 });
    expect(pointAt(halfCircle, 0.5).y).toBeCloseTo(-5, 9);
    expect(bulgeOf(quarter)).toBeCloseTo(Math.tan(Math.PI / 8), 12);
    expect(segmentFromBulge({ x: 1, y: 1 }, { x: 1, y: 1 }, 1).kind).toBe('line');
  });

  it('come back from each other', () => {
    fc.assert(
      fc.property(point, point, anyBulge, (from, to, bulge) => {
        fc.pre(distance(from, to) > 1);
        const segment = segmentFromBulge(from, to, bulge);
        expect(bulgeOf(segment)).toBeCloseTo(bulge, 6);
        expect(bulgeOf(reverseSegment(segment))).toBeCloseTo(-bulge, 6);
      }),
      { numRuns: 200 },
    );
  });
});

describe('along a segment', () => {
  it('gives length, middle and direction of an arc', () => {
    expect(segmentLength(quarter)).toBeCloseTo(5 * Math.PI, 10);
    expect(arcSweepDeg(quarter)).toBe(90);
    expect(arcSweepDeg({ ...quarter, clockwise: true })).toBe(-270);
    expect(pointAt(quarter, 0.5).x).toBeCloseTo(10 * Math.SQRT1_2, 10);
    expect(tangentAt(quarter, 0)).toEqual({ x: expect.closeTo(0, 10) as unknown, y: expect.closeTo(1, 10) as unknown });
    expect(tangentAt({ ...quarter, clockwise: true }, 0).y).toBeCloseTo(-1, 10);
    expect(arcSweepDeg({ ...quarter, to: quarter.from })).toBe(360);
  });

  it('splits into pieces of the whole length', () => {
    fc.assert(
      fc.property(point, point, anyBulge, fc.integer({ min: 1, max: 99 }), (from, to, bulge, percent) => {
        fc.pre(distance(from, to) > 1);
        const segment = segmentFromBulge(from, to, bulge);
        const [first, second] = [subSegment(segment, 0, percent / 100), subSegment(segment, percent / 100, 1)];
        expect(segmentLength(first) + segmentLength(second)).toBeCloseTo(segmentLength(segment), 6);
      }),
      { numRuns: 200 },
    );
  });
});

describe('reach', () => {
  it('of an arc includes its extremes', () => {
    expect(segmentBounds({ ...quarter, clockwise: true })).toEqual({
      min: { x: expect.closeTo(-10, 9) as unknown, y: expect.closeTo(-10, 9) as unknown },
      max: { x: expect.closeTo(10, 9) as unknown, y: expect.closeTo(10, 9) as unknown },
    });
    expect(extremePoint(quarter, { x: 1, y: 1 }).x).toBeCloseTo(10 * Math.SQRT1_2, 9);
    expect(extremePoint(quarter, { x: -1, y: 0 })).toEqual({ x: 0, y: 10 });
  });

  it('nearest point of an arc is its foot or an end', () => {
    expect(nearestOnSegment(quarter, { x: 6, y: 6 }).distanceMm).toBeCloseTo(10 - 6 * Math.SQRT2, 9);
    expect(nearestOnSegment(quarter, { x: 10, y: -3 }).distanceMm).toBeCloseTo(3, 9);
    expect(nearestOnSegment(quarter, quarter.centre).distanceMm).toBeCloseTo(10, 9);
  });

  it('is no farther from its chords than the chord error', () => {
    fc.assert(
      fc.property(point, point, anyBulge, (from, to, bulge) => {
        fc.pre(distance(from, to) > 1);
        const segment = segmentFromBulge(from, to, bulge);
        if (segment.kind !== 'arc') return;
        const points = flattenSegment(segment, 0.01);
        points.slice(1).forEach((end, index) => {
          const start = points[index] ?? end;
          const middle = { x: (start.x + end.x) / 2, y: (start.y + end.y) / 2 };
          expect(arcRadius(segment) - distance(middle, segment.centre)).toBeLessThan(0.0101);
        });
      }),
      { numRuns: 100 },
    );
    expect(() => flattenSegment(quarter, 0)).toThrow(RangeError);
  });
});
