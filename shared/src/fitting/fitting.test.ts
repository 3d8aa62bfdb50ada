import type { Point } from '../geometry/point';
import { fitLoop } from './loop-fit';
import { fitCircle, fitObround } from './round-opening';
import type { TracePrimitive } from './trace';

/** Repeatable noise, about normal, mm. */
function noise(sigmaMm: number): () => number {
  let state = 12345;
  const next = (): number => {
    state = (state * 1103515245 + 12345) % 2147483648;
    return state / 2147483648;
  };
  return () => (next() + next() + next() + next() - 2) * Math.sqrt(3) * sigmaMm;
}

function alongLine(from: Point, to: Point, stepMm: number): Point[] {
  const count = Math.round(Math.hypot(to.x - from.x, to.y - from.y) / stepMm);
  return Array.from({ length: count }, (_, k) => ({
    x: from.x + ((to.x - from.x) * k) / count,
    y: from.y + ((to.y - from.y) * k) / count,
  }));
}

function alongArc(centre: Point, radiusMm: number, fromDeg: number, toDeg: number, stepMm: number): Point[] {
  const sweep = ((toDeg - fromDeg) * Math.PI) / 180;
  const count = Math.round((Math.abs(sweep) * radiusMm) / stepMm);
  return Array.from({ length: count }, (_, k) => {
    const angle = (fromDeg * Math.PI) / 180 + (sweep * k) / count;
    return { x: centre.x + radiusMm * Math.cos(angle), y: centre.y + radiusMm * Math.sin(angle) };
  });
}

function shaken(points: readonly Point[], sigmaMm: number): Point[] {
  const shake = noise(sigmaMm);
  return points.map(({ x, y }) => ({ x: x + shake(), y: y + shake() }));
}

/** A plate 80 x 50 with three sharp corners and one of radius 10. */
function plate(): Point[] {
  return [
    ...alongLine({ x: 0, y: 0 }, { x: 80, y: 0 }, 0.3),
    ...alongLine({ x: 80, y: 0 }, { x: 80, y: 40 }, 0.3),
    ...alongArc({ x: 70, y: 40 }, 10, 0, 90, 0.3),
    ...alongLine({ x: 70, y: 50 }, { x: 0, y: 50 }, 0.3),
    ...alongLine({ x: 0, y: 50 }, { x: 0, y: 0 }, 0.3),
  ];
}

function gapMm(loop: readonly TracePrimitive[]): number {
  return Math.max(
    ...loop.map(({ to }, index) => {
      const next = loop[(index + 1) % loop.length];
      return next ? Math.hypot(to[0] - next.from[0], to[1] - next.from[1]) : 0;
    }),
  );
}

/** Angle between the ends of two neighbours at their joint, degrees. */
function bendDeg(before: TracePrimitive, after: TracePrimitive): number {
  const heading = (primitive: TracePrimitive, isEnd: boolean): number => {
    if (primitive.kind === 'line')
      return Math.atan2(primitive.to[1] - primitive.from[1], primitive.to[0] - primitive.from[0]);
    const at = isEnd ? primitive.to : primitive.from;
    const out = Math.atan2(at[1] - primitive.centre[1], at[0] - primitive.centre[0]);
    return out + (primitive.clockwise ? -Math.PI / 2 : Math.PI / 2);
  };
  const turn = heading(after, false) - heading(before, true);
  return Math.abs((Math.atan2(Math.sin(turn), Math.cos(turn)) * 180) / Math.PI);
}

/** A plate whose upper right corner turns by 38 degrees only, rounded with R 8: the arc is 5.3 mm long and bulges by 0.44. */
function gentlyRounded(): Point[] {
  const turn = (38 * Math.PI) / 180;
  const tangentMm = 8 * Math.tan(turn / 2);
  const tip = { x: 60, y: 40 };
  // Up along x = 60, then on to the left by 38 degrees.
  const way = { x: -Math.sin(turn), y: Math.cos(turn) };
  const end = { x: tip.x + 30 * way.x, y: tip.y + 30 * way.y };
  const touch = { x: tip.x + tangentMm * way.x, y: tip.y + tangentMm * way.y };
  return [
    ...alongLine({ x: 0, y: 0 }, { x: 60, y: 0 }, 0.3),
    ...alongLine({ x: 60, y: 0 }, { x: 60, y: 40 - tangentMm }, 0.3),
    ...alongArc({ x: 52, y: 40 - tangentMm }, 8, 0, 38, 0.3),
    ...alongLine(touch, end, 0.3),
    ...alongLine(end, { x: 0, y: end.y }, 0.3),
    ...alongLine({ x: 0, y: end.y }, { x: 0, y: 0 }, 0.3),
  ];
}

/** An edge that a shadow bends by a tenth of a millimetre half way along, as two edges at an angle would. */
function bentByShadow(): Point[] {
  return [
    ...alongLine({ x: 0, y: 0 }, { x: 60, y: 0.1 }, 0.3),
    ...alongLine({ x: 60, y: 0.1 }, { x: 120, y: 0 }, 0.3),
    ...alongLine({ x: 120, y: 0 }, { x: 120, y: 40 }, 0.3),
    ...alongLine({ x: 120, y: 40 }, { x: 0, y: 40 }, 0.3),
    ...alongLine({ x: 0, y: 40 }, { x: 0, y: 0 }, 0.3),
  ];
}

describe('fitLoop', () => {
  it.each([0, 0.03])('rounds a corner that turns by 38 degrees with R 8 under %p mm of noise', (sigmaMm) => {
    const loop = fitLoop(shaken(gentlyRounded(), sigmaMm))?.primitives ?? [];
    expect(loop.map(({ kind }) => kind).sort()).toEqual(['arc', 'line', 'line', 'line', 'line', 'line']);
    const arc = loop.find(({ kind }) => kind === 'arc');
    if (arc?.kind !== 'arc') throw new Error('no arc');
    expect(Math.abs(Math.hypot(arc.from[0] - arc.centre[0], arc.from[1] - arc.centre[1]) - 8)).toBeLessThan(1);
    expect(gapMm(loop)).toBeLessThan(0.01);
  });

  it('keeps one edge where a shadow bends it a little, and two where they differ', () => {
    expect(fitLoop(shaken(bentByShadow(), 0.02))?.primitives).toHaveLength(4);
    const bent = bentByShadow().map(({ x, y }) => ({ x, y: y < 5 ? y * 8 : y }));
    expect(fitLoop(shaken(bent, 0.02))?.primitives).toHaveLength(5);
  });

  it.each([0, 0.03, 0.06])('finds four lines and one tangent arc under %p mm of noise', (sigmaMm) => {
    const fit = fitLoop(shaken(plate(), sigmaMm));
    expect(fit?.primitives.map(({ kind }) => kind).sort()).toEqual(['arc', 'line', 'line', 'line', 'line']);
    const loop = fit?.primitives ?? [];
    expect(gapMm(loop)).toBeLessThan(1e-9);
    const arcAt = loop.findIndex(({ kind }) => kind === 'arc');
    const arc = loop[arcAt];
    if (arc?.kind !== 'arc') throw new Error('no arc');
    expect(Math.hypot(arc.from[0] - arc.centre[0], arc.from[1] - arc.centre[1])).toBeCloseTo(10, sigmaMm === 0 ? 2 : 0);
    expect(arc.clockwise).toBe(false);
    const before = loop[(arcAt + 4) % 5];
    const after = loop[(arcAt + 1) % 5];
    if (!before || !after) throw new Error('no neighbours');
    expect(bendDeg(before, arc)).toBeLessThan(0.1);
    expect(bendDeg(arc, after)).toBeLessThan(0.1);
  });

  it('puts sharp corners where the lines cross, within a fiftieth of a millimetre', () => {
    const corners = (fitLoop(shaken(plate(), 0.04))?.primitives ?? []).map(({ from }) => from);
    for (const [x, y] of [
      [0, 0],
      [80, 0],
      [0, 50],
    ] as const) {
      expect(Math.min(...corners.map((c) => Math.hypot(c[0] - x, c[1] - y)))).toBeLessThan(0.04);
    }
  });

  it('keeps to the points after a gap in them', () => {
    const points = plate().filter(({ x, y }) => !(y === 0 && x > 20 && x < 45));
    expect(fitLoop(points)?.primitives).toHaveLength(5);
  });

  it('answers null for too few points', () => {
    expect(
      fitLoop([
        { x: 0, y: 0 },
        { x: 1, y: 0 },
        { x: 1, y: 1 },
      ]),
    ).toBeNull();
  });
});

describe('round openings', () => {
  it('finds a circle from half of it, outliers held back', () => {
    const points = shaken(alongArc({ x: 5, y: -3 }, 4, 10, 200, 0.1), 0.02);
    points.push({ x: 5, y: -3 }, { x: 12, y: -3 });
    const fit = fitCircle(points);
    expect(fit?.centre.x).toBeCloseTo(5, 1);
    expect(fit?.centre.y).toBeCloseTo(-3, 1);
    expect(fit?.radiusMm).toBeCloseTo(4, 1);
  });

  it('finds an obround standing at an angle', () => {
    const upright = [
      ...alongLine({ x: -8, y: -3 }, { x: 8, y: -3 }, 0.2),
      ...alongArc({ x: 8, y: 0 }, 3, -90, 90, 0.2),
      ...alongLine({ x: 8, y: 3 }, { x: -8, y: 3 }, 0.2),
      ...alongArc({ x: -8, y: 0 }, 3, 90, 270, 0.2),
    ];
    const turn = (37 * Math.PI) / 180;
    const points = upright.map(({ x, y }) => ({
      x: 100 + x * Math.cos(turn) - y * Math.sin(turn),
      y: 40 + x * Math.sin(turn) + y * Math.cos(turn),
    }));
    const fit = fitObround(shaken(points, 0.02));
    if (!fit) throw new Error('no obround');
    expect(fit.widthMm).toBeCloseTo(6, 1);
    expect(Math.hypot(fit.to.x - fit.from.x, fit.to.y - fit.from.y)).toBeCloseTo(16, 1);
    expect((fit.from.x + fit.to.x) / 2).toBeCloseTo(100, 1);
    expect(fit.rmsMm).toBeLessThan(0.04);
  });
});
