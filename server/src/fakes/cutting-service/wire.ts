import { z } from 'zod';
import { deliverySchema } from '../callback-sender';

/** What a customer sends to be priced. Sizes in mm, angles in degrees from flat. */
export const quoteRequestSchema = z.object({
  reference: z.string().min(1).max(200),
  partName: z.string().min(1).max(200),
  dxf: z.string().min(1).max(5_000_000),
  material: z.string().min(1),
  thicknessMm: z.number().positive(),
  quantities: z.array(z.number().int().positive()).min(1).max(10),
  currency: z.enum(['EUR', 'USD']),
  statement: z.enum(['cut-and-bend-to-our-flat', 'formed-sizes-rule']),
  bends: z.array(
    z.object({
      name: z.string(),
      angleDeg: z.number().positive(),
      direction: z.enum(['toward', 'away']),
      insideRadiusMm: z.number().nonnegative(),
      lengthMm: z.number().positive(),
    }),
  ),
});
export type QuoteRequest = z.output<typeof quoteRequestSchema>;

export const readingsSchema = z.object({
  widthMm: z.number(),
  heightMm: z.number(),
  cutLengthMm: z.number(),
  pierces: z.number(),
  bendLines: z.number(),
});
/** What the shop measured on the drawing itself. */
export type Readings = z.output<typeof readingsSchema>;

export const breakSchema = z.object({
  quantity: z.number(),
  eachMinor: z.number(),
  totalMinor: z.number(),
  leadTimeDays: z.number(),
  lines: z.array(z.object({ label: z.string(), amountMinor: z.number() })),
});
export type PriceBreak = z.output<typeof breakSchema>;

export const quoteSchema = z.object({
  id: z.string(),
  reference: z.string(),
  state: z.enum(['priced', 'refused']),
  currency: z.enum(['EUR', 'USD']),
  breaks: z.array(breakSchema),
  reasons: z.array(z.object({ code: z.string(), text: z.string() })),
  readings: readingsSchema.nullable(),
  validUntil: z.string(),
  dxfSha256: z.string(),
});
export type Quote = z.output<typeof quoteSchema>;

export const orderRequestSchema = z.object({
  /** The customer's own number for the order; a second request with the same one answers with the first order. */
  reference: z.string().min(1).max(200),
  quoteId: z.string().min(1),
  quantity: z.number().int().positive(),
  dxf: z.string().min(1).max(5_000_000),
  /** PDF, base64. */
  drawing: z.string().min(1).max(20_000_000),
});
export type OrderRequest = z.output<typeof orderRequestSchema>;

export const ORDER_STEPS = ['accepted', 'cutting', 'bending', 'shipped'] as const;
export const orderStateSchema = z.enum(['received', ...ORDER_STEPS, 'refused', 'cancelled']);
export type OrderState = z.output<typeof orderStateSchema>;

export const shopOrderSchema = z.object({
  id: z.string(),
  reference: z.string(),
  quoteId: z.string(),
  quantity: z.number(),
  totalMinor: z.number(),
  currency: z.string(),
  state: orderStateSchema,
  trackingCode: z.string().nullable(),
  reason: z.string().nullable(),
  hasBends: z.boolean(),
  history: z.array(z.object({ state: orderStateSchema, at: z.string() })),
});
export type ShopOrder = z.output<typeof shopOrderSchema>;

/** Ways in which the shop can be told to misbehave while somebody tries the customer's side. */
export const moodSchema = z.object({
  refuseOrders: z.boolean().default(false),
  answerDelayMs: z.number().int().min(0).max(120_000).default(0),
  answerNonsense: z.boolean().default(false),
  failEveryRequest: z.boolean().default(false),
});
export type Mood = z.output<typeof moodSchema>;

export const shopStateSchema = z.object({
  quotes: z.record(z.string(), quoteSchema),
  orders: z.record(z.string(), shopOrderSchema),
  deliveries: z.array(deliverySchema),
  counter: z.number(),
  mood: moodSchema,
});
export type ShopState = z.output<typeof shopStateSchema>;

export const EMPTY_SHOP_STATE: ShopState = {
  quotes: {},
  orders: {},
  deliveries: [],
  counter: 0,
  mood: { refuseOrders: false, answerDelayMs: 0, answerNonsense: false, failEveryRequest: false },
};
