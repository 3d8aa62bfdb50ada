import { formatMoney } from '@foldwright/shared/units/money';
import type { Sale } from '../../models/sale';
import type { Letter } from '../order-letters';
import type { SaleFact } from './sale-state';

/** What letters about a sale need besides the sale itself. */
export interface LetterSubject {
  readonly sale: Pick<Sale, 'id' | 'number' | 'link' | 'customerName' | 'totalMinor' | 'currency'>;
  readonly shopName: string;
  /** Whether a payment came in, now or before. */
  readonly isPaid: boolean;
  /** "1 × Two-pump water kit, moss" a line. */
  readonly lines: readonly string[];
  readonly publicUrl: string;
}

/** Address of the customer's order page: whoever has it sees the order. */
export const orderPageUrl = (publicUrl: string, link: string): string => `${publicUrl}/shop/order/${link}`;

/** The letter to the customer about something that happened; null for what nobody has to be told by mail. */
export function letterToCustomer(subject: LetterSubject, fact: SaleFact): Letter | null {
  const { sale, shopName, lines, publicUrl } = subject;
  const words = wordsAbout(subject, fact);
  if (words === null) return null;
  const body = [
    `Hello ${sale.customerName},`,
    words.text,
    ...(fact.kind === 'placed' || fact.kind === 'paid' ? [[...lines, `Total ${totalOf(sale)}`].join('\n')] : []),
    `${fact.details.isWhole === true ? 'Your order' : 'Your order, with its fitting sheet'}: ${orderPageUrl(publicUrl, sale.link)}`,
    shopName,
  ];
  return { subject: `${shopName}, order ${sale.number}: ${words.subject}`, body: `${body.join('\n\n')}\n` };
}

/** The letter to the workshop that somebody has bought something; null for everything else. */
export function letterToWorkshop(subject: LetterSubject, fact: SaleFact): Letter | null {
  if (fact.kind !== 'paid') return null;
  const { sale, lines, publicUrl } = subject;
  const body = [
    `${sale.customerName} has paid order ${sale.number}.`,
    [...lines, `Total ${totalOf(sale)}`].join('\n'),
    `What to do next: ${publicUrl}/shop-desk/sales/${sale.id}`,
  ];
  return { subject: `Sale ${sale.number} is paid`, body: `${body.join('\n\n')}\n` };
}

const totalOf = (sale: LetterSubject['sale']) => formatMoney({ amountMinor: sale.totalMinor, currency: sale.currency });

function wordsAbout({ sale, isPaid }: LetterSubject, fact: SaleFact): { subject: string; text: string } | null {
  const { reason, what, parcel, carrier, trackingCode, amountMinor, isWhole } = fact.details;
  const because = reason === undefined ? [] : [reason];
  switch (fact.kind) {
    case 'placed':
      return {
        subject: 'noted',
        text: 'Your order is noted. What is on the shelf is kept for you for an hour; pay for it on the page below.',
      };
    case 'paid':
      return { subject: 'paid', text: 'Your payment came in. Thank you. We tell you when the parcel leaves.' };
    case 'cut-ordered':
      return {
        subject: 'being cut for you',
        text: `Part of your order has to be cut first, and is on order now: ${what ?? 'a bracket'}.`,
      };
    case 'shipped':
      return {
        subject: `parcel ${parcel ?? 1} is on its way`,
        text: [
          `Parcel ${parcel ?? 1} left with ${carrier ?? 'the carrier'}.`,
          ...(trackingCode === undefined ? [] : [`Tracking code: ${trackingCode}`]),
          ...(what === undefined ? [] : ['', what]),
        ].join('\n'),
      };
    case 'cancelled':
      return {
        subject: isWhole === true ? 'cancelled' : 'partly cancelled',
        text: [
          isWhole === true ? 'Your order is cancelled.' : `Part of your order is cancelled: ${what ?? 'see below'}.`,
          ...because,
          isPaid ? 'What was paid for it goes back to the card that paid.' : 'Nothing was charged.',
        ].join('\n'),
      };
    case 'returned':
      return { subject: 'return noted', text: `We have it back: ${what ?? 'what you sent'}.` };
    case 'refunded': {
      const back = formatMoney({ amountMinor: amountMinor ?? 0, currency: sale.currency });
      return { subject: 'money sent back', text: [`${back} went back to the card that paid.`, ...because].join('\n') };
    }
    default:
      return null;
  }
}
