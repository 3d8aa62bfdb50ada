import { LARGEST_K, isPossibleK } from './allowance';
import type { StripSeries } from './bend-measurements';
import { readStrip, WORKSHOP_ERRORS } from './bend-test-strip';
import type { BendTestStrip, MeasuringErrors, StripReading } from './bend-test-strip';

/** Series from strips, and strips that say nothing, each with the reason. */
export interface FittedStrips {
  readonly series: readonly StripSeries[];
  readonly refused: readonly { readonly stripId: string; readonly message: string }[];
}

/**
 * Two-sided 95 % quantiles of Student's t for 2, 3, ... degrees of freedom; from 30 on the last serves, a little on the wide
 * side. Source: tables of Student's t distribution.
 */
const STUDENT_95 = [
  4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145, 2.131, 2.12, 2.11, 2.101,
  2.093, 2.086, 2.08, 2.074, 2.069, 2.064, 2.06, 2.056, 2.052, 2.048, 2.045, 2.042,
] as const;

/** From so many strips on their own spread is taken at its word. */
const ENOUGH_STRIPS = 3;

/**
 * Fits bend test strips: strips alike in material, thickness, die, angle and reference make a series with n, mean and standard
 * deviation of the deduction, and K derived from it. K of one strip is linear in its deduction and radius, so K of the means is
 * the mean of the K.
 * The half-width of K is Student's prediction interval for the next bend from three strips on, never less than what the length
 * error alone can do; for fewer strips it is the measuring error of length and radius.
 * @param errors half-widths of the readings
 */
export function fitStrips(strips: readonly BendTestStrip[], errors: MeasuringErrors = WORKSHOP_ERRORS): FittedStrips {
  const refused: { readonly stripId: string; readonly message: string }[] = [];
  const groups = new Map<string, StripReading[]>();
  for (const strip of strips) {
    const result = readStrip(strip, errors);
    if (!result.ok) {
      refused.push({ stripId: strip.id, message: result.message });
      continue;
    }
    const { materialId, thicknessMm, vOpeningMm, bendAngleDeg, reference } = strip;
    const key = [materialId, thicknessMm, vOpeningMm, bendAngleDeg, reference].join('|');
    groups.set(key, [...(groups.get(key) ?? []), result.reading]);
  }
  return { series: [...groups.values()].map((readings) => seriesOf(readings, errors)), refused };
}

function seriesOf(readings: readonly StripReading[], errors: MeasuringErrors): StripSeries {
  const first = readings[0];
  if (first === undefined) throw new RangeError('A series needs a strip');
  const { materialId, thicknessMm, vOpeningMm, bendAngleDeg, reference } = first.strip;
  const radii = readings.map(({ strip }) => strip.insideRadiusMm);
  const deductions = readings.map(({ deductionMm }) => deductionMm);
  const factors = readings.map(({ kFactor }) => kFactor);
  const count = readings.length;
  const kFactor = meanOf(factors);
  const kDeviation = deviationOf(factors);
  const largest = (of: (reading: StripReading) => number): number => Math.max(...readings.map(of));
  const lengthShift = largest(({ shifts }) => shifts.length);
  const radiusShift = largest(({ shifts }) => shifts.radius);
  return {
    materialId,
    thicknessMm,
    vOpeningMm,
    bendAngleDeg,
    reference,
    insideRadiusMm: meanOf(radii),
    count,
    deductionMm: meanOf(deductions),
    deductionDeviationMm: deviationOf(deductions),
    kFactor,
    kDeviation,
    kHalfWidth: Math.min(LARGEST_K, halfWidthOf(count, kDeviation, lengthShift, radiusShift)),
    warnings: [
      ...(isPossibleK(kFactor) ? [] : [`K comes out at ${kFactor.toFixed(3)} on average, which no sheet has.`]),
      ...(count < ENOUGH_STRIPS ? ['Fewer than three strips say little about their spread; bend another.'] : []),
      ...(Math.max(...radii) - Math.min(...radii) > errors.radiusMm
        ? ['The radii of these strips differ by more than a gauge can misread; was it the same die?']
        : []),
      ...new Set(readings.flatMap(({ warnings }) => warnings)),
    ],
  };
}

function halfWidthOf(count: number, deviation: number | null, lengthShift: number, radiusShift: number): number {
  if (count < ENOUGH_STRIPS || deviation === null) return Math.hypot(lengthShift, radiusShift);
  const student = STUDENT_95[count - ENOUGH_STRIPS] ?? STUDENT_95.at(-1) ?? Infinity;
  return Math.max(student * deviation * Math.sqrt(1 + 1 / count), lengthShift);
}

function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Standard deviation of a sample (n - 1); null for a single value, which has none. */
function deviationOf(values: readonly number[]): number | null {
  if (values.length < 2) return null;
  const mean = meanOf(values);
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1));
}
