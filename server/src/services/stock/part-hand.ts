import type { Hand } from '@foldwright/shared/contracts/stock';
import { makeOtherHand as makeContract } from '@foldwright/shared/contracts/stock';
import { mirrorDocument } from '@foldwright/shared/part/mirror-document';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Part } from '../../models/part';
import { addPart, nextNumber } from '../create-part';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { readStoredDocument } from '../stored-document';

const OTHER: Readonly<Record<Hand, Hand>> = { left: 'right', right: 'left', either: 'right' };

/** The part that is this one's mirror image, whichever was drawn first. */
async function otherHandOf(scope: WorkshopScope, part: Part): Promise<Part | null> {
  if (part.otherHandOf !== null) return scope.rows.parts.find(part.otherHandOf);
  return scope.rows.parts.findOne({ otherHandOf: part.id });
}

/**
 * Say which hand a part is; its mirror image is then the other one. Revisions that were released before keep theirs.
 * @throws Problem `not-found`, `wrong-state` when it is to have no hand though there is a mirror image of it
 */
export function setPartHand(
  database: Database,
  actor: Member,
  partId: string,
  hand: Hand,
): Promise<{ partId: string; hand: Hand; otherHandPartId: string | null }> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    // Two people at the two hands of one bracket lock them in the same order.
    const ids = [partId, (await otherHandOf(scope, await scope.rows.parts.get(partId)))?.id ?? []].flat().sort();
    const parts: Part[] = [];
    for (const id of ids) parts.push(await scope.rows.parts.get(id, { lock: true }));
    const twin = parts.find(({ id }) => id !== partId);
    if (hand === 'either' && twin !== undefined) {
      throw new Problem('wrong-state', {
        detail: `Its other hand is ${twin.number} ${twin.name}, so it is a left or a right one.`,
        kept: 'Both hands are as they were.',
      });
    }
    for (const part of parts) await turnTo(scope, actor, part, part.id === partId ? hand : OTHER[hand]);
    return { partId, hand, otherHandPartId: twin?.id ?? null };
  });
}

async function turnTo(scope: WorkshopScope, actor: Member, part: Part, hand: Hand): Promise<void> {
  if (part.hand === hand) return;
  await scope.rows.parts.change(part, { hand });
  const what = `Said it is the ${hand === 'either' ? 'only' : hand} hand`;
  await recordAudit(scope, actor, what, `${part.number} ${part.name}`);
  recordEvent(scope, { kind: 'part-changed', partId: part.id });
}

async function latestDocument(scope: WorkshopScope, partId: string): Promise<unknown> {
  const draft = await scope.rows.drafts.findOne({ partId, closedAt: null });
  if (draft !== null && draft.hasOutline) return draft.document;
  return (await scope.rows.revisions.findOne({ partId }, { order: [['position', 'DESC']] }))?.document;
}

/**
 * Make the mirror image of a part's latest state: a part of its own, with a number of its own, once under the caller's
 * key. A part that was no hand so far becomes the left one.
 * @throws Problem `not-found`, `already-exists` when it has another hand already, `wrong-state` without an outline
 */
export function makeOtherHand(
  database: Database,
  actor: Member,
  partId: string,
  name: string,
  key: string,
  now: Date,
): Promise<{ partId: string; draftId: string; number: string; hand: Hand }> {
  const { workshopId, userId } = actor;
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: makeContract.id, key, request: { partId, name } }, makeContract.response, async () => {
      const part = await scope.rows.parts.get(partId, { lock: true });
      const twin = await otherHandOf(scope, part);
      if (twin !== null) {
        throw new Problem('already-exists', {
          detail: `Its other hand is ${twin.number} ${twin.name}.`,
          kept: 'Nothing was changed.',
          extra: { partId: twin.id },
        });
      }
      const stored = await latestDocument(scope, partId);
      if (stored === undefined) {
        throw new Problem('wrong-state', {
          detail: 'There is no outline yet that could be mirrored.',
          next: 'Accept the trace of a photo or start from typed sizes.',
        });
      }
      const document = mirrorDocument(readStoredDocument(stored));
      const number = await nextNumber(scope);
      const drawn: Hand = part.hand;
      const hand = OTHER[drawn];
      const added = await addPart(scope, actor, { name, number, document, hasOutline: true }, now);
      const mirrored = await scope.rows.parts.get(added.partId);
      await scope.rows.parts.change(mirrored, { hand, otherHandOf: part.id });
      if (part.hand === 'either') await scope.rows.parts.change(part, { hand: 'left' });
      await recordAudit(scope, actor, 'Made the other hand', `${number} ${name}, of ${part.number} ${part.name}`);
      recordEvent(scope, { kind: 'part-changed', partId });
      return { partId: added.partId, draftId: added.draftId, number, hand };
    }),
  );
}
