import fc from 'fast-check';
import { movePoint } from '../geometry/transform';
import { developLayout } from './develop';
import type { Development } from './development';
import { panelPoses, placeIn, placeInZone } from './fold';
import { layOutMesh, poseFormed } from './formed-mesh';
import type { Layout } from './layout';
import { meshFacts } from './testing/mesh-facts';
import { layoutOfPart, mirrored, randomPart, turned } from './testing/random-parts';
import { randomStrip, stripOf } from './testing/random-strips';
import {
  cradleLayout,
  hatLayout,
  lLayout,
  sampleStock,
  tabLayout,
  trayLayout,
  uLayout,
  zLayout,
} from './testing/sample-layouts';

const CHORD_MM = 0.02;
const SAMPLES: readonly (readonly [string, Layout])[] = [
  ['L', lLayout()],
  ['U', uLayout()],
  ['Z', zLayout()],
  ['hat', hatLayout()],
  ['tray', trayLayout()],
  ['tab with reliefs', tabLayout()],
  ['tab without reliefs', tabLayout({}, { mode: 'none' })],
  ['cradle', cradleLayout()],
  ['hem', lLayout(50, 30, { bendAngleDeg: 180, reference: 'tangent', insideRadiusMm: 0.2 })],
];

function developed(layout: Layout, stock = sampleStock()): Development {
  const result = developLayout(layout, null, stock);
  if (!result.ok) throw new Error(result.problems.map(({ message }) => message).join(' '));
  return result.development;
}

/** Volume of the sheet in a bend zone over its volume when flat: the mean radius over the neutral one. Source: plane geometry. */
function formedVolume({ flat, zones, stock }: Development): number {
  const grown = zones.reduce((sum, zone) => {
    const length =
      zone.outer[0] === undefined
        ? 0
        : Math.hypot(zone.outer[0].to.x - zone.outer[0].from.x, zone.outer[0].to.y - zone.outer[0].from.y);
    const area =
      ((zone.bendAngleDeg * Math.PI) / 360) *
      ((zone.insideRadiusMm + stock.thicknessMm) ** 2 - zone.insideRadiusMm ** 2);
    return sum + length * (area - zone.bendAllowanceMm * stock.thicknessMm);
  }, 0);
  return flat.areaMm2 * stock.thicknessMm + grown;
}

describe('mesh of the samples', () => {
  it.each(SAMPLES)('%s is closed with one sense at every fold fraction', (_, layout) => {
    const foldable = layOutMesh(developed(layout), CHORD_MM);
    for (const fraction of [0, 0.25, 0.5, 1]) {
      expect(meshFacts(poseFormed(foldable, fraction))).toMatchObject({ openEdges: 0, isFinite: true });
    }
  });

  it('has the volume of the flat and, formed, of slabs and cylinders', () => {
    for (const layout of [lLayout(), uLayout(), zLayout(), hatLayout()]) {
      const development = developed(layout);
      const foldable = layOutMesh(development, 0.001);
      expect(meshFacts(poseFormed(foldable, 0)).volumeMm3).toBeCloseTo(development.flat.areaMm2 * 2, 4);
      const exact = formedVolume(development);
      expect(Math.abs(meshFacts(poseFormed(foldable, 1)).volumeMm3 - exact) / exact).toBeLessThan(0.0001);
    }
  });

  // At R = T and K 0.33 the zone grows by (R + T/2)/(R + K T) - 1.
  it('grows by 13 % in the bend zone at R = T, K 0.33', () => {
    const development = developed(lLayout(50, 30, { kFactor: 0.33 }));
    const flatZone = (development.zones[0]?.bendAllowanceMm ?? 0) * 40 * 2;
    expect((formedVolume(development) - development.flat.areaMm2 * 2) / flatZone).toBeCloseTo(0.128, 3);
  });

  it('has the formed box, within the chord error', () => {
    const { formedBox, ...rest } = developed(cradleLayout());
    const facts = meshFacts(poseFormed(layOutMesh({ formedBox, ...rest }, CHORD_MM), 1));
    (['x', 'y', 'z'] as const).forEach((axis, index) => {
      expect(Math.abs((facts.min[index] ?? NaN) - formedBox.min[axis])).toBeLessThan(2 * CHORD_MM);
      expect(Math.abs((facts.max[index] ?? NaN) - formedBox.max[axis])).toBeLessThan(2 * CHORD_MM);
    });
  });

  it('puts the base with face B on the ground and bends towards face A upwards', () => {
    const up = meshFacts(poseFormed(layOutMesh(developed(lLayout())), 1));
    expect(up.min[2]).toBeCloseTo(0, 9);
    expect(up.max[2]).toBeCloseTo(30, 9);
    const down = meshFacts(poseFormed(layOutMesh(developed(lLayout(50, 30, { direction: 'away' }))), 1));
    expect(down.max[2]).toBeCloseTo(2, 9);
    expect(down.min[2]).toBeCloseTo(2 - 30, 9);
  });

  it('refuses a fold fraction outside 0 to 1', () => {
    const foldable = layOutMesh(developed(lLayout()));
    expect(() => poseFormed(foldable, 1.01)).toThrow(RangeError);
    expect(() => poseFormed(foldable, Number.NaN)).toThrow(RangeError);
  });
});

describe('folding', () => {
  it('at fraction 0 is the flat pattern, and turns every panel by the sum of its bends at 1', () => {
    fc.assert(
      fc.property(randomStrip(), (strip) => {
        const { panels, zones } = developed(stripOf(strip), strip.stock);
        const flat = panelPoses(panels, zones, strip.stock.thicknessMm, 0);
        const formed = panelPoses(panels, zones, strip.stock.thicknessMm, 1);
        let turnedDeg = 0;
        panels.forEach((panel, index) => {
          const corner = panel.outer[0]?.from ?? { x: 0, y: 0 };
          const lying = flat[index] === undefined ? null : placeIn(flat[index], corner, 0).at;
          expect(lying?.x).toBeCloseTo(corner.x, 9);
          expect(lying?.y).toBeCloseTo(corner.y, 9);
          expect(lying?.z).toBeCloseTo(0, 9);
          const bend = strip.bends[index - 1];
          if (bend !== undefined) turnedDeg += (bend.bendAngleDeg ?? 0) * (bend.direction === 'towards' ? 1 : -1);
          expect(formed[index]?.uz.z).toBeCloseTo(Math.cos((turnedDeg * Math.PI) / 180), 9);
        });
      }),
      { numRuns: 200 },
    );
  });

  it('moves panels rigidly and keeps the neutral line of every zone at its length', () => {
    fc.assert(
      fc.property(randomStrip(), fc.integer({ min: 1, max: 100 }), (strip, percent) => {
        const { panels, zones } = developed(stripOf(strip), strip.stock);
        const thickness = strip.stock.thicknessMm;
        const poses = panelPoses(panels, zones, thickness, percent / 100);
        for (const pose of poses) {
          for (const axis of [pose.ux, pose.uy, pose.uz]) expect(Math.hypot(axis.x, axis.y, axis.z)).toBeCloseTo(1, 9);
        }
        for (const zone of zones) {
          const parent = poses[zone.parentIndex];
          if (parent === undefined) throw new Error('a zone without its parent');
          const neutral = zone.direction === 'towards' ? thickness * (1 - zone.kFactor) : thickness * zone.kFactor;
          const at = (share: number) => {
            const across = zone.bendAllowanceMm * share;
            const point = {
              x: zone.origin.x + zone.towardsChild.x * across,
              y: zone.origin.y + zone.towardsChild.y * across,
            };
            return placeInZone(zone, parent, thickness, percent / 100, point, neutral).at;
          };
          const steps = 200;
          let length = 0;
          for (let step = 0; step < steps; step += 1) {
            const [a, b] = [at(step / steps), at((step + 1) / steps)];
            length += Math.hypot(b.x - a.x, b.y - a.y, b.z - a.z);
          }
          expect(Math.abs(length - zone.bendAllowanceMm)).toBeLessThan(0.0001 * zone.bendAllowanceMm);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('undone brings every point of the layout back', () => {
    fc.assert(
      fc.property(randomStrip(), (strip) => {
        const { panels, zones } = developed(stripOf(strip), strip.stock);
        const poses = panelPoses(panels, zones, strip.stock.thicknessMm, 1);
        for (const panel of panels) {
          const pose = poses[panel.index];
          if (pose === undefined) throw new Error('a panel without a pose');
          for (const { from } of panel.outer) {
            const { x, y, z } = placeIn(pose, from, 0).at;
            const off = { x: x - pose.origin.x, y: y - pose.origin.y, z: z - pose.origin.z };
            const flat = {
              x: off.x * pose.ux.x + off.y * pose.ux.y + off.z * pose.ux.z,
              y: off.x * pose.uy.x + off.y * pose.uy.y + off.z * pose.uy.z,
            };
            const drawn = movePoint(
              { turnDeg: 0, shift: { x: -panel.placement.shift.x, y: -panel.placement.shift.y } },
              flat,
            );
            expect(drawn.x).toBeCloseTo(from.x - panel.placement.shift.x, 8);
            expect(drawn.y).toBeCloseTo(from.y - panel.placement.shift.y, 8);
          }
        }
      }),
      { numRuns: 200 },
    );
  });
});

describe('random parts with flanges, returns, reliefs and holes in bend zones', () => {
  it('give a closed mesh of the right volume inside the formed box, or a typed problem', () => {
    let made = 0;
    fc.assert(
      fc.property(randomPart, (part) => {
        const result = developLayout(layoutOfPart(part), null, sampleStock());
        if (!result.ok) {
          // Holes may overlap each other; nothing else about these parts cannot be made.
          expect(
            result.problems.every(
              ({ code, ids }) => code === 'outlineNotSimple' && ids.some((id) => id.startsWith('hole')),
            ),
          ).toBe(true);
          return;
        }
        made += 1;
        const { development } = result;
        const foldable = layOutMesh(development, 0.05);
        const flat = meshFacts(poseFormed(foldable, 0));
        expect(flat).toMatchObject({ openEdges: 0, isFinite: true });
        expect(Math.abs(flat.volumeMm3 / (2 * development.flat.areaMm2) - 1)).toBeLessThan(0.002);
        const formed = meshFacts(poseFormed(foldable, 1));
        expect(formed).toMatchObject({ openEdges: 0, isFinite: true });
        (['x', 'y', 'z'] as const).forEach((axis, index) => {
          expect(formed.min[index] ?? NaN).toBeGreaterThan(development.formedBox.min[axis] - 0.000001);
          expect(formed.max[index] ?? NaN).toBeLessThan(development.formedBox.max[axis] + 0.000001);
          expect((formed.min[index] ?? NaN) - development.formedBox.min[axis]).toBeLessThan(0.06);
          expect(development.formedBox.max[axis] - (formed.max[index] ?? NaN)).toBeLessThan(0.06);
        });
      }),
      { numRuns: 60 },
    );
    expect(made).toBeGreaterThan(40);
  });

  it('come out the same when the layout is turned or seen from behind', () => {
    fc.assert(
      fc.property(randomPart, fc.integer({ min: 1, max: 359 }), (part, turnDeg) => {
        const layout = layoutOfPart(part);
        const first = developLayout(layout, null, sampleStock());
        const others = [turned(layout, turnDeg), mirrored(layout)].map((one) =>
          developLayout(one, null, sampleStock()),
        );
        for (const other of others) {
          expect(other.ok).toBe(first.ok);
          if (!first.ok || !other.ok) continue;
          expect(other.development.flat.areaMm2).toBeCloseTo(first.development.flat.areaMm2, 4);
          expect(other.development.flat.cutLengthMm).toBeCloseTo(first.development.flat.cutLengthMm, 4);
          const values = ({ development }: typeof first): readonly number[] =>
            development.formedSizes.map(({ valueMm }) => valueMm);
          values(other).forEach((value, index) => expect(value).toBeCloseTo(values(first)[index] ?? NaN, 5));
          const heightOf = ({ formedBox }: Development): number => formedBox.max.z - formedBox.min.z;
          expect(heightOf(other.development)).toBeCloseTo(heightOf(first.development), 5);
        }
      }),
      { numRuns: 100 },
    );
  });

  it('have the same flat whichever panel is the base', () => {
    fc.assert(
      fc.property(randomPart, fc.nat(8), (part, pick) => {
        const layout = layoutOfPart(part);
        const first = developLayout(layout, null, sampleStock());
        if (!first.ok) return;
        const { panels } = first.development;
        const panel = panels[pick % panels.length];
        const corners = panel?.layoutOuter.map(({ from }) => from) ?? [];
        const middle = corners.reduce(
          (sum, { x, y }) => ({ x: sum.x + x / corners.length, y: sum.y + y / corners.length }),
          { x: 0, y: 0 },
        );
        const second = developLayout({ ...layout, baseAnchor: middle }, null, sampleStock());
        if (!second.ok) throw new Error(second.problems[0]?.message);
        expect(second.development.flat.areaMm2).toBeCloseTo(first.development.flat.areaMm2, 6);
        const corner = first.development.flat.outer.map(({ from }) => from);
        const size = ({ flat }: Development): readonly number[] => [
          flat.bounds.max.x - flat.bounds.min.x,
          flat.bounds.max.y - flat.bounds.min.y,
        ];
        expect(size(second.development)[0]).toBeCloseTo(size(first.development)[0] ?? NaN, 6);
        expect(size(second.development)[1]).toBeCloseTo(size(first.development)[1] ?? NaN, 6);
        expect(second.development.flat.outer).toHaveLength(corner.length);
      }),
      { numRuns: 100 },
    );
  });
});
