import type { Listing as ListingContract, ListingInput } from '@foldwright/shared/contracts/shop';
import { createListing as createContract, listingSchema } from '@foldwright/shared/contracts/shop';
import { UniqueConstraintError } from 'sequelize';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Listing } from '../../models/listing';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { refuseStale } from '../refuse-stale';
import { presentListing } from './present-listing';

async function valuesOf(scope: WorkshopScope, { what, ...rest }: ListingInput) {
  if (what.kind === 'bracket') {
    const { id } = await scope.rows.revisions.get(what.revisionId);
    return { ...rest, revisionId: id, kitId: null };
  }
  const { id } = await scope.rows.kits.get(what.kitId);
  return { ...rest, revisionId: null, kitId: id };
}

async function refuseTakenSlug<T>(slug: string, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Problem('already-exists', {
      detail: `Another listing has the address ${slug}.`,
      kept: 'Nothing was changed.',
      errors: [{ pointer: '/slug', detail: 'Choose another address.' }],
    });
  }
}

/** Listings by title, the published ones first. */
export function listListings(database: Database, { workshopId }: Member): Promise<ListingContract[]> {
  return database.inWorkshop(workshopId, async (scope) => {
    const rows = await scope.rows.listings.list({
      order: [
        ['state', 'ASC'],
        ['title', 'ASC'],
      ],
    });
    const rank = { published: 0, draft: 1, withdrawn: 2 } as const;
    const sorted = [...rows].sort(
      (a, b) => rank[a.state as ListingContract['state']] - rank[b.state as ListingContract['state']],
    );
    const listings: ListingContract[] = [];
    for (const row of sorted) listings.push(await presentListing(scope, row));
    return listings;
  });
}

/** @throws Problem `not-found` */
export function readListing(database: Database, { workshopId }: Member, listingId: string): Promise<ListingContract> {
  return database.inWorkshop(workshopId, async (scope) =>
    presentListing(scope, await scope.rows.listings.get(listingId)),
  );
}

/** Put a listing into the shop, unseen. @throws Problem `not-found` for a revision or kit that isn't there */
export async function addListing(scope: WorkshopScope, input: ListingInput, now: Date): Promise<Listing> {
  return scope.rows.listings.add({ ...(await valuesOf(scope, input)), createdAt: now });
}

/** Write a listing, once under the caller's key. @throws Problem `not-found`, `already-exists` */
export function createListing(
  database: Database,
  actor: Member,
  input: ListingInput,
  key: string,
  now: Date,
): Promise<ListingContract> {
  const { workshopId, userId } = actor;
  return refuseTakenSlug(input.slug, () =>
    database.inWorkshop(workshopId, (scope) =>
      once(scope, { userId, route: createContract.id, key, request: input }, listingSchema, async () => {
        const listing = await addListing(scope, input, now);
        await recordAudit(scope, actor, 'Wrote the listing', listing.title);
        return presentListing(scope, listing);
      }),
    ),
  );
}

/**
 * Change a listing. Carts that hold it are priced anew; what was sold before stays as it was.
 * @throws Problem `not-found`, `stale-row`, `already-exists`
 */
export function changeListing(
  database: Database,
  actor: Member,
  listingId: string,
  input: ListingInput,
  seenRevision: number,
): Promise<ListingContract> {
  return refuseTakenSlug(input.slug, () =>
    database.inWorkshop(actor.workshopId, async (scope) => {
      const listing = await scope.rows.listings.get(listingId, { lock: true });
      refuseStale(listing, seenRevision);
      const values = await valuesOf(scope, input);
      await scope.rows.listings.change(listing, { ...values, revision: listing.revision + 1 });
      await recordAudit(scope, actor, 'Changed the listing', listing.title);
      return presentListing(scope, listing);
    }),
  );
}

/** Publish or withdraw a listing. @throws Problem `not-found`, `stale-row` */
export function setListingState(
  database: Database,
  actor: Member,
  listingId: string,
  state: 'published' | 'withdrawn',
  seenRevision: number,
): Promise<ListingContract> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const listing = await scope.rows.listings.get(listingId, { lock: true });
    refuseStale(listing, seenRevision);
    await scope.rows.listings.change(listing, { state, revision: listing.revision + 1 });
    await recordAudit(
      scope,
      actor,
      state === 'published' ? 'Published the listing' : 'Withdrew the listing',
      listing.title,
    );
    return presentListing(scope, listing);
  });
}
