import type { CustomerOrder } from '@foldwright/shared/contracts/sale-links';
import { dayWords } from '@foldwright/ui/date-text/date-words';

type Item = CustomerOrder['items'][number];

/** Pieces that go together, as the customer sees them: a parcel that left, or what is still here. */
export interface Parcel {
  readonly key: string;
  readonly title: string;
  readonly note: string;
  readonly rows: readonly { readonly item: Item; readonly quantity: number; readonly note: string | null }[];
}

const noteOf = (item: Item): string | null => {
  if (item.short > 0) return item.beingCut > 0 ? 'being cut for you' : 'waits for metal';
  return item.reserved > 0 ? 'on the shelf for you' : null;
};

/** Parcels of an order: those that left, oldest first, then what is still to come, then what was cancelled. */
export function parcelsOf(
  order: Pick<CustomerOrder, 'items' | 'shipments' | 'state' | 'leavesInDays'>,
  now: Date,
): readonly Parcel[] {
  const itemOf = (id: string): Item | undefined => order.items.find((item) => item.id === id);
  const sent = order.shipments.map((shipment): Parcel => {
    const where =
      shipment.deliveredAt === null
        ? `On its way since ${dayWords(shipment.shippedAt, now)} with ${shipment.carrier}`
        : `Arrived ${dayWords(shipment.deliveredAt, now)}`;
    return {
      key: shipment.id,
      title: `Parcel ${shipment.number}`,
      note: shipment.trackingCode === null ? where : `${where}, ${shipment.trackingCode}`,
      rows: shipment.items.flatMap(({ itemId, quantity }) => {
        const item = itemOf(itemId);
        const note = item !== undefined && item.returned > 0 ? `${item.returned} came back` : null;
        return item === undefined ? [] : [{ item, quantity, note }];
      }),
    };
  });
  const waiting = order.items.flatMap((item) => {
    const quantity = item.quantity - item.shipped - item.cancelled;
    return quantity > 0 ? [{ item, quantity, note: noteOf(item) }] : [];
  });
  const cancelled = order.items.flatMap((item) =>
    item.cancelled > 0 ? [{ item, quantity: item.cancelled, note: null }] : [],
  );
  return [
    ...sent,
    ...(waiting.length === 0
      ? []
      : [
          {
            key: 'waiting',
            title: sent.length === 0 ? 'Your order' : 'Still to come',
            note:
              order.state === 'placed' ? 'kept for you while you pay' : `leaves in about ${order.leavesInDays} days`,
            rows: waiting,
          },
        ]),
    ...(cancelled.length === 0 ? [] : [{ key: 'cancelled', title: 'Cancelled', note: '', rows: cancelled }]),
  ];
}
