import fc from 'fast-check';
import type { PricedLine } from './sum-offer';
import { joinCart, sumOffer } from './sum-offer';

const TERMS = { currency: 'EUR', taxName: 'VAT', taxBasisPoints: 2300, postageMinor: 690 } as const;
const LISTING = '11111111-1111-4111-8111-111111111111';
const line = (changes: Partial<PricedLine> = {}): PricedLine => ({
  ...{ listingId: LISTING, slug: 'strap-anchor', title: 'Strap anchor', finishId: 'bare', quantity: 1, fromShelf: 1 },
  ...{ eachMinor: 3400, leavesInDays: 1, contents: ['1 × Strap anchor, revision A, bare metal'] },
  ...changes,
});

const listingIds = fc.constantFrom('a', 'b', 'c');
const finishIds = fc.constantFrom('bare', 'powder-moss');
const quantities = fc.integer({ min: 1, max: 500 });
const cart = fc.array(fc.record({ listingId: listingIds, finishId: finishIds, quantity: quantities }), {
  minLength: 1,
  maxLength: 40,
});
const anyLine = fc
  .record({ eachMinor: fc.integer({ min: 1, max: 20_000_000 }), quantity: fc.integer({ min: 1, max: 20_000 }) })
  .map(line);
const anyTerms = fc.record({
  currency: fc.constantFrom('EUR', 'USD'),
  taxName: fc.constant('VAT'),
  taxBasisPoints: fc.integer({ min: 0, max: 3000 }),
  postageMinor: fc.integer({ min: 0, max: 10_000_000 }),
});

describe('an offer', () => {
  it('of two lines and postage, worked by hand', () => {
    // 2 × 148.00 holds 296.00 · 23 / 123 = 55.3496 of tax, 34.00 holds 6.3577, postage of 6.90 holds 1.2902.
    const offer = sumOffer(TERMS, [line({ eachMinor: 14_800, quantity: 2 }), line()], []);
    expect(offer.lines.map(({ total, tax }) => [total.amountMinor, tax.amountMinor])).toEqual([
      [29_600, 5535],
      [3400, 636],
    ]);
    expect(offer.items.amountMinor).toBe(33_000);
    expect(offer.tax.amountMinor).toBe(5535 + 636 + 129);
    expect(offer.total).toEqual({ amountMinor: 33_690, currency: 'EUR' });
  });

  it('of nothing costs nothing, postage neither', () => {
    const gone = [{ listingId: LISTING, finishId: 'bare', reason: 'This is no longer sold.' }];
    const offer = sumOffer(TERMS, [], gone);
    expect([offer.items, offer.postage, offer.tax, offer.total].map(({ amountMinor }) => amountMinor)).toEqual([
      0, 0, 0, 0,
    ]);
    expect(offer.gone).toEqual(gone);
  });

  it('adds up to the cent for every cart that can be asked for', () => {
    fc.assert(
      fc.property(anyTerms, fc.array(anyLine, { minLength: 1, maxLength: 40 }), (terms, lines) => {
        const offer = sumOffer(terms, lines, []);
        const sum = (amounts: readonly { readonly amountMinor: number }[]) =>
          amounts.reduce((total, { amountMinor }) => total + amountMinor, 0);
        expect(offer.items.amountMinor).toBe(sum(offer.lines.map(({ total }) => total)));
        expect(offer.total.amountMinor).toBe(offer.items.amountMinor + offer.postage.amountMinor);
        // Rounded once a line, so at most half a cent a line and half a cent for the postage away from the exact tax.
        const exact = (offer.total.amountMinor * terms.taxBasisPoints) / (10_000 + terms.taxBasisPoints);
        expect(Math.abs(offer.tax.amountMinor - exact)).toBeLessThanOrEqual((lines.length + 1) / 2 + 1e-3);
        expect(Number.isSafeInteger(offer.total.amountMinor)).toBe(true);
      }),
    );
  });

  it('has another name as soon as anything is different that the buyer sees', () => {
    const seen = sumOffer(TERMS, [line()], []);
    const changes: readonly Partial<PricedLine>[] = [
      { eachMinor: 3401 },
      { quantity: 2 },
      { fromShelf: 0 },
      { leavesInDays: 10 },
      { title: 'Strap anchor, wide' },
      { finishId: 'powder-moss' },
      { contents: ['1 × Strap anchor, revision B, bare metal'] },
    ];
    const others = changes.map((change) => sumOffer(TERMS, [line(change)], []));
    const terms = [
      sumOffer({ ...TERMS, taxBasisPoints: 2301 }, [line()], []),
      sumOffer({ ...TERMS, taxName: 'Sales tax' }, [line()], []),
      sumOffer({ ...TERMS, postageMinor: 691 }, [line()], []),
      sumOffer({ ...TERMS, currency: 'USD' }, [line()], []),
      sumOffer(TERMS, [line()], [{ listingId: LISTING, finishId: 'bare', reason: 'This is no longer sold.' }]),
    ];
    const names = [seen, ...others, ...terms].map(({ offerHash }) => offerHash);
    expect(new Set(names).size).toBe(1 + changes.length + terms.length);
    expect(sumOffer(TERMS, [line()], []).offerHash).toBe(seen.offerHash);
    expect(seen.offerHash).toMatch(/^[0-9a-f]{64}$/);
  });
});

describe('a cart', () => {
  it('counts one thing in one finish once, however often it was put in', () => {
    fc.assert(
      fc.property(cart, (lines) => {
        const joined = joinCart(lines);
        const keys = joined.map(({ listingId, finishId }) => `${listingId} ${finishId}`);
        expect(new Set(keys).size).toBe(keys.length);
        for (const { listingId, finishId, quantity } of joined) {
          const same = lines.filter((one) => one.listingId === listingId && one.finishId === finishId);
          expect(quantity).toBe(same.reduce((total, one) => total + one.quantity, 0));
        }
        // Joining twice is joining once, and nothing gets lost on the way.
        expect(joinCart(joined)).toEqual(joined);
        expect(new Set(lines.map(({ listingId, finishId }) => `${listingId} ${finishId}`))).toEqual(new Set(keys));
      }),
    );
  });
});
