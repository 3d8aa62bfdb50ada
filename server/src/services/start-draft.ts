import type { Draft } from '@foldwright/shared/contracts/parts';
import type { Database } from '../database/database';
import { recordEvent } from '../events/record-event';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import { presentDraft } from '../presenters/drafts';
import { computeBothStocks, countFindings } from './computed-part';
import { namesOfPeople } from './names-of-people';
import { recordAudit } from './record-audit';
import { revisionLetter } from './revision-letter';
import { readStoredDocument } from './stored-document';

/**
 * Start the next draft from the latest revision's document.
 * @throws Problem `not-found`; `wrong-state` when a draft is open or nothing was released yet
 */
export function startDraft(database: Database, member: Member, partId: string, now: Date): Promise<Draft> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    // The part's row is the lock that two people starting at once have to pass.
    const part = await scope.rows.parts.get(partId, { lock: true });
    const open = await scope.rows.drafts.findOne({ partId, closedAt: null });
    if (open !== null) {
      throw new Problem('wrong-state', {
        detail: `Draft ${open.letter} is open already.`,
        next: `Go on with draft ${open.letter}.`,
        extra: { draftId: open.id },
      });
    }
    const latest = await scope.rows.revisions.findOne({ partId }, { order: [['position', 'DESC']] });
    if (latest === null) {
      throw new Problem('wrong-state', { detail: 'Nothing was released yet that a draft could start from.' });
    }
    const document = readStoredDocument(latest.document);
    const letter = revisionLetter(latest.position + 1);
    const draft = await scope.rows.drafts.add({
      partId,
      letter,
      document,
      hasOutline: true,
      furthestStep: 'outline',
      ...countFindings(computeBothStocks(document)),
      updatedBy: member.userId,
      updatedAt: now,
    });
    await scope.rows.parts.change(part, { updatedAt: now });
    await recordAudit(
      scope,
      member,
      `Started draft ${letter} from revision ${latest.letter}`,
      `${part.number} ${part.name}`,
    );
    recordEvent(scope, { kind: 'part-changed', partId });
    return presentDraft(draft, await namesOfPeople(scope, [member.userId]));
  });
}
