/** Largest constant in use for bending in a V die, from trade charts in tons per foot (575 T2/V at 60 ksi). Common practice, no source. */
const CHART_CONSTANT = 1.6;

/** What a bend asks of the brake. */
export interface BendForceInput {
  readonly ultimateStrengthMpa: number;
  readonly bendLengthMm: number;
  readonly thicknessMm: number;
  readonly vOpeningMm: number;
}

/**
 * Force to air-bend in a V die, kN: C * UTS * length * T2 / V. The constant C runs from 1.0 to 1.6 by source and, after
 * Oehler, 1 + 4 T / V, which is more in narrow dies; the highest of them is taken, so that the brake is not planned too small.
 * Coining or bottoming takes several times as much.
 * Source: M. P. Groover, Fundamentals of Modern Manufacturing (form of the formula, C = 1.33); G. Oehler as given in the
 * Schuler Metal Forming Handbook (1 + 4 T / V); trade charts (1.6).
 */
export function bendForceKn(input: BendForceInput): number {
  const constant = Math.max(CHART_CONSTANT, 1 + (4 * input.thicknessMm) / input.vOpeningMm);
  return (constant * input.ultimateStrengthMpa * input.bendLengthMm * input.thicknessMm ** 2) / input.vOpeningMm / 1000;
}
