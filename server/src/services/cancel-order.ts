import type { Order as OrderContract } from '@foldwright/shared/contracts/orders';
import type { AppDependencies } from '../app-dependencies';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import { presentWithTimeline } from './order-rows';
import { recordAudit } from './record-audit';
import { tellOrder } from './tell-order';

/**
 * Cancel an order that is not paid. Its payment page is closed after commit; money that comes in all the same goes back.
 * @param seenRevision revision that the person saw
 * @throws Problem `not-found`, `wrong-state` once it is paid, `stale-row` when something else happened in between
 */
export async function cancelOrder(
  { database, queue, publicUrl, now }: Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>,
  actor: Member,
  orderId: string,
  seenRevision: number,
): Promise<OrderContract> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const order = await scope.rows.orders.get(orderId, { lock: true });
    if (order.state === 'cancelled') return presentWithTimeline(scope, order);
    if (order.state !== 'placed') {
      throw new Problem('wrong-state', {
        detail: `Order ${order.number} is paid, so it can’t be cancelled here.`,
        kept: 'The order goes on as it was.',
        next: 'Talk to the cutting service; an order that it hands back is refunded.',
      });
    }
    if (order.revision !== seenRevision) {
      throw new Problem('stale-row', {
        detail: `Something happened to order ${order.number} since you saw it.`,
        kept: 'The order goes on as it was.',
        next: 'Look at its timeline and decide again.',
      });
    }
    await recordAudit(scope, actor, `Cancelled order ${order.number}`, `${order.partNumber} ${order.partName}`);
    const cancelled = { key: 'cancelled', kind: 'cancelled', at: now(), source: order.id, details: {} } as const;
    await tellOrder(scope, order, [cancelled], { queue, publicUrl, now });
    return presentWithTimeline(scope, order);
  });
}
