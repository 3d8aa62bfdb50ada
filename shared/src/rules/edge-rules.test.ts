import { applyCommand } from '../part/apply-command';
import { mirrorDocument } from '../part/mirror-document';
import type { PartDocument } from '../part/part-document';
import { bracket, cutout, found, MENDED, outcomeOfMending, outlined, severities } from './testing/rule-bench';

// Bracket: R 2.6, T 2, K 0.35349: BA = 5.19453, half the zone 2.59726, half the deduction 2.00274 (see bending-rules.test.ts).
// So an edge at x in the layout of the flange lies x - 60 - 2.00274 from the bend's centre.
const HALF_DEDUCTION_MM = 2.00274;
const HALF_ZONE_MM = 2.59726;

describe('edgeInBendZone', () => {
  /** The flange with a notch 10 wide from its free edge down to a distance from the bend's centre. */
  const notched = (fromCentreMm: number): PartDocument => {
    const x = 60 + HALF_DEDUCTION_MM + fromCentreMm;
    return outlined(bracket(), [
      [0, 0],
      [100, 0],
      [100, 20],
      [x, 20],
      [x, 30],
      [100, 30],
      [100, 50],
      [0, 50],
    ]);
  };

  it('flips at half the die’s opening from the centre of the bend', () => {
    expect(found(notched(8.04), 'edgeInBendZone')).toEqual([]);
    const [finding] = found(notched(7.96), 'edgeInBendZone');
    expect(finding).toMatchObject({
      severity: 'caution',
      requiredMm: 8,
      ids: ['t3', 'b1'],
      title: 'E4 lies over the die at B1',
    });
    expect(finding?.foundMm).toBeCloseTo(7.96, 4);
  });

  it('becomes a blocker at 2 T from the tangent line', () => {
    expect(severities(notched(HALF_ZONE_MM + 4.04), 'edgeInBendZone')).toEqual(['caution']);
    expect(severities(notched(HALF_ZONE_MM + 3.96), 'edgeInBendZone')).toEqual(['blocker']);
  });

  it('sees steps that leave part of a flange low, on both sides of the bend', () => {
    const step = (fromCentreMm: number) =>
      outlined(bracket(), [
        [0, 0],
        [60 + HALF_DEDUCTION_MM + fromCentreMm, 0],
        [60 + HALF_DEDUCTION_MM + fromCentreMm, 20],
        [100, 20],
        [100, 50],
        [0, 50],
      ]);
    expect(found(step(8.04), 'edgeInBendZone')).toEqual([]);
    expect(found(step(7.96), 'edgeInBendZone')).toMatchObject([{ severity: 'caution', ids: ['t1', 'b1'] }]);
    const inBase = (fromCentreMm: number) =>
      outlined(bracket(), [
        [0, 0],
        [100, 0],
        [100, 50],
        [0, 50],
        [0, 30],
        [60 - HALF_DEDUCTION_MM - fromCentreMm, 30],
        [60 - HALF_DEDUCTION_MM - fromCentreMm, 20],
        [0, 20],
      ]);
    const anchored = (fromCentreMm: number) =>
      applyCommand(inBase(fromCentreMm), { kind: 'setBaseAnchor', to: { x: 30, y: 10 } });
    expect(found(anchored(8.04), 'edgeInBendZone')).toEqual([]);
    expect(found(anchored(7.96), 'edgeInBendZone')).toMatchObject([{ severity: 'caution', ids: ['t5', 'b1'] }]);
  });

  it('leaves sides alone that lead away from the bend, tapered and rounded, and flanges that are low all along', () => {
    const tapered = outlined(bracket(), [
      [0, 0],
      [60, 0],
      [100, 15],
      [100, 35],
      [60, 50],
      [0, 50],
    ]);
    expect(found(tapered, 'edgeInBendZone')).toEqual([]);
    const low = applyCommand(bracket(), { kind: 'slideEdge', edgeId: 'e2', byMm: -30 });
    expect(found(low, 'edgeInBendZone')).toEqual([]);
    expect(severities(low, 'flangeTooShort')).toEqual(['blocker']);
  });

  it('names the tip of a pointed notch by both its edges', () => {
    const x = 60 + HALF_DEDUCTION_MM + 7;
    const pointed = outlined(bracket(), [
      [0, 0],
      [100, 0],
      [100, 20],
      [x, 25],
      [100, 30],
      [100, 50],
      [0, 50],
    ]);
    expect(found(pointed, 'edgeInBendZone')).toMatchObject([{ ids: ['t2', 't3', 'b1'], mend: null }]);
  });

  it.each([9, 7, 4])('finds the same in the other hand, with a notch %d mm from the centre', (fromCentreMm) => {
    const mirrored = mirrorDocument(notched(fromCentreMm));
    expect(severities(mirrored, 'edgeInBendZone')).toEqual(severities(notched(fromCentreMm), 'edgeInBendZone'));
  });

  it('is mended by moving the bottom of the notch out', () => {
    expect(outcomeOfMending(notched(7), 'edgeInBendZone')).toEqual(MENDED);
    expect(outcomeOfMending(notched(4), 'edgeInBendZone')).toEqual(MENDED);
  });
});

describe('missingRelief at drawn notches', () => {
  // Tangent line of the base: R + T = 4.6 before the crease. Wanted past it: R + T = 4.6, and 1 T = 2 wide.
  const drawn = (depthMm: number, widthMm: number): PartDocument => {
    const x = 60 - 4.6 - depthMm;
    const start = outlined(bracket(), [
      [0, 0],
      [60, 0],
      [60, 10 - widthMm],
      [x, 10 - widthMm],
      [x, 10],
      [60, 10],
      [100, 10],
      [100, 50],
      [0, 50],
    ]);
    const [bend] = start.layout.bends;
    if (bend === undefined) throw new Error('an L has a bend');
    return applyCommand(start, {
      kind: 'changeBend',
      bendId: 'b1',
      bend: { ...bend, line: { from: { x: 60, y: 10 }, to: { x: 60, y: 50 } } },
    });
  };

  it('flips at a depth of R + T past the tangent line', () => {
    expect(found(drawn(4.64, 3), 'missingRelief')).toEqual([]);
    const [finding] = found(drawn(4.56, 3), 'missingRelief');
    expect(finding).toMatchObject({
      severity: 'caution',
      ids: ['b1'],
      title: 'The notch at the end of B1 is too shallow',
    });
    expect(finding?.foundMm).toBeCloseTo(4.56, 6);
    expect(finding?.requiredMm).toBeCloseTo(4.6, 6);
  });

  it('flips at a width of 1 T', () => {
    expect(found(drawn(6, 2.04), 'missingRelief')).toEqual([]);
    expect(found(drawn(6, 1.96), 'missingRelief')).toMatchObject([
      { title: 'The notch at the end of B1 is too narrow', mend: null },
    ]);
  });

  it('is mended by deepening it', () => {
    expect(outcomeOfMending(drawn(2, 3), 'missingRelief')).toEqual(MENDED);
  });

  it('looks at openings across the bend too', () => {
    // Tangent line of the flange: 64.6; wanted past it 4.6, so the rim belongs at 69.2.
    const window = (pastMm: number) =>
      applyCommand(
        bracket(),
        cutout('c', [
          [64.6 + pastMm, 20],
          [64.6 + pastMm, 30],
          [50, 30],
          [50, 20],
        ]),
      );
    expect(found(window(4.64), 'missingRelief')).toEqual([]);
    expect(found(window(4.56), 'missingRelief')).toMatchObject([
      { severity: 'caution', title: 'The opening across B1 is too shallow' },
    ]);
    expect(found(window(4.56), 'edgeInBendZone')).toEqual([]);
    expect(outcomeOfMending(window(2), 'missingRelief')).toEqual(MENDED);
  });

  it('takes a wide step in the panel for its shape', () => {
    expect(found(drawn(2, 7.9), 'missingRelief')).toHaveLength(1);
    expect(found(drawn(2, 8.1), 'missingRelief')).toEqual([]);
  });
});
