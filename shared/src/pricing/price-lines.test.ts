import * as fc from 'fast-check';
import { type PriceLine, eachMinor, priceLines, savingPercent, sumOfLines } from './price-lines';

const line = (unitMinor: number, quantity: number, taxBasisPoints: number): PriceLine => ({
  label: 'cutting',
  quantity,
  unitMinor,
  taxBasisPoints,
});

describe('priceLines', () => {
  it('rounds tax once per line, half away from zero', () => {
    // 3 x 0.35 at 23 %: 105 x 0.23 = 24.15 -> 24; 1 x 0.50 at 23 %: 11.5 -> 12.
    const price = priceLines('EUR', [line(35, 3, 2300), line(50, 1, 2300)]);
    expect(price.lines.map(({ taxMinor }) => taxMinor)).toEqual([24, 12]);
    expect(price).toMatchObject({ netMinor: 155, taxMinor: 36, grossMinor: 191 });
    // Three lines of 0.50: 12 each, where a tax on the sum would be 34.5 -> 35.
    expect(
      priceLines(
        'EUR',
        [1, 2, 3].map(() => line(50, 1, 2300)),
      ).taxMinor,
    ).toBe(36);
  });

  it('takes a credit back to the cent', () => {
    expect(priceLines('EUR', [line(-50, 1, 2300)]).taxMinor).toBe(-12);
  });

  it('adds up for any lines', () => {
    const lines = fc.array(
      fc.record({
        label: fc.string(),
        quantity: fc.integer({ min: 0, max: 5000 }),
        unitMinor: fc.integer({ min: -1_000_000, max: 1_000_000 }),
        taxBasisPoints: fc.integer({ min: 0, max: 3000 }),
      }),
    );
    fc.assert(
      fc.property(lines, (some) => {
        const price = priceLines('EUR', some);
        expect(price.grossMinor).toBe(price.netMinor + price.taxMinor);
        for (const { netMinor, taxMinor, taxBasisPoints } of price.lines) {
          expect(Number.isSafeInteger(taxMinor)).toBe(true);
          expect(Math.abs(taxMinor - (netMinor * taxBasisPoints) / 10000)).toBeLessThanOrEqual(0.5);
        }
      }),
    );
  });

  it.each([
    ['half a piece', line(100, 0.5, 0)],
    ['a fraction of a cent', line(0.5, 1, 0)],
    ['a fraction of a basis point', line(100, 1, 0.5)],
  ])('refuses %s', (_, bad) => {
    expect(() => priceLines('EUR', [bad])).toThrow(RangeError);
  });
});

describe('quantity breaks', () => {
  const one = { quantity: 1, total: { amountMinor: 1620, currency: 'EUR' } };
  const ten = { quantity: 10, total: { amountMinor: 9994, currency: 'EUR' } };

  it('never shows a price each that falls short of the total', () => {
    expect(eachMinor(one)).toBe(1620);
    expect(eachMinor(ten)).toBe(1000);
    expect(() => eachMinor({ ...one, quantity: 0 })).toThrow(RangeError);
  });

  it('says what a quantity saves against the smallest', () => {
    // 9994 against 16200: 38.3 %.
    expect(savingPercent([one, ten], ten)).toBe(38);
    expect(savingPercent([one, ten], one)).toBe(0);
  });

  it('sums lines of one currency only', () => {
    const amount = { amountMinor: 100, currency: 'EUR' };
    expect(sumOfLines([{ amount }, { amount }])).toEqual({ amountMinor: 200, currency: 'EUR' });
    expect(() => sumOfLines([{ amount }, { amount: { ...amount, currency: 'USD' } }])).toThrow(RangeError);
    expect(() => sumOfLines([])).toThrow(RangeError);
  });
});
