import { randomBytes } from 'node:crypto';
import type { FormRecord } from './form-body';
import { recordAt, textAt, textsOf } from './form-body';
import type { Charge, Intent, PaymentState, Refund, Session } from './objects';
import { readTestCard } from './test-cards';

/** A request that the host won't do; written to the caller in the shape its client library expects. */
export class HostRefusal extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly type = 'invalid_request_error',
  ) {
    super(message);
  }
}

export type EventType =
  'checkout.session.completed' | 'checkout.session.expired' | 'payment_intent.payment_failed' | 'charge.refunded';

export interface LedgerContext {
  readonly baseUrl: () => string;
  readonly now: () => Date;
  readonly announce: (type: EventType, object: Session | Intent | Charge) => void;
}

const HALF_AN_HOUR_S = 30 * 60;
const ONE_DAY_S = 24 * 60 * 60;
const newId = (prefix: string) => `${prefix}_${randomBytes(12).toString('hex')}`;

/** Sessions, payments and refunds. Every change of money happens here and is announced once. */
export class PaymentLedger {
  constructor(
    private readonly state: PaymentState,
    private readonly context: LedgerContext,
  ) {}

  createSession(form: FormRecord): Session {
    const lines = readLines(form);
    const currency = lines[0]?.currency;
    if (currency === undefined) throw new HostRefusal(400, 'parameter_missing', 'Missing required param: line_items.');
    if (lines.some((line) => line.currency !== currency)) {
      throw new HostRefusal(400, 'parameter_invalid', 'All line items must use one currency.');
    }
    if (textAt(form, 'mode') !== 'payment')
      throw new HostRefusal(400, 'parameter_invalid', 'Only mode=payment is known.');
    const successUrl = textAt(form, 'success_url');
    if (successUrl === undefined || !URL.canParse(successUrl)) {
      throw new HostRefusal(400, 'parameter_missing', 'success_url must be an absolute address.');
    }
    const total = lines.reduce((sum, line) => sum + line.quantity * line.unitAmountMinor, 0);
    if (total < 50) throw new HostRefusal(400, 'amount_too_small', 'The total must be at least 50 minor units.');
    const created = this.seconds();
    const expiresAt = Number(textAt(form, 'expires_at') ?? created + ONE_DAY_S);
    if (!(expiresAt >= created + HALF_AN_HOUR_S - 60 && expiresAt <= created + ONE_DAY_S + 60)) {
      throw new HostRefusal(400, 'parameter_invalid', 'expires_at must lie between 30 minutes and 24 hours ahead.');
    }
    const id = newId('cs_test');
    const session: Session = {
      id,
      object: 'checkout.session',
      status: 'open',
      payment_status: 'unpaid',
      mode: 'payment',
      amount_total: total,
      amount_subtotal: total,
      currency,
      client_reference_id: textAt(form, 'client_reference_id') ?? null,
      customer_email: textAt(form, 'customer_email') ?? null,
      payment_intent: null,
      success_url: successUrl,
      cancel_url: textAt(form, 'cancel_url') ?? null,
      url: `${this.context.baseUrl()}/pay/${id}`,
      created,
      expires_at: expiresAt,
      livemode: false,
      metadata: textsOf(recordAt(form, 'metadata')),
    };
    this.state.sessions[id] = session;
    this.state.lines[id] = lines;
    this.state.intentMetadata[id] = textsOf(recordAt(form, 'payment_intent_data', 'metadata'));
    return session;
  }

  session(id: string): Session {
    const session = this.state.sessions[id];
    if (session === undefined) throw new HostRefusal(404, 'resource_missing', `No such checkout.session: ${id}`);
    if (session.status === 'open' && session.expires_at <= this.seconds()) this.endSession(session);
    return session;
  }

  linesOf(id: string): PaymentState['lines'][string] {
    return this.state.lines[id] ?? [];
  }

  intent(id: string): Intent {
    const intent = this.state.intents[id];
    if (intent === undefined) throw new HostRefusal(404, 'resource_missing', `No such payment_intent: ${id}`);
    return intent;
  }

  expireSession(id: string): Session {
    const session = this.session(id);
    if (session.status !== 'open') {
      throw new HostRefusal(
        400,
        'checkout_session_not_open',
        `Only open sessions can be expired, this one is ${session.status}.`,
      );
    }
    this.endSession(session);
    return session;
  }

  /** End every open session whose time is over. */
  expireOverdueSessions(): void {
    for (const session of Object.values(this.state.sessions)) this.session(session.id);
  }

  /**
   * Try a card on an open session.
   * @returns null when it is paid (or was already), else what the page tells the person
   */
  payWithCard(id: string, card: { number: string; expiry: string; code: string }): string | null {
    const session = this.session(id);
    if (session.status === 'complete') return null;
    if (session.status === 'expired') return 'This payment page has run out. Go back and open it again.';
    const reading = readTestCard(card, this.context.now());
    if (reading.kind === 'mistyped') return reading.message;
    const intent = this.intentOf(session);
    if (reading.kind === 'declined') {
      intent.last_payment_error = { code: reading.code, message: reading.message, type: 'card_error' };
      this.context.announce('payment_intent.payment_failed', intent);
      return reading.message;
    }
    const charge: Charge = {
      id: newId('ch'),
      object: 'charge',
      status: 'succeeded',
      amount: session.amount_total,
      amount_refunded: 0,
      refunded: false,
      currency: session.currency,
      payment_intent: intent.id,
      created: this.seconds(),
      livemode: false,
      metadata: intent.metadata,
    };
    this.state.charges[charge.id] = charge;
    Object.assign(intent, {
      status: 'succeeded',
      amount_received: charge.amount,
      latest_charge: charge.id,
      last_payment_error: null,
    });
    Object.assign(session, { status: 'complete', payment_status: 'paid', url: null });
    this.context.announce('checkout.session.completed', session);
    return null;
  }

  refund(form: FormRecord): Refund {
    const intent = this.intent(textAt(form, 'payment_intent') ?? '');
    const charge = intent.latest_charge === null ? undefined : this.state.charges[intent.latest_charge];
    if (charge === undefined)
      throw new HostRefusal(400, 'payment_intent_unexpected_state', 'Nothing was paid on this.');
    const left = charge.amount - charge.amount_refunded;
    if (left === 0)
      throw new HostRefusal(400, 'charge_already_refunded', `Charge ${charge.id} has already been refunded.`);
    const amount = Number(textAt(form, 'amount') ?? left);
    if (!Number.isInteger(amount) || amount <= 0 || amount > left) {
      throw new HostRefusal(400, 'parameter_invalid', `The amount must be between 1 and ${left}.`);
    }
    const refund: Refund = {
      id: newId('re'),
      object: 'refund',
      status: 'succeeded',
      amount,
      currency: charge.currency,
      charge: charge.id,
      payment_intent: intent.id,
      reason: textAt(form, 'reason') ?? null,
      created: this.seconds(),
      metadata: textsOf(recordAt(form, 'metadata')),
    };
    this.state.refunds[refund.id] = refund;
    charge.amount_refunded += amount;
    charge.refunded = charge.amount_refunded === charge.amount;
    this.context.announce('charge.refunded', charge);
    return refund;
  }

  private endSession(session: Session): void {
    Object.assign(session, { status: 'expired', url: null });
    this.context.announce('checkout.session.expired', session);
  }

  private intentOf(session: Session): Intent {
    if (session.payment_intent !== null) return this.intent(session.payment_intent);
    const intent: Intent = {
      id: newId('pi'),
      object: 'payment_intent',
      status: 'requires_payment_method',
      amount: session.amount_total,
      amount_received: 0,
      currency: session.currency,
      latest_charge: null,
      last_payment_error: null,
      created: this.seconds(),
      livemode: false,
      metadata: this.state.intentMetadata[session.id] ?? {},
    };
    this.state.intents[intent.id] = intent;
    session.payment_intent = intent.id;
    return intent;
  }

  private seconds(): number {
    return Math.floor(this.context.now().getTime() / 1000);
  }
}

interface Line {
  readonly name: string;
  readonly quantity: number;
  readonly unitAmountMinor: number;
  readonly currency: string;
}

function readLines(form: FormRecord): Line[] {
  const items = Object.values(recordAt(form, 'line_items')).filter((item) => typeof item === 'object');
  return items.map((item) => {
    const unitAmountMinor = Number(textAt(item, 'price_data', 'unit_amount'));
    const quantity = Number(textAt(item, 'quantity') ?? '1');
    const currency = textAt(item, 'price_data', 'currency');
    if (!Number.isInteger(unitAmountMinor) || unitAmountMinor < 0 || !Number.isInteger(quantity) || quantity < 1) {
      throw new HostRefusal(400, 'parameter_invalid', 'unit_amount and quantity must be whole numbers.');
    }
    if (currency === undefined || !/^[a-z]{3}$/.test(currency)) {
      throw new HostRefusal(400, 'parameter_invalid', 'currency must be three lower-case letters.');
    }
    return { name: textAt(item, 'price_data', 'product_data', 'name') ?? 'Item', quantity, unitAmountMinor, currency };
  });
}
