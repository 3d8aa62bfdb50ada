import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import type { Queue } from '../jobs/queue';
import type { Order } from '../models/order';
import { letterAbout } from './order-letters';
import { factOf, factRowId } from './order-rows';
import type { OrderFact } from './order-state';
import { joinFact, paymentsOf, standingOf, workDue } from './order-state';
import { bookCutting } from './sales/book-ledger';
import { writeMail } from './write-mail';

export interface TellOrderTools {
  readonly queue: Queue;
  readonly publicUrl: string;
  readonly now: () => Date;
}

/**
 * Tell an order what happened, once or again: writes the facts, derives where the order stands, and puts the work and the
 * letters that follow from it into the same transaction. Telling the same twice changes nothing. Call it last in a
 * transaction.
 * @param order its row, locked in this transaction
 * @returns whether anything was new
 */
export async function tellOrder(
  scope: WorkshopScope,
  order: Order,
  told: readonly OrderFact[],
  tools: TellOrderTools,
): Promise<boolean> {
  const rows = await scope.rows.orderEvents.list({ where: { orderId: order.id } });
  const before: readonly OrderFact[] = rows.map(factOf);
  const after = told.reduce(joinFact, before);
  if (after === before) return false;

  for (const fact of after.filter((one) => !before.includes(one))) {
    const { key, kind, at, source, details } = fact;
    const row = rows.find((candidate) => candidate.key === key);
    if (row === undefined) {
      await scope.rows.orderEvents.add({
        id: factRowId(order.id, key),
        orderId: order.id,
        key,
        kind,
        at,
        source,
        details,
      });
    } else await scope.rows.orderEvents.change(row, { at, source, details });
  }
  await scope.rows.orders.change(order, standingOf(after));
  await bookMoney(scope, order, { before, after });
  await enqueueWork(scope, order, { before, after }, tools.queue);
  await writeLetters(scope, order, { before, after }, tools);
  recordEvent(scope, { kind: 'order-changed', orderId: order.id });
  return true;
}

interface Change {
  readonly before: readonly OrderFact[];
  readonly after: readonly OrderFact[];
}

/** Every payment and every refund goes into the books, those made in vain too. */
async function bookMoney(scope: WorkshopScope, order: Order, { before, after }: Change): Promise<void> {
  for (const { kind, key, at } of after.filter((one) => !before.some((known) => known.key === one.key))) {
    if (kind === 'paid' || kind === 'refunded') await bookCutting(scope, order, { kind, key, at });
  }
}

async function enqueueWork(scope: WorkshopScope, order: Order, { before, after }: Change, queue: Queue): Promise<void> {
  const { workshopId, transaction } = scope;
  const orderId = order.id;
  const [wasDue, isDue] = [workDue(before), workDue(after)];
  if (isDue.submission && !wasDue.submission)
    await queue.enqueue(transaction, 'cutting-order', { workshopId, orderId });
  for (const paymentId of isDue.refunds.filter((payment) => !wasDue.refunds.includes(payment))) {
    await queue.enqueue(transaction, 'payment', { task: 'refund', workshopId, orderId, paymentId });
  }
  const hasJustEnded = standingOf(after).state === 'cancelled' && standingOf(before).state !== 'cancelled';
  if (hasJustEnded && order.checkoutId !== null) {
    await queue.enqueue(transaction, 'payment', { task: 'close-checkout', workshopId, orderId });
  }
}

async function writeLetters(
  scope: WorkshopScope,
  order: Order,
  { before, after }: Change,
  { queue, publicUrl, now }: TellOrderTools,
): Promise<void> {
  const isCancelled = standingOf(after).state === 'cancelled';
  const [payment] = paymentsOf(after);
  for (const fact of after.filter((one) => !before.some(({ key }) => key === one.key))) {
    // Money that came too late or twice is told of when it goes back.
    const isMoneyInVain = fact.kind === 'paid' && (isCancelled || fact.details.paymentId !== payment);
    const letter = isMoneyInVain ? null : letterAbout(order, fact, publicUrl);
    if (letter === null) continue;
    const key = `order:${order.id}:${fact.kind === 'paid' ? 'paid' : fact.key}`;
    await writeMail(scope, queue, { ...letter, key, orderId: order.id, recipient: order.placedByEmail }, now());
  }
}
