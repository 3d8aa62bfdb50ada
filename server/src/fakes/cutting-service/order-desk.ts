import { createHash, randomBytes } from 'node:crypto';
import { judgeRequest } from './judge-request';
import { priceQuantity } from './price-quantity';
import { readDrawing, UnreadableDrawing } from './read-drawing';
import type { OrderRequest, OrderState, Quote, QuoteRequest, ShopOrder, ShopState } from './wire';

/** A request that the shop turns down at the counter. */
export class CounterRefusal extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

export interface DeskContext {
  readonly now: () => Date;
  /** Time of one step, ms. */
  readonly paceMs: number;
  readonly after: (delayMs: number, run: () => void) => void;
  readonly save: () => void;
  /** Tell the customer; `delayMs` holds the message back. */
  readonly announce: (body: string, id: string, copies: number, delayMs: number) => void;
}

const QUOTE_DAYS = 30;
const FINAL: readonly OrderState[] = ['shipped', 'refused', 'cancelled'];
const REFUSAL =
  'The last sheets of this thickness came in scratched and the mill gives no date. We have to hand this order back.';
const digest = (text: string) => createHash('sha256').update(text).digest('hex');

/** Quotes and orders of the invented shop; an order walks through the shop by itself, one step a pace. */
export class OrderDesk {
  constructor(
    private readonly state: ShopState,
    private readonly context: DeskContext,
  ) {}

  quote(request: QuoteRequest): Quote {
    const id = this.newId('Q');
    const priced = this.priceOrRefuse(request);
    const validUntil = new Date(this.context.now().getTime() + QUOTE_DAYS * 86_400_000).toISOString();
    const { reference, currency } = request;
    const quote: Quote = { id, reference, currency, validUntil, dxfSha256: digest(request.dxf), ...priced };
    this.state.quotes[id] = quote;
    this.context.save();
    return quote;
  }

  findQuote(id: string): Quote {
    const quote = this.state.quotes[id];
    if (quote === undefined) throw new CounterRefusal(404, 'unknown-quote', `We have no quote ${id}.`);
    return quote;
  }

  order(request: OrderRequest): { order: ShopOrder; isNew: boolean } {
    const known = Object.values(this.state.orders).find((order) => order.reference === request.reference);
    if (known !== undefined) {
      if (known.quoteId === request.quoteId && known.quantity === request.quantity)
        return { order: known, isNew: false };
      throw new CounterRefusal(
        409,
        'reference-taken',
        `Order ${request.reference} is with us already, with other content.`,
      );
    }
    const quote = this.findQuote(request.quoteId);
    const priceBreak = quote.breaks.find((row) => row.quantity === request.quantity);
    if (priceBreak === undefined)
      throw new CounterRefusal(422, 'not-quoted', `${request.quantity} pieces were not quoted.`);
    if (Date.parse(quote.validUntil) < this.context.now().getTime()) {
      throw new CounterRefusal(422, 'quote-expired', `The quote ${quote.id} has run out.`);
    }
    if (digest(request.dxf) !== quote.dxfSha256) {
      throw new CounterRefusal(422, 'drawing-changed', 'The drawing is not the one that was quoted.');
    }
    if (!Buffer.from(request.drawing, 'base64').subarray(0, 5).equals(Buffer.from('%PDF-'))) {
      throw new CounterRefusal(422, 'drawing-unreadable', 'The drawing sheet is not a PDF.');
    }
    const order: ShopOrder = {
      id: this.newId('A'),
      reference: request.reference,
      quoteId: quote.id,
      quantity: request.quantity,
      totalMinor: priceBreak.totalMinor,
      currency: quote.currency,
      state: 'received',
      trackingCode: null,
      reason: null,
      hasBends: (quote.readings?.bendLines ?? 0) > 0,
      history: [{ state: 'received', at: this.context.now().toISOString() }],
    };
    this.state.orders[order.id] = order;
    this.context.save();
    this.scheduleNext(order);
    return { order, isNew: true };
  }

  findOrder(id: string): ShopOrder {
    const order = this.state.orders[id];
    if (order === undefined) throw new CounterRefusal(404, 'unknown-order', `We have no order ${id}.`);
    return order;
  }

  cancel(id: string): ShopOrder {
    const order = this.findOrder(id);
    if (order.state === 'cancelled') return order;
    if (order.state !== 'received' && order.state !== 'accepted') {
      throw new CounterRefusal(409, 'too-late', `The order is ${order.state} already.`);
    }
    this.enter(order, 'cancelled');
    return order;
  }

  /** Let the orders that an earlier run left half-way walk on. */
  resume(): void {
    for (const order of Object.values(this.state.orders)) this.scheduleNext(order);
  }

  private scheduleNext(order: ShopOrder): void {
    if (FINAL.includes(order.state)) return;
    this.context.after(this.context.paceMs, () => {
      if (FINAL.includes(order.state)) return;
      this.enter(order, this.nextState(order));
      this.scheduleNext(order);
    });
  }

  private nextState(order: ShopOrder): OrderState {
    if (order.state === 'received') return this.state.mood.refuseOrders ? 'refused' : 'accepted';
    if (order.state === 'accepted') return 'cutting';
    return order.state === 'cutting' && order.hasBends ? 'bending' : 'shipped';
  }

  private enter(order: ShopOrder, state: OrderState): void {
    order.state = state;
    order.history.push({ state, at: this.context.now().toISOString() });
    if (state === 'shipped') order.trackingCode = `AM ${randomBytes(5).toString('hex').toUpperCase()}`;
    if (state === 'refused') order.reason = REFUSAL;
    this.state.counter += 1;
    const id = `cb-${randomBytes(9).toString('hex')}`;
    const { reference, trackingCode, reason } = order;
    const body = JSON.stringify({
      id,
      type: `order.${state}`,
      sequence: order.history.length,
      at: order.history.at(-1)?.at,
      order: { id: order.id, reference, state, trackingCode, reason },
    });
    // As messages on a real network do, every third comes twice and every fourth "accepted" arrives behind the next step.
    const copies = this.state.counter % 3 === 0 ? 2 : 1;
    const isHeldBack = state === 'accepted' && this.state.counter % 4 === 0;
    this.context.announce(body, id, copies, isHeldBack ? this.context.paceMs * 1.5 : 0);
    this.context.save();
  }

  private priceOrRefuse(request: QuoteRequest): Pick<Quote, 'state' | 'breaks' | 'reasons' | 'readings'> {
    try {
      const judgement = judgeRequest(request, readDrawing(request.dxf));
      if (!judgement.canMake) return { state: 'refused', breaks: [], reasons: [...judgement.reasons], readings: null };
      const { readings, sheet } = judgement;
      const breaks = request.quantities.map((quantity) => priceQuantity(request, readings, sheet, quantity));
      return { state: 'priced', breaks, reasons: [], readings };
    } catch (error) {
      // A file that is no drawing is the customer's matter and answered in words; anything else is a fault of ours.
      if (!(error instanceof UnreadableDrawing)) throw error;
      const reasons = [{ code: 'drawing-unreadable', text: error.message }];
      return { state: 'refused', breaks: [], reasons, readings: null };
    }
  }

  private newId(letter: string): string {
    return `${letter}-${randomBytes(6).toString('hex')}`;
  }
}
