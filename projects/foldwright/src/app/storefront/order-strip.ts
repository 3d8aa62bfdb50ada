import type { CustomerOrder } from '@foldwright/shared/contracts/sale-links';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import type { RouteMark, RouteStep } from '@foldwright/ui/route-strip/route-strip';

const STEPS = ['paid', 'made', 'sent', 'arrived'] as const;

/** How far an order is, as a strip: paid, all there, on its way, with the customer. */
export function orderStrip(
  order: Pick<CustomerOrder, 'state' | 'paymentState' | 'items' | 'events' | 'leavesInDays'>,
  now: Date,
): readonly RouteStep[] {
  if (order.state === 'cancelled') return [{ id: 'cancelled', label: 'Cancelled', mark: 'ring' }];
  const isPaid = order.state !== 'placed';
  const isMade = isPaid && order.items.every(({ short }) => short === 0);
  const isSent = order.state === 'shipped' || order.state === 'delivered';
  const done = [isPaid, isMade, isSent, order.state === 'delivered'];
  const at = done.indexOf(false);
  const dayOf = (kind: CustomerOrder['events'][number]['kind']): string | null => {
    const event = order.events.findLast((one) => one.kind === kind);
    return event === undefined ? null : dayWords(event.at, now);
  };
  const labels = {
    paid: isPaid ? 'Paid' : 'To be paid',
    made: isMade ? 'All there' : 'Being made',
    sent: order.state === 'partly-shipped' ? 'Partly on its way' : 'On its way',
    arrived: 'With you',
  } as const;
  const subs = {
    paid: dayOf('paid'),
    made: isMade ? null : `leaves in about ${order.leavesInDays} days`,
    sent: dayOf('shipped'),
    arrived: dayOf('delivered'),
  } as const;
  return STEPS.map((id, index) => {
    const mark: RouteMark = done[index] === true ? 'punched' : index === at ? 'ring' : 'tick';
    return { id, label: labels[id], sub: isPaid || id === 'paid' ? subs[id] : null, mark };
  });
}
