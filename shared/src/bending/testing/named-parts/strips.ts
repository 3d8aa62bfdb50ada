import type { Layout } from '../../layout';
import { hatLayout, lLayout, stripLayout, uLayout, zLayout } from '../sample-layouts';
import type { SampleBend } from '../sample-layouts';
import { ALLOY, MILD, THIN } from './named-part';
import type { NamedPart } from './named-part';

const outside = { reference: 'outsideApex' } as const;
const outermost = { reference: 'outsideTangent' } as const;

/** Square wave: up, over, down, over, and again; 20 bends. */
const wave = Array.from({ length: 20 }, (_, index): SampleBend => {
  return { ...outside, direction: index % 4 === 0 || index % 4 === 3 ? 'towards' : 'away' };
});

const withOverride = (layout: Layout, deductionMm: number): Layout => ({
  ...layout,
  bends: layout.bends.map((bend) => ({
    ...bend,
    override: { kind: 'deduction', deductionMm, reference: 'outsideApex', reason: 'measured on the last batch' },
  })),
});

/** Strips 40 wide with bends across them. Axes: x along the base, z up from its face B. */
export const STRIPS: readonly NamedPart[] = [
  {
    name: 'L, outside sizes',
    stock: MILD,
    layout: lLayout(50, 30),
    // 50 + 30 - 3.821682
    flatMm: [76.178318, 40],
    formedMm: [50, 40, 30],
  },
  {
    name: 'L, inside sizes',
    stock: ALLOY,
    layout: stripLayout([50, 30], [{}]),
    // 50 + 30 - 2 x 4.5 + 9.000663; a sheet of 3 outside each leg
    flatMm: [80.000663, 40],
    formedMm: [53, 40, 33],
  },
  {
    name: 'L with a measured deduction',
    stock: MILD,
    layout: withOverride(lLayout(50, 30), 3.6),
    // 50 + 30 - 3.6
    flatMm: [76.4, 40],
    formedMm: [50, 40, 30],
  },
  {
    name: 'L of 5 degrees',
    stock: MILD,
    layout: lLayout(60, 60, { bendAngleDeg: 5 }),
    // BA 0.087266 x 2.66 = 0.232129, setback 4 tan 2.5 = 0.174644: 120 - 0.349288 + 0.232129
    flatMm: [119.882841, 40],
    // 60 + 60 cos 5 = 60 + 59.771682; 60 sin 5 + 2 cos 5 = 5.229345 + 1.992389
    formedMm: [119.771682, 40, 7.221734],
  },
  {
    name: 'L of 45 degrees',
    stock: MILD,
    layout: lLayout(50, 30, { bendAngleDeg: 45 }),
    // BA 0.785398 x 2.66 = 2.089159, setback 4 tan 22.5 = 1.656854: 80 - 3.313708 + 2.089159
    flatMm: [78.775451, 40],
    // 50 + 30 cos 45; 30 sin 45 + 2 cos 45 = 21.213203 + 1.414214
    formedMm: [71.213203, 40, 22.627417],
  },
  {
    name: 'L of 75 degrees, away',
    stock: MILD,
    layout: lLayout(50, 30, { bendAngleDeg: 75, direction: 'away' }),
    // BA 1.308997 x 2.66 = 3.481932, setback 4 tan 37.5 = 3.069308: 80 - 6.138616 + 3.481932
    flatMm: [77.343316, 40],
    // 50 + 30 cos 75 = 50 + 7.764571; 30 sin 75 + 2 cos 75 = 28.977775 + 0.517638
    formedMm: [57.764571, 40, 29.495413],
  },
  {
    name: 'L of 135 degrees, outermost points',
    stock: MILD,
    layout: lLayout(50, 40, { bendAngleDeg: 135, ...outermost }),
    // BA 2.356194 x 2.66 = 6.267477: 90 - 2 x 4 + 6.267477
    flatMm: [88.267477, 40],
    // The flange leans back over the base. Axis 4 up; outside of the bend's end 4 + 4 cos 45 = 6.828427, then 36 sin 45 = 25.455844.
    formedMm: [50, 40, 32.284271],
  },
  {
    name: 'L of 150 degrees, innermost points',
    stock: ALLOY,
    layout: lLayout(60, 30, { bendAngleDeg: 150, reference: 'insideTangent' }),
    // BA 2.617994 x 5.73 = 15.001105: 90 - 2 x 4.5 + 15.001105
    flatMm: [96.001105, 40],
    // 60 inside and a sheet of 3. Axis 7.5 up: 7.5 + 7.5 cos 30 = 13.995191, then (30 - 4.5) sin 30 = 12.75.
    formedMm: [63, 40, 26.745191],
  },
  {
    name: 'L of 165 degrees',
    stock: THIN,
    layout: lLayout(60, 40, { bendAngleDeg: 165, ...outermost }),
    // BA 2.879793 x 2.13 = 6.133960: 100 - 2 x 3 + 6.133960
    flatMm: [100.13396, 40],
    // 3 + 3 cos 15 = 5.897777, then 37 sin 15 = 9.576305
    formedMm: [60, 40, 15.474082],
  },
  {
    name: 'hem, flat lengths to the tangent lines',
    stock: THIN,
    layout: stripLayout([40, 12], [{ bendAngleDeg: 180, reference: 'tangent', insideRadiusMm: 0.75 }]),
    // A hem counts K 0.5: BA pi (0.75 + 0.75) = 4.712389: 40 + 12 + 4.712389
    flatMm: [56.712389, 40],
    // 40 + R + T = 42.25; 2 R + 2 T
    formedMm: [42.25, 40, 4.5],
  },
  {
    name: 'hem turned away, outermost points',
    stock: THIN,
    layout: stripLayout([42.25, 14.25], [{ bendAngleDeg: 180, insideRadiusMm: 0.75, direction: 'away', ...outermost }]),
    // The hem above, measured over its bend: 42.25 + 14.25 - 2 x 2.25 + 4.712389
    flatMm: [56.712389, 40],
    formedMm: [42.25, 40, 4.5],
  },
  {
    name: 'Z, web over everything',
    stock: THIN,
    layout: zLayout(25, 40, 25),
    // 90 - 2 x 2.654204
    flatMm: [84.691592, 40],
    // The web's sheet belongs to both flanges: 25 + 25 - 1.5.
    formedMm: [48.5, 40, 40],
  },
  {
    name: 'Z on its web: one flange up, one down',
    stock: MILD,
    layout: stripLayout([20, 100, 15], [outside, { ...outside, direction: 'away' }], 40, 1),
    // 135 - 2 x 3.821682
    flatMm: [127.356636, 40],
    // 20 up from face B, 15 down from face A, 2 above it
    formedMm: [100, 40, 33],
  },
  {
    name: 'joggle of 30 degrees',
    stock: MILD,
    layout: stripLayout(
      [40, 20, 40],
      [
        { bendAngleDeg: 30, ...outside },
        { bendAngleDeg: 30, direction: 'away', ...outside },
      ],
    ),
    // BA 0.523599 x 2.66 = 1.392773, setback 4 tan 15 = 1.071797; deduction 0.750821: 100 - 1.501642
    flatMm: [98.498358, 40],
    // From apex on face B to apex on face A: 20 cos 30 - 2 sin 30 = 16.320508 along, 20 sin 30 + 2 cos 30 = 11.732051 up; 40 + 16.320508 + 40
    formedMm: [96.320508, 40, 11.732051],
  },
  {
    name: 'U',
    stock: ALLOY,
    layout: uLayout(30, 60),
    // 120 - 2 x 5.999337
    flatMm: [108.001326, 40],
    formedMm: [60, 40, 30],
  },
  {
    name: 'U with flanges of 120 degrees',
    stock: THIN,
    layout: uLayout(30, 80, { bendAngleDeg: 120, ...outermost }),
    // BA 2.094395 x 2.13 = 4.461062: 140 - 2 x (6 - 4.461062)
    flatMm: [136.922124, 40],
    // 3 + 3 cos 60 = 4.5, then 27 sin 60 = 23.382686
    formedMm: [80, 40, 27.882686],
  },
  {
    name: 'hat',
    stock: MILD,
    layout: hatLayout(20, 25, 50),
    // 140 - 4 x 3.821682
    flatMm: [124.713272, 40],
    // Brims start inside the sides' sheet: 50 + 2 x 20 - 2 x 2.
    formedMm: [86, 40, 25],
  },
  {
    name: 'hat with sides of 60 degrees',
    stock: MILD,
    layout: hatLayout(20, 25, 50, { bendAngleDeg: 60 }),
    // BA 1.047198 x 2.66 = 2.785545, setback 4 tan 30 = 2.309401; deduction 1.833257: 140 - 4 x 1.833257
    flatMm: [132.666972, 40],
    // Half of it: 25 + 25 cos 60 - 2 sin 60 + 20 = 55.767949; 25 sin 60 + 2 cos 60 = 22.650635
    formedMm: [111.535898, 40, 22.650635],
  },
  {
    name: 'channel with lips turned in',
    stock: ALLOY,
    layout: stripLayout([12, 25, 60, 25, 12], [outside, outside, outside, outside], 40, 2),
    // 134 - 4 x 5.999337
    flatMm: [110.002652, 40],
    formedMm: [60, 40, 25],
  },
  {
    name: 'square tube with an open seam',
    stock: THIN,
    layout: stripLayout([20, 40, 40, 40, 18], [outside, outside, outside, outside], 40, 2),
    // 158 - 4 x 2.654204
    flatMm: [147.383184, 40],
    formedMm: [40, 40, 40],
  },
  {
    name: 'two bends, each to its own reference',
    stock: ALLOY,
    layout: stripLayout([40, 60, 30], [{}, { bendAngleDeg: 120, ...outermost }]),
    // 130 - 2 x 4.5 + 9.000663 - 2 x 7.5 + 2.094395 x 5.73 (12.000884)
    flatMm: [127.001547, 40],
    // Inside 40 and 3 of sheet; 3 of sheet and 60 to the outermost point. The last flange comes back to 43 - 11.25 - 22.5 cos 30.
    formedMm: [43, 40, 63],
  },
  {
    name: 'twenty bends: a square wave',
    stock: THIN,
    layout: stripLayout(
      Array.from({ length: 21 }, () => 20),
      wave,
    ),
    // 21 x 20 - 20 x 2.654204
    flatMm: [366.91592, 40],
    // Eleven legs lie along x; each of ten webs is shared by two of them: 220 - 10 x 1.5.
    formedMm: [205, 40, 20],
  },
];

const template = (readOn: 'faceA' | 'faceB', thicknessMm: number): NonNullable<NamedPart['template']> => ({
  thicknessMm,
  reading: { readOn, bearingFace: 'A', hinge: { kind: 'middle' } },
});

const fromTemplate = (layout: Layout): Layout => ({
  ...layout,
  bends: layout.bends.map((bend) => ({ ...bend, lengths: { from: 'template', override: null } })),
});

/** Strips taken from card. */
export const CARD_STRIPS: readonly NamedPart[] = [
  {
    name: 'Z read on one face of card',
    stock: MILD,
    layout: fromTemplate(zLayout(25, 40, 25)),
    template: template('faceA', 3),
    // Face A is inside the first bend and outside the second: 90 - 2 x 2 - 2 x 4 + 2 x 4.178318
    flatMm: [86.356636, 40],
    // Along face A 25 + 25 between the ends; the web of 40 has its sheet of 2 at its foot only.
    formedMm: [50, 40, 42],
  },
  {
    name: 'L read outside on card of 1.5, held inside in alloy of 3',
    stock: ALLOY,
    layout: fromTemplate(lLayout(50, 30)),
    template: template('faceB', 1.5),
    // Inside legs 48.5 and 28.5: 77 - 2 x 4.5 + 9.000663
    flatMm: [77.000663, 40],
    formedMm: [51.5, 40, 31.5],
  },
];
