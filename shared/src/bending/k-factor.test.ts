import { bendDeductionMm } from './allowance';
import { chooseKFactor } from './k-factor';
import { sampleStock } from './testing/sample-layouts';

const BEND = { bendAngleDeg: 90, insideRadiusMm: 2, thicknessMm: 2 };
// Band of cold rolled steel for air bends, R/T 1 to 3. Common practice, no source.
const STEEL_BANDS = [
  { ratioBelow: 1, low: 0.33, high: 0.42, source: 'trade band', confidence: 'common-practice' },
  { ratioBelow: 3, low: 0.38, high: 0.46, source: 'trade band', confidence: 'common-practice' },
  { ratioBelow: null, low: 0.44, high: 0.5, source: 'trade band', confidence: 'common-practice' },
] as const;
const TABLE = [
  { ratioFrom: 0, ratioTo: 1, kFactor: 0.38, source: 'own table', confidence: 'published' },
  { ratioFrom: 1, ratioTo: null, kFactor: 0.42, source: 'own table', confidence: 'published' },
] as const;

describe('order of the sources of K', () => {
  it('takes what a person entered first', () => {
    const choice = chooseKFactor(
      BEND,
      { kind: 'kFactor', kFactor: 0.4, reason: 'matched last batch' },
      sampleStock({ kTable: TABLE }),
    );
    expect(choice).toMatchObject({
      ok: true,
      kFactor: 0.4,
      provenance: { confidence: 'entered', text: 'entered by hand: matched last batch' },
    });
  });

  it('takes the table by material next, row by R/T', () => {
    const stock = sampleStock({ kTable: TABLE });
    expect(chooseKFactor(BEND, null, stock)).toMatchObject({
      ok: true,
      kFactor: 0.42,
      provenance: { source: 'own table' },
    });
    expect(chooseKFactor({ ...BEND, insideRadiusMm: 1.99 }, null, stock)).toMatchObject({ kFactor: 0.38 });
  });

  it('takes DIN 6935 for steel without a table', () => {
    const choice = chooseKFactor(BEND, null, sampleStock());
    expect(choice).toMatchObject({ ok: true, kFactor: 0.325, provenance: { confidence: 'published' } });
  });

  // Source: M. P. Groover, Fundamentals of Modern Manufacturing: 0.33 below R 2 T, 0.5 from there on.
  it('takes the textbook rule for other metals without a table', () => {
    const stock = sampleStock({ family: 'aluminium' });
    expect(chooseKFactor(BEND, null, stock)).toMatchObject({ kFactor: 0.33 });
    expect(chooseKFactor({ ...BEND, insideRadiusMm: 4 }, null, stock)).toMatchObject({ kFactor: 0.5 });
  });

  it('puts the neutral line of a hem in the middle unless told otherwise', () => {
    const hem = { ...BEND, bendAngleDeg: 180 };
    expect(chooseKFactor(hem, null, sampleStock({ kTable: TABLE }))).toMatchObject({ kFactor: 0.5 });
    expect(chooseKFactor(hem, { kind: 'kFactor', kFactor: 0.35, reason: 'measured' }, sampleStock())).toMatchObject({
      kFactor: 0.35,
    });
  });
});

describe('a measured deduction', () => {
  it('gives the K that makes it', () => {
    const bend = { ...BEND, insideRadiusMm: 1.5, thicknessMm: 1.5 };
    const deductionMm = bendDeductionMm({ ...bend, kFactor: 0.42 }, 'outsideApex');
    const choice = chooseKFactor(
      bend,
      { kind: 'deduction', deductionMm, reference: 'outsideApex', reason: 'strip' },
      sampleStock(),
    );
    expect(choice.ok && choice.kFactor).toBeCloseTo(0.42, 10);
  });

  it('is refused to an apex at 180 degrees', () => {
    const override = { kind: 'deduction', deductionMm: 1, reference: 'outsideApex', reason: 'strip' } as const;
    expect(chooseKFactor({ ...BEND, bendAngleDeg: 180 }, override, sampleStock())).toMatchObject({
      ok: false,
      code: 'referenceNotAllowed',
    });
  });

  it('is refused when no sheet could have it', () => {
    const override = { kind: 'deduction', deductionMm: 0, reference: 'outsideApex', reason: 'strip' } as const;
    expect(chooseKFactor(BEND, override, sampleStock())).toMatchObject({ ok: false, code: 'kOutOfRange' });
  });
});

describe('range and band', () => {
  it('says when K lies outside the band of the material', () => {
    const low = chooseKFactor(BEND, null, sampleStock({ kBands: STEEL_BANDS }));
    expect(low.ok && low.note).toContain('below the band usual for this material, 0.38 to 0.46');
    const inside = chooseKFactor(
      BEND,
      { kind: 'kFactor', kFactor: 0.42, reason: 'x' },
      sampleStock({ kBands: STEEL_BANDS }),
    );
    expect(inside.ok && inside.note).toBeNull();
  });

  it.each([0, -0.1, 0.501, Number.NaN])('refuses an entered K of %s', (kFactor) => {
    expect(chooseKFactor(BEND, { kind: 'kFactor', kFactor, reason: 'x' }, sampleStock())).toMatchObject({
      ok: false,
      code: 'kOutOfRange',
    });
  });

  it('has no source for steel sharper than R/T 0.1', () => {
    expect(chooseKFactor({ ...BEND, insideRadiusMm: 0.19 }, null, sampleStock())).toMatchObject({
      ok: false,
      code: 'kOutOfRange',
    });
  });
});
