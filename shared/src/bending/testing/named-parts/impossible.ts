import type { Point } from '../../../geometry/point';
import type { DevelopmentProblem } from '../../development';
import type { BendDeclaration, Layout } from '../../layout';
import { lLayout, sampleBend, sampleLayout, sampleLoop, stripLayout } from '../sample-layouts';

/** A part that can't be, and what has to be said about it: which things are in the way, by their ids. */
export interface ImpossiblePart {
  readonly name: string;
  readonly layout: Layout;
  readonly code: DevelopmentProblem['code'];
  /** One list for each problem. */
  readonly offenders: readonly (readonly string[])[];
}

const at = (x: number, y: number): Point => ({ x, y });
const loopOf = (id: string, corners: readonly (readonly [number, number])[]): Layout['outer'] =>
  sampleLoop(
    id,
    corners.map(([x, y]) => at(x, y)),
  );

/** A plate of 100 x 80 with bends across it. */
function plate(bends: readonly BendDeclaration[], cutouts: Layout['cutouts'] = []): Layout {
  const outer = [at(0, 0), at(100, 0), at(100, 80), at(0, 80)];
  return sampleLayout({ outer, bends, cutouts, baseAnchor: at(5, 5) });
}

const bend = (id: string, from: readonly [number, number], to: readonly [number, number]): BendDeclaration =>
  sampleBend(id, at(...from), at(...to));

const window = loopOf('window', [
  [40, 30],
  [60, 30],
  [60, 50],
  [40, 50],
]);

/** A slit round three sides of a tab of 36 x 28. */
const slit = loopOf('slit', [
  [30, 20],
  [32, 20],
  [32, 48],
  [68, 48],
  [68, 20],
  [70, 20],
  [70, 50],
  [30, 50],
]);

/** A window with a tab left standing in it. */
const windowWithTab = loopOf('window', [
  [20, 20],
  [30, 20],
  [30, 40],
  [50, 40],
  [50, 20],
  [80, 20],
  [80, 60],
  [20, 60],
]);

const cornerHole = (id: string, x: number, y: number): Layout['outer'] =>
  loopOf(id, [
    [x - 5, y - 5],
    [x + 5, y - 5],
    [x + 5, y + 5],
    [x - 5, y + 5],
  ]);

export const IMPOSSIBLE_PARTS: readonly ImpossiblePart[] = [
  {
    name: 'a bend line that runs across another and ends in the sheet',
    layout: plate([bend('up', [50, 0], [50, 80]), bend('free', [80, 0], [80, 80]), bend('over', [0, 40], [70, 40])]),
    code: 'bendLineEndsInside',
    offenders: [['over']],
  },
  {
    name: 'two bend lines that cross',
    layout: plate([bend('free', [80, 0], [100, 20]), bend('up', [50, 0], [50, 80]), bend('over', [0, 40], [100, 40])]),
    code: 'bendLinesCross',
    offenders: [['up', 'over']],
  },
  {
    name: 'a tray whose corners are not cut out',
    layout: plate([
      bend('front', [0, 10], [100, 10]),
      bend('right', [90, 0], [90, 80]),
      bend('back', [0, 70], [100, 70]),
      bend('left', [10, 0], [10, 80]),
    ]),
    code: 'bendLinesCross',
    offenders: [
      ['front', 'right'],
      ['front', 'left'],
      ['right', 'back'],
      ['back', 'left'],
    ],
  },
  {
    name: 'a ring of four panels round a window',
    layout: plate(
      [
        bend('south', [50, 0], [50, 30]),
        bend('east', [60, 40], [100, 40]),
        bend('north', [50, 50], [50, 80]),
        bend('west', [0, 40], [40, 40]),
      ],
      [window],
    ),
    code: 'panelRing',
    offenders: [['south', 'east', 'north', 'west']],
  },
  {
    name: 'a bend line that ends inside the sheet without a relief',
    layout: plate([bend('good', [80, 0], [80, 80]), bend('short', [40, 0], [40, 60])]),
    code: 'bendLineEndsInside',
    offenders: [['short']],
  },
  {
    name: 'a bend line that stops at a window and parts nothing',
    layout: plate([bend('short', [50, 0], [50, 30])], [window]),
    code: 'bendLineEndsInside',
    offenders: [['short']],
  },
  {
    name: 'a tab slit free in the middle of a panel',
    layout: plate([bend('good', [90, 0], [90, 80]), bend('tab', [32, 24], [68, 24])], [slit]),
    code: 'bendLineEndsInside',
    offenders: [['tab']],
  },
  {
    name: 'a tab left standing in a window, bent at the window’s edge',
    layout: plate([bend('tab', [30, 20], [50, 20])], [windowWithTab]),
    code: 'bendLineEndsInside',
    offenders: [['tab']],
  },
  {
    name: 'a middle that is hinged to its frame on all sides',
    layout: plate(
      [
        bend('south', [35, 20], [65, 20]),
        bend('east', [70, 25], [70, 55]),
        bend('north', [35, 60], [65, 60]),
        bend('west', [30, 25], [30, 55]),
      ],
      [cornerHole('sw', 30, 20), cornerHole('se', 70, 20), cornerHole('ne', 70, 60), cornerHole('nw', 30, 60)],
    ),
    code: 'bendLineEndsInside',
    offenders: [['south', 'east', 'north', 'west']],
  },
  {
    name: 'a web shorter than its two bends',
    layout: stripLayout([30, 7.9, 30], [{ reference: 'outsideApex' }, { reference: 'outsideApex' }]),
    code: 'bendTooClose',
    offenders: [['bend-1', 'bend-2']],
  },
  {
    name: 'a flange shorter than its bend',
    layout: lLayout(50, 3.9),
    code: 'bendTooClose',
    offenders: [['bend-1']],
  },
  {
    name: 'a hem measured to an apex',
    layout: lLayout(50, 12, { bendAngleDeg: 180 }),
    code: 'referenceNotAllowed',
    offenders: [['bend-1']],
  },
];
