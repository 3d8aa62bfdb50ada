import { applyCommand, applyCommands } from '../part/apply-command';
import type { DeclaredUse, PartDocument, SheetStock } from '../part/part-document';
import { starterDocument } from '../part/starter-document';
import { checkPart } from './check-part';
import type { RuleId } from './finding';
import { ACROSS, add, bracket, found, hole, outcomeOfMending, plain, severities } from './testing/rule-bench';

/** The mend takes the findings away and brings none that cannot be made. */
function expectMended(document: PartDocument, rule: RuleId): void {
  const { before, left, newBlockers } = outcomeOfMending(document, rule);
  expect(before).toBeGreaterThan(0);
  expect([left, newBlockers]).toEqual([0, 0]);
}

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

  it('calls a hole over the edge or off the sheet what it is', () => {
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
