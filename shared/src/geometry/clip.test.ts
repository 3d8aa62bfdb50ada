import fc from 'fast-check';
import { joinPieces } from './chain';
import { loopClearance, pointToLoop } from './clearance';
import { clipRegion } from './clip';
import { circleLoop, clockwise, loopFromBulges, polygonLoop, signedArea } from './loop';
import { outsideOpenings } from './stretch';
import { triangulate } from './triangulate';
import { biarc } from './biarc';
import { tangentAt } from './segment';

const TOL = 0.000001;
const total = (loops: readonly (readonly unknown[])[] | null): number =>
  (loops ?? []).reduce((sum, loop) => sum + signedArea(loop as Parameters<typeof signedArea>[0]), 0);

describe('clip by a half plane', () => {
  it('cuts a circle to a segment of known area, arcs kept', () => {
    const [cap, ...rest] = clipRegion(
      [circleLoop({ x: 0, y: 0 }, 5)],
      { origin: { x: 0, y: 3 }, inward: { x: 0, y: 1 } },
      TOL,
    );
    expect(rest).toEqual([]);
    // Source: plane geometry, r2 acos(d/r) - d sqrt(r2 - d2).
    expect(signedArea(cap ?? [])).toBeCloseTo(25 * Math.acos(0.6) - 12, 9);
    expect(cap?.some(({ kind }) => kind === 'arc')).toBe(true);
  });

  it('parts a U into two and keeps openings open', () => {
    const u = polygonLoop([
      { x: 0, y: 0 },
      { x: 30, y: 0 },
      { x: 30, y: 20 },
      { x: 20, y: 20 },
      { x: 20, y: 10 },
      { x: 10, y: 10 },
      { x: 10, y: 20 },
      { x: 0, y: 20 },
    ]);
    expect(clipRegion([u], { origin: { x: 0, y: 15 }, inward: { x: 0, y: 1 } }, TOL)).toHaveLength(2);
    const below = clipRegion(
      [u, clockwise(circleLoop({ x: 15, y: 5 }, 2))],
      { origin: { x: 0, y: 5 }, inward: { x: 0, y: -1 } },
      TOL,
    );
    expect(total(below)).toBeCloseTo(150 - 2 * Math.PI, 9);
  });

  it('keeps the whole and drops the rest when the line misses or touches', () => {
    const square = polygonLoop([
      { x: 0, y: 0 },
      { x: 10, y: 0 },
      { x: 10, y: 10 },
      { x: 0, y: 10 },
    ]);
    expect(total(clipRegion([square], { origin: { x: 0, y: 0 }, inward: { x: 0, y: 1 } }, TOL))).toBeCloseTo(100, 9);
    expect(clipRegion([square], { origin: { x: 0, y: 10 }, inward: { x: 0, y: 1 } }, TOL)).toEqual([]);
  });

  it('both halves make the whole, in area and joined again', () => {
    const star = fc.array(
      fc.record({ radius: fc.integer({ min: 20, max: 60 }), bulge: fc.integer({ min: -15, max: 15 }) }),
      { minLength: 3, maxLength: 10 },
    );
    fc.assert(
      fc.property(
        star,
        fc.integer({ min: 0, max: 359 }),
        fc.integer({ min: -20, max: 20 }),
        (corners, angleDeg, offset) => {
          const loop = loopFromBulges(
            corners.map(({ radius, bulge }, index) => {
              const angle = (2 * Math.PI * index) / corners.length + 0.1;
              return { start: { x: radius * Math.cos(angle), y: radius * Math.sin(angle) }, bulge: bulge / 100 };
            }),
          );
          const inward = { x: Math.cos((angleDeg * Math.PI) / 180), y: Math.sin((angleDeg * Math.PI) / 180) };
          const origin = { x: inward.x * offset, y: inward.y * offset };
          const kept = clipRegion([loop], { origin, inward }, TOL);
          const rest = clipRegion([loop], { origin, inward: { x: -inward.x, y: -inward.y } }, TOL);
          expect(total(kept) + total(rest)).toBeCloseTo(signedArea(loop), 5);
          const joined = joinPieces([...kept, ...rest], 2 * TOL);
          expect(total(joined)).toBeCloseTo(signedArea(loop), 5);
        },
      ),
      { numRuns: 200 },
    );
  });
});

describe('joining pieces', () => {
  it('removes the shared edge and the corners it leaves on a straight run', () => {
    const left = polygonLoop([
      { x: 0, y: 0 },
      { x: 10, y: 0 },
      { x: 10, y: 10 },
      { x: 0, y: 10 },
    ]);
    const right = polygonLoop([
      { x: 10, y: 0 },
      { x: 15, y: 0 },
      { x: 15, y: 10 },
      { x: 10, y: 10 },
    ]);
    expect(joinPieces([left, right], TOL)).toMatchObject([{ length: 4 }]);
    const tab = polygonLoop([
      { x: 10, y: 2 },
      { x: 15, y: 2 },
      { x: 15, y: 8 },
      { x: 10, y: 8 },
    ]);
    expect(joinPieces([left, tab], TOL)).toMatchObject([{ length: 8 }]);
  });

  it('says so when pieces do not close', () => {
    expect(joinPieces([[{ kind: 'line', from: { x: 0, y: 0 }, to: { x: 1, y: 0 } }]], TOL)).toBeNull();
  });
});

describe('small tools', () => {
  it('takes openings out of a stretch', () => {
    const stretch = { from: { x: 0, y: 0 }, to: { x: 20, y: 0 } };
    const left = outsideOpenings(stretch, [circleLoop({ x: 10, y: 0 }, 2), circleLoop({ x: 19.5, y: 0 }, 1)]);
    expect(left.map(({ from, to }) => [from.x, to.x])).toEqual([
      [0, expect.closeTo(8, 9)],
      [expect.closeTo(12, 9), expect.closeTo(18.5, 9)],
    ]);
  });

  it('measures clearances of loops and points', () => {
    expect(loopClearance(circleLoop({ x: 0, y: 0 }, 3), circleLoop({ x: 10, y: 0 }, 2))?.distanceMm).toBeCloseTo(5, 9);
    expect(pointToLoop({ x: 0, y: 0 }, circleLoop({ x: 0, y: 0 }, 3))?.distanceMm).toBeCloseTo(3, 9);
    expect(loopClearance([], circleLoop({ x: 0, y: 0 }, 1))).toBeNull();
  });

  it('triangulates with every corner kept, openings left open', () => {
    const outer = [
      { x: 0, y: 0 },
      { x: 5, y: 0 },
      { x: 10, y: 0 },
      { x: 10, y: 10 },
      { x: 5, y: 10 },
      { x: 0, y: 10 },
    ];
    const opening = [
      { x: 4, y: 4 },
      { x: 4, y: 6 },
      { x: 6, y: 6 },
      { x: 6, y: 4 },
    ];
    const triangles = triangulate(outer, [opening]);
    const points = [...outer, ...opening];
    let area = 0;
    for (let at = 0; at < triangles.length; at += 3) {
      const [a, b, c] = [points[triangles[at] ?? 0], points[triangles[at + 1] ?? 0], points[triangles[at + 2] ?? 0]];
      if (a === undefined || b === undefined || c === undefined) throw new Error('index out of range');
      const twice = (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
      expect(twice).toBeGreaterThan(0);
      area += twice / 2;
    }
    expect(area).toBeCloseTo(96, 9);
    expect(new Set(triangles).size).toBe(points.length);
  });

  it('carries an edge on through two arcs without a kink', () => {
    const leaving = { x: 1, y: 0 };
    const arriving = { x: Math.SQRT1_2, y: Math.SQRT1_2 };
    const [first, second] = biarc({ x: 0, y: 0 }, leaving, { x: 10, y: 4 }, arriving);
    if (first === undefined || second === undefined) throw new Error('two pieces expected');
    expect(tangentAt(first, 0).x).toBeCloseTo(1, 9);
    expect(tangentAt(second, 1).x).toBeCloseTo(Math.SQRT1_2, 9);
    expect(tangentAt(first, 1).x).toBeCloseTo(tangentAt(second, 0).x, 9);
    expect(tangentAt(first, 1).y).toBeCloseTo(tangentAt(second, 0).y, 9);
  });
});
