import type { commandLogEntrySchema, Draft } from '@foldwright/shared/contracts/parts';
import { Op } from 'sequelize';
import type * as z from 'zod/mini';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import type { Member } from '../http/visitor';
import { presentCommandBatch, presentDraft } from '../presenters/drafts';
import { namesOfPeople } from './names-of-people';

export type CommandLogEntry = z.output<typeof commandLogEntrySchema>;
/** Most entries of a history at once; an editor that was away longer takes the whole draft instead. */
const LONGEST_HISTORY = 500;

/** @throws Problem `not-found` */
export function readDraft(database: Database, member: Member, draftId: string): Promise<Draft> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const draft = await scope.rows.drafts.get(draftId);
    return presentDraft(draft, await namesOfPeople(scope, [draft.updatedBy]));
  });
}

/** What was changed after a revision of the draft, newest first. */
export async function changesSince(
  scope: WorkshopScope,
  draftId: string,
  sinceRevision: number,
): Promise<CommandLogEntry[]> {
  const batches = await scope.rows.commandBatches.list({
    where: { draftId, revision: { [Op.gt]: sinceRevision } },
    order: [['revision', 'DESC']],
    limit: LONGEST_HISTORY,
  });
  const nameOf = await namesOfPeople(
    scope,
    batches.map(({ userId }) => userId),
  );
  return batches.map((batch) => presentCommandBatch(batch, nameOf));
}

/** @throws Problem `not-found` */
export function readDraftHistory(
  database: Database,
  member: Member,
  draftId: string,
  sinceRevision: number,
): Promise<CommandLogEntry[]> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const draft = await scope.rows.drafts.get(draftId);
    return changesSince(scope, draft.id, sinceRevision);
  });
}
