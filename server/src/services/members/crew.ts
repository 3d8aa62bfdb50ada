import { crewRole } from '@foldwright/shared/contracts/members';
import type { WorkshopScope } from '../../database/workshop-scope';

/** Roles of those who work in a workshop. Its customers have a membership too, but come and go through the shop. */
export const CREW = crewRole.options;

/** One after the other where members come, go and change: two owners can't demote each other at once. */
export async function lockMembers(scope: WorkshopScope): Promise<void> {
  await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('members:' || $1, 0))", [scope.workshopId]);
}
