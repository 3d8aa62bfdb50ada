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
  /** Payments that have to go back: all when the order was ended early, else all but the first. */
  readonly refunds: readonly string[];
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

const byTelling = (a: OrderFact, b: OrderFact) =>
  a.at.getTime() - b.at.getTime() || (a.source < b.source ? -1 : a.source > b.source ? 1 : 0);

/**
 * Add a telling to what is known. Of two tellings of one fact the earlier counts, so that the result is the same in
 * whatever order and however often they come (a join: commutative, associative, idempotent).
 * @returns the same array when nothing is new
 */
export function joinFact(known: readonly OrderFact[], told: OrderFact): readonly OrderFact[] {
  const before = known.find((fact) => fact.key === told.key);
  if (before === undefined) return [...known, told];
  if (byTelling(before, told) <= 0) return known;
  return known.map((fact) => (fact === before ? told : fact));
}

/** Where an order stands, from its facts alone. */
export function standingOf(facts: readonly OrderFact[]): OrderStanding {
  const has = (kind: OrderEventKind) => facts.some((fact) => fact.kind === kind);
  const state = BY_WEIGHT.findLast(has) ?? 'placed';
  const [payment] = paymentsOf(facts);
  return {
    state,
    paymentState:
      payment !== undefined
        ? wentBack(facts, payment)
          ? 'refunded'
          : 'paid'
        : has('payment-failed')
          ? 'failed'
          : 'open',
    trackingCode: facts.find((fact) => fact.kind === 'shipped')?.details.trackingCode ?? null,
    revision: facts.filter((fact) => fact.kind !== 'mail-sent').length,
  };
}

/** What has to be done now, from the facts alone. */
export function workDue(facts: readonly OrderFact[]): WorkDue {
  const { state } = standingOf(facts);
  const has = (kind: OrderEventKind) => facts.some((fact) => fact.kind === kind);
  const isEnded = state === 'refused' || state === 'cancelled';
  const payments = paymentsOf(facts);
  return {
    submission: has('paid') && !isEnded && !has('sent-to-cutter'),
    refunds: (isEnded ? payments : payments.slice(1)).filter((paymentId) => !wentBack(facts, paymentId)),
  };
}

/** Payments of an order, the first one first: the order is paid by that one, any other was made by mistake. */
export function paymentsOf(facts: readonly OrderFact[]): readonly string[] {
  const paid = facts.filter((fact) => fact.kind === 'paid').sort(byTelling);
  return paid.flatMap((fact) => fact.details.paymentId ?? []);
}

const wentBack = (facts: readonly OrderFact[], paymentId: string) =>
  facts.some((fact) => fact.kind === 'refunded' && fact.details.paymentId === paymentId);

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
