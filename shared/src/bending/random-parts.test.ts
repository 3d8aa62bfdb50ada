import fc from 'fast-check';
import { developLayout } from './develop';
import type { Development, DevelopmentResult } from './development';
import { segmentLength } from '../geometry/segment';
import { layOutMesh, poseFormed } from './formed-mesh';
import { meshFacts } from './testing/mesh-facts';
import { layoutOfPart, mirrored, randomPart, turned } from './testing/random-parts';
import { runs } from './testing/runs';
import { sampleStock } from './testing/sample-layouts';

jest.setTimeout(60_000 + runs() * 150);

/** Coarse on purpose: that the mesh closes and holds its volume does not depend on it. */
const CHORD_ERROR_MM = 0.2;

describe('random parts with flanges, returns, reliefs and holes in bend zones', () => {
  it('give a closed mesh of the right volume inside the formed box, or a typed problem', () => {
    let made = 0;
    fc.assert(
      fc.property(randomPart, (part) => {
        const result = developLayout(layoutOfPart(part), null, sampleStock());
        if (!result.ok) {
          // Holes may overlap each other; nothing else about these parts cannot be made.
          expect(
            result.problems.every(
              ({ code, ids }) => code === 'outlineNotSimple' && ids.some((id) => id.startsWith('hole')),
            ),
          ).toBe(true);
          return;
        }
        made += 1;
        const { development } = result;
        const foldable = layOutMesh(development, CHORD_ERROR_MM);
        const flat = meshFacts(poseFormed(foldable, 0));
        expect(flat).toMatchObject({ openEdges: 0, isFinite: true });
        expect(Math.abs(flat.volumeMm3 / (2 * development.flat.areaMm2) - 1)).toBeLessThan(0.01);
        const formed = meshFacts(poseFormed(foldable, 1));
        expect(formed).toMatchObject({ openEdges: 0, isFinite: true });
        (['x', 'y', 'z'] as const).forEach((axis, index) => {
          expect(formed.min[index] ?? NaN).toBeGreaterThan(development.formedBox.min[axis] - 0.000001);
          expect(formed.max[index] ?? NaN).toBeLessThan(development.formedBox.max[axis] + 0.000001);
          expect((formed.min[index] ?? NaN) - development.formedBox.min[axis]).toBeLessThan(CHORD_ERROR_MM + 0.01);
          expect(development.formedBox.max[axis] - (formed.max[index] ?? NaN)).toBeLessThan(CHORD_ERROR_MM + 0.01);
        });
      }),
      { numRuns: runs() },
    );
    expect(made).toBeGreaterThan(runs() / 2);
  });

  it('come out the same when the layout is turned or seen from behind', () => {
    fc.assert(
      fc.property(randomPart, fc.integer({ min: 1, max: 359 }), (part, turnDeg) => {
        const layout = layoutOfPart(part);
        const first = developLayout(layout, null, sampleStock());
        const others = [turned(layout, turnDeg), mirrored(layout)].map((one) =>
          developLayout(one, null, sampleStock()),
        );
        for (const other of others) {
          expect(other.ok).toBe(first.ok);
          if (!first.ok || !other.ok) continue;
          expect(other.development.flat.areaMm2).toBeCloseTo(first.development.flat.areaMm2, 4);
          expect(other.development.flat.cutLengthMm).toBeCloseTo(first.development.flat.cutLengthMm, 4);
          const values = ({ development }: typeof first): readonly number[] =>
            development.formedSizes.map(({ valueMm }) => valueMm);
          values(other).forEach((value, index) => expect(value).toBeCloseTo(values(first)[index] ?? NaN, 5));
          const heightOf = ({ formedBox }: Development): number => formedBox.max.z - formedBox.min.z;
          expect(heightOf(other.development)).toBeCloseTo(heightOf(first.development), 5);
        }
      }),
      { numRuns: runs() },
    );
  });

  it('have the same flat whichever panel is the base', () => {
    fc.assert(
      fc.property(randomPart, fc.nat(8), (part, pick) => {
        const layout = layoutOfPart(part);
        const first = developLayout(layout, null, sampleStock());
        if (!first.ok) return;
        const { panels } = first.development;
        const panel = panels[pick % panels.length];
        const corners = panel?.layoutOuter.map(({ from }) => from) ?? [];
        const middle = corners.reduce(
          (sum, { x, y }) => ({ x: sum.x + x / corners.length, y: sum.y + y / corners.length }),
          { x: 0, y: 0 },
        );
        const second = developLayout({ ...layout, baseAnchor: middle }, null, sampleStock());
        if (!second.ok) throw new Error(second.problems[0]?.message);
        expect(second.development.flat.areaMm2).toBeCloseTo(first.development.flat.areaMm2, 6);
        const corner = first.development.flat.outer.map(({ from }) => from);
        const size = ({ flat }: Development): readonly number[] => [
          flat.bounds.max.x - flat.bounds.min.x,
          flat.bounds.max.y - flat.bounds.min.y,
        ];
        expect(size(second.development)[0]).toBeCloseTo(size(first.development)[0] ?? NaN, 6);
        expect(size(second.development)[1]).toBeCloseTo(size(first.development)[1] ?? NaN, 6);
        expect(second.development.flat.outer).toHaveLength(corner.length);
        expect(isSameRound(edgeLengths(first), edgeLengths(second))).toBe(true);
      }),
      { numRuns: runs() },
    );
  });
});

function edgeLengths({ development }: Extract<DevelopmentResult, { readonly ok: true }>): readonly number[] {
  return development.flat.outer.map(segmentLength);
}

/** Whether two rounds of lengths are the same, wherever they begin: so they are for an outline that was moved. */
function isSameRound(a: readonly number[], b: readonly number[]): boolean {
  return a.some((_, shift) =>
    a.every((length, index) => Math.abs(length - (b[(index + shift) % b.length] ?? Number.NaN)) < 1e-6),
  );
}
