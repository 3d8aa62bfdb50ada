import type { Money } from '@foldwright/shared/contracts/scalars';

/** What is to be paid, and where the person goes afterwards. The amount always comes from our own order. */
export interface CheckoutRequest {
  readonly orderId: string;
  readonly description: string;
  readonly amount: Money;
  readonly customerEmail: string;
  readonly successUrl: string;
  readonly cancelUrl: string;
  /** The same key with the same request gives the same session, however often it is sent. */
  readonly idempotencyKey: string;
}

export interface RefundRequest {
  readonly orderId: string;
  readonly paymentId: string;
  /** Part of the payment, minor units; null for all that is left of it. */
  readonly amountMinor: number | null;
  readonly idempotencyKey: string;
}

export interface CheckoutSession {
  readonly id: string;
  readonly state: 'open' | 'paid' | 'expired';
  /** Address of the hosted page; null once it is closed. */
  readonly url: string | null;
}

/** What a signed event of the payment host means to us. `at` is the host's own time. */
export type PaymentEvent = {
  readonly id: string;
  readonly at: Date;
} & (
  | {
      readonly kind: 'paid';
      readonly orderId: string;
      readonly sessionId: string;
      readonly paymentId: string;
      readonly amount: { readonly amountMinor: number; readonly currency: string };
    }
  | { readonly kind: 'failed'; readonly orderId: string; readonly paymentId: string; readonly message: string }
  | { readonly kind: 'checkout-ended'; readonly orderId: string; readonly sessionId: string }
  | { readonly kind: 'refunded'; readonly orderId: string; readonly paymentId: string; readonly refundedMinor: number }
  | { readonly kind: 'of-no-concern'; readonly type: string }
);

/** An event about money or a payment page of ours. */
export type MoneyEvent = Exclude<PaymentEvent, { kind: 'of-no-concern' }>;

/** A message that does not prove where it comes from, or is too old to count. */
export class UnprovenMessage extends Error {}

/** The payment host did not answer in time, or not at all. What was asked may or may not have happened. */
export class PaymentHostUnreachable extends Error {}

/** The payment host understood and said no. */
export class PaymentHostRefused extends Error {
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

/** Hosted payments. One real adapter; another host means another adapter. */
export interface PaymentHost {
  /** @throws PaymentHostUnreachable, PaymentHostRefused */
  openCheckout(request: CheckoutRequest): Promise<CheckoutSession>;
  /**
   * A page that the host doesn't know any more counts as expired.
   * @throws PaymentHostUnreachable, PaymentHostRefused
   */
  readCheckout(sessionId: string): Promise<CheckoutSession>;
  /**
   * Close an open page, so that nobody can pay there any more; one that is closed already stays as it is.
   * @throws PaymentHostUnreachable, PaymentHostRefused
   */
  closeCheckout(sessionId: string): Promise<CheckoutSession>;
  /**
   * Send a payment back, whole or in part. The same key gives the same refund, however often it is sent; a payment that
   * went back whole already counts as done.
   * @returns whether the money has gone through; if not, an event tells of it later
   * @throws PaymentHostUnreachable, PaymentHostRefused
   */
  refund(request: RefundRequest): Promise<{ readonly isDone: boolean }>;
  /**
   * Prove and read a message, from its bytes as they came.
   * @throws UnprovenMessage
   */
  readEvent(body: Buffer, signature: string | undefined): PaymentEvent;
}
