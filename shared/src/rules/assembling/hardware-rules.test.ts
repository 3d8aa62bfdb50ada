import type { HolePurpose } from '../../bending/layout';
import { applyCommand } from '../../part/apply-command';
import type { PartDocument } from '../../part/part-document';
import { checkPart } from '../check-part';
import { MENDED, add, bracket, found, hole, outcomeOfMending, plate, severities } from '../testing/rule-bench';
import { assembled } from './testing/assembled';

const tapped = (thread: string): HolePurpose => ({ kind: 'tapped', thread });
const nut = (thread: string): HolePurpose => ({ kind: 'rivet-nut', thread });

function withHole(purpose: HolePurpose, thicknessMm = 2, materialId = 'dc01'): PartDocument {
  const { production } = plate(60, 50).stocks;
  const sheet = applyCommand(plate(60, 50), {
    kind: 'setStock',
    role: 'production',
    stock: { ...production, thicknessMm, materialId },
  });
  return add(sheet, hole('h1', 30, 25, purpose));
}

describe('threadTooShort', () => {
  it.each([
    // M6 has a turn every 1 mm: two take 2 mm. Half of M6 is 3 mm.
    ['M6', 2],
    ['M10', 3],
    // 1/4-20: 25.4 / 20 = 1.27 mm a turn.
    ['1/4-20', 2.54],
  ])('wants two full turns of %s: %d mm', (thread, limitMm) => {
    expect(severities(withHole(tapped(thread), limitMm - 0.04), 'threadTooShort')).toEqual(['caution']);
    expect(severities(withHole(tapped(thread), limitMm + 0.04), 'threadTooShort')).toEqual(['hint']);
    expect(found(withHole(tapped(thread), limitMm - 0.04), 'threadTooShort')[0]).toMatchObject({
      requiredMm: limitMm,
      foundMm: limitMm - 0.04,
    });
  });

  it('wants half a diameter in steel, a whole one in aluminium', () => {
    expect(severities(withHole(tapped('M6'), 2.96), 'threadTooShort')).toEqual(['hint']);
    expect(severities(withHole(tapped('M6'), 3.04), 'threadTooShort')).toEqual([]);
    expect(severities(withHole(tapped('M6'), 5.96, 'al5052h32'), 'threadTooShort')).toEqual(['hint']);
    expect(severities(withHole(tapped('M6'), 6.04, 'al5052h32'), 'threadTooShort')).toEqual([]);
  });

  it('is mended by a rivet nut, which inch threads do not have', () => {
    expect(outcomeOfMending(withHole(tapped('M6'), 1.5), 'threadTooShort')).toEqual(MENDED);
    expect(found(withHole(tapped('M6'), 1.5), 'threadTooShort')[0]?.mend?.label).toBe(
      'Make it a hole for an M6 rivet nut',
    );
    expect(found(withHole(tapped('1/4-20'), 1.5), 'threadTooShort')[0]?.mend).toBeNull();
  });

  it('offers no rivet nut where its hole would not leave a land', () => {
    // The nut's 9 mm hole at 5.4 mm from the edge leaves 0.9 mm, less than T.
    const tight = add(plate(60, 50), hole('h1', 5.4, 25, tapped('M8')), hole('h2', 30, 25, tapped('M8')));
    const [first, second] = found(tight, 'threadTooShort');
    expect(first?.mend).toBeNull();
    expect(second?.mend).not.toBeNull();
  });
});

describe('hardwareNeedsMask', () => {
  const said = { finishId: 'powder-moss', hardwareSet: 'before-coating' } as const;
  const both = add(bracket(), hole('h1', 20, 15, tapped('M6')), hole('h2', 20, 35, nut('M6')));

  it('speaks of powder over threads and nuts, and of nuts in a bath', () => {
    const [finding] = found(assembled(both, said), 'hardwareNeedsMask');
    expect(finding).toMatchObject({ severity: 'caution', title: 'H1 and H2 need masks', ids: ['h1', 'h2'] });
    const zinc = found(assembled(both, { ...said, finishId: 'zinc' }), 'hardwareNeedsMask');
    expect(zinc).toMatchObject([{ severity: 'hint', ids: ['h2'] }]);
  });

  it('keeps quiet when hardware is set afterwards, the part is bare or nothing is said', () => {
    expect(found(assembled(both, { ...said, hardwareSet: 'after-coating' }), 'hardwareNeedsMask')).toEqual([]);
    expect(found(assembled(both, { ...said, finishId: 'bare' }), 'hardwareNeedsMask')).toEqual([]);
    expect(found(both, 'hardwareNeedsMask')).toEqual([]);
    expect(checkPart(assembled(both, said), 'trial').map(({ rule }) => rule)).not.toContain('hardwareNeedsMask');
  });

  it('is mended by setting it afterwards', () => {
    expect(outcomeOfMending(assembled(both, said), 'hardwareNeedsMask')).toEqual(MENDED);
  });
});

describe('finishNotForMetal', () => {
  const inMetal = (materialId: string, finishId: string) =>
    assembled(withHole({ kind: 'plain', diameterMm: 6 }, 2, materialId), { finishId });

  it.each([
    ['al5052h32', 'zinc', 1],
    ['ss304', 'zinc', 1],
    ['dc01', 'zinc', 0],
    ['dc01', 'anodise', 1],
    ['al5052h32', 'anodise', 0],
    ['dc01', 'powder-moss', 0],
    ['cu110', 'powder-moss', 0],
  ])('%s with %s: %d', (materialId, finishId, count) => {
    expect(found(inMetal(materialId, finishId), 'finishNotForMetal')).toHaveLength(count);
  });

  it('cannot be made, and is mended by leaving the part bare', () => {
    expect(severities(inMetal('al5052h32', 'zinc'), 'finishNotForMetal')).toEqual(['blocker']);
    expect(outcomeOfMending(inMetal('al5052h32', 'zinc'), 'finishNotForMetal')).toEqual(MENDED);
  });
});

describe('unlikeMetals', () => {
  const on = (materialId: string, material: 'steel' | 'stainless' | 'aluminium' | 'other', isWet = true) =>
    severities(
      assembled(withHole({ kind: 'plain', diameterMm: 6 }, 2, materialId), { seat: { material, isWet, corners: [] } }),
      'unlikeMetals',
    );

  it.each([
    ['al5052h32', 'steel', true, ['hint']],
    ['al5052h32', 'stainless', true, ['hint']],
    ['dc01', 'aluminium', true, ['hint']],
    ['cu110', 'aluminium', true, ['hint']],
    ['al5052h32', 'aluminium', true, []],
    ['al5052h32', 'steel', false, []],
    ['dc01', 'stainless', true, []],
    ['cu110', 'other', true, []],
  ] as const)('%s on %s, wet %s: %j', (materialId, seat, isWet, expected) => {
    expect(on(materialId, seat, isWet)).toEqual(expected);
  });
});
