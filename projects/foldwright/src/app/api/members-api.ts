import { Injectable, inject } from '@angular/core';
import {
  type CrewRole,
  type Invitation,
  changeMemberRole,
  inviteMember,
  listInvitations,
  readInvitation,
  removeMember,
  withdrawInvitation,
} from '@foldwright/shared/contracts/members';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import { ApiClient, type ApiRead } from './api-client';

/** Members of the workshop and invitations to it. */
@Injectable({ providedIn: 'root' })
export class MembersApi {
  private readonly client = inject(ApiClient);

  invitations(wanted: () => boolean): ApiRead<{ invitations: Invitation[] }> {
    return this.client.read(listInvitations, () => (wanted() ? {} : undefined));
  }

  invite(email: string, role: CrewRole, idempotencyKey: string): Promise<Invitation> {
    return this.client.call(inviteMember, { body: { email, role }, idempotencyKey });
  }

  async withdraw(invitationId: string): Promise<void> {
    await this.client.call(withdrawInvitation, { params: { invitationId } });
  }

  async changeRole(memberId: string, role: CrewRole, revision: number): Promise<void> {
    await this.client.call(changeMemberRole, { params: { memberId }, body: { role }, ifMatch: revision });
  }

  async remove(memberId: string, revision: number): Promise<void> {
    await this.client.call(removeMember, { params: { memberId }, ifMatch: revision });
  }

  invitation(link: () => string): ApiRead<RouteResponse<typeof readInvitation>> {
    return this.client.read(readInvitation, () => ({ params: { link: link() } }));
  }
}
