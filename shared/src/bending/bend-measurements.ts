import type { LengthReference } from './layout';

/** Strips of one material, thickness, die, angle and reference taken together. Lengths mm. */
export interface StripSeries {
  readonly materialId: string;
  readonly thicknessMm: number;
  readonly vOpeningMm: number;
  readonly bendAngleDeg: number;
  readonly reference: LengthReference;
  /** Mean of what was delivered. */
  readonly insideRadiusMm: number;
  readonly count: number;
  /** Mean deduction to `reference` in this die: what is kept. */
  readonly deductionMm: number;
  /** Standard deviation of one strip's deduction (n - 1); null for a single strip. */
  readonly deductionDeviationMm: number | null;
  /** K of the mean deduction at the mean radius. */
  readonly kFactor: number;
  readonly kDeviation: number | null;
  /** Within which K of the next bend is to be expected, 19 times of 20. */
  readonly kHalfWidth: number;
  readonly warnings: readonly string[];
}

/** A deduction that the bender of this part measured and stands by. Lengths mm. */
export interface BenderDeduction {
  readonly benderName: string;
  readonly materialId: string;
  readonly thicknessMm: number;
  readonly vOpeningMm: number;
  readonly bendAngleDeg: number;
  /** What this die delivers. */
  readonly insideRadiusMm: number;
  readonly deductionMm: number;
  readonly reference: LengthReference;
  /** How many bends it was taken from. */
  readonly count: number;
  /** Half-width of the deduction, mm, 19 times of 20; null when the bender states none. */
  readonly halfWidthMm: number | null;
}

/** What was measured for a sheet, on other brakes than the tables'. */
export interface BendMeasurements {
  /** Of the one bender who makes the part. */
  readonly benderDeductions: readonly BenderDeduction[];
  readonly stripSeries: readonly StripSeries[];
}
