import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import type { Sale } from '../../models/sale';
import { factRowId } from '../order-rows';
import type { TellOrderTools } from '../tell-order';
import { writeMail } from '../write-mail';
import { askRefund, leftOfPayment } from './ask-refund';
import { bookPayment } from './book-ledger';
import { finishWords } from './piece-words';
import type { LetterSubject } from './sale-letters';
import { letterToCustomer, letterToWorkshop } from './sale-letters';
import { saleFactOf } from './sale-rows';
import type { SaleFact } from './sale-state';
import { isCancelled, joinSaleFact, paymentsOf, refundsDue, standingOfSale } from './sale-state';

/** What telling a sale or an order needs: the queue for what follows, the public address for letters, and the time. */
export type TellTools = TellOrderTools;

interface Change {
  readonly before: readonly SaleFact[];
  readonly after: readonly SaleFact[];
}

/**
 * Tell a sale what happened, once or again: writes the facts, derives where the sale stands, and puts books, refunds and
 * letters that follow from it into the same transaction. Telling the same twice changes nothing. Call it last in a
 * transaction, after the pieces of the sale were changed.
 * @param sale its row, locked in this transaction
 * @returns whether anything was new
 */
export async function tellSale(
  scope: WorkshopScope,
  sale: Sale,
  told: readonly SaleFact[],
  tools: TellTools,
): Promise<boolean> {
  const rows = await scope.rows.saleFacts.list({ where: { saleId: sale.id } });
  const before: readonly SaleFact[] = rows.map(saleFactOf);
  const after = told.reduce(joinSaleFact, before);
  if (after === before) return false;

  for (const fact of after.filter((one) => !before.includes(one))) {
    const { key, kind, at, source, details } = fact;
    const row = rows.find((candidate) => candidate.key === key);
    const values = { saleId: sale.id, key, kind, at, source, details };
    if (row === undefined) await scope.rows.saleFacts.add({ id: factRowId(sale.id, key), ...values });
    else await scope.rows.saleFacts.change(row, { at, source, details });
  }
  const change = { before, after };
  await askWholeRefunds(scope, sale, after, tools);
  const pieces = await scope.rows.saleItems.list({ where: { saleId: sale.id } });
  await scope.rows.sales.change(sale, standingOfSale(after, pieces, sale.totalMinor));
  await bookPayments(scope, sale, change);
  await closeCheckoutOfCancelled(scope, sale, change, tools);
  await writeLetters(scope, sale, change, tools);
  recordEvent(scope, { kind: 'sale-changed', saleId: sale.id });
  return true;
}

async function askWholeRefunds(
  scope: WorkshopScope,
  sale: Sale,
  facts: readonly SaleFact[],
  { queue, now }: TellTools,
): Promise<void> {
  for (const { key, paymentId, reason } of refundsDue(facts)) {
    const amountMinor = await leftOfPayment(scope, sale, paymentId);
    if (amountMinor > 0) await askRefund(scope, queue, sale, { key, paymentId, amountMinor, reason }, now());
  }
}

async function bookPayments(scope: WorkshopScope, sale: Sale, { before, after }: Change): Promise<void> {
  for (const fact of after.filter((one) => one.kind === 'paid' && !before.some(({ key }) => key === one.key))) {
    if (fact.details.paymentId !== undefined) await bookPayment(scope, sale, fact.details.paymentId, fact.at);
  }
}

/** Nobody shall pay by mistake for what was cancelled. */
async function closeCheckoutOfCancelled(
  scope: WorkshopScope,
  sale: Sale,
  { before, after }: Change,
  { queue }: TellTools,
): Promise<void> {
  if (!isCancelled(after) || isCancelled(before) || sale.checkoutId === null) return;
  const { workshopId, transaction } = scope;
  await queue.enqueue(transaction, 'sale', { task: 'close-checkout', workshopId, saleId: sale.id });
}

async function writeLetters(
  scope: WorkshopScope,
  sale: Sale,
  { before, after }: Change,
  { queue, publicUrl, now }: TellTools,
): Promise<void> {
  const fresh = after.filter((one) => !before.some(({ key }) => key === one.key));
  const [payment] = paymentsOf(after);
  const subject = await subjectOf(scope, sale, publicUrl, payment !== undefined);
  const shop = await scope.rows.shops.findOne({});
  for (const fact of fresh) {
    // Money that came too late or twice is told of when it goes back.
    if (fact.kind === 'paid' && (isCancelled(after) || fact.details.paymentId !== payment)) continue;
    const about = fact.kind === 'paid' ? 'paid' : fact.key;
    const mail = { orderId: null, saleId: sale.id };
    const toCustomer = letterToCustomer(subject, fact);
    if (toCustomer !== null) {
      const key = `sale:${sale.id}:${about}`;
      await writeMail(scope, queue, { ...toCustomer, ...mail, key, recipient: sale.customerEmail }, now());
    }
    const toWorkshop = letterToWorkshop(subject, fact);
    if (toWorkshop !== null && shop !== null) {
      const key = `sale:${sale.id}:${about}:workshop`;
      await writeMail(scope, queue, { ...toWorkshop, ...mail, key, recipient: shop.questionsTo }, now());
    }
  }
}

async function subjectOf(scope: WorkshopScope, sale: Sale, publicUrl: string, isPaid: boolean): Promise<LetterSubject> {
  const workshop = await scope.workshop();
  const lines = await scope.rows.saleLines.list({ where: { saleId: sale.id }, order: [['position', 'ASC']] });
  return {
    sale,
    shopName: workshop.name,
    isPaid,
    publicUrl,
    lines: lines.map(({ quantity, title, finishId }) => `${quantity} × ${title}, ${finishWords(finishId)}`),
  };
}
