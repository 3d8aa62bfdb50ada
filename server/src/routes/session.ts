import type { Session } from '@foldwright/shared/contracts/session';
import * as contracts from '@foldwright/shared/contracts/session';
import type { Request } from 'express';
import type { AppDependencies } from '../app-dependencies';
import { csrfTokenOf } from '../http/csrf';
import { Problem } from '../http/problem';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { SESSION_COOKIE } from '../http/session';
import { endSession, signInWithPassword } from '../http/sign-in';
import type { Visitor } from '../http/visitor';
import { presentSession } from '../presenters/session';
import { changeOwnName } from '../services/change-own-name';
import { loadVisitor } from '../services/load-visitor';

export function sessionRoutes({ database, authenticator, limits }: AppDependencies): BoundRoute[] {
  const present = (visitor: Visitor, request: Request): Session => presentSession(visitor, csrfTokenOf(request));
  const reload = async (userId: string, request: Request): Promise<Session> =>
    present(await settle(await loadVisitor(database, userId, request.session.workshopId), request), request);
  /** The session works in the workshop that its page shows, until somebody switches; in another when that one is lost. */
  const settle = async (visitor: Visitor, request: Request): Promise<Visitor> => {
    const { user, memberships, current } = visitor;
    const settled =
      user !== null && current === null && memberships.length > 0
        ? await loadVisitor(database, user.id, undefined)
        : visitor;
    if (settled.current !== null) request.session.workshopId = settled.current.workshopId;
    return settled;
  };

  return [
    bind(contracts.readSession, async ({ actor, request }) => present(await settle(actor, request), request)),
    bind(contracts.signIn, async ({ body, request }) => {
      const address = request.ip ?? 'unknown';
      const email = body.email.toLowerCase();
      await limits.countSignIn(address, email);
      const userId = await signInWithPassword(authenticator, request);
      if (userId === null) {
        throw new Problem('wrong-sign-in', { detail: 'No account has this e-mail with this password.' });
      }
      await limits.forgiveSignIn(address, email);
      return reload(userId, request);
    }),
    bind(contracts.signOut, async ({ request, response }) => {
      await endSession(request);
      response.clearCookie(SESSION_COOKIE, { path: '/' });
    }),
    bind(contracts.switchWorkshop, async ({ actor, body, request }) => {
      if (!actor.memberships.some((one) => one.workshopId === body.workshopId)) {
        throw new Problem('not-found', { detail: 'You belong to no such workshop.' });
      }
      request.session.workshopId = body.workshopId;
      return reload(actor.user.id, request);
    }),
    bind(contracts.changeOwnName, async ({ actor, body, request }) => {
      await changeOwnName(database, actor.user.id, body.name);
      return reload(actor.user.id, request);
    }),
  ];
}
