import fc from 'fast-check';
import { bendAllowanceMm } from './allowance';
import { legGains, outsideReachMm } from './leg-gains';

describe('gains of a leg', () => {
  // kernel.md: delivered radius 0.43 mm per mm at 90 degrees, for both legs: 2 - pi/2 = 0.4292.
  it('are 0.43 mm per mm of radius at 90 degrees, both legs together', () => {
    const { perRadiusMm } = legGains({ bendAngleDeg: 90, insideRadiusMm: 2, thicknessMm: 2, kFactor: 0.4 });
    expect(2 * perRadiusMm).toBeCloseTo(0.4292, 4);
  });

  it('are the slopes of the bend formulas', () => {
    const number = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
    const anyBend = fc.record({
      bendAngleDeg: fc.oneof(number(5, 89), number(91, 179)),
      insideRadiusMm: number(0.2, 8),
      thicknessMm: number(0.5, 6),
      kFactor: number(0.05, 0.45),
    });
    const step = 0.0001;
    fc.assert(
      fc.property(anyBend, (bend) => {
        const legMm = (one: typeof bend): number => outsideReachMm(one) - bendAllowanceMm(one) / 2;
        const slope = (key: keyof typeof bend): number =>
          (legMm({ ...bend, [key]: bend[key] + step }) - legMm({ ...bend, [key]: bend[key] - step })) / (2 * step);
        const gains = legGains(bend);
        expect(gains.perRadiusMm).toBeCloseTo(slope('insideRadiusMm'), 6);
        expect(gains.perThicknessMm).toBeCloseTo(slope('thicknessMm'), 6);
        expect(gains.perK).toBeCloseTo(slope('kFactor'), 6);
        expect(gains.perDegree).toBeCloseTo(slope('bendAngleDeg'), 6);
      }),
    );
  });
});
