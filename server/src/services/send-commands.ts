import type { Draft as DraftAnswer } from '@foldwright/shared/contracts/parts';
import { PART_STEPS } from '@foldwright/shared/contracts/parts';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import { CommandRefusal } from '@foldwright/shared/part/command-refusal';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { assertInvariants } from '@foldwright/shared/part/invariants';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { Draft } from '../models/draft';
import { presentDraft, readStep } from '../presenters/drafts';
import type { ComputationCache } from './computation-cache';
import type { PartComputations } from './computed-part';
import { computeBothStocks, countFindings } from './computed-part';
import { namesOfPeople } from './names-of-people';
import { changesSince } from './read-draft';
import { readStoredDocument } from './stored-document';

type Step = (typeof PART_STEPS)[number];

export interface CommandsInput {
  readonly baseRevision: number;
  readonly batchId: string;
  readonly clientId: string;
  readonly commands: readonly PartCommand[];
  readonly reachedStep?: Step | undefined;
}

/** @throws Problem `draft-moved-on` with the draft as it is and what came in between, unless the revision is the draft's */
export async function refuseOldBase(scope: WorkshopScope, draft: Draft, baseRevision: number): Promise<void> {
  if (draft.revision === baseRevision) return;
  const since = await changesSince(scope, draft.id, baseRevision);
  const nameOf = await namesOfPeople(scope, [draft.updatedBy]);
  throw new Problem('draft-moved-on', {
    detail: `${nameOf(draft.updatedBy)} has changed the draft since revision ${baseRevision}.`,
    kept: 'Their changes stand; yours are still in your page.',
    next: 'Take their changes and make yours again on top.',
    extra: { draft: presentDraft(draft, nameOf), since },
  });
}

/** @throws Problem `wrong-state` when the draft was released */
export function refuseClosed(draft: Draft): void {
  if (draft.closedAt === null) return;
  throw new Problem('wrong-state', {
    detail: `Draft ${draft.letter} was released; a revision doesn’t change any more.`,
    kept: 'The revision is as it was released.',
    next: 'Start the next draft.',
    extra: { revisionId: draft.releasedRevisionId },
  });
}

function apply(document: PartDocument, commands: readonly PartCommand[]): PartDocument {
  try {
    const changed = applyCommands(document, commands);
    assertInvariants(changed);
    return changed;
  } catch (error) {
    if (!(error instanceof CommandRefusal)) throw error;
    throw new Problem('command-refused', {
      detail: error.message,
      kept: 'The draft is as it was.',
      extra: { code: error.code, ids: error.ids },
    });
  }
}

const furthest = (...steps: readonly Step[]): Step =>
  steps.reduce((far, step) => (PART_STEPS.indexOf(step) > PART_STEPS.indexOf(far) ? step : far), 'mock-up');

/**
 * Change a draft by commands. Document, log and counts of findings are stored together; a batch that comes a second time
 * changes nothing and gets the draft.
 * @throws Problem `not-found`, `wrong-state`, `draft-moved-on`, `command-refused`
 */
export async function sendCommands(
  database: Database,
  cache: ComputationCache,
  member: Member,
  draftId: string,
  input: CommandsInput,
  now: Date,
): Promise<DraftAnswer> {
  let computations: PartComputations | undefined;
  const answer = await database.inWorkshop(member.workshopId, async (scope) => {
    computations = undefined;
    const draft = await scope.rows.drafts.get(draftId, { lock: true });
    const earlier = await scope.rows.commandBatches.findOne({ draftId, batchId: input.batchId });
    if (earlier !== null) return presentDraft(draft, await namesOfPeople(scope, [draft.updatedBy]));
    refuseClosed(draft);
    await refuseOldBase(scope, draft, input.baseRevision);

    const document = apply(readStoredDocument(draft.document), input.commands);
    const bringsOutline = input.commands.some(({ kind }) => kind === 'replaceLayout');
    const hasOutline = draft.hasOutline || bringsOutline;
    const revision = draft.revision + 1;
    computations = computeBothStocks(document);
    await scope.rows.drafts.change(draft, {
      document,
      revision,
      hasOutline,
      furthestStep: furthest(
        readStep(draft.furthestStep),
        input.reachedStep ?? 'mock-up',
        hasOutline ? 'outline' : 'mock-up',
      ),
      ...(hasOutline ? countFindings(computations) : {}),
      updatedBy: member.userId,
      updatedAt: now,
    });
    await scope.rows.commandBatches.add({
      draftId,
      batchId: input.batchId,
      revision,
      clientId: input.clientId,
      commands: input.commands,
      userId: member.userId,
      createdAt: now,
    });
    await scope.rows.parts.changeWhere({ id: draft.partId }, { updatedAt: now });
    recordEvent(scope, {
      kind: 'draft-changed',
      draftId,
      partId: draft.partId,
      revision,
      clientId: input.clientId,
      by: member.userName,
    });
    return presentDraft(draft, () => member.userName);
  });
  if (computations !== undefined) cache.remember(draftId, answer.revision, computations);
  return answer;
}
