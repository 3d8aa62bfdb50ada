import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import type { CustomerOrder } from '@foldwright/shared/contracts/sale-links';
import type { Sale as SaleContract, SaleItem as SaleItemContract } from '@foldwright/shared/contracts/sales';
import * as z from 'zod/mini';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Sale } from '../../models/sale';
import type { SaleItem } from '../../models/sale-item';
import type { PictureOf } from '../../presenters/sales';
import { presentHead, presentItem, presentLine, presentRefund } from '../../presenters/sales';
import { saleEventWords } from '../../presenters/sale-event-words';
import { factRowId } from '../order-rows';
import { presentQuestions } from '../shop/questions';
import { frontOf } from '../shop/storefront';
import { readStoredDocument } from '../stored-document';
import { leftOfPayment } from './ask-refund';
import { shortOf } from './reserve';
import { readSaleFacts } from './sale-rows';
import { paymentsOf, timelineOfSale } from './sale-state';
import { beingCutOf } from './short-items';

async function picturesOf(scope: WorkshopScope, items: readonly SaleItem[]): Promise<ReadonlyMap<string, PictureOf>> {
  const ids = [...new Set(items.flatMap(({ revisionId }) => revisionId ?? []))];
  const revisions = await scope.rows.revisions.list({ where: { id: ids } });
  return new Map(
    revisions.map((revision) => [
      revision.id,
      {
        document: readStoredDocument(revision.document),
        materialLabel: z.parse(computedPartSchema, revision.computedProduction).stockLabel,
      },
    ]),
  );
}

/** Pieces of a sale with everything that is known of them. */
export async function presentItems(scope: WorkshopScope, sale: Sale): Promise<SaleItemContract[]> {
  const items = await scope.rows.saleItems.list({ where: { saleId: sale.id }, order: [['position', 'ASC']] });
  const pictures = await picturesOf(scope, items);
  const cut = await beingCutOf(scope, [sale.id]);
  return items.map((item) => {
    const short = shortOf(item);
    const counts = { short, beingCut: Math.min(short, cut.get(item.id) ?? 0) };
    return presentItem(item, counts, item.revisionId === null ? undefined : pictures.get(item.revisionId));
  });
}

async function shipmentsOf(scope: WorkshopScope, saleId: string): Promise<SaleContract['shipments']> {
  const rows = await scope.rows.shipments.list({ where: { saleId }, order: [['number', 'ASC']] });
  const contents = await scope.rows.shipmentItems.list({ where: { shipmentId: rows.map(({ id }) => id) } });
  return rows.map(({ id, number, carrier, trackingCode, shippedAt, deliveredAt }) => ({
    ...{ id, number, carrier, trackingCode },
    shippedAt: shippedAt.toISOString(),
    deliveredAt: deliveredAt?.toISOString() ?? null,
    items: contents.filter(({ shipmentId }) => shipmentId === id).map(({ itemId, quantity }) => ({ itemId, quantity })),
  }));
}

/** What workshop and customer both see of a sale. */
async function common(scope: WorkshopScope, sale: Sale) {
  const facts = timelineOfSale(await readSaleFacts(scope, sale.id));
  const lines = await scope.rows.saleLines.list({ where: { saleId: sale.id }, order: [['position', 'ASC']] });
  return {
    ...presentHead(sale),
    lines: lines.map((line) => presentLine(line, sale.currency)),
    items: await presentItems(scope, sale),
    shipments: await shipmentsOf(scope, sale.id),
    events: facts.map((fact) => ({
      id: factRowId(sale.id, fact.key),
      at: fact.at.toISOString(),
      kind: fact.kind,
      text: saleEventWords(sale, fact),
    })),
    questions: await presentQuestions(scope, { saleId: sale.id }),
  };
}

/** What is left that could go back of what the customer paid, minor units. */
async function refundableMinor(scope: WorkshopScope, sale: Sale): Promise<number> {
  const [payment] = paymentsOf(await readSaleFacts(scope, sale.id));
  return payment === undefined ? 0 : Math.max(0, await leftOfPayment(scope, sale, payment));
}

const canShip = (items: readonly SaleItemContract[]) => items.some(({ reserved }) => reserved > 0);
const canCut = (items: readonly SaleItemContract[]) =>
  items.some(({ what, short, beingCut }) => what.kind === 'bracket' && short > beingCut);
const isOpen = (sale: Sale) => sale.state === 'paid' || sale.state === 'partly-shipped';

/** A sale as the workshop sees it, read in this transaction. */
export async function presentSale(scope: WorkshopScope, sale: Sale): Promise<SaleContract> {
  const shared = await common(scope, sale);
  const refunds = await scope.rows.refunds.list({ where: { saleId: sale.id }, order: [['askedAt', 'ASC']] });
  const assignments = await scope.rows.cutAssignments.list({ where: { saleId: sale.id } });
  const orders = await scope.rows.orders.list({
    where: { id: assignments.map(({ orderId }) => orderId) },
    order: [['number', 'ASC']],
  });
  return {
    ...shared,
    isGuest: sale.customerId === null,
    refunds: refunds.map((refund) => presentRefund(refund, sale.currency)),
    cutOrders: orders.map(({ id, number, state, quantity, partName }) => ({
      ...{ orderId: id, number, state, quantity, partName },
    })),
    can: {
      ship: isOpen(sale) && canShip(shared.items),
      cut: isOpen(sale) && canCut(shared.items),
      cancel: sale.state === 'placed' || (isOpen(sale) && shared.items.some((item) => item.short + item.reserved > 0)),
      refundMinor: sale.state === 'placed' ? 0 : await refundableMinor(scope, sale),
    },
  };
}

/** The same as its customer sees it. */
export async function presentCustomerOrder(scope: WorkshopScope, sale: Sale): Promise<CustomerOrder> {
  const shared = await common(scope, sale);
  const isPaid = sale.paymentState !== 'open' && sale.paymentState !== 'failed';
  return {
    shop: await frontOf(scope),
    ...shared,
    // Why the payment host would not send money back is between it and the workshop, which tries again.
    events: shared.events.filter(({ kind }) => kind !== 'refund-failed'),
    canPay: sale.state === 'placed' && !isPaid,
    canCancel: sale.state === 'placed' || sale.state === 'paid',
    hasFittingSheet: sale.state !== 'cancelled',
    hasInvoice: isPaid,
  };
}
