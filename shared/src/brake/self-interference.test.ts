import { describe, expect, it } from '@jest/globals';
import { developed } from '../bending/testing/developed';
import {
  hatLayout,
  sampleBend,
  sampleLayout,
  sampleLoop,
  stripLayout,
  trayLayout,
  uLayout,
} from '../bending/testing/sample-layouts';
import { findSelfInterference } from './self-interference';

const square = { reference: 'outsideApex' } as const;
/** Leg 40, web, leg, and a flange that comes back towards the first leg. T 2, R 2, outside sizes. */
const hook = (webMm: number, backMm: number) => stripLayout([40, webMm, 30, backMm], [square, square, square], 40, 1);

describe('a formed part that would be in its own way', () => {
  it('finds nothing on parts that people make', () => {
    for (const layout of [uLayout(), hatLayout(), trayLayout()])
      expect(findSelfInterference(developed(layout))).toEqual([]);
  });

  it('names the leg and the flange that runs into it, within 0.05 mm of where they meet', () => {
    // Outside width of the hook 40: the flange that comes back reaches so far from its own leg's outside and meets the other leg's
    // inside at 40 - 2 = 38.
    expect(findSelfInterference(developed(hook(40, 37.97)))).toEqual([]);
    expect(findSelfInterference(developed(hook(40, 38.05)))).toEqual([
      { first: { kind: 'panel', index: 1 }, second: { kind: 'panel', index: 3 } },
    ]);
  });

  it('lets a flange pass through an opening', () => {
    // Strip of 40 + 40 + 30 + 45; its last flange is 20 wide, from 10 to 30, and lies 28 to 30 above the web's outside: on the
    // first leg 10 to 12 from the free edge. It reaches 45 - 40 = 5 through.
    const [x0, x1, x2, x3] = [40, 80, 110, 155];
    const layout = sampleLayout({
      outer: [
        { x: 0, y: 0 },
        { x: x2, y: 0 },
        { x: x2, y: 10 },
        { x: x3, y: 10 },
        { x: x3, y: 30 },
        { x: x2, y: 30 },
        { x: x2, y: 40 },
        { x: 0, y: 40 },
      ],
      bends: [
        ...[x0, x1].map((x, index) => sampleBend(`bend-${String(index)}`, { x, y: -5 }, { x, y: 45 }, square)),
        sampleBend('tab', { x: x2, y: 10 }, { x: x2, y: 30 }, square),
      ],
      baseAnchor: { x: 60, y: 20 },
    });
    const window = (fromY: number, toY: number) =>
      sampleLoop('window', [
        { x: 8, y: fromY },
        { x: 14, y: fromY },
        { x: 14, y: toY },
        { x: 8, y: toY },
      ]);
    expect(findSelfInterference(developed(layout))).toHaveLength(1);
    expect(findSelfInterference(developed({ ...layout, cutouts: [window(8, 32)] }))).toEqual([]);
    expect(findSelfInterference(developed({ ...layout, cutouts: [window(8, 28)] }))).toHaveLength(1);
  });
});
