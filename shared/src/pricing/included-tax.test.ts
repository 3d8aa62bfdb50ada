import fc from 'fast-check';
import { includedTaxMinor, partMinor } from './included-tax';

describe('tax contained in an amount', () => {
  it.each([
    [11900, 1900, 1900],
    [14800, 2300, 2767],
    [100, 0, 0],
    [1, 2300, 0],
    [-11900, 1900, -1900],
    // 5 · 2500 / 12500 = 1 exactly; 3 of 25 % is 0.6, which rounds up.
    [5, 2500, 1],
    [3, 2500, 1],
  ])('of %d at %d basis points is %d', (gross, basisPoints, tax) => {
    expect(includedTaxMinor(gross, basisPoints)).toBe(tax);
  });

  it('is within half a cent of the exact share, and mirrors under a change of sign', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 100_000_000 }), fc.integer({ min: 0, max: 3000 }), (gross, basisPoints) => {
        const tax = includedTaxMinor(gross, basisPoints);
        expect(Math.abs(tax - (gross * basisPoints) / (10_000 + basisPoints))).toBeLessThanOrEqual(0.5 + 1e-9);
        expect(includedTaxMinor(-gross, basisPoints)).toBe(tax === 0 ? 0 : -tax);
      }),
    );
  });

  it('refuses fractions of a cent and rates below zero', () => {
    expect(() => includedTaxMinor(1.5, 1900)).toThrow(RangeError);
    expect(() => includedTaxMinor(100, -1)).toThrow(RangeError);
    expect(() => partMinor(100, 1, 0)).toThrow(RangeError);
  });
});
