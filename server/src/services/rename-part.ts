import type { PartDetail } from '@foldwright/shared/contracts/parts';
import type { Database } from '../database/database';
import { recordEvent } from '../events/record-event';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import { canEditParts } from '../policies/parts';
import { presentPart } from '../presenters/parts';
import { loadPart } from './load-part';
import { refuseTakenNumber } from './part-number';
import { recordAudit } from './record-audit';

export interface PartNaming {
  readonly name: string;
  readonly number: string;
}

/**
 * Change a part's name or number.
 * @param seenRevision revision of the part the change is based on
 * @throws Problem `not-found`, `stale-row`, `already-exists`
 */
export function renamePart(
  database: Database,
  member: Member,
  partId: string,
  naming: PartNaming,
  seenRevision: number,
  now: Date,
): Promise<PartDetail> {
  return refuseTakenNumber(naming.number, () =>
    database.inWorkshop(member.workshopId, async (scope) => {
      const part = await scope.rows.parts.get(partId, { lock: true });
      if (part.revision !== seenRevision) {
        throw new Problem('stale-row', {
          detail: 'Somebody else has changed this part’s name or number.',
          kept: 'Their change stands; yours was not made.',
          next: 'Look at the part again and repeat your change if it still fits.',
          extra: { revision: part.revision, name: part.name, number: part.number },
        });
      }
      const before = `${part.number} ${part.name}`;
      await scope.rows.parts.change(part, { ...naming, revision: part.revision + 1, updatedAt: now });
      await recordAudit(scope, member, `Renamed the part from ${before}`, `${naming.number} ${naming.name}`);
      recordEvent(scope, { kind: 'part-changed', partId });
      const { row, nameOf } = await loadPart(scope, part);
      return presentPart(row, canEditParts(member.role), nameOf);
    }),
  );
}
