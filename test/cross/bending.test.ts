import { Clipper, FillRule } from 'clipper2-ts';
import fc from 'fast-check';
import { developLayout } from '@foldwright/shared/bending/develop';
import type { Development } from '@foldwright/shared/bending/development';
import { layoutOfPart, randomPart } from '@foldwright/shared/bending/testing/random-parts';
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
import { flattenLoop } from '@foldwright/shared/geometry/flatten';
import { circleLoop, slotLoop } from '@foldwright/shared/geometry/loop';
import type { Loop } from '@foldwright/shared/geometry/path';
import { runs } from '@foldwright/shared/bending/testing/runs';

// The flat's area by two roads that share nothing with the kernel's joining of panels and zones: a count of trapezoids over a fine
// polygon of the outline, and a general polygon library's union of all panels and zones less all openings.

const CHORD_MM = 0.0005;
/** Digits after the point on the library's grid. */
const GRID_DIGITS = 6;

type Corners = { x: number; y: number }[];

function cornersOf(loop: Loop): Corners {
  return flattenLoop(loop, CHORD_MM).map(({ x, y }) => ({ x, y }));
}

function trapezoids(corners: Corners): number {
  return corners.reduce((sum, { x, y }, index) => {
    const next = corners[(index + 1) % corners.length] ?? { x, y };
    return sum + ((next.x - x) * (y + next.y)) / 2;
  }, 0);
}

function openingsOf({ flat }: Development): readonly Loop[] {
  return [
    ...flat.holes.map(({ centre, diameterMm }) => circleLoop(centre, diameterMm / 2)),
    ...flat.slots.map(({ from, to, widthMm }) => slotLoop(from, to, widthMm)),
    ...flat.cutouts,
  ];
}

function areaByCount(development: Development): number {
  const openings = openingsOf(development).reduce((sum, loop) => sum + Math.abs(trapezoids(cornersOf(loop))), 0);
  return Math.abs(trapezoids(cornersOf(development.flat.outer))) - openings;
}

function areaByUnion(development: Development): number {
  const pieces = [...development.panels.map(({ outer }) => outer), ...development.zones.map(({ outer }) => outer)].map(
    cornersOf,
  );
  const whole = Clipper.unionD(pieces, [], FillRule.NonZero, GRID_DIGITS);
  const openings = development.panels.flatMap((panel) => panel.openings.map(cornersOf));
  const net = openings.length === 0 ? whole : Clipper.differenceD(whole, openings, FillRule.NonZero, GRID_DIGITS);
  return Math.abs(Clipper.areaPathsD(net));
}

const SAMPLES = [
  ['L', lLayout()],
  ['U', uLayout()],
  ['Z', zLayout()],
  ['hat', hatLayout()],
  ['tray', trayLayout()],
  ['tab with reliefs', tabLayout()],
  ['tab without reliefs', tabLayout({}, { mode: 'none' })],
  ['cradle', cradleLayout()],
  ['cradle with blended sides', cradleLayout({ sideEdges: 'blended' })],
] as const;

describe('area of the flat pattern', () => {
  it.each(SAMPLES)('%s: counted and united', (_, layout) => {
    const result = developLayout(layout, null, sampleStock());
    if (!result.ok) throw new Error(result.problems[0]?.message);
    const { areaMm2, cutLengthMm } = result.development.flat;
    // Chords lose at most two thirds of the chord error along the cut.
    const slackMm2 = CHORD_MM * cutLengthMm + 0.001;
    expect(Math.abs(areaByCount(result.development) - areaMm2)).toBeLessThan(slackMm2);
    expect(Math.abs(areaByUnion(result.development) - areaMm2)).toBeLessThan(slackMm2);
  });

  it('of random parts', () => {
    fc.assert(
      fc.property(randomPart, (part) => {
        const result = developLayout(layoutOfPart(part), null, sampleStock());
        if (!result.ok) return;
        const { areaMm2, cutLengthMm } = result.development.flat;
        const slackMm2 = CHORD_MM * cutLengthMm + 0.001;
        expect(Math.abs(areaByCount(result.development) - areaMm2)).toBeLessThan(slackMm2);
        // Where nothing is relieved a slit of no width stays between panel and zone, and the pieces may overlap along it.
        if (part.reliefs.mode === 'automatic')
          expect(Math.abs(areaByUnion(result.development) - areaMm2)).toBeLessThan(slackMm2);
      }),
      { numRuns: runs(0.3) },
    );
  });
});
