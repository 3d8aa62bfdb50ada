import { segmentLength, tangentAt } from '../geometry/segment';
import { dot } from '../geometry/vector';
import { developLayout } from './develop';
import { boxOf, developed, sizeOf } from './testing/developed';
import { EDGES } from './testing/named-parts/edges';
import { IMPOSSIBLE_PARTS } from './testing/named-parts/impossible';
import { MILD } from './testing/named-parts/named-part';
import { PLATES } from './testing/named-parts/plates';
import { CARD_STRIPS, STRIPS } from './testing/named-parts/strips';

const WITHIN_MM = 0.005;
const PARTS = [...STRIPS, ...CARD_STRIPS, ...PLATES, ...EDGES];

function expectNear(found: readonly number[], expected: readonly number[]): void {
  expect(found).toHaveLength(expected.length);
  found.forEach((value, index) => expect(Math.abs(value - (expected[index] ?? NaN))).toBeLessThan(WITHIN_MM));
}

describe('parts people bend, against sizes worked out by hand', () => {
  it('are kept: at least 24 of them, no two alike', () => {
    expect(new Set(PARTS.map(({ name }) => name)).size).toBe(PARTS.length);
    expect(PARTS.length).toBeGreaterThanOrEqual(24);
  });

  it.each(PARTS.map((part) => [part.name, part] as const))('%s', (_, part) => {
    const development = developed(part.layout, part.stock, part.template ?? null);
    expectNear(sizeOf(development), part.flatMm);
    expectNear(boxOf(development), part.formedMm);
    expect(development.reliefs.map(({ state }) => state)).toEqual(
      Array.from({ length: part.reliefs ?? 0 }, () => 'added'),
    );
    if (part.areaMm2 !== undefined) expectNear([development.flat.areaMm2], [part.areaMm2]);
    for (const [id, middle] of Object.entries(part.holesMm ?? {})) {
      const hole = development.flat.holes.find(({ featureId }) => featureId === id);
      expectNear([hole?.centre.x ?? NaN, hole?.centre.y ?? NaN], middle);
    }
  });

  it('have no kink in a blended side, and one of 17 degrees in a trimmed one', () => {
    const steepest = (name: string): number => {
      const part = EDGES.find((one) => one.name === name);
      if (part === undefined) throw new Error(`There is no part ${name}.`);
      const { outer } = developed(part.layout, part.stock).flat;
      const cosines = outer.flatMap((segment, index): readonly number[] => {
        const next = outer[(index + 1) % outer.length] ?? segment;
        const cosine = dot(tangentAt(segment, 1), tangentAt(next, 0));
        // The corners of the part itself turn by 60 degrees and more.
        return segmentLength(segment) > 0 && cosine > 0.5 ? [cosine] : [];
      });
      return (Math.acos(Math.min(1, ...cosines)) * 180) / Math.PI;
    };
    expect(steepest('sides leaning one way, blended')).toBeLessThan(0.01);
    // atan(4 / 4.178318) - atan(1 / 2) = 43.751 - 26.565
    expect(steepest('sides leaning one way, trimmed')).toBeCloseTo(17.186, 2);
  });
});

describe('parts that cannot be', () => {
  it.each(IMPOSSIBLE_PARTS.map((part) => [part.name, part] as const))('%s', (_, { layout, code, offenders }) => {
    const result = developLayout(layout, null, MILD);
    if (result.ok) throw new Error('This part must not come out.');
    expect(result.problems.map(({ ids }) => ids)).toEqual(offenders);
    for (const problem of result.problems) {
      expect(problem.code).toBe(code);
      // People know bends by their place in the list: B1, B2.
      for (const id of problem.ids) {
        const place = layout.bends.findIndex((bend) => bend.id === id);
        expect(problem.message).toContain(`B${String(place + 1)}`);
      }
    }
  });
});
