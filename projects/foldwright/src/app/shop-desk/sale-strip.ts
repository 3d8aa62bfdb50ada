import type { Sale } from '@foldwright/shared/contracts/sales';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import type { RouteMark, RouteStep } from '@foldwright/ui/route-strip/route-strip';

/** How far a sale is, from the desk: paid, all on the shelf, all sent, all arrived. */
export function saleStrip(sale: Pick<Sale, 'state' | 'items' | 'events'>, now: Date): readonly RouteStep[] {
  if (sale.state === 'cancelled') return [{ id: 'cancelled', label: 'Cancelled', mark: 'ring' }];
  const isPaid = sale.state !== 'placed';
  const missing = sale.items.reduce((sum, { short }) => sum + short, 0);
  const done = [
    isPaid,
    isPaid && missing === 0,
    sale.state === 'shipped' || sale.state === 'delivered',
    sale.state === 'delivered',
  ];
  const current = done.indexOf(false);
  const day = (kind: Sale['events'][number]['kind']): string | null => {
    const event = sale.events.findLast((one) => one.kind === kind);
    return event === undefined ? null : dayWords(event.at, now);
  };
  const steps = [
    { id: 'paid', label: 'Paid', sub: day('paid') },
    { id: 'there', label: 'On the shelf', sub: missing > 0 ? `${missing} missing` : null },
    { id: 'sent', label: 'Sent', sub: day('shipped') },
    { id: 'arrived', label: 'Arrived', sub: day('delivered') },
  ];
  return steps.map((step, at) => {
    const mark: RouteMark = done[at] === true ? 'punched' : at === current ? 'ring' : 'tick';
    return { ...step, mark };
  });
}
