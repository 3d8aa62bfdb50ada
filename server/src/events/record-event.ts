import type { LiveEvent } from '@foldwright/shared/contracts/system';
import type { WorkshopScope } from '../database/workshop-scope';

type WithoutSeq<E> = E extends LiveEvent ? Omit<E, 'seq'> : never;
/** An event before it has its number. */
export type NewLiveEvent = WithoutSeq<LiveEvent>;

/**
 * Tell every open page of the workshop, once the transaction commits. Call it last in a transaction: numbers are handed
 * out one transaction after the other, so that a page that asks for what came after number n misses none.
 */
export async function recordEvent(scope: WorkshopScope, event: NewLiveEvent): Promise<void> {
  await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('live:' || $1, 0))", [scope.workshopId]);
  await scope.sql('INSERT INTO live_events (workshop_id, payload) VALUES ($1, $2::jsonb)', [
    scope.workshopId,
    JSON.stringify(event),
  ]);
}
