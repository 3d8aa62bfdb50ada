import { developLayout } from './develop';
import type { Development } from './development';
import { layoutToFlat } from './layout-to-flat';
import { lLayout, sampleStock, uLayout } from './testing/sample-layouts';

function developed(layout = lLayout()): Development {
  const result = developLayout(layout, null, sampleStock());
  if (!result.ok) throw new Error('sample does not develop');
  return result.development;
}

describe('from layout to flat pattern', () => {
  it('leaves the base alone and shifts flanges by the deduction', () => {
    const development = developed();
    const deduction = development.bendTable[0]?.layoutDeductionMm ?? NaN;
    expect(layoutToFlat(development, { x: 10, y: 20 })).toEqual({ x: 10, y: 20 });
    expect(layoutToFlat(development, { x: 70, y: 20 }).x).toBeCloseTo(70 - deduction, 9);
    expect(layoutToFlat(development, { x: 90, y: 20 }).x).toBeCloseTo(90 - deduction, 9);
  });

  it('puts the bend line in the middle of its zone and never jumps', () => {
    const development = developed(uLayout());
    for (const bend of development.flat.bends) {
      const crease = bend.bendId === 'bend-1' ? 30 : 90;
      expect(layoutToFlat(development, { x: crease, y: 20 }).x).toBeCloseTo(bend.centreLines[0]?.from.x ?? NaN, 9);
    }
    let before = layoutToFlat(development, { x: 0, y: 20 }).x;
    for (let x = 0.01; x <= 120; x += 0.01) {
      const now = layoutToFlat(development, { x, y: 20 }).x;
      expect(now).toBeGreaterThan(before - 0.000001);
      expect(now - before).toBeLessThan(0.02);
      before = now;
    }
  });
});
