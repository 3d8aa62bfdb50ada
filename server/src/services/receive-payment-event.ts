import type { AppDependencies } from '../app-dependencies';
import type { WorkshopScope } from '../database/workshop-scope';
import type { Queue } from '../jobs/queue';
import type { Order } from '../models/order';
import type { MoneyEvent, PaymentEvent, PaymentHost } from '../payments/payment-host';
import { UnprovenMessage } from '../payments/payment-host';
import type { OrderFact } from './order-state';
import { keepingFailures } from './operator/failed-messages';
import { saleFactsOf } from './sales/payment-facts';
import { refuseMessage, takeMessage } from './take-message';

/**
 * Take a signed event of the payment host, from its bytes as they came.
 * @throws Problem `invalid-input` for one that does not prove where it comes from; nothing of it is stored
 */
export async function receivePaymentEvent(
  tools: Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now' | 'payments'>,
  body: Buffer,
  signature: string | undefined,
): Promise<void> {
  const event = await provenEvent(tools, tools.payments, body, signature);
  if (event.kind === 'of-no-concern') return;
  await handlePaymentEvent(tools, event, body);
}

/** Act on an event that has proved where it comes from; taken before, it changes nothing. */
export async function handlePaymentEvent(
  tools: Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>,
  event: MoneyEvent,
  body: Buffer,
): Promise<void> {
  const { id, at, kind, orderId } = event;
  const message = { provider: 'payments', eventId: id, kind, aboutId: orderId, happenedAt: at, body } as const;
  await keepingFailures(tools.database, { provider: 'payments', told: event, body }, tools.now, () =>
    takeMessage(tools, 'find the workshop of a payment event', message, {
      order: (scope, order) => factsOf(scope, order, event, tools.queue),
      sale: (scope, sale) => saleFactsOf(scope, sale, event, tools),
    }),
  );
}

async function provenEvent(
  tools: Pick<AppDependencies, 'database' | 'now'>,
  payments: PaymentHost,
  body: Buffer,
  signature: string | undefined,
): Promise<PaymentEvent> {
  try {
    return payments.readEvent(body, signature);
  } catch (error) {
    // Only a missing proof is foreseen here.
    if (error instanceof UnprovenMessage) return refuseMessage(tools, 'payments', error);
    throw error;
  }
}

async function factsOf(
  scope: WorkshopScope,
  order: Order,
  event: MoneyEvent,
  queue: Queue,
): Promise<readonly OrderFact[]> {
  const base = { at: event.at, source: event.id };
  switch (event.kind) {
    case 'paid': {
      const { paymentId, amount } = event;
      const isWhole = amount.amountMinor === order.totalMinor && amount.currency === order.currency;
      if (isWhole) return [{ ...base, key: `paid:${paymentId}`, kind: 'paid', details: { paymentId } }];
      // Our own order named the sum, so this can't happen; if it does, nothing is cut for it and the money goes back.
      const { workshopId, id: orderId } = order;
      await queue.enqueue(scope.transaction, 'payment', { task: 'refund', workshopId, orderId, paymentId });
      const reason = 'The payment host reports another sum than the order’s. It goes back to the card.';
      return [{ ...base, key: `payment-failed:${event.id}`, kind: 'payment-failed', details: { reason } }];
    }
    case 'failed':
      return [
        { ...base, key: `payment-failed:${event.id}`, kind: 'payment-failed', details: { reason: event.message } },
      ];
    case 'refunded': {
      const { paymentId, refundedMinor } = event;
      if (refundedMinor < order.totalMinor) return [];
      return [{ ...base, key: `refunded:${paymentId}`, kind: 'refunded', details: { paymentId } }];
    }
    case 'checkout-ended':
      if (order.checkoutId === event.sessionId) {
        await scope.rows.orders.change(order, { checkoutId: null, checkoutRound: order.checkoutRound + 1 });
      }
      return [];
  }
}
