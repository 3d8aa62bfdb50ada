import type { TableSource } from './figure';

/** Width of the cut a fibre laser leaves, mm: nitrogen at the low end, oxygen at the high one. */
export interface KerfRow {
  readonly thicknessMm: number;
  readonly lowMm: number;
  readonly highMm: number;
}

export const KERF_SOURCE: TableSource = {
  source: 'typical fibre laser values, no source',
  confidence: 'common-practice',
};

export const LASER_KERF: readonly KerfRow[] = [
  { thicknessMm: 1, lowMm: 0.1, highMm: 0.15 },
  { thicknessMm: 2, lowMm: 0.12, highMm: 0.18 },
  { thicknessMm: 3, lowMm: 0.15, highMm: 0.22 },
  { thicknessMm: 4, lowMm: 0.18, highMm: 0.25 },
  { thicknessMm: 6, lowMm: 0.2, highMm: 0.3 },
  { thicknessMm: 8, lowMm: 0.25, highMm: 0.35 },
  { thicknessMm: 10, lowMm: 0.28, highMm: 0.4 },
  { thicknessMm: 12, lowMm: 0.3, highMm: 0.45 },
  { thicknessMm: 15, lowMm: 0.35, highMm: 0.5 },
  { thicknessMm: 20, lowMm: 0.4, highMm: 0.6 },
];

/**
 * Widest cut to expect in a sheet, mm: that of the first row at least as thick, of the last row beyond.
 * @param thicknessMm sheet thickness, mm, above 0
 */
export function widestKerfMm(thicknessMm: number): number {
  const row = LASER_KERF.find((one) => thicknessMm <= one.thicknessMm) ?? LASER_KERF[LASER_KERF.length - 1];
  if (row === undefined) throw new RangeError('the table of cuts is empty');
  return row.highMm;
}
