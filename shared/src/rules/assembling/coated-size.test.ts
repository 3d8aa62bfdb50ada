import type { Feature, HolePurpose } from '../../bending/layout';
import { applyCommand } from '../../part/apply-command';
import type { PartDocument } from '../../part/part-document';
import { starterDocument } from '../../part/starter-document';
import { ACROSS, MENDED, add, bracket, found, hole, outcomeOfMending, severities } from '../testing/rule-bench';
import { assembled } from './testing/assembled';

const POWDER = { finishId: 'powder-moss' } as const;
const clearance = (thread: string, fit: 'close' | 'medium' | 'coarse'): HolePurpose => ({
  kind: 'clearance',
  thread,
  fit,
});

/** A channel 80 wide with flanges of 60, 50 long; x = 100 lies in the middle of its web. */
function channel(angleDeg = 90): PartDocument {
  const shape = { shape: 'u-bracket', baseMm: 80, leftFlangeMm: 60, rightFlangeMm: 60, widthMm: 50 } as const;
  return applyCommand(starterDocument({ ...shape, bendAngleDeg: angleDeg }), {
    kind: 'setStock',
    role: 'production',
    stock: ACROSS,
  });
}

function slot(widthMm: number, fromX = 15): Feature {
  return { kind: 'slot', id: 's1', from: { x: fromX, y: 25 }, to: { x: fromX + 10, y: 25 }, widthMm };
}

describe('coatedTooSmall', () => {
  // Powder builds up to 0.12 a side, 0.24 on a diameter; a bolt wants 0.1 mm more than its size.
  it('takes the thickest coat off both sides of a hole', () => {
    // M3: close 3.2 - 0.24 = 2.96 < 3.1; medium 3.4 - 0.24 = 3.16. M6 close 6.4 - 0.24 = 6.16 > 6.1.
    const [finding] = found(
      assembled(add(bracket(), hole('h1', 20, 25, clearance('M3', 'close'))), POWDER),
      'coatedTooSmall',
    );
    expect(finding).toMatchObject({ severity: 'caution', title: 'Hole H1 is tight for M3 once coated' });
    expect(finding?.foundMm).toBeCloseTo(2.96, 9);
    expect(finding?.requiredMm).toBeCloseTo(3.1, 9);
    for (const purpose of [clearance('M3', 'medium'), clearance('M6', 'close')]) {
      expect(found(assembled(add(bracket(), hole('h1', 20, 25, purpose)), POWDER), 'coatedTooSmall')).toEqual([]);
    }
  });

  it('flips where a slot leaves 0.1 mm of play', () => {
    // M6 wants 6.1 under 0.24 of powder: 6.34 would do, but such widths lie below its close fit; M8: 8.34.
    // M8 reaches from 8.4, so the limit that can be crossed within its range is the doubled one: 8.1 + 0.48 = 8.58.
    const inChannel = (widthMm: number) => assembled(add(channel(), slot(widthMm, 95)), POWDER);
    expect(severities(inChannel(8.56), 'coatedTooSmall')).toEqual(['caution']);
    expect(severities(inChannel(8.6), 'coatedTooSmall')).toEqual([]);
    expect(outcomeOfMending(inChannel(8.5), 'coatedTooSmall')).toEqual(MENDED);
    expect(found(inChannel(8.5), 'coatedTooSmall')[0]?.mend?.label).toBe('Widen it to 8.6 mm');
  });

  it('counts the coat double inside a channel, on its web and on its flanges', () => {
    // M5 medium: 5.5 - 0.24 = 5.26 flat, 5.5 - 0.48 = 5.02 < 5.1 inside.
    const at = (document: PartDocument, x: number) =>
      severities(assembled(add(document, hole('h1', x, 25, clearance('M5', 'medium'))), POWDER), 'coatedTooSmall');
    expect(at(bracket(), 20)).toEqual([]);
    for (const x of [25, 100, 175]) expect(at(channel(), x)).toEqual(['caution']);
    expect(at(channel(60), 100)).toEqual([]);
    const z = starterDocument({ shape: 'z-bracket', webMm: 80, lowerFlangeMm: 60, upperFlangeMm: 60, widthMm: 50 });
    expect(at(applyCommand(z, { kind: 'setStock', role: 'production', stock: ACROSS }), 100)).toEqual([]);
  });

  it('is mended by the next fit that is coarse enough', () => {
    const m3 = assembled(add(bracket(), hole('h1', 20, 25, clearance('M3', 'close'))), POWDER);
    expect(found(m3, 'coatedTooSmall')[0]?.mend?.label).toBe('Take the medium fit');
    expect(outcomeOfMending(m3, 'coatedTooSmall')).toEqual(MENDED);
    // Inside a channel M3 needs 3.1 + 0.48 = 3.58: only the coarse 3.6 does. M2 would need 2.58: coarse is 2.6.
    const inside = assembled(add(channel(), hole('h1', 100, 25, clearance('M3', 'close'))), POWDER);
    expect(found(inside, 'coatedTooSmall')[0]?.mend?.label).toBe('Take the coarse fit');
    expect(outcomeOfMending(inside, 'coatedTooSmall')).toEqual(MENDED);
  });

  it('looks at rivet nuts that are set afterwards', () => {
    const nut = add(bracket(), hole('h1', 20, 25, { kind: 'rivet-nut', thread: 'M6' }));
    // 9 - 0.24 = 8.76 under powder; zinc 9 - 0.024 = 8.976, within the 0.05 that a nut's hole may lack.
    expect(found(assembled(nut, POWDER), 'coatedTooSmall')[0]?.foundMm).toBeCloseTo(8.76, 9);
    expect(severities(assembled(nut, { finishId: 'zinc' }), 'coatedTooSmall')).toEqual([]);
    expect(severities(assembled(nut, { ...POWDER, hardwareSet: 'before-coating' }), 'coatedTooSmall')).toEqual([]);
  });

  it('counts plating four times on threads: 48 µm of zinc against what ISO leaves', () => {
    // 4 x 12 = 48 µm. M20 leaves 15 + 11 x 2.5 = 42.5, M24 15 + 11 x 3 = 48.
    const plated = (
      thread: string,
      finishId: string,
      hardwareSet: 'before-coating' | 'after-coating' = 'before-coating',
    ) => {
      const part = applyCommand(add(bracket(), hole('h1', 25, 25, { kind: 'tapped', thread })), {
        kind: 'setStock',
        role: 'production',
        stock: { ...ACROSS, thicknessMm: 2, materialId: finishId === 'anodise' ? 'al5052h32' : 'dc01' },
      });
      return assembled(part, { finishId, hardwareSet });
    };
    expect(severities(plated('M20', 'zinc'), 'coatedTooSmall')).toEqual(['caution']);
    expect(severities(plated('M24', 'zinc'), 'coatedTooSmall')).toEqual([]);
    expect(severities(plated('M20', 'zinc', 'after-coating'), 'coatedTooSmall')).toEqual([]);
    expect(severities(plated('M6', 'powder-moss'), 'coatedTooSmall')).toEqual([]);
    // Anodising: 4 x 12.7 = 50.8 µm.
    expect(severities(plated('M24', 'anodise'), 'coatedTooSmall')).toEqual(['caution']);
    expect(outcomeOfMending(plated('M6', 'zinc'), 'coatedTooSmall')).toEqual(MENDED);
  });

  it('leaves a coated tab 0.1 mm in its coated slot', () => {
    // 2 mm of sheet is 2.24 coated and wants 2.34; the slot loses 0.24: 2.58.
    const tabbed = (widthMm: number) => assembled(add(bracket(), slot(widthMm)), POWDER);
    expect(severities(tabbed(2.56), 'coatedTooSmall')).toEqual(['caution']);
    expect(severities(tabbed(2.6), 'coatedTooSmall')).toEqual([]);
    expect(outcomeOfMending(tabbed(2.3), 'coatedTooSmall')).toEqual(MENDED);
    expect(severities(assembled(add(bracket(), slot(2.3))), 'coatedTooSmall')).toEqual([]);
  });
});
