import type { Order as OrderContract, Quote as QuoteContract } from '@foldwright/shared/contracts/orders';
import { quoteBreakSchema } from '@foldwright/shared/contracts/orders';
import * as z from 'zod/mini';
import type { Order } from '../models/order';
import type { Quote } from '../models/quote';
import type { TimelineEntry } from './order-event-words';
import { wordsOf } from './order-event-words';

/** A quote as people see it; one whose prices have run out says so. */
export function presentQuote(quote: Quote, now: Date): QuoteContract {
  const hasRunOut = quote.state === 'priced' && quote.validUntil !== null && quote.validUntil <= now;
  return {
    id: quote.id,
    revisionId: quote.revisionId,
    revisionLetter: quote.revisionLetter,
    revisionHash: quote.revisionHash,
    stock: quote.stock,
    state: hasRunOut ? 'expired' : quote.state,
    breaks: z.parse(z.array(quoteBreakSchema), quote.breaks),
    refusal: quote.refusal,
    validUntil: quote.validUntil?.toISOString() ?? null,
    askedAt: quote.askedAt.toISOString(),
  };
}

/** @param timeline facts of the order, in the order in which they are told */
export function presentOrder(order: Order, timeline: readonly TimelineEntry[]): OrderContract {
  return {
    id: order.id,
    number: order.number,
    partId: order.partId,
    partName: order.partName,
    partNumber: order.partNumber,
    revisionId: order.revisionId,
    revisionLetter: order.revisionLetter,
    revisionHash: order.revisionHash,
    stock: order.stock,
    stockLabel: order.stockLabel,
    statement: order.statement,
    quantity: order.quantity,
    total: { amountMinor: order.totalMinor, currency: order.currency },
    lines: z.parse(quoteBreakSchema.shape.lines, order.lines),
    state: order.state,
    paymentState: order.paymentState,
    trackingCode: order.trackingCode,
    events: timeline.map((entry) => ({
      id: entry.id,
      at: entry.at.toISOString(),
      kind: entry.kind,
      text: wordsOf(order, entry, timeline),
    })),
    placedAt: order.placedAt.toISOString(),
    placedBy: order.placedByName,
    revision: order.revision,
  };
}
