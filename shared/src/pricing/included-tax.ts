import { assertMinor } from '../units/money';

/**
 * Tax that is contained in an amount, rounded half away from zero to whole minor units: of 11900 at 19 % it is 1900.
 * Formed in integers, so that no fraction of a binary number tips a cent.
 * @param grossMinor amount with tax, whole minor units
 * @param basisPoints rate in hundredths of a percent: 1900 is 19 %
 * @throws RangeError when either is not a whole number, or the rate is below zero
 */
export function includedTaxMinor(grossMinor: number, basisPoints: number): number {
  assertMinor(grossMinor);
  if (!Number.isInteger(basisPoints) || basisPoints < 0) throw new RangeError(`basis points: ${basisPoints}`);
  return partMinor(grossMinor, basisPoints, 10_000 + basisPoints);
}

/**
 * `amount · share / whole` rounded half away from zero to whole minor units.
 * @throws RangeError when the product leaves the safe integers, or the whole is not above zero
 */
export function partMinor(amountMinor: number, share: number, whole: number): number {
  if (!Number.isInteger(whole) || whole <= 0) throw new RangeError(`a part of ${whole}`);
  const product = amountMinor * share;
  assertMinor(product);
  const magnitude = Math.floor((2 * Math.abs(product) + whole) / (2 * whole));
  return product < 0 && magnitude > 0 ? -magnitude : magnitude;
}
