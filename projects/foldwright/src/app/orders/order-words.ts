import type { Order } from '@foldwright/shared/contracts/orders';

const STATEMENT_WORDS: Readonly<Record<Order['statement'], string>> = {
  'cut-and-bend-to-our-flat': 'Cut and bend to our flat pattern.',
  'formed-sizes-rule': 'The formed sizes rule; the bender develops the flat.',
};

const PAYMENT_WORDS: Readonly<Record<Order['paymentState'], string>> = {
  open: 'not paid yet',
  paid: 'paid',
  failed: 'payment failed, nothing charged',
  refunded: 'paid back',
};

const STATE_WORDS: Readonly<Record<Order['state'], string>> = {
  placed: 'To pay',
  paid: 'With the cutter',
  accepted: 'Accepted',
  cutting: 'Being cut',
  bending: 'Being bent',
  shipped: 'On its way',
  refused: 'Refused',
  cancelled: 'Cancelled',
};

/** What the cutting service was told to hold to. */
export function statementWords(statement: Order['statement']): string {
  return STATEMENT_WORDS[statement];
}

export function paymentWords(state: Order['paymentState']): string {
  return PAYMENT_WORDS[state];
}

export function stateWords(state: Order['state']): string {
  return STATE_WORDS[state];
}

/** The first signs of a hash: enough to compare by eye. */
export function shortHash(hash: string): string {
  return hash.slice(0, 12);
}
