import { formatMoney } from '@foldwright/shared/units/money';
import type { Order } from '../models/order';
import type { OrderFact } from './order-state';

/** What a mail says. */
export interface Letter {
  readonly subject: string;
  readonly body: string;
}

const pieces = (quantity: number) => (quantity === 1 ? '1 piece' : `${quantity} pieces`);

/** The letter to whoever ordered about something that happened; null for what nobody has to be told by mail. */
export function letterAbout(order: Order, fact: OrderFact, publicUrl: string): Letter | null {
  const words = wordsAbout(order, fact);
  if (words === null) return null;
  const name = `${order.partName}, revision ${order.revisionLetter}`;
  const body = [
    `Hello ${order.placedByName},`,
    words.text,
    `${order.partNumber} ${name}\n${pieces(order.quantity)}, ${order.stockLabel}\n${totalOf(order)}`,
    `The order with its timeline: ${publicUrl}/orders/${order.id}`,
  ].join('\n\n');
  return { subject: `Order ${order.number}: ${words.subject}`, body: `${body}\n` };
}

const totalOf = (order: Order) => formatMoney({ amountMinor: order.totalMinor, currency: order.currency });

function wordsAbout(order: Order, fact: OrderFact): { subject: string; text: string } | null {
  const { reason, trackingCode } = fact.details;
  switch (fact.kind) {
    case 'placed':
      return {
        subject: 'placed',
        text: 'Your order is placed. It goes to the cutting service once it is paid.',
      };
    case 'paid':
      return {
        subject: 'paid',
        text: `${totalOf(order)} came in. The cut file and the drawing go to the cutting service now.`,
      };
    case 'accepted':
      return {
        subject: 'accepted by the cutting service',
        text: `The cutting service has accepted the order. It named ${order.leadTimeDays} days.`,
      };
    case 'shipped':
      return {
        subject: 'shipped',
        text:
          trackingCode === undefined
            ? 'The parcel is on its way.'
            : `The parcel is on its way. Tracking code: ${trackingCode}`,
      };
    case 'refused':
      return {
        subject: 'handed back by the cutting service',
        text: [
          'The cutting service will not make this order.',
          ...(reason === undefined ? [] : [`It says: ${reason}`]),
          'What was paid goes back to the card.',
        ].join('\n'),
      };
    case 'refunded':
      return { subject: 'money sent back', text: `${totalOf(order)} went back to the card that paid.` };
    default:
      return null;
  }
}
