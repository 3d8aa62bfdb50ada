import type { TableSource } from './figure';

/** One V-die of the chart: opening, shortest outside flange at 90°, radius it leaves in mild steel. All mm. */
export interface VDieRow {
  readonly openingMm: number;
  readonly minimumFlangeMm: number;
  readonly steelRadiusMm: number;
}

/** The air-bending chart printed on press brakes and in textbooks. */
export const V_DIE_CHART: readonly VDieRow[] = [
  { openingMm: 6, minimumFlangeMm: 4, steelRadiusMm: 1 },
  { openingMm: 8, minimumFlangeMm: 5.5, steelRadiusMm: 1.3 },
  { openingMm: 10, minimumFlangeMm: 7, steelRadiusMm: 1.6 },
  { openingMm: 12, minimumFlangeMm: 8.5, steelRadiusMm: 2 },
  { openingMm: 16, minimumFlangeMm: 11, steelRadiusMm: 2.6 },
  { openingMm: 20, minimumFlangeMm: 14, steelRadiusMm: 3.3 },
  { openingMm: 25, minimumFlangeMm: 17.5, steelRadiusMm: 4 },
  { openingMm: 32, minimumFlangeMm: 22, steelRadiusMm: 5 },
  { openingMm: 40, minimumFlangeMm: 28, steelRadiusMm: 6.5 },
  { openingMm: 50, minimumFlangeMm: 35, steelRadiusMm: 8 },
  { openingMm: 63, minimumFlangeMm: 45, steelRadiusMm: 10 },
  { openingMm: 80, minimumFlangeMm: 55, steelRadiusMm: 13 },
  { openingMm: 100, minimumFlangeMm: 71, steelRadiusMm: 16 },
];

export const V_DIE_SOURCE: TableSource = {
  source: 'air-bending chart as printed on press brakes',
  confidence: 'common-practice',
};

/** V opening over thickness that shops start from; the usual range is 6 to 12. */
export const V_OVER_T = 8;

/** Below this share of T an inside radius is a crease: the sheet does not follow a sharper punch. */
export const SHARPEST_RADIUS_OVER_T = 0.63;

const ANGLE_FACTOR_ROWS: readonly { readonly includedAngleDeg: number; readonly factor: number }[] = [
  { includedAngleDeg: 30, factor: 2.3 },
  { includedAngleDeg: 60, factor: 1.6 },
  { includedAngleDeg: 90, factor: 1 },
  { includedAngleDeg: 120, factor: 0.9 },
  { includedAngleDeg: 135, factor: 0.8 },
];

export const ANGLE_FACTOR_SOURCE: TableSource = { source: 'flange factors of trade charts', confidence: 'memory' };

/**
 * Opening a shop would take for a thickness when nobody named one: the die of the chart nearest to 8 T by ratio,
 * the wider one on a tie.
 * @param thicknessMm sheet thickness, mm, above 0
 * @returns V opening, mm
 */
export function usualVOpeningMm(thicknessMm: number): number {
  const wanted = V_OVER_T * thicknessMm;
  let best = V_DIE_CHART[0]?.openingMm ?? wanted;
  for (const { openingMm } of V_DIE_CHART) {
    if (Math.abs(Math.log(openingMm / wanted)) <= Math.abs(Math.log(best / wanted))) best = openingMm;
  }
  return best;
}

/**
 * Shortest outside flange a die can bend, mm.
 * Straight between the rows of the chart (and by proportion outside it), times the factor of the included angle,
 * straight between its rows and held at its ends.
 * @param vOpeningMm die opening, mm
 * @param bendAngleDeg rotation away from flat, degrees
 */
export function minimumFlangeMm(vOpeningMm: number, bendAngleDeg: number): number {
  return squareFlangeMm(vOpeningMm) * flangeAngleFactor(180 - bendAngleDeg);
}

function squareFlangeMm(vOpeningMm: number): number {
  const first = V_DIE_CHART[0];
  const last = V_DIE_CHART[V_DIE_CHART.length - 1];
  if (first === undefined || last === undefined) throw new RangeError('the die chart is empty');
  if (vOpeningMm <= first.openingMm) return (first.minimumFlangeMm / first.openingMm) * vOpeningMm;
  if (vOpeningMm >= last.openingMm) return (last.minimumFlangeMm / last.openingMm) * vOpeningMm;
  return between(
    V_DIE_CHART,
    vOpeningMm,
    (row) => row.openingMm,
    (row) => row.minimumFlangeMm,
  );
}

function flangeAngleFactor(includedAngleDeg: number): number {
  const held = Math.min(135, Math.max(30, includedAngleDeg));
  return between(
    ANGLE_FACTOR_ROWS,
    held,
    (row) => row.includedAngleDeg,
    (row) => row.factor,
  );
}

/** Straight interpolation in a table whose keys rise. `at` lies inside the table. */
function between<Row>(
  rows: readonly Row[],
  at: number,
  key: (row: Row) => number,
  value: (row: Row) => number,
): number {
  for (let index = 1; index < rows.length; index += 1) {
    const low = rows[index - 1];
    const high = rows[index];
    if (low === undefined || high === undefined || at > key(high)) continue;
    const share = (at - key(low)) / (key(high) - key(low));
    return value(low) + share * (value(high) - value(low));
  }
  throw new RangeError(`${at} lies outside the table`);
}
