import fc from 'fast-check';
import { movePoint } from '../geometry/transform';
import { developLayout } from './develop';
import type { Development } from './development';
import { panelPoses, placeIn, placeInZone } from './fold';
import { layOutMesh, poseFormed } from './formed-mesh';
import type { Layout } from './layout';
import { meshFacts } from './testing/mesh-facts';
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
import { runs } from './testing/runs';

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
      { numRuns: runs() },
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
      { numRuns: runs(0.2) },
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
      { numRuns: runs() },
    );
  });
});
