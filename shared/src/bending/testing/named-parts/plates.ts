import { sampleBend, sampleLayout, tabLayout } from '../sample-layouts';
import type { SampleBend } from '../sample-layouts';
import type { Layout } from '../../layout';
import type { Point } from '../../../geometry/point';
import { MILD, THIN } from './named-part';
import type { NamedPart } from './named-part';

const outside = { reference: 'outsideApex' } as const;
const at = (x: number, y: number): Point => ({ x, y });

/** A base with flanges on all sides that leave `cornerMm` free at each corner; front and back may carry a return flange. */
function box(sizes: {
  readonly lengthMm: number;
  readonly widthMm: number;
  readonly flangeMm: number;
  readonly cornerMm: number;
  readonly returnMm?: number;
  readonly bend?: SampleBend;
}): Layout {
  const { lengthMm: l, widthMm: w, flangeMm: f, cornerMm: c, returnMm = 0 } = sizes;
  const bend = { ...outside, ...sizes.bend };
  const far = f + returnMm;
  const returns =
    returnMm === 0
      ? []
      : [
          sampleBend('front-return', at(c, -f), at(l - c, -f), bend),
          sampleBend('back-return', at(c, w + f), at(l - c, w + f), bend),
        ];
  return sampleLayout({
    outer: [
      ...[at(0, 0), at(c, 0), at(c, -far), at(l - c, -far), at(l - c, 0), at(l, 0)],
      ...[at(l, c), at(l + f, c), at(l + f, w - c), at(l, w - c), at(l, w)],
      ...[at(l - c, w), at(l - c, w + far), at(c, w + far), at(c, w), at(0, w)],
      ...[at(0, w - c), at(-f, w - c), at(-f, c), at(0, c)],
    ],
    bends: [
      sampleBend('front', at(c, 0), at(l - c, 0), bend),
      sampleBend('right', at(l, c), at(l, w - c), bend),
      sampleBend('back', at(c, w), at(l - c, w), bend),
      sampleBend('left', at(0, c), at(0, w - c), bend),
      ...returns,
    ],
    baseAnchor: at(l / 2, w / 2),
  });
}

const tabWithReturn = sampleLayout({
  outer: [
    ...[at(0, -50), at(80, -50), at(80, 0), at(60, 0), at(60, 25), at(50, 25), at(50, 40)],
    ...[at(30, 40), at(30, 25), at(20, 25), at(20, 0), at(0, 0)],
  ],
  bends: [sampleBend('tab', at(20, 0), at(60, 0), outside), sampleBend('return', at(30, 25), at(50, 25), outside)],
  baseAnchor: at(40, -30),
});

const twoFlanges = sampleLayout({
  outer: [at(0, 0), at(100, 0), at(120, 0), at(120, 57), at(100, 57), at(100, 60), at(100, 85), at(0, 85), at(0, 60)],
  bends: [sampleBend('right', at(100, 0), at(100, 57), outside), sampleBend('back', at(0, 60), at(100, 60), outside)],
  baseAnchor: at(50, 30),
});

const skew = sampleLayout({
  outer: [at(0, 0), at(200, 0), at(200, 60), at(0, 60)],
  bends: [sampleBend('skew', at(60, 0), at(105, 60), outside)],
  baseAnchor: at(20, 30),
});

/** A plate with flanges that do not run along each other. */
export const PLATES: readonly NamedPart[] = [
  {
    name: 'box with four flanges and reliefs',
    stock: THIN,
    layout: box({ lengthMm: 120, widthMm: 80, flangeMm: 25, cornerMm: 12 }),
    // 120 + 2 x (25 - 2.654204), 80 + 2 x 22.345796
    flatMm: [164.691592, 124.691592],
    formedMm: [120, 80, 25],
    // Reliefs 1.5 wide from the bend line to 3 + 3 below it, round at the bottom: 1.5 x 5.25 + pi 0.75^2 / 2 = 8.758573.
    // 120 x 80 + 2 x 96 x 22.345796 + 2 x 56 x 22.345796 - 8 x 8.758573 = 9600 + 6793.121984 - 70.068584
    areaMm2: 16323.0534,
    reliefs: 8,
  },
  {
    name: 'box with return flanges on two sides',
    stock: THIN,
    layout: box({ lengthMm: 120, widthMm: 80, flangeMm: 25, cornerMm: 12, returnMm: 10 }),
    // 80 + 2 x (25 + 10 - 2 x 2.654204)
    flatMm: [164.691592, 139.383184],
    formedMm: [120, 80, 25],
    // The box, and 2 x 96 x (10 - 2.654204)
    areaMm2: 17733.446232,
    reliefs: 8,
  },
  {
    name: 'pan with sides of 60 degrees',
    stock: MILD,
    layout: box({ lengthMm: 100, widthMm: 60, flangeMm: 20, cornerMm: 12, bend: { bendAngleDeg: 60 } }),
    // BA 2.785545, setback 2.309401, deduction 1.833257: 100 + 2 x 18.166743, 60 + 2 x 18.166743
    flatMm: [136.333486, 96.333486],
    // 20 cos 60 on either side; 20 sin 60 + 2 cos 60
    formedMm: [120, 80, 18.320508],
    reliefs: 8,
  },
  {
    name: 'plate with a tab narrower than itself',
    stock: MILD,
    layout: tabLayout(),
    // Inside sizes: 50 + 25 - 2 x 2 + 4.178318
    flatMm: [80, 75.178318],
    formedMm: [80, 52, 27],
    // 80 x 50 + 40 x 25.178318 - 2 reliefs of 2 x 5 + pi / 2
    areaMm2: 4983.991127,
    reliefs: 2,
  },
  {
    name: 'tab with a narrower return',
    stock: MILD,
    layout: tabWithReturn,
    // 90 - 2 x 3.821682
    flatMm: [80, 82.356636],
    formedMm: [80, 50, 25],
    // 80 x 50 + 40 x 21.178318 + 20 x 11.178318 - 4 reliefs of 2 x 7 + pi / 2 = 4000 + 847.13272 + 223.56636 - 62.283185
    areaMm2: 5008.415895,
    reliefs: 4,
  },
  {
    name: 'two flanges that meet at a corner',
    stock: MILD,
    layout: twoFlanges,
    // 120 - 3.821682, 85 - 3.821682
    flatMm: [116.178318, 81.178318],
    formedMm: [100, 60, 25],
  },
  {
    name: 'bend that runs askew to the edges',
    stock: MILD,
    layout: skew,
    // The bend runs along (0.6, 0.8): the flange comes nearer by 3.821682 x (0.8, -0.6).
    flatMm: [196.942654, 62.293009],
    // Corner (200, 0) lies 112 from the line, corner (200, 60) 76, at 132 along it: (60 + 0.6 x 132, 0.8 x 132) = (139.2, 105.6),
    // its inner face 2 x (-0.8, 0.6) from there.
    formedMm: [139.2, 106.8, 112],
  },
];
