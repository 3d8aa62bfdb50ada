import { randomUUID } from 'node:crypto';
import { adjustStock as adjustContract, receiveStock as receiveContract } from '@foldwright/shared/contracts/stock';
import type { AppDependencies } from '../../app-dependencies';
import type { WorkshopScope } from '../../database/workshop-scope';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Order } from '../../models/order';
import type { StockPosition } from '../../models/stock-position';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { serveWaitingSales } from '../sales/reserve';
import { receivedOf } from './arrivals';
import type { StockTarget } from './shelf';
import { announceStock, lockShelf, moveStock, positionOf, targetOf } from './shelf';

export interface Shelved {
  readonly positionId: string;
  readonly onHand: number;
  readonly reserved: number;
}

export interface Receipt {
  readonly what: StockTarget;
  readonly quantity: number;
  /** The order to the cutting service that it came from. */
  readonly orderId: string | null;
  readonly reason: string;
}

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

const shelved = ({ id, onHand, reserved }: StockPosition): Shelved => ({ positionId: id, onHand, reserved });

/**
 * Put what came in on the shelf, once under the caller's key. Sales that wait for it get it, the oldest first; what came
 * from an order to the cutting service counts as arrived for the sales it was cut for.
 * @throws Problem `not-found`, `wrong-state` when the order made something else or fewer are still to come
 */
export function receiveStock(tools: Tools, actor: Member, receipt: Receipt, key: string): Promise<Shelved> {
  const { workshopId, userId, userName } = actor;
  return tools.database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: receiveContract.id, key, request: receipt }, receiveContract.response, async () => {
      await lockShelf(scope);
      await refuseUnknown(scope, receipt.what);
      const order = receipt.orderId === null ? null : await scope.rows.orders.get(receipt.orderId);
      if (order !== null) await countArrival(scope, order, receipt);
      const position = await positionOf(scope, receipt.what);
      await moveStock(scope, position, {
        key: `receive:${randomUUID()}`,
        kind: 'received',
        onHandChange: receipt.quantity,
        reservedChange: 0,
        reason: receipt.reason || (order === null ? 'Came in' : `From order ${order.number}`),
        byName: userName,
        at: tools.now(),
        orderId: order?.id ?? null,
      });
      await recordAudit(scope, actor, `Put ${receipt.quantity} on the shelf`, receipt.reason || null);
      await serveWaitingSales(scope, receipt.what, tools);
      announceStock(scope, [position.id]);
      return shelved(await scope.rows.stockPositions.get(position.id));
    }),
  );
}

async function refuseUnknown(scope: WorkshopScope, what: StockTarget): Promise<void> {
  if (what.kind === 'bracket') await scope.rows.revisions.get(what.revisionId);
  else await scope.rows.hardwareItems.get(what.hardwareId);
}

/** What was ordered is received once: never more than the order made, and only what it made. */
async function countArrival(scope: WorkshopScope, order: Order, { what, quantity }: Receipt): Promise<void> {
  const kept = 'The shelf is as it was.';
  if (what.kind !== 'bracket' || what.revisionId !== order.revisionId) {
    throw new Problem('wrong-state', {
      detail: `Order ${order.number} made ${order.partName}, revision ${order.revisionLetter}, and nothing else.`,
      kept,
    });
  }
  if (order.state !== 'shipped') {
    throw new Problem('wrong-state', {
      detail: `The cutting service has not shipped order ${order.number} yet.`,
      kept,
      next: 'Receive it once it is there.',
    });
  }
  if (order.stock !== 'production') {
    throw new Problem('wrong-state', {
      detail: `Order ${order.number} was cut in ${order.stockLabel} to try the bracket. The shelf holds what is sold.`,
      kept,
    });
  }
  const before = (await receivedOf(scope, [order.id])).get(order.id) ?? 0;
  if (before + quantity > order.quantity) {
    throw new Problem('wrong-state', {
      detail: `Order ${order.number} made ${order.quantity}, and ${before} of them are on the shelf already.`,
      kept,
      next: 'Receive the rest, or correct the shelf with a reason.',
    });
  }
  let left = quantity;
  const assignments = await scope.rows.cutAssignments.list({ where: { orderId: order.id } });
  const sales = await scope.rows.sales.list({ where: { id: assignments.map(({ saleId }) => saleId) } });
  const numberOf = ({ saleId }: { readonly saleId: string }) => sales.find(({ id }) => id === saleId)?.number ?? 0;
  for (const row of [...assignments].sort((a, b) => numberOf(a) - numberOf(b) || a.id.localeCompare(b.id))) {
    const arrived = Math.min(left, row.quantity - row.arrived);
    if (arrived > 0) await scope.rows.cutAssignments.change(row, { arrived: row.arrived + arrived });
    left -= arrived;
  }
}

/**
 * Correct what lies on the shelf, with a reason, once under the caller's key.
 * @throws Problem `not-found`, `not-enough-stock` when less would lie there than is kept for sales
 */
export function adjustStock(
  tools: Tools,
  actor: Member,
  { positionId, change, reason }: { readonly positionId: string; readonly change: number; readonly reason: string },
  key: string,
): Promise<Shelved> {
  const { workshopId, userId, userName } = actor;
  const request = { positionId, change, reason };
  return tools.database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: adjustContract.id, key, request }, adjustContract.response, async () => {
      await lockShelf(scope);
      const position = await scope.rows.stockPositions.get(positionId, { lock: true });
      await moveStock(scope, position, {
        key: `adjust:${randomUUID()}`,
        kind: 'adjusted',
        onHandChange: change,
        reservedChange: 0,
        reason,
        byName: userName,
        at: tools.now(),
      });
      await recordAudit(scope, actor, `Corrected the shelf by ${change > 0 ? '+' : '−'}${Math.abs(change)}`, reason);
      if (change > 0) await serveWaitingSales(scope, targetOf(position), tools);
      announceStock(scope, [position.id]);
      return shelved(await scope.rows.stockPositions.get(position.id));
    }),
  );
}
