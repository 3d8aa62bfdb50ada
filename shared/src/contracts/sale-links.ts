import * as z from 'zod/mini';
import { defineRoute } from './route';
import { moneySchema, timestamp } from './scalars';
import { SALE_STATES, saleShape } from './sales';
import { shopFrontSchema } from './storefront';

const linkParams = z.strictObject({ link: z.string().check(z.regex(/^[A-Za-z0-9_-]{20,80}$/)) });

/** A sale as its customer sees it, behind a private link. */
export const customerOrderSchema = z.object({
  shop: shopFrontSchema,
  ...saleShape,
  canPay: z.boolean(),
  canCancel: z.boolean(),
  hasFittingSheet: z.boolean(),
  hasInvoice: z.boolean(),
});
export type CustomerOrder = z.output<typeof customerOrderSchema>;

export const readSaleByLink = defineRoute({
  id: 'readSaleByLink',
  method: 'GET',
  path: '/api/sale-links/:link',
  tag: 'storefront',
  access: 'public',
  summary: 'A customer’s order by its private link',
  params: linkParams,
  answer: 'json',
  response: customerOrderSchema,
  successStatus: 200,
});
export const openSaleCheckout = defineRoute({
  id: 'openSaleCheckout',
  method: 'POST',
  path: '/api/sale-links/:link/checkout',
  tag: 'storefront',
  access: 'public',
  summary: 'Open the hosted payment page, or answer the one that is open',
  params: linkParams,
  answer: 'json',
  response: z.object({ url: z.url() }),
  successStatus: 201,
  idempotent: true,
  problems: ['wrong-state', 'service-unreachable', 'too-many-requests'],
});
export const cancelSaleByLink = defineRoute({
  id: 'cancelSaleByLink',
  method: 'POST',
  path: '/api/sale-links/:link/cancel',
  tag: 'storefront',
  access: 'public',
  summary: 'Cancel the order as long as nothing of it was shipped; what was paid goes back',
  params: linkParams,
  answer: 'json',
  response: customerOrderSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['wrong-state', 'stale-row', 'too-many-requests'],
});
export const askByLink = defineRoute({
  id: 'askByLink',
  method: 'POST',
  path: '/api/sale-links/:link/messages',
  tag: 'storefront',
  access: 'public',
  summary: 'Ask about fit on the order; the workshop gets it by mail',
  params: linkParams,
  body: z.strictObject({ text: z.string().check(z.trim(), z.minLength(1), z.maxLength(3000)) }),
  bodyKind: 'json',
  answer: 'json',
  response: customerOrderSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists', 'too-many-requests'],
});
export const readFittingSheet = defineRoute({
  id: 'readFittingSheet',
  method: 'GET',
  path: '/api/sale-links/:link/fitting-sheet',
  tag: 'storefront',
  access: 'public',
  summary: 'Fitting sheet (PDF): what it is, hardware, steps, cautions',
  params: linkParams,
  answer: 'file',
  successStatus: 200,
});
export const readInvoiceByLink = defineRoute({
  id: 'readInvoiceByLink',
  method: 'GET',
  path: '/api/sale-links/:link/invoice',
  tag: 'storefront',
  access: 'public',
  summary: 'Invoice (PDF) once it is paid',
  params: linkParams,
  answer: 'file',
  successStatus: 200,
  problems: ['wrong-state'],
});
export const listPurchases = defineRoute({
  id: 'listPurchases',
  method: 'GET',
  path: '/api/purchases',
  tag: 'storefront',
  access: 'signed-in',
  summary: 'What the person who is signed in has bought, in every shop',
  answer: 'json',
  response: z.object({
    purchases: z.array(
      z.object({
        link: z.string(),
        number: z.int(),
        shopName: z.string(),
        shopSlug: z.string(),
        placedAt: timestamp,
        what: z.string(),
        total: moneySchema,
        state: z.enum(SALE_STATES),
      }),
    ),
  }),
  successStatus: 200,
});
