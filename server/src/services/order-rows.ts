import { createHash } from 'node:crypto';
import type { Order as OrderContract } from '@foldwright/shared/contracts/orders';
import * as z from 'zod/mini';
import type { WorkshopScope } from '../database/workshop-scope';
import type { Order } from '../models/order';
import type { OrderEvent } from '../models/order-event';
import { presentOrder } from '../presenters/orders';
import type { OrderFact } from './order-state';
import { timelineOf } from './order-state';

const detailsSchema = z.object({
  paymentId: z.exactOptional(z.string()),
  trackingCode: z.exactOptional(z.string()),
  reason: z.exactOptional(z.string()),
  subject: z.exactOptional(z.string()),
});

/** A fact as its row tells it. */
export function factOf(row: OrderEvent): OrderFact {
  const { key, kind, at, source } = row;
  return { key, kind, at, source, details: detailsSchema.parse(row.details) };
}

/**
 * Id of the row of a fact: it follows from order and key, so that the same facts make the same rows in whatever order
 * they were told. In the form of a UUID of version 8 (RFC 9562, 5.8).
 */
export function factRowId(orderId: string, key: string): string {
  const hex = createHash('sha256').update(`${orderId}\n${key}`).digest('hex');
  const variant = '89ab'[Number.parseInt(hex.charAt(16), 16) % 4];
  return [
    hex.slice(0, 8),
    hex.slice(8, 12),
    `8${hex.slice(13, 16)}`,
    `${variant}${hex.slice(17, 20)}`,
    hex.slice(20, 32),
  ].join('-');
}

/** The facts of one order, read in this transaction. */
export async function readFacts(scope: WorkshopScope, orderId: string): Promise<readonly OrderFact[]> {
  return (await scope.rows.orderEvents.list({ where: { orderId } })).map(factOf);
}

/** Orders as people see them, each with its timeline, read in this transaction. */
export async function presentWithTimelines(scope: WorkshopScope, orders: readonly Order[]): Promise<OrderContract[]> {
  const rows = await scope.rows.orderEvents.list({ where: { orderId: orders.map((order) => order.id) } });
  return orders.map((order) => {
    const facts = rows.filter((row) => row.orderId === order.id).map(factOf);
    const timeline = timelineOf(facts).map((fact) => ({ ...fact, id: factRowId(order.id, fact.key) }));
    return presentOrder(order, timeline);
  });
}

/** One order as people see it, with its timeline. */
export async function presentWithTimeline(scope: WorkshopScope, order: Order): Promise<OrderContract> {
  const [only] = await presentWithTimelines(scope, [order]);
  if (only === undefined) throw new Error(`order ${order.id} was not presented`);
  return only;
}
