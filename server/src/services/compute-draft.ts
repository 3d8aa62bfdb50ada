import type { ComputedPart } from '@foldwright/shared/contracts/development-schema';
import type { StockRole } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import type { ComputationCache } from './computation-cache';
import { readStoredDocument } from './stored-document';

/**
 * The draft as the server computes it for one sheet, at its current revision.
 * @throws Problem `not-found`
 */
export async function computeDraft(
  database: Database,
  cache: ComputationCache,
  member: Member,
  draftId: string,
  role: StockRole,
): Promise<{ revision: number; computed: ComputedPart }> {
  const draft = await database.inWorkshop(member.workshopId, (scope) => scope.rows.drafts.get(draftId));
  const { computed } = cache.get(draft.id, draft.revision, role, () => readStoredDocument(draft.document));
  return { revision: draft.revision, computed };
}
