import type { Order } from '@foldwright/shared/contracts/orders';
import { orderTimeline, waitsFor } from './order-timeline';

const ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11';
const NOW = new Date(2026, 4, 20);
const event = (kind: Order['events'][number]['kind'], day: number) => ({
  id: ID,
  kind,
  at: new Date(2026, 4, day, 12).toISOString(),
  text: '',
});
const order = (over: Partial<Order>): Order => ({
  id: ID,
  number: 1042,
  partId: ID,
  partName: 'Grinder cradle',
  partNumber: 'LC-07',
  revisionId: ID,
  revisionLetter: 'A',
  revisionHash: 'ab',
  stock: 'production',
  stockLabel: 'Alloy, 3.0',
  statement: 'cut-and-bend-to-our-flat',
  quantity: 10,
  total: { amountMinor: 16200, currency: 'EUR' },
  lines: [],
  state: 'placed',
  paymentState: 'open',
  trackingCode: null,
  events: [event('placed', 14)],
  placedAt: new Date(2026, 4, 14, 12).toISOString(),
  placedBy: 'Tomasz Wren',
  revision: 1,
  ...over,
});
const marks = (given: Order) => orderTimeline(given, NOW).map((step) => `${step.label}:${step.mark}`);

describe('orderTimeline', () => {
  it('waits for payment first', () => {
    expect(marks(order({}))).toEqual([
      'Placed:punched',
      'Paid:ring',
      'Accepted:tick',
      'Cutting:tick',
      'Bending:tick',
      'On its way:tick',
    ]);
    expect(orderTimeline(order({}), NOW)[0]?.sub).toBe('14 May');
    expect(orderTimeline(order({}), NOW)[1]?.sub).toBe('to pay');
  });

  it('rings what is under way', () => {
    expect(marks(order({ state: 'cutting', paymentState: 'paid' }))[3]).toBe('Cutting:ring');
    expect(orderTimeline(order({ state: 'cutting' }), NOW)[3]?.sub).toBe('now');
    expect(marks(order({ state: 'bending' }))[4]).toBe('Bending:ring');
  });

  it('punches everything once it is on its way', () => {
    expect(marks(order({ state: 'shipped' })).every((mark) => mark.endsWith(':punched'))).toBe(true);
  });

  it('ends early with what was done and how it ended', () => {
    const refused = order({ state: 'refused', events: [event('placed', 14), event('paid', 15), event('refused', 16)] });
    expect(marks(refused)).toEqual(['Placed:punched', 'Paid:punched', 'Refused:ring']);
    expect(waitsFor(refused)).toBeNull();
  });

  it('says that a failed payment charged nothing', () => {
    expect(waitsFor(order({ paymentState: 'failed' }))).toContain('Nothing was charged');
  });
});
