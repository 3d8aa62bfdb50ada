import type { CartLine, Offer } from '@foldwright/shared/contracts/storefront';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Listing } from '../../models/listing';
import type { Shop } from '../../models/shop';
import { findShop } from '../sales/find-by-link';
import { findPosition } from '../stock/shelf';
import type { ListedPiece } from './pieces';
import { pieceWords, piecesOf, targetOfPiece } from './pieces';
import { finishesOf } from './present-listing';
import { shopOf } from './settings';
import type { PricedLine } from './sum-offer';
import { joinCart, sumOffer } from './sum-offer';

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

/** Price a cart as it stands now, in the caller's transaction. */
export async function makeOffer(scope: WorkshopScope, cart: readonly CartLine[]): Promise<MadeOffer> {
  const shop = await shopOf(scope);
  const shelf = new Shelf(scope);
  const made: { readonly listing: Listing; readonly pieces: readonly ListedPiece[] }[] = [];
  const priced: PricedLine[] = [];
  const gone: Offer['gone'] = [];
  for (const { listingId, finishId, quantity } of joinCart(cart)) {
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
    made.push({ listing, pieces });
    priced.push({
      ...{ listingId, slug: listing.slug, title: listing.title, finishId, quantity, fromShelf },
      eachMinor: listing.priceMinor + finish.surchargeMinor,
      leavesInDays: leavesInDays(shop, listing, fromShelf === quantity),
      contents: pieces.map((piece) => pieceWords(piece, finishId)),
    });
  }
  const offer = sumOffer(shop, priced, gone);
  const lines = offer.lines.flatMap((line, at) => {
    const from = made[at];
    return from === undefined ? [] : [{ ...from, line }];
  });
  return { offer, lines };
}

/** What a cart costs now. @throws Problem `not-found` for a shop that isn't there or is closed */
export async function priceCart(database: Database, shopSlug: string, cart: readonly CartLine[]): Promise<Offer> {
  const workshopId = await findShop(database, shopSlug);
  return database.viewWorkshop(workshopId, async (scope) => (await makeOffer(scope, cart)).offer);
}
