import { createHash } from 'node:crypto';
import type { CartLine, Offer } from '@foldwright/shared/contracts/storefront';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import { includedTaxMinor } from '@foldwright/shared/pricing/included-tax';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Listing } from '../../models/listing';
import type { Shop } from '../../models/shop';
import { findShop } from '../sales/find-by-link';
import { findPosition } from '../stock/shelf';
import type { ListedPiece } from './pieces';
import { piecesOf, targetOfPiece } from './pieces';
import { finishesOf } from './present-listing';
import { shopOf } from './settings';

/** A line of an offer together with what it was made from, for whoever places the order. */
export interface OfferedLine {
  readonly listing: Listing;
  readonly pieces: readonly ListedPiece[];
  readonly line: Offer['lines'][number];
}

export interface MadeOffer {
  readonly offer: Offer;
  readonly lines: readonly OfferedLine[];
}

/** What is free on the shelf while an offer is made: each line takes its share, so that two don't count the same piece. */
class Shelf {
  private readonly free = new Map<string, number>();

  constructor(private readonly scope: WorkshopScope) {}

  /** @returns how many of a listing come from the shelf; they are taken off for the lines that follow */
  async take(pieces: readonly ListedPiece[], finishId: string, quantity: number): Promise<number> {
    const needs = new Map<string, number>();
    for (const piece of pieces) {
      const target = targetOfPiece(piece, finishId);
      const key = JSON.stringify(target);
      needs.set(key, (needs.get(key) ?? 0) + piece.quantity);
      if (this.free.has(key)) continue;
      const position = await findPosition(this.scope, target);
      this.free.set(key, position === null ? 0 : position.onHand - position.reserved);
    }
    const made = Math.min(quantity, ...[...needs].map(([key, each]) => Math.floor((this.free.get(key) ?? 0) / each)));
    for (const [key, each] of needs) this.free.set(key, (this.free.get(key) ?? 0) - each * made);
    return made;
  }
}

/** Days until something leaves: packing, and cutting first when not all of it is on the shelf. */
const leavesInDays = (shop: Shop, listing: Listing, isOnShelf: boolean): number =>
  shop.packingDays + (isOnShelf ? 0 : listing.leadTimeDays);

/** Lines of one thing in one finish count as one. */
function joinLines(lines: readonly CartLine[]): readonly CartLine[] {
  const joined = new Map<string, CartLine>();
  for (const line of lines) {
    const key = `${line.listingId} ${line.finishId}`;
    joined.set(key, { ...line, quantity: (joined.get(key)?.quantity ?? 0) + line.quantity });
  }
  return [...joined.values()];
}

/** Price a cart as it stands now, in the caller's transaction. */
export async function makeOffer(scope: WorkshopScope, cart: readonly CartLine[]): Promise<MadeOffer> {
  const shop = await shopOf(scope);
  const { currency, taxBasisPoints, taxName } = shop;
  const money = (amountMinor: number) => ({ amountMinor, currency });
  const shelf = new Shelf(scope);
  const lines: OfferedLine[] = [];
  const gone: Offer['gone'] = [];
  for (const { listingId, finishId, quantity } of joinLines(cart)) {
    const listing = await scope.rows.listings.find(listingId);
    const finish = listing === null ? undefined : finishesOf(listing).find((one) => one.finishId === finishId);
    if (listing === null || listing.state !== 'published' || finish === undefined) {
      const reason =
        listing?.state === 'published' ? `${listing.title} no longer comes in this finish.` : 'This is no longer sold.';
      gone.push({ listingId, finishId, reason });
      continue;
    }
    const pieces = await piecesOf(scope, listing);
    const fromShelf = await shelf.take(pieces, finishId, quantity);
    const eachMinor = listing.priceMinor + finish.surchargeMinor;
    const totalMinor = eachMinor * quantity;
    lines.push({
      listing,
      pieces,
      line: {
        ...{ listingId, slug: listing.slug, title: listing.title, finishId, quantity, fromShelf },
        each: money(eachMinor),
        total: money(totalMinor),
        tax: money(includedTaxMinor(totalMinor, taxBasisPoints)),
        leavesInDays: leavesInDays(shop, listing, fromShelf === quantity),
      },
    });
  }
  const sum = (amount: (line: Offer['lines'][number]) => number) =>
    lines.reduce((total, { line }) => total + amount(line), 0);
  const itemsMinor = sum((line) => line.total.amountMinor);
  const postageMinor = lines.length === 0 ? 0 : shop.postageMinor;
  const priced = {
    lines: lines.map(({ line }) => line),
    gone,
    items: money(itemsMinor),
    postage: money(postageMinor),
    taxName,
    taxBasisPoints,
    tax: money(sum((line) => line.tax.amountMinor) + includedTaxMinor(postageMinor, taxBasisPoints)),
    total: money(itemsMinor + postageMinor),
  };
  const offerHash = createHash('sha256').update(canonicalJson(priced)).digest('hex');
  return { offer: { ...priced, offerHash }, lines };
}

/** What a cart costs now. @throws Problem `not-found` for a shop that isn't there or is closed */
export async function priceCart(database: Database, shopSlug: string, cart: readonly CartLine[]): Promise<Offer> {
  const workshopId = await findShop(database, shopSlug);
  return database.viewWorkshop(workshopId, async (scope) => (await makeOffer(scope, cart)).offer);
}
