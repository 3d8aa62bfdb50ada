import { describe, expect, it } from '@jest/globals';
import { stripLayout } from '../bending/testing/sample-layouts';
import { developPart } from '../part/develop-part';
import { emptyDocument, starterDocument } from '../part/starter-document';
import type { PartDocument } from '../part/part-document';
import { checkBendOrder } from './bend-order';
import { ACROSS, bracket, found, severities } from './testing/rule-bench';

const square = { reference: 'outsideApex', insideRadiusMm: 2 } as const;

/** A strip of outside sizes in 2 mm steel over a V 16, all bends square with R 2; the base is the second leg. */
function strip(...legsMm: readonly number[]): PartDocument {
  const bends = legsMm.slice(1).map((): typeof square => square);
  const start = emptyDocument(stripLayout(legsMm, bends, 40, 1));
  return { ...start, stocks: { ...start.stocks, production: ACROSS } };
}

describe('bendOrder', () => {
  it('proposes an order with punch, die and lie of the sheet', () => {
    expect(found(strip(45, 30, 45), 'bendOrder')).toMatchObject([
      {
        severity: 'hint',
        title: 'Bend in this order: B2, B1',
        detail: 'B2 with face A up, straight punch over V16-88; B1 with face A up, gooseneck punch over V16-88.',
        ids: ['bend-2', 'bend-1'],
      },
    ]);
  });

  it('says nothing of a single bend, nor to who has it bent outside', () => {
    expect(found(bracket(), 'bendOrder')).toEqual([]);
    const making = { bender: 'outside', statement: 'formed-sizes-rule' } as const;
    expect(found({ ...strip(45, 30, 45), making }, 'bendOrder')).toEqual([]);
  });

  it('blocks when nothing works, and says what is in the way', () => {
    expect(found(strip(90, 30, 90), 'bendOrder')).toMatchObject([
      {
        severity: 'blocker',
        title: 'No order of bends works: B1 and B2 are in the way',
        detail:
          'B1: at 30° the panel beyond B2 runs into the punch. B2: at 30° the panel beyond B1 runs into the punch.',
        ids: ['bend-1', 'bend-2'],
      },
    ]);
  });

  it('flips within 0.05 mm of where the flange meets the neck of the gooseneck', () => {
    const limitMm = limitOf((legMm) => severities(strip(legMm, 30, legMm), 'bendOrder')[0] === 'hint', 45, 90);
    // The corner of its inside face comes to x = (h - w + T) / sqrt 2, which is 14 for h = 28 + 14 x 1.4142 = 47.799.
    expect(limitMm).toBeCloseTo(47.8, 1);
  });

  it('leaves a flange that is too short for the die to the rule about it', () => {
    expect(severities(strip(6, 50), 'flangeTooShort')).toEqual(['blocker']);
    expect(found(strip(6, 50), 'bendOrder')).toEqual([]);
  });

  it('says so when the search was broken off', () => {
    const document = strip(45, 30, 45);
    const result = developPart(document, 'production');
    if (!result.ok) throw new Error('a U can be developed');
    const context = {
      document,
      role: 'production',
      sheet: document.stocks.production,
      material: null,
      names: new Map(),
      development: result.development,
      problems: [],
      tryOut: null,
    } as const;
    expect(checkBendOrder(context, 100)).toMatchObject([{ severity: 'caution', ids: ['bend-1', 'bend-2'] }]);
  });
});

describe('selfInterference', () => {
  it('names both panels, and flips within 0.05 mm of where they meet', () => {
    // The last flange comes back over the base and meets the inside of the first leg at 40 - 2 = 38.
    expect(found(strip(40, 40, 30, 37.97), 'selfInterference')).toEqual([]);
    expect(found(strip(40, 40, 30, 38.05), 'selfInterference')).toMatchObject([
      { severity: 'blocker', title: 'The panel beyond B1 runs into the panel beyond B3', ids: ['bend-1', 'bend-3'] },
    ]);
  });

  it('leaves no finding on starter shapes', () => {
    for (const starter of [
      { shape: 'tray', lengthMm: 120, widthMm: 80, flangeMm: 25 },
      { shape: 'gusseted-l', baseMm: 60, flangeMm: 40, widthMm: 50, gussetMm: 30 },
      { shape: 'hat-section', topMm: 50, sideMm: 30, brimMm: 20, widthMm: 40 },
    ] as const) {
      const document = starterDocument(starter);
      expect(found(document, 'selfInterference')).toEqual([]);
      expect(severities(document, 'bendOrder')).toEqual(['hint']);
    }
  });
});

/** Largest value that still works, by halving. */
function limitOf(works: (value: number) => boolean, worksAt: number, failsAt: number): number {
  let [low, high] = [worksAt, failsAt];
  while (high - low > 0.01) {
    const middle = (low + high) / 2;
    if (works(middle)) low = middle;
    else high = middle;
  }
  return low;
}
