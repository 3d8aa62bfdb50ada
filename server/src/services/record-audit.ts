import type { WorkshopScope } from '../database/workshop-scope';
import type { Member } from '../http/visitor';

/**
 * Write down who did what, in the transaction that does it.
 * @param what in words, past tense ("Released revision A")
 * @param about the thing, as people call it ("LC-02 Pump tray"); null when it is the workshop itself
 */
export async function recordAudit(
  scope: WorkshopScope,
  by: Pick<Member, 'userId' | 'userName'> | null,
  what: string,
  about: string | null,
): Promise<void> {
  await scope.rows.auditEntries.add({ userId: by?.userId ?? null, byName: by?.userName ?? 'Foldwright', what, about });
}
