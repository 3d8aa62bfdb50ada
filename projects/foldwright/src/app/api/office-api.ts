import { Injectable, inject } from '@angular/core';
import {
  type Mail,
  type auditEntrySchema,
  listAuditTrail,
  listMails,
  listMembers,
  type memberSchema,
  readInstallation,
} from '@foldwright/shared/contracts/office';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import { readHealth } from '@foldwright/shared/contracts/system';
import type * as z from 'zod/mini';
import { ApiClient, type ApiRead } from './api-client';

export type Member = z.output<typeof memberSchema>;
export type AuditEntry = z.output<typeof auditEntrySchema>;
export type Installation = RouteResponse<typeof readInstallation>;
export type Health = RouteResponse<typeof readHealth>;

/** What the office of a workshop sees, and what the operator of an installation sees. */
@Injectable({ providedIn: 'root' })
export class OfficeApi {
  private readonly client = inject(ApiClient);

  mails(wanted: () => boolean = () => true): ApiRead<{ mails: Mail[] }> {
    return this.client.read(listMails, () => (wanted() ? {} : undefined));
  }

  members(wanted: () => boolean = () => true): ApiRead<{ members: Member[] }> {
    return this.client.read(listMembers, () => (wanted() ? {} : undefined));
  }

  auditTrail(wanted: () => boolean = () => true): ApiRead<{ entries: AuditEntry[] }> {
    return this.client.read(listAuditTrail, () => (wanted() ? {} : undefined));
  }

  installation(): ApiRead<Installation> {
    return this.client.read(readInstallation, () => ({}));
  }

  health(): ApiRead<Health> {
    return this.client.read(readHealth, () => ({}));
  }
}
