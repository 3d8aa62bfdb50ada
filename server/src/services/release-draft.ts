import { createHash } from 'node:crypto';
import type { RevisionSummary } from '@foldwright/shared/contracts/revisions';
import { revisionSummarySchema } from '@foldwright/shared/contracts/revisions';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import type { FileStore } from '../files/file-store';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { Draft } from '../models/draft';
import type { Part } from '../models/part';
import { presentRevisionSummary } from '../presenters/revisions';
import type { PartComputations } from './computed-part';
import { computeBothStocks, rulesVersion, tablesVersion } from './computed-part';
import { earlierAnswer, once } from './once';
import { cannotBeDeveloped } from './print-draft';
import { recordAudit } from './record-audit';
import type { ReleasedFile } from './released-file';
import { writeReleaseDocuments } from './release-documents';
import { refuseClosed, refuseOldBase } from './send-commands';
import { readStoredDocument } from './stored-document';

export interface ReleaseInput {
  readonly baseRevision: number;
  readonly note: string;
  readonly acceptedCautionIds: readonly string[];
}

/** Everything a release is made from, read before its files are written. */
interface Prepared {
  readonly part: Part;
  readonly draft: Draft;
  readonly document: PartDocument;
  readonly computations: PartComputations;
  readonly hash: string;
}

/**
 * SHA-256 over what a release freezes: which part, letter and hand, the document, both computed tables, and the versions of
 * rules and tables. Orders and drawings carry it.
 */
function releaseHash(part: Part, draft: Draft, document: PartDocument, computations: PartComputations): string {
  const frozen = {
    partId: part.id,
    letter: draft.letter,
    hand: part.hand,
    document,
    trial: computations.trial.computed,
    production: computations.production.computed,
    rulesVersion,
    tablesVersion,
  };
  return createHash('sha256').update(canonicalJson(frozen)).digest('hex');
}

/** @throws Problem `cannot-be-developed`, `has-blockers` */
function refuseUnmakeable({ trial, production }: PartComputations): void {
  for (const computation of [trial, production]) {
    if (computation.development === null) throw cannotBeDeveloped(computation);
  }
  const all = [...trial.findings, ...production.findings].filter(({ severity }) => severity === 'blocker');
  const blockers = [...new Map(all.map((finding) => [finding.id, finding])).values()];
  if (blockers.length === 0) return;
  throw new Problem('has-blockers', {
    detail: `${blockers[0]?.title ?? ''}${blockers.length > 1 ? `, and ${blockers.length - 1} more` : ''}.`,
    kept: 'The draft is as it was.',
    next: 'Mend what the checks name, then release.',
    extra: { findings: blockers },
  });
}

async function prepare(scope: WorkshopScope, draftId: string, input: ReleaseInput): Promise<Prepared> {
  const draft = await scope.rows.drafts.get(draftId);
  refuseClosed(draft);
  await refuseOldBase(scope, draft, input.baseRevision);
  if (!draft.hasOutline) {
    throw new Problem('wrong-state', {
      detail: 'There is no outline yet.',
      next: 'Accept the trace of a photo or start from typed sizes.',
    });
  }
  const part = await scope.rows.parts.get(draft.partId);
  const document = readStoredDocument(draft.document);
  const computations = computeBothStocks(document);
  refuseUnmakeable(computations);
  return { part, draft, document, computations, hash: releaseHash(part, draft, document, computations) };
}

async function freeze(
  scope: WorkshopScope,
  member: Member,
  prepared: Prepared,
  files: readonly ReleasedFile[],
  input: ReleaseInput,
  now: Date,
  followUp: FollowUp,
): Promise<RevisionSummary> {
  const { part, document, computations, hash } = prepared;
  const draft = await scope.rows.drafts.get(prepared.draft.id, { lock: true });
  refuseClosed(draft);
  await refuseOldBase(scope, draft, input.baseRevision);
  const revision = await scope.rows.revisions.add({
    partId: part.id,
    letter: draft.letter,
    position: await scope.rows.revisions.count({ partId: part.id }),
    hash,
    hand: part.hand,
    note: input.note,
    document,
    computedTrial: computations.trial.computed,
    computedProduction: computations.production.computed,
    acceptedCautionIds: input.acceptedCautionIds,
    rulesVersion,
    tablesVersion,
    releasedBy: member.userId,
    releasedAt: now,
  });
  for (const file of files) await scope.rows.revisionFiles.add({ ...file, revisionId: revision.id });
  await followUp(scope, revision.id);
  await scope.rows.drafts.change(draft, { closedAt: now, releasedRevisionId: revision.id, furthestStep: 'release' });
  await scope.rows.parts.changeWhere({ id: part.id }, { updatedAt: now });
  await recordAudit(scope, member, `Released revision ${draft.letter}`, `${part.number} ${part.name}`);
  recordEvent(scope, { kind: 'part-changed', partId: part.id });
  return presentRevisionSummary(revision, () => member.userName);
}

/** What is done in the transaction of a release besides: work for later is put into the queue. */
export type FollowUp = (scope: WorkshopScope, revisionId: string) => Promise<void>;

/**
 * Freeze a draft as a revision: document, computed tables, versions and hash, with its files written. The files are made
 * before the transaction that freezes, so that nobody waits for them; if that transaction is refused they are removed.
 * @throws Problem `not-found`, `wrong-state`, `draft-moved-on`, `cannot-be-developed`, `has-blockers`
 */
export async function releaseDraft(
  database: Database,
  store: FileStore,
  member: Member,
  draftId: string,
  input: ReleaseInput,
  idempotencyKey: string,
  now: Date,
  followUp: FollowUp,
): Promise<RevisionSummary> {
  const key = { userId: member.userId, route: 'releaseDraft', key: idempotencyKey, request: { draftId, ...input } };
  const start = await database.inWorkshop(member.workshopId, async (scope) => {
    const earlier = await earlierAnswer(scope, key, revisionSummarySchema);
    return earlier === undefined ? await prepare(scope, draftId, input) : { earlier };
  });
  if ('earlier' in start) return start.earlier;

  const files = await writeReleaseDocuments(store, member, start, now);
  let isFrozenHere = false;
  try {
    return await database.inWorkshop(member.workshopId, async (scope) => {
      isFrozenHere = false;
      const answer = await once(scope, key, revisionSummarySchema, async () => {
        isFrozenHere = true;
        return freeze(scope, member, start, files, input, now, followUp);
      });
      return answer;
    });
  } catch (error) {
    isFrozenHere = false;
    throw error;
  } finally {
    if (!isFrozenHere) await Promise.all(files.map(({ storedAs }) => store.remove(storedAs)));
  }
}
