import type { ModelStatic, Sequelize, Transaction } from 'sequelize';
import type { WorkshopRow } from '../database/scoped-rows';
import { ScopedRows } from '../database/scoped-rows';
import { defineAuditEntry } from './audit-entry';
import { defineCommandBatch } from './command-batch';
import { defineDraft } from './draft';
import { defineIdempotencyKey } from './idempotency-key';
import { defineJob } from './job';
import { defineMail } from './mail';
import { defineMembership } from './membership';
import { defineOrder } from './order';
import { defineOrderEvent } from './order-event';
import { definePart } from './part';
import { definePhoto } from './photo';
import { defineQuote } from './quote';
import { defineRevision } from './revision';
import { defineRevisionFile } from './revision-file';
import { defineUser } from './user';
import { defineWebhookEvent } from './webhook-event';
import { defineWorkshop } from './workshop';

/** Every table of the application on one connection. */
export function defineModels(sequelize: Sequelize) {
  return {
    sequelize,
    workshops: defineWorkshop(sequelize),
    users: defineUser(sequelize),
    memberships: defineMembership(sequelize),
    auditEntries: defineAuditEntry(sequelize),
    idempotencyKeys: defineIdempotencyKey(sequelize),
    parts: definePart(sequelize),
    drafts: defineDraft(sequelize),
    commandBatches: defineCommandBatch(sequelize),
    revisions: defineRevision(sequelize),
    revisionFiles: defineRevisionFile(sequelize),
    photos: definePhoto(sequelize),
    jobs: defineJob(sequelize),
    quotes: defineQuote(sequelize),
    orders: defineOrder(sequelize),
    orderEvents: defineOrderEvent(sequelize),
    mails: defineMail(sequelize),
    webhookEvents: defineWebhookEvent(sequelize),
  };
}
export type Models = ReturnType<typeof defineModels>;

/** A repository for each table that belongs to workshops, bound to one workshop and one transaction. */
export function workshopRows(models: Models, workshopId: string, transaction: Transaction) {
  const of = <M extends WorkshopRow>(model: ModelStatic<M>) => new ScopedRows(model, workshopId, transaction);
  return {
    memberships: of(models.memberships),
    auditEntries: of(models.auditEntries),
    idempotencyKeys: of(models.idempotencyKeys),
    parts: of(models.parts),
    drafts: of(models.drafts),
    commandBatches: of(models.commandBatches),
    revisions: of(models.revisions),
    revisionFiles: of(models.revisionFiles),
    photos: of(models.photos),
    jobs: of(models.jobs),
    quotes: of(models.quotes),
    orders: of(models.orders),
    orderEvents: of(models.orderEvents),
    mails: of(models.mails),
    webhookEvents: of(models.webhookEvents),
  };
}
export type WorkshopRows = ReturnType<typeof workshopRows>;
