import fc from 'fast-check';
import type { PieceCount, SaleEventKind, SaleFact } from './sale-state';
import { isCancelled, joinSaleFact, paymentsOf, refundsDue, standingOfSale, timelineOfSale } from './sale-state';

const MINUTE = 60_000;
const START = Date.parse('2026-03-02T08:00:00Z');
const TOTAL = 15_490;

const fact = (kind: SaleEventKind, minute: number, changes: Partial<SaleFact> = {}): SaleFact => ({
  key: kind,
  kind,
  at: new Date(START + minute * MINUTE),
  source: `message-${kind}-${minute}`,
  details: {},
  ...changes,
});
const paidBy = (paymentId: string, minute: number) =>
  fact('paid', minute, { key: `paid:${paymentId}`, details: { paymentId } });
const back = (paymentId: string, amountMinor: number, minute: number) =>
  fact('refunded', minute, { key: `refunded:${paymentId}:${minute}`, details: { paymentId, amountMinor } });
const parcel = (kind: 'shipped' | 'delivered', number: number, minute: number) =>
  fact(kind, minute, { key: `${kind}:${number}`, details: { parcel: number } });

const PLACED = fact('placed', 0);
const OPENED = fact('checkout-opened', 1, { key: 'checkout-opened:cs_1' });
const DECLINED = fact('payment-failed', 2, { key: 'payment-failed:evt_1', details: { reason: 'declined' } });
const PAID = paidBy('pi_1', 3);
const PAID_TWICE = paidBy('pi_2', 4);
const CANCELLED = fact('cancelled', 5, { key: 'cancelled:whole', details: { isWhole: true, reason: 'Not needed.' } });
const PARTLY = fact('cancelled', 5, { key: 'cancelled:1', details: { what: '1 × strap' } });
const MAIL = fact('mail-sent', 6, { key: 'mail-sent:1', details: { subject: 'paid' } });

const pieces = (...counts: readonly (readonly [quantity: number, shipped: number, cancelled?: number])[]) =>
  counts.map(([quantity, shipped, cancelled = 0]): PieceCount => ({ quantity, shipped, cancelled }));
const join = (told: readonly SaleFact[]) => told.reduce(joinSaleFact, [PLACED] as readonly SaleFact[]);
const standing = (told: readonly SaleFact[], counts: readonly PieceCount[] = pieces([2, 0])) =>
  standingOfSale(join(told), counts, TOTAL);
const outcome = (told: readonly SaleFact[]) => {
  const facts = join(told);
  return {
    timeline: timelineOfSale(facts),
    standing: standingOfSale(facts, pieces([2, 1]), TOTAL),
    due: refundsDue(facts),
  };
};

const POOL = [
  ...[OPENED, DECLINED, PAID, PAID_TWICE, CANCELLED, PARTLY, MAIL],
  ...[parcel('shipped', 1, 7), parcel('delivered', 1, 9), back('pi_1', 3400, 10), back('pi_2', TOTAL, 11)],
];
// The same told by another message, half a second later: one fact still.
const RETOLD = POOL.map((one) => ({ ...one, at: new Date(one.at.getTime() + 500), source: `${one.source}-again` }));
const someTold = fc.array(fc.constantFrom(...POOL, ...RETOLD), { minLength: 1, maxLength: 24 });

describe('where a sale stands', () => {
  it('is placed until somebody pays, whether a card was declined or not', () => {
    expect(standing([])).toEqual({ state: 'placed', paymentState: 'open', refundedMinor: 0, revision: 1 });
    expect(standing([OPENED, DECLINED])).toMatchObject({ state: 'placed', paymentState: 'failed' });
    expect(standing([OPENED, DECLINED, PAID])).toMatchObject({ state: 'paid', paymentState: 'paid', revision: 4 });
  });

  it('follows its pieces through the parcels', () => {
    const sent = [PAID, parcel('shipped', 1, 7)];
    expect(standing(sent, pieces([2, 2], [1, 0])).state).toBe('partly-shipped');
    expect(standing(sent, pieces([2, 2], [1, 0, 1])).state).toBe('shipped');
    const both = [...sent, parcel('shipped', 2, 8), parcel('delivered', 1, 9)];
    expect(standing(both, pieces([2, 2], [1, 1])).state).toBe('shipped');
    expect(standing([...both, parcel('delivered', 2, 10)], pieces([2, 2], [1, 1])).state).toBe('delivered');
  });

  it('is not cancelled by cancelling a part of it', () => {
    expect(standing([PAID, PARTLY]).state).toBe('paid');
    expect(isCancelled(join([PAID, PARTLY]))).toBe(false);
    expect(standing([PAID, CANCELLED]).state).toBe('cancelled');
  });

  it('counts what went back of the payment that paid it, and of no other', () => {
    expect(standing([PAID, back('pi_1', 3400, 10)])).toMatchObject({
      paymentState: 'partly-refunded',
      refundedMinor: 3400,
    });
    expect(standing([PAID, PAID_TWICE, back('pi_2', TOTAL, 10)])).toMatchObject({
      paymentState: 'paid',
      refundedMinor: 0,
    });
    const all = [PAID, back('pi_1', 3400, 10), back('pi_1', TOTAL - 3400, 11)];
    expect(standing(all)).toMatchObject({ paymentState: 'refunded', refundedMinor: TOTAL });
  });

  it('leaves mails out of the revision: a mail that went out makes nobody’s page old', () => {
    expect(standing([PAID, MAIL]).revision).toBe(standing([PAID]).revision);
  });
});

describe('money that has to go back whole', () => {
  it('is the second payment, whichever message came first', () => {
    for (const told of [
      [PAID, PAID_TWICE],
      [PAID_TWICE, PAID],
    ]) {
      expect(paymentsOf(join(told))).toEqual(['pi_1', 'pi_2']);
      expect(refundsDue(join(told))).toEqual([{ key: 'twice:pi_2', paymentId: 'pi_2', reason: 'It was paid twice.' }]);
    }
  });

  it('is all of a cancelled sale, for the reason it was cancelled for', () => {
    expect(refundsDue(join([CANCELLED]))).toEqual([]);
    expect(refundsDue(join([CANCELLED, PAID]))).toEqual([
      { key: 'whole:pi_1', paymentId: 'pi_1', reason: 'Not needed.' },
    ]);
    expect(refundsDue(join([PAID, CANCELLED, PAID_TWICE])).map(({ paymentId }) => paymentId)).toEqual(['pi_1', 'pi_2']);
  });

  it('is none of a sale of which only a part was cancelled', () => {
    expect(refundsDue(join([PAID, PARTLY]))).toEqual([]);
  });
});

describe('facts of a sale', () => {
  it('come to the same in each of the 5040 orders in which seven can be told', () => {
    const told = [
      OPENED,
      DECLINED,
      PAID,
      PAID_TWICE,
      parcel('shipped', 1, 7),
      parcel('delivered', 1, 9),
      back('pi_2', TOTAL, 11),
    ];
    const expected = JSON.stringify(outcome(told));
    let tried = 0;
    const visit = (before: readonly SaleFact[], rest: readonly SaleFact[]) => {
      if (rest.length === 0) {
        if (JSON.stringify(outcome(before)) !== expected) throw new Error(before.map(({ key }) => key).join(' '));
        tried += 1;
      }
      for (const one of rest) {
        visit(
          [...before, one],
          rest.filter((other) => other !== one),
        );
      }
    };
    visit([], told);
    expect(tried).toBe(5040);
    expect(outcome(told).timeline.map(({ kind }) => kind)).toEqual([
      ...['placed', 'checkout-opened', 'payment-failed', 'paid', 'paid', 'shipped', 'delivered', 'refunded'],
    ]);
  });

  it('come to the same whatever is doubled, mixed or told with other times', () => {
    fc.assert(
      fc.property(someTold, fc.infiniteStream(fc.nat()), (told, order) => {
        const shuffled = told
          .map((one) => ({ one, at: order.next().value as number }))
          .sort((a, b) => a.at - b.at)
          .map(({ one }) => one);
        expect(outcome([...shuffled, ...told])).toEqual(outcome(told));
      }),
      { numRuns: 500 },
    );
  });

  it('are the same array when nothing new was told, so that nothing is written', () => {
    fc.assert(
      fc.property(someTold, (told) => {
        const facts = join(told);
        for (const one of told) expect(joinSaleFact(facts, one)).toBe(facts);
      }),
    );
  });

  it('never have more go back than came in, and never send the payment that keeps a sale alive', () => {
    fc.assert(
      fc.property(someTold, (told) => {
        const facts = join(told);
        const due = refundsDue(facts).map(({ paymentId }) => paymentId);
        expect(new Set(due).size).toBe(due.length);
        const payments = paymentsOf(facts);
        expect(due.every((one) => payments.includes(one))).toBe(true);
        expect(payments.length - due.length).toBe(payments.length === 0 || isCancelled(facts) ? 0 : 1);
      }),
    );
  });

  it('keep the course of a sale within one second, where the clocks are too coarse to tell', () => {
    const second = (kind: SaleEventKind, ms: number) => fact(kind, 0, { at: new Date(START + ms) });
    const told = [second('shipped', 100), second('paid', 0), second('checkout-opened', 700)];
    expect(timelineOfSale(join(told)).map(({ kind }) => kind)).toEqual([
      'placed',
      'checkout-opened',
      'paid',
      'shipped',
    ]);
  });
});
