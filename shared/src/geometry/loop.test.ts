import fc from 'fast-check';
import { flattenLoop, polygonArea } from './flatten';
import {
  centreOfArea,
  circleLoop,
  clockwise,
  counterClockwise,
  loopBounds,
  loopFromBulges,
  loopLength,
  loopReach,
  pointInLoop,
  polygonLoop,
  reverseLoop,
  signedArea,
  slotLoop,
} from './loop';
import { mirrorLoop, moveLoop, movePoint } from './transform';

const half = loopFromBulges([
  { start: { x: -10, y: 0 }, bulge: 0 },
  { start: { x: 10, y: 0 }, bulge: 1 },
]);

/** Star-shaped outlines with arcs: corners around the origin, gentle bulges, so that they never cross themselves. */
const outline = fc
  .array(fc.record({ radius: fc.integer({ min: 20, max: 60 }), bulge: fc.integer({ min: -15, max: 15 }) }), {
    minLength: 3,
    maxLength: 12,
  })
  .map((corners) =>
    loopFromBulges(
      corners.map(({ radius, bulge }, index) => {
        const angle = (2 * Math.PI * index) / corners.length;
        return { start: { x: radius * Math.cos(angle), y: radius * Math.sin(angle) }, bulge: bulge / 100 };
      }),
    ),
  );
const motion = fc.record({
  turnDeg: fc.integer({ min: -360, max: 360 }),
  shift: fc.record({ x: fc.integer({ min: -500, max: 500 }), y: fc.integer({ min: -500, max: 500 }) }),
});

describe('area and length', () => {
  it('are exact for a circle, a half disc and an obround', () => {
    expect(signedArea(circleLoop({ x: 1000, y: -2000 }, 3))).toBeCloseTo(9 * Math.PI, 9);
    expect(signedArea(half)).toBeCloseTo(50 * Math.PI, 9);
    expect(loopLength(half)).toBeCloseTo(20 + 10 * Math.PI, 9);
    const slot = slotLoop({ x: 0, y: 0 }, { x: 10, y: 0 }, 6);
    expect(signedArea(slot)).toBeCloseTo(60 + 9 * Math.PI, 9);
    expect(loopLength(slot)).toBeCloseTo(20 + 6 * Math.PI, 9);
  });

  it('agree with a polygon of many corners', () => {
    fc.assert(
      fc.property(outline, (loop) => {
        expect(Math.abs(signedArea(loop) - polygonArea(flattenLoop(loop, 0.0001)))).toBeLessThan(
          0.0001 * loopLength(loop),
        );
      }),
      { numRuns: 100 },
    );
  });

  it('do not change under rigid motions; the area changes sign when reversed or mirrored', () => {
    fc.assert(
      fc.property(outline, motion, (loop, move) => {
        const area = signedArea(loop);
        expect(signedArea(moveLoop(move, loop))).toBeCloseTo(area, 6);
        expect(loopLength(moveLoop(move, loop))).toBeCloseTo(loopLength(loop), 6);
        expect(signedArea(reverseLoop(loop))).toBeCloseTo(-area, 8);
        expect(signedArea(mirrorLoop(loop))).toBeCloseTo(-area, 8);
        expect(signedArea(counterClockwise(reverseLoop(loop)))).toBeGreaterThan(0);
        expect(signedArea(clockwise(loop))).toBeLessThan(0);
      }),
      { numRuns: 200 },
    );
  });
});

describe('centre of area', () => {
  it('lies 4r/3pi above the flat of a half disc', () => {
    expect(centreOfArea(half, [])?.y).toBeCloseTo(40 / (3 * Math.PI), 9);
    expect(centreOfArea(half, [])?.x).toBeCloseTo(0, 9);
  });

  it('moves away from an opening', () => {
    const plate = polygonLoop([
      { x: 0, y: 0 },
      { x: 20, y: 0 },
      { x: 20, y: 10 },
      { x: 0, y: 10 },
    ]);
    const hole = circleLoop({ x: 15, y: 5 }, 2);
    const expected = (200 * 10 - 4 * Math.PI * 15) / (200 - 4 * Math.PI);
    expect(centreOfArea(plate, [hole])?.x).toBeCloseTo(expected, 9);
  });

  it('goes with the loop', () => {
    fc.assert(
      fc.property(outline, motion, (loop, move) => {
        const centre = centreOfArea(loop, []);
        const moved = centreOfArea(moveLoop(move, loop), []);
        if (centre === null || moved === null) throw new Error('no centre');
        expect(moved.x).toBeCloseTo(movePoint(move, centre).x, 6);
        expect(moved.y).toBeCloseTo(movePoint(move, centre).y, 6);
      }),
      { numRuns: 100 },
    );
  });

  it('is none where nothing is enclosed', () => {
    expect(centreOfArea([], [])).toBeNull();
  });
});

describe('bounds and reach', () => {
  it('include the extremes of arcs', () => {
    expect(loopBounds(half)).toEqual({
      min: { x: -10, y: expect.closeTo(0, 9) as unknown },
      max: { x: 10, y: expect.closeTo(10, 9) as unknown },
    });
    expect(loopReach(half, { x: Math.SQRT1_2, y: Math.SQRT1_2 })).toBeCloseTo(10, 9);
    expect(loopReach(half, { x: 0, y: -1 })).toBeCloseTo(0, 9);
    expect(loopBounds([])).toBeNull();
  });
});

describe('place of a point', () => {
  it('counts arcs and not their chords', () => {
    expect(pointInLoop({ x: 0, y: 9.99 }, half, 0)).toBe('inside');
    expect(pointInLoop({ x: 0, y: 10.01 }, half, 0)).toBe('outside');
    const bitten = loopFromBulges([
      { start: { x: -10, y: 0 }, bulge: 0.5 },
      { start: { x: 10, y: 0 }, bulge: 0 },
      { start: { x: 10, y: 20 }, bulge: -0.5 },
      { start: { x: -10, y: 20 }, bulge: 0 },
    ]);
    expect(pointInLoop({ x: 0, y: -4.9 }, bitten, 0)).toBe('inside');
    expect(pointInLoop({ x: 0, y: 15.1 }, bitten, 0)).toBe('outside');
    expect(pointInLoop({ x: 0, y: 14.9 }, bitten, 0)).toBe('inside');
  });

  it('is on the boundary within the tolerance, and at heights of corners', () => {
    const diamond = polygonLoop([
      { x: 0, y: -5 },
      { x: 5, y: 0 },
      { x: 0, y: 5 },
      { x: -5, y: 0 },
    ]);
    expect(pointInLoop({ x: 5.0005, y: 0 }, diamond, 0.001)).toBe('on');
    expect(pointInLoop({ x: 5.002, y: 0 }, diamond, 0.001)).toBe('outside');
    expect(pointInLoop({ x: 0, y: 0 }, diamond, 0)).toBe('inside');
    expect(pointInLoop({ x: -9, y: 0 }, diamond, 0)).toBe('outside');
  });

  it('does not depend on the running direction', () => {
    fc.assert(
      fc.property(outline, fc.integer({ min: -70, max: 70 }), fc.integer({ min: -70, max: 70 }), (loop, x, y) => {
        expect(pointInLoop({ x, y }, reverseLoop(loop), 0.001)).toBe(pointInLoop({ x, y }, loop, 0.001));
      }),
      { numRuns: 200 },
    );
  });
});
