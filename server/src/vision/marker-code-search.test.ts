import { codeDistance, codeTurns, mirrorCode, searchMarkerCodes, turnCode } from './marker-code-search';
import { CODES_PER_SHEET, MARKER_CODE_SEARCH, MARKER_CODES } from './marker-codes';

describe('marker codes', () => {
  it('are what the seeded search finds', () => {
    expect(searchMarkerCodes(MARKER_CODE_SEARCH)).toEqual(MARKER_CODES);
  });

  it('fill four ranges', () => {
    expect(MARKER_CODES).toHaveLength(4 * CODES_PER_SHEET);
  });

  it('differ in at least eight cells from each other in every turn', () => {
    let least = 25;
    MARKER_CODES.forEach((code, index) => {
      for (const other of MARKER_CODES.slice(index + 1)) {
        for (const turn of codeTurns(other)) least = Math.min(least, codeDistance(code, turn));
      }
    });
    expect(least).toBe(8);
  });

  it('differ in at least eight cells from their own turns', () => {
    for (const code of MARKER_CODES) {
      for (const turn of codeTurns(code).slice(1)) expect(codeDistance(code, turn)).toBeGreaterThanOrEqual(8);
    }
  });

  it('differ in at least four cells from every mirrored code', () => {
    for (const code of MARKER_CODES) {
      for (const other of MARKER_CODES) {
        for (const turn of codeTurns(other)) {
          expect(codeDistance(mirrorCode(code), turn)).toBeGreaterThanOrEqual(MARKER_CODE_SEARCH.mirrorDistance);
        }
      }
    }
  });

  it('come back after four turns and two mirrors', () => {
    for (const code of MARKER_CODES) {
      expect(turnCode(turnCode(turnCode(turnCode(code))))).toBe(code);
      expect(mirrorCode(mirrorCode(code))).toBe(code);
    }
  });

  it('cannot be more than there are', () => {
    expect(() => searchMarkerCodes({ ...MARKER_CODE_SEARCH, count: 5000 })).toThrow(RangeError);
  });
});
