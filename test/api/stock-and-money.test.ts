import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import { tellSale } from '@foldwright/server/services/sales/tell-sale';
import type { Commerce } from '../support/commerce';
import { releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import { act, expectBalance, openShop, place, publish, readLink, readSale, receive } from '../support/shop';

jest.setTimeout(180_000);

/** Programs of several people at once in the suite; more behind this switch. */
const RUNS = Number(process.env['STOCK_RUNS'] ?? 4);

type Step =
  | { readonly do: 'receive' | 'adjust' | 'place'; readonly count: number }
  | { readonly do: 'pay' | 'ship' | 'cancel' | 'refund' | 'return'; readonly which: number; readonly count: number };

const step: fc.Arbitrary<Step> = fc.oneof(
  fc.record({ do: fc.constantFrom('receive' as const, 'place' as const), count: fc.integer({ min: 1, max: 3 }) }),
  fc.record({ do: fc.constant('adjust' as const), count: fc.constantFrom(-2, -1, 1) }),
  fc.record({
    do: fc.constantFrom('pay' as const, 'ship' as const, 'cancel' as const, 'refund' as const, 'return' as const),
    which: fc.nat(5),
    count: fc.integer({ min: 1, max: 2 }),
  }),
);

describe('stock and money under several people at once', () => {
  let test: Commerce;
  let owner: TestBrowser;
  let workshop: string;
  let revisionId: string;
  let listingId: string;
  let links: string[] = [];

  beforeAll(async () => {
    test = await startCommerce({ isTold: false });
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    ({ revisionId } = await releaseBracket(owner));
    await openShop(owner);
    listingId = await publish(owner, { kind: 'bracket', revisionId });
  });
  afterAll(() => test.closeAll());

  const what = () => ({ kind: 'bracket' as const, revisionId, finishId: 'powder-moss' });
  const saleAt = async (which: number) => {
    const link = links[which % Math.max(1, links.length)];
    return link === undefined ? null : readSale(owner, (await readLink(owner, link)).id);
  };

  /** A payment as the host would tell of it. */
  async function pay(saleId: string): Promise<void> {
    const { database, queue, publicUrl } = test;
    const now = () => new Date();
    await database.inWorkshop(workshop, async (scope) => {
      const sale = await scope.rows.sales.get(saleId, { lock: true });
      const paymentId = `pi_${saleId}`;
      const told = { key: `paid:${paymentId}`, kind: 'paid', at: now(), source: paymentId } as const;
      await tellSale(scope, sale, [{ ...told, details: { paymentId } }], { queue, publicUrl, now });
    });
  }

  /** One thing that somebody does; what is refused in words is as good as done: the point is what is left behind. */
  async function run(one: Step): Promise<void> {
    if ('which' in one) await onSale(one);
    else if (one.do === 'receive') await receive(owner, what(), one.count);
    else if (one.do === 'place') {
      const lines = [{ listingId, finishId: 'powder-moss', quantity: one.count }];
      // Somebody else may have taken the last one between the offer and the order.
      await place(owner, lines).then(
        (link) => links.push(link),
        () => undefined,
      );
    } else {
      const { body } = await owner.get('/api/stock').expect(200);
      const [position] = body.brackets;
      if (position === undefined) return;
      await owner
        .post(`/api/stock/${position.positionId}/adjustments`)
        .set('idempotency-key', randomUUID())
        .send({ change: one.count, reason: 'counted' });
    }
  }

  async function onSale({ do: verb, which, count }: Extract<Step, { which: number }>): Promise<void> {
    const sale = await saleAt(which);
    if (sale === null) return;
    const [item] = sale.items;
    const [line] = sale.lines;
    if (verb === 'pay') await pay(sale.id);
    else if (verb === 'ship') {
      const items = [{ itemId: item?.id, quantity: count }];
      await act(owner, sale.id, 'shipments', { items, carrier: 'Post', trackingCode: null });
    } else if (verb === 'cancel') {
      await act(owner, sale.id, 'cancellations', { lines: [{ lineId: line?.id, quantity: count }], reason: 'r' });
    } else if (verb === 'refund') await act(owner, sale.id, 'refunds', { amountMinor: 700 * count, reason: 'r' });
    else {
      const returned = { itemId: item?.id, quantity: 1, isBackOnShelf: count === 1, refundMinor: 500, reason: 'r' };
      await act(owner, sale.id, 'returns', returned);
    }
  }

  it('balances to the piece and the cent, whatever is done in whatever order', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.array(step, { minLength: 1, maxLength: 3 }), { minLength: 3, maxLength: 6 }),
        async (rounds) => {
          links = [];
          // Steps of one round run at once, over connections of their own.
          for (const round of rounds) await Promise.all(round.map(run));
          await test.runWork();
          await expectBalance(owner);
          await asOwner(test.ownerUrl, async (client) => {
            const { rows } = await client.query(`
            SELECT s.number FROM sales s
            WHERE s.total_minor * (SELECT COUNT(*) FROM sale_facts f WHERE f.sale_id = s.id AND f.kind = 'paid')
              < (SELECT COALESCE(SUM(amount_minor), 0) FROM refunds r WHERE r.sale_id = s.id AND r.state <> 'failed')
            UNION ALL SELECT 0 FROM stock_positions p WHERE p.on_hand < p.reserved OR p.reserved < 0`);
            expect(rows).toEqual([]);
          });
          expect(test.loggedErrors.filter((entry) => entry.includes('unforeseen'))).toEqual([]);
        },
      ),
      { numRuns: RUNS, endOnFailure: true },
    );
  });
});
