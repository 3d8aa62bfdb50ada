import type { Offer } from '@foldwright/shared/contracts/storefront';
import { offerChanges } from './offer-change';

const money = (amountMinor: number) => ({ amountMinor, currency: 'EUR' as const });
const offer = (each: number, fromShelf: number, changes: Partial<Offer> = {}): Offer => ({
  lines: [
    {
      ...{ listingId: 'l', slug: 's', title: 'Water kit', finishId: 'bare', quantity: 1, fromShelf },
      ...{ each: money(each), total: money(each), tax: money(0), leavesInDays: fromShelf > 0 ? 1 : 13 },
      contents: ['1 × Pump tray, revision C, moss', '4 × Socket screw M5 × 16'],
    },
  ],
  gone: [],
  ...{ items: money(each), postage: money(690), taxName: 'VAT', taxBasisPoints: 2300 },
  ...{ tax: money(0), total: money(each + 690), offerHash: 'h' },
  ...changes,
});

describe('what changed in an offer', () => {
  it('names prices, what left the shelf, and postage', () => {
    expect(offerChanges(offer(14800, 1), offer(15200, 0, { postage: money(790) }))).toEqual([
      'Water kit: €148.00 each was what you saw, now it is €152.00.',
      'Water kit: 1 were on the shelf, now there are 0; it leaves in about 13 days.',
      'Postage: €6.90 was what you saw, now it is €7.90.',
    ]);
  });

  it('names a piece that is another one now, down to its revision', () => {
    const seen = offer(14800, 1);
    const contents = ['1 × Pump tray, revision D, moss', '4 × Socket screw M5 × 16'];
    const now = { ...seen, lines: seen.lines.map((line) => ({ ...line, contents })) };
    expect(offerChanges(seen, now)).toEqual([
      'Water kit: no longer in it: 1 × Pump tray, revision C, moss.',
      'Water kit: now in it: 1 × Pump tray, revision D, moss.',
    ]);
  });

  it('names what can’t be had any more', () => {
    expect(offerChanges(offer(14800, 1), offer(14800, 1, { lines: [] }))).toEqual(['Water kit can’t be had any more.']);
  });
});
