import { type Money, assertMinor, shareMinor } from '../units/money';

/** One line of a price: so many of something at a price each, taxed at a rate. Amounts net, in minor units. */
export interface PriceLine {
  readonly label: string;
  readonly quantity: number;
  readonly unitMinor: number;
  /** Tax rate in hundredths of a percent: 2300 is 23 %. */
  readonly taxBasisPoints: number;
}

/** A line worked out: net, tax rounded once for the line, gross. */
export interface PricedLine extends PriceLine {
  readonly netMinor: number;
  readonly taxMinor: number;
  readonly grossMinor: number;
}

/** A price broken down. Totals are sums of the lines, so what is printed adds up. */
export interface PriceBreakdown {
  readonly currency: string;
  readonly lines: readonly PricedLine[];
  readonly netMinor: number;
  readonly taxMinor: number;
  readonly grossMinor: number;
}

/**
 * Works a price out. Tax is rounded once per line, half away from zero, and never again.
 * @param currency ISO 4217 code
 * @throws RangeError for a quantity that is no whole number of 0 or more, or an amount that is no whole minor unit
 */
export function priceLines(currency: string, lines: readonly PriceLine[]): PriceBreakdown {
  const priced = lines.map((line): PricedLine => {
    assertMinor(line.unitMinor);
    if (!Number.isInteger(line.quantity) || line.quantity < 0) {
      throw new RangeError(`quantity of “${line.label}” is ${line.quantity}`);
    }
    const netMinor = line.quantity * line.unitMinor;
    assertMinor(netMinor);
    const taxMinor = shareMinor(netMinor, line.taxBasisPoints);
    return { ...line, netMinor, taxMinor, grossMinor: netMinor + taxMinor };
  });
  const sum = (amount: (line: PricedLine) => number) => priced.reduce((total, line) => total + amount(line), 0);
  return {
    currency,
    lines: priced,
    netMinor: sum((line) => line.netMinor),
    taxMinor: sum((line) => line.taxMinor),
    grossMinor: sum((line) => line.grossMinor),
  };
}

/** One row of a quote: so many off for so much. */
export interface QuantityBreak {
  readonly quantity: number;
  readonly total: Money;
}

/**
 * Price of one at a quantity, for show only: rounded up to a whole minor unit, so that the shown price times the quantity
 * never falls short of the total.
 * @throws RangeError when the quantity is not a whole number above 0
 */
export function eachMinor({ quantity, total }: QuantityBreak): number {
  if (!Number.isInteger(quantity) || quantity < 1) throw new RangeError(`quantity is ${quantity}`);
  assertMinor(total.amountMinor);
  return Math.ceil(total.amountMinor / quantity);
}

/**
 * What one costs less than at the smallest quantity, in whole percent, rounded down; 0 for the smallest itself.
 * @param breaks rows of one quote in one currency, any order
 */
export function savingPercent(breaks: readonly QuantityBreak[], at: QuantityBreak): number {
  const smallest = breaks.reduce((least, row) => (row.quantity < least.quantity ? row : least), at);
  if (smallest.total.currency !== at.total.currency) throw new RangeError('a quote has one currency');
  // In whole minor units over both quantities, so that no fraction of a cent tips the percentage.
  const full = smallest.total.amountMinor * at.quantity;
  if (full <= 0) return 0;
  const paid = at.total.amountMinor * smallest.quantity;
  return Math.max(0, Math.floor(((full - paid) * 100) / full));
}

/** Sum of the amounts of a price given in lines. @throws RangeError when the currencies differ or there is no line */
export function sumOfLines(lines: readonly { readonly amount: Money }[]): Money {
  const [first, ...rest] = lines;
  if (first === undefined) throw new RangeError('a price has at least one line');
  return rest.reduce((total, { amount }) => {
    if (amount.currency !== total.currency) throw new RangeError(`${amount.currency} in a price in ${total.currency}`);
    return { currency: total.currency, amountMinor: total.amountMinor + amount.amountMinor };
  }, first.amount);
}
