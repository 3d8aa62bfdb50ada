import * as z from 'zod/mini';
import { defineRoute } from './route';
import { oneLine, rowId, timestamp } from './scalars';
import { sessionSchema } from './session';

/** Roles that an owner gives: customers come through the shop, operators through the installation. */
export const crewRole = z.enum(['owner', 'fabricator', 'viewer']);
export type CrewRole = z.output<typeof crewRole>;

export const LEAST_PASSWORD = 10;
const newPassword = z.string().check(z.minLength(LEAST_PASSWORD), z.maxLength(200));

const workshopInput = {
  workshopName: oneLine(80),
  /** Letters that part numbers begin with. */
  numberPrefix: z.string().check(z.regex(/^[A-Z]{1,4}$/)),
};

export const invitationSchema = z.object({
  id: rowId,
  email: z.string(),
  role: crewRole,
  invitedBy: z.string(),
  sentAt: timestamp,
  expiresAt: timestamp,
});
export type Invitation = z.output<typeof invitationSchema>;

/** Why an invitation can't be accepted any more. */
const invitationEnd = z.enum(['used', 'expired', 'replaced', 'withdrawn']);
export type InvitationEnd = z.output<typeof invitationEnd>;
/** What the problem `invitation-ended` says in `extra`. */
export const endedInvitation = z.object({ reason: invitationEnd });

const link = z.strictObject({ link: z.string().check(z.regex(/^[A-Za-z0-9_-]{20,80}$/)) });
const owners = ['owner'] as const;

export const signUp = defineRoute({
  id: 'signUp',
  method: 'POST',
  path: '/api/sign-up',
  tag: 'session',
  access: 'public',
  summary: 'Make an account and a workshop that it owns, and sign in',
  body: z.strictObject({ name: oneLine(80), email: z.email(), password: newPassword, ...workshopInput }),
  bodyKind: 'json',
  answer: 'json',
  response: sessionSchema,
  successStatus: 201,
  problems: ['already-exists', 'too-many-requests'],
});
export const createWorkshop = defineRoute({
  id: 'createWorkshop',
  method: 'POST',
  path: '/api/workshops',
  tag: 'session',
  access: 'signed-in',
  summary: 'Make another workshop and work in it',
  body: z.strictObject(workshopInput),
  bodyKind: 'json',
  answer: 'json',
  response: sessionSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists', 'too-many-requests'],
});
export const listInvitations = defineRoute({
  id: 'listInvitations',
  method: 'GET',
  path: '/api/office/invitations',
  tag: 'office',
  access: owners,
  summary: 'Invitations that nobody accepted yet, those too old included',
  answer: 'json',
  response: z.object({ invitations: z.array(invitationSchema) }),
  successStatus: 200,
});
export const inviteMember = defineRoute({
  id: 'inviteMember',
  method: 'POST',
  path: '/api/office/invitations',
  tag: 'office',
  access: owners,
  summary: 'Invite somebody by mail; an earlier invitation of the same address ends',
  body: z.strictObject({ email: z.email(), role: crewRole }),
  bodyKind: 'json',
  answer: 'json',
  response: invitationSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists', 'too-many-requests'],
});
export const withdrawInvitation = defineRoute({
  id: 'withdrawInvitation',
  method: 'DELETE',
  path: '/api/office/invitations/:invitationId',
  tag: 'office',
  access: owners,
  summary: 'Withdraw an invitation: its link opens nothing any more',
  params: z.strictObject({ invitationId: rowId }),
  answer: 'empty',
  successStatus: 204,
});
export const changeMemberRole = defineRoute({
  id: 'changeMemberRole',
  method: 'PUT',
  path: '/api/office/members/:memberId/role',
  tag: 'office',
  access: owners,
  summary: 'Change what a member may do; a workshop keeps at least one owner',
  params: z.strictObject({ memberId: rowId }),
  body: z.strictObject({ role: crewRole }),
  bodyKind: 'json',
  answer: 'empty',
  successStatus: 204,
  ifMatch: true,
  problems: ['wrong-state', 'stale-row'],
});
export const removeMember = defineRoute({
  id: 'removeMember',
  method: 'DELETE',
  path: '/api/office/members/:memberId',
  tag: 'office',
  access: owners,
  summary: 'Remove a member; their work stays, and their next request finds the workshop gone',
  params: z.strictObject({ memberId: rowId }),
  answer: 'empty',
  successStatus: 204,
  ifMatch: true,
  problems: ['wrong-state', 'stale-row'],
});
export const readInvitation = defineRoute({
  id: 'readInvitation',
  method: 'GET',
  path: '/api/invitation-links/:link',
  tag: 'session',
  access: 'public',
  summary: 'What an invitation is for; 410 with the reason once it is used, replaced, withdrawn or too old',
  params: link,
  answer: 'json',
  response: z.object({
    workshopName: z.string(),
    role: crewRole,
    invitedBy: z.string(),
    email: z.string(),
    /** Whether the address has an account: then its owner signs in, else chooses a name and a password. */
    hasAccount: z.boolean(),
  }),
  successStatus: 200,
  problems: ['invitation-ended'],
});
export const acceptInvitation = defineRoute({
  id: 'acceptInvitation',
  method: 'POST',
  path: '/api/invitation-links/:link/acceptance',
  tag: 'session',
  access: 'public',
  summary: 'Join: signed in as the invited address, or with a new account for it',
  params: link,
  body: z.strictObject({ account: z.nullable(z.strictObject({ name: oneLine(80), password: newPassword })) }),
  bodyKind: 'json',
  answer: 'json',
  response: sessionSchema,
  successStatus: 200,
  problems: ['wrong-state', 'not-signed-in', 'invitation-ended', 'too-many-requests'],
});
