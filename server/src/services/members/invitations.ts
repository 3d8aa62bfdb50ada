import { createHash, randomBytes } from 'node:crypto';
import type { CrewRole, Invitation as InvitationContract } from '@foldwright/shared/contracts/members';
import { inviteMember as inviteContract, invitationSchema } from '@foldwright/shared/contracts/members';
import type { AppDependencies } from '../../app-dependencies';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Invitation } from '../../models/invitation';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { writeMail } from '../write-mail';
import { CREW, lockMembers } from './crew';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

const LASTS_MS = 7 * 24 * 3600 * 1000;

/** Letters of invitations have keys that begin so. Their links let people in, so only owners get to read them. */
export const INVITATION_MAILS = 'invitation:';

/** What is stored of a link. */
export const hashOfLink = (link: string): string => createHash('sha256').update(link).digest('hex');

const present = ({ id, email, role, invitedByName, sentAt, expiresAt }: Invitation): InvitationContract => ({
  ...{ id, email, role, invitedBy: invitedByName },
  sentAt: sentAt.toISOString(),
  expiresAt: expiresAt.toISOString(),
});

/** Invitations that nobody accepted or withdrew, the newest first; those too old as well, so that they can be sent again. */
export function listInvitations(database: Database, { workshopId }: Member): Promise<InvitationContract[]> {
  return database.viewWorkshop(workshopId, async ({ rows }) => {
    const order: [string, string][] = [
      ['sentAt', 'DESC'],
      ['id', 'ASC'],
    ];
    return (await rows.invitations.list({ where: { endedAt: null }, order })).map(present);
  });
}

async function refuseCrew(scope: WorkshopScope, email: string): Promise<void> {
  const user = await scope.models.users.findOne({ where: { email }, transaction: scope.transaction });
  if (user === null || (await scope.rows.memberships.count({ userId: user.id, role: [...CREW] })) === 0) return;
  throw new Problem('already-exists', {
    detail: `${user.name} belongs to the workshop already.`,
    kept: 'No mail was sent.',
    next: 'Change the role in the list of members.',
  });
}

/**
 * Invite somebody by mail, once under the caller's key. An earlier invitation of the same address ends: only the newest
 * link opens. A customer may be invited too, and becomes one of the crew.
 * @throws Problem `already-exists` for somebody who belongs to the crew
 */
export function inviteMember(
  { database, queue, publicUrl, now }: Tools,
  actor: Member,
  wish: { readonly email: string; readonly role: CrewRole },
  key: string,
): Promise<InvitationContract> {
  const { workshopId, userId, userName, workshopName } = actor;
  const { role } = wish;
  const email = wish.email.toLowerCase();
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: inviteContract.id, key, request: { email, role } }, invitationSchema, async () => {
      await lockMembers(scope);
      await refuseCrew(scope, email);
      const at = now();
      const replaced = await scope.rows.invitations.changeWhere({ email, endedAt: null }, { endedAt: at });
      const link = randomBytes(32).toString('base64url');
      const invitation = await scope.rows.invitations.add({
        ...{ email, role, linkHash: hashOfLink(link), invitedBy: userId, invitedByName: userName, sentAt: at },
        expiresAt: new Date(at.getTime() + LASTS_MS),
      });
      const what = replaced === 0 ? `Invited ${email} as ${role}` : `Invited ${email} again, as ${role}`;
      await recordAudit(scope, actor, what, null);
      const body = [
        'Hello,',
        `${userName} invites you to ${workshopName} as ${role}.`,
        `Open this within seven days; it works once: ${publicUrl}/invitation/${link}`,
        'If you expected nothing like it, let it be: nothing happens.',
      ];
      const subject = `${userName} invites you to ${workshopName}`;
      const mail = { key: `${INVITATION_MAILS}${invitation.id}`, orderId: null, recipient: email, subject };
      await writeMail(scope, queue, { ...mail, body: `${body.join('\n\n')}\n` }, at);
      recordEvent(scope, { kind: 'members-changed' });
      return present(invitation);
    }),
  );
}

/** Withdraw an invitation. One that has ended already stays as it is. @throws Problem `not-found` */
export function withdrawInvitation({ database, now }: Tools, actor: Member, invitationId: string): Promise<void> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    await lockMembers(scope);
    const invitation = await scope.rows.invitations.get(invitationId, { lock: true });
    if (invitation.endedAt !== null) return;
    await scope.rows.invitations.change(invitation, { endedAt: now() });
    await recordAudit(scope, actor, `Withdrew the invitation of ${invitation.email}`, null);
    recordEvent(scope, { kind: 'members-changed' });
  });
}
