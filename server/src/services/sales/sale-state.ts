import type { Sale } from '@foldwright/shared/contracts/sales';

export type SaleEventKind = Sale['events'][number]['kind'];

/** Particulars of a fact; which of them are there depends on its kind. */
export interface SaleFactDetails {
  readonly paymentId?: string;
  readonly amountMinor?: number;
  /** Why a card was declined, a sale cancelled, money sent back. */
  readonly reason?: string;
  /** Subject of a mail that went out. */
  readonly subject?: string;
  /** What it is about, in words: the pieces of a parcel, an order to the cutting service. */
  readonly what?: string;
  readonly parcel?: number;
  readonly carrier?: string;
  readonly trackingCode?: string;
  /** Whether the whole sale was cancelled, with nothing of it shipped. */
  readonly isWhole?: boolean;
}

/**
 * Something that happened to a sale, told once or many times, early or late. Facts of one sale with the same key are the
 * same fact.
 */
export interface SaleFact {
  readonly key: string;
  readonly kind: SaleEventKind;
  /** When it happened, by the clock of whoever it happened at. */
  readonly at: Date;
  /** Id of the message or row that told of it; decides between two tellings of one moment. */
  readonly source: string;
  readonly details: SaleFactDetails;
}

/** What the pieces of a sale say about how far it is. */
export interface PieceCount {
  readonly quantity: number;
  readonly shipped: number;
  readonly cancelled: number;
}

export interface SaleStanding {
  readonly state: Sale['state'];
  readonly paymentState: Sale['paymentState'];
  readonly refundedMinor: number;
  /** Number of facts so far, mails left out: what `If-Match` is compared with. */
  readonly revision: number;
}

/** Money that has to go back as a whole, whoever cancelled or paid twice. */
export interface RefundDue {
  readonly key: string;
  readonly paymentId: string;
  readonly reason: string;
}

/** Order within one second, the finest that every clock involved tells. */
const WITHIN_A_SECOND: readonly SaleEventKind[] = [
  'placed',
  'checkout-opened',
  'payment-failed',
  'cancelled',
  'paid',
  'cut-ordered',
  'stock-arrived',
  'shipped',
  'delivered',
  'returned',
  'refund-asked',
  'refund-failed',
  'refunded',
  'mail-sent',
];

const byTelling = (a: SaleFact, b: SaleFact) =>
  a.at.getTime() - b.at.getTime() || (a.source < b.source ? -1 : a.source > b.source ? 1 : 0);

/**
 * Add a telling to what is known. Of two tellings of one fact the earlier counts, so that the result is the same in
 * whatever order and however often they come (a join: commutative, associative, idempotent).
 * @returns the same array when nothing is new
 */
export function joinSaleFact(known: readonly SaleFact[], told: SaleFact): readonly SaleFact[] {
  const before = known.find((fact) => fact.key === told.key);
  if (before === undefined) return [...known, told];
  if (byTelling(before, told) <= 0) return known;
  return known.map((fact) => (fact === before ? told : fact));
}

/** Payments of a sale, the first one first: the sale is paid by that one, any other was made by mistake. */
export function paymentsOf(facts: readonly SaleFact[]): readonly string[] {
  const paid = facts.filter((fact) => fact.kind === 'paid').sort(byTelling);
  return paid.flatMap((fact) => fact.details.paymentId ?? []);
}

/** Whether the sale was cancelled as a whole, with nothing of it shipped. */
export const isCancelled = (facts: readonly SaleFact[]): boolean =>
  facts.some((fact) => fact.kind === 'cancelled' && fact.details.isWhole === true);

/** Where a sale stands, from its facts and its pieces alone. */
export function standingOfSale(
  facts: readonly SaleFact[],
  pieces: readonly PieceCount[],
  totalMinor: number,
): SaleStanding {
  const [payment] = paymentsOf(facts);
  const refundedMinor = facts
    .filter((fact) => fact.kind === 'refunded' && fact.details.paymentId === payment)
    .reduce((sum, fact) => sum + (fact.details.amountMinor ?? 0), 0);
  return {
    state: stateOf(facts, pieces, payment),
    paymentState: paymentStateOf(facts, payment, refundedMinor, totalMinor),
    refundedMinor,
    revision: facts.filter((fact) => fact.kind !== 'mail-sent').length,
  };
}

function stateOf(
  facts: readonly SaleFact[],
  pieces: readonly PieceCount[],
  payment: string | undefined,
): SaleStanding['state'] {
  if (isCancelled(facts)) return 'cancelled';
  const parcels = facts.filter((fact) => fact.kind === 'shipped').length;
  if (parcels > 0) {
    const isAllGone = pieces.every(({ quantity, shipped, cancelled }) => shipped + cancelled === quantity);
    if (!isAllGone) return 'partly-shipped';
    return facts.filter((fact) => fact.kind === 'delivered').length >= parcels ? 'delivered' : 'shipped';
  }
  return payment === undefined ? 'placed' : 'paid';
}

function paymentStateOf(
  facts: readonly SaleFact[],
  payment: string | undefined,
  refundedMinor: number,
  totalMinor: number,
): SaleStanding['paymentState'] {
  if (payment === undefined) return facts.some((fact) => fact.kind === 'payment-failed') ? 'failed' : 'open';
  if (refundedMinor === 0) return 'paid';
  return refundedMinor < totalMinor ? 'partly-refunded' : 'refunded';
}

/** Payments that have to go back whole: all of a cancelled sale, else all but the first. */
export function refundsDue(facts: readonly SaleFact[]): readonly RefundDue[] {
  const payments = paymentsOf(facts);
  const twice = payments
    .slice(1)
    .map((paymentId) => ({ key: `twice:${paymentId}`, paymentId, reason: 'It was paid twice.' }));
  const [first] = payments;
  if (first === undefined || !isCancelled(facts)) return twice;
  const reason = facts.find((fact) => fact.kind === 'cancelled' && fact.details.isWhole === true)?.details.reason;
  return [{ key: `whole:${first}`, paymentId: first, reason: reason ?? 'The order was cancelled.' }, ...twice];
}

/** Facts as a timeline: by time, and within a second by the course of a sale. */
export function timelineOfSale(facts: readonly SaleFact[]): readonly SaleFact[] {
  const second = (fact: SaleFact) => Math.floor(fact.at.getTime() / 1000);
  const rank = (fact: SaleFact) => WITHIN_A_SECOND.indexOf(fact.kind);
  return [...facts].sort(
    (a, b) =>
      second(a) - second(b) ||
      rank(a) - rank(b) ||
      a.at.getTime() - b.at.getTime() ||
      (a.key < b.key ? -1 : a.key > b.key ? 1 : 0),
  );
}
