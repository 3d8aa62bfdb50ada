import type { BendDeclaration, Feature, HolePurpose } from '../bending/layout';
import { applyCommand, applyCommands } from '../part/apply-command';
import type { PartCommand } from '../part/commands';
import type { DeclaredUse, PartDocument, SheetStock } from '../part/part-document';
import { starterDocument } from '../part/starter-document';
import { checkPart } from './check-part';
import type { Finding, RuleId } from './finding';

const ACROSS: SheetStock = { materialId: 'dc01', thicknessMm: 2, grainDirectionDeg: 0, vOpeningMm: 16 };

/** An L of 60 + 40, 50 wide, in 2 mm steel bent across the grain with R 2.6 over a V 16; nothing is wrong with it. */
function bracket(stock: Partial<SheetStock> = {}, bend: Partial<BendDeclaration> = {}): PartDocument {
  const start = starterDocument({ shape: 'l-bracket', baseMm: 60, flangeMm: 40, widthMm: 50, bendAngleDeg: 90 });
  const [declared] = start.layout.bends;
  if (declared === undefined) throw new Error('an L has a bend');
  return applyCommands(start, [
    { kind: 'setStock', role: 'production', stock: { ...ACROSS, ...stock } },
    { kind: 'changeBend', bendId: 'b1', bend: { ...declared, insideRadiusMm: 2.6, ...bend } },
  ]);
}

const hole = (id: string, x: number, y: number, purpose: HolePurpose): Feature => ({
  kind: 'hole',
  id,
  centre: { x, y },
  purpose,
});
const plain = (diameterMm: number): HolePurpose => ({ kind: 'plain', diameterMm });
const add = (document: PartDocument, ...features: readonly Feature[]): PartDocument =>
  applyCommands(
    document,
    features.map((feature): PartCommand => ({ kind: 'addFeature', feature })),
  );
const found = (document: PartDocument, rule: RuleId): readonly Finding[] =>
  checkPart(document, 'production').filter((finding) => finding.rule === rule);
const severities = (document: PartDocument, rule: RuleId) => found(document, rule).map(({ severity }) => severity);

/** Applies every mend of a rule until it has none left; each has to reduce what the rule finds. */
function mended(document: PartDocument, rule: RuleId): PartDocument {
  let current = document;
  for (let round = 0; round < 6; round += 1) {
    const mend = found(current, rule).find((finding) => finding.mend !== null)?.mend;
    if (mend == null) return current;
    current = applyCommands(current, mend.commands);
  }
  throw new Error(`mending ${rule} does not come to an end`);
}

/** The mend takes the findings away and brings none that cannot be made. */
function expectMended(document: PartDocument, rule: RuleId): void {
  expect(found(document, rule).length).toBeGreaterThan(0);
  const blockersBefore = checkPart(document, 'production').filter(({ severity }) => severity === 'blocker').length;
  const after = mended(document, rule);
  expect(found(after, rule)).toEqual([]);
  const blockersAfter = checkPart(after, 'production').filter(({ severity }) => severity === 'blocker').length;
  expect(blockersAfter).toBeLessThanOrEqual(blockersBefore);
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

  it('leaves a window alone that spans the whole mouth, and a hole beside the bend’s end', () => {
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

describe('holeTooSmall', () => {
  const drilled = (diameterMm: number, stock: Partial<SheetStock> = {}) =>
    add(bracket(stock), hole('h1', 30, 25, plain(diameterMm)));

  it.each<[string, Partial<SheetStock>, number, string]>([
    ['1 T in steel', {}, 2, 'caution'],
    ['half of that in steel', {}, 1, 'blocker'],
    ['1 T in aluminium', { materialId: 'al5052h32' }, 2, 'blocker'],
    ['0.5 mm in foil', { materialId: 'ss304', thicknessMm: 0.4 }, 0.5, 'blocker'],
  ])('flips at %s', (_, stock, limitMm, severity) => {
    expect(severities(drilled(limitMm + 0.04, stock), 'holeTooSmall')).not.toContain(severity);
    expect(severities(drilled(limitMm - 0.04, stock), 'holeTooSmall')).toEqual([severity]);
  });

  it('flips for slots at 1 T, and 1 mm at least', () => {
    const slotted = (widthMm: number, thicknessMm: number) =>
      add(bracket({ thicknessMm, materialId: 'ss304' }), {
        kind: 'slot',
        id: 's1',
        from: { x: 20, y: 25 },
        to: { x: 30, y: 25 },
        widthMm,
      });
    expect(found(slotted(2.04, 2), 'holeTooSmall')).toEqual([]);
    expect(severities(slotted(1.96, 2), 'holeTooSmall')).toEqual(['blocker']);
    expect(found(slotted(1.04, 0.8), 'holeTooSmall')).toEqual([]);
    expect(severities(slotted(0.96, 0.8), 'holeTooSmall')).toEqual(['blocker']);
    expectMended(slotted(0.5, 2), 'holeTooSmall');
  });

  it('is mended by growing what has a size of its own, never by another thread', () => {
    expectMended(drilled(0.3), 'holeTooSmall');
    const tapped = add(bracket({ thicknessMm: 3 }), hole('h1', 30, 25, { kind: 'tapped', thread: 'M2' }));
    expect(found(tapped, 'holeTooSmall')).toMatchObject([{ mend: null }]);
  });
});

describe('landTooThin', () => {
  // 2 mm sheet: a land of 2 mm. A hole of 6 at x = land + 3.
  const atEdge = (landMm: number) => add(bracket(), hole('h1', landMm + 3, 25, plain(6)));

  it('flips at 1 T to the edge', () => {
    expect(found(atEdge(2.04), 'landTooThin')).toEqual([]);
    const [finding] = found(atEdge(1.96), 'landTooThin');
    expect(finding).toMatchObject({ severity: 'caution', requiredMm: 2, ids: ['h1'] });
    expect(finding?.foundMm).toBeCloseTo(1.96, 6);
    expect(finding?.at?.layout.x).toBeCloseTo(0, 6);
  });

  it('flips at 1 mm in thinner sheet', () => {
    const thin = (landMm: number) => add(bracket({ thicknessMm: 0.8 }), hole('h1', landMm + 3, 25, plain(6)));
    expect(found(thin(1.04), 'landTooThin')).toEqual([]);
    expect(severities(thin(0.96), 'landTooThin')).toEqual(['caution']);
  });

  it('flips between two holes', () => {
    const pair = (landMm: number) =>
      add(bracket(), hole('h1', 20, 25, plain(6)), hole('h2', 26 + landMm, 25, plain(6)));
    expect(found(pair(2.04), 'landTooThin')).toEqual([]);
    expect(found(pair(1.96), 'landTooThin')).toMatchObject([{ severity: 'caution', ids: ['h1', 'h2'], mend: null }]);
    expect(severities(pair(-1), 'landTooThin')).toEqual(['blocker']);
  });

  it('calls a hole inside another, over the edge or off the sheet what it is', () => {
    const nested = add(bracket(), hole('h1', 20, 25, plain(20)), hole('h2', 20, 25, plain(4)));
    expect(severities(nested, 'landTooThin')).toEqual(['blocker']);
    expect(severities(atEdge(-2), 'landTooThin')).toEqual(['blocker']);
    expect(severities(add(bracket(), hole('h1', -20, 25, plain(6))), 'landTooThin')).toEqual(['blocker']);
  });

  it('is mended by moving the hole in, on a bent-up flange too', () => {
    expectMended(atEdge(1), 'landTooThin');
    expectMended(add(bracket(), hole('h1', 96.5, 25, plain(6))), 'landTooThin');
    expectMended(add(bracket(), hole('h1', 20, 46.2, plain(6))), 'landTooThin');
  });

  it('offers no move that would make another land thin', () => {
    const hemmedIn = add(atEdge(1), hole('h2', 12.1, 25, plain(6)));
    const [toEdge] = found(hemmedIn, 'landTooThin').filter(({ ids }) => ids.length === 1);
    expect(toEdge).toMatchObject({ mend: null });
  });
});

describe('outlineCrossesItself', () => {
  /** A corner pulled through the opposite edge by some millimetres. */
  const pulled = (throughMm: number) =>
    applyCommands(starterDocument({ shape: 'flat-plate', widthMm: 60, heightMm: 40 }), [
      { kind: 'setStock', role: 'production', stock: ACROSS },
      { kind: 'insertVertex', edgeId: 'e1', newEdge: { id: 'n1', start: { x: 30, y: 0 }, bulge: 0 } },
      { kind: 'moveVertex', edgeId: 'n1', to: { x: 30, y: 40 + throughMm } },
    ]);

  it('flips where the corner meets the edge, and names both', () => {
    expect(found(pulled(-0.04), 'outlineCrossesItself')).toEqual([]);
    const findings = found(pulled(0.04), 'outlineCrossesItself');
    expect(new Set(findings.flatMap(({ ids }) => ids))).toEqual(new Set(['e1', 'n1', 'e3']));
    expect(findings.every(({ severity }) => severity === 'blocker')).toBe(true);
    expect(findings[0]?.at?.layout.y).toBeCloseTo(40, 6);
  });

  it('is told once, not again as a part that cannot be developed', () => {
    expect(found(pulled(5), 'cannotBeDeveloped')).toEqual([]);
  });

  it('sees cut-outs that cross the outline', () => {
    const cut = applyCommand(bracket(), {
      kind: 'addCutout',
      loop: {
        id: 'c1',
        edges: [
          { id: 'ca', start: { x: -5, y: 10 }, bulge: 0 },
          { id: 'cb', start: { x: 10, y: 10 }, bulge: 0 },
          { id: 'cc', start: { x: 10, y: 20 }, bulge: 0 },
        ],
      },
    });
    expect(found(cut, 'outlineCrossesItself').flatMap(({ ids }) => ids)).toContain('e4');
  });
});

describe('cannotBeDeveloped', () => {
  it('names what stands in the way', () => {
    const offSheet = applyCommand(bracket(), {
      kind: 'setBaseAnchor',
      to: { x: -50, y: 0 },
    });
    expect(found(offSheet, 'cannotBeDeveloped')).toMatchObject([{ severity: 'blocker' }]);
    const unknown = bracket({ materialId: 'unobtainium' });
    const [finding] = found(unknown, 'cannotBeDeveloped');
    expect(finding).toMatchObject({ severity: 'blocker', ids: ['unobtainium'] });
    expect(finding?.advice).toBe('Choose a material from the table.');
  });

  it('points at the bend that goes wrong', () => {
    const short = bracket({}, { line: { from: { x: 60, y: 10 }, to: { x: 60, y: 30 } } });
    const [finding] = found(short, 'cannotBeDeveloped');
    expect(finding?.ids).toContain('b1');
    expect(finding?.at?.layout).toEqual({ x: 60, y: 20 });
  });
});

describe('declaredUse', () => {
  const uses: readonly DeclaredUse[] = [
    'vehicle',
    'fuel',
    'pressure',
    'heat',
    'vibration',
    'lifting-people',
    'seat',
    'steering',
    'brakes',
  ];

  it.each(uses)('cautions about %s and defers to those who decide', (use) => {
    const findings = found(applyCommand(bracket(), { kind: 'setDeclaredUses', uses: [use, use] }), 'declaredUse');
    expect(findings).toMatchObject([{ severity: 'caution' }]);
    expect(findings[0]?.advice).toMatch(/local code/u);
  });

  it('never calls anything safe or approved', () => {
    const everything = applyCommand(bracket(), { kind: 'setDeclaredUses', uses });
    const words = JSON.stringify(checkPart(everything, 'production'));
    expect(words).not.toMatch(/\b(un)?safe|approved\b/iu);
  });
});
