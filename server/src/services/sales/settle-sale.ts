import type { Database } from '../../database/database';
import type { Sale } from '../../models/sale';
import type { PaymentHost } from '../../payments/payment-host';
import { PaymentHostRefused } from '../../payments/payment-host';
import { bookRefund } from './book-ledger';
import { cancelWholeSale } from './cancel-whole-sale';
import type { TellTools } from './tell-sale';
import { tellSale } from './tell-sale';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Refund } from '../../models/refund';
import { lockShelf } from '../stock/shelf';

export interface SettleSaleTools extends TellTools {
  readonly database: Database;
  readonly payments: PaymentHost;
}

/**
 * Send a refund to the payment host. The host does it once under the key of the try, however often it is asked: an answer that
 * got lost, or a worker that died, changes nothing. What the host refuses is told to the owner.
 * @throws PaymentHostUnreachable for the queue to try again
 */
export async function sendRefund(
  tools: SettleSaleTools,
  { workshopId, refundId }: { readonly workshopId: string; readonly refundId: string },
): Promise<void> {
  const { database, payments } = tools;
  const refund = await database.inWorkshop(workshopId, ({ rows }) => rows.refunds.get(refundId));
  if (refund.state === 'done' || refund.state === 'failed') return;
  try {
    const { isDone } = await payments.refund({
      orderId: refund.saleId,
      paymentId: refund.paymentId,
      amountMinor: refund.amountMinor,
      idempotencyKey: `refund-${refund.id}-${refund.attempt}`,
    });
    await database.inWorkshop(workshopId, async (scope) => {
      const sale = await scope.rows.sales.get(refund.saleId, { lock: true });
      const row = await scope.rows.refunds.get(refundId, { lock: true });
      if (isDone) await finishRefunds(scope, sale, [row], tools);
      else if (row.state === 'asked') await scope.rows.refunds.change(row, { state: 'sent', problem: null });
    });
  } catch (error) {
    if (!(error instanceof PaymentHostRefused)) throw error;
    await database.inWorkshop(workshopId, (scope) => failRefund(scope, refundId, error.message, tools));
  }
}

async function failRefund(scope: WorkshopScope, refundId: string, problem: string, tools: TellTools): Promise<void> {
  const { saleId } = await scope.rows.refunds.get(refundId);
  const sale = await scope.rows.sales.get(saleId, { lock: true });
  const row = await scope.rows.refunds.get(refundId, { lock: true });
  if (row.state !== 'asked') return;
  await scope.rows.refunds.change(row, { state: 'failed', problem });
  const fact = { kind: 'refund-failed', at: tools.now(), source: row.id } as const;
  const details = { amountMinor: row.amountMinor, paymentId: row.paymentId, reason: problem };
  await tellSale(scope, sale, [{ ...fact, key: `refund-failed:${row.id}:${row.attempt}`, details }], tools);
}

/**
 * Note that refunds have gone through: books and timeline, once each.
 * @param sale its row, locked in this transaction
 */
export async function finishRefunds(
  scope: WorkshopScope,
  sale: Sale,
  refunds: readonly Refund[],
  tools: TellTools,
): Promise<void> {
  for (const refund of refunds.filter(({ state }) => state !== 'done')) {
    const done = await scope.rows.refunds.list({
      where: { saleId: sale.id, paymentId: refund.paymentId, state: 'done' },
    });
    const beforeMinor = done.reduce((sum, { amountMinor }) => sum + amountMinor, 0);
    const at = tools.now();
    await bookRefund(scope, sale, refund, beforeMinor, at);
    await scope.rows.refunds.change(refund, { state: 'done', problem: null });
    const { id, paymentId, amountMinor, reason } = refund;
    const fact = { key: `refunded:${id}`, kind: 'refunded', at, source: id } as const;
    await tellSale(scope, sale, [{ ...fact, details: { paymentId, amountMinor, reason } }], tools);
  }
}

/**
 * The payment host says how much of a payment went back in all: refunds that were on their way are through now.
 * @param sale its row, locked in this transaction
 */
export async function confirmRefunds(
  scope: WorkshopScope,
  sale: Sale,
  paymentId: string,
  cumulativeMinor: number,
  tools: TellTools,
): Promise<void> {
  const rows = await scope.rows.refunds.list({
    where: { saleId: sale.id, paymentId },
    order: [
      ['askedAt', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  let left = rows
    .filter(({ state }) => state === 'done')
    .reduce((rest, row) => rest - row.amountMinor, cumulativeMinor);
  const through = rows.filter((row) => {
    if (row.state !== 'sent' || row.amountMinor > left) return false;
    left -= row.amountMinor;
    return true;
  });
  await finishRefunds(scope, sale, through, tools);
}

/**
 * A sale that nobody paid in time is cancelled, and what was kept for it goes back on the shelf. One that was paid
 * meanwhile stays.
 */
export async function expireSale(
  tools: SettleSaleTools,
  { workshopId, saleId }: { readonly workshopId: string; readonly saleId: string },
): Promise<void> {
  await tools.database.inWorkshop(workshopId, async (scope) => {
    await lockShelf(scope);
    const sale = await scope.rows.sales.get(saleId, { lock: true });
    if (sale.state !== 'placed') return;
    await cancelWholeSale(scope, sale, 'It was not paid in time.', tools);
  });
}

/**
 * Close the payment page of a cancelled sale, so that nobody pays for it by mistake.
 * @throws PaymentHostUnreachable, PaymentHostRefused for the queue to try again
 */
export async function closeSaleCheckout(
  { database, payments }: Pick<SettleSaleTools, 'database' | 'payments'>,
  { workshopId, saleId }: { readonly workshopId: string; readonly saleId: string },
): Promise<void> {
  const checkoutId = await database.inWorkshop(workshopId, async ({ rows }) => {
    const sale = await rows.sales.get(saleId);
    return sale.state === 'cancelled' ? sale.checkoutId : null;
  });
  if (checkoutId !== null) await payments.closeCheckout(checkoutId);
}
