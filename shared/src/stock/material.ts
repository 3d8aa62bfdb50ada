import type { Figure, TableSource } from './figure';

export type MetalFamily = 'steel' | 'stainless' | 'aluminium' | 'copper' | 'brass' | 'other';

/** Gauge numbers mean a different thickness in each of these; titanium is bought by decimals only. */
export type GaugeFamily = 'steel' | 'galvanised' | 'stainless' | 'non-ferrous';

/** Band of K for air bends over one range of R/T. */
export interface KBand {
  readonly low: number;
  readonly high: number;
}

/** The trade's bands of K by R/T: below 1, from 1 to 3, above 3. */
export interface KBands extends TableSource {
  readonly belowOne: KBand;
  readonly oneToThree: KBand;
  readonly aboveThree: KBand;
}

/** K of one material by handbook, at any R/T. */
export interface HandbookK extends TableSource {
  readonly kFactor: number;
}

/**
 * Smallest inside radius of a 90° cold bend across the grain.
 * `multiple`: one multiple of T for all thicknesses. `byThickness`: rows of an upper thickness and the multiple there.
 * `absoluteOverT`: below it the sheet is expected to crack; null = the source gives no second limit.
 * `refuseBelow`: whether a bend below the recommended radius counts as one that cannot be made (tempers that crack).
 */
export interface MinimumRadius extends TableSource {
  readonly rows: readonly { readonly upToThicknessMm: number; readonly recommendedOverT: number }[];
  readonly absoluteOverT: number | null;
  readonly refuseBelow: boolean;
}

/** A sheet material as the tables know it. Strengths are those of the sheet as delivered. */
export interface SheetMaterial {
  readonly id: string;
  readonly name: string;
  /** As a person would say it on a drawing's margin. */
  readonly shortName: string;
  readonly family: MetalFamily;
  readonly gaugeFamily: GaugeFamily | null;
  readonly densityKgPerM3: Figure;
  readonly elasticModulusGpa: Figure;
  /** Lower limit (or usual value) of the yield strength; null where the standard states none. */
  readonly yieldMpa: Figure | null;
  /** Highest tensile strength to expect, because bending force is sized against the highest. */
  readonly ultimateMpa: Figure;
  readonly minimumRadius: MinimumRadius;
  readonly kBands: KBands;
  readonly handbookK: HandbookK | null;
  /** Inside radius an air bend delivers, as a share of the V opening (0.16 = 16 %). */
  readonly deliveredRadiusShare: Figure;
  /**
   * What K is taken from when nobody measured it: `din6935` (written for flat rolled steel), the handbook's figure, or
   * the middle of the trade's band where neither names the metal.
   */
  readonly kFrom: 'din6935' | 'handbook' | 'band';
  readonly note: string;
}
