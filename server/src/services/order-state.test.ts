import fc from 'fast-check';
import type { OrderEventKind, OrderFact } from './order-state';
import { joinFact, standingOf, timelineOf, workDue } from './order-state';

const MINUTE = 60_000;
const START = Date.parse('2026-03-02T08:00:00Z');

const fact = (kind: OrderEventKind, minute: number, changes: Partial<OrderFact> = {}): OrderFact => ({
  key: kind,
  kind,
  at: new Date(START + minute * MINUTE),
  source: `message-${kind}-${minute}`,
  details: {},
  ...changes,
});

const PLACED = fact('placed', 0);
const OPENED = fact('checkout-opened', 1, { key: 'checkout-opened:cs_1' });
const FAILED = fact('payment-failed', 2, { key: 'payment-failed:evt_1', details: { reason: 'declined' } });
const PAID = fact('paid', 3, { key: 'paid:pi_1', details: { paymentId: 'pi_1' } });
const SENT = fact('sent-to-cutter', 4);
const ACCEPTED = fact('accepted', 5);
const CUTTING = fact('cutting', 6);
const BENDING = fact('bending', 7);
const SHIPPED = fact('shipped', 8, { details: { trackingCode: 'AM 1' } });
const REFUSED = fact('refused', 6, { details: { reason: 'no sheet' } });

const BACK = fact('refunded', 9, { key: 'refunded:pi_1', details: { paymentId: 'pi_1' } });
const PAID_TWICE = fact('paid', 4, { key: 'paid:pi_2', details: { paymentId: 'pi_2' } });

const join = (tellings: readonly OrderFact[]) => tellings.reduce(joinFact, [PLACED] as readonly OrderFact[]);
const outcome = (tellings: readonly OrderFact[]) => {
  const facts = join(tellings);
  return { timeline: timelineOf(facts), standing: standingOf(facts), due: workDue(facts) };
};

function* permutations<T>(items: readonly T[]): Generator<readonly T[]> {
  if (items.length <= 1) {
    yield items;
    return;
  }
  for (const [index, item] of items.entries()) {
    for (const rest of permutations([...items.slice(0, index), ...items.slice(index + 1)])) yield [item, ...rest];
  }
}

describe('the state of an order', () => {
  it('ends the same in each of the 40320 orders in which its messages can come', () => {
    const told = [OPENED, FAILED, PAID, SENT, ACCEPTED, CUTTING, BENDING, SHIPPED];
    const expected = JSON.stringify(outcome(told));
    let tried = 0;
    for (const order of permutations(told)) {
      if (JSON.stringify(outcome(order)) !== expected) throw new Error(order.map(({ kind }) => kind).join(' '));
      tried += 1;
    }
    expect(tried).toBe(40320);
    expect(outcome(told)).toMatchObject({
      standing: { state: 'shipped', paymentState: 'paid', trackingCode: 'AM 1', revision: 9 },
      due: { submission: false, refunds: [] },
    });
    expect(outcome(told).timeline.map(({ kind }) => kind)).toEqual([
      'placed',
      'checkout-opened',
      'payment-failed',
      'paid',
      'sent-to-cutter',
      'accepted',
      'cutting',
      'bending',
      'shipped',
    ]);
  });

  it('ends the same with every message doubled, in each order', () => {
    const told = [PAID, PAID, ACCEPTED, ACCEPTED, SHIPPED, SHIPPED, CUTTING];
    const expected = JSON.stringify(outcome([PAID, ACCEPTED, CUTTING, SHIPPED]));
    for (const order of permutations(told)) expect(JSON.stringify(outcome(order))).toBe(expected);
  });

  it('ends the same whatever is doubled, mixed or told with other times', () => {
    const pool = [OPENED, FAILED, PAID, SENT, ACCEPTED, CUTTING, BENDING, SHIPPED, REFUSED, PAID_TWICE, BACK];
    const retold = pool.map((one) => ({ ...one, at: new Date(one.at.getTime() + 500), source: `${one.source}-again` }));
    const telling = fc.constantFrom(...pool, ...retold);
    fc.assert(
      fc.property(fc.array(telling, { minLength: 1, maxLength: 20 }), fc.infiniteStream(fc.nat()), (told, order) => {
        const shuffled = told
          .map((one) => ({ one, at: order.next().value as number }))
          .sort((a, b) => a.at - b.at)
          .map(({ one }) => one);
        expect(outcome([...shuffled, ...told])).toEqual(outcome(told));
      }),
      { numRuns: 500 },
    );
  });

  it('never goes back by something told late', () => {
    expect(outcome([PAID, SHIPPED, ACCEPTED]).standing.state).toBe('shipped');
  });

  it('says once that there is something to hand over, until it was handed over', () => {
    expect(outcome([]).due).toEqual({ submission: false, refunds: [] });
    expect(outcome([PAID]).due).toEqual({ submission: true, refunds: [] });
    expect(outcome([PAID, SENT]).due).toEqual({ submission: false, refunds: [] });
  });

  it('sends the money back when the shop hands the order back', () => {
    expect(outcome([PAID, SENT, REFUSED]).due).toEqual({ submission: false, refunds: ['pi_1'] });
    const facts = outcome([PAID, SENT, REFUSED, BACK]);
    expect(facts.standing).toMatchObject({ state: 'refused', paymentState: 'refunded' });
    expect(facts.due).toEqual({ submission: false, refunds: [] });
  });

  it('sends the money back that came after the order was cancelled, and never has it cut', () => {
    const late = outcome([fact('cancelled', 2), PAID]);
    expect(late.standing).toMatchObject({ state: 'cancelled', paymentState: 'paid' });
    expect(late.due).toEqual({ submission: false, refunds: ['pi_1'] });
  });

  it('sends a second payment back and keeps the first', () => {
    const twice = outcome([PAID_TWICE, PAID, SENT]);
    expect(twice.standing).toMatchObject({ state: 'paid', paymentState: 'paid' });
    expect(twice.due).toEqual({ submission: false, refunds: ['pi_2'] });
  });

  it('keeps the course of an order within one second, where the clocks are too coarse to tell', () => {
    const second = (kind: OrderEventKind, ms: number) => fact(kind, 0, { at: new Date(START + ms) });
    const told = [second('paid', 0), second('checkout-opened', 700), second('accepted', 300)];
    expect(outcome(told).timeline.map(({ kind }) => kind)).toEqual(['placed', 'checkout-opened', 'paid', 'accepted']);
  });
});
