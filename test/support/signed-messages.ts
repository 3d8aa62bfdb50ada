import { createHmac } from 'node:crypto';
import Stripe from 'stripe';
import type { Commerce } from './commerce';
import { CUTTING_SECRET, PAYMENT_SECRET } from './commerce';

/** A message of an outside service, ready to be posted. */
export interface SignedMessage {
  readonly path: string;
  readonly body: string;
  readonly headers: Record<string, string>;
}

/** Deviations from a message as it ought to be. */
export interface MessageFaults {
  readonly secret?: string;
  /** How long ago it claims to have been sent, seconds. */
  readonly ageS?: number;
}

type PaymentType =
  'checkout.session.completed' | 'checkout.session.expired' | 'payment_intent.payment_failed' | 'charge.refunded';

/** What the payment host says about an order, in its own shape, signed by its own library. */
export function paymentMessage(
  event: { id: string; type: PaymentType | string; at: Date; object: object },
  faults: MessageFaults = {},
): SignedMessage {
  const { id, type, at, object } = event;
  const created = Math.floor(at.getTime() / 1000);
  const body = JSON.stringify({ id, object: 'event', type, created, livemode: false, data: { object } });
  const signature = Stripe.webhooks.generateTestHeaderString({
    payload: body,
    secret: faults.secret ?? PAYMENT_SECRET,
    timestamp: Math.floor(Date.now() / 1000) - (faults.ageS ?? 0),
  });
  return { path: '/api/webhooks/payments', body, headers: { 'stripe-signature': signature } };
}

/** What the cutting service says about an order. */
export function cuttingMessage(
  event: { id: string; at: Date; reference: string; state: string; trackingCode?: string; reason?: string },
  faults: MessageFaults = {},
): SignedMessage {
  const { id, at, reference, state, trackingCode = null, reason = null } = event;
  const order = { id: 'A-1', reference, state, trackingCode, reason };
  const body = JSON.stringify({ id, type: `order.${state}`, sequence: 1, at: at.toISOString(), order });
  const time = String(Date.now() - (faults.ageS ?? 0) * 1000);
  const signature = createHmac('sha256', faults.secret ?? CUTTING_SECRET)
    .update(`${time}.${body}`)
    .digest('hex');
  const headers = { 'x-ashmarrow-time': time, 'x-ashmarrow-signature': signature };
  return { path: '/api/webhooks/cutting', body, headers };
}

/** Post a message as the service would. */
export function deliver({ publicUrl }: Pick<Commerce, 'publicUrl'>, message: SignedMessage): Promise<Response> {
  const { path, body, headers } = message;
  return fetch(`${publicUrl}${path}`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', ...headers },
    body,
  });
}
