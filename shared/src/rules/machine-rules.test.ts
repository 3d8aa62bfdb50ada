import type { BendDeclaration } from '../bending/layout';
import { applyCommand, applyCommands } from '../part/apply-command';
import type { Assembly } from '../part/assembly';
import type { PartDocument, SheetStock } from '../part/part-document';
import { starterDocument } from '../part/starter-document';
import { standOffMm } from './seat-corner';
import { ACROSS, bracket, found, MENDED, outcomeOfMending, plate, severities } from './testing/rule-bench';

/** A flat plate in the bench's sheet. */
/** An L in another sheet, and as wide as wanted. */
function angle(stock: Partial<SheetStock>, widthMm: number, legMm = 60): PartDocument {
  const start = starterDocument({ shape: 'l-bracket', baseMm: legMm, flangeMm: legMm, widthMm, bendAngleDeg: 90 });
  return applyCommand(start, { kind: 'setStock', role: 'production', stock: { ...ACROSS, ...stock } });
}

describe('dieOpeningUnusual', () => {
  const over = (vOpeningMm: number) => bracket({ vOpeningMm });

  it('flips at 6 and at 12 T', () => {
    expect(found(over(12.04), 'dieOpeningUnusual')).toEqual([]);
    expect(found(over(11.96), 'dieOpeningUnusual')).toMatchObject([{ severity: 'caution', requiredMm: 12 }]);
    expect(found(over(23.96), 'dieOpeningUnusual')).toEqual([]);
    expect(found(over(24.04), 'dieOpeningUnusual')).toMatchObject([{ severity: 'hint', requiredMm: 24 }]);
  });

  it('is mended by the usual die, and says nothing of flat parts', () => {
    expect(outcomeOfMending(over(8), 'dieOpeningUnusual')).toEqual(MENDED);
    const flat = applyCommand(plate(60, 40), {
      kind: 'setStock',
      role: 'production',
      stock: { ...ACROSS, vOpeningMm: 8 },
    });
    expect(found(flat, 'dieOpeningUnusual')).toEqual([]);
  });
});

describe('deliveredRadius', () => {
  // V 16 in mild steel: 16 % = 2.56 mm. Within 0.5 of it nothing is said.
  const asked = (insideRadiusMm: number, stock: Partial<SheetStock> = {}) => bracket(stock, { insideRadiusMm });

  it('cautions about a radius that the die cannot bend so small', () => {
    expect(found(asked(2.07), 'deliveredRadius')).toEqual([]);
    const [finding] = found(asked(2.03), 'deliveredRadius');
    expect(finding).toMatchObject({ severity: 'caution', foundMm: 2.03, ids: ['b1'] });
    expect(finding?.requiredMm).toBeCloseTo(2.56, 9);
    expect(finding?.detail).toContain('2.03');
    expect(finding?.detail).toContain('2.56');
  });

  it('hints at the punch that a larger radius needs', () => {
    expect(found(asked(3.04), 'deliveredRadius')).toEqual([]);
    expect(severities(asked(3.08), 'deliveredRadius')).toEqual(['hint']);
  });

  it('is mended by the radius as delivered, unless the metal would not stand it', () => {
    expect(outcomeOfMending(asked(1), 'deliveredRadius')).toEqual(MENDED);
    expect(outcomeOfMending(asked(6), 'deliveredRadius')).toEqual(MENDED);
    // 6061-T6 at 2 mm over V 16 delivers less than the 2 T it wants.
    expect(found(asked(6, { materialId: 'al6061t6' }), 'deliveredRadius')).toMatchObject([{ mend: null }]);
  });

  it('tells of bends that ask for the same radius together, and nothing of hems', () => {
    const start = angle({}, 50);
    const [bend] = start.layout.bends;
    if (bend === undefined) throw new Error('an L has a bend');
    const second: BendDeclaration = { ...bend, id: 'b2', line: { from: { x: 30, y: 0 }, to: { x: 30, y: 50 } } };
    const both = applyCommands(start, [
      { kind: 'changeBend', bendId: 'b1', bend: { ...bend, insideRadiusMm: 4 } },
      { kind: 'addBend', bend: { ...second, insideRadiusMm: 4 } },
    ]);
    expect(found(both, 'deliveredRadius')).toMatchObject([{ ids: ['b1', 'b2'] }]);
    const hem = bracket(
      {},
      { bendAngleDeg: 180, insideRadiusMm: 0, lengths: { from: 'reference', reference: 'tangent' } },
    );
    expect(found(hem, 'deliveredRadius')).toEqual([]);
  });
});

describe('brakeTooSmall', () => {
  it('flips at a length of 3 m', () => {
    const long = (lengthMm: number) => angle({ thicknessMm: 1 }, lengthMm);
    expect(found(long(2999.96), 'brakeTooSmall')).toEqual([]);
    expect(found(long(3000.04), 'brakeTooSmall')).toMatchObject([
      { severity: 'caution', requiredMm: 3000, ids: ['b1'] },
    ]);
  });

  it('flips at 1000 kN: 1.6 · 410 · L · 36 / 50 / 1000, which is 2117.2 mm of 6 mm steel over V 50', () => {
    const thick = (lengthMm: number) => angle({ thicknessMm: 6, vOpeningMm: 50 }, lengthMm, 120);
    expect(found(thick(2117.1), 'brakeTooSmall')).toEqual([]);
    expect(found(thick(2117.3), 'brakeTooSmall')).toMatchObject([
      { id: 'brakeTooSmall-b1-force', severity: 'caution' },
    ]);
  });

  it('is mended by the next wider die that is still usual', () => {
    const thick = angle({ thicknessMm: 6, vOpeningMm: 50 }, 2400, 120);
    expect(found(thick, 'brakeTooSmall')[0]?.mend?.label).toBe('Take the V 63 die');
    expect(outcomeOfMending(thick, 'brakeTooSmall')).toEqual(MENDED);
    // Flanges that the wider die could not bend leave it at advice.
    expect(found(angle({ thicknessMm: 6, vOpeningMm: 50 }, 2400, 40), 'brakeTooSmall')).toMatchObject([{ mend: null }]);
  });
});

describe('blankOutOfRange', () => {
  it('flips at what a sheet of 3000 × 1500 has inside its margin', () => {
    expect(found(plate(2499, 1479.96), 'blankOutOfRange')).toEqual([]);
    expect(found(plate(2499, 1480.04), 'blankOutOfRange')).toMatchObject([{ severity: 'caution', requiredMm: 1480 }]);
    expect(found(plate(1480.04, 2499), 'blankOutOfRange')).toHaveLength(1);
  });

  it('lays the blank as it fits best', () => {
    // A strip drawn at 45 degrees, whose box along the axes is larger than the sheet.
    const strip = applyCommand(plate(100, 100), {
      kind: 'replaceLayout',
      origin: 'import',
      layout: {
        ...plate(100, 100).layout,
        outer: {
          id: 'outer',
          edges: [
            { id: 'd1', start: { x: 0, y: 0 }, bulge: 0 },
            { id: 'd2', start: { x: 1700, y: 1700 }, bulge: 0 },
            { id: 'd3', start: { x: 1600, y: 1800 }, bulge: 0 },
            { id: 'd4', start: { x: -100, y: 100 }, bulge: 0 },
          ],
        },
        baseAnchor: { x: 800, y: 850 },
      },
    });
    expect(found(strip, 'blankOutOfRange')).toEqual([]);
  });

  it('flips at the narrowest blank that lies on the slats', () => {
    expect(found(plate(100, 15.04), 'blankOutOfRange')).toEqual([]);
    expect(found(plate(100, 14.96), 'blankOutOfRange')).toMatchObject([{ severity: 'caution', requiredMm: 15 }]);
  });

  it('leaves parts whose units slipped to that rule', () => {
    expect(found(plate(4, 3), 'blankOutOfRange')).toEqual([]);
    expect(found(plate(4, 3), 'unitsSlip')).toHaveLength(1);
    expect(found(plate(3500, 2000), 'blankOutOfRange')).toEqual([]);
    expect(found(plate(3500, 2000), 'unitsSlip')).toHaveLength(1);
  });
});

describe('seatCorner', () => {
  const seated = (insideRadiusMm: number, cornerMm: number, bend: Partial<BendDeclaration> = {}) => {
    const assembly: Assembly = {
      finishId: 'bare',
      hardwareSet: 'after-coating',
      seat: { material: 'steel', isWet: false, corners: [{ bendId: 'b1', radiusMm: cornerMm }] },
      neighbours: [],
      bolts: null,
    };
    return applyCommand(bracket({}, { insideRadiusMm, ...bend }), { kind: 'setAssembly', assembly });
  };

  it('knows how far a flange stands off: all of R - r at 90°, twice that round an edge', () => {
    expect(standOffMm(3, 0, 90)).toBeCloseTo(3, 12);
    expect(standOffMm(3, 1, 90)).toBeCloseTo(2, 12);
    expect(standOffMm(3, 0, 180)).toBeCloseTo(6, 12);
    expect(standOffMm(3, 0, 60)).toBeCloseTo(1.5, 12);
    expect(standOffMm(2, 3, 90)).toBe(0);
  });

  it.each([30, 60, 90, 120, 150])('agrees with laying the bend on the corner by hand at %d°', (bendAngleDeg) => {
    // The seat's corner as points of its curve; the second face of the part has to clear all of them.
    const [innerMm, cornerMm] = [4, 1.5];
    const turned = (bendAngleDeg * Math.PI) / 180;
    const half = Math.tan(turned / 2);
    const centre = { x: -cornerMm * half, y: cornerMm };
    const gapAt = (backMm: number): number => {
      const bend = { x: -innerMm * half + backMm, y: innerMm };
      // Deepest that a point of the corner lies outside of the bend's curve, over the part of it that both turn through.
      let worst = -Infinity;
      for (let step = 0; step <= 2000; step += 1) {
        const at = (turned * step) / 2000;
        const point = { x: centre.x + cornerMm * Math.sin(at), y: centre.y - cornerMm * Math.cos(at) };
        const isInCurve =
          point.x >= bend.x && (point.x - bend.x) * Math.cos(turned) + (point.y - bend.y) * Math.sin(turned) <= 0;
        if (isInCurve) worst = Math.max(worst, Math.hypot(point.x - bend.x, point.y - bend.y) - innerMm);
      }
      return worst;
    };
    let [low, high] = [0, 40];
    for (let step = 0; step < 60; step += 1) {
      const middle = (low + high) / 2;
      if (gapAt(middle) > 1e-9) low = middle;
      else high = middle;
    }
    expect(high * Math.sin(turned)).toBeCloseTo(standOffMm(innerMm, cornerMm, bendAngleDeg), 2);
  });

  it('flips at a gap that bolts pull shut', () => {
    expect(found(seated(2.56, 2.5), 'seatCorner')).toEqual([]);
    expect(found(seated(2.64, 2.5), 'seatCorner')).toMatchObject([{ severity: 'caution', ids: ['b1'] }]);
    expect(found(bracket(), 'seatCorner')).toEqual([]);
  });

  it('is mended by a tighter bend where the metal stands it', () => {
    expect(outcomeOfMending(seated(4, 2.2), 'seatCorner')).toEqual(MENDED);
    expect(found(seated(2.6, 0), 'seatCorner')).toMatchObject([{ mend: null }]);
  });
});
