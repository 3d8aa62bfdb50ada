import { createHash } from 'node:crypto';
import type { CartLine, Offer } from '@foldwright/shared/contracts/storefront';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import { includedTaxMinor } from '@foldwright/shared/pricing/included-tax';
import type { Shop } from '../../models/shop';

type OfferLine = Offer['lines'][number];

/** A line before it is summed up: everything the buyer sees of it but the sums. */
export type PricedLine = Omit<OfferLine, 'each' | 'total' | 'tax'> & { readonly eachMinor: number };

type Terms = Pick<Shop, 'currency' | 'taxName' | 'taxBasisPoints' | 'postageMinor'>;

/** Lines of one thing in one finish count as one, where the first of them stands. */
export function joinCart(cart: readonly CartLine[]): readonly CartLine[] {
  const joined = new Map<string, CartLine>();
  for (const line of cart) {
    const key = `${line.listingId} ${line.finishId}`;
    joined.set(key, { ...line, quantity: (joined.get(key)?.quantity ?? 0) + line.quantity });
  }
  return [...joined.values()];
}

/**
 * An offer from its priced lines: tax of each line and of the postage rounded once, and a hash of all that the buyer sees.
 * Postage is paid once for an order, and not for one with nothing in it.
 */
export function sumOffer(terms: Terms, priced: readonly PricedLine[], gone: Offer['gone']): Offer {
  const { currency, taxName, taxBasisPoints } = terms;
  const money = (amountMinor: number) => ({ amountMinor, currency });
  const taxIn = (amountMinor: number) => includedTaxMinor(amountMinor, taxBasisPoints);
  const lines = priced.map(({ eachMinor, ...line }): OfferLine => {
    const totalMinor = eachMinor * line.quantity;
    return { ...line, each: money(eachMinor), total: money(totalMinor), tax: money(taxIn(totalMinor)) };
  });
  const sum = (amountOf: (line: OfferLine) => number) => lines.reduce((total, line) => total + amountOf(line), 0);
  const itemsMinor = sum(({ total }) => total.amountMinor);
  const postageMinor = lines.length === 0 ? 0 : terms.postageMinor;
  const seen = {
    lines,
    gone,
    items: money(itemsMinor),
    postage: money(postageMinor),
    taxName,
    taxBasisPoints,
    tax: money(sum(({ tax }) => tax.amountMinor) + taxIn(postageMinor)),
    total: money(itemsMinor + postageMinor),
  };
  return { ...seen, offerHash: createHash('sha256').update(canonicalJson(seen)).digest('hex') };
}
