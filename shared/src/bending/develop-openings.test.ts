import type { Layout } from './layout';
import { cradleLayout, lLayout, sampleLoop, tabLayout } from './testing/sample-layouts';
import { developed } from './testing/developed';

describe('openings', () => {
  it('are carried along on their panel at their exact size', () => {
    const layout: Layout = {
      ...lLayout(50, 30, { kFactor: 0.33 }),
      features: [
        {
          kind: 'hole',
          id: 'base',
          centre: { x: 20, y: 20 },
          purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' },
        },
        { kind: 'hole', id: 'flange', centre: { x: 70, y: 20 }, purpose: { kind: 'plain', diameterMm: 5 } },
        { kind: 'slot', id: 'slot', from: { x: 68, y: 8 }, to: { x: 68, y: 12 }, widthMm: 4 },
      ],
    };
    const { flat, featuresInBendZones } = developed(layout);
    const deduction = 80 - 76.1783;
    // ISO 273, medium: 6.6 mm for M6.
    expect(flat.holes[0]).toMatchObject({ featureId: 'base', centre: { x: 20, y: 20 }, diameterMm: 6.6 });
    expect(flat.holes[1]?.centre.x).toBeCloseTo(70 - deduction, 3);
    expect(flat.slots[0]?.from.x).toBeCloseTo(68 - deduction, 3);
    expect(flat.areaMm2).toBeCloseTo(76.1783 * 40 - (Math.PI * (6.6 ** 2 + 5 ** 2)) / 4 - (4 * 4 + Math.PI * 4), 2);
    expect(flat.pierces).toBe(4);
    expect(featuresInBendZones).toEqual([]);
  });

  it('that reach into a bend zone are kept and named, on the bend line in the middle of the zone', () => {
    const layout: Layout = {
      ...lLayout(50, 30),
      features: [
        { kind: 'hole', id: 'on', centre: { x: 50, y: 10 }, purpose: { kind: 'plain', diameterMm: 6 } },
        { kind: 'hole', id: 'near', centre: { x: 43.5, y: 30 }, purpose: { kind: 'plain', diameterMm: 6 } },
      ],
    };
    const { flat, featuresInBendZones } = developed(layout);
    expect([...featuresInBendZones].sort()).toEqual(['near', 'on']);
    const line = flat.bends[0]?.centreLines[0];
    expect(flat.holes[0]?.centre.x).toBeCloseTo(line?.from.x ?? 0, 9);
    // The bend is interrupted by the hole on it.
    expect(flat.bends[0]?.centreLines).toHaveLength(2);
  });

  it('crossed by a bend line part the bend and are cut as one opening', () => {
    const cutouts = [
      sampleLoop('window', [
        { x: 40, y: 15 },
        { x: 60, y: 15 },
        { x: 60, y: 25 },
        { x: 40, y: 25 },
      ]),
    ];
    const { flat, bendTable, featuresInBendZones, panels } = developed({ ...lLayout(50, 30), cutouts });
    expect(panels).toHaveLength(2);
    expect(flat.cutouts).toHaveLength(1);
    expect(featuresInBendZones).toEqual(['window']);
    expect(bendTable[0]?.bendLengthMm).toBeCloseTo(30, 6);
    expect(flat.bends[0]?.centreLines).toHaveLength(2);
  });
});

describe('reliefs', () => {
  it('are cut beside a tab, one sheet wide and R + T past the tangent line', () => {
    const { flat, reliefs, bendTable } = developed(tabLayout());
    expect(reliefs.map(({ state }) => state)).toEqual(['added', 'added']);
    expect(reliefs[0]).toMatchObject({ bendId: 'tab', widthMm: 2, depthMm: 4 });
    expect(bendTable[0]?.bendLengthMm).toBeCloseTo(40, 9);
    expect(flat.outer.filter(({ kind }) => kind === 'arc')).toHaveLength(2);
    const bare = developed(tabLayout({}, { mode: 'none' }));
    expect(bare.reliefs.map(({ state }) => state)).toEqual(['missing', 'missing']);
    // Two reliefs 2 wide, from the edge to 2 + 4 below it, round at the bottom.
    const relief = 2 * 5 + Math.PI / 2;
    expect(bare.flat.areaMm2 - flat.areaMm2).toBeCloseTo(2 * relief, 6);
  });

  it('take the size and shape asked for', () => {
    const { flat, reliefs } = developed(tabLayout({}, { widthMm: 3, depthMm: 5, shape: 'rectangular' }));
    expect(reliefs[0]).toMatchObject({ widthMm: 3, depthMm: 5 });
    const bare = developed(tabLayout({}, { mode: 'none' }));
    expect(bare.flat.areaMm2 - flat.areaMm2).toBeCloseTo(2 * 3 * 7, 6);
  });
});

describe('parts with many bends', () => {
  it('cradle of four bends, two at 75 degrees, one away', () => {
    const { panels, bendTable, flat } = developed(cradleLayout());
    expect(panels).toHaveLength(5);
    expect(bendTable.map(({ bendAngleDeg, direction }) => [bendAngleDeg, direction])).toEqual([
      [90, 'towards'],
      [90, 'towards'],
      [75, 'towards'],
      [75, 'away'],
    ]);
    expect(flat.holes).toHaveLength(2);
    expect(flat.slots).toHaveLength(1);
  });
});
