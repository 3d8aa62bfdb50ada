import * as fc from 'fast-check';
import { starterSchema } from '../contracts/parts';
import type { SheetStock, StockRole } from './part-document';
import { developPart } from './develop-part';
import { checkInvariants } from './invariants';
import { type StarterShape, starterDocument } from './starter-document';

function formedSize(starter: StarterShape, role: StockRole): readonly number[] {
  const result = developPart(starterDocument(starter), role);
  if (!result.ok) throw new Error(result.problems.map(({ message }) => message).join('; '));
  const { min, max } = result.development.formedBox;
  return [max.x - min.x, max.y - min.y, max.z - min.z];
}

const thicknessOf = (starter: StarterShape, role: StockRole): number =>
  (starterDocument(starter).stocks[role] satisfies SheetStock).thicknessMm;

const size = fc.double({ min: 30, max: 400, noNaN: true });
const role = fc.constantFrom<StockRole>('trial', 'production');

describe('starterDocument', () => {
  it('forms to the sizes that were typed, all outside', () => {
    fc.assert(
      fc.property(size, size, size, size, role, (a, b, c, widthMm, stock) => {
        const expectSize = (starter: StarterShape, expected: readonly number[]) => {
          const formed = formedSize(starter, stock);
          formed.forEach((sizeMm, axis) => {
            expect(Math.abs(sizeMm - (expected[axis] ?? 0))).toBeLessThan(0.01);
          });
        };
        const square = { widthMm, bendAngleDeg: 90 };
        expectSize({ shape: 'l-bracket', baseMm: a, flangeMm: b, ...square }, [a, widthMm, b]);
        expectSize({ shape: 'u-bracket', baseMm: a, leftFlangeMm: b, rightFlangeMm: c, ...square }, [
          a,
          widthMm,
          Math.max(b, c),
        ]);
        const z: StarterShape = { shape: 'z-bracket', webMm: a, lowerFlangeMm: b, upperFlangeMm: c, widthMm };
        expectSize(z, [a, widthMm, b + c - thicknessOf(z, stock)]);
        const hat: StarterShape = { shape: 'hat-section', topMm: a, sideMm: b, brimMm: c, widthMm };
        expectSize(hat, [a + 2 * (c - thicknessOf(hat, stock)), widthMm, b]);
        const tray: StarterShape = { shape: 'tray', lengthMm: a, widthMm: b, flangeMm: c / 8 + 20 };
        expectSize(tray, [a, b, c / 8 + 20]);
        const gussetMm = Math.min(a - 14, b) / 2 + 12;
        if (gussetMm <= Math.min(a - 13, b)) {
          expectSize({ shape: 'gusseted-l', baseMm: a, flangeMm: b, widthMm, gussetMm }, [a, widthMm, b]);
        }
        expectSize({ shape: 'flat-plate', widthMm: a, heightMm: b }, [a, b, thicknessOf(z, stock)]);
      }),
      { numRuns: 100 },
    );
  });

  it('keeps the base to size at any angle', () => {
    fc.assert(
      fc.property(size, fc.double({ min: 91, max: 165, noNaN: true }), role, (baseMm, bendAngleDeg, stock) => {
        // Beyond 90° the flange leans back over the base, so the base's outside is the part's whole length.
        const starter: StarterShape = { shape: 'l-bracket', baseMm, flangeMm: 28, widthMm: 40, bendAngleDeg };
        expect(formedSize(starter, stock)[0]).toBeCloseTo(baseMm, 6);
      }),
      { numRuns: 15 },
    );
  });

  it('leans out by its angle where that is less than 90°', () => {
    fc.assert(
      fc.property(
        size,
        size,
        fc.double({ min: 5, max: 90, noNaN: true }),
        role,
        (baseMm, flangeMm, bendAngleDeg, stock) => {
          const starter: StarterShape = { shape: 'l-bracket', baseMm, flangeMm, widthMm: 40, bendAngleDeg };
          const [cosine, sine] = [Math.cos((bendAngleDeg * Math.PI) / 180), Math.sin((bendAngleDeg * Math.PI) / 180)];
          const expected = [baseMm + flangeMm * cosine, 40, flangeMm * sine + thicknessOf(starter, stock) * cosine];
          formedSize(starter, stock).forEach((sizeMm, axis) => {
            expect(Math.abs(sizeMm - (expected[axis] ?? 0))).toBeLessThan(0.01);
          });
        },
      ),
      { numRuns: 50 },
    );
  });

  it.each(['trial', 'production'] as const)('ends every bend of a tray in a relief, in the %s sheet', (stock) => {
    for (const flangeMm of [12, 15, 25]) {
      const result = developPart(starterDocument({ shape: 'tray', lengthMm: 120, widthMm: 80, flangeMm }), stock);
      if (!result.ok) throw new Error('A tray can be developed.');
      // 9 mm at either end, on base and flange, so that no bend zone touches another or ends askew.
      expect(result.development.bendTable.map(({ bendLengthMm }) => bendLengthMm)).toEqual(
        [102, 62, 102, 62].map((lengthMm) => expect.closeTo(lengthMm, 9) as unknown),
      );
      for (const { outer } of result.development.zones) expect(outer).toHaveLength(4);
      expect(result.development.reliefs).toEqual([]);
    }
  });

  it('is a good document, the same every time, and one the contract takes', () => {
    const starter: StarterShape = {
      shape: 'u-bracket',
      baseMm: 80,
      leftFlangeMm: 30,
      rightFlangeMm: 25,
      widthMm: 60,
      bendAngleDeg: 75,
    };
    expect(checkInvariants(starterDocument(starter))).toEqual([]);
    expect(starterDocument(starter)).toEqual(starterDocument(starter));
    expect(starterSchema.parse(starter)).toEqual(starter);
  });

  it.each<[string, StarterShape]>([
    ['a gusset taller than its flange', { shape: 'gusseted-l', baseMm: 90, flangeMm: 40, widthMm: 50, gussetMm: 41 }],
    ['a tray without room for a flange', { shape: 'tray', lengthMm: 27, widthMm: 60, flangeMm: 20 }],
    ['a size of 0', { shape: 'flat-plate', widthMm: 0, heightMm: 10 }],
    ['a size that is no number', { shape: 'flat-plate', widthMm: Number.NaN, heightMm: 10 }],
    ['a bend that closes on itself', { shape: 'l-bracket', baseMm: 50, flangeMm: 30, widthMm: 20, bendAngleDeg: 170 }],
  ])('refuses %s', (_, starter) => {
    expect(() => starterDocument(starter)).toThrow(RangeError);
  });
});
