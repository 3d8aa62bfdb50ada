import type { WorkshopScope } from '../../database/workshop-scope';
import type { Queue } from '../../jobs/queue';
import type { Refund } from '../../models/refund';
import type { Sale } from '../../models/sale';

export interface NewRefund {
  /** What it is for: a second one of the same key is not asked for. */
  readonly key: string;
  readonly paymentId: string;
  readonly amountMinor: number;
  readonly reason: string;
}

/** What is still there of a payment: all of it less what went back or is on its way back. */
export async function leftOfPayment(scope: WorkshopScope, sale: Sale, paymentId: string): Promise<number> {
  const rows = await scope.rows.refunds.list({ where: { saleId: sale.id, paymentId } });
  return rows
    .filter(({ state }) => state !== 'failed')
    .reduce((left, { amountMinor }) => left - amountMinor, sale.totalMinor);
}

/**
 * Ask for money to go back, in the transaction that makes it necessary; a job sends it after commit.
 * @param sale its row, locked in this transaction: that keeps refunds from adding up to more than the payment
 * @returns the row, or null when it was asked for before
 */
export async function askRefund(
  scope: WorkshopScope,
  queue: Queue,
  sale: Sale,
  { key, paymentId, amountMinor, reason }: NewRefund,
  now: Date,
): Promise<Refund | null> {
  const known = await scope.rows.refunds.findOne({ saleId: sale.id, key });
  if (known !== null) return null;
  const refund = await scope.rows.refunds.add({
    saleId: sale.id,
    key,
    paymentId,
    amountMinor,
    reason,
    state: 'asked',
    askedAt: now,
  });
  await enqueueRefund(scope, queue, refund);
  return refund;
}

/** Have a refund sent to the payment host after commit. */
export async function enqueueRefund(scope: WorkshopScope, queue: Queue, refund: Refund): Promise<void> {
  const { workshopId, transaction } = scope;
  await queue.enqueue(transaction, 'sale', { task: 'refund', workshopId, refundId: refund.id });
}
