import type { CrewRole } from '@foldwright/shared/contracts/members';
import type { AppDependencies } from '../../app-dependencies';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import { Problem, notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Membership } from '../../models/membership';
import type { User } from '../../models/user';
import { recordAudit } from '../record-audit';
import { refuseStale } from '../refuse-stale';
import { writeMail } from '../write-mail';
import { CREW, lockMembers } from './crew';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'now'>;

interface Found {
  readonly membership: Membership;
  readonly user: User;
}

async function findMember(scope: WorkshopScope, memberId: string, seenRevision: number): Promise<Found> {
  await lockMembers(scope);
  const membership = await scope.rows.memberships.findOne({ userId: memberId, role: [...CREW] }, { lock: true });
  if (membership === null) throw notFound();
  refuseStale(membership, seenRevision);
  const user = await scope.models.users.findByPk(memberId, { transaction: scope.transaction, rejectOnEmpty: true });
  return { membership, user };
}

/** @throws Problem `wrong-state` when nobody would own the workshop any more */
async function refuseLastOwner(scope: WorkshopScope, membership: Membership): Promise<void> {
  if (membership.role !== 'owner' || (await scope.rows.memberships.count({ role: 'owner' })) > 1) return;
  throw new Problem('wrong-state', {
    detail: 'A workshop has at least one owner, and this is the last.',
    kept: 'Nothing was changed.',
    next: 'Make somebody else an owner first.',
  });
}

/** Writes to the person concerned and wakes open pages and streams: who was removed hears nothing any more. */
async function tell(
  scope: WorkshopScope,
  { queue, now }: Tools,
  actor: Member,
  { membership, user }: Found,
  what: string,
): Promise<void> {
  // Before the mail, so that whoever was removed isn't even told of that.
  recordEvent(scope, { kind: 'members-changed' });
  const body = [`Hello ${user.name},`, `${actor.userName} has ${what}.`, 'Ask them if you expected nothing like it.'];
  const key = `member:${membership.id}:${membership.revision}`;
  const subject = `${actor.workshopName}: your membership`;
  await writeMail(
    scope,
    queue,
    { key, orderId: null, recipient: user.email, subject, body: `${body.join('\n\n')}\n` },
    now(),
  );
}

/** Change what a member may do; it counts from their next request on. @throws Problem `not-found`, `stale-row`, `wrong-state` */
export function changeMemberRole(
  tools: Tools,
  actor: Member,
  memberId: string,
  role: CrewRole,
  seenRevision: number,
): Promise<void> {
  return tools.database.inWorkshop(actor.workshopId, async (scope) => {
    const found = await findMember(scope, memberId, seenRevision);
    const { membership, user } = found;
    if (membership.role === role) return;
    await refuseLastOwner(scope, membership);
    await scope.rows.memberships.change(membership, { role, revision: membership.revision + 1 });
    await recordAudit(scope, actor, `Made ${user.name} ${role}`, user.email);
    await tell(scope, tools, actor, found, `made you ${role} of ${actor.workshopName}`);
  });
}

/** Remove a member; what they did stays. @throws Problem `not-found`, `stale-row`, `wrong-state` */
export function removeMember(tools: Tools, actor: Member, memberId: string, seenRevision: number): Promise<void> {
  return tools.database.inWorkshop(actor.workshopId, async (scope) => {
    const found = await findMember(scope, memberId, seenRevision);
    const { membership, user } = found;
    await refuseLastOwner(scope, membership);
    // The number of its last change belongs to its mail: each change of a membership has one of its own.
    await scope.rows.memberships.change(membership, { revision: membership.revision + 1 });
    await scope.rows.memberships.remove(membership);
    await recordAudit(scope, actor, `Removed ${user.name}`, user.email);
    await tell(scope, tools, actor, found, `taken you off the members of ${actor.workshopName}`);
  });
}
