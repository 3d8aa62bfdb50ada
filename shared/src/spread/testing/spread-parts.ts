import type { BendingStock, Development } from '../../bending/development';
import type { Feature, Layout } from '../../bending/layout';
import { developed } from '../../bending/testing/developed';
import {
  cradleLayout,
  hatLayout,
  lLayout,
  sampleStock,
  stripLayout,
  tabLayout,
  trayLayout,
  uLayout,
  zLayout,
} from '../../bending/testing/sample-layouts';

/** A layout with plain holes of 6.6 mm at the places given; ids are h1, h2, ... */
export function withHoles(layout: Layout, places: readonly (readonly [number, number])[]): Layout {
  const features = places.map(([x, y], index): Feature => ({
    kind: 'hole',
    id: `h${String(index + 1)}`,
    centre: { x, y },
    purpose: { kind: 'plain', diameterMm: 6.6 },
  }));
  return { ...layout, features };
}

const PARTS: readonly (readonly [string, Layout, Partial<BendingStock>])[] = [
  [
    'L',
    withHoles(lLayout(50, 30), [
      [15, 20],
      [70, 12],
      [70, 28],
    ]),
    {},
  ],
  [
    'U',
    withHoles(uLayout(), [
      [12, 20],
      [60, 20],
      [108, 20],
    ]),
    {},
  ],
  [
    'Z',
    withHoles(zLayout(), [
      [10, 20],
      [45, 20],
      [80, 20],
    ]),
    {},
  ],
  [
    'hat',
    withHoles(hatLayout(), [
      [10, 20],
      [60, 20],
      [110, 20],
      [110, 32],
    ]),
    {},
  ],
  [
    'tray',
    withHoles(trayLayout(), [
      [50, 30],
      [50, -12],
      [112, 30],
      [50, 72],
    ]),
    {},
  ],
  [
    'tab',
    withHoles(tabLayout(), [
      [20, -30],
      [60, -30],
      [40, 16],
    ]),
    {},
  ],
  ['cradle', cradleLayout(), { thicknessMm: 1.5, deliveredRadiusMm: 2.4 }],
  [
    'acute L',
    withHoles(lLayout(60, 50, { bendAngleDeg: 135, reference: 'outsideTangent' }), [
      [20, 20],
      [85, 20],
    ]),
    {},
  ],
  [
    'strip of mixed bends',
    withHoles(
      stripLayout(
        [40, 50, 45, 60],
        [{ bendAngleDeg: 30 }, { bendAngleDeg: 75, direction: 'away' }, { bendAngleDeg: 110 }],
      ),
      [
        [15, 20],
        [65, 20],
        [110, 12],
        [165, 28],
      ],
    ),
    { thicknessMm: 3, deliveredRadiusMm: 4.5 },
  ],
  [
    'gentle Z',
    withHoles(zLayout(40, 30, 40, { bendAngleDeg: 45 }), [
      [15, 20],
      [90, 20],
    ]),
    {},
  ],
];

/** Ten parts with holes on several panels: L, U, Z, hat, tray, tab, cradle, an acute L, a strip of mixed bends, a gentle Z. */
export const SPREAD_PARTS: readonly { readonly name: string; readonly development: Development }[] = PARTS.map(
  ([name, layout, sheet]) => ({ name, development: developed(layout, sampleStock(sheet)) }),
);
