import fc from 'fast-check';
import { loopLength } from '../geometry/loop';
import { bendAllowanceMm } from './allowance';
import { developLayout } from './develop';
import type { Development, DevelopmentProblem } from './development';
import type { CardReading, Layout } from './layout';
import { randomStrip, stripOf } from './testing/random-strips';
import {
  cradleLayout,
  hatLayout,
  lLayout,
  sampleBend,
  sampleLayout,
  sampleLoop,
  sampleStock,
  stripLayout,
  tabLayout,
  trayLayout,
  uLayout,
  zLayout,
} from './testing/sample-layouts';
import { WORKED_STRIPS } from './testing/worked-values';

function developed(
  layout: Layout,
  stock = sampleStock(),
  template: Parameters<typeof developLayout>[1] = null,
): Development {
  const result = developLayout(layout, template, stock);
  if (!result.ok) throw new Error(result.problems.map(({ message }) => message).join(' '));
  return result.development;
}

function problemsOf(layout: Layout, stock = sampleStock()): readonly DevelopmentProblem[] {
  const result = developLayout(layout, null, stock);
  return result.ok ? [] : result.problems;
}

function sizeOf({ flat }: Development): readonly [number, number] {
  return [flat.bounds.max.x - flat.bounds.min.x, flat.bounds.max.y - flat.bounds.min.y];
}

function boxOf({ formedBox }: Development): readonly number[] {
  return (['x', 'y', 'z'] as const).map((axis) => formedBox.max[axis] - formedBox.min[axis]);
}

describe('flat lengths of whole layouts', () => {
  it.each(WORKED_STRIPS)('$id', ({ legsMm, reference, thicknessMm, bendAngleDeg, insideRadiusMm, kFactor, flatMm }) => {
    const bend = { bendAngleDeg, reference, kFactor };
    const layout = stripLayout(
      legsMm,
      legsMm.slice(1).map(() => bend),
    );
    const development = developed(layout, sampleStock({ thicknessMm, deliveredRadiusMm: insideRadiusMm }));
    expect(Math.abs(sizeOf(development)[0] - flatMm)).toBeLessThan(0.0002);
  });
});

describe('from card to metal, 50 + 30 at 90 degrees', () => {
  const layout = (reading: CardReading | null): Layout => {
    const typed = stripLayout([50, 30], [{ kFactor: 0.33 }]);
    return {
      ...typed,
      bends: typed.bends.map((bend) => ({ ...bend, lengths: { from: 'template', override: reading } as const })),
    };
  };
  const middle = { kind: 'middle' } as const;
  it.each([
    [76.18, 'faceB', 'B'],
    [80.18, 'faceA', 'A'],
    [79.18, 'crease', 'B'],
    [77.18, 'crease', 'A'],
  ] as const)('%s mm read on %s, face %s bearing', (flatMm, readOn, bearingFace) => {
    const reading = { readOn, bearingFace, hinge: middle };
    expect(
      Math.abs(sizeOf(developed(layout(null), sampleStock(), { thicknessMm: 3, reading }))[0] - flatMm),
    ).toBeLessThan(0.01);
    const other = { thicknessMm: 3, reading: { readOn: 'faceA', bearingFace: 'B', hinge: middle } } as const;
    expect(Math.abs(sizeOf(developed(layout(reading), sampleStock(), other))[0] - flatMm)).toBeLessThan(0.01);
  });

  it('brings the bearing face of the metal where the card had it', () => {
    const reading: CardReading = { readOn: 'crease', bearingFace: 'B', hinge: middle };
    const development = developed(layout(null), sampleStock(), { thicknessMm: 3, reading });
    // Card outside legs: 1.5 mm more than at mid-thickness, and face B is outside a bend towards.
    expect(boxOf(development)[0]).toBeCloseTo(51.5, 6);
    expect(boxOf(development)[2]).toBeCloseTo(31.5, 6);
  });
});

describe('formed outside sizes', () => {
  const mm = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
  const stock = fc
    .record({ thicknessMm: mm(0.5, 3), deliveredRadiusMm: mm(0.3, 4) })
    .map((sheet) => sampleStock(sheet));
  const kFactor = mm(0.1, 0.5);

  it('are the typed ones for an L', () => {
    fc.assert(
      fc.property(mm(20, 200), mm(20, 200), stock, kFactor, (first, second, sheet, k) => {
        const [x, , z] = boxOf(developed(lLayout(first, second, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - first)).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - second)).toBeLessThan(0.01);
      }),
      { numRuns: 200 },
    );
  });

  it('are the typed ones for a U', () => {
    fc.assert(
      fc.property(mm(20, 200), mm(20, 200), stock, kFactor, (flange, web, sheet, k) => {
        const [x, , z] = boxOf(developed(uLayout(flange, web, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - web)).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - flange)).toBeLessThan(0.01);
      }),
      { numRuns: 200 },
    );
  });

  it('are the typed ones for a Z, its web measured over everything', () => {
    fc.assert(
      fc.property(mm(20, 200), mm(20, 200), mm(20, 200), stock, kFactor, (first, web, second, sheet, k) => {
        const [x, , z] = boxOf(developed(zLayout(first, web, second, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - (first + second - sheet.thicknessMm))).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - web)).toBeLessThan(0.01);
      }),
      { numRuns: 200 },
    );
  });

  it('are the typed ones for a hat', () => {
    fc.assert(
      fc.property(mm(20, 100), mm(20, 100), mm(20, 200), stock, kFactor, (brim, side, crown, sheet, k) => {
        const [x, , z] = boxOf(developed(hatLayout(brim, side, crown, { kFactor: k }), sheet));
        expect(Math.abs((x ?? 0) - (crown + 2 * brim - 2 * sheet.thicknessMm))).toBeLessThan(0.01);
        expect(Math.abs((z ?? 0) - side)).toBeLessThan(0.01);
      }),
      { numRuns: 200 },
    );
  });

  it('are inside sizes plus the sheet for a tray', () => {
    const development = developed(trayLayout(100, 60, 20));
    expect(boxOf(development)).toEqual([expect.closeTo(104, 6), expect.closeTo(64, 6), expect.closeTo(22, 6)]);
  });

  it('are listed for callipers with what spreads them', () => {
    const { formedSizes } = developed(uLayout());
    expect(formedSizes.map(({ valueMm }) => valueMm)).toEqual([
      expect.closeTo(60, 9),
      expect.closeTo(30, 9),
      expect.closeTo(30, 9),
    ]);
    // Two bends between the gauge and the far side: gauging counts twice, as squares.
    expect(formedSizes[0]?.spreadMm ?? 0).toBeGreaterThan(0.4 * Math.SQRT2);
    expect(formedSizes[0]?.mostlyFrom).toBe('gauging on the brake');
  });
});

describe('every development', () => {
  it('has zones exactly one allowance long', () => {
    fc.assert(
      fc.property(randomStrip(), (strip) => {
        const { zones, bendTable } = developed(stripOf(strip), strip.stock);
        for (const zone of zones) {
          const row = bendTable.find(({ bendId }) => bendId === zone.bendId);
          const allowance = bendAllowanceMm({ ...zone, thicknessMm: strip.stock.thicknessMm });
          expect(row?.bendAllowanceMm).toBeCloseTo(allowance, 9);
          expect((loopLength(zone.outer) - 2 * strip.widthMm) / 2).toBeCloseTo(allowance, 6);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('has the same flat whichever panel is the base', () => {
    fc.assert(
      fc.property(randomStrip(), fc.nat(5), (strip, pick) => {
        const first = developed(stripOf(strip), strip.stock);
        const second = developed(stripOf(strip, pick % strip.legsMm.length), strip.stock);
        expect(sizeOf(second)[0]).toBeCloseTo(sizeOf(first)[0], 9);
        expect(second.flat.areaMm2).toBeCloseTo(first.flat.areaMm2, 6);
        const linesOf = ({ flat }: Development): readonly number[] =>
          flat.bends
            .flatMap(({ centreLines }) => centreLines.map(({ from }) => from.x - flat.bounds.min.x))
            .sort((a, b) => a - b);
        linesOf(second).forEach((x, index) => expect(x).toBeCloseTo(linesOf(first)[index] ?? NaN, 9));
      }),
      { numRuns: 200 },
    );
  });

  it('has an area that is its length times its width, and mass from it', () => {
    fc.assert(
      fc.property(randomStrip(), (strip) => {
        const { flat } = developed(stripOf(strip), strip.stock);
        const area = (flat.bounds.max.x - flat.bounds.min.x) * strip.widthMm;
        expect(flat.areaMm2).toBeCloseTo(area, 5);
        expect(flat.massKg).toBeCloseTo((area * strip.stock.thicknessMm * 7850) / 1e9, 9);
        expect(flat.cutLengthMm).toBeCloseTo(2 * (flat.bounds.max.x - flat.bounds.min.x + strip.widthMm), 6);
        expect(flat.pierces).toBe(1);
      }),
      { numRuns: 100 },
    );
  });
});

describe('problems name the offenders', () => {
  const square = [
    { x: 0, y: 0 },
    { x: 100, y: 0 },
    { x: 100, y: 60 },
    { x: 0, y: 60 },
  ];
  const plate = (bends: Layout['bends'], changes: Partial<Layout> = {}): Layout => ({
    ...sampleLayout({ outer: square, bends, baseAnchor: { x: 5, y: 5 } }),
    ...changes,
  });
  const across = (id: string, x: number): Layout['bends'][number] => sampleBend(id, { x, y: -1 }, { x, y: 61 });

  it('an outline that crosses itself', () => {
    const outer = sampleLoop(
      'outer',
      [square[0], square[2], square[1], square[3]].flatMap((point) => point ?? []),
    );
    expect(problemsOf(plate([], { outer }))).toMatchObject([
      { code: 'outlineNotSimple', ids: expect.arrayContaining(['outer']) as unknown },
    ]);
  });

  it('an outline of nothing', () => {
    expect(problemsOf(plate([], { outer: sampleLoop('outer', square.slice(0, 2)) }))[0]).toMatchObject({
      code: 'outlineNotSimple',
      ids: ['outer'],
    });
    const lost = { id: 'outer', edges: [{ id: 'e', start: { x: Number.NaN, y: 0 }, bulge: 0 }] };
    expect(problemsOf(plate([], { outer: lost }))[0]).toMatchObject({ code: 'outlineNotSimple' });
  });

  it('openings over an edge, outside, or in one another', () => {
    const hole = (id: string, x: number, diameterMm = 6): Layout['features'][number] => ({
      kind: 'hole',
      id,
      centre: { x, y: 30 },
      purpose: { kind: 'plain', diameterMm },
    });
    expect(problemsOf(plate([], { features: [hole('edge', 1)] }))).toMatchObject([
      { code: 'outlineNotSimple', ids: expect.arrayContaining(['edge', 'outer']) as unknown },
    ]);
    expect(problemsOf(plate([], { features: [hole('off', 200)] }))).toMatchObject([
      { code: 'outlineNotSimple', ids: ['off'] },
    ]);
    expect(problemsOf(plate([], { features: [hole('big', 50, 20), hole('small', 50)] }))[0]).toMatchObject({
      ids: expect.arrayContaining(['small', 'big']) as unknown,
    });
  });

  it('a hole of no known size', () => {
    const features: Layout['features'] = [
      { kind: 'hole', id: 'odd', centre: { x: 50, y: 30 }, purpose: { kind: 'tapped', thread: 'M6.5' } },
    ];
    expect(problemsOf(plate([], { features }))).toMatchObject([{ code: 'holeUnknown', ids: ['odd'] }]);
  });

  it('a bend line beside the sheet', () => {
    expect(problemsOf(plate([across('b', 130)]))).toMatchObject([{ code: 'bendLineOutside', ids: ['b'] }]);
    expect(problemsOf(plate([sampleBend('b', { x: 1, y: 1 }, { x: 1, y: 1 })]))).toMatchObject([
      { code: 'bendLineOutside' },
    ]);
  });

  it('a bend line that ends inside', () => {
    expect(problemsOf(plate([sampleBend('b', { x: 50, y: -1 }, { x: 50, y: 40 })]))).toMatchObject([
      { code: 'bendLineEndsInside', ids: ['b'] },
    ]);
    expect(problemsOf(plate([sampleBend('b', { x: 50, y: 20 }, { x: 50, y: 40 })]))).toMatchObject([
      { code: 'bendLineEndsInside', ids: ['b'] },
    ]);
  });

  it('a bend line that stops at an opening and so parts nothing', () => {
    const cutouts = [
      sampleLoop('window', [
        { x: 40, y: 20 },
        { x: 60, y: 20 },
        { x: 60, y: 40 },
        { x: 40, y: 40 },
      ]),
    ];
    expect(problemsOf(plate([sampleBend('b', { x: 50, y: -1 }, { x: 50, y: 20 })], { cutouts }))).toMatchObject([
      { code: 'bendLineEndsInside', ids: ['b'] },
    ]);
  });

  it('bend lines that cross', () => {
    const along = sampleBend('along', { x: -1, y: 30 }, { x: 101, y: 30 });
    expect(problemsOf(plate([across('across', 50), along]))).toMatchObject([
      { code: 'bendLinesCross', ids: ['across', 'along'] },
    ]);
  });

  it('a ring of panels', () => {
    const cutouts = [
      sampleLoop('window', [
        { x: 30, y: 20 },
        { x: 70, y: 20 },
        { x: 70, y: 40 },
        { x: 30, y: 40 },
      ]),
    ];
    const bends = [
      sampleBend('south', { x: 50, y: -1 }, { x: 50, y: 20 }),
      sampleBend('north', { x: 45, y: 40 }, { x: 45, y: 61 }),
    ];
    const [problem] = problemsOf(plate(bends, { cutouts }));
    expect(problem).toMatchObject({ code: 'panelRing' });
    expect([...(problem?.ids ?? [])].sort()).toEqual(['north', 'south']);
  });

  it('bends too close to leave a flat between them, and just far enough', () => {
    // Inside apex at 90 degrees, R 2: each bend takes 2 mm.
    expect(problemsOf(plate([across('a', 50), across('b', 53.99)]))).toMatchObject([
      { code: 'bendTooClose', ids: expect.arrayContaining(['a', 'b']) as unknown },
    ]);
    expect(problemsOf(plate([across('a', 50), across('b', 54.01)]))).toEqual([]);
  });

  it('a flange shorter than its own bend', () => {
    expect(problemsOf(plate([across('a', 98.5)]))).toMatchObject([{ code: 'bendTooClose', ids: ['a'] }]);
  });

  it.each([0, -90, 180.5, Number.NaN])('an angle of %s', (bendAngleDeg) => {
    expect(problemsOf(plate([{ ...across('a', 50), bendAngleDeg }]))).toMatchObject([
      { code: 'angleOutOfRange', ids: ['a'] },
    ]);
  });

  it.each([-1, Number.NaN, Infinity])('a radius of %s', (insideRadiusMm) => {
    expect(problemsOf(plate([{ ...across('a', 50), insideRadiusMm }]))).toMatchObject([
      { code: 'radiusOutOfRange', ids: ['a'] },
    ]);
  });

  it('an apex at 180 degrees, but not a tangent there', () => {
    const hem = { ...across('a', 50), bendAngleDeg: 180 };
    expect(problemsOf(plate([hem]))).toMatchObject([{ code: 'referenceNotAllowed', ids: ['a'] }]);
    expect(problemsOf(plate([{ ...hem, lengths: { from: 'reference', reference: 'tangent' } }]))).toEqual([]);
  });

  it('template lengths without a template, and above 165 degrees', () => {
    const bend = { ...across('a', 50), lengths: { from: 'template', override: null } as const };
    expect(problemsOf(plate([bend]))).toMatchObject([{ code: 'referenceNotAllowed', ids: ['a'] }]);
    const template = {
      thicknessMm: 2,
      reading: { readOn: 'faceA', bearingFace: 'A', hinge: { kind: 'middle' } },
    } as const;
    const steep = developLayout(plate([{ ...bend, bendAngleDeg: 166 }]), template, sampleStock());
    expect(steep).toMatchObject({ ok: false, problems: [{ code: 'referenceNotAllowed', ids: ['a'] }] });
  });

  it('a K no sheet can have', () => {
    const override = { kind: 'kFactor', kFactor: 0.6, reason: 'x' } as const;
    expect(problemsOf(plate([{ ...across('a', 50), override }]))).toMatchObject([{ code: 'kOutOfRange', ids: ['a'] }]);
  });

  it('an anchor off the sheet', () => {
    expect(problemsOf(plate([across('a', 50)], { baseAnchor: { x: 200, y: 0 } }))).toMatchObject([
      { code: 'baseAnchorOutside' },
    ]);
  });

  it('a sheet of no thickness', () => {
    expect(problemsOf(plate([]), sampleStock({ thicknessMm: 0 }))).toMatchObject([{ code: 'stockUnknown' }]);
  });

  it('all bends at once, not only the first', () => {
    const bends = [
      { ...across('a', 40), bendAngleDeg: 0 },
      { ...across('b', 60), insideRadiusMm: -1 },
    ];
    expect(problemsOf(plate(bends)).map(({ ids }) => ids[0])).toEqual(['a', 'b']);
  });
});

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
