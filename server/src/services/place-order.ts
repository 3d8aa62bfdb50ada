import type { Order as OrderContract } from '@foldwright/shared/contracts/orders';
import { orderSchema, placeOrder as contract, quoteBreakSchema } from '@foldwright/shared/contracts/orders';
import * as z from 'zod/mini';
import type { AppDependencies } from '../app-dependencies';
import type { WorkshopScope } from '../database/workshop-scope';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { Order } from '../models/order';
import type { Quote } from '../models/quote';
import { once } from './once';
import { presentWithTimeline } from './order-rows';
import { recordAudit } from './record-audit';
import { tellOrder } from './tell-order';

export interface OrderPlacing {
  readonly quoteId: string;
  readonly quantity: number;
}

const FIRST_NUMBER = 1001;
const numberRow = z.tuple([z.object({ next: z.int() })]);

/**
 * Order a quoted quantity. The order freezes what it refers to: revision and hash, stock, statement, prices in lines.
 * @param key made by the browser for this one order: pressing twice gives one order
 * @throws Problem `not-found`, `wrong-state` when the quote is no price or has run out, `invalid-input` for a quantity
 *   that was not quoted, `already-exists` for a key that was used for another order
 */
export async function placeOrder(
  { database, queue, publicUrl, now }: Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>,
  actor: Member,
  placing: OrderPlacing,
  key: string,
): Promise<OrderContract> {
  const { userId, workshopId } = actor;
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: contract.id, key, request: placing }, orderSchema, async () => {
      // One order after the other in a workshop, so that numbers have no gaps and none comes twice.
      await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('orders:' || $1, 0))", [workshopId]);
      const quote = await scope.rows.quotes.get(placing.quoteId);
      const order = await addOrder(scope, quote, actor, placing.quantity, now());
      await recordAudit(scope, actor, `Placed order ${order.number}`, `${order.partNumber} ${order.partName}`);
      const placed = { key: 'placed', kind: 'placed', at: order.placedAt, source: order.id, details: {} } as const;
      await tellOrder(scope, order, [placed], { queue, publicUrl, now });
      return presentWithTimeline(scope, order);
    }),
  );
}

async function addOrder(
  scope: WorkshopScope,
  quote: Quote,
  actor: Member,
  quantity: number,
  now: Date,
): Promise<Order> {
  if (quote.state !== 'priced' || quote.quoteReference === null || quote.validUntil === null) {
    throw new Problem('wrong-state', {
      detail: 'The cutting service named no price in this quote.',
      kept: 'Nothing was ordered.',
      next: 'Ask for a new quote.',
    });
  }
  if (quote.validUntil <= now) {
    throw new Problem('wrong-state', {
      detail: 'The prices of this quote have run out.',
      kept: 'Nothing was ordered.',
      next: 'Ask for a new quote; it takes a moment.',
    });
  }
  const priced = z.parse(z.array(quoteBreakSchema), quote.breaks).find((row) => row.quantity === quantity);
  if (priced === undefined) {
    throw new Problem('invalid-input', {
      detail: 'This quantity was not quoted.',
      kept: 'Nothing was ordered.',
      errors: [{ pointer: '/quantity', detail: 'Choose one of the quoted quantities.' }],
    });
  }
  const revision = await scope.rows.revisions.get(quote.revisionId);
  const part = await scope.rows.parts.get(revision.partId);
  const user = await scope.models.users.findByPk(actor.userId, { transaction: scope.transaction, rejectOnEmpty: true });
  const [{ next }] = numberRow.parse(
    await scope.sql('SELECT COALESCE(MAX(number) + 1, $2) AS next FROM orders WHERE workshop_id = $1', [
      scope.workshopId,
      FIRST_NUMBER,
    ]),
  );
  return scope.rows.orders.add({
    number: next,
    quoteId: quote.id,
    quoteReference: quote.quoteReference,
    partId: part.id,
    partName: part.name,
    partNumber: part.number,
    revisionId: quote.revisionId,
    revisionLetter: quote.revisionLetter,
    revisionHash: quote.revisionHash,
    stock: quote.stock,
    stockLabel: quote.stockLabel,
    statement: quote.statement,
    quantity: priced.quantity,
    totalMinor: priced.total.amountMinor,
    currency: priced.total.currency,
    lines: priced.lines,
    leadTimeDays: priced.leadTimeDays,
    state: 'placed',
    paymentState: 'open',
    revision: 0,
    placedBy: actor.userId,
    placedByName: actor.userName,
    placedByEmail: user.email,
    placedAt: now,
  });
}
