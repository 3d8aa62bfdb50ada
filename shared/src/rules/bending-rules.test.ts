import type { Feature } from '../bending/layout';
import { applyCommand, applyCommands } from '../part/apply-command';
import type { PartDocument, SheetStock } from '../part/part-document';
import { starterDocument } from '../part/starter-document';
import { checkPart } from './check-part';
import type { RuleId } from './finding';
import { ACROSS, add, bracket, cutout, found, hole, outcomeOfMending, plain, severities } from './testing/rule-bench';

/** The mend takes the findings away and brings none that cannot be made. */
function expectMended(document: PartDocument, rule: RuleId): void {
  const { before, left, newBlockers } = outcomeOfMending(document, rule);
  expect(before).toBeGreaterThan(0);
  expect([left, newBlockers]).toEqual([0, 0]);
}

it('finds nothing on a bracket that is as it should be', () => {
  expect(checkPart(bracket(), 'production')).toEqual([]);
});

describe('flangeTooShort', () => {
  // V 16 of the chart bends no flange under 11 mm at 90°.
  const withFlange = (flangeMm: number) =>
    applyCommand(bracket(), { kind: 'slideEdge', edgeId: 'e2', byMm: flangeMm - 40 });

  it('flips at the chart’s shortest flange', () => {
    expect(found(withFlange(11.04), 'flangeTooShort')).toEqual([]);
    const [finding] = found(withFlange(10.96), 'flangeTooShort');
    expect(finding).toMatchObject({ severity: 'blocker', requiredMm: 11, ids: ['b1', 'e2'] });
    expect(finding?.foundMm).toBeCloseTo(10.96, 6);
  });

  it('asks more of an acute bend: 1.6 times at an included angle of 60°', () => {
    const acute = (flangeMm: number) => {
      const start = starterDocument({ shape: 'l-bracket', baseMm: 60, flangeMm, widthMm: 50, bendAngleDeg: 120 });
      return applyCommand(start, { kind: 'setStock', role: 'production', stock: ACROSS });
    };
    expect(found(acute(17.64), 'flangeTooShort')).toEqual([]);
    expect(severities(acute(17.56), 'flangeTooShort')).toEqual(['blocker']);
  });

  it('looks at both sides of a bend', () => {
    const narrowBase = applyCommand(bracket(), { kind: 'slideEdge', edgeId: 'e4', byMm: -49.04 });
    const [finding] = found(
      applyCommand(narrowBase, { kind: 'setBaseAnchor', to: { x: 80, y: 25 } }),
      'flangeTooShort',
    );
    expect(finding?.foundMm).toBeCloseTo(10.96, 6);
  });

  it('measures a web between two bends from outside to outside', () => {
    const z = (webMm: number) =>
      applyCommand(starterDocument({ shape: 'z-bracket', webMm, lowerFlangeMm: 30, upperFlangeMm: 30, widthMm: 40 }), {
        kind: 'setStock',
        role: 'production',
        stock: ACROSS,
      });
    expect(found(z(11.04), 'flangeTooShort')).toEqual([]);
    expect(severities(z(10.96), 'flangeTooShort')).toEqual(['blocker', 'blocker']);
  });

  it('tells of a flange once that a window parts at the bend', () => {
    const parted = applyCommand(
      withFlange(8),
      cutout('c', [
        [50, 20],
        [50, 30],
        [65, 30],
        [65, 20],
      ]),
    );
    expect(found(parted, 'flangeTooShort')).toHaveLength(1);
  });

  it('is mended by lengthening the flange, rounded corners and all', () => {
    expectMended(withFlange(8), 'flangeTooShort');
    const rounded = applyCommands(withFlange(9), [
      { kind: 'roundCorner', edgeId: 'e2', radiusMm: 4, newEdgeId: 'r1' },
      { kind: 'roundCorner', edgeId: 'e3', radiusMm: 4, newEdgeId: 'r2' },
    ]);
    expectMended(rounded, 'flangeTooShort');
  });
});

describe('holeInBendZone', () => {
  // R 2.6, T 2: R/T 1.3, so K by DIN 6935 = (0.65 + 0.5·lg 1.3)/2 = 0.35349 and BA = π/2·(2.6 + 0.70697) = 5.19453;
  // BD = 9.2 - 5.19453 = 4.00547, half of which the layout's edges come nearer to the bend's centre.
  const halfDeductionMm = 2.00274;
  const halfZoneMm = 2.59726;
  // V 16: the mouth gapes to 8.0. 2 T past the tangent line: 2.59726 + 4 = 6.59726 from the centre.
  const withRim = (rimMm: number, side: 1 | -1 = 1) =>
    add(bracket(), hole('h1', 60 + side * (rimMm + halfDeductionMm + 3), 25, plain(6)));

  it('flips at half the die’s opening, on both sides', () => {
    for (const side of [1, -1] as const) {
      expect(found(withRim(8.04, side), 'holeInBendZone')).toEqual([]);
      const [finding] = found(withRim(7.96, side), 'holeInBendZone');
      expect(finding).toMatchObject({ severity: 'caution', requiredMm: 8, ids: ['h1', 'b1'] });
      expect(finding?.foundMm).toBeCloseTo(7.96, 4);
    }
  });

  it('becomes a blocker at 2 T from the tangent line', () => {
    const limitMm = halfZoneMm + 4;
    expect(severities(withRim(limitMm + 0.04), 'holeInBendZone')).toEqual(['caution']);
    expect(severities(withRim(limitMm - 0.04), 'holeInBendZone')).toEqual(['blocker']);
    expect(severities(withRim(-3), 'holeInBendZone')).toEqual(['blocker']);
  });

  it('means 2 T from the tangent line, which is R + 3 T from the outside face of the other leg', () => {
    // Layout lengths run to the outside apex, so R + 3 T = 2.6 + 6 = 8.6 from the crease is the same limit.
    const fromOutside = (rimMm: number) => add(bracket(), hole('h1', 60 + rimMm + 3, 25, plain(6)));
    expect(severities(fromOutside(8.64), 'holeInBendZone')).toEqual(['caution']);
    expect(severities(fromOutside(8.56), 'holeInBendZone')).toEqual(['blocker']);
  });

  it('tells of holes in a row once and moves them together', () => {
    const row = add(withRim(7.5), hole('h2', 60 + 7.5 + halfDeductionMm + 3, 40, plain(6)));
    const [finding, ...rest] = found(row, 'holeInBendZone');
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ ids: ['h1', 'h2', 'b1'], mend: { label: 'Move both 0.5 mm out' } });
    expectMended(row, 'holeInBendZone');
  });

  it('is mended from anywhere, slots too', () => {
    expectMended(withRim(1), 'holeInBendZone');
    expectMended(withRim(5, -1), 'holeInBendZone');
    const slot: Feature = { kind: 'slot', id: 's1', from: { x: 68, y: 20 }, to: { x: 68, y: 30 }, widthMm: 6 };
    expectMended(add(bracket(), slot), 'holeInBendZone');
  });

  it('leaves a window to the rule about reliefs that the bend runs across, and sees one beside the bend', () => {
    const window = (fromX: number, toX: number): PartDocument =>
      applyCommand(bracket(), {
        kind: 'addCutout',
        loop: {
          id: 'c1',
          edges: [
            { id: 'ca', start: { x: fromX, y: 20 }, bulge: 0 },
            { id: 'cb', start: { x: fromX, y: 30 }, bulge: 0 },
            { id: 'cc', start: { x: toX, y: 30 }, bulge: 0 },
            { id: 'cd', start: { x: toX, y: 20 }, bulge: 0 },
          ],
        },
      });
    expect(found(window(45, 75), 'holeInBendZone')).toEqual([]);
    expect(found(window(54, 66), 'holeInBendZone')).toEqual([]);
    expect(severities(window(54, 66), 'missingRelief')).toEqual(['caution']);
    const [finding] = found(window(66, 75), 'holeInBendZone');
    expect(finding).toMatchObject({ severity: 'blocker', ids: ['c1', 'b1'], mend: null });
  });
});

describe('missingRelief', () => {
  /** The L with its flange cut down to the middle 30 of 50 mm. */
  const tab = (reliefs: Partial<PartDocument['layout']['reliefs']>): PartDocument => {
    const start = bracket();
    const point = (x: number, y: number) => ({ x, y });
    const corners = [
      point(0, 0),
      point(60, 0),
      point(60, 10),
      point(100, 10),
      point(100, 40),
      point(60, 40),
      point(60, 50),
      point(0, 50),
    ];
    const [bend] = start.layout.bends;
    if (bend === undefined) throw new Error('an L has a bend');
    return applyCommand(start, {
      kind: 'replaceLayout',
      origin: 'import',
      layout: {
        ...start.layout,
        outer: { id: 'outer', edges: corners.map((at, index) => ({ id: `t${index}`, start: at, bulge: 0 })) },
        bends: [{ ...bend, line: { from: point(60, 10), to: point(60, 40) } }],
        reliefs: { ...start.layout.reliefs, ...reliefs },
      },
    });
  };

  it('is quiet when reliefs are cut by the rule and speaks when there are none', () => {
    expect(found(tab({}), 'missingRelief')).toEqual([]);
    const [finding] = found(tab({ mode: 'none' }), 'missingRelief');
    expect(finding).toMatchObject({ severity: 'caution', ids: ['b1'], foundMm: 0 });
  });

  it('flips at a width of 1 T and a depth of R + T', () => {
    expect(found(tab({ widthMm: 2.04 }), 'missingRelief')).toEqual([]);
    expect(severities(tab({ widthMm: 1.96 }), 'missingRelief')).toEqual(['caution']);
    expect(found(tab({ depthMm: 4.64 }), 'missingRelief')).toEqual([]);
    expect(severities(tab({ depthMm: 4.56 }), 'missingRelief')).toEqual(['caution']);
  });

  it('is mended by letting them be cut by the rule', () => {
    expectMended(tab({ mode: 'none' }), 'missingRelief');
    expectMended(tab({ widthMm: 0.5, depthMm: 0.5 }), 'missingRelief');
  });
});

describe('radiusBelowMinimum', () => {
  const bent = (stock: Partial<SheetStock>, insideRadiusMm: number) => bracket(stock, { insideRadiusMm });

  it.each<[string, Partial<SheetStock>, number, string]>([
    // Mild steel: 1 T across the grain, half of that is the end; half as much again along it.
    ['steel across the grain', {}, 2, 'caution'],
    ['steel at its end', {}, 1, 'blocker'],
    ['steel along the grain', { grainDirectionDeg: 90 }, 3, 'hint'],
    ['steel of unknown grain', { grainDirectionDeg: null }, 3, 'hint'],
    // Aluminum Design Manual 2005: 5052-H32 1.5 T at 1/8 in, 6061-T6 2.5 T.
    ['5052 at 3 mm', { materialId: 'al5052h32', thicknessMm: 3 }, 4.5, 'caution'],
    ['6061-T6 at 3 mm', { materialId: 'al6061t6', thicknessMm: 3 }, 7.5, 'blocker'],
    ['6061-T6 along the grain', { materialId: 'al6061t6', thicknessMm: 3, grainDirectionDeg: 90 }, 11.25, 'caution'],
    // 1/16 in row of the same table, for sheet sold as 1.6 mm: 1 T.
    ['5052 at 1.6 mm', { materialId: 'al5052h32', thicknessMm: 1.6 }, 1.6, 'caution'],
    // ASTM B265 names the mandrel's diameter, 4 T: a radius of 2 T.
    ['titanium at its end', { materialId: 'ti2' }, 4, 'blocker'],
  ])('flips for %s', (_, stock, limitMm, severity) => {
    expect(severities(bent(stock, limitMm + 0.04), 'radiusBelowMinimum')).not.toContain(severity);
    expect(severities(bent(stock, limitMm - 0.04), 'radiusBelowMinimum')).toEqual([severity]);
  });

  it('counts a bend at 45° to the grain as across it', () => {
    expect(found(bent({ grainDirectionDeg: 45 }, 2.04), 'radiusBelowMinimum')).toEqual([]);
    expect(severities(bent({ grainDirectionDeg: 45.1 }, 2.04), 'radiusBelowMinimum')).toEqual(['hint']);
    expect(found(bent({ grainDirectionDeg: -45 }, 2.04), 'radiusBelowMinimum')).toEqual([]);
  });

  it('is mended by the radius the material wants', () => {
    expectMended(bent({ grainDirectionDeg: null }, 0.5), 'radiusBelowMinimum');
    expectMended(bent({ materialId: 'al6061t6', thicknessMm: 3 }, 3), 'radiusBelowMinimum');
  });
});
