import fc from 'fast-check';
import { loopLength } from '../geometry/loop';
import { bendAllowanceMm } from './allowance';
import type { Development } from './development';
import type { CardReading, Layout } from './layout';
import { randomStrip, stripOf } from './testing/random-strips';
import { hatLayout, lLayout, sampleStock, stripLayout, trayLayout, uLayout, zLayout } from './testing/sample-layouts';
import { WORKED_STRIPS } from './testing/worked-values';
import { boxOf, developed, sizeOf } from './testing/developed';
import { runs } from './testing/runs';

describe('flat lengths of whole layouts', () => {
  it.each(WORKED_STRIPS)('$id', ({ legsMm, reference, thicknessMm, bendAngleDeg, insideRadiusMm, kFactor, flatMm }) => {
    const bend = { bendAngleDeg, reference, kFactor };
    const layout = stripLayout(
      legsMm,
      legsMm.slice(1).map(() => bend),
    );
    const development = developed(layout, sampleStock({ thicknessMm, deliveredRadiusMm: insideRadiusMm }));
    expect(Math.abs(sizeOf(development)[0] - flatMm)).toBeLessThan(0.0002);
  });
});

describe('from card to metal, 50 + 30 at 90 degrees', () => {
  const layout = (reading: CardReading | null): Layout => {
    const typed = stripLayout([50, 30], [{ kFactor: 0.33 }]);
    return {
      ...typed,
      bends: typed.bends.map((bend) => ({ ...bend, lengths: { from: 'template', override: reading } as const })),
    };
  };
  const middle = { kind: 'middle' } as const;
  it.each([
    [76.18, 'faceB', 'B'],
    [80.18, 'faceA', 'A'],
    [79.18, 'crease', 'B'],
    [77.18, 'crease', 'A'],
  ] as const)('%s mm read on %s, face %s bearing', (flatMm, readOn, bearingFace) => {
    const reading = { readOn, bearingFace, hinge: middle };
    expect(
      Math.abs(sizeOf(developed(layout(null), sampleStock(), { thicknessMm: 3, reading }))[0] - flatMm),
    ).toBeLessThan(0.01);
    const other = { thicknessMm: 3, reading: { readOn: 'faceA', bearingFace: 'B', hinge: middle } } as const;
    expect(Math.abs(sizeOf(developed(layout(reading), sampleStock(), other))[0] - flatMm)).toBeLessThan(0.01);
  });

  it('brings the bearing face of the metal where the card had it', () => {
    const reading: CardReading = { readOn: 'crease', bearingFace: 'B', hinge: middle };
    const development = developed(layout(null), sampleStock(), { thicknessMm: 3, reading });
    // Card outside legs: 1.5 mm more than at mid-thickness, and face B is outside a bend towards.
    expect(boxOf(development)[0]).toBeCloseTo(51.5, 6);
    expect(boxOf(development)[2]).toBeCloseTo(31.5, 6);
  });
});

describe('formed outside sizes', () => {
  const mm = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
  const stock = fc
    .record({ thicknessMm: mm(0.5, 3), deliveredRadiusMm: mm(0.3, 4) })
    .map((sheet) => sampleStock(sheet));
  const kFactor = mm(0.1, 0.5);

  it('are the typed ones for an L', () => {
    fc.assert(
      fc.property(mm(20, 200), mm(20, 200), stock, kFactor, (first, second, sheet, k) => {
        const [x, , z] = boxOf(developed(lLayout(first, second, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - first)).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - second)).toBeLessThan(0.01);
      }),
      { numRuns: runs() },
    );
  });

  it('are the typed ones for a U', () => {
    fc.assert(
      fc.property(mm(20, 200), mm(20, 200), stock, kFactor, (flange, web, sheet, k) => {
        const [x, , z] = boxOf(developed(uLayout(flange, web, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - web)).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - flange)).toBeLessThan(0.01);
      }),
      { numRuns: runs() },
    );
  });

  it('are the typed ones for a Z, its web measured over everything', () => {
    fc.assert(
      fc.property(mm(20, 200), mm(20, 200), mm(20, 200), stock, kFactor, (first, web, second, sheet, k) => {
        const [x, , z] = boxOf(developed(zLayout(first, web, second, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - (first + second - sheet.thicknessMm))).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - web)).toBeLessThan(0.01);
      }),
      { numRuns: runs() },
    );
  });

  it('are the typed ones for a hat', () => {
    fc.assert(
      fc.property(mm(20, 100), mm(20, 100), mm(20, 200), stock, kFactor, (brim, side, crown, sheet, k) => {
        const [x, , z] = boxOf(developed(hatLayout(brim, side, crown, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - (crown + 2 * brim - 2 * sheet.thicknessMm))).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - side)).toBeLessThan(0.01);
      }),
      { numRuns: runs() },
    );
  });

  it('are inside sizes plus the sheet for a tray', () => {
    const development = developed(trayLayout(100, 60, 20));
    expect(boxOf(development)).toEqual([expect.closeTo(104, 6), expect.closeTo(64, 6), expect.closeTo(22, 6)]);
  });

  it('are listed for callipers with what spreads them', () => {
    const { formedSizes } = developed(uLayout());
    expect(formedSizes.map(({ valueMm }) => valueMm)).toEqual([
      expect.closeTo(60, 9),
      expect.closeTo(30, 9),
      expect.closeTo(30, 9),
    ]);
    // Two bends between the gauge and the far side: gauging counts twice, as squares.
    expect(formedSizes[0]?.spreadMm ?? 0).toBeGreaterThan(0.4 * Math.SQRT2);
    expect(formedSizes[0]?.mostlyFrom).toBe('gauging on the brake');
  });
});

describe('every development', () => {
  it('has zones exactly one allowance long', () => {
    fc.assert(
      fc.property(randomStrip(), (strip) => {
        const { zones, bendTable } = developed(stripOf(strip), strip.stock);
        for (const zone of zones) {
          const row = bendTable.find(({ bendId }) => bendId === zone.bendId);
          const allowance = bendAllowanceMm({ ...zone, thicknessMm: strip.stock.thicknessMm });
          expect(row?.bendAllowanceMm).toBeCloseTo(allowance, 9);
          expect((loopLength(zone.outer) - 2 * strip.widthMm) / 2).toBeCloseTo(allowance, 6);
        }
      }),
      { numRuns: runs() },
    );
  });

  it('has the same flat whichever panel is the base', () => {
    fc.assert(
      fc.property(randomStrip(), fc.nat(5), (strip, pick) => {
        const first = developed(stripOf(strip), strip.stock);
        const second = developed(stripOf(strip, pick % strip.legsMm.length), strip.stock);
        expect(sizeOf(second)[0]).toBeCloseTo(sizeOf(first)[0], 9);
        expect(second.flat.areaMm2).toBeCloseTo(first.flat.areaMm2, 6);
        const linesOf = ({ flat }: Development): readonly number[] =>
          flat.bends
            .flatMap(({ centreLines }) => centreLines.map(({ from }) => from.x - flat.bounds.min.x))
            .sort((a, b) => a - b);
        linesOf(second).forEach((x, index) => expect(x).toBeCloseTo(linesOf(first)[index] ?? NaN, 9));
      }),
      { numRuns: runs() },
    );
  });

  it('has an area that is its length times its width, and mass from it', () => {
    fc.assert(
      fc.property(randomStrip(), (strip) => {
        const { flat } = developed(stripOf(strip), strip.stock);
        const area = (flat.bounds.max.x - flat.bounds.min.x) * strip.widthMm;
        expect(flat.areaMm2).toBeCloseTo(area, 5);
        expect(flat.massKg).toBeCloseTo((area * strip.stock.thicknessMm * 7850) / 1e9, 9);
        expect(flat.cutLengthMm).toBeCloseTo(2 * (flat.bounds.max.x - flat.bounds.min.x + strip.widthMm), 6);
        expect(flat.pierces).toBe(1);
      }),
      { numRuns: runs() },
    );
  });
});
