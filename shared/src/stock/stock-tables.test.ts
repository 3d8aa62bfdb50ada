import type { BendingStock } from '../bending/development';
import { METRIC_FASTENERS } from './fastener-tables';
import { FINISHES, coatedHoleMm, findFinish } from './finishes';
import { GAUGE_TABLE, gaugeThicknessMm } from './gauges';
import { findHoleDiameterMm, findMetricFastener, holeDiameterMm, threadsFor } from './hole-diameter';
import { SHEET_MATERIALS, findMaterial } from './materials';
import { type StockResolution, resolveStock } from './resolve-stock';
import { stockThicknessesMm } from './stock-thicknesses';
import { TEMPLATE_KINDS } from './template-kinds';
import { parseThickness } from './thickness-input';
import { V_DIE_CHART, minimumFlangeMm, usualVOpeningMm } from './v-dies';

const material = (id: string) => {
  const found = findMaterial(id);
  if (found === null) throw new Error(`no material ${id}`);
  return found;
};
const stock = (materialId: string, thicknessMm: number, vOpeningMm: number | null = null): BendingStock => {
  const resolution: StockResolution = resolveStock({ materialId, thicknessMm, vOpeningMm });
  if (!resolution.ok) throw new Error(resolution.problem.message);
  return resolution.stock;
};

describe('gauges', () => {
  // Source: sheet-metal gauge tables of Machinery's Handbook. One number is four thicknesses.
  it.each([
    ['dc01', 0.0478],
    ['galv', 0.0516],
    ['ss304', 0.05],
    ['al5052h32', 0.0403],
  ])('18 ga of %s is %d in', (id, inches) => {
    const reading = parseThickness('18 ga', material(id));
    expect(reading.ok && reading.valueMm).toBeCloseTo(inches * 25.4, 9);
  });

  it('agrees with the formulas the tables come from', () => {
    for (const { gauge, nonFerrousIn, steelIn, galvanisedIn, stainlessIn } of GAUGE_TABLE) {
      // ASTM B258: 0.005 * 92^((36 - n) / 39) in.
      expect(nonFerrousIn).toBeCloseTo(0.005 * 92 ** ((36 - gauge) / 39), 3);
      // Stainless counts lb/ft² over 40, carbon steel over 41.82, of the same nominal weight.
      expect(steelIn).toBeCloseTo((stainlessIn * 40) / 41.82, 3);
      // Galvanised adds 2.5 oz/ft² of zinc.
      if (galvanisedIn !== null) expect(galvanisedIn).toBeCloseTo(steelIn + 2.5 / 16 / 41.82, 3);
    }
  });

  it('takes thicknesses by length too and refuses what has no gauge', () => {
    const steel = material('dc01');
    expect(parseThickness('0.0478 in', steel)).toMatchObject({ ok: true });
    expect(parseThickness('16 gauge', steel)).toMatchObject({ ok: true });
    expect(parseThickness('3 ga', steel)).toMatchObject({ ok: false });
    expect(parseThickness('18 ga', material('ti2'))).toMatchObject({ ok: false });
    expect(parseThickness('-1', steel)).toMatchObject({ ok: false });
    expect(gaugeThicknessMm(7, 'galvanised')).toBeNull();
  });
});

describe('fasteners', () => {
  // Source: ISO 273:1979, medium. The ASME metric normal series has 14, 16, 18 for the last three.
  it.each([
    ['M3', 3.4],
    ['M5', 5.5],
    ['M6', 6.6],
    ['M8', 9],
    ['M12', 13.5],
    ['M14', 15.5],
    ['M16', 17.5],
  ])('%s clears through %d mm', (thread, diameterMm) => {
    expect(holeDiameterMm({ kind: 'clearance', thread, fit: 'medium' })).toBe(diameterMm);
  });

  // Source: ISO 4017. DIN 933 had 17, 19, 22 and 32.
  it.each([
    ['M10', 16],
    ['M12', 18],
    ['M14', 21],
    ['M22', 34],
  ])('%s has a hex of %d mm', (thread, acrossFlatsMm) => {
    expect(findMetricFastener(thread)?.acrossFlatsMm).toBe(acrossFlatsMm);
  });

  it('orders every row as the standards do', () => {
    for (const { nominalMm, pitchMm, clearanceMm, tapDrillMm, rivetNutMm } of METRIC_FASTENERS) {
      expect(clearanceMm.close).toBeGreaterThan(nominalMm);
      expect(clearanceMm.medium).toBeGreaterThan(clearanceMm.close);
      expect(clearanceMm.coarse).toBeGreaterThan(clearanceMm.medium);
      // ISO 2306: nominal less pitch, rounded to a stock drill.
      expect(Math.abs(tapDrillMm - (nominalMm - pitchMm))).toBeLessThanOrEqual(0.06);
      if (rivetNutMm !== null) expect(rivetNutMm).toBeGreaterThan(nominalMm);
    }
  });

  it('sizes the other purposes', () => {
    expect(holeDiameterMm({ kind: 'tapped', thread: 'M6' })).toBe(5);
    expect(holeDiameterMm({ kind: 'rivet-nut', thread: 'M6' })).toBe(9);
    expect(holeDiameterMm({ kind: 'countersunk', thread: 'M5' })).toBe(5.5);
    expect(holeDiameterMm({ kind: 'pass-through', diameterMm: 52 })).toBe(52);
    // ASME B18.2.8 normal and the customary tap drill of Machinery's Handbook.
    expect(holeDiameterMm({ kind: 'clearance', thread: '1/4', fit: 'medium' })).toBeCloseTo(0.2812 * 25.4, 9);
    expect(holeDiameterMm({ kind: 'clearance', thread: '1/4-20', fit: 'medium' })).toBeCloseTo(0.2812 * 25.4, 9);
    expect(holeDiameterMm({ kind: 'tapped', thread: '1/4-20' })).toBeCloseTo(0.201 * 25.4, 9);
  });

  it('offers only threads it can size, and says when it cannot', () => {
    for (const kind of ['tapped', 'rivet-nut', 'countersunk'] as const) {
      for (const thread of threadsFor(kind)) expect(findHoleDiameterMm({ kind, thread })).toBeGreaterThan(0);
    }
    for (const thread of threadsFor('clearance')) {
      expect(findHoleDiameterMm({ kind: 'clearance', thread, fit: 'close' })).toBeGreaterThan(0);
    }
    expect(findHoleDiameterMm({ kind: 'rivet-nut', thread: 'M2' })).toBeNull();
    expect(() => holeDiameterMm({ kind: 'tapped', thread: 'M99' })).toThrow(RangeError);
  });
});

describe('materials and dies', () => {
  it('knows twelve materials with sane figures', () => {
    expect(SHEET_MATERIALS).toHaveLength(12);
    for (const { densityKgPerM3, ultimateMpa, yieldMpa, kBands, minimumRadius, id } of SHEET_MATERIALS) {
      expect(densityKgPerM3.value).toBeGreaterThan(2500);
      expect(ultimateMpa.value).toBeGreaterThan(yieldMpa?.value ?? 0);
      for (const { low, high } of [kBands.belowOne, kBands.oneToThree, kBands.aboveThree]) {
        expect(low).toBeLessThan(high);
        expect(high).toBeLessThanOrEqual(0.5);
      }
      const multiples = minimumRadius.rows.map(({ recommendedOverT }) => recommendedOverT);
      expect([...multiples].sort((a, b) => a - b)).toEqual(multiples);
      expect(stockThicknessesMm(id).length).toBeGreaterThan(0);
    }
  });

  it('weighs by density, not by the pounds a gauge was named for', () => {
    // 1 m² of 18 ga cold rolled: 1.21412 mm x 7850 = 9.53 kg; 2 lb/ft² of the gauge table would be 9.765 kg.
    const { thicknessMm, densityKgPerM3 } = stock('dc01', 0.0478 * 25.4);
    expect((thicknessMm / 1000) * densityKgPerM3).toBeCloseTo(9.531, 3);
  });

  it.each([
    [0.8, 6],
    [1, 8],
    [1.2, 10],
    [1.5, 12],
    [2, 16],
    [2.5, 20],
    [3, 25],
    [4, 32],
    [6, 50],
  ])('takes for %d mm the die V %d, nearest to 8 T', (thicknessMm, vOpeningMm) => {
    expect(usualVOpeningMm(thicknessMm)).toBe(vOpeningMm);
  });

  it('delivers a radius that follows the opening and the material, not the punch', () => {
    // Shares of V: low-carbon steel 16 %, 304 21 %, 5052 14 %.
    expect(stock('dc01', 1.5).deliveredRadiusMm).toBeCloseTo(0.16 * 12, 9);
    expect(stock('ss304', 1.5).deliveredRadiusMm).toBeCloseTo(0.21 * 12, 9);
    expect(stock('al5052h32', 3, 24).deliveredRadiusMm).toBeCloseTo(3.36, 9);
    // A die far too narrow creases the sheet; the radius stays at 0.63 T.
    expect(stock('dc01', 3, 6).deliveredRadiusMm).toBeCloseTo(0.63 * 3, 9);
  });

  it('bends no shorter flange than the chart, straight between its rows, more for an acute bend', () => {
    for (const { openingMm, minimumFlangeMm: flangeMm } of V_DIE_CHART) {
      expect(minimumFlangeMm(openingMm, 90)).toBeCloseTo(flangeMm, 9);
    }
    expect(minimumFlangeMm(24, 90)).toBeCloseTo(16.8, 9);
    expect(minimumFlangeMm(16, 120)).toBeCloseTo(11 * 1.6, 9);
    expect(minimumFlangeMm(16, 60)).toBeCloseTo(11 * 0.9, 9);
    expect(minimumFlangeMm(16, 105)).toBeCloseTo(11 * 1.3, 9);
  });

  it('takes K of steel from the standard, of aluminium from the handbook, of stainless from the band', () => {
    expect(stock('dc01', 1.5).kTable).toEqual([]);
    // Machinery's Handbook: 0.64 T + 1.57 R for aluminium is K = 0.64 / (π/2) = 0.4074.
    expect(stock('al5052h32', 3).kTable[0]?.kFactor).toBeCloseTo(0.4074, 4);
    const middles = stock('ss304', 1.5).kTable.map(({ kFactor }) => kFactor);
    [0.4, 0.445, 0.475].forEach((kFactor, index) => {
      expect(middles[index]).toBeCloseTo(kFactor, 9);
    });
    expect(stock('dc01', 1.5).kBands.map(({ ratioBelow }) => ratioBelow)).toEqual([1, 3, null]);
  });

  it.each([
    ['an unknown material', { materialId: 'unobtainium', thicknessMm: 1, vOpeningMm: null }],
    ['a sheet of no thickness', { materialId: 'dc01', thicknessMm: 0, vOpeningMm: null }],
    ['a thickness that is no number', { materialId: 'dc01', thicknessMm: Number.NaN, vOpeningMm: null }],
    ['a die that is shut', { materialId: 'dc01', thicknessMm: 1, vOpeningMm: 0 }],
  ])('says what is wrong with %s', (_, choice) => {
    const resolution = resolveStock(choice);
    expect(resolution.ok ? '' : resolution.problem.code).toBe('stockUnknown');
  });
});

describe('finishes and templates', () => {
  it('leaves a hole smaller after powder coat, by up to 0.24 on its diameter', () => {
    const cream = findFinish('powder-cream');
    expect(cream === null ? 0 : coatedHoleMm(8.4, cream)).toBeCloseTo(8.16, 9);
    expect(FINISHES.find(({ process }) => process === 'none')?.buildUpPerSideMm.high).toBe(0);
  });

  it('knows how thick templates usually are', () => {
    expect(TEMPLATE_KINDS.map(({ id, usualThicknessMm }) => [id, usualThicknessMm])).toEqual([
      ['card', 0.5],
      ['single-wall', 3],
      ['double-wall', 6],
      ['board', 2],
      ['mdf', 3],
      ['sheet-metal', null],
    ]);
  });
});
