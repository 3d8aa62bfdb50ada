import type { BendGeometry } from './allowance';

/** Below this R/T the standard's formula for k falls towards 0 (it turns negative near 0.05), so it is not used there. */
export const SMALLEST_DIN_RATIO = 0.1;

/** The standard's name as it goes onto documents. */
export const DIN_6935 = 'DIN 6935, cold bending of flat rolled steel';

/**
 * Correction factor k of DIN 6935 for a ratio of inside radius to thickness: 0.65 + 0.5 * log10(R/T) up to 5, 1 above.
 * It multiplies half the thickness, so the K-factor is half of it.
 * Source: DIN 6935.
 * @returns null below R/T 0.1, where the formula does not hold.
 */
export function dinCorrection(radiusOverThickness: number): number | null {
  if (!(radiusOverThickness >= SMALLEST_DIN_RATIO)) return null;
  return radiusOverThickness > 5 ? 1 : 0.65 + 0.5 * Math.log10(radiusOverThickness);
}

/** K-factor after DIN 6935, for steel only; null below R/T 0.1. */
export function dinKFactor(radiusOverThickness: number): number | null {
  const correction = dinCorrection(radiusOverThickness);
  return correction === null ? null : correction / 2;
}

/**
 * Length v that DIN 6935 adds to the two legs, mm, mostly negative: flat = a + b + v.
 * The standard counts the opening angle 180 - A. Its legs run to the tangent planes for bends of 90 degrees and more and to the
 * outside apex below; v jumps to 0 for bends under 15 degrees, as the standard says, whatever is lost by it.
 * Source: DIN 6935.
 * @returns null below R/T 0.1.
 */
export function dinLengthChangeMm(bend: BendGeometry): number | null {
  const correction = dinCorrection(bend.insideRadiusMm / bend.thicknessMm);
  if (correction === null) return null;
  const openingAngleDeg = 180 - bend.bendAngleDeg;
  if (openingAngleDeg > 165) return 0;
  const turnedRad = (bend.bendAngleDeg * Math.PI) / 180;
  const arcMm = turnedRad * (bend.insideRadiusMm + (bend.thicknessMm / 2) * correction);
  const outsideMm = bend.insideRadiusMm + bend.thicknessMm;
  return openingAngleDeg <= 90 ? arcMm - 2 * outsideMm : arcMm - 2 * outsideMm * Math.tan(turnedRad / 2);
}

/** Developed length of a strip after DIN 6935, mm, legs as the standard measures them; null below R/T 0.1 at any bend. */
export function dinFlatLengthMm(legsMm: readonly number[], bends: readonly BendGeometry[]): number | null {
  let flatMm = legsMm.reduce((sum, leg) => sum + leg, 0);
  for (const bend of bends) {
    const change = dinLengthChangeMm(bend);
    if (change === null) return null;
    flatMm += change;
  }
  return flatMm;
}
