import type { PartDetail } from '@foldwright/shared/contracts/parts';
import type { Database } from '../database/database';
import type { Member } from '../http/visitor';
import { canEditParts } from '../policies/parts';
import { presentPart } from '../presenters/parts';
import { loadPart } from './load-part';

/** @throws Problem `not-found` */
export function readPart(database: Database, member: Member, partId: string): Promise<PartDetail> {
  return database.viewWorkshop(member.workshopId, async (scope) => {
    const { row, nameOf } = await loadPart(scope, await scope.rows.parts.get(partId));
    return presentPart(row, canEditParts(member.role), nameOf);
  });
}
