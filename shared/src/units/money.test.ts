import * as fc from 'fast-check';
import { addMoney, formatMoney, minorDigits, parseMoneyMinor, shareMinor, typedMoney } from './money';
import { formatAngle, formatMass, formatPercent } from './quantity';

describe('money', () => {
  it('knows the minor digits of ISO 4217', () => {
    expect(['EUR', 'USD', 'JPY', 'BHD'].map(minorDigits)).toEqual([2, 2, 0, 3]);
  });

  it('writes amounts in whole minor units', () => {
    expect(formatMoney({ amountMinor: 120405, currency: 'USD' }, 'en-US')).toBe('$1,204.05');
    expect(formatMoney({ amountMinor: 1620, currency: 'EUR' }, 'en-IE')).toBe('€16.20');
    expect(() => formatMoney({ amountMinor: 0.5, currency: 'EUR' })).toThrow(RangeError);
  });

  it('adds one currency only', () => {
    expect(addMoney({ amountMinor: 1, currency: 'EUR' }, { amountMinor: 2, currency: 'EUR' }).amountMinor).toBe(3);
    expect(() => addMoney({ amountMinor: 1, currency: 'EUR' }, { amountMinor: 2, currency: 'USD' })).toThrow(
      RangeError,
    );
  });

  it('rounds a share half away from zero, both ways alike', () => {
    expect(shareMinor(50, 2300)).toBe(12);
    expect(shareMinor(115, 10000)).toBe(115);
    expect(shareMinor(1, 4999)).toBe(0);
    fc.assert(
      fc.property(fc.integer({ min: -1e9, max: 1e9 }), fc.integer({ min: 0, max: 10000 }), (amount, points) => {
        expect(shareMinor(-amount, points) + shareMinor(amount, points)).toBe(0);
      }),
    );
  });
});

describe('quantities', () => {
  it('says masses as a shop does', () => {
    expect([0.2154, 0.9994, 0.9996, 1.375].map(formatMass)).toEqual(['215 g', '999 g', '1 kg', '1.38 kg']);
  });

  it('says shares and angles', () => {
    expect(formatPercent(0.125)).toBe('12.5 %');
    expect(formatAngle(75)).toBe('75°');
    expect(() => formatAngle(Number.NaN)).toThrow(RangeError);
  });
});

describe('an amount that was typed', () => {
  it.each([
    ['148', 14800],
    ['148.5', 14850],
    ['148,50', 14850],
    [' 1 204.00 ', 120400],
    ["1'204", 120400],
    ['0.07', 7],
    ['1.234', null],
    ['12.', null],
    ['-3', null],
    ['', null],
    ['12 34', null],
  ])('%s is %s', (typed, minor) => {
    expect(parseMoneyMinor(typed, 'EUR')).toBe(minor);
  });

  it('is read back as it is shown', () => {
    for (const amountMinor of [0, 7, 14800, 120499]) {
      expect(parseMoneyMinor(typedMoney({ amountMinor, currency: 'EUR' }), 'EUR')).toBe(amountMinor);
    }
  });
});
