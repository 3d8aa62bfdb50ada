import { execFileSync } from 'node:child_process';
import path from 'node:path';
import fc from 'fast-check';
import type { Development } from '@foldwright/shared/bending/development';
import { developLayout } from '@foldwright/shared/bending/develop';
import type { Layout } from '@foldwright/shared/bending/layout';
import { layoutOfPart, randomPart } from '@foldwright/shared/bending/testing/random-parts';
import {
  cradleLayout,
  hatLayout,
  sampleStock,
  tabLayout,
  trayLayout,
} from '@foldwright/shared/bending/testing/sample-layouts';
import { loopClearance } from '@foldwright/shared/geometry/clearance';
import { flattenLoop } from '@foldwright/shared/geometry/flatten';
import { circleLoop, slotLoop } from '@foldwright/shared/geometry/loop';
import type { Loop } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { furnishedBracket } from '../support/any-command';
import { developPart } from '@foldwright/shared/part/develop-part';
import * as z from 'zod/mini';

const MEASURE = path.join(__dirname, '..', 'support', 'measure_flat.py');
/** Chords stay this close to their arcs, mm; both areas and gaps may then differ by about as much along every edge. */
const CHORD_ERROR_MM = 1e-5;

const measuredSchema = z.array(
  z.object({
    isValid: z.boolean(),
    areaMm2: z.number(),
    perimeterMm: z.number(),
    smallestGapMm: z.nullable(z.number()),
    areaInsideMm2: z.number(),
    bounds: z.tuple([z.number(), z.number(), z.number(), z.number()]),
  }),
);

const openingsOf = ({ flat }: Development): readonly Loop[] => [
  ...flat.cutouts,
  ...flat.holes.map(({ centre, diameterMm }) => circleLoop(centre, diameterMm / 2)),
  ...flat.slots.map(({ from, to, widthMm }) => slotLoop(from, to, widthMm)),
];

const chords = (loop: Loop): readonly (readonly [number, number])[] =>
  flattenLoop(loop, CHORD_ERROR_MM).map(({ x, y }: Point) => [x, y] as const);

/** Flat patterns measured by Shapely (Debian's python3-shapely), in order. */
function measured(developments: readonly Development[]) {
  const input = developments.map((development) => ({
    outer: chords(development.flat.outer),
    openings: openingsOf(development).map(chords),
  }));
  const said = execFileSync('/usr/bin/python3', [MEASURE], {
    input: JSON.stringify(input),
    encoding: 'utf8',
    timeout: 120_000,
    maxBuffer: 100_000_000,
  });
  return measuredSchema.parse(JSON.parse(said));
}

const develop = (layout: Layout): readonly Development[] => {
  const result = developLayout(layout, null, sampleStock());
  return result.ok ? [result.development] : [];
};

/** Outlines rounded at the corners by a hand, with a cut-out of arcs, a slot and holes. */
const furnished = (['trial', 'production'] as const).flatMap((role) => {
  const result = developPart(furnishedBracket, role);
  return result.ok ? [result.development] : [];
});

describe('flat patterns, measured by a geometry library that is not ours', () => {
  const parts = [
    ...furnished,
    ...[trayLayout(), hatLayout(), tabLayout(), cradleLayout()].flatMap(develop),
    ...fc.sample(randomPart, { numRuns: 200, seed: 20261201 }).flatMap((part) => develop(layoutOfPart(part))),
  ];
  const truth = measured(parts);

  it('are valid polygons of the same area, cut length and extents', () => {
    // Most random parts can be developed; those that can't are told by typed problems, which other tests look at.
    expect(parts.length).toBeGreaterThan(150);
    const worst = { area: 0, cut: 0, extent: 0 };
    parts.forEach((part, index) => {
      const said = truth[index];
      if (said === undefined) throw new Error('A part was not measured.');
      const { flat } = part;
      expect(said.isValid).toBe(true);
      const chordAreaMm2 = CHORD_ERROR_MM * flat.cutLengthMm;
      expect(Math.abs(said.areaMm2 - flat.areaMm2)).toBeLessThan(chordAreaMm2 + 1e-9 * flat.areaMm2);
      expect(Math.abs(said.perimeterMm - flat.cutLengthMm)).toBeLessThan(1e-5 * flat.cutLengthMm);
      const bounds = [flat.bounds.min.x, flat.bounds.min.y, flat.bounds.max.x, flat.bounds.max.y];
      said.bounds.forEach((bound, side) => {
        expect(Math.abs(bound - (bounds[side] ?? Number.NaN))).toBeLessThan(2 * CHORD_ERROR_MM);
        worst.extent = Math.max(worst.extent, Math.abs(bound - (bounds[side] ?? Number.NaN)));
      });
      worst.area = Math.max(worst.area, Math.abs(said.areaMm2 - flat.areaMm2) / flat.areaMm2);
      worst.cut = Math.max(worst.cut, Math.abs(said.perimeterMm - flat.cutLengthMm) / flat.cutLengthMm);
    });
    process.stdout.write(
      `flat patterns against Shapely, ${parts.length} parts, chords within ${CHORD_ERROR_MM} mm: ` +
        `area ${worst.area.toExponential(1)}, cut length ${worst.cut.toExponential(1)} (relative), ` +
        `extents ${worst.extent.toExponential(1)} mm at worst\n`,
    );
  });

  it('leave the same land between their cuts', () => {
    let compared = 0;
    parts.forEach((part, index) => {
      const loops = [part.flat.outer, ...openingsOf(part)];
      const gaps = loops.flatMap((a, at) => loops.slice(at + 1).flatMap((b) => loopClearance(a, b)?.distanceMm ?? []));
      const said = truth[index]?.smallestGapMm;
      if (said === null || said === undefined) return;
      compared += 1;
      expect(Math.abs(Math.min(...gaps) - said)).toBeLessThan(3 * CHORD_ERROR_MM);
    });
    expect(compared).toBeGreaterThan(80);
  });

  it('shrink by their cut length when every edge moves in by a hair', () => {
    // Steiner: the area lost is the cut length times the way, but for corners (a bounded share of the way squared).
    parts.forEach((part, index) => {
      const { flat } = part;
      const lostMm2 = flat.areaMm2 - (truth[index]?.areaInsideMm2 ?? Number.NaN);
      const corners = flat.outer.length + flat.cutouts.reduce((sum, loop) => sum + loop.length, 0);
      expect(Math.abs(lostMm2 - flat.cutLengthMm)).toBeLessThan(2 * (corners + 2 * Math.PI * (1 + flat.pierces)));
    });
  });
});
