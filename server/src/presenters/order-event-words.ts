import type { Order as OrderContract } from '@foldwright/shared/contracts/orders';
import { formatMoney } from '@foldwright/shared/units/money';
import type { Order } from '../models/order';

/** An entry of a timeline before it has words. */
export interface TimelineEntry {
  readonly id: string;
  readonly at: Date;
  readonly kind: OrderContract['events'][number]['kind'];
  readonly details: {
    readonly paymentId?: string;
    readonly trackingCode?: string;
    readonly reason?: string;
    readonly subject?: string;
  };
}

const pieces = (quantity: number) => (quantity === 1 ? '1 piece' : `${quantity} pieces`);

/** What happened, in a sentence or two; some of it depends on what else happened to the order. */
export function wordsOf(order: Order, entry: TimelineEntry, timeline: readonly TimelineEntry[]): string {
  const { reason, trackingCode, subject } = entry.details;
  const total = formatMoney({ amountMinor: order.totalMinor, currency: order.currency });
  switch (entry.kind) {
    case 'placed':
      return `${order.placedByName} ordered ${pieces(order.quantity)} of revision ${order.revisionLetter} for ${total}.`;
    case 'checkout-opened':
      return 'The payment page was opened.';
    case 'paid':
      return paidWords(entry, timeline, total);
    case 'payment-failed':
      return `The payment did not go through. ${reason ?? ''}`.trim();
    case 'sent-to-cutter':
      return 'Cut file, drawing and bend table handed to the cutting service.';
    case 'accepted':
      return 'The cutting service accepted the order.';
    case 'cutting':
      return 'The blanks are being cut.';
    case 'bending':
      return 'The blanks are cut and go through the press brake.';
    case 'shipped':
      return trackingCode === undefined ? 'Shipped.' : `Shipped. Tracking code ${trackingCode}.`;
    case 'refused':
      return ['The cutting service handed the order back.', reason ?? '', 'What was paid goes back to the card.']
        .filter((sentence) => sentence !== '')
        .join(' ');
    case 'cancelled':
      return 'Cancelled before it was paid.';
    case 'refunded':
      return `${total} went back to the card.`;
    case 'mail-sent':
      return `Mail to ${order.placedByEmail}: “${subject ?? ''}”`;
  }
}

function paidWords(entry: TimelineEntry, timeline: readonly TimelineEntry[], total: string): string {
  const isLate = timeline.some(({ kind }) => kind === 'cancelled');
  if (isLate) return `${total} came in after the order was cancelled. It goes back to the card.`;
  const first = timeline.find(({ kind }) => kind === 'paid');
  if (first !== undefined && first.id !== entry.id) return `${total} came in a second time. It goes back to the card.`;
  return `${total} paid.`;
}
