import fc from 'fast-check';
import { isReferenceAllowed, setbackMm } from './allowance';
import type { CardReading, Layout, LengthReference } from './layout';
import { boxOf, developed, sizeOf } from './testing/developed';
import { runs } from './testing/runs';
import { lLayout, sampleStock, stripLayout, zLayout } from './testing/sample-layouts';

jest.setTimeout(30_000 + runs() * 20);

const REFERENCES: readonly LengthReference[] = [
  'outsideApex',
  'insideApex',
  'outsideTangent',
  'insideTangent',
  'tangent',
];

const mm = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });

/** A bend with the reference its lengths are stated to, and another they can be stated to. */
const bend = fc
  .record({
    bendAngleDeg: fc.oneof(fc.constantFrom(90, 180), mm(5, 170)),
    direction: fc.constantFrom('towards', 'away'),
    kFactor: mm(0.1, 0.5),
    from: fc.constantFrom(...REFERENCES),
    to: fc.constantFrom(...REFERENCES),
  })
  .map((one) => {
    const allowed = (reference: LengthReference): LengthReference =>
      isReferenceAllowed(reference, one.bendAngleDeg) ? reference : 'tangent';
    return { ...one, from: allowed(one.from), to: allowed(one.to) };
  });

describe('lengths stated to another reference', () => {
  it('give the same blank and the same part, whatever the reference at each bend', () => {
    fc.assert(
      fc.property(
        fc.array(bend, { minLength: 1, maxLength: 4 }),
        fc.array(mm(20, 60), { minLength: 5, maxLength: 5 }),
        mm(0.5, 3),
        mm(0.3, 4),
        (bends, flats, thicknessMm, deliveredRadiusMm) => {
          const stock = sampleStock({ thicknessMm, deliveredRadiusMm });
          // Legs between tangent lines, each carried on at either end to what its lengths are stated to.
          const statedTo = (pick: 'from' | 'to'): Layout => {
            const setbacks = bends.map((one) =>
              setbackMm({ bendAngleDeg: one.bendAngleDeg, insideRadiusMm: deliveredRadiusMm, thicknessMm }, one[pick]),
            );
            const legs = flats
              .slice(0, bends.length + 1)
              .map((flatMm, index) => flatMm + (setbacks[index - 1] ?? 0) + (setbacks[index] ?? 0));
            return stripLayout(
              legs,
              bends.map((one) => ({ ...one, reference: one[pick] })),
            );
          };
          const first = developed(statedTo('from'), stock);
          const second = developed(statedTo('to'), stock);
          expect(sizeOf(second)[0]).toBeCloseTo(sizeOf(first)[0], 8);
          boxOf(second).forEach((sizeMm, axis) => expect(sizeMm).toBeCloseTo(boxOf(first)[axis] ?? NaN, 7));
          second.formedSizes.forEach(({ valueMm }, index) =>
            expect(valueMm).toBeCloseTo(first.formedSizes[index]?.valueMm ?? NaN, 8),
          );
          // The row states its deduction to the reference it names, so both rows stand for one allowance.
          second.bendTable.forEach((row, index) => {
            const other = first.bendTable[index];
            expect(row.deductionReference).toBe(bends[index]?.to);
            expect(other?.deductionReference).toBe(bends[index]?.from);
            const form = { ...row, thicknessMm };
            const shift = 2 * setbackMm(form, row.deductionReference);
            const otherShift = 2 * setbackMm(form, bends[index]?.from ?? 'tangent');
            expect(row.bendDeductionMm - shift).toBeCloseTo((other?.bendDeductionMm ?? NaN) - otherShift, 8);
          });
        },
      ),
      { numRuns: runs() },
    );
  });
});

function fromCard(layout: Layout): Layout {
  return { ...layout, bends: layout.bends.map((one) => ({ ...one, lengths: { from: 'template', override: null } })) };
}

const reading = (readOn: CardReading['readOn'], bearingFace: 'A' | 'B'): CardReading => ({
  readOn,
  bearingFace,
  hinge: { kind: 'middle' },
});

// 50 x 30 outside on 1.5 mm card; a bend towards has face B outside. Blank, then outside sizes of the metal.
describe('one template, two sheets', () => {
  it.each([
    ['steel of 1.5', 'B', 1.5, 1.5, 0.42, [77.35, 50, 30]],
    ['alloy of 3, outside held', 'B', 3, 4.5, 0.41, [74.0, 50, 30]],
    ['alloy of 3, inside held', 'A', 3, 4.5, 0.41, [77.0, 51.5, 31.5]],
  ] as const)('%s', (_, bearingFace, thicknessMm, deliveredRadiusMm, kFactor, expected) => {
    const made = developed(fromCard(lLayout(50, 30, { kFactor })), sampleStock({ thicknessMm, deliveredRadiusMm }), {
      thicknessMm: 1.5,
      reading: reading('faceB', bearingFace),
    });
    const [x, , z] = boxOf(made);
    [sizeOf(made)[0], x, z].forEach((found, index) =>
      expect(Math.abs((found ?? NaN) - (expected[index] ?? NaN))).toBeLessThan(0.01),
    );
  });
});

// The web reads 40 along one face of the card. In metal its sheet is added where that face is inside, and only there.
describe('a Z read on one face', () => {
  it.each(['faceA', 'faceB'] as const)('%s: the web over everything is 40 and one sheet', (readOn) => {
    for (const thicknessMm of [1, 2, 3]) {
      const made = developed(fromCard(zLayout(25, 40, 25, { kFactor: 0.4 })), sampleStock({ thicknessMm }), {
        thicknessMm: 3,
        reading: reading(readOn, readOn === 'faceA' ? 'A' : 'B'),
      });
      expect(boxOf(made)).toEqual([expect.closeTo(50, 6), expect.closeTo(40, 6), expect.closeTo(40 + thicknessMm, 6)]);
    }
  });
});
