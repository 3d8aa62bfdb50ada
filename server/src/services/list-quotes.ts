import type { Quote as QuoteContract } from '@foldwright/shared/contracts/orders';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import { presentQuote } from '../presenters/orders';

/** Quotes for a revision, newest first. @throws Problem `not-found` */
export async function listQuotes(
  database: Database,
  { workshopId }: Member,
  revisionId: string,
  now: Date,
): Promise<QuoteContract[]> {
  return database.inWorkshop(workshopId, async ({ rows }) => {
    const revision = await rows.revisions.get(revisionId);
    const quotes = await rows.quotes.list({ where: { revisionId: revision.id }, order: [['askedAt', 'DESC']] });
    return quotes.map((quote) => presentQuote(quote, now));
  });
}
