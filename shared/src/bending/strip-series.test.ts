import fc from 'fast-check';
import { bendDeductionMm, isReferenceAllowed } from './allowance';
import { readStrip } from './bend-test-strip';
import type { BendTestStrip, StripReading } from './bend-test-strip';
import type { LengthReference } from './layout';
import { fitStrips } from './strip-series';
import { WORKED_BENDS } from './testing/worked-values';

/** A strip of 1.5 mm steel, 50 + 30 outside, whose K is 0.42: BD = 2 * 3 - 1.5708 * (1.5 + 0.63) = 2.6542. */
const STRIP: BendTestStrip = {
  id: 's1',
  materialId: 'dc01',
  thicknessMm: 1.5,
  vOpeningMm: 12,
  bendAngleDeg: 90,
  insideRadiusMm: 1.5,
  blankMm: 80 - 2.6542,
  legsMm: [50, 30],
  reference: 'outsideApex',
};

function read(strip: BendTestStrip): StripReading {
  const result = readStrip(strip);
  if (!result.ok) throw new Error(result.message);
  return result.reading;
}

describe('one strip', () => {
  it('gives the deduction measured and the K that makes it', () => {
    const { deductionMm, kFactor } = read(STRIP);
    expect(deductionMm).toBeCloseTo(2.6542, 9);
    expect(kFactor).toBeCloseTo(0.42, 4);
  });

  // dK/dBD = 1 / (pi/2 * 1.5) = 0.4244 per mm; dK/dR = (2 / (pi/2) - 1) / 1.5 = 0.1822 per mm.
  it('says what the measuring error does to K at T 1.5', () => {
    const { shifts, warnings } = read(STRIP);
    expect(shifts.length).toBeCloseTo(0.0424, 4);
    expect(shifts.radius).toBeCloseTo(0.0911, 4);
    expect(warnings).toEqual([
      'An error of 0.1 mm in the lengths shifts K by 0.04, an inside radius misread by 0.5 mm by 0.09.',
    ]);
  });

  // By hand: K(89.5) - K(90) with setback 3 * tan(44.75) = 2.97393: (2 * 2.97393 - 2.6542) / 1.56207 = 2.10852; the arc radius
  // was 2.13, so K moves 0.0143. And with T 1.48: (2 * 2.98 - 2.6542) / 1.5708 = 2.10453, K = 0.60453 / 1.48 = 0.40847, 0.0115.
  it('says the same of angle and thickness', () => {
    const { shifts } = read(STRIP);
    expect(shifts.angle).toBeCloseTo(0.0143, 3);
    expect(shifts.thickness).toBeCloseTo(0.0115, 3);
  });

  it.each(WORKED_BENDS)('finds K of $id again from its deductions', (worked) => {
    const form = { ...STRIP, bendAngleDeg: worked.bendAngleDeg, thicknessMm: worked.thickness };
    const strip = { ...form, insideRadiusMm: worked.insideRadius, legsMm: [40, 25] as const };
    const perMm = 180 / (Math.PI * worked.bendAngleDeg * worked.thickness);
    const apex = read({ ...strip, reference: 'outsideApex', blankMm: 65 - worked.deductionApex });
    const tangent = read({ ...strip, reference: 'outsideTangent', blankMm: 65 - worked.deductionTangent });
    // The table's deductions carry four decimals.
    expect(Math.abs(apex.kFactor - worked.kFactor)).toBeLessThan(0.0001 * perMm);
    expect(Math.abs(tangent.kFactor - worked.kFactor)).toBeLessThan(0.0001 * perMm);
  });

  it('gives K back whatever the legs were measured to', () => {
    const references: readonly LengthReference[] = [
      'outsideApex',
      'insideApex',
      'outsideTangent',
      'insideTangent',
      'tangent',
    ];
    const number = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(
        fc.record({
          bendAngleDeg: number(5, 180),
          insideRadiusMm: number(0, 8),
          thicknessMm: number(0.5, 6),
          kFactor: number(0.05, 0.5),
        }),
        fc.constantFrom(...references),
        (bend, reference) => {
          fc.pre(isReferenceAllowed(reference, bend.bendAngleDeg) && bend.bendAngleDeg < 175);
          const blankMm = 1000 - bendDeductionMm(bend, reference);
          fc.pre(blankMm > 0);
          const reading = read({ ...STRIP, ...bend, reference, blankMm, legsMm: [600, 400] });
          expect(reading.kFactor).toBeCloseTo(bend.kFactor, 7);
          expect(Object.values(reading.shifts).every((shift) => Number.isFinite(shift) && shift >= 0)).toBe(true);
        },
      ),
    );
  });

  it('flags a K no sheet has, and still tells the numbers', () => {
    const { kFactor, warnings } = read({ ...STRIP, blankMm: STRIP.blankMm + 0.4 });
    expect(kFactor).toBeCloseTo(0.59, 2);
    expect(warnings[0]).toContain('K comes out at 0.590');
  });

  it.each([
    [{ blankMm: 0 }, 'above 0 mm'],
    [{ legsMm: [50, Number.NaN] as const }, 'above 0 mm'],
    [{ insideRadiusMm: -1 }, 'inside radius'],
    [{ bendAngleDeg: 181 }, 'at most 180'],
    [{ bendAngleDeg: 180 }, 'no apex'],
  ])('refuses %j', (changes, words) => {
    const result = readStrip({ ...STRIP, ...changes });
    expect(result).toMatchObject({ ok: false, message: expect.stringContaining(words) });
  });
});

describe('strips together', () => {
  const strips = [2.6, 2.7, 2.66].map((deductionMm, index) => ({
    ...STRIP,
    id: `s${String(index)}`,
    blankMm: 80 - deductionMm,
  }));

  // Mean 2.65333; deviations -0.05333, 0.04667, 0.00667: sum of squares 0.0050667, / 2 = 0.0025333, root 0.050332.
  // K = (6 - 2.65333) / (pi/2) / 1.5 - 1 = 0.42037; deviation of K 0.050332 * 0.424413 = 0.021362.
  // Student with 2 degrees of freedom 4.303: 4.303 * 0.021362 * sqrt(4/3) = 0.10614.
  it('give n, mean and standard deviation of the deduction and of K', () => {
    const { series, refused } = fitStrips(strips);
    expect(refused).toEqual([]);
    expect(series).toHaveLength(1);
    expect(series[0]).toMatchObject({ count: 3, vOpeningMm: 12, reference: 'outsideApex', insideRadiusMm: 1.5 });
    expect(series[0]?.deductionMm).toBeCloseTo(2.653333, 6);
    expect(series[0]?.deductionDeviationMm).toBeCloseTo(0.050332, 6);
    expect(series[0]?.kFactor).toBeCloseTo(0.42037, 5);
    expect(series[0]?.kDeviation).toBeCloseTo(0.021362, 6);
    expect(series[0]?.kHalfWidth).toBeCloseTo(0.10614, 5);
  });

  it('never promise less than callipers can read', () => {
    const alike = strips.map((strip) => ({ ...strip, blankMm: STRIP.blankMm }));
    expect(fitStrips(alike).series[0]?.kDeviation).toBeCloseTo(0, 9);
    expect(fitStrips(alike).series[0]?.kHalfWidth).toBeCloseTo(0.0424, 4);
  });

  it('ask for more when there are fewer than three', () => {
    const [series] = fitStrips([STRIP]).series;
    expect(series).toMatchObject({ count: 1, kDeviation: null, deductionDeviationMm: null });
    // Measuring errors of length and radius: root of 0.0424^2 + 0.0911^2.
    expect(series?.kHalfWidth).toBeCloseTo(0.1005, 4);
    expect(series?.warnings[0]).toContain('Fewer than three');
  });

  it('are kept apart by die, angle, reference, thickness and material', () => {
    const others = [
      { vOpeningMm: 16 },
      { bendAngleDeg: 60 },
      { reference: 'insideApex' as const },
      { thicknessMm: 2 },
      { materialId: 'ss304' },
    ].map((change, index) => ({ ...STRIP, ...change, id: `o${String(index)}` }));
    expect(fitStrips([STRIP, ...others]).series).toHaveLength(6);
  });

  it('say when their radii are not of one die, and which strip was refused', () => {
    const { series, refused } = fitStrips([
      STRIP,
      { ...STRIP, id: 's2', insideRadiusMm: 2.6 },
      { ...STRIP, id: 'bad', blankMm: -1 },
    ]);
    expect(series[0]?.warnings.join(' ')).toContain('same die');
    expect(refused).toEqual([{ stripId: 'bad', message: expect.stringContaining('Strip bad') }]);
  });
});
