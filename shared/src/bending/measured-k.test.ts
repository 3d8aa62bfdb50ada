import { bendDeductionMm } from './allowance';
import type { BenderDeduction } from './bend-measurements';
import type { BendingStock } from './development';
import { chooseKFactor } from './k-factor';
import type { BendOverride } from './layout';
import { fitStrips } from './strip-series';
import { sampleStock } from './testing/sample-layouts';

const BEND = { bendAngleDeg: 90, insideRadiusMm: 2, thicknessMm: 2 };
const TABLE = [{ ratioFrom: 0, ratioTo: null, kFactor: 0.4, source: 'own table', confidence: 'published' }] as const;
const BY_HAND: BendOverride = { kind: 'kFactor', kFactor: 0.35, reason: 'this coil is soft' };

/** Sample sheet is 2 mm of dc01 in V 16 at R 2. K 0.44 there. */
const BENDER: BenderDeduction = {
  benderName: 'Hill Street Bending',
  materialId: 'dc01',
  thicknessMm: 2,
  vOpeningMm: 16,
  bendAngleDeg: 90,
  insideRadiusMm: 2,
  deductionMm: bendDeductionMm({ ...BEND, kFactor: 0.44 }, 'outsideApex'),
  reference: 'outsideApex',
  count: 5,
  halfWidthMm: 0.08,
};

const strip = (thicknessMm: number, insideRadiusMm: number, kFactor: number, bendAngleDeg = 90, vOpeningMm = 12) => ({
  id: `t${String(thicknessMm)}r${String(insideRadiusMm)}a${String(bendAngleDeg)}`,
  materialId: 'dc01',
  thicknessMm,
  vOpeningMm,
  bendAngleDeg,
  insideRadiusMm,
  blankMm: 100 - bendDeductionMm({ bendAngleDeg, thicknessMm, insideRadiusMm, kFactor }, 'tangent'),
  legsMm: [60, 40] as const,
  reference: 'tangent' as const,
});

function stockWith(
  benderDeductions: readonly BenderDeduction[],
  strips: readonly ReturnType<typeof strip>[],
  changes: Partial<BendingStock> = {},
): BendingStock {
  return sampleStock({ ...changes, measurements: { benderDeductions, stripSeries: fitStrips(strips).series } });
}

describe('order of the sources with measurements', () => {
  const everything = stockWith([BENDER], [strip(2, 2, 0.42, 90, 16)], { kTable: TABLE });
  it.each([
    ['entered by hand', BY_HAND, everything, 0.35, 'entered'],
    ['the bender’s deduction', null, everything, 0.44, 'measured'],
    ['own strips', null, stockWith([], [strip(2, 2, 0.42, 90, 16)], { kTable: TABLE }), 0.42, 'measured'],
    ['the table by material', null, stockWith([], [], { kTable: TABLE }), 0.4, 'published'],
    ['DIN 6935', null, stockWith([], []), 0.325, 'published'],
  ] as const)('takes %s', (_, override, stock, kFactor, confidence) => {
    const choice = chooseKFactor(BEND, override, stock);
    if (!choice.ok) throw new Error(choice.message);
    expect(choice.kFactor).toBeCloseTo(kFactor, 9);
    expect(choice.provenance.confidence).toBe(confidence);
  });

  it('names bender, deduction, reference, die and count', () => {
    const choice = chooseKFactor(BEND, null, everything);
    expect(choice.ok && choice.provenance.text).toBe(
      "Hill Street Bending's deduction 3.476 mm (outsideApex), V 16, n 5",
    );
    // 0.08 mm of deduction: 0.08 / (pi/2 * 2) = 0.0255 of K.
    expect(choice.ok && choice.halfWidth).toBeCloseTo(0.0255, 4);
  });
});

describe('a deduction of the bender', () => {
  it('comes out of the flat as it was measured even where the radius was misread a little', () => {
    const bend = { ...BEND, insideRadiusMm: 2.3 };
    const choice = chooseKFactor(bend, null, stockWith([BENDER], []));
    if (!choice.ok) throw new Error(choice.message);
    expect(bendDeductionMm({ ...bend, kFactor: choice.kFactor }, 'outsideApex')).toBeCloseTo(BENDER.deductionMm, 9);
  });

  it('is carried to another angle by K, and says so', () => {
    const choice = chooseKFactor({ ...BEND, bendAngleDeg: 60 }, null, stockWith([BENDER], []));
    expect(choice.ok && choice.kFactor).toBeCloseTo(0.44, 9);
    expect(choice.ok && choice.provenance.text).toContain('measured at 90° and carried over by K');
  });

  it('at the nearest angle counts', () => {
    const at45 = {
      ...BENDER,
      bendAngleDeg: 45,
      deductionMm: bendDeductionMm({ ...BEND, bendAngleDeg: 45, kFactor: 0.4 }, 'outsideApex'),
    };
    const choice = chooseKFactor({ ...BEND, bendAngleDeg: 50 }, null, stockWith([BENDER, at45], []));
    expect(choice.ok && choice.kFactor).toBeCloseTo(0.4, 9);
  });

  it.each([{ vOpeningMm: 12 }, { thicknessMm: 1.5 }, { materialId: 'ss304' }, { bendAngleDeg: 180 }])(
    'does not hold for another sheet, die or a hem: %j',
    (change) => {
      const other = { ...BENDER, ...change, reference: 'outsideTangent' } as const;
      expect(chooseKFactor(BEND, null, stockWith([other], []))).toMatchObject({ kFactor: 0.325, note: null });
    },
  );

  it('does not hold for another radius, and says so', () => {
    const choice = chooseKFactor({ ...BEND, insideRadiusMm: 4 }, null, stockWith([BENDER], []));
    expect(choice.ok && choice.provenance.source).toContain('DIN 6935');
    expect(choice.ok && choice.note).toContain('measured at an inside radius of 2 mm, not 4: not used');
  });

  it('that no sheet could have is passed over aloud', () => {
    const choice = chooseKFactor(BEND, null, stockWith([{ ...BENDER, deductionMm: 0 }], []));
    expect(choice.ok && choice.kFactor).toBe(0.325);
    expect(choice.ok && choice.note).toContain('which no sheet has: not used');
  });
});

describe('own strips', () => {
  // Other thicknesses of the same material: R/T 0.8 with K 0.38, R/T 1.6 with K 0.44.
  const strips = [strip(1.5, 1.2, 0.38), strip(3, 4.8, 0.44, 90, 25)];

  it('are interpolated over R/T', () => {
    const choice = chooseKFactor({ ...BEND, insideRadiusMm: 2.4 }, null, stockWith([], strips));
    // R/T 1.2 is half way.
    expect(choice.ok && choice.kFactor).toBeCloseTo(0.41, 9);
    expect(choice.ok && choice.provenance.text).toBe(
      'own strips, between R/T 0.8 (90°, V 12, n 1) and 1.6 (90°, V 25, n 1)',
    );
  });

  it.each([
    [1.6, 0.38],
    [3.2, 0.44],
  ])('hold at their own R/T, R %s', (insideRadiusMm, kFactor) => {
    const choice = chooseKFactor({ ...BEND, insideRadiusMm }, null, stockWith([], strips));
    expect(choice.ok && choice.kFactor).toBeCloseTo(kFactor, 9);
  });

  it.each([
    [1.58, 0.79],
    [3.22, 1.61],
  ])('are never carried beyond what they cover, R %s', (insideRadiusMm, ratio) => {
    const choice = chooseKFactor({ ...BEND, insideRadiusMm }, null, stockWith([], strips));
    expect(choice.ok && choice.provenance.source).toContain('DIN 6935');
    expect(choice.ok && choice.note).toContain(
      `own strips cover R/T 0.8 to 1.6, this bend has ${String(ratio)}: not carried beyond them`,
    );
  });

  it('in the very die count before those of other sheets', () => {
    const choice = chooseKFactor(BEND, null, stockWith([], [...strips, strip(2, 2, 0.36, 90, 16)]));
    expect(choice.ok && choice.kFactor).toBeCloseTo(0.36, 9);
    expect(choice.ok && choice.provenance.text).toContain('V 16, n 1');
  });

  it('of the nearest angle speak where several share one R/T', () => {
    const choice = chooseKFactor(
      { ...BEND, insideRadiusMm: 1.6, bendAngleDeg: 50 },
      null,
      stockWith([], [strip(1.5, 1.2, 0.3, 45), ...strips]),
    );
    expect(choice.ok && choice.kFactor).toBeCloseTo(0.3, 9);
  });

  it('of hems answer for hems, and only they', () => {
    const hems = [strip(2, 2, 0.4, 180, 16)];
    expect(chooseKFactor({ ...BEND, bendAngleDeg: 180 }, null, stockWith([], hems))).toMatchObject({
      kFactor: expect.closeTo(0.4, 9),
    });
    expect(chooseKFactor({ ...BEND, bendAngleDeg: 180 }, null, stockWith([], strips))).toMatchObject({ kFactor: 0.5 });
    expect(chooseKFactor(BEND, null, stockWith([], hems))).toMatchObject({ kFactor: 0.325, note: null });
  });
});

describe('spread of what was not measured', () => {
  const bands = [{ ratioBelow: null, low: 0.38, high: 0.46, source: 'band', confidence: 'common-practice' }] as const;
  it('reaches to the far end of the band', () => {
    // DIN 0.325 at R = T lies below the band of steel: what comes out may be 0.135 more.
    expect(chooseKFactor(BEND, null, sampleStock({ kBands: bands }))).toMatchObject({
      halfWidth: expect.closeTo(0.135, 9),
    });
    expect(chooseKFactor(BEND, null, sampleStock())).toMatchObject({ halfWidth: 0.03 });
  });
});
