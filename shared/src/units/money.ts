/** An amount of money: integer minor units (cents, pence) and an ISO 4217 code. */
export interface Money {
  readonly amountMinor: number;
  readonly currency: string;
}

/**
 * Number of minor digits of a currency: 2 for EUR and USD, 0 for JPY, 3 for BHD.
 * Source: ISO 4217, as the platform's Intl data carries it.
 * @throws RangeError when the code is not three letters
 */
export function minorDigits(currency: string): number {
  return new Intl.NumberFormat('en', { style: 'currency', currency }).resolvedOptions().maximumFractionDigits ?? 2;
}

/**
 * Money in words of a locale, for example "€ 16.20" or "$1,204.00".
 * @throws RangeError when the amount is not a whole number of minor units
 */
export function formatMoney(money: Money, locale = 'en-IE'): string {
  assertMinor(money.amountMinor);
  const digits = minorDigits(money.currency);
  return new Intl.NumberFormat(locale, { style: 'currency', currency: money.currency }).format(
    money.amountMinor / 10 ** digits,
  );
}

/**
 * What somebody typed as an amount, in minor units: "148", "148.5", "148,50", "1 204.00"; null when it is none, or has
 * more digits than the currency.
 */
export function parseMoneyMinor(typed: string, currency: string): number | null {
  const digits = minorDigits(currency);
  const found = /^(\d{1,3}(?:[ \u00a0']?\d{3})*|\d+)(?:[.,](\d+))?$/.exec(typed.trim());
  if (found === null) return null;
  const [, whole = '', part = ''] = found;
  if (part.length > digits) return null;
  const minor = Number(whole.replace(/\D/g, '') + part.padEnd(digits, '0'));
  return Number.isSafeInteger(minor) ? minor : null;
}

/** An amount as somebody would type it: "148.00". */
export function typedMoney(money: Money): string {
  const digits = minorDigits(money.currency);
  return (money.amountMinor / 10 ** digits).toFixed(digits);
}

/**
 * Sum of two amounts of one currency.
 * @throws RangeError when the currencies differ
 */
export function addMoney(a: Money, b: Money): Money {
  if (a.currency !== b.currency) throw new RangeError(`cannot add ${b.currency} to ${a.currency}`);
  return { amountMinor: a.amountMinor + b.amountMinor, currency: a.currency };
}

/**
 * Share of an amount, rounded half away from zero to whole minor units, so that a credit mirrors its invoice.
 * The product is formed in integers (basis points), because 1.15 * 100 is not 115 in binary.
 * @param amountMinor whole minor units
 * @param basisPoints hundredths of a percent: 2300 is 23 %
 * @throws RangeError when either is not a whole number
 */
export function shareMinor(amountMinor: number, basisPoints: number): number {
  assertMinor(amountMinor);
  if (!Number.isInteger(basisPoints)) throw new RangeError(`basis points must be whole: ${basisPoints}`);
  const product = amountMinor * basisPoints;
  const magnitude = Math.floor((Math.abs(product) + 5000) / 10000);
  // No -0: it would not equal 0 where rows are compared.
  return product < 0 && magnitude > 0 ? -magnitude : magnitude;
}

/**
 * Guards money arithmetic against fractions of a minor unit.
 * @throws RangeError when the value is not a safe integer
 */
export function assertMinor(amountMinor: number): void {
  if (!Number.isSafeInteger(amountMinor)) throw new RangeError(`not a whole number of minor units: ${amountMinor}`);
}
