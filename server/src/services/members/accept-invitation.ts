import type { CrewRole, InvitationEnd } from '@foldwright/shared/contracts/members';
import { Op } from 'sequelize';
import * as z from 'zod/mini';
import type { AppDependencies } from '../../app-dependencies';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import { Problem, notFound } from '../../http/problem';
import type { Visitor } from '../../http/visitor';
import type { Invitation } from '../../models/invitation';
import { hashPassword } from '../password-hash';
import { recordAudit } from '../record-audit';
import { CREW, lockMembers } from './crew';
import { hashOfLink } from './invitations';
import { addAccount } from './workshops';

type Tools = Pick<AppDependencies, 'database' | 'now'>;

const workshopRow = z.object({ workshop_id: z.uuid() });

const END_WORDS: Readonly<Record<InvitationEnd, { readonly detail: string; readonly next: string }>> = {
  used: { detail: 'It was accepted already, and works only once.', next: 'Sign in to work in the workshop.' },
  expired: { detail: 'It is older than seven days.', next: 'Ask whoever invited you to send it again.' },
  replaced: { detail: 'A newer one was sent to the same address.', next: 'Open the link of the newest mail.' },
  withdrawn: { detail: 'It was withdrawn.', next: 'Ask whoever invited you, if you expected something else.' },
};

async function findWorkshop(database: Database, link: string): Promise<string> {
  const found = await database.asSystem('find the workshop of an invitation', async ({ select }) =>
    select('SELECT workshop_id FROM invitations WHERE link_hash = $1', [hashOfLink(link)]),
  );
  const [row] = found.map((one) => workshopRow.parse(one));
  if (row === undefined) throw notFound();
  return row.workshop_id;
}

async function invitationOf(scope: WorkshopScope, link: string): Promise<Invitation> {
  const invitation = await scope.rows.invitations.findOne({ linkHash: hashOfLink(link) }, { lock: true });
  if (invitation === null) throw notFound();
  return invitation;
}

/** Why an invitation can't be accepted any more; null while it can. */
async function endOf(scope: WorkshopScope, invitation: Invitation, now: Date): Promise<InvitationEnd | null> {
  const { email, endedAt, acceptedBy, expiresAt } = invitation;
  if (acceptedBy !== null) return 'used';
  if (endedAt === null) return expiresAt <= now ? 'expired' : null;
  return (await scope.rows.invitations.count({ email, sentAt: { [Op.gte]: endedAt } })) > 0 ? 'replaced' : 'withdrawn';
}

/** @throws Problem `invitation-ended`; it says nothing of workshop and people, since the link may be in other hands by now */
async function refuseEnded(scope: WorkshopScope, invitation: Invitation, now: Date): Promise<void> {
  const reason = await endOf(scope, invitation, now);
  if (reason === null) return;
  throw new Problem('invitation-ended', { ...END_WORDS[reason], kept: 'Nothing was changed.', extra: { reason } });
}

export interface InvitationView {
  readonly workshopName: string;
  readonly role: CrewRole;
  readonly invitedBy: string;
  readonly email: string;
  readonly hasAccount: boolean;
}

/** What an invitation is for. @throws Problem `not-found`, `invitation-ended` */
export async function readInvitation({ database, now }: Tools, link: string): Promise<InvitationView> {
  const workshopId = await findWorkshop(database, link);
  return database.inWorkshop(workshopId, async (scope) => {
    const invitation = await invitationOf(scope, link);
    await refuseEnded(scope, invitation, now());
    const { email, role, invitedByName } = invitation;
    const hasAccount = (await scope.models.users.count({ where: { email }, transaction: scope.transaction })) > 0;
    return { workshopName: (await scope.workshop()).name, role, invitedBy: invitedByName, email, hasAccount };
  });
}

interface Joining {
  readonly userId: string;
  readonly userName: string;
}

/**
 * Join a workshop: as whoever is signed in when the address is theirs, or with a new account for it, which is made in the
 * same transaction. Pressing twice joins once.
 * @returns who has joined where
 * @throws Problem `not-found`, `invitation-ended`, `not-signed-in` when the address has an account, `wrong-state` for
 *   somebody else's address
 */
export async function acceptInvitation(
  { database, now }: Tools,
  visitor: Visitor,
  link: string,
  account: { readonly name: string; readonly password: string } | null,
): Promise<{ readonly userId: string; readonly workshopId: string }> {
  const workshopId = await findWorkshop(database, link);
  const newAccount =
    visitor.user !== null || account === null
      ? null
      : { name: account.name, passwordHash: await hashPassword(account.password) };
  return database.inWorkshop(workshopId, async (scope) => {
    await lockMembers(scope);
    const invitation = await invitationOf(scope, link);
    const joined = await joinedBefore(scope, visitor, invitation);
    if (joined !== null) return { userId: joined, workshopId };
    await refuseEnded(scope, invitation, now());
    const { userId, userName } = await whoJoins(scope, visitor, invitation, newAccount);
    const membership = await scope.rows.memberships.findOne({ userId }, { lock: true });
    if (membership === null) await scope.rows.memberships.add({ userId, role: invitation.role });
    else await scope.rows.memberships.change(membership, { role: invitation.role, revision: membership.revision + 1 });
    await scope.rows.invitations.change(invitation, { endedAt: now(), acceptedBy: userId });
    await recordAudit(scope, { userId, userName }, `Joined as ${invitation.role}`, invitation.email);
    recordEvent(scope, { kind: 'members-changed' });
    return { userId, workshopId };
  });
}

/** The visitor, when this very invitation let them in and they belong to the crew still: a second press. Else null. */
async function joinedBefore(
  scope: WorkshopScope,
  { user }: Visitor,
  { acceptedBy }: Invitation,
): Promise<string | null> {
  if (user === null || acceptedBy !== user.id) return null;
  return (await scope.rows.memberships.count({ userId: user.id, role: [...CREW] })) > 0 ? user.id : null;
}

async function whoJoins(
  scope: WorkshopScope,
  { user }: Visitor,
  { email }: Invitation,
  account: { readonly name: string; readonly passwordHash: string } | null,
): Promise<Joining> {
  if (user !== null) {
    if (user.email === email) return { userId: user.id, userName: user.name };
    throw new Problem('wrong-state', {
      detail: `The invitation is for ${email}; you are signed in as ${user.email}.`,
      kept: 'The invitation can still be accepted.',
      next: `Sign out, then open the link again as ${email}.`,
    });
  }
  if ((await scope.models.users.count({ where: { email }, transaction: scope.transaction })) > 0) {
    throw new Problem('not-signed-in', {
      detail: `${email} has an account.`,
      kept: 'The invitation can still be accepted.',
      next: 'Sign in with it, then join.',
    });
  }
  if (account === null) {
    throw new Problem('invalid-input', {
      detail: 'A new account needs a name and a password.',
      errors: [{ pointer: '/account', detail: 'This is missing.' }],
    });
  }
  return { userId: await addAccount(scope, { ...account, email }), userName: account.name };
}
