import type { Listing as ListingContract } from '@foldwright/shared/contracts/shop';
import { listingSchema } from '@foldwright/shared/contracts/shop';
import { Op } from 'sequelize';
import * as z from 'zod/mini';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Listing } from '../../models/listing';
import { bracketsById } from '../stock/brackets';
import { costOfBracketSold, costOfKit } from '../stock/costs';
import { linesOfKit } from '../stock/kits';
import { sellingOf } from '../stock/selling';
import { shopOf } from './settings';

const finishesSchema = listingSchema.shape.finishes;

/** Finishes of a listing as they were written down. */
export const finishesOf = (listing: Pick<Listing, 'finishes'>): ListingContract['finishes'] =>
  z.parse(finishesSchema, listing.finishes);

/** Revisions of the brackets that a listing sells. */
export async function revisionsOf(scope: WorkshopScope, listing: Listing): Promise<readonly string[]> {
  if (listing.revisionId !== null) return [listing.revisionId];
  const lines = listing.kitId === null ? [] : await linesOfKit(scope, listing.kitId);
  return lines.flatMap(({ revisionId }) => revisionId ?? []);
}

async function isBehind(scope: WorkshopScope, listing: Listing): Promise<boolean> {
  for (const id of await revisionsOf(scope, listing)) {
    const { partId, position } = await scope.rows.revisions.get(id);
    if ((await scope.rows.revisions.count({ partId, position: { [Op.gt]: position } })) > 0) return true;
  }
  return false;
}

async function whatOf(scope: WorkshopScope, listing: Listing): Promise<Pick<ListingContract, 'what' | 'cost'>> {
  if (listing.kitId !== null) {
    const kit = await scope.rows.kits.get(listing.kitId);
    const cost = await costOfKit(scope, await linesOfKit(scope, kit.id));
    return { what: { kind: 'kit', kitId: kit.id, kitName: kit.name }, cost };
  }
  const revisionId = listing.revisionId ?? '';
  const bracket = (await bracketsById(scope, [revisionId])).get(revisionId);
  if (bracket === undefined) throw new Error(`listing ${listing.id} sells a revision that is not there`);
  return { what: { kind: 'bracket', bracket }, cost: await costOfBracketSold(scope, revisionId, bracket.partId) };
}

/** A listing as the workshop sees it, with what it costs and what is left. */
export async function presentListing(scope: WorkshopScope, listing: Listing): Promise<ListingContract> {
  const shop = await shopOf(scope);
  const { what, cost } = await whatOf(scope, listing);
  const photos = await scope.rows.listingPhotos.list({
    where: { listingId: listing.id },
    order: [['position', 'ASC']],
  });
  const { id, state, slug, title, summary, fits, doesNotFit, fittingSteps, leadTimeDays, revision } = listing;
  return {
    ...{ id, state, what, slug, title, summary, fits, doesNotFit, fittingSteps, leadTimeDays, cost, revision },
    price: { amountMinor: listing.priceMinor, currency: shop.currency },
    finishes: finishesOf(listing),
    margin: sellingOf(shop, listing.priceMinor, cost.each).margin,
    photos: photos.map((photo) => ({ id: photo.id, description: photo.description })),
    isBehind: await isBehind(scope, listing),
  };
}
