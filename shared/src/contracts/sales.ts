import * as z from 'zod/mini';
import { partDocumentSchema } from './part-document-schema';
import { defineRoute } from './route';
import { moneySchema, oneLine, rowId, timestamp } from './scalars';
import { questionSchema } from './questions';
import { bracketRefSchema, finishId, handSchema } from './stock';
import { addressSchema } from './storefront';

/** How far a sale to a customer is, derived from its facts. */
export const SALE_STATES = ['placed', 'paid', 'partly-shipped', 'shipped', 'delivered', 'cancelled'] as const;
export const SALE_PAYMENT_STATES = ['open', 'paid', 'failed', 'partly-refunded', 'refunded'] as const;

export const SALE_EVENTS = [
  'placed',
  'checkout-opened',
  'payment-failed',
  'paid',
  'cut-ordered',
  'stock-arrived',
  'shipped',
  'delivered',
  'cancelled',
  'returned',
  'refund-asked',
  'refund-failed',
  'refunded',
  'mail-sent',
] as const;
export const saleEventSchema = z.object({ id: rowId, at: timestamp, kind: z.enum(SALE_EVENTS), text: z.string() });

/**
 * One thing that has to reach the customer, with the exact revision, hash and hand. At every moment
 * `quantity` = `shipped` + `reserved` + `short` + `cancelled`; `returned` is counted among `shipped`.
 */
export const saleItemSchema = z.object({
  id: rowId,
  lineId: rowId,
  what: z.discriminatedUnion('kind', [
    z.object({
      kind: z.literal('bracket'),
      ...bracketRefSchema.shape,
      finishId,
      materialLabel: z.string(),
      document: partDocumentSchema,
    }),
    z.object({ kind: z.literal('hardware'), hardwareId: rowId, name: z.string(), specification: z.string() }),
  ]),
  quantity: z.int(),
  shipped: z.int(),
  reserved: z.int(),
  short: z.int(),
  cancelled: z.int(),
  returned: z.int(),
  /** Of `short`, what the cutting service is making for this sale. */
  beingCut: z.int(),
});
export type SaleItem = z.output<typeof saleItemSchema>;

export const saleLineSchema = z.object({
  id: rowId,
  title: z.string(),
  kind: z.enum(['bracket', 'kit']),
  finishId,
  quantity: z.int(),
  cancelled: z.int(),
  each: moneySchema,
  total: moneySchema,
  tax: moneySchema,
});

export const shipmentSchema = z.object({
  id: rowId,
  /** 1, 2, 3 within the sale: “Parcel 1”. */
  number: z.int(),
  carrier: z.string(),
  trackingCode: z.nullable(z.string()),
  shippedAt: timestamp,
  deliveredAt: z.nullable(timestamp),
  items: z.array(z.object({ itemId: rowId, quantity: z.int() })),
});
export type Shipment = z.output<typeof shipmentSchema>;

export const refundSchema = z.object({
  id: rowId,
  amount: moneySchema,
  reason: z.string(),
  state: z.enum(['asked', 'sent', 'done', 'failed']),
  /** Words of the payment host when it refused. */
  problem: z.nullable(z.string()),
  askedAt: timestamp,
});

const totalsShape = {
  items: moneySchema,
  postage: moneySchema,
  taxName: z.string(),
  taxBasisPoints: z.int(),
  tax: moneySchema,
  total: moneySchema,
  refunded: moneySchema,
};

/** What a workshop and its customer both see of a sale. */
export const saleShape = {
  id: rowId,
  number: z.int(),
  state: z.enum(SALE_STATES),
  paymentState: z.enum(SALE_PAYMENT_STATES),
  placedAt: timestamp,
  customerName: z.string(),
  customerEmail: z.string(),
  address: addressSchema,
  lines: z.array(saleLineSchema),
  items: z.array(saleItemSchema),
  shipments: z.array(shipmentSchema),
  totals: z.object(totalsShape),
  events: z.array(saleEventSchema),
  questions: z.array(questionSchema),
  /** Days until the parcel leaves, as promised when it was ordered. */
  leavesInDays: z.int(),
  revision: z.int(),
};

/** A sale as the workshop sees it. */
export const saleSchema = z.object({
  ...saleShape,
  isGuest: z.boolean(),
  refunds: z.array(refundSchema),
  /** Orders to the cutting service that were placed for it. */
  cutOrders: z.array(
    z.object({ orderId: rowId, number: z.int(), state: z.string(), quantity: z.int(), partName: z.string() }),
  ),
  /** What can be done now, so that the page offers nothing that will be refused. */
  can: z.object({ ship: z.boolean(), cut: z.boolean(), cancel: z.boolean(), refundMinor: z.int() }),
});
export type Sale = z.output<typeof saleSchema>;

export const saleSummarySchema = z.object({
  id: rowId,
  number: z.int(),
  customerName: z.string(),
  placedAt: timestamp,
  state: z.enum(SALE_STATES),
  paymentState: z.enum(SALE_PAYMENT_STATES),
  what: z.string(),
  total: moneySchema,
  /** Pieces that neither lie on the shelf nor are being cut. */
  short: z.int(),
  unanswered: z.int(),
});
export type SaleSummary = z.output<typeof saleSummarySchema>;

const owners = ['owner'] as const;
const sellers = ['owner', 'fabricator'] as const;
const crew = ['owner', 'fabricator', 'viewer'] as const;
const saleIdParams = z.strictObject({ saleId: rowId });
const pieces = z.int().check(z.gte(1), z.lte(100_000));
const minor = z.int().check(z.gte(0), z.lte(100_000_000));

export const listSales = defineRoute({
  id: 'listSales',
  method: 'GET',
  path: '/api/sales',
  tag: 'sales',
  access: crew,
  summary: 'Sales to customers, what has to be done first',
  answer: 'json',
  response: z.object({ sales: z.array(saleSummarySchema) }),
  successStatus: 200,
});
export const readSale = defineRoute({
  id: 'readSale',
  method: 'GET',
  path: '/api/sales/:saleId',
  tag: 'sales',
  access: crew,
  summary: 'One sale with its parcels, its money and its timeline',
  params: saleIdParams,
  answer: 'json',
  response: saleSchema,
  successStatus: 200,
});
export const cutMissing = defineRoute({
  id: 'cutMissing',
  method: 'POST',
  path: '/api/sales/:saleId/cut-orders',
  tag: 'sales',
  access: sellers,
  summary: 'Ask prices for every missing bracket of a sale and place the orders to the cutting service',
  params: saleIdParams,
  answer: 'json',
  response: z.object({
    sale: saleSchema,
    /** What the cutting service would not take, in its words. */
    refused: z.array(z.object({ what: z.string(), reason: z.string() })),
  }),
  successStatus: 201,
  idempotent: true,
  problems: ['wrong-state', 'service-unreachable'],
});
export const shipSale = defineRoute({
  id: 'shipSale',
  method: 'POST',
  path: '/api/sales/:saleId/shipments',
  tag: 'sales',
  access: sellers,
  summary: 'Send a parcel with what is reserved for the sale; the customer gets a mail',
  params: saleIdParams,
  body: z.strictObject({
    items: z.array(z.strictObject({ itemId: rowId, quantity: pieces })).check(z.minLength(1), z.maxLength(200)),
    carrier: oneLine(60),
    trackingCode: z.nullable(oneLine(60)),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: saleSchema,
  successStatus: 201,
  ifMatch: true,
  idempotent: true,
  problems: ['wrong-state', 'not-enough-stock', 'stale-row'],
});
export const markDelivered = defineRoute({
  id: 'markDelivered',
  method: 'PUT',
  path: '/api/sales/:saleId/shipments/:shipmentId/delivery',
  tag: 'sales',
  access: sellers,
  summary: 'Note that a parcel has arrived',
  params: z.strictObject({ saleId: rowId, shipmentId: rowId }),
  answer: 'json',
  response: saleSchema,
  successStatus: 200,
});
export const readPackingSlip = defineRoute({
  id: 'readPackingSlip',
  method: 'GET',
  path: '/api/sales/:saleId/shipments/:shipmentId/packing-slip',
  tag: 'sales',
  access: crew,
  summary: 'Packing slip of a parcel (PDF): revision, hand, finish and picture of each piece',
  params: z.strictObject({ saleId: rowId, shipmentId: rowId }),
  answer: 'file',
  successStatus: 200,
});
export const readInvoice = defineRoute({
  id: 'readInvoice',
  method: 'GET',
  path: '/api/sales/:saleId/invoice',
  tag: 'sales',
  access: crew,
  summary: 'Invoice of a paid sale (PDF)',
  params: saleIdParams,
  answer: 'file',
  successStatus: 200,
  problems: ['wrong-state'],
});
export const cancelSale = defineRoute({
  id: 'cancelSale',
  method: 'POST',
  path: '/api/sales/:saleId/cancellations',
  tag: 'sales',
  access: owners,
  summary: 'Cancel what has not been shipped of some lines; what was paid for it goes back',
  params: saleIdParams,
  body: z.strictObject({
    lines: z.array(z.strictObject({ lineId: rowId, quantity: pieces })).check(z.minLength(1), z.maxLength(40)),
    reason: oneLine(200),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: saleSchema,
  successStatus: 201,
  ifMatch: true,
  idempotent: true,
  problems: ['wrong-state', 'stale-row'],
});
export const refundSale = defineRoute({
  id: 'refundSale',
  method: 'POST',
  path: '/api/sales/:saleId/refunds',
  tag: 'sales',
  access: owners,
  summary: 'Send part of the money back, up to what is left of the payment',
  params: saleIdParams,
  body: z.strictObject({ amountMinor: z.int().check(z.gte(1), z.lte(100_000_000)), reason: oneLine(200) }),
  bodyKind: 'json',
  answer: 'json',
  response: saleSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['wrong-state'],
});
export const retryRefund = defineRoute({
  id: 'retryRefund',
  method: 'POST',
  path: '/api/sales/:saleId/refunds/:refundId/retry',
  tag: 'sales',
  access: owners,
  summary: 'Try a refund again that the payment host refused; it is never sent twice',
  params: z.strictObject({ saleId: rowId, refundId: rowId }),
  answer: 'json',
  response: saleSchema,
  successStatus: 202,
  problems: ['wrong-state'],
});
export const recordReturn = defineRoute({
  id: 'recordReturn',
  method: 'POST',
  path: '/api/sales/:saleId/returns',
  tag: 'sales',
  access: sellers,
  summary: 'Take a shipped piece back, on the shelf or to scrap, and send money back for it',
  params: saleIdParams,
  body: z.strictObject({
    itemId: rowId,
    quantity: pieces,
    isBackOnShelf: z.boolean(),
    refundMinor: minor,
    reason: oneLine(200),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: saleSchema,
  successStatus: 201,
  ifMatch: true,
  idempotent: true,
  problems: ['wrong-state', 'stale-row'],
});
export const listBuyers = defineRoute({
  id: 'listBuyers',
  method: 'GET',
  path: '/api/revisions/:revisionId/buyers',
  tag: 'sales',
  access: crew,
  summary: 'Everybody who bought this very revision, alone or in a kit',
  params: z.strictObject({ revisionId: rowId }),
  answer: 'json',
  response: z.object({
    buyers: z.array(
      z.object({
        saleId: rowId,
        saleNumber: z.int(),
        customerName: z.string(),
        customerEmail: z.string(),
        placedAt: timestamp,
        inKit: z.nullable(z.string()),
        hash: z.string(),
        hand: handSchema,
        finishId,
        bought: z.int(),
        shipped: z.int(),
        returned: z.int(),
      }),
    ),
  }),
  successStatus: 200,
});
