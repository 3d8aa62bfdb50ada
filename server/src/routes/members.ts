import * as contracts from '@foldwright/shared/contracts/members';
import type { Session } from '@foldwright/shared/contracts/session';
import type { Request } from 'express';
import type { AppDependencies } from '../app-dependencies';
import { csrfTokenOf } from '../http/csrf';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { signInAs } from '../http/sign-in';
import { presentSession } from '../presenters/session';
import { loadVisitor } from '../services/load-visitor';
import { changeMemberRole, removeMember } from '../services/members/change-member';
import { acceptInvitation, readInvitation } from '../services/members/accept-invitation';
import { inviteMember, listInvitations, withdrawInvitation } from '../services/members/invitations';
import { addOwnedWorkshop, signUp } from '../services/members/workshops';

export function memberRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, limits } = dependencies;
  /** The session as it is after somebody began to work in a workshop. */
  const enter = async (request: Request, userId: string, workshopId: string): Promise<Session> => {
    request.session.workshopId = workshopId;
    return presentSession(await loadVisitor(database, userId, workshopId), csrfTokenOf(request));
  };

  return [
    bind(contracts.signUp, async ({ body, request }) => {
      await limits.countSignUp(request);
      const { userId, workshopId } = await signUp(database, body);
      await signInAs(request, userId);
      return enter(request, userId, workshopId);
    }),
    bind(contracts.createWorkshop, async ({ actor, body, idempotencyKey, request }) => {
      await limits.countSignUp(request);
      const { id: userId, name: userName } = actor.user;
      return enter(request, userId, await addOwnedWorkshop(database, { userId, userName }, body, idempotencyKey));
    }),
    bind(contracts.listInvitations, async ({ actor }) => ({
      invitations: await listInvitations(database, actor),
    })),
    bind(contracts.inviteMember, async ({ actor, body, idempotencyKey }) => {
      await limits.countInvitation(actor.workshopId);
      return inviteMember(dependencies, actor, body, idempotencyKey);
    }),
    bind(contracts.withdrawInvitation, ({ actor, params }) =>
      withdrawInvitation(dependencies, actor, params.invitationId),
    ),
    bind(contracts.changeMemberRole, ({ actor, params, body, ifMatch }) =>
      changeMemberRole(dependencies, actor, params.memberId, body.role, ifMatch),
    ),
    bind(contracts.removeMember, ({ actor, params, ifMatch }) =>
      removeMember(dependencies, actor, params.memberId, ifMatch),
    ),
    bind(contracts.readInvitation, ({ params }) => readInvitation(dependencies, params.link)),
    bind(contracts.acceptInvitation, async ({ actor, params, body, request }) => {
      await limits.countVisitorPost(request);
      const { userId, workshopId } = await acceptInvitation(dependencies, actor, params.link, body.account);
      if (actor.user === null) await signInAs(request, userId);
      return enter(request, userId, workshopId);
    }),
  ];
}
