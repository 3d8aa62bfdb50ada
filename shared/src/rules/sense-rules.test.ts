import type { BendDeclaration } from '../bending/layout';
import { applyCommand, applyCommands } from '../part/apply-command';
import type { PartDocument, Template } from '../part/part-document';
import { starterDocument } from '../part/starter-document';
import { checkPart } from './check-part';
import {
  ACROSS,
  add,
  bracket,
  cutout,
  found,
  hole,
  MENDED,
  outcomeOfMending,
  outlined,
  plain,
  plate,
  severities,
} from './testing/rule-bench';

/** Finds nothing that cannot be made but what one rule says. */
function blockersBut(document: PartDocument, rule: string): readonly string[] {
  return checkPart(document, 'production')
    .filter((finding) => finding.severity === 'blocker' && finding.rule !== rule)
    .map(({ title }) => title);
}

describe('unitsSlip', () => {
  it('flips at a longest side of 12 mm and of 2.5 m', () => {
    expect(found(plate(12.04, 8), 'unitsSlip')).toEqual([]);
    expect(found(plate(11.96, 8), 'unitsSlip')).toMatchObject([{ severity: 'caution', requiredMm: 12 }]);
    expect(found(plate(2499.96, 900), 'unitsSlip')).toEqual([]);
    expect(found(plate(2500.04, 900), 'unitsSlip')).toMatchObject([{ severity: 'caution', requiredMm: 2500 }]);
  });

  it('is mended by 25.4, holes, slots and texts with it', () => {
    const inches = add(plate(4, 3), hole('h1', 1, 1, plain(0.5)), {
      kind: 'slot',
      id: 's1',
      from: { x: 2, y: 2 },
      to: { x: 3, y: 2 },
      widthMm: 0.25,
    });
    const drawn = applyCommand(inches, {
      kind: 'setMarks',
      marks: [{ id: 'm1', text: 'A', at: { x: 0.5, y: 2 }, heightMm: 3, turnDeg: 0 }],
    });
    expect(outcomeOfMending(drawn, 'unitsSlip')).toEqual(MENDED);
    const mend = found(drawn, 'unitsSlip')[0]?.mend;
    const mended = applyCommands(drawn, mend?.commands ?? []);
    expect(mended.layout.outer.edges[2]?.start.x).toBeCloseTo(101.6, 9);
    expect(mended.layout.outer.edges[2]?.start.y).toBeCloseTo(76.2, 9);
    expect(mended.layout.features[0]).toMatchObject({ centre: { x: 25.4, y: 25.4 }, purpose: { diameterMm: 12.7 } });
    expect(mended.layout.features[1]).toMatchObject({ widthMm: 6.35 });
    expect(mended.marks?.[0]).toMatchObject({ at: { x: 12.7, y: 50.8 }, heightMm: 3 });
    expect(outcomeOfMending(plate(2540, 1270), 'unitsSlip')).toEqual(MENDED);
  });
});

describe('drawnTwice', () => {
  const pair = (apartMm: number, secondMm = 6) =>
    add(bracket(), hole('h1', 20, 25, plain(6)), hole('h2', 20 + apartMm, 25, plain(secondMm)));

  it('flips for holes at 0.05 mm apart and 0.05 mm of size', () => {
    expect(found(pair(0.08), 'drawnTwice')).toEqual([]);
    expect(found(pair(0.02), 'drawnTwice')).toMatchObject([
      { severity: 'blocker', ids: ['h1', 'h2'], title: 'H1 and H2 are the same hole' },
    ]);
    expect(found(pair(0, 6.08), 'drawnTwice')).toEqual([]);
    expect(found(pair(0, 6.02), 'drawnTwice')).toHaveLength(1);
  });

  it('flips for slots, whichever way round they run', () => {
    const slots = (offMm: number) =>
      add(
        bracket(),
        { kind: 'slot', id: 's1', from: { x: 15, y: 20 }, to: { x: 25, y: 20 }, widthMm: 5 },
        { kind: 'slot', id: 's2', from: { x: 25, y: 20 + offMm }, to: { x: 15, y: 20 }, widthMm: 5 },
      );
    expect(found(slots(0.08), 'drawnTwice')).toEqual([]);
    expect(found(slots(0.02), 'drawnTwice')).toHaveLength(1);
  });

  const window = (offMm: number) =>
    [
      [10 + offMm, 10],
      [10 + offMm, 20],
      [25 + offMm, 20],
      [25 + offMm, 10],
    ] as const;

  it('flips for cut-outs and tells of them once', () => {
    const twice = (offMm: number) => applyCommands(bracket(), [cutout('c', window(0)), cutout('d', window(offMm))]);
    expect(found(twice(0.08), 'drawnTwice')).toEqual([]);
    expect(found(twice(0.02), 'drawnTwice')).toHaveLength(1);
    expect(blockersBut(twice(0.02), 'drawnTwice')).toEqual([]);
    expect(outcomeOfMending(twice(0.02), 'drawnTwice')).toEqual(MENDED);
  });

  const second = (apartMm: number, fromY = 0): BendDeclaration => {
    const [bend] = bracket().layout.bends;
    if (bend === undefined) throw new Error('an L has a bend');
    return { ...bend, id: 'b2', line: { from: { x: 60 + apartMm, y: fromY }, to: { x: 60 + apartMm, y: 50 } } };
  };

  it('flips for bends and tells of them once', () => {
    const twice = (apartMm: number) => applyCommand(bracket(), { kind: 'addBend', bend: second(apartMm) });
    expect(found(twice(0.08), 'drawnTwice')).toEqual([]);
    expect(found(twice(0.02), 'drawnTwice')).toMatchObject([
      { ids: ['b1', 'b2'], title: 'B1 and B2 are the same bend' },
    ]);
    expect(blockersBut(twice(0), 'drawnTwice')).toEqual([]);
    expect(blockersBut(twice(0.02), 'drawnTwice')).toEqual([]);
    expect(outcomeOfMending(twice(0.02), 'drawnTwice')).toEqual(MENDED);
  });

  it('leaves bends of two tabs on one line alone', () => {
    const start = outlined(bracket(), [
      [0, 0],
      [100, 0],
      [100, 20],
      [50, 20],
      [50, 30],
      [100, 30],
      [100, 50],
      [0, 50],
    ]);
    const [bend] = start.layout.bends;
    if (bend === undefined) throw new Error('an L has a bend');
    const tabs = applyCommands(start, [
      { kind: 'changeBend', bendId: 'b1', bend: { ...bend, line: { from: { x: 60, y: 0 }, to: { x: 60, y: 20 } } } },
      { kind: 'addBend', bend: second(0, 30) },
    ]);
    expect(found(tabs, 'drawnTwice')).toEqual([]);
    expect(found(tabs, 'cannotBeDeveloped')).toEqual([]);
  });

  it('is mended by taking all copies away but the first', () => {
    const three = add(pair(0), hole('h3', 20.01, 25, plain(6)));
    expect(found(three, 'drawnTwice')).toMatchObject([{ mend: { label: 'Take H2 and H3 away' } }]);
    expect(outcomeOfMending(three, 'drawnTwice')).toEqual(MENDED);
    expect(blockersBut(three, 'drawnTwice')).toEqual([]);
  });
});

describe('tinyEdge', () => {
  // 2 mm sheet: the cut is up to 0.18 mm wide.
  const nicked = (lengthMm: number) =>
    outlined(bracket(), [
      [0, 0],
      [100, 0],
      [100, 50],
      [30 + lengthMm, 50],
      [30, 50],
      [0, 40],
    ]);

  it('flips at 0.05 mm and at the width of the cut', () => {
    expect(found(nicked(0.19), 'tinyEdge')).toEqual([]);
    expect(severities(nicked(0.17), 'tinyEdge')).toEqual(['hint']);
    expect(severities(nicked(0.06), 'tinyEdge')).toEqual(['hint']);
    expect(found(nicked(0.04), 'tinyEdge')).toMatchObject([{ severity: 'caution', ids: ['t3'], requiredMm: 0.05 }]);
    expect(severities(nicked(0), 'tinyEdge')).toEqual(['caution']);
  });

  it('tells of many at once and takes all their corners away', () => {
    const many = outlined(bracket(), [
      [0, 0],
      [100, 0],
      [100.02, 0.02],
      [100, 50],
      [100, 50.03],
      [50, 50.03],
      [50, 50],
      [0, 50],
    ]);
    expect(found(many, 'tinyEdge')).toMatchObject([
      { ids: ['t1', 't3', 't5'], mend: { label: 'Take 3 corners away' } },
    ]);
    expect(outcomeOfMending(many, 'tinyEdge')).toEqual(MENDED);
  });

  it('keeps the arc before it round', () => {
    const rounded = applyCommands(bracket(), [
      { kind: 'roundCorner', edgeId: 'e3', radiusMm: 8, newEdgeId: 'r1' },
      { kind: 'insertVertex', edgeId: 'e3', newEdge: { id: 'n1', start: { x: 91.9, y: 50 }, bulge: 0 } },
    ]);
    expect(found(rounded, 'tinyEdge')).toMatchObject([{ severity: 'hint', ids: ['e3'] }]);
    const mended = applyCommands(rounded, found(rounded, 'tinyEdge')[0]?.mend?.commands ?? []);
    expect(mended.layout.outer.edges.find(({ id }) => id === 'r1')?.bulge).toBeCloseTo(Math.tan(Math.PI / 8), 9);
    expect(found(mended, 'tinyEdge')).toEqual([]);
  });
});

describe('wrongHand', () => {
  const template: Template = {
    kind: 'card',
    thicknessMm: 0.5,
    reading: { readOn: 'crease', bearingFace: 'A', hinge: { kind: 'middle' } },
  };
  const channel = (said: Template | null): PartDocument =>
    applyCommands(starterDocument({ shape: 'hat-section', topMm: 90, sideMm: 40, brimMm: 20, widthMm: 50 }), [
      { kind: 'setStock', role: 'production', stock: ACROSS },
      { kind: 'setTemplate', template: said },
    ]);
  const turned = (document: PartDocument, ...away: readonly string[]): PartDocument =>
    applyCommands(
      document,
      document.layout.bends.map((bend) => ({
        kind: 'changeBend' as const,
        bendId: bend.id,
        bend: { ...bend, direction: away.includes(bend.id) ? ('away' as const) : ('towards' as const) },
      })),
    );

  it('names the bends that fold otherwise than the template was said to', () => {
    const said: Template = { ...template, flangesFold: 'towards' };
    expect(found(turned(channel(said)), 'wrongHand')).toEqual([]);
    expect(found(turned(channel(said), 'b2', 'b3'), 'wrongHand')).toMatchObject([
      { severity: 'hint', ids: ['b2', 'b3'], title: 'B2 and B3 fold the other way' },
    ]);
  });

  it('names a single bend that folds against the others where nobody said', () => {
    expect(found(turned(channel(template)), 'wrongHand')).toEqual([]);
    expect(found(turned(channel(template), 'b4'), 'wrongHand')).toMatchObject([{ ids: ['b4'] }]);
    expect(found(turned(channel(template), 'b1', 'b2', 'b3'), 'wrongHand')).toMatchObject([{ ids: ['b4'] }]);
    expect(found(turned(channel(template), 'b3', 'b4'), 'wrongHand')).toEqual([]);
  });

  it('says nothing of typed parts, and is mended by turning them', () => {
    expect(found(turned(channel(null), 'b4'), 'wrongHand')).toEqual([]);
    expect(outcomeOfMending(turned(channel(template), 'b4'), 'wrongHand')).toEqual(MENDED);
  });
});
