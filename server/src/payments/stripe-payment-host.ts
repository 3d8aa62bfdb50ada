import Stripe from 'stripe';
import type { CheckoutRequest, CheckoutSession, PaymentEvent, PaymentHost, RefundRequest } from './payment-host';
import { PaymentHostRefused, PaymentHostUnreachable, UnprovenMessage } from './payment-host';

export interface StripePaymentHostOptions {
  readonly apiKey: string;
  readonly hostUrl: string;
  readonly webhookSecret: string;
  /** How long one try may take, ms. */
  readonly timeoutMs?: number;
  readonly retries?: number;
}

/** How old a signed message may be, seconds: long enough for clocks that differ, too short for a replay. */
const MESSAGE_AGE_S = 300;

/** Payments through the Stripe SDK, against the host that the settings name. */
export class StripePaymentHost implements PaymentHost {
  private readonly stripe: Stripe;

  constructor(private readonly options: StripePaymentHostOptions) {
    const host = new URL(options.hostUrl);
    const isPlain = host.protocol === 'http:';
    this.stripe = new Stripe(options.apiKey, {
      host: host.hostname,
      port: host.port === '' ? (isPlain ? 80 : 443) : Number(host.port),
      protocol: isPlain ? 'http' : 'https',
      telemetry: false,
      timeout: options.timeoutMs ?? 8000,
      maxNetworkRetries: options.retries ?? 2,
    });
  }

  async openCheckout(request: CheckoutRequest): Promise<CheckoutSession> {
    const metadata = { orderId: request.orderId };
    const session = await this.ask(() =>
      this.stripe.checkout.sessions.create(
        {
          mode: 'payment',
          client_reference_id: request.orderId,
          customer_email: request.customerEmail,
          success_url: request.successUrl,
          cancel_url: request.cancelUrl,
          metadata,
          // Failed cards and refunds are told about the payment, not about the session: both carry the order.
          payment_intent_data: { metadata },
          line_items: [
            {
              quantity: 1,
              price_data: {
                currency: request.amount.currency.toLowerCase(),
                unit_amount: request.amount.amountMinor,
                product_data: { name: request.description },
              },
            },
          ],
        },
        { idempotencyKey: request.idempotencyKey },
      ),
    );
    return sessionOf(session);
  }

  async readCheckout(sessionId: string): Promise<CheckoutSession> {
    try {
      return sessionOf(await this.ask(() => this.stripe.checkout.sessions.retrieve(sessionId)));
    } catch (error) {
      // A host that has forgotten the page can't take money on it: the next one may be opened.
      if (error instanceof PaymentHostRefused && error.code === 'resource_missing') {
        return { id: sessionId, state: 'expired', url: null };
      }
      throw error;
    }
  }

  async closeCheckout(sessionId: string): Promise<CheckoutSession> {
    const session = await this.readCheckout(sessionId);
    if (session.state !== 'open') return session;
    try {
      return sessionOf(await this.ask(() => this.stripe.checkout.sessions.expire(sessionId)));
    } catch (error) {
      // Somebody paid or the time ran out between the two requests: what it is now is the answer.
      if (error instanceof PaymentHostRefused) return this.readCheckout(sessionId);
      throw error;
    }
  }

  async refund({ orderId, paymentId, amountMinor, idempotencyKey }: RefundRequest): Promise<{ isDone: boolean }> {
    try {
      const refund = await this.ask(() =>
        this.stripe.refunds.create(
          {
            payment_intent: paymentId,
            metadata: { orderId },
            ...(amountMinor === null ? {} : { amount: amountMinor }),
          },
          { idempotencyKey },
        ),
      );
      if (refund.status === 'failed' || refund.status === 'canceled') {
        throw new PaymentHostRefused(
          refund.failure_reason ?? refund.status,
          'The payment host could not send it back.',
        );
      }
      return { isDone: refund.status === 'succeeded' };
    } catch (error) {
      const isAllBack = error instanceof PaymentHostRefused && error.code === 'charge_already_refunded';
      if (isAllBack && amountMinor === null) return { isDone: true };
      throw error;
    }
  }

  readEvent(body: Buffer, signature: string | undefined): PaymentEvent {
    if (signature === undefined) throw new UnprovenMessage('The message carries no signature.');
    try {
      return eventOf(this.stripe.webhooks.constructEvent(body, signature, this.options.webhookSecret, MESSAGE_AGE_S));
    } catch (error) {
      if (error instanceof Stripe.errors.StripeSignatureVerificationError || error instanceof SyntaxError) {
        throw new UnprovenMessage('The signature does not fit the message, or the message is too old.');
      }
      throw error;
    }
  }

  private async ask<T>(request: () => Promise<T>): Promise<T> {
    try {
      return await request();
    } catch (error) {
      if (!(error instanceof Stripe.errors.StripeError)) throw error;
      const isOnTheirSide = error.statusCode === undefined || error.statusCode >= 500 || error.statusCode === 429;
      if (isOnTheirSide) throw new PaymentHostUnreachable(error.message, { cause: error });
      throw new PaymentHostRefused(error.code ?? error.type, error.message);
    }
  }
}

function sessionOf(session: Stripe.Checkout.Session): CheckoutSession {
  const isPaid = session.payment_status !== 'unpaid' || session.status === 'complete';
  const state = isPaid ? 'paid' : session.status === 'open' ? 'open' : 'expired';
  return { id: session.id, state, url: session.url };
}

const idOf = (reference: string | { id: string } | null | undefined) =>
  typeof reference === 'string' ? reference : (reference?.id ?? '');

function eventOf(event: Stripe.Event): PaymentEvent {
  const base = { id: event.id, at: new Date(event.created * 1000) };
  const ofNoConcern: PaymentEvent = { ...base, kind: 'of-no-concern', type: event.type };
  switch (event.type) {
    case 'checkout.session.completed': {
      const session = event.data.object;
      const orderId = session.metadata?.['orderId'];
      if (orderId === undefined || session.payment_status !== 'paid') return ofNoConcern;
      const amount = { amountMinor: session.amount_total ?? 0, currency: (session.currency ?? '').toUpperCase() };
      const paymentId = idOf(session.payment_intent);
      return { ...base, kind: 'paid', orderId, sessionId: session.id, paymentId, amount };
    }
    case 'checkout.session.expired': {
      const orderId = event.data.object.metadata?.['orderId'];
      if (orderId === undefined) return ofNoConcern;
      return { ...base, kind: 'checkout-ended', orderId, sessionId: event.data.object.id };
    }
    case 'payment_intent.payment_failed': {
      const intent = event.data.object;
      const orderId = intent.metadata['orderId'];
      if (orderId === undefined) return ofNoConcern;
      const message = intent.last_payment_error?.message ?? 'The card was declined.';
      return { ...base, kind: 'failed', orderId, paymentId: intent.id, message };
    }
    case 'charge.refunded': {
      const charge = event.data.object;
      const orderId = charge.metadata['orderId'];
      if (orderId === undefined) return ofNoConcern;
      const paymentId = idOf(charge.payment_intent);
      return { ...base, kind: 'refunded', orderId, paymentId, refundedMinor: charge.amount_refunded };
    }
    default:
      return ofNoConcern;
  }
}
