import type { PartDetail, Starter } from '@foldwright/shared/contracts/parts';
import { partDetailSchema } from '@foldwright/shared/contracts/parts';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { StarterError } from '@foldwright/shared/part/folded-starters';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import * as z from 'zod/mini';
import type { Database } from '../database/database';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import { canEditParts } from '../policies/parts';
import { presentPart } from '../presenters/parts';
import { computeBothStocks, countFindings } from './computed-part';
import { loadPart } from './load-part';
import { once } from './once';
import { refuseTakenNumber } from './part-number';
import { recordAudit } from './record-audit';
import { revisionLetter } from './revision-letter';

export interface NewPart {
  readonly name: string;
  /** The workshop's next number when there is none. */
  readonly number?: string | undefined;
  /** Typed dimensions to start from; null when a photo of a mock-up will follow. */
  readonly starter: Starter | null;
}

/** A plain sheet that holds the place of the outline until a trace is accepted; it is never shown. */
const PLACEHOLDER: Starter = { shape: 'flat-plate', widthMm: 100, heightMm: 60 };

const numberRow = z.object({ prefix: z.string(), highest: z.int() });

/** The workshop's prefix and one more than the highest number with it. Held until the transaction ends. */
export async function nextNumber(scope: WorkshopScope): Promise<string> {
  await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('part number:' || $1, 0))", [scope.workshopId]);
  const [row] = await scope.sql(
    `SELECT w.number_prefix AS prefix, COALESCE(MAX(substring(p.number FROM '^' || w.number_prefix || '-(\\d{1,9})$')::int), 0) AS highest
     FROM workshops w LEFT JOIN parts p ON p.workshop_id = w.id WHERE w.id = $1 GROUP BY w.number_prefix`,
    [scope.workshopId],
  );
  const { prefix, highest } = numberRow.parse(row);
  return `${prefix}-${String(highest + 1).padStart(2, '0')}`;
}

/** Put a part with its first draft into the workshop. Answers the ids. */
export async function addPart(
  scope: WorkshopScope,
  member: Pick<Member, 'userId' | 'userName'>,
  part: { name: string; number: string; document: PartDocument; hasOutline: boolean },
  now: Date,
): Promise<{ partId: string; draftId: string }> {
  const row = await scope.rows.parts.add({ name: part.name, number: part.number, createdAt: now, updatedAt: now });
  const draft = await scope.rows.drafts.add({
    partId: row.id,
    letter: revisionLetter(0),
    document: part.document,
    hasOutline: part.hasOutline,
    furthestStep: part.hasOutline ? 'outline' : 'mock-up',
    ...(part.hasOutline ? countFindings(computeBothStocks(part.document)) : {}),
    updatedBy: member.userId,
    updatedAt: now,
  });
  await recordAudit(scope, member, 'Started the part', `${part.number} ${part.name}`);
  recordEvent(scope, { kind: 'part-changed', partId: row.id });
  return { partId: row.id, draftId: draft.id };
}

function documentOf(starter: Starter): PartDocument {
  try {
    return starterDocument(starter);
  } catch (error) {
    if (!(error instanceof StarterError)) throw error;
    throw new Problem('invalid-input', { detail: error.message, kept: 'No part was started.' });
  }
}

/**
 * Start a part, once under the caller's key.
 * @throws Problem `already-exists` when the number is taken, `invalid-input` for sizes that do not go together
 */
export function createPart(
  database: Database,
  member: Member,
  input: NewPart,
  idempotencyKey: string,
  now: Date,
): Promise<PartDetail> {
  return refuseTakenNumber(input.number, () =>
    database.inWorkshop(member.workshopId, (scope) => {
      const key = { userId: member.userId, route: 'createPart', key: idempotencyKey, request: input };
      return once(scope, key, partDetailSchema, async () => {
        const number = input.number ?? (await nextNumber(scope));
        const document = documentOf(input.starter ?? PLACEHOLDER);
        const hasOutline = input.starter !== null;
        const { partId } = await addPart(scope, member, { name: input.name, number, document, hasOutline }, now);
        const { row, nameOf } = await loadPart(scope, await scope.rows.parts.get(partId));
        return presentPart(row, canEditParts(member.role), nameOf);
      });
    }),
  );
}
