import fc from 'fast-check';
import { developLayout } from '@foldwright/shared/bending/develop';
import type { Development } from '@foldwright/shared/bending/development';
import type { Layout } from '@foldwright/shared/bending/layout';
import { layoutOfPart, randomPart } from '@foldwright/shared/bending/testing/random-parts';
import { runs } from '@foldwright/shared/bending/testing/runs';
import {
  cradleLayout,
  hatLayout,
  lLayout,
  sampleStock,
  tabLayout,
  trayLayout,
  uLayout,
  zLayout,
} from '@foldwright/shared/bending/testing/sample-layouts';
import { developPart } from '@foldwright/shared/part/develop-part';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { solidFacts } from '@foldwright/shared/solid/solid-facts';
import { solidPlan } from '@foldwright/shared/solid/solid-plan';
import { makeSolids } from '@foldwright/server/step/make-solids';
import { furnishedBracket } from '../support/any-command';

jest.setTimeout(300_000);

/** Relative error wanted where the sides of bend zones run straight across, and where they are oblique or round. */
const STRAIGHT = 1e-9;
const OBLIQUE = 1e-6;
/** The modeller widens boxes by its own confusion distance, 1e-7 mm. */
const BOX_MM = 1e-6;

const round = (diameterMm: number, offMm: number): Layout => ({
  ...lLayout(50, 40),
  features: [{ kind: 'hole', id: 'h', centre: { x: 50 + offMm, y: 20 }, purpose: { kind: 'plain', diameterMm } }],
});

/** An L whose side edges lean over the bend, so that they wind round it. */
const leaning = (sideEdges: 'trimmed' | 'blended'): Layout => {
  const layout = lLayout(60, 40, { sideEdges });
  return {
    ...layout,
    outer: {
      id: 'outer',
      edges: [
        { id: 'a', start: { x: 0, y: 0 }, bulge: 0 },
        { id: 'b', start: { x: 100, y: 18 }, bulge: 0 },
        { id: 'c', start: { x: 100, y: 30 }, bulge: 0 },
        { id: 'd', start: { x: 0, y: 40 }, bulge: 0 },
      ],
    },
  };
};

const LAYOUTS: readonly (readonly [string, Layout])[] = [
  ['L', lLayout()],
  ['L, 5 degrees', lLayout(50, 30, { bendAngleDeg: 5 })],
  ['L, 30 degrees away', lLayout(50, 30, { bendAngleDeg: 30, direction: 'away' })],
  ['L, 135 degrees', lLayout(50, 40, { bendAngleDeg: 135 })],
  ['L, 165 degrees', lLayout(60, 60, { bendAngleDeg: 165, reference: 'tangent' })],
  ['U', uLayout()],
  ['Z', zLayout()],
  ['hat', hatLayout()],
  ['tray', trayLayout()],
  ['tabs with reliefs', tabLayout()],
  ['tabs with square reliefs', tabLayout({}, { shape: 'rectangular' })],
  ['cradle, trimmed', cradleLayout()],
  ['cradle, blended', cradleLayout({ sideEdges: 'blended' })],
  ['leaning sides, trimmed', leaning('trimmed')],
  ['leaning sides, blended', leaning('blended')],
  ['hole within a bend', round(1, 0.3)],
  ['hole over a tangent line', round(4, 1)],
  ['hole over a whole bend', round(12, 0)],
];

/** Random parts whose holes overlap can't be developed; they are counted. */
let undeveloped = 0;
const developed = (layout: Layout): readonly Development[] => {
  const result = developLayout(layout, null, sampleStock());
  if (!result.ok) undeveloped += 1;
  return result.ok ? [result.development] : [];
};

const starters = [
  { shape: 'tray', lengthMm: 120, widthMm: 80, flangeMm: 30 },
  { shape: 'gusseted-l', baseMm: 90, flangeMm: 70, widthMm: 60, gussetMm: 55 },
  { shape: 'hat-section', topMm: 60, sideMm: 40, brimMm: 30, widthMm: 50 },
] as const;

const parts: readonly (readonly [string, Development])[] = [
  ...LAYOUTS.flatMap(([name, layout]) => developed(layout).map((development) => [name, development] as const)),
  ...[furnishedBracket, ...starters.map(starterDocument)].flatMap((document, index) =>
    (['trial', 'production'] as const).flatMap((role) => {
      const result = developPart(document, role);
      return result.ok ? [[`document ${index} ${role}`, result.development] as const] : [];
    }),
  ),
  ...fc
    .sample(randomPart, { numRuns: Math.round(60 + runs(0.001)), seed: 3 })
    .flatMap((part, index) => developed(layoutOfPart(part)).map((one) => [`random ${index}`, one] as const)),
];

/** Whether every free side of every bend runs straight across it. */
const isStraight = (development: Development): boolean =>
  solidPlan(development).pieces.every(
    (piece) =>
      piece.kind === 'slab' ||
      piece.loops.flat().every(({ segment, isSeam }) => {
        const isAcross = Math.abs(segment.from.x - segment.to.x) < 1e-9;
        return isSeam || (segment.kind === 'line' && isAcross);
      }),
  );

describe('formed solids, built and measured by OpenCascade', () => {
  it('are valid, closed, and of the volume, surface and box that the kernel computes', async () => {
    expect(parts.length).toBeGreaterThanOrEqual(60);
    const plans = parts.map(([name, development]) => ({ name, plan: solidPlan(development) }));
    const answers = await makeSolids({ solids: plans, stamp: '2026-12-01T00:00:00' });
    const worst = { straight: { volume: 0, surface: 0 }, oblique: { volume: 0, surface: 0 }, boxMm: 0 };
    const counts = { straight: 0, oblique: 0 };
    const refused: string[] = [];
    parts.forEach(([name, development], index) => {
      const answer = answers[index];
      const plan = plans[index]?.plan;
      if (answer === undefined || plan === undefined) throw new Error('A part was not answered.');
      if (!answer.ok) {
        refused.push(`${name}: ${answer.reason}`);
        return;
      }
      const kind = isStraight(development) ? 'straight' : 'oblique';
      counts[kind] += 1;
      const facts = solidFacts(plan);
      const volume = Math.abs(answer.measures.volumeMm3 / facts.volumeMm3 - 1);
      const surface = Math.abs(answer.measures.surfaceMm2 / facts.surfaceMm2 - 1);
      expect([name, volume < (kind === 'straight' ? STRAIGHT : OBLIQUE)]).toEqual([name, true]);
      expect([name, surface < (kind === 'straight' ? STRAIGHT : OBLIQUE)]).toEqual([name, true]);
      worst[kind] = {
        volume: Math.max(worst[kind].volume, volume),
        surface: Math.max(worst[kind].surface, surface),
      };
      const { min, max } = development.formedBox;
      (['x', 'y', 'z'] as const).forEach((axis, at) => {
        const offMm = Math.max(
          Math.abs((answer.measures.box.min[at] ?? NaN) - min[axis]),
          Math.abs((answer.measures.box.max[at] ?? NaN) - max[axis]),
        );
        expect([name, offMm < BOX_MM]).toEqual([name, true]);
        worst.boxMm = Math.max(worst.boxMm, offMm);
      });
      expect(answer.step).toContain('MANIFOLD_SOLID_BREP');
      expect(answer.step).toContain('AP242_MANAGED_MODEL_BASED_3D_ENGINEERING');
    });
    const figures = ({ volume, surface }: typeof worst.straight): string =>
      `volume ${volume.toExponential(1)}, surface ${surface.toExponential(1)}`;
    process.stdout.write(
      `solids against OpenCascade: ${counts.straight} with straight sides: ${figures(worst.straight)}; ` +
        `${counts.oblique} with oblique or round ones: ${figures(worst.oblique)} (relative); boxes ${worst.boxMm.toExponential(1)} mm` +
        `; ${undeveloped} could not be developed${refused.length === 0 ? '' : `; refused: ${refused.join(', ')}`}\n`,
    );
    expect(counts.straight + counts.oblique).toBeGreaterThanOrEqual(60);
    expect(counts.oblique).toBeGreaterThanOrEqual(8);
    expect(undeveloped).toBeLessThanOrEqual(3);
    expect(refused).toEqual([]);
  });

  it('have more metal in the bend than the flat, by half less K of the zone: 13 % at R = T and K 0.33', () => {
    // (Ro^2 - Ri^2) / 2 = T (R + T / 2), against T (R + K T): at R = T that is 1.5 / 1.33 = 1.128 for K = 0.33.
    const stock = sampleStock({ thicknessMm: 2, deliveredRadiusMm: 2 });
    const result = developLayout(lLayout(50, 30, { kFactor: 0.33 }), null, stock);
    if (!result.ok) throw new Error('An L can be developed.');
    const { volumeMm3 } = solidFacts(solidPlan(result.development));
    const { flat, zones } = result.development;
    const zone = zones[0];
    if (zone === undefined) throw new Error('An L has a bend.');
    const widthMm = flat.bounds.max.y - flat.bounds.min.y;
    const zoneMm3 = zone.bendAllowanceMm * widthMm * 2;
    expect((volumeMm3 - flat.areaMm2 * 2) / zoneMm3).toBeCloseTo(1.5 / 1.33 - 1, 9);
  });
});
