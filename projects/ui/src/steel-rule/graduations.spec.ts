import { graduate } from './graduations';

describe('graduate', () => {
  it('sets a tick each millimetre and a figure each ten at 3.25 px per mm', () => {
    const { ticks, labels, labelStepMm } = graduate(650, 3.25, 65);
    expect(labelStepMm).toBe(10);
    expect(labels[0]).toEqual({ xPx: 65, text: '0' });
    expect(labels[1]).toEqual({ xPx: 97.5, text: '10' });
    expect((ticks[1]?.xPx ?? 0) - (ticks[0]?.xPx ?? 0)).toBeCloseTo(3.25, 6);
  });

  it.each([0.05, 0.2, 0.9, 3.3, 12, 47, 200])('never crowds figures or ticks at %p px per mm', (pxPerMm) => {
    const { ticks, labels } = graduate(900, pxPerMm, 120);
    const gaps = (xs: readonly number[]) => xs.slice(1).map((x, index) => x - (xs[index] ?? 0));
    for (const gap of gaps(labels.map((label) => label.xPx))) expect(gap).toBeGreaterThanOrEqual(27.9);
    for (const gap of gaps(ticks.map((tick) => tick.xPx))) expect(gap).toBeGreaterThanOrEqual(2.9);
  });

  it('graduates left of zero without figures there', () => {
    const { ticks, labels } = graduate(300, 4, 100);
    expect(Math.min(...ticks.map((tick) => tick.xPx))).toBeLessThan(100);
    expect(Math.min(...labels.map((label) => label.xPx))).toBe(100);
  });

  it('draws nothing without width or scale', () => {
    expect(graduate(0, 3, 0).ticks).toHaveLength(0);
    expect(graduate(300, 0, 0).ticks).toHaveLength(0);
  });
});
