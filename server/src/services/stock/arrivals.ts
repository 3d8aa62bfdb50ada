import type { Arrival } from '@foldwright/shared/contracts/stock';
import type { WorkshopScope } from '../../database/workshop-scope';
import { bracketsById } from './brackets';

/** How many of each order were put on the shelf, by its id. */
export async function receivedOf(
  scope: WorkshopScope,
  orderIds: readonly string[],
): Promise<ReadonlyMap<string, number>> {
  const moves = await scope.rows.stockMoves.list({ where: { orderId: [...orderIds], kind: 'received' } });
  const counts = new Map<string, number>();
  for (const { orderId, onHandChange } of moves) {
    if (orderId !== null) counts.set(orderId, (counts.get(orderId) ?? 0) + onHandChange);
  }
  return counts;
}

/** Orders of production sheet that the cutting service has shipped and that aren't all on the shelf, the oldest first. */
export async function listArrivals(scope: WorkshopScope): Promise<Arrival[]> {
  const orders = await scope.rows.orders.list({
    where: { state: 'shipped', stock: 'production' },
    order: [['number', 'ASC']],
  });
  const received = await receivedOf(
    scope,
    orders.map(({ id }) => id),
  );
  const brackets = await bracketsById(
    scope,
    orders.map(({ revisionId }) => revisionId),
  );
  return orders.flatMap(({ id, number, revisionId, quantity }): Arrival[] => {
    const bracket = brackets.get(revisionId);
    const left = quantity - (received.get(id) ?? 0);
    return bracket === undefined || left <= 0 ? [] : [{ orderId: id, orderNumber: number, bracket, quantity: left }];
  });
}
