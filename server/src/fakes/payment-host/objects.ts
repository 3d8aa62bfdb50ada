import { z } from 'zod';
import { deliverySchema } from '../callback-sender';

const metadata = z.record(z.string(), z.string());

export const sessionSchema = z.object({
  id: z.string(),
  object: z.literal('checkout.session'),
  status: z.enum(['open', 'complete', 'expired']),
  payment_status: z.enum(['unpaid', 'paid']),
  mode: z.literal('payment'),
  amount_total: z.number(),
  amount_subtotal: z.number(),
  currency: z.string(),
  client_reference_id: z.string().nullable(),
  customer_email: z.string().nullable(),
  payment_intent: z.string().nullable(),
  success_url: z.string(),
  cancel_url: z.string().nullable(),
  url: z.string().nullable(),
  created: z.number(),
  expires_at: z.number(),
  livemode: z.literal(false),
  metadata,
});
export type Session = z.output<typeof sessionSchema>;

export const intentSchema = z.object({
  id: z.string(),
  object: z.literal('payment_intent'),
  status: z.enum(['requires_payment_method', 'succeeded']),
  amount: z.number(),
  amount_received: z.number(),
  currency: z.string(),
  latest_charge: z.string().nullable(),
  last_payment_error: z.object({ code: z.string(), message: z.string(), type: z.literal('card_error') }).nullable(),
  created: z.number(),
  livemode: z.literal(false),
  metadata,
});
export type Intent = z.output<typeof intentSchema>;

export const chargeSchema = z.object({
  id: z.string(),
  object: z.literal('charge'),
  status: z.literal('succeeded'),
  amount: z.number(),
  amount_refunded: z.number(),
  refunded: z.boolean(),
  currency: z.string(),
  payment_intent: z.string(),
  created: z.number(),
  livemode: z.literal(false),
  metadata,
});
export type Charge = z.output<typeof chargeSchema>;

export const refundSchema = z.object({
  id: z.string(),
  object: z.literal('refund'),
  status: z.literal('succeeded'),
  amount: z.number(),
  currency: z.string(),
  charge: z.string(),
  payment_intent: z.string(),
  reason: z.string().nullable(),
  created: z.number(),
  metadata,
});
export type Refund = z.output<typeof refundSchema>;

/** How the desk behaves towards refunds; nothing given means well. */
export const refundMoodSchema = z.object({ refunds: z.enum(['refused', 'lost']).optional() });
export type RefundMood = z.output<typeof refundMoodSchema>;

/** What a session shows on its page besides the sum. */
const sessionLines = z.array(z.object({ name: z.string(), quantity: z.number(), unitAmountMinor: z.number() }));

export const paymentStateSchema = z.object({
  sessions: z.record(z.string(), sessionSchema),
  lines: z.record(z.string(), sessionLines),
  intentMetadata: z.record(z.string(), metadata),
  intents: z.record(z.string(), intentSchema),
  charges: z.record(z.string(), chargeSchema),
  refunds: z.record(z.string(), refundSchema),
  answers: z.record(z.string(), z.object({ fingerprint: z.string(), status: z.number(), body: z.string() })),
  deliveries: z.array(deliverySchema),
  eventCount: z.number(),
});
export type PaymentState = z.output<typeof paymentStateSchema>;

export const EMPTY_PAYMENT_STATE: PaymentState = {
  sessions: {},
  lines: {},
  intentMetadata: {},
  intents: {},
  charges: {},
  refunds: {},
  answers: {},
  deliveries: [],
  eventCount: 0,
};
