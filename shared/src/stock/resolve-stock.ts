import type { TableConfidence } from './figure';
import type { KBand, MetalFamily, SheetMaterial } from './material';
import { findMaterial } from './materials';
import { SHARPEST_RADIUS_OVER_T, usualVOpeningMm } from './v-dies';

/** What a person chose: the shape of a part document's stock, as far as tooling depends on it. */
export interface SheetChoice {
  readonly materialId: string;
  readonly thicknessMm: number;
  /** Null = the usual die for the thickness. */
  readonly vOpeningMm: number | null;
}

/** Sheet and tooling a development is computed for. Fits `BendingStock` of the bending folder. */
export interface ResolvedStock {
  readonly materialId: string;
  readonly materialName: string;
  readonly family: MetalFamily;
  readonly thicknessMm: number;
  readonly densityKgPerM3: number;
  readonly deliveredRadiusMm: number;
  readonly vOpeningMm: number;
  readonly ultimateStrengthMpa: number;
  readonly kBands: readonly KBandRow[];
  readonly kTable: readonly KRow[];
}

/** Band of K below a ratio R/T; null = for every larger one. */
export interface KBandRow {
  readonly ratioBelow: number | null;
  readonly low: number;
  readonly high: number;
  readonly source: string;
  readonly confidence: TableConfidence;
}

/** K of the material itself from one ratio R/T up to another; null = no upper end. */
export interface KRow {
  readonly ratioFrom: number;
  readonly ratioTo: number | null;
  readonly kFactor: number;
  readonly source: string;
  readonly confidence: TableConfidence;
}

export type StockResolution =
  | { readonly ok: true; readonly stock: ResolvedStock }
  | {
      readonly ok: false;
      readonly problem: { readonly code: 'stockUnknown'; readonly message: string; readonly ids: readonly string[] };
    };

/**
 * Fills a choice of sheet from the tables: density, strength, die (the chart's nearest to 8 T unless one is named) and
 * the inside radius an air bend in that die delivers.
 * The radius follows the opening and the material and not the punch's nose, as long as the nose is smaller; it never
 * falls below 0.63 T, where a bend turns into a crease. Source: the trade's share-of-V rule, common practice.
 * @param choice material id, thickness and opening in mm
 * @returns the stock, or why there is none (unknown material, a thickness or opening that is not above 0)
 */
export function resolveStock(choice: SheetChoice): StockResolution {
  const material = findMaterial(choice.materialId);
  if (material === null)
    return unknown(`There is no material “${choice.materialId}” in the tables.`, choice.materialId);
  const thicknessMm = choice.thicknessMm;
  if (!Number.isFinite(thicknessMm) || thicknessMm <= 0) {
    return unknown(`A sheet of ${thicknessMm} mm cannot be bent; give its thickness in mm.`, choice.materialId);
  }
  const vOpeningMm = choice.vOpeningMm ?? usualVOpeningMm(thicknessMm);
  if (!Number.isFinite(vOpeningMm) || vOpeningMm <= 0) {
    return unknown(`A die opening of ${vOpeningMm} mm does not exist.`, choice.materialId);
  }
  return {
    ok: true,
    stock: {
      materialId: material.id,
      materialName: material.name,
      family: material.family,
      thicknessMm,
      densityKgPerM3: material.densityKgPerM3.value,
      deliveredRadiusMm: Math.max(
        material.deliveredRadiusShare.value * vOpeningMm,
        SHARPEST_RADIUS_OVER_T * thicknessMm,
      ),
      vOpeningMm,
      ultimateStrengthMpa: material.ultimateMpa.value,
      kBands: kBandRows(material),
      kTable: kRows(material),
    },
  };
}

function kBandRows(material: SheetMaterial): readonly KBandRow[] {
  const { belowOne, oneToThree, aboveThree, source, confidence } = material.kBands;
  return [
    { ratioBelow: 1, ...belowOne, source, confidence },
    { ratioBelow: 3, ...oneToThree, source, confidence },
    { ratioBelow: null, ...aboveThree, source, confidence },
  ];
}

/** Empty for steel, so that the standard written for it serves. */
function kRows(material: SheetMaterial): readonly KRow[] {
  if (material.kFrom === 'din6935') return [];
  if (material.kFrom === 'handbook' && material.handbookK !== null) {
    return [{ ratioFrom: 0, ratioTo: null, ...material.handbookK }];
  }
  const { belowOne, oneToThree, aboveThree, confidence } = material.kBands;
  const middle = (band: KBand) => (band.low + band.high) / 2;
  const source = 'middle of the band the trade uses for air bends, no source';
  return [
    { ratioFrom: 0, ratioTo: 1, kFactor: middle(belowOne), source, confidence },
    { ratioFrom: 1, ratioTo: 3, kFactor: middle(oneToThree), source, confidence },
    { ratioFrom: 3, ratioTo: null, kFactor: middle(aboveThree), source, confidence },
  ];
}

function unknown(message: string, materialId: string): StockResolution {
  return { ok: false, problem: { code: 'stockUnknown', message, ids: [materialId] } };
}
