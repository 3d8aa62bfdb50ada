import { SALE_EVENTS } from '@foldwright/shared/contracts/sales';
import type { LetterSubject } from './sale-letters';
import { letterToCustomer, letterToWorkshop } from './sale-letters';
import type { SaleEventKind, SaleFactDetails } from './sale-state';

const LINK = 'a-link-that-is-as-long-as-a-key-43-characters';
const SUBJECT: LetterSubject = {
  sale: {
    ...{ id: 'c0ffee00-0000-4000-8000-000000000001', number: 1042, link: LINK, customerName: 'Ravi Sandle' },
    ...{ totalMinor: 15_490, currency: 'EUR' },
  },
  shopName: 'Larkfield Cartworks',
  isPaid: true,
  lines: ['1 × Two-pump water kit, powder coat, moss'],
  publicUrl: 'https://larkfield.example.test',
};

const fact = (kind: SaleEventKind, details: SaleFactDetails = {}) => ({
  ...{ key: kind, kind, at: new Date('2026-03-02T08:00:00Z'), source: 'message', details },
});
const letter = (kind: SaleEventKind, details: SaleFactDetails = {}, changes: Partial<LetterSubject> = {}) => {
  const written = letterToCustomer({ ...SUBJECT, ...changes }, fact(kind, details));
  if (written === null) throw new Error(`nobody is told of ${kind}`);
  return written;
};

describe('letters about a sale', () => {
  it('tell the customer of each step that matters, and leave the rest to the order page', () => {
    const told = SALE_EVENTS.filter((kind) => letterToCustomer(SUBJECT, fact(kind)) !== null);
    expect(told).toEqual(['placed', 'paid', 'cut-ordered', 'shipped', 'cancelled', 'returned', 'refunded']);
    expect(SALE_EVENTS.filter((kind) => letterToWorkshop(SUBJECT, fact(kind)) !== null)).toEqual(['paid']);
  });

  it('carry number, name and the private link, each of them', () => {
    for (const kind of SALE_EVENTS) {
      const written = letterToCustomer(SUBJECT, fact(kind));
      if (written === null) continue;
      expect(written.subject).toMatch(/^Larkfield Cartworks, order 1042: \S/);
      expect(written.body).toMatch(/^Hello Ravi Sandle,\n\n/);
      expect(written.body).toContain(`https://larkfield.example.test/shop/order/${LINK}\n`);
      expect(written.body).not.toMatch(/undefined|null|\n\n\n/);
    }
  });

  it('of a parcel say who carries it, how to follow it and what is in it', () => {
    const what = '1 × Pump tray, revision D, left hand, powder coat, moss\n4 × Socket screw M5 × 16, ISO 4762';
    const { subject, body } = letter('shipped', { parcel: 2, carrier: 'Post', trackingCode: 'PP 7', what });
    expect(subject).toContain('parcel 2 is on its way');
    expect(body).toContain(`Parcel 2 left with Post.\nTracking code: PP 7\n\n${what}\n`);
    expect(letter('shipped', { parcel: 1, carrier: 'Post', what }).body).not.toContain('Tracking');
  });

  it('of a cancellation say what becomes of the money: it goes back, or nothing was charged', () => {
    const details = { isWhole: true, reason: 'It was not paid in time.' };
    const unpaid = letter('cancelled', details, { isPaid: false });
    expect(unpaid.body).toContain('Your order is cancelled.\nIt was not paid in time.\nNothing was charged.');
    expect(unpaid.body).not.toContain('fitting sheet');
    expect(letter('cancelled', details).body).toContain('goes back to the card that paid.');
    const partly = letter('cancelled', { reason: 'Out of sheet', what: '1 × Strap anchor' });
    expect(partly.subject).toContain('partly cancelled');
    expect(partly.body).toContain('Part of your order is cancelled: 1 × Strap anchor.\nOut of sheet');
  });

  it('of money that went back name the sum and why', () => {
    expect(letter('refunded', { amountMinor: 3400, reason: 'Wrong hand' }).body).toContain(
      '€34.00 went back to the card that paid.\nWrong hand',
    );
  });

  it('of a payment tell the workshop what was bought and where to go on', () => {
    const written = letterToWorkshop(SUBJECT, fact('paid'));
    expect(written?.body).toContain('Ravi Sandle has paid order 1042.\n\n1 × Two-pump water kit, powder coat, moss');
    expect(written?.body).toContain(`https://larkfield.example.test/shop-desk/sales/${SUBJECT.sale.id}`);
    // The link is the customer's.
    expect(written?.body).not.toContain(LINK);
  });
});
