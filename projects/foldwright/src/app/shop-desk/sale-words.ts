import type { Sale } from '@foldwright/shared/contracts/sales';

const STATES: Readonly<Record<Sale['state'], string>> = {
  placed: 'not paid yet',
  paid: 'to be sent',
  'partly-shipped': 'partly sent',
  shipped: 'sent',
  delivered: 'arrived',
  cancelled: 'cancelled',
};
const PAYMENTS: Readonly<Record<Sale['paymentState'], string>> = {
  open: 'nothing paid',
  paid: 'paid',
  failed: 'payment failed',
  'partly-refunded': 'partly sent back',
  refunded: 'money sent back',
};
const HANDS = { either: 'one hand', left: 'left hand', right: 'right hand' } as const;

export const saleStateWords = (state: Sale['state']): string => STATES[state];
export const salePaymentWords = (state: Sale['paymentState']): string => PAYMENTS[state];
export const handWords = (hand: keyof typeof HANDS): string => HANDS[hand];

/** What somebody at the desk has to do next with a sale, in a few words; null when nothing is left to do. */
export function nextStep(sale: {
  readonly state: Sale['state'];
  readonly short: number;
  readonly unanswered: number;
}): string | null {
  if (sale.unanswered > 0) return 'answer a question';
  if (sale.state !== 'paid' && sale.state !== 'partly-shipped') return null;
  return sale.short > 0 ? `${sale.short} to be cut` : 'send it';
}
