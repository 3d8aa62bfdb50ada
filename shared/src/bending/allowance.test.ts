import fc from 'fast-check';
import {
  allowanceFromDeductionMm,
  bendAllowanceMm,
  bendDeductionMm,
  convertDeductionMm,
  convertLegMm,
  flatLengthMm,
  insideSetbackMm,
  isReferenceAllowed,
  kFactorFromAllowance,
  outsideSetbackMm,
  setbackMm,
  usualReference,
} from './allowance';
import type { LengthReference } from './layout';
import { HANDBOOK_BENDS, WORKED_BENDS, WORKED_STRIPS } from './testing/worked-values';
import { runs } from './testing/runs';

const REFERENCES: readonly LengthReference[] = [
  'outsideApex',
  'insideApex',
  'outsideTangent',
  'insideTangent',
  'tangent',
];

describe('worked bends', () => {
  it.each(WORKED_BENDS)('$id ($source)', (worked) => {
    const bend = {
      bendAngleDeg: worked.bendAngleDeg,
      insideRadiusMm: worked.insideRadius,
      thicknessMm: worked.thickness,
      kFactor: worked.kFactor,
    };
    expect(bendAllowanceMm(bend)).toBeCloseTo(worked.allowance, 3);
    expect(Math.abs(bendAllowanceMm(bend) - worked.allowance)).toBeLessThan(0.0001);
    expect(Math.abs(outsideSetbackMm(bend) - worked.setbackApex)).toBeLessThan(0.0001);
    expect(Math.abs(insideSetbackMm(bend) - worked.insideSetbackApex)).toBeLessThan(0.0001);
    expect(Math.abs(bendDeductionMm(bend, 'outsideApex') - worked.deductionApex)).toBeLessThan(0.0001);
    expect(Math.abs(setbackMm(bend, 'outsideTangent') - worked.setbackTangent)).toBeLessThan(0.0001);
    expect(Math.abs(bendDeductionMm(bend, 'outsideTangent') - worked.deductionTangent)).toBeLessThan(0.0001);
  });

  // Source: M. P. Groover, Fundamentals of Modern Manufacturing, bending example; printed answers 6.08 and 69.08 from memory.
  it('gives the textbook blank of 69.08 mm', () => {
    const bend = { bendAngleDeg: 60, insideRadiusMm: 4.75, thicknessMm: 3.2, kFactor: 0.33 };
    expect(flatLengthMm([38, 25], [bend], 'tangent')).toBeCloseTo(69.08, 2);
  });
});

describe('straight lengths of the handbook', () => {
  // The handbook rounds pi/2 to 1.57, which is worth 0.001 of the radius.
  it.each(HANDBOOK_BENDS)('$id', (worked) => {
    const kFactor = worked.coefficient / (Math.PI / 2);
    const bend = {
      bendAngleDeg: worked.bendAngleDeg,
      insideRadiusMm: worked.insideRadius,
      thicknessMm: worked.thickness,
      kFactor,
    };
    expect(Math.abs(bendAllowanceMm(bend) - worked.straightLength)).toBeLessThan(0.001 * worked.insideRadius + 0.0001);
    if (!Number.isNaN(worked.impliedK)) expect(kFactor).toBeCloseTo(worked.impliedK, 3);
  });

  // Source: Machinery's Handbook, third group; 2.000 x 1.500 in outside, 18 gauge, R 1/16 in.
  it('gives 3.4115 in for an L of cold rolled 18 gauge sheet', () => {
    const bend = { bendAngleDeg: 90, insideRadiusMm: 0.0625, thicknessMm: 0.0478, kFactor: 0.71 / (Math.PI / 2) };
    expect(flatLengthMm([2, 1.5], [bend], 'outsideApex')).toBeCloseTo(3.4115, 3);
  });
});

describe('flat lengths of strips', () => {
  it.each(WORKED_STRIPS)('$id', (worked) => {
    const bend = { ...worked };
    const bends = worked.legsMm.slice(1).map(() => bend);
    expect(Math.abs(flatLengthMm(worked.legsMm, bends, worked.reference) - worked.flatMm)).toBeLessThan(0.0002);
  });

  it('refuses a count of legs that does not fit', () => {
    expect(() =>
      flatLengthMm([50], [{ bendAngleDeg: 90, insideRadiusMm: 1, thicknessMm: 1, kFactor: 0.4 }], 'tangent'),
    ).toThrow(RangeError);
  });
});

// Source: FAA-H-8083-31, Aviation Maintenance Technician Handbook, Airframe, volume 1: BA = (0.01743 R + 0.0078 T) N, setback
// tan(N/2) (R + T). Outside sizes of the channel (1.00, 2.00, 1.00 in) from memory.
describe('aviation handbook channel in 2024-T3', () => {
  const bend = { bendAngleDeg: 90, insideRadiusMm: 0.16, thicknessMm: 0.04, kFactor: 0.0078 / (Math.PI / 180) };

  it('has a K of 0.447, which is not the "K" of its setback chart', () => {
    expect(bend.kFactor).toBeCloseTo(0.4469, 4);
    expect(outsideSetbackMm(bend) / (0.16 + 0.04)).toBe(1);
  });

  it('gives setback 0.20, allowance 0.2791 and a blank of 3.7581 in', () => {
    expect(outsideSetbackMm(bend)).toBeCloseTo(0.2, 10);
    expect((0.01743 * 0.16 + 0.0078 * 0.04) * 90).toBeCloseTo(0.2791, 4);
    // The handbook rounds pi/180 to 0.01743, which is worth 0.0021 of the radius at 90 degrees.
    const rounding = 0.0021 * 0.16;
    expect(Math.abs(bendAllowanceMm(bend) - 0.2791)).toBeLessThan(rounding + 0.0001);
    expect(Math.abs(flatLengthMm([1, 2, 1], [bend, bend], 'outsideApex') - 3.7581)).toBeLessThan(2 * rounding + 0.0002);
  });
});

describe('references', () => {
  it('tells a deduction to the apex from one to the tangent: 9.36 and 0.88 at 135 degrees', () => {
    const bend = { bendAngleDeg: 135, insideRadiusMm: 1.5, thicknessMm: 1.5, kFactor: 0.45 };
    expect(bendDeductionMm(bend, 'outsideApex')).toBeCloseTo(9.36, 2);
    expect(bendDeductionMm(bend, 'outsideTangent')).toBeCloseTo(0.88, 2);
  });

  it('lets the apex run away towards 180 degrees and has none there', () => {
    const near = { bendAngleDeg: 179.9, insideRadiusMm: 1, thicknessMm: 1 };
    expect(outsideSetbackMm(near)).toBeGreaterThan(2000);
    const hem = { ...near, bendAngleDeg: 180 };
    expect(isReferenceAllowed('outsideApex', 180)).toBe(false);
    expect(() => outsideSetbackMm(hem)).toThrow(RangeError);
    expect(setbackMm(hem, 'outsideTangent')).toBe(2);
    expect(setbackMm(hem, 'insideTangent')).toBe(1);
    expect(setbackMm(hem, 'tangent')).toBe(0);
  });

  it('has a negative deduction for a wide hem', () => {
    expect(
      bendDeductionMm({ bendAngleDeg: 180, insideRadiusMm: 5, thicknessMm: 1, kFactor: 0.5 }, 'outsideTangent'),
    ).toBeLessThan(0);
  });

  it('defaults to the inside apex up to 90 and to the inside tangent above', () => {
    expect(usualReference(90)).toBe('insideApex');
    expect(usualReference(90.5)).toBe('insideTangent');
  });

  it('counts the angle turned, not the angle left between the legs', () => {
    const half = { bendAngleDeg: 45, insideRadiusMm: 2, thicknessMm: 2, kFactor: 0.4 };
    expect(bendAllowanceMm({ ...half, bendAngleDeg: 90 })).toBeCloseTo(2 * bendAllowanceMm(half), 10);
  });

  it('converts legs and deductions to any reference and back', () => {
    const bends = fc.record({
      bendAngleDeg: fc.double({ min: 5, max: 170, noNaN: true }),
      insideRadiusMm: fc.double({ min: 0, max: 20, noNaN: true }),
      thicknessMm: fc.double({ min: 0.3, max: 8, noNaN: true }),
      kFactor: fc.double({ min: 0.05, max: 0.5, noNaN: true }),
    });
    const reference = fc.constantFrom(...REFERENCES);
    fc.assert(
      fc.property(bends, reference, reference, fc.double({ min: 1, max: 500, noNaN: true }), (bend, from, to, leg) => {
        expect(convertLegMm(convertLegMm(leg, bend, from, to), bend, to, from)).toBeCloseTo(leg, 8);
        const deduction = bendDeductionMm(bend, from);
        expect(convertDeductionMm(deduction, bend, from, to)).toBeCloseTo(bendDeductionMm(bend, to), 8);
        expect(flatLengthMm([leg, leg], [bend], from)).toBeCloseTo(
          flatLengthMm([convertLegMm(leg, bend, from, to), convertLegMm(leg, bend, from, to)], [bend], to),
          8,
        );
        expect(kFactorFromAllowance(bend, allowanceFromDeductionMm(bend, deduction, from))).toBeCloseTo(
          bend.kFactor,
          6,
        );
      }),
      { numRuns: runs() },
    );
  });
});

describe('refusals', () => {
  const good = { bendAngleDeg: 90, insideRadiusMm: 1, thicknessMm: 1, kFactor: 0.4 };
  it.each([
    ['angle 0', { bendAngleDeg: 0 }],
    ['angle above 180', { bendAngleDeg: 180.001 }],
    ['angle not a number', { bendAngleDeg: Number.NaN }],
    ['radius below 0', { insideRadiusMm: -0.001 }],
    ['endless radius', { insideRadiusMm: Infinity }],
    ['no thickness', { thicknessMm: 0 }],
    ['K of 0', { kFactor: 0 }],
    ['K above 0.5', { kFactor: 0.5001 }],
  ])('%s', (_, change) => {
    expect(() => bendAllowanceMm({ ...good, ...change })).toThrow(RangeError);
  });
});
