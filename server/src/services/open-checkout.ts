import type { AppDependencies } from '../app-dependencies';
import type { Database } from '../database/database';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { Order } from '../models/order';
import type { CheckoutSession } from '../payments/payment-host';
import { PaymentHostRefused, PaymentHostUnreachable } from '../payments/payment-host';
import { tellOrder } from './tell-order';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now' | 'payments'>;

/**
 * Open the payment page of an order, or answer the one that is open. No transaction waits for the payment host: its
 * answer is written in one of its own, and a key for each round makes a repeated request give the same page.
 * @returns address of the hosted page
 * @throws Problem `not-found`, `wrong-state` when there is nothing to pay, `service-unreachable`
 */
export async function openCheckout(tools: Tools, { workshopId }: Member, orderId: string): Promise<string> {
  const { database, payments, publicUrl } = tools;
  let order = await database.inWorkshop(workshopId, async (scope) => payable(await scope.rows.orders.get(orderId)));

  if (order.checkoutId !== null) {
    const session = await askHost(order, () => payments.readCheckout(order.checkoutId ?? ''));
    if (session.state === 'open' && session.url !== null) return session.url;
    if (session.state === 'paid') {
      throw new Problem('wrong-state', {
        detail: `Order ${order.number} is paid; the payment host’s message about it is on its way.`,
        kept: 'Nothing was charged twice.',
      });
    }
    order = await beginNextRound(database, order);
  }
  const page = `${publicUrl}/orders/${order.id}`;
  const session = await askHost(order, () =>
    payments.openCheckout({
      orderId: order.id,
      description: `Order ${order.number}: ${order.quantity} × ${order.partName}, revision ${order.revisionLetter}`,
      amount: { amountMinor: order.totalMinor, currency: order.currency },
      customerEmail: order.placedByEmail,
      successUrl: `${page}?payment=done`,
      cancelUrl: `${page}?payment=left`,
      idempotencyKey: `checkout-${order.id}-${order.checkoutRound}`,
    }),
  );
  return keepSession(tools, order, session);
}

/** Forget a page that is closed, once, however many notice it. */
async function beginNextRound(
  database: Database,
  { id, workshopId, checkoutId, checkoutRound }: Order,
): Promise<Order> {
  return database.inWorkshop(workshopId, async ({ rows }) => {
    await rows.orders.changeWhere({ id, checkoutId }, { checkoutId: null, checkoutRound: checkoutRound + 1 });
    return payable(await rows.orders.get(id));
  });
}

async function keepSession(tools: Tools, { id, workshopId }: Order, session: CheckoutSession): Promise<string> {
  const isWanted = await tools.database.inWorkshop(workshopId, async (scope) => {
    const order = await scope.rows.orders.get(id, { lock: true });
    if (order.checkoutId === null) await scope.rows.orders.change(order, { checkoutId: session.id });
    if (order.state === 'cancelled') {
      await tools.queue.enqueue(scope.transaction, 'payment', { task: 'close-checkout', workshopId, orderId: id });
      return false;
    }
    const at = tools.now();
    const opened = { kind: 'checkout-opened', key: `checkout-opened:${session.id}`, at, source: session.id } as const;
    await tellOrder(scope, order, [{ ...opened, details: {} }], tools);
    return true;
  });
  if (isWanted && session.url !== null) return session.url;
  throw new Problem('wrong-state', {
    detail: 'The order was cancelled while its payment page was being opened, or the page is closed already.',
    kept: 'Nothing was charged.',
  });
}

function payable(order: Order): Order {
  if (order.state === 'placed' && (order.paymentState === 'open' || order.paymentState === 'failed')) return order;
  throw new Problem('wrong-state', {
    detail:
      order.state === 'cancelled'
        ? `Order ${order.number} was cancelled.`
        : `Order ${order.number} is paid, there is nothing left to pay.`,
    kept: 'Nothing was charged.',
  });
}

async function askHost<T>(order: Order, request: () => Promise<T>): Promise<T> {
  try {
    return await request();
  } catch (error) {
    // The payment host being away or unwilling is foreseen and told in words; anything else is a fault of ours.
    if (!(error instanceof PaymentHostUnreachable || error instanceof PaymentHostRefused)) throw error;
    throw new Problem('service-unreachable', {
      detail:
        error instanceof PaymentHostUnreachable
          ? 'The payment host doesn’t answer at the moment.'
          : 'The payment host would not open a payment page.',
      kept: `Order ${order.number} is kept as it is. Nothing was charged.`,
      next: 'Try again in a few minutes.',
    });
  }
}
