import { seededNumbers } from './seeded-normal';

const COUNT = 100_000;

describe('seeded numbers', () => {
  it('follow from the seed alone', () => {
    const draw = (seed: number): readonly number[] => {
      const numbers = seededNumbers(seed);
      return Array.from({ length: 20 }, () => numbers.normal());
    };
    expect(draw(7)).toEqual(draw(7));
    expect(draw(8)).not.toEqual(draw(7));
    expect(() => seededNumbers(Number.NaN)).toThrow(RangeError);
  });

  // Limits are five standard errors of 100,000 numbers: mean 1 / sqrt(n), variance sqrt(2 / n), kurtosis sqrt(24 / n).
  it('are normal with mean 0 and standard deviation 1', () => {
    const numbers = seededNumbers(1);
    const values = Array.from({ length: COUNT }, () => numbers.normal());
    const moment = (power: number): number => values.reduce((sum, value) => sum + value ** power, 0) / COUNT;
    expect(Math.abs(moment(1))).toBeLessThan(5 / Math.sqrt(COUNT));
    expect(Math.abs(moment(2) - 1)).toBeLessThan(5 * Math.sqrt(2 / COUNT));
    expect(Math.abs(moment(4) - 3)).toBeLessThan(5 * Math.sqrt(96 / COUNT));
    // 68.27 % within one standard deviation, 95.45 % within two.
    const within = (limit: number): number => values.filter((value) => Math.abs(value) < limit).length / COUNT;
    expect(Math.abs(within(1) - 0.6827)).toBeLessThan(0.0075);
    expect(Math.abs(within(2) - 0.9545)).toBeLessThan(0.0033);
  });

  it('are even between 0 and 1, and one says nothing of the next', () => {
    const numbers = seededNumbers(2);
    const values = Array.from({ length: COUNT }, () => numbers.uniform());
    const bins = new Array<number>(20).fill(0);
    values.forEach((value) => {
      bins[Math.floor(value * 20)] = (bins[Math.floor(value * 20)] ?? 0) + 1;
    });
    const chi = bins.reduce((sum, bin) => sum + (bin - COUNT / 20) ** 2 / (COUNT / 20), 0);
    // 19 degrees of freedom: 99.99 % below 50.8.
    expect(chi).toBeLessThan(50.8);
    const pairs = values.slice(1).reduce((sum, value, at) => sum + (value - 0.5) * ((values[at] ?? 0) - 0.5), 0);
    expect(Math.abs((pairs / COUNT) * 12)).toBeLessThan(5 / Math.sqrt(COUNT));
  });
});
