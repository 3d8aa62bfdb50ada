import type { LiveEvent } from '@foldwright/shared/contracts/system';
import type { WorkshopScope } from '../database/workshop-scope';

type WithoutSeq<E> = E extends LiveEvent ? Omit<E, 'seq'> : never;
/** An event before it has its number. */
export type NewLiveEvent = WithoutSeq<LiveEvent>;

/**
 * Tell every open page of the workshop, once the transaction commits. Numbers are handed out one transaction after the
 * other, so that a page that asks for what came after number n misses none. That takes a lock, which comes after every
 * other one: a transaction that went on to lock rows while it held it could wait for one that waits for it.
 */
export function recordEvent(scope: WorkshopScope, event: NewLiveEvent): void {
  scope.atEnd(async () => {
    await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('live:' || $1, 0))", [scope.workshopId]);
    await scope.sql('INSERT INTO live_events (workshop_id, payload) VALUES ($1, $2::jsonb)', [
      scope.workshopId,
      JSON.stringify(event),
    ]);
  });
}
