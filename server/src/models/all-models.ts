import type { ModelStatic, Sequelize, Transaction } from 'sequelize';
import type { WorkshopRow } from '../database/scoped-rows';
import { ScopedRows } from '../database/scoped-rows';
import { defineAuditEntry } from './audit-entry';
import { defineCommandBatch } from './command-batch';
import { defineComment } from './comment';
import { defineCutAssignment } from './cut-assignment';
import { defineDraft } from './draft';
import { defineHardwareItem } from './hardware-item';
import { defineIdempotencyKey } from './idempotency-key';
import { defineInvitation } from './invitation';
import { defineJob } from './job';
import { defineKit } from './kit';
import { defineKitLine } from './kit-line';
import { defineLedgerEntry } from './ledger-entry';
import { defineLedgerPosting } from './ledger-posting';
import { defineListing } from './listing';
import { defineListingPhoto } from './listing-photo';
import { defineMail } from './mail';
import { defineMembership } from './membership';
import { defineOpinion } from './opinion';
import { defineOrder } from './order';
import { defineOrderEvent } from './order-event';
import { definePart } from './part';
import { definePartHardware } from './part-hardware';
import { definePhoto } from './photo';
import { defineQuestion } from './question';
import { defineQuestionMessage } from './question-message';
import { defineQuote } from './quote';
import { defineRefund } from './refund';
import { defineReviewLink } from './review-link';
import { defineRevision } from './revision';
import { defineRevisionFile } from './revision-file';
import { defineSale } from './sale';
import { defineSaleFact } from './sale-fact';
import { defineSaleItem } from './sale-item';
import { defineSaleLine } from './sale-line';
import { defineShipment } from './shipment';
import { defineShipmentItem } from './shipment-item';
import { defineShop } from './shop';
import { defineStockMove } from './stock-move';
import { defineStockPosition } from './stock-position';
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
    reviewLinks: defineReviewLink(sequelize),
    comments: defineComment(sequelize),
    opinions: defineOpinion(sequelize),
    invitations: defineInvitation(sequelize),
    hardwareItems: defineHardwareItem(sequelize),
    partHardware: definePartHardware(sequelize),
    kits: defineKit(sequelize),
    kitLines: defineKitLine(sequelize),
    stockPositions: defineStockPosition(sequelize),
    stockMoves: defineStockMove(sequelize),
    shops: defineShop(sequelize),
    listings: defineListing(sequelize),
    listingPhotos: defineListingPhoto(sequelize),
    sales: defineSale(sequelize),
    saleLines: defineSaleLine(sequelize),
    saleItems: defineSaleItem(sequelize),
    saleFacts: defineSaleFact(sequelize),
    shipments: defineShipment(sequelize),
    shipmentItems: defineShipmentItem(sequelize),
    refunds: defineRefund(sequelize),
    cutAssignments: defineCutAssignment(sequelize),
    questions: defineQuestion(sequelize),
    questionMessages: defineQuestionMessage(sequelize),
    ledgerEntries: defineLedgerEntry(sequelize),
    ledgerPostings: defineLedgerPosting(sequelize),
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
    reviewLinks: of(models.reviewLinks),
    comments: of(models.comments),
    opinions: of(models.opinions),
    invitations: of(models.invitations),
    hardwareItems: of(models.hardwareItems),
    partHardware: of(models.partHardware),
    kits: of(models.kits),
    kitLines: of(models.kitLines),
    stockPositions: of(models.stockPositions),
    stockMoves: of(models.stockMoves),
    shops: of(models.shops),
    listings: of(models.listings),
    listingPhotos: of(models.listingPhotos),
    sales: of(models.sales),
    saleLines: of(models.saleLines),
    saleItems: of(models.saleItems),
    saleFacts: of(models.saleFacts),
    shipments: of(models.shipments),
    shipmentItems: of(models.shipmentItems),
    refunds: of(models.refunds),
    cutAssignments: of(models.cutAssignments),
    questions: of(models.questions),
    questionMessages: of(models.questionMessages),
    ledgerEntries: of(models.ledgerEntries),
    ledgerPostings: of(models.ledgerPostings),
  };
}
export type WorkshopRows = ReturnType<typeof workshopRows>;
