import * as z from 'zod/mini';
import { stockRoleSchema } from './part-document-schema';
import { defineRoute } from './route';
import { moneySchema, rowId, timestamp } from './scalars';

/** One quantity break of a quote, with the price broken down as the cutting service gave it. */
export const quoteBreakSchema = z.object({
  quantity: z.int(),
  each: moneySchema,
  total: moneySchema,
  lines: z.array(z.object({ label: z.string(), amount: moneySchema })),
  leadTimeDays: z.int(),
});

export const quoteSchema = z.object({
  id: rowId,
  revisionId: rowId,
  revisionLetter: z.string(),
  revisionHash: z.string(),
  stock: stockRoleSchema,
  state: z.enum(['asked', 'priced', 'refused', 'unreachable', 'expired']),
  breaks: z.array(quoteBreakSchema),
  /** Why the cutting service will not make it, in its own words. */
  refusal: z.nullable(z.string()),
  validUntil: z.nullable(timestamp),
  askedAt: timestamp,
});
export type Quote = z.output<typeof quoteSchema>;

/** States of an order to the cutting service, in order; `cancelled` and `refused` end it early. */
export const ORDER_STATES = [
  'placed',
  'paid',
  'accepted',
  'cutting',
  'bending',
  'shipped',
  'refused',
  'cancelled',
] as const;

export const orderEventSchema = z.object({
  id: rowId,
  at: timestamp,
  kind: z.enum([
    'placed',
    'checkout-opened',
    'paid',
    'payment-failed',
    'sent-to-cutter',
    'accepted',
    'cutting',
    'bending',
    'shipped',
    'refused',
    'cancelled',
    'refunded',
    'mail-sent',
  ]),
  text: z.string(),
});

export const orderSchema = z.object({
  id: rowId,
  /** The number people read. */
  number: z.int(),
  partId: rowId,
  partName: z.string(),
  partNumber: z.string(),
  revisionId: rowId,
  revisionLetter: z.string(),
  revisionHash: z.string(),
  stock: stockRoleSchema,
  stockLabel: z.string(),
  statement: z.enum(['cut-and-bend-to-our-flat', 'formed-sizes-rule']),
  quantity: z.int(),
  total: moneySchema,
  lines: z.array(z.object({ label: z.string(), amount: moneySchema })),
  state: z.enum(ORDER_STATES),
  paymentState: z.enum(['open', 'paid', 'failed', 'refunded']),
  trackingCode: z.nullable(z.string()),
  events: z.array(orderEventSchema),
  placedAt: timestamp,
  placedBy: z.string(),
  revision: z.int(),
});
export type Order = z.output<typeof orderSchema>;

const makers = ['owner', 'fabricator'] as const;
const everyMember = ['owner', 'fabricator', 'viewer'] as const;
const orderIdParams = z.strictObject({ orderId: rowId });
const revisionIdParams = z.strictObject({ revisionId: rowId });

export const askForQuote = defineRoute({
  id: 'askForQuote',
  method: 'POST',
  path: '/api/revisions/:revisionId/quotes',
  tag: 'orders',
  access: makers,
  summary: 'Ask the cutting service for a price at several quantities',
  params: revisionIdParams,
  body: z.strictObject({
    stock: stockRoleSchema,
    quantities: z.array(z.int().check(z.gte(1), z.lte(10000))).check(z.minLength(1), z.maxLength(6)),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: quoteSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['service-unreachable', 'service-refused'],
});
export const listQuotes = defineRoute({
  id: 'listQuotes',
  method: 'GET',
  path: '/api/revisions/:revisionId/quotes',
  tag: 'orders',
  access: everyMember,
  summary: 'Quotes for a revision, newest first',
  params: revisionIdParams,
  answer: 'json',
  response: z.object({ quotes: z.array(quoteSchema) }),
  successStatus: 200,
});
export const placeOrder = defineRoute({
  id: 'placeOrder',
  method: 'POST',
  path: '/api/orders',
  tag: 'orders',
  access: makers,
  summary: 'Order a quoted quantity',
  body: z.strictObject({ quoteId: rowId, quantity: z.int().check(z.gte(1)) }),
  bodyKind: 'json',
  answer: 'json',
  response: orderSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['wrong-state'],
});
export const listOrders = defineRoute({
  id: 'listOrders',
  method: 'GET',
  path: '/api/orders',
  tag: 'orders',
  access: everyMember,
  summary: 'Orders of the workshop, newest first',
  answer: 'json',
  response: z.object({ orders: z.array(orderSchema) }),
  successStatus: 200,
});
export const readOrder = defineRoute({
  id: 'readOrder',
  method: 'GET',
  path: '/api/orders/:orderId',
  tag: 'orders',
  access: everyMember,
  summary: 'One order with its timeline',
  params: orderIdParams,
  answer: 'json',
  response: orderSchema,
  successStatus: 200,
});
export const openCheckout = defineRoute({
  id: 'openCheckout',
  method: 'POST',
  path: '/api/orders/:orderId/checkout',
  tag: 'orders',
  access: makers,
  summary: 'Open the hosted payment page for an order',
  params: orderIdParams,
  answer: 'json',
  response: z.object({ url: z.url() }),
  successStatus: 201,
  idempotent: true,
  problems: ['wrong-state', 'service-unreachable'],
});
export const cancelOrder = defineRoute({
  id: 'cancelOrder',
  method: 'POST',
  path: '/api/orders/:orderId/cancel',
  tag: 'orders',
  access: makers,
  summary: 'Cancel an order that is not paid yet',
  params: orderIdParams,
  answer: 'json',
  response: orderSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['wrong-state', 'stale-row'],
});
export const receivePaymentEvent = defineRoute({
  id: 'receivePaymentEvent',
  method: 'POST',
  path: '/api/webhooks/payments',
  tag: 'webhooks',
  access: 'service',
  summary: 'Signed events of the payment host',
  bodyKind: 'raw',
  answer: 'empty',
  successStatus: 204,
});
export const receiveCuttingCallback = defineRoute({
  id: 'receiveCuttingCallback',
  method: 'POST',
  path: '/api/webhooks/cutting',
  tag: 'webhooks',
  access: 'service',
  summary: 'Signed progress of the cutting service',
  bodyKind: 'raw',
  answer: 'empty',
  successStatus: 204,
});
