import type { Order } from '@foldwright/shared/contracts/orders';

export type OrderEventKind = Order['events'][number]['kind'];

/** Particulars of a fact; which of them are there depends on its kind. */
export interface FactDetails {
  readonly paymentId?: string;
  readonly trackingCode?: string;
  /** Words of the other side: why a card or an order was refused. */
  readonly reason?: string;
  /** Subject of a mail that went out. */
  readonly subject?: string;
}

/**
 * Something that happened to an order, told once or many times, early or late. Facts of one order with the same key are
 * the same fact.
 */
export interface OrderFact {
  readonly key: string;
  readonly kind: OrderEventKind;
  /** When it happened, by the clock of whoever it happened at. */
  readonly at: Date;
  /** Id of the message that told of it; decides between two tellings of one moment. */
  readonly source: string;
  readonly details: FactDetails;
}

export interface OrderStanding {
  readonly state: Order['state'];
  readonly paymentState: Order['paymentState'];
  readonly trackingCode: string | null;
  /** Number of facts so far, mails left out: what `If-Match` is compared with. */
  readonly revision: number;
}

export interface WorkDue {
  /** The order is paid and has to be handed to the cutting service. */
  readonly submission: boolean;
  /** The payment has to go back. */
  readonly refund: string | null;
}

/** Furthest last. What ends an order early outweighs whatever else is told, since the money goes back then. */
const BY_WEIGHT = ['placed', 'paid', 'accepted', 'cutting', 'bending', 'shipped', 'refused', 'cancelled'] as const;

/** Order within one second, the finest that every clock involved tells. */
const WITHIN_A_SECOND: readonly OrderEventKind[] = [
  'placed',
  'checkout-opened',
  'payment-failed',
  'cancelled',
  'paid',
  'sent-to-cutter',
  'accepted',
  'cutting',
  'bending',
  'shipped',
  'refused',
  'refunded',
  'mail-sent',
];

const sameOrEarlier = (a: OrderFact, b: OrderFact) =>
  a.at.getTime() - b.at.getTime() || (a.source < b.source ? -1 : a.source > b.source ? 1 : 0);

/**
 * Add a telling to what is known. Of two tellings of one fact the earlier counts, so that the result is the same in
 * whatever order and however often they come (a join: commutative, associative, idempotent).
 * @returns the same array when nothing is new
 */
export function joinFact(known: readonly OrderFact[], told: OrderFact): readonly OrderFact[] {
  const before = known.find((fact) => fact.key === told.key);
  if (before === undefined) return [...known, told];
  if (sameOrEarlier(before, told) <= 0) return known;
  return known.map((fact) => (fact === before ? told : fact));
}

/** Where an order stands, from its facts alone. */
export function standingOf(facts: readonly OrderFact[]): OrderStanding {
  const has = (kind: OrderEventKind) => facts.some((fact) => fact.kind === kind);
  const state = BY_WEIGHT.findLast(has) ?? 'placed';
  const paymentState = has('refunded') ? 'refunded' : has('paid') ? 'paid' : has('payment-failed') ? 'failed' : 'open';
  return {
    state,
    paymentState,
    trackingCode: facts.find((fact) => fact.kind === 'shipped')?.details.trackingCode ?? null,
    revision: facts.filter((fact) => fact.kind !== 'mail-sent').length,
  };
}

/** What has to be done now, from the facts alone. */
export function workDue(facts: readonly OrderFact[]): WorkDue {
  const { state } = standingOf(facts);
  const has = (kind: OrderEventKind) => facts.some((fact) => fact.kind === kind);
  const paymentId = facts.find((fact) => fact.kind === 'paid')?.details.paymentId;
  const isEnded = state === 'refused' || state === 'cancelled';
  return {
    submission: has('paid') && !isEnded && !has('sent-to-cutter'),
    refund: isEnded && paymentId !== undefined && !has('refunded') ? paymentId : null,
  };
}

/** Facts as a timeline: by time, and within a second by the course of an order. */
export function timelineOf(facts: readonly OrderFact[]): readonly OrderFact[] {
  const second = (fact: OrderFact) => Math.floor(fact.at.getTime() / 1000);
  const rank = (fact: OrderFact) => WITHIN_A_SECOND.indexOf(fact.kind);
  return [...facts].sort(
    (a, b) =>
      second(a) - second(b) ||
      rank(a) - rank(b) ||
      a.at.getTime() - b.at.getTime() ||
      (a.key < b.key ? -1 : a.key > b.key ? 1 : 0),
  );
}
