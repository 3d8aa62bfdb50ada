import { bendForceKn } from './bend-force';

const PLATE = { ultimateStrengthMpa: 450, bendLengthMm: 1000, thicknessMm: 2, vOpeningMm: 16 };

describe('force to bend in a V die', () => {
  // Figures for 1 m of 2 mm sheet of 450 MPa in a 16 mm die by other formulas: Groover (C = 1.33) 149.6 kN, trade chart in metric
  // units (C = 1.42) 159.8 kN, Oehler (1 + 4 T/V) 168.75 kN, plain C = 1.0 112.5 kN.
  it.each([112.5, 149.625, 159.75, 168.75])('is no less than %s kN by another source', (otherKn) => {
    expect(bendForceKn(PLATE)).toBeGreaterThanOrEqual(otherKn);
    expect(bendForceKn(PLATE)).toBeCloseTo(180, 9);
  });

  // Source: trade chart, 575 T2/V tons per foot at 60 ksi: 4.14 tons per foot for 0.060 in over 0.5 in. Common practice.
  it('comes within a hundredth of the inch chart', () => {
    const perFoot = bendForceKn({
      ultimateStrengthMpa: 413.685,
      bendLengthMm: 304.8,
      thicknessMm: 1.524,
      vOpeningMm: 12.7,
    });
    expect(Math.abs(perFoot / (4.14 * 8.896443) - 1)).toBeLessThan(0.01);
  });

  it('grows faster in a narrow die, after Oehler', () => {
    expect(bendForceKn({ ...PLATE, vOpeningMm: 8 })).toBeCloseTo((2 * 450 * 1000 * 4) / 8 / 1000, 9);
  });
});
