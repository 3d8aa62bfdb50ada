import type { Order } from '@foldwright/shared/contracts/orders';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import type { RouteStep } from '@foldwright/ui/route-strip/route-strip';

type OrderEventKind = Order['events'][number]['kind'];

/** The road of an order, by the event that ends each step. */
const ROAD = [
  { id: 'placed', label: 'Placed', done: 'placed', waiting: '' },
  { id: 'paid', label: 'Paid', done: 'paid', waiting: 'to pay' },
  { id: 'accepted', label: 'Accepted', done: 'accepted', waiting: 'the cutter looks at it' },
  { id: 'cutting', label: 'Cutting', done: 'bending', waiting: 'next' },
  { id: 'bending', label: 'Bending', done: 'shipped', waiting: 'next' },
  { id: 'shipped', label: 'On its way', done: 'shipped', waiting: 'next' },
] as const satisfies readonly { id: string; label: string; done: OrderEventKind; waiting: string }[];

/** How many steps of the road each state has behind it. */
const BEHIND: Readonly<Record<Order['state'], number>> = {
  placed: 1,
  paid: 2,
  accepted: 3,
  cutting: 3,
  bending: 4,
  shipped: 6,
  refused: 0,
  cancelled: 0,
};

/**
 * The timeline of an order on the route strip: what is done is punched with its day, what is under way wears the ring.
 * An order that ended early shows what was done and how it ended.
 */
export function orderTimeline(order: Order, now: Date): readonly RouteStep[] {
  if (order.state === 'refused' || order.state === 'cancelled') return endedEarly(order, now);
  const behind = BEHIND[order.state];
  return ROAD.map((step, index) => ({
    id: step.id,
    label: step.label,
    mark: index < behind ? 'punched' : index === behind ? 'ring' : 'tick',
    sub:
      index < behind
        ? dayOf(order, step.id === 'shipped' ? 'shipped' : step.id, now)
        : index === behind
          ? underWay(order, step)
          : null,
  }));
}

/** What an order waits for, in a sentence; null once it is on its way. */
export function waitsFor(order: Order): string | null {
  switch (order.state) {
    case 'placed':
      return order.paymentState === 'failed'
        ? 'The payment didn’t go through. Nothing was charged; pay again when you are ready.'
        : 'It goes to the cutting service once it is paid.';
    case 'paid':
      return 'The cutting service has it and looks at it.';
    case 'accepted':
      return 'The cutting service will make it.';
    case 'cutting':
      return 'It is being cut.';
    case 'bending':
      return 'It is being bent.';
    case 'shipped':
    case 'refused':
    case 'cancelled':
      return null;
  }
}

function endedEarly(order: Order, now: Date): readonly RouteStep[] {
  const happened = new Set(order.events.map((event) => event.kind));
  const done = ROAD.filter((step) => happened.has(step.id));
  return [
    ...done.map((step) => ({
      id: step.id,
      label: step.label,
      mark: 'punched' as const,
      sub: dayOf(order, step.id, now),
    })),
    {
      id: order.state,
      label: order.state === 'refused' ? 'Refused' : 'Cancelled',
      mark: 'ring' as const,
      sub: dayOf(order, order.state, now),
    },
  ];
}

function underWay(order: Order, step: (typeof ROAD)[number]): string {
  return order.state === step.id ? 'now' : step.waiting;
}

function dayOf(order: Order, kind: string, now: Date): string | null {
  const event = order.events.find((candidate) => candidate.kind === kind);
  return event === undefined ? null : dayWords(event.at, now);
}
