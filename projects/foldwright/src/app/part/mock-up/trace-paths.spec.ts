import type { Trace } from '@foldwright/shared/fitting/trace';
import { residualStep, tracePaths, worstStretch } from './trace-paths';

const TRACE: Trace = {
  units: 'mm',
  frame: 'scale-sheet',
  outer: [
    { kind: 'line', from: [10, 10], to: [60, 10] },
    { kind: 'arc', from: [60, 10], to: [60, 50], centre: [60, 30], clockwise: false },
    { kind: 'line', from: [60, 50], to: [10, 50] },
    { kind: 'line', from: [10, 50], to: [10, 10] },
  ],
  cutouts: [],
  holes: [{ centre: [20, 20], diameterMm: 6.6 }],
  slots: [{ from: [30, 20], to: [40, 20], widthMm: 8 }],
  uncertaintyMm: 0.2,
  method: 'markers',
  pixelsPerMm: 8,
  markersUsed: 20,
  tiltDeg: 12,
  bands: [
    { primitiveIndex: 0, halfWidthMm: 0.1, residualMm: 0.02 },
    { primitiveIndex: 2, halfWidthMm: 0.3, residualMm: 0.25 },
  ],
  mostlyFrom: 'thickness',
  warnings: [],
  timingsMs: {},
};

describe('a trace drawn over its photo', () => {
  const paths = tracePaths(TRACE, 297);

  it('counts y down from the upper edge of the sheet', () => {
    expect(paths.outline.startsWith('M10 287L60 287')).toBe(true);
    expect(paths.holes).toEqual([{ x: 20, y: 277, radius: 3.3 }]);
  });

  it('keeps the way an arc runs: counter-clockwise on the sheet is SVG sweep 0', () => {
    expect(paths.outline).toContain('A20 20 0 0 0 60 247');
    expect(paths.stretches[1]?.middle[0]).toBeCloseTo(80, 9);
  });

  it('tells residuals in three steps and finds the worst', () => {
    expect([0.05, 0.1, 0.2].map(residualStep)).toEqual(['near', 'some', 'far']);
    expect(worstStretch(paths)?.index).toBe(2);
    // A primitive without a band of its own carries the trace's.
    expect(paths.stretches[1]?.halfWidthMm).toBe(0.2);
  });

  it('draws a slot over its ends', () => {
    expect(paths.slots[0]).toBe('M30 273L40 273A4 4 0 0 1 40 281L30 281A4 4 0 0 1 30 273Z');
  });
});
