import type { Sale as SaleContract } from '@foldwright/shared/contracts/sales';
import { formatMoney } from '@foldwright/shared/units/money';
import type { Sale } from '../models/sale';

/** Something that happened to a sale, as its row tells it. */
export interface SaleEntry {
  readonly kind: SaleContract['events'][number]['kind'];
  readonly details: {
    readonly amountMinor?: number;
    readonly reason?: string;
    readonly subject?: string;
    readonly what?: string;
    readonly parcel?: number;
    readonly carrier?: string;
    readonly trackingCode?: string;
    readonly isWhole?: boolean;
  };
}

/** A fact of a sale in words, fit for the workshop and for the customer. */
export function saleEventWords(sale: Sale, { kind, details }: SaleEntry): string {
  const { reason, what, parcel, carrier, trackingCode, amountMinor, subject, isWhole } = details;
  const money = formatMoney({ amountMinor: amountMinor ?? sale.totalMinor, currency: sale.currency });
  const because = reason === undefined ? '' : ` ${reason}`;
  switch (kind) {
    case 'placed':
      return `Ordered by ${sale.customerName}`;
    case 'checkout-opened':
      return 'Payment page opened';
    case 'payment-failed':
      return `The payment didn’t go through.${because}`;
    case 'paid':
      return `${money} paid`;
    case 'cut-ordered':
      return `On order at the cutting service: ${what ?? 'the missing brackets'}`;
    case 'stock-arrived':
      return `Now on the shelf: ${what ?? 'what was missing'}`;
    case 'shipped':
      return `Parcel ${parcel ?? 1} left with ${carrier ?? 'the carrier'}${trackingCode === undefined ? '' : `, ${trackingCode}`}`;
    case 'delivered':
      return `Parcel ${parcel ?? 1} arrived`;
    case 'cancelled':
      return `${isWhole === true ? 'Cancelled' : `Partly cancelled: ${what ?? ''}`}.${because}`;
    case 'returned':
      return `Came back: ${what ?? ''}.${because}`;
    case 'refund-asked':
      return `${money} is to go back.${because}`;
    case 'refund-failed':
      return `${money} could not be sent back.${because}`;
    case 'refunded':
      return `${money} went back.${because}`;
    case 'mail-sent':
      return `Mail sent: ${subject ?? ''}`;
  }
}
