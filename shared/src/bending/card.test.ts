import { bendAllowanceMm } from './allowance';
import { faceInBend, readDepthMm, templateSetbackMm } from './card';
import type { CardReading } from './layout';

const MIDDLE = { kind: 'middle' } as const;

function flatOf(
  reading: CardReading,
  cardMm: number,
  metal: { thicknessMm: number; insideRadiusMm: number; kFactor: number },
): number {
  const bend = { bendAngleDeg: 90, ...metal };
  return 50 + 30 - 2 * templateSetbackMm(bend, 'towards', { thicknessMm: cardMm, reading }) + bendAllowanceMm(bend);
}

// Towards the viewer of face A, face A is inside the bend. Expected figures worked by hand from nested right angles.
describe('an L of 50 + 30 off 3 mm card in 2 mm sheet, R 2, K 0.33', () => {
  const metal = { thicknessMm: 2, insideRadiusMm: 2, kFactor: 0.33 };
  it.each([
    ['outside read and held', 'faceB', 'B', 76.18],
    ['inside read and held', 'faceA', 'A', 80.18],
    ['hinged at the middle, outside held', 'crease', 'B', 79.18],
    ['hinged at the middle, inside held', 'crease', 'A', 77.18],
  ] as const)('%s', (_, readOn, bearingFace, expected) => {
    expect(Math.abs(flatOf({ readOn, bearingFace, hinge: MIDDLE }, 3, metal) - expected)).toBeLessThan(0.005);
  });
});

describe('one part, two stocks: outside 50 x 30 off 1.5 mm steel', () => {
  it.each([
    ['the steel itself', 'B', { thicknessMm: 1.5, insideRadiusMm: 1.5, kFactor: 0.42 }, 77.35],
    ['3 mm alloy, outside held', 'B', { thicknessMm: 3, insideRadiusMm: 4.5, kFactor: 0.41 }, 74.0],
    ['3 mm alloy, inside held', 'A', { thicknessMm: 3, insideRadiusMm: 4.5, kFactor: 0.41 }, 77.0],
  ] as const)('%s', (_, bearingFace, metal, expected) => {
    expect(Math.abs(flatOf({ readOn: 'faceB', bearingFace, hinge: MIDDLE }, 1.5, metal) - expected)).toBeLessThan(
      0.005,
    );
  });
});

describe('faces and depths', () => {
  it('has face A inside when the sheet turns towards its viewer', () => {
    expect(faceInBend('A', 'towards')).toBe('inside');
    expect(faceInBend('A', 'away')).toBe('outside');
    expect(faceInBend('B', 'towards')).toBe('outside');
    expect(faceInBend('B', 'away')).toBe('inside');
  });

  it('measures a hinge from face A and counts it from the inside of the bend', () => {
    const template = {
      thicknessMm: 3,
      reading: { readOn: 'crease', bearingFace: 'A', hinge: { kind: 'depth', depthMm: 1 } },
    } as const;
    expect(readDepthMm(template, 'towards')).toBe(1);
    expect(readDepthMm(template, 'away')).toBe(2);
    const liner = {
      thicknessMm: 3,
      reading: { readOn: 'crease', bearingFace: 'A', hinge: { kind: 'liner', face: 'B' } },
    } as const;
    expect(readDepthMm(liner, 'towards')).toBe(3);
    expect(readDepthMm(liner, 'away')).toBe(0);
  });

  it('moves the tangent line of one bend of a Z only when both are read on one face', () => {
    const reading: CardReading = { readOn: 'faceA', bearingFace: 'A', hinge: MIDDLE };
    const bend = { bendAngleDeg: 90, insideRadiusMm: 2, thicknessMm: 2 };
    const template = { thicknessMm: 3, reading };
    // Inside of the first bend, outside of the second: they differ by the sheet's own thickness.
    expect(templateSetbackMm(bend, 'away', template) - templateSetbackMm(bend, 'towards', template)).toBeCloseTo(2, 10);
  });

  it('grows with tan(A/2)', () => {
    const template = { thicknessMm: 3, reading: { readOn: 'faceB', bearingFace: 'A', hinge: MIDDLE } } as const;
    const bend = { bendAngleDeg: 60, insideRadiusMm: 2, thicknessMm: 2 };
    // Read outside, inside held: inside setback of R 2 plus 3 mm of card, each times tan 30.
    expect(templateSetbackMm(bend, 'towards', template)).toBeCloseTo(5 * Math.tan(Math.PI / 6), 10);
  });

  it('holds up to 165 degrees', () => {
    const template = { thicknessMm: 3, reading: { readOn: 'faceA', bearingFace: 'A', hinge: MIDDLE } } as const;
    const bend = { insideRadiusMm: 2, thicknessMm: 2 };
    expect(templateSetbackMm({ ...bend, bendAngleDeg: 165 }, 'towards', template)).toBeGreaterThan(0);
    expect(() => templateSetbackMm({ ...bend, bendAngleDeg: 165.01 }, 'towards', template)).toThrow(RangeError);
  });
});
