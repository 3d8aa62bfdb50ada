import * as fc from 'fast-check';
import { type LengthStyle, formatLength, parseLength } from './length';

const read = (text: string, unit: 'mm' | 'in' = 'mm') => {
  const reading = parseLength(text, unit);
  return reading.ok ? reading.valueMm : reading.reason;
};

describe('parseLength', () => {
  it.each([
    ['12', 12],
    ['12 mm', 12],
    ['12mm', 12],
    ['12,5', 12.5],
    ['.5', 0.5],
    [',5 mm', 0.5],
    ['1.2 cm', 12],
    ['0.5in', 12.7],
    ['0.5 IN', 12.7],
    ['0.5 inch.', 12.7],
    ['1 3/8"', 34.925],
    ['1-3/8 in', 34.925],
    ['3/8"', 9.525],
    ['3⁄8″', 9.525],
    ['-2.5', -2.5],
    ['+ 3', 3],
    ['  7  ', 7],
    ["2''", 50.8],
  ])('reads %s as %d mm', (text, valueMm) => {
    expect(read(text)).toBeCloseTo(valueMm, 9);
  });

  it('takes a bare number in the unit asked for', () => {
    expect(read('2', 'in')).toBeCloseTo(50.8, 9);
    expect(read('2 mm', 'in')).toBe(2);
  });

  it.each([
    '',
    'twelve',
    '12 kg',
    '1 2',
    '1/0"',
    '1,200.5',
    '1.2.3',
    '--3',
    '1 3/',
    'NaN',
    'Infinity',
    '1e5',
    '9'.repeat(400),
  ])('refuses %p in words', (text) => {
    expect(typeof read(text)).toBe('string');
  });
});

describe('formatLength', () => {
  const fraction: LengthStyle = { unit: 'in', form: 'fraction', denominator: 64 };

  it.each([
    [12, '12 mm'],
    [12.5, '12.5 mm'],
    [12.345, '12.35 mm'],
    [-0.001, '0 mm'],
  ])('writes %d as %s', (valueMm, text) => {
    expect(formatLength(valueMm)).toBe(text);
  });

  it.each([
    [34.925, '1 3/8"'],
    [9.525, '3/8"'],
    [25.4, '1"'],
    [0, '0"'],
    [-1.984375, '-5/64"'],
    [25.3, '1"'],
    [1, '3/64"'],
  ])('writes %d mm in inches as %s', (valueMm, text) => {
    expect(formatLength(valueMm, fraction)).toBe(text);
  });

  it('writes decimal inches', () => {
    expect(formatLength(34.925, { unit: 'in', form: 'decimal', decimals: 3 })).toBe('1.375 in');
  });

  it('will not write what is no length', () => {
    expect(() => formatLength(Number.NaN)).toThrow(RangeError);
  });

  it('reads back what it writes, to half a step', () => {
    const styles: readonly (readonly [LengthStyle, number])[] = [
      [{ unit: 'mm', decimals: 2 }, 0.005],
      [{ unit: 'in', form: 'decimal', decimals: 4 }, 0.00005 * 25.4],
      [fraction, 25.4 / 128],
    ];
    fc.assert(
      fc.property(
        fc.double({ min: -3000, max: 3000, noNaN: true }),
        fc.constantFrom(...styles),
        (valueMm, [style, step]) => {
          const reading = parseLength(formatLength(valueMm, style), style.unit);
          expect(reading.ok && Math.abs(reading.valueMm - valueMm)).toBeLessThanOrEqual(step + 1e-9);
        },
      ),
    );
  });
});
