import * as z from 'zod/mini';
import { ROLES, defineRoute } from './route';
import { oneLine, rowId } from './scalars';

export const membershipSchema = z.object({ workshopId: rowId, workshopName: z.string(), role: z.enum(ROLES) });

export const sessionSchema = z.object({
  /** Null when nobody is signed in. */
  user: z.nullable(z.object({ id: rowId, name: z.string(), email: z.string(), isOperator: z.boolean() })),
  memberships: z.array(membershipSchema),
  /** The workshop that requests of this session work in. */
  current: z.nullable(membershipSchema),
  /** To be sent as `x-csrf-token` with every change. */
  csrfToken: z.string(),
});
export type Session = z.output<typeof sessionSchema>;

const signInSchema = z.strictObject({ email: z.email(), password: z.string().check(z.minLength(1), z.maxLength(200)) });

export const readSession = defineRoute({
  id: 'readSession',
  method: 'GET',
  path: '/api/session',
  tag: 'session',
  access: 'public',
  summary: 'Who is signed in, in which workshop, and the token for changes',
  answer: 'json',
  response: sessionSchema,
  successStatus: 200,
});
export const signIn = defineRoute({
  id: 'signIn',
  method: 'POST',
  path: '/api/session',
  tag: 'session',
  access: 'public',
  summary: 'Sign in with e-mail and password',
  body: signInSchema,
  bodyKind: 'json',
  answer: 'json',
  response: sessionSchema,
  successStatus: 200,
  problems: ['wrong-sign-in', 'too-many-requests'],
});
export const signOut = defineRoute({
  id: 'signOut',
  method: 'DELETE',
  path: '/api/session',
  tag: 'session',
  access: 'signed-in',
  summary: 'Sign out',
  answer: 'empty',
  successStatus: 204,
});
export const switchWorkshop = defineRoute({
  id: 'switchWorkshop',
  method: 'PUT',
  path: '/api/session/workshop',
  tag: 'session',
  access: 'signed-in',
  summary: 'Work in another of one’s workshops',
  body: z.strictObject({ workshopId: rowId }),
  bodyKind: 'json',
  answer: 'json',
  response: sessionSchema,
  successStatus: 200,
});
export const changeOwnName = defineRoute({
  id: 'changeOwnName',
  method: 'PATCH',
  path: '/api/session/user',
  tag: 'session',
  access: 'signed-in',
  summary: 'Change the name others see',
  body: z.strictObject({ name: oneLine(80) }),
  bodyKind: 'json',
  answer: 'json',
  response: sessionSchema,
  successStatus: 200,
});
