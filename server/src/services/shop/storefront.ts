import type { ShopCard, ShopFront, ShopListing } from '@foldwright/shared/contracts/storefront';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { cautionsForBuyers } from '../../documents/cautions';
import { notFound } from '../../http/problem';
import type { Listing } from '../../models/listing';
import { findShop } from '../sales/find-by-link';
import { freeOnShelf, piecesOf, showPiece } from './pieces';
import { finishesOf } from './present-listing';
import { shopOf } from './settings';

/** Whether a finish is worn by what is drawn: the first one that is offered, else the metal as it is. */
const BARE = 'bare';

/** The front of a workshop's shop, in the caller's transaction. */
export async function frontOf(scope: WorkshopScope): Promise<ShopFront> {
  const workshop = await scope.workshop();
  const { slug, headline, about, currency, taxName, taxBasisPoints, postageMinor } = await shopOf(scope);
  const postage = { amountMinor: postageMinor, currency };
  return { slug, name: workshop.name, headline, about, currency, taxName, taxBasisPoints, postage };
}

/** The front of a workshop's shop, whether it is open or not. */
export const readShopFront = (database: Database, workshopId: string): Promise<ShopFront> =>
  database.inWorkshop(workshopId, frontOf);

/** @throws Problem `not-found` */
export async function readShop(database: Database, shopSlug: string): Promise<ShopFront> {
  return database.inWorkshop(await findShop(database, shopSlug), frontOf);
}

async function cardOf(scope: WorkshopScope, listing: Listing): Promise<ShopCard> {
  const { currency } = await shopOf(scope);
  const finishes = finishesOf(listing);
  const pieces = await piecesOf(scope, listing);
  const drawn: ShopCard['pieces'] = [];
  for (const piece of pieces) {
    const shown = await showPiece(scope, piece);
    if (shown.kind !== 'bracket') continue;
    drawn.push({ document: shown.document, finishId: shown.finishId ?? finishes[0]?.finishId ?? BARE });
  }
  const photo = await scope.rows.listingPhotos.findOne({ listingId: listing.id }, { order: [['position', 'ASC']] });
  let isOnShelf = false;
  for (const { finishId } of finishes) isOnShelf ||= (await freeOnShelf(scope, pieces, finishId)) > 0;
  const cheapest = Math.min(...finishes.map(({ surchargeMinor }) => surchargeMinor));
  return {
    slug: listing.slug,
    kind: listing.kitId === null ? 'bracket' : 'kit',
    title: listing.title,
    summary: listing.summary,
    from: { amountMinor: listing.priceMinor + cheapest, currency },
    pieces: drawn,
    photoId: photo?.id ?? null,
    isOnShelf,
  };
}

export interface ShopSearch {
  readonly words?: string | undefined;
  readonly kind?: 'bracket' | 'kit' | undefined;
}

const plain = (text: string) => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/** Whether every word that was typed stands somewhere in what a listing says. */
export function isFoundBy(listing: Pick<Listing, 'title' | 'summary' | 'fits'>, words: string): boolean {
  const text = plain(`${listing.title} ${listing.summary} ${listing.fits}`);
  return plain(words)
    .split(/\s+/)
    .every((word) => text.includes(word));
}

/** What a shop sells: kits first, then by title. @throws Problem `not-found` */
export async function searchShop(
  database: Database,
  shopSlug: string,
  { words = '', kind }: ShopSearch,
): Promise<ShopCard[]> {
  return database.inWorkshop(await findShop(database, shopSlug), async (scope) => {
    const listings = await scope.rows.listings.list({ where: { state: 'published' }, order: [['title', 'ASC']] });
    const cards: ShopCard[] = [];
    for (const listing of listings) {
      const isWanted = kind === undefined || (kind === 'kit') === (listing.kitId !== null);
      if (isWanted && isFoundBy(listing, words)) cards.push(await cardOf(scope, listing));
    }
    return cards.sort((a, b) => Number(a.kind === 'bracket') - Number(b.kind === 'bracket'));
  });
}

const linesOf = (text: string): string[] =>
  text
    .split('\n')
    .map((line) => line.trim())
    .filter((line) => line !== '');

/** One published listing as customers see it. @throws Problem `not-found` */
export async function readShopListing(database: Database, shopSlug: string, listingSlug: string): Promise<ShopListing> {
  return database.inWorkshop(await findShop(database, shopSlug), async (scope) => {
    const listing = await scope.rows.listings.findOne({ slug: listingSlug, state: 'published' });
    if (listing === null) throw notFound();
    const { currency, packingDays } = await shopOf(scope);
    const finishes = finishesOf(listing);
    const pieces = await piecesOf(scope, listing);
    const availability: ShopListing['availability'] = [];
    for (const { finishId } of finishes) {
      const onShelf = await freeOnShelf(scope, pieces, finishId);
      availability.push({ finishId, onShelf, leavesInDays: packingDays + (onShelf > 0 ? 0 : listing.leadTimeDays) });
    }
    const shown: ShopListing['pieces'] = [];
    for (const piece of pieces) shown.push(await showPiece(scope, piece));
    const photos = await scope.rows.listingPhotos.list({
      where: { listingId: listing.id },
      order: [['position', 'ASC']],
    });
    return {
      id: listing.id,
      slug: listing.slug,
      kind: listing.kitId === null ? 'bracket' : 'kit',
      title: listing.title,
      summary: listing.summary,
      fits: linesOf(listing.fits),
      doesNotFit: linesOf(listing.doesNotFit),
      price: { amountMinor: listing.priceMinor, currency },
      finishes,
      availability,
      pieces: shown,
      photos: photos.map(({ id, description }) => ({ id, description })),
      cautions: [
        ...cautionsForBuyers(shown.flatMap((piece) => (piece.kind === 'bracket' ? piece.document.declaredUses : []))),
      ],
    };
  });
}
