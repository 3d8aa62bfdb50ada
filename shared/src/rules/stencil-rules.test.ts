import * as fc from 'fast-check';
import { runs } from '../bending/testing/runs';
import { loopClearance } from '../geometry/clearance';
import { loopFromBulges, polygonLoop, signedArea } from '../geometry/loop';
import { findCrossings } from '../geometry/loop-crossings';
import type { Loop } from '../geometry/path';
import type { Point } from '../geometry/point';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { add as add2, turn } from '../geometry/vector';
import { applyCommand, applyCommands } from '../part/apply-command';
import type { Assembly, Mark } from '../part/assembly';
import type { PartDocument } from '../part/part-document';
import { bridgedGap } from './bridge';
import {
  add,
  bracket,
  cutout,
  found,
  hole,
  MENDED,
  outcomeOfMending,
  outlined,
  plain,
  severities,
} from './testing/rule-bench';

const square = (from: number, to: number) =>
  [
    [from, from],
    [from, to],
    [to, to],
    [to, from],
  ] as const;

describe('insideCornerTooSharp', () => {
  // 2 mm sheet: the cut is 0.18 wide, half of it 0.09.
  const notched: readonly (readonly [number, number])[] = [
    [0, 0],
    [100, 0],
    [100, 50],
    [40, 50],
    [40, 35],
    [20, 35],
    [20, 50],
    [0, 50],
  ];
  const rounded = (radiusMm: number): PartDocument =>
    applyCommand(outlined(bracket(), notched), { kind: 'roundCorner', edgeId: 't4', radiusMm, newEdgeId: 'r1' });
  const shaken = (document: PartDocument) => applyCommand(document, { kind: 'setDeclaredUses', uses: ['vibration'] });

  it('flips for roundings at half the width of the cut', () => {
    expect(found(rounded(0.11), 'insideCornerTooSharp')).toEqual([]);
    expect(found(rounded(0.07), 'insideCornerTooSharp')).toMatchObject([{ severity: 'hint', ids: ['r1'] }]);
  });

  it('leaves outside corners and their roundings alone', () => {
    const outside = applyCommand(outlined(bracket(), notched), {
      kind: 'roundCorner',
      edgeId: 't2',
      radiusMm: 0.05,
      newEdgeId: 'r1',
    });
    expect(found(outside, 'insideCornerTooSharp')).toEqual([]);
    expect(found(shaken(bracket()), 'insideCornerTooSharp')).toEqual([]);
  });

  it('lists sharp ones in one finding where a part is shaken, those of cut-outs too', () => {
    const document = applyCommand(outlined(bracket(), notched), cutout('c', square(5, 15)));
    expect(found(document, 'insideCornerTooSharp')).toEqual([]);
    const [finding, ...rest] = found(shaken(document), 'insideCornerTooSharp');
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ severity: 'hint', title: '6 inside corners are sharper than the cut' });
    expect(new Set(finding?.ids)).toEqual(new Set(['t4', 't5', 'c0', 'c1', 'c2', 'c3']));
  });

  it('leaves corners out where reliefs are cut', () => {
    const tab = outlined(bracket(), [
      [0, 0],
      [60, 0],
      [60, 10],
      [100, 10],
      [100, 50],
      [0, 50],
    ]);
    const [bend] = tab.layout.bends;
    if (bend === undefined) throw new Error('an L has a bend');
    const relieved = applyCommand(shaken(tab), {
      kind: 'changeBend',
      bendId: 'b1',
      bend: { ...bend, line: { from: { x: 60, y: 10 }, to: { x: 60, y: 50 } } },
    });
    expect(found(relieved, 'insideCornerTooSharp')).toEqual([]);
  });

  it('is mended by rounding', () => {
    expect(outcomeOfMending(rounded(0.05), 'insideCornerTooSharp')).toEqual(MENDED);
    const document = applyCommand(outlined(bracket(), notched), cutout('c', square(5, 15)));
    expect(outcomeOfMending(shaken(document), 'insideCornerTooSharp')).toEqual(MENDED);
  });
});

describe('pieceDropsOut', () => {
  const stencil = (innerFrom: number, innerTo: number) =>
    applyCommands(bracket(), [cutout('c', square(5, 35)), cutout('d', square(innerFrom, innerTo))]);

  it('flips where an opening gets inside another', () => {
    const pair = (x: number) => add(bracket(), hole('h1', 20, 25, plain(20)), hole('h2', x, 25, plain(4)));
    // Rims meet from 22 to 26 mm out: inside, it drops out; across, they run into each other.
    expect(found(pair(27.96), 'pieceDropsOut')).toMatchObject([{ severity: 'blocker', ids: ['h1', 'h2'] }]);
    expect(found(pair(27.96), 'landTooThin')).toEqual([]);
    expect(found(pair(28.04), 'pieceDropsOut')).toEqual([]);
    expect(severities(pair(28.04), 'landTooThin')).toEqual(['blocker']);
    expect(found(pair(35), 'pieceDropsOut')).toEqual([]);
  });

  it('is mended for holes by taking them away', () => {
    const inWindow = add(
      applyCommand(bracket(), cutout('c', square(5, 35))),
      hole('h1', 15, 15, plain(5)),
      hole('h2', 25, 25, plain(5)),
    );
    expect(found(inWindow, 'pieceDropsOut')).toMatchObject([
      { ids: ['c', 'h1', 'h2'], mend: { label: 'Take H1 and H2 away' } },
    ]);
    expect(outcomeOfMending(inWindow, 'pieceDropsOut')).toEqual(MENDED);
  });

  it('is mended for a piece by a bridge that holds it', () => {
    const document = stencil(12, 28);
    expect(found(document, 'pieceDropsOut')).toMatchObject([{ severity: 'blocker', requiredMm: 2, ids: ['c', 'd'] }]);
    expect(outcomeOfMending(document, 'pieceDropsOut')).toEqual(MENDED);
    const mended = applyCommands(document, found(document, 'pieceDropsOut')[0]?.mend?.commands ?? []);
    const [gap, ...others] = mended.layout.cutouts;
    expect(others).toEqual([]);
    // 30² less 16² less a bridge of 2 across the gap of 7.
    expect(Math.abs(signedArea(loopFromBulges(gap?.edges ?? [])))).toBeCloseTo(900 - 256 - 14, 6);
  });

  it('bridges round pieces and several of them', () => {
    const round = (id: string, x: number, y: number, radiusMm: number) =>
      ({
        kind: 'addCutout',
        loop: {
          id,
          edges: [
            { id: `${id}0`, start: { x: x - radiusMm, y }, bulge: 1 },
            { id: `${id}1`, start: { x: x + radiusMm, y }, bulge: 1 },
          ],
        },
      }) as const;
    const ring = applyCommands(bracket(), [round('c', 25, 25, 20), round('d', 24, 25, 8)]);
    expect(outcomeOfMending(ring, 'pieceDropsOut')).toEqual(MENDED);
    const eight = applyCommands(bracket(), [round('c', 25, 25, 20), round('d', 17, 25, 5), round('f', 33, 25, 5)]);
    expect(found(eight, 'pieceDropsOut')).toMatchObject([{ mend: { label: 'Leave 2 bridges of 2 mm' } }]);
    expect(outcomeOfMending(eight, 'pieceDropsOut')).toEqual(MENDED);
  });

  it('offers no bridge that is wider than the piece', () => {
    expect(found(stencil(19, 20.5), 'pieceDropsOut')).toMatchObject([{ mend: null }]);
  });
});

describe('bridgedGap', () => {
  /** A polygon with as many corners as asked, turned by an angle. */
  const ngon = (corners: number, radiusMm: number, at: Point, turnDeg: number): Loop =>
    polygonLoop(
      Array.from({ length: corners }, (_, index) =>
        add2(at, turn({ x: radiusMm, y: 0 }, turnDeg + (360 * index) / corners)),
      ),
    );
  const count = fc.integer({ min: 3, max: 9 });
  const angleDeg = fc.double({ min: 0, max: 360, noNaN: true });

  it('is one simple loop whose area is the gap’s less a bridge of its width, for any polygon in another', () => {
    fc.assert(
      fc.property(
        count,
        count,
        angleDeg,
        angleDeg,
        fc.double({ min: 0, max: 0.9, noNaN: true }),
        angleDeg,
        (m, n, a, b, off, dir) => {
          const outer = ngon(m, 100, { x: 0, y: 0 }, a);
          // A triangle's inscribed circle is half as large as the one around it.
          const inner = ngon(n, 20, turn({ x: 29 * off, y: 0 }, dir), b);
          const gap = bridgedGap(outer, inner, 2);
          if (gap === null) throw new Error('there is room for a bridge of 2 on any edge of 13 or more');
          expect(findCrossings([gap], COINCIDENT_MM)).toEqual([]);
          const bridgeMm2 = Math.abs(signedArea(outer)) - Math.abs(signedArea(inner)) - signedArea(gap);
          // The bridge is 2 wide; its outer end may be cut at a slant or by a corner, which changes its mean length by at most 4.
          const clearance = loopClearance(outer, inner)?.distanceMm ?? 0;
          expect(bridgeMm2 / 2).toBeGreaterThan(clearance - 4);
          expect(bridgeMm2 / 2).toBeLessThan(120);
        },
      ),
      { numRuns: runs() },
    );
  });
});

describe('etchedText', () => {
  const marked = (mark: Partial<Mark>, document: PartDocument = bracket()) =>
    applyCommand(document, {
      kind: 'setMarks',
      marks: [{ id: 'm1', text: 'FW 7', at: { x: 10, y: 10 }, heightMm: 4, turnDeg: 0, ...mark }],
    });

  it('flips at letters 8 lines high', () => {
    expect(found(marked({ heightMm: 2.44 }), 'etchedText')).toEqual([]);
    expect(found(marked({ heightMm: 2.36 }), 'etchedText')).toMatchObject([{ severity: 'caution', ids: ['m1'] }]);
    expect(outcomeOfMending(marked({ heightMm: 1 }), 'etchedText')).toEqual(MENDED);
  });

  it('flips where it runs off the part, and comes back onto it', () => {
    // 4 letters of 0.75 · 4 mm: 12 mm long.
    expect(found(marked({ at: { x: 0.04, y: 10 } }), 'etchedText')).toEqual([]);
    expect(found(marked({ at: { x: -0.04, y: 10 } }), 'etchedText')).toMatchObject([
      { severity: 'caution', title: '“FW 7” runs off the part' },
    ]);
    expect(found(marked({ at: { x: -40, y: 80 } }), 'etchedText')).toHaveLength(1);
    expect(outcomeOfMending(marked({ at: { x: -40, y: 80 } }), 'etchedText')).toEqual(MENDED);
  });

  it('flips at the tangent line of a bend', () => {
    // Base: the tangent line lies 4.6 before the crease at 60, the text is 12 long.
    const upTo = (x: number) => marked({ at: { x: x - 12, y: 20 } });
    expect(found(upTo(55.36), 'etchedText')).toEqual([]);
    expect(found(upTo(55.44), 'etchedText')).toMatchObject([{ title: '“FW 7” runs over B1', ids: ['m1', 'b1'] }]);
    expect(outcomeOfMending(upTo(57), 'etchedText')).toEqual(MENDED);
    const flange = (x: number) => marked({ at: { x, y: 20 } });
    expect(found(flange(64.64), 'etchedText')).toEqual([]);
    expect(found(flange(64.56), 'etchedText')).toHaveLength(1);
    expect(outcomeOfMending(flange(62), 'etchedText')).toEqual(MENDED);
  });

  it('turns with the text and sees openings under it', () => {
    expect(found(marked({ at: { x: 10, y: 40 }, turnDeg: 90 }), 'etchedText')).toHaveLength(1);
    expect(found(marked({ at: { x: 10, y: 30 }, turnDeg: 90 }), 'etchedText')).toEqual([]);
    const over = (x: number) => marked({}, add(bracket(), hole('h1', x, 12, plain(6))));
    expect(found(over(25.04), 'etchedText')).toEqual([]);
    expect(found(over(24.96), 'etchedText')).toMatchObject([{ ids: ['m1', 'h1'], mend: null }]);
    expect(found(marked({}, add(bracket(), hole('h1', 16, 12, plain(2)))), 'etchedText')).toHaveLength(1);
  });

  it('hints that powder coat hides it', () => {
    const finish = (finishId: string): Assembly => ({
      finishId,
      hardwareSet: 'after-coating',
      seat: null,
      neighbours: [],
      bolts: null,
    });
    const coated = (finishId: string) => applyCommand(marked({}), { kind: 'setAssembly', assembly: finish(finishId) });
    expect(severities(coated('powder-moss'), 'etchedText')).toEqual(['hint']);
    expect(found(coated('zinc'), 'etchedText')).toEqual([]);
  });
});
