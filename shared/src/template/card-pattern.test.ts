import fc from 'fast-check';
import { developLayout } from '../bending/develop';
import type { Development, Panel } from '../bending/development';
import { panelPoses, placeIn } from '../bending/fold';
import type { CardHinge, Layout } from '../bending/layout';
import { runs } from '../bending/testing/runs';
import {
  hatLayout,
  lLayout,
  sampleBend,
  sampleLayout,
  sampleStock,
  tabLayout,
  trayLayout,
  uLayout,
  zLayout,
} from '../bending/testing/sample-layouts';
import type { Point, Point3 } from '../geometry/point';
import { movePoint } from '../geometry/transform';
import { distance, dot, subtract, unit } from '../geometry/vector';
import { along3, cross3, dot3, subtract3, unit3 } from '../geometry/vector3';
import { type CardPattern, type CardStock, cardPattern } from './card-pattern';

jest.setTimeout(30_000 + runs() * 100);

const WITHIN_MM = 0.01;

/** A stiff plate of card in space: turns and shifts points that lay in the flat card with face B on z = 0. */
type Motion = (point: Point3) => Point3;

/** Turns about a line in space by Rodrigues' formula. */
function turnAbout(at: Point3, axis: Point3, angleDeg: number): Motion {
  const u = unit3(axis);
  const [cosine, sine] = [Math.cos((angleDeg * Math.PI) / 180), Math.sin((angleDeg * Math.PI) / 180)];
  return (point) => {
    const off = subtract3(point, at);
    const turned = along3(along3(scaled(off, cosine), cross3(u, off), sine), u, dot3(u, off) * (1 - cosine));
    return { x: at.x + turned.x, y: at.y + turned.y, z: at.z + turned.z };
  };
}

const scaled = ({ x, y, z }: Point3, by: number): Point3 => ({ x: x * by, y: y * by, z: z * by });

/** Depth of the hinge below face A. */
function hingeBelowFaceA({ thicknessMm, hinge }: CardStock): number {
  if (hinge.kind === 'middle') return thicknessMm / 2;
  if (hinge.kind === 'depth') return hinge.depthMm;
  return hinge.face === 'A' ? 0 : thicknessMm;
}

/** Folds card as stiff plates about its hinges, from the base panel outwards. Nothing here comes from the kernel's folding. */
function foldCard(pattern: CardPattern, card: CardStock): readonly Motion[] {
  const motions: Motion[] = [];
  const hingeZ = card.thicknessMm - hingeBelowFaceA(card);
  for (const panel of pattern.panels) {
    const crease = pattern.creases.find(({ bendId, from, to }) => bendId === panel.bendId && isBeside(panel, from, to));
    const parent = panel.parentIndex === null ? undefined : motions[panel.parentIndex];
    if (crease === undefined || parent === undefined) {
      motions[panel.index] = (point) => point;
      continue;
    }
    const inside = middleOfPanel(panel);
    const way = unit(subtract(crease.to, crease.from));
    // The child lies to the left of the line that is turned about, so that a positive turn lifts it towards face A.
    const isLeft = way.x * (inside.y - crease.from.y) - way.y * (inside.x - crease.from.x) > 0;
    const axis = isLeft ? { ...way, z: 0 } : { x: -way.x, y: -way.y, z: 0 };
    const turnDeg = crease.direction === 'towards' ? crease.bendAngleDeg : -crease.bendAngleDeg;
    const own = turnAbout({ ...crease.from, z: hingeZ }, axis, turnDeg);
    motions[panel.index] = (point) => parent(own(point));
  }
  return motions;
}

const middleOfPanel = ({ outer }: Panel): Point =>
  outer.reduce((sum, { from }) => ({ x: sum.x + from.x / outer.length, y: sum.y + from.y / outer.length }), {
    x: 0,
    y: 0,
  });

/** Whether a panel has an edge along a line: several panels may hang on pieces of one bend line. */
function isBeside(panel: Panel, from: Point, to: Point): boolean {
  const way = unit(subtract(to, from));
  const off = (point: Point): number => Math.abs(way.x * (point.y - from.y) - way.y * (point.x - from.x));
  const reach = (point: Point): number => dot(subtract(point, from), way);
  return panel.outer.some(
    (edge) =>
      off(edge.from) < 0.01 &&
      off(edge.to) < 0.01 &&
      distance(edge.from, edge.to) > 1 &&
      Math.max(reach(edge.from), reach(edge.to)) > 0.5 &&
      Math.min(reach(edge.from), reach(edge.to)) < distance(from, to) - 0.5,
  );
}

/** Greatest distance between places of the layout on the metal's bearing face and on the folded card's. */
function worstMissMm(layout: Layout, development: Development, pattern: CardPattern, card: CardStock): number {
  const { thicknessMm } = development.stock;
  const poses = panelPoses(development.panels, development.zones, thicknessMm, 1);
  const motions = foldCard(pattern, card);
  const isFaceA = card.bearingFace === 'A';
  // The card's bearing face is laid on the metal's at the base panel.
  const liftMm = isFaceA ? thicknessMm - card.thicknessMm : 0;
  let worst = 0;
  for (const panel of development.panels) {
    const pose = poses[panel.index];
    const plate = pattern.panels.find(({ bendId, parentIndex, layoutOuter }) => {
      const [a, b] = [layoutOuter[0]?.from, panel.layoutOuter[0]?.from];
      return bendId === panel.bendId && parentIndex === panel.parentIndex && a?.x === b?.x && a?.y === b?.y;
    });
    const motion = plate === undefined ? undefined : motions[plate.index];
    if (pose === undefined || plate === undefined || motion === undefined) throw new Error('A panel has no card.');
    for (const { from } of panel.layoutOuter) {
      const metal = placeIn(pose, movePoint(panel.placement, from), isFaceA ? thicknessMm : 0).at;
      const flat = movePoint(plate.placement, from);
      const folded = motion({ ...flat, z: isFaceA ? card.thicknessMm : 0 });
      const off = subtract3(metal, { ...folded, z: folded.z + liftMm });
      worst = Math.max(worst, Math.hypot(off.x, off.y, off.z));
    }
  }
  expect(layout.bends.length).toBe(new Set(pattern.creases.map(({ bendId }) => bendId)).size);
  return worst;
}

const HINGES: readonly CardHinge[] = [
  { kind: 'middle' },
  { kind: 'liner', face: 'A' },
  { kind: 'liner', face: 'B' },
  { kind: 'depth', depthMm: 0.7 },
];
const SHAPES: readonly (readonly [string, Layout, number])[] = [
  ['L', lLayout(), 3],
  ['U', uLayout(), 3],
  ['Z', zLayout(), 3],
  ['hat', hatLayout(), 3],
  ['tray', trayLayout(), 1],
  ['tabs with reliefs', tabLayout(), 3],
  ['L at 30 degrees', lLayout(50, 30, { bendAngleDeg: 30 }), 3],
  ['L at 135 degrees', lLayout(50, 40, { bendAngleDeg: 135 }), 3],
];

describe('a template of card made from a design', () => {
  it.each(SHAPES)('%s: folded about its hinge, its bearing faces are where the metal’s are', (_, layout, cardMm) => {
    for (const thicknessMm of [1.5, 3]) {
      const stock = sampleStock({ thicknessMm, deliveredRadiusMm: 2 });
      const result = developLayout(layout, null, stock);
      if (!result.ok) throw new Error(result.problems[0]?.message);
      for (const bearingFace of ['A', 'B'] as const) {
        for (const hinge of HINGES) {
          const card: CardStock = { thicknessMm: cardMm, hinge, bearingFace };
          const made = cardPattern(layout, null, stock, card);
          if (!made.ok) throw new Error(made.problems[0]?.message);
          expect(worstMissMm(layout, result.development, made.pattern, card)).toBeLessThan(WITHIN_MM);
        }
      }
    }
  });

  it('does so for bends that are not parallel, at any angle up to 165 degrees', () => {
    const angle = fc.integer({ min: 5, max: 120 });
    const direction = fc.constantFrom('towards', 'away');
    const hinge = fc.constantFrom(...HINGES);
    const face = fc.constantFrom('A', 'B');
    fc.assert(
      fc.property(angle, angle, direction, direction, hinge, face, (first, second, d1, d2, cardHinge, bearingFace) => {
        const layout = sampleLayout({
          outer: [
            { x: 0, y: 0 },
            { x: 160, y: 0 },
            { x: 160, y: 80 },
            { x: 0, y: 80 },
          ],
          bends: [
            sampleBend('b1', { x: 50, y: 0 }, { x: 44, y: 80 }, { bendAngleDeg: first, direction: d1 }),
            sampleBend('b2', { x: 105, y: 0 }, { x: 118, y: 80 }, { bendAngleDeg: second, direction: d2 }),
          ],
          baseAnchor: { x: 80, y: 40 },
        });
        const stock = sampleStock();
        const result = developLayout(layout, null, stock);
        const card: CardStock = { thicknessMm: 3, hinge: cardHinge, bearingFace };
        const made = cardPattern(layout, null, stock, card);
        if (!result.ok || !made.ok) throw new Error('This part can be developed.');
        expect(worstMissMm(layout, result.development, made.pattern, card)).toBeLessThan(WITHIN_MM);
      }),
      { numRuns: runs(0.3) },
    );
  });

  it('is the old template again when that was read and held on one face', () => {
    // 50 + 30 on the outside of 3 mm card hinged at its middle: the legs to the hinge are 1.5 mm shorter each.
    const reading = { readOn: 'faceB', bearingFace: 'B', hinge: { kind: 'middle' } } as const;
    const bend = { ...lLayout().bends[0], lengths: { from: 'template', override: null } } as Layout['bends'][number];
    const layout = { ...lLayout(50, 30), bends: [bend] };
    const made = cardPattern(layout, { thicknessMm: 3, reading }, sampleStock(), {
      thicknessMm: 3,
      hinge: { kind: 'middle' },
      bearingFace: 'B',
    });
    if (!made.ok) throw new Error(made.problems[0]?.message);
    const { min, max } = made.pattern.bounds;
    expect(max.x - min.x).toBeCloseTo(77, 2);
  });

  it('is refused in words for a hem, and for a hinge outside the card', () => {
    const card: CardStock = { thicknessMm: 3, hinge: { kind: 'middle' }, bearingFace: 'A' };
    const hem = cardPattern(lLayout(50, 30, { bendAngleDeg: 170 }), null, sampleStock(), card);
    expect(hem).toMatchObject({ ok: false, problems: [{ code: 'angleOutOfRange', ids: ['bend-1'] }] });
    const outside = cardPattern(lLayout(), null, sampleStock(), { ...card, hinge: { kind: 'depth', depthMm: 3.1 } });
    expect(outside).toMatchObject({ ok: false, problems: [{ code: 'referenceNotAllowed' }] });
  });
});
