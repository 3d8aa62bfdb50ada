import { formatDecimal } from './length';

/** Mass as a shop says it: grams below a kilogram, kilograms above. `massKg` in kg. */
export function formatMass(massKg: number): string {
  if (!Number.isFinite(massKg)) throw new RangeError(`formatMass: massKg is ${massKg}`);
  // 0.9995 kg would read "1000 g"; it is shown in kilograms instead.
  return Math.abs(massKg) < 0.9995 ? `${formatDecimal(massKg * 1000, 0)} g` : `${formatDecimal(massKg, 2)} kg`;
}

/** A share as a percentage with at most one decimal: 0.125 is "12.5 %". */
export function formatPercent(share: number): string {
  if (!Number.isFinite(share)) throw new RangeError(`formatPercent: share is ${share}`);
  return `${formatDecimal(share * 100, 1)} %`;
}

/** An angle with at most two decimals: 75 is "75°". */
export function formatAngle(angleDeg: number): string {
  if (!Number.isFinite(angleDeg)) throw new RangeError(`formatAngle: angleDeg is ${angleDeg}`);
  return `${formatDecimal(angleDeg, 2)}°`;
}
