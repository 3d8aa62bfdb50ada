import type { AppDependencies } from '../app-dependencies';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { Order } from '../models/order';
import { openHostedPage } from './hosted-page';
import { tellOrder } from './tell-order';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now' | 'payments'>;

/**
 * Open the payment page of an order to the cutting service, or answer the one that is open.
 * @returns address of the hosted page
 * @throws Problem `not-found`, `wrong-state` when there is nothing to pay, `service-unreachable`
 */
export function openCheckout(tools: Tools, { workshopId }: Member, orderId: string): Promise<string> {
  return openHostedPage(tools, workshopId, {
    async read(scope) {
      const order = payable(await scope.rows.orders.get(orderId));
      return {
        id: order.id,
        name: `Order ${order.number}`,
        checkoutId: order.checkoutId,
        checkoutRound: order.checkoutRound,
        description: `Order ${order.number}: ${order.quantity} × ${order.partName}, revision ${order.revisionLetter}`,
        amount: { amountMinor: order.totalMinor, currency: order.currency },
        customerEmail: order.placedByEmail,
        page: `${tools.publicUrl}/orders/${order.id}`,
      };
    },
    async forgetPage({ rows }, { id, checkoutId, checkoutRound }) {
      await rows.orders.changeWhere({ id, checkoutId }, { checkoutId: null, checkoutRound: checkoutRound + 1 });
    },
    async keepPage(scope, session) {
      const order = await scope.rows.orders.get(orderId, { lock: true });
      if (order.checkoutId === null) await scope.rows.orders.change(order, { checkoutId: session.id });
      if (order.state === 'cancelled') {
        await tools.queue.enqueue(scope.transaction, 'payment', { task: 'close-checkout', workshopId, orderId });
        return false;
      }
      const at = tools.now();
      const opened = { kind: 'checkout-opened', key: `checkout-opened:${session.id}`, at, source: session.id } as const;
      await tellOrder(scope, order, [{ ...opened, details: {} }], tools);
      return true;
    },
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
