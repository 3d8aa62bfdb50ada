import { createHash, randomBytes } from 'node:crypto';
import type { CrewRole, Invitation as InvitationContract } from '@foldwright/shared/contracts/members';
import { inviteMember as inviteContract, invitationSchema } from '@foldwright/shared/contracts/members';
import * as z from 'zod/mini';
import type { AppDependencies } from '../../app-dependencies';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem, notFound } from '../../http/problem';
import type { Member, Visitor } from '../../http/visitor';
import type { Invitation } from '../../models/invitation';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { writeMail } from '../write-mail';
import { addAccount } from './workshops';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

const LASTS_MS = 7 * 24 * 3600 * 1000;
const hashOf = (link: string): string => createHash('sha256').update(link).digest('hex');
const workshopRow = z.object({ workshop_id: z.uuid() });

const present = ({ id, email, role, invitedByName, sentAt, expiresAt }: Invitation): InvitationContract => ({
  ...{ id, email, role, invitedBy: invitedByName },
  sentAt: sentAt.toISOString(),
  expiresAt: expiresAt.toISOString(),
});

/** Invitations that can still be accepted, the newest first. */
export function listInvitations(database: Database, { workshopId }: Member, now: Date): Promise<InvitationContract[]> {
  return database.viewWorkshop(workshopId, async ({ rows }) => {
    const open = await rows.invitations.list({ where: { endedAt: null }, order: [['sentAt', 'DESC']] });
    return open.filter(({ expiresAt }) => expiresAt > now).map(present);
  });
}

async function refuseMember(scope: WorkshopScope, email: string): Promise<void> {
  const user = await scope.models.users.findOne({ where: { email }, transaction: scope.transaction });
  if (user === null || (await scope.rows.memberships.count({ userId: user.id })) === 0) return;
  throw new Problem('already-exists', {
    detail: `${user.name} belongs to the workshop already.`,
    kept: 'No mail was sent.',
    next: 'Change the role in the list of members.',
  });
}

/**
 * Invite somebody by mail, once under the caller's key. An earlier invitation of the same address ends: only the newest
 * link opens.
 * @throws Problem `already-exists` for somebody who belongs to the workshop
 */
export function inviteMember(
  { database, queue, publicUrl, now }: Tools,
  actor: Member,
  wish: { readonly email: string; readonly role: CrewRole },
  key: string,
): Promise<InvitationContract> {
  const { workshopId, userId, userName, workshopName } = actor;
  const { role } = wish;
  const email = wish.email.trim().toLowerCase();
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: inviteContract.id, key, request: { email, role } }, invitationSchema, async () => {
      await lockMembers(scope);
      await refuseMember(scope, email);
      const at = now();
      await scope.rows.invitations.changeWhere({ email, endedAt: null }, { endedAt: at });
      const link = randomBytes(32).toString('base64url');
      const invitation = await scope.rows.invitations.add({
        ...{ email, role, linkHash: hashOf(link), invitedBy: userId, invitedByName: userName, sentAt: at },
        expiresAt: new Date(at.getTime() + LASTS_MS),
      });
      await recordAudit(scope, actor, `Invited ${email} as ${role}`, null);
      const body = [
        'Hello,',
        `${userName} invites you to ${workshopName} as ${role}.`,
        `Open this within seven days; it works once: ${publicUrl}/invitation/${link}`,
        'If you expected nothing like it, let it be: nothing happens.',
      ];
      const subject = `${userName} invites you to ${workshopName}`;
      const mail = { key: `invitation:${invitation.id}`, orderId: null, recipient: email, subject };
      await writeMail(scope, queue, { ...mail, body: `${body.join('\n\n')}\n` }, at);
      return present(invitation);
    }),
  );
}

/** One after the other where members come, go and change: two owners can't demote each other at once. */
export async function lockMembers(scope: WorkshopScope): Promise<void> {
  await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('members:' || $1, 0))", [scope.workshopId]);
}

/** Withdraw an invitation. One that has ended already stays as it is. @throws Problem `not-found` */
export function withdrawInvitation({ database, now }: Tools, actor: Member, invitationId: string): Promise<void> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const invitation = await scope.rows.invitations.get(invitationId, { lock: true });
    if (invitation.endedAt !== null) return;
    await scope.rows.invitations.change(invitation, { endedAt: now() });
    await recordAudit(scope, actor, `Withdrew the invitation of ${invitation.email}`, null);
  });
}

async function findWorkshop(database: Database, link: string): Promise<string> {
  const found = await database.asSystem('find the workshop of an invitation', async ({ select }) =>
    select('SELECT workshop_id FROM invitations WHERE link_hash = $1', [hashOf(link)]),
  );
  const [row] = found.map((one) => workshopRow.parse(one));
  if (row === undefined) throw notFound();
  return row.workshop_id;
}

/** The invitation behind a link, as long as it can be accepted. @throws Problem `not-found`, whatever the reason */
async function openInvitation(scope: WorkshopScope, link: string, now: Date): Promise<Invitation> {
  const invitation = await scope.rows.invitations.findOne({ linkHash: hashOf(link) }, { lock: true });
  if (invitation === null || invitation.endedAt !== null || invitation.expiresAt <= now) throw notFound();
  return invitation;
}

export interface InvitationView {
  readonly workshopName: string;
  readonly role: CrewRole;
  readonly invitedBy: string;
  readonly email: string;
  readonly hasAccount: boolean;
}

/** What an invitation is for. @throws Problem `not-found` once it is used, withdrawn or too old */
export async function readInvitation({ database, now }: Tools, link: string): Promise<InvitationView> {
  const workshopId = await findWorkshop(database, link);
  return database.inWorkshop(workshopId, async (scope) => {
    const { email, role, invitedByName } = await openInvitation(scope, link, now());
    const user = await scope.models.users.findOne({ where: { email }, transaction: scope.transaction });
    const { name } = await scope.workshop();
    return { workshopName: name, role, invitedBy: invitedByName, email, hasAccount: user !== null };
  });
}

/**
 * Join a workshop: as whoever is signed in when the address is theirs, or with a new account for it. Accepting twice at
 * once joins once.
 * @returns who has joined where
 * @throws Problem `not-found`, `not-signed-in` when the address has an account, `wrong-state` for somebody else's address
 */
export async function acceptInvitation(
  tools: Tools,
  visitor: Visitor,
  link: string,
  account: { readonly name: string; readonly password: string } | null,
): Promise<{ readonly userId: string; readonly workshopId: string }> {
  const { database } = tools;
  const { email, hasAccount } = await readInvitation(tools, link);
  const workshopId = await findWorkshop(database, link);
  const userId = await whoJoins(database, visitor, { email, hasAccount }, account);
  await database.inWorkshop(workshopId, async (scope) => {
    await lockMembers(scope);
    const invitation = await openInvitation(scope, link, tools.now());
    const user = await scope.models.users.findByPk(userId, { transaction: scope.transaction, rejectOnEmpty: true });
    const membership = await scope.rows.memberships.findOne({ userId });
    if (membership === null) await scope.rows.memberships.add({ userId, role: invitation.role });
    else await scope.rows.memberships.change(membership, { role: invitation.role, revision: membership.revision + 1 });
    await scope.rows.invitations.change(invitation, { endedAt: tools.now(), acceptedBy: userId });
    await recordAudit(scope, { userId, userName: user.name }, `Joined as ${invitation.role}`, invitation.email);
  });
  return { userId, workshopId };
}

async function whoJoins(
  database: Database,
  visitor: Visitor,
  { email, hasAccount }: { readonly email: string; readonly hasAccount: boolean },
  account: { readonly name: string; readonly password: string } | null,
): Promise<string> {
  if (visitor.user !== null) {
    if (visitor.user.email === email) return visitor.user.id;
    throw new Problem('wrong-state', {
      detail: `The invitation is for ${email}; you are signed in as ${visitor.user.email}.`,
      kept: 'The invitation can still be accepted.',
      next: `Sign out, then open the link again as ${email}.`,
    });
  }
  if (hasAccount) {
    throw new Problem('not-signed-in', { detail: `${email} has an account.`, next: 'Sign in with it, then join.' });
  }
  if (account === null) {
    throw new Problem('invalid-input', {
      detail: 'A new account needs a name and a password.',
      errors: [{ pointer: '/account', detail: 'This is missing.' }],
    });
  }
  return addAccount(database, { ...account, email });
}
