import { randomUUID } from 'node:crypto';
import { NOBODY } from '@foldwright/server/http/visitor';
import { placeSale } from '@foldwright/server/services/sales/place-sale';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import fc from 'fast-check';
import { Client } from 'pg';
import type { Commerce } from '../support/commerce';
import { releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import { ADDRESS, expectBalance, offerFor, openShop, publish, readLink } from '../support/shop';
import { deliver, paymentMessage } from '../support/signed-messages';

// A release writes real documents, and each order of the messages is a sale of its own.
jest.setTimeout(180_000);

interface Placed {
  readonly id: string;
  readonly link: string;
  readonly number: number;
}

describe('messages of the payment host about a sale', () => {
  let shop: Commerce;
  let owner: TestBrowser;
  let behind: Client;
  let line: CartLine;
  let totalMinor: number;
  /** Provider time of everything told here, and the time of ordering: the same for all, so that rows can be compared. */
  const start = Date.now() + 60_000;
  const minute = (count: number) => new Date(start + count * 60_000);

  beforeAll(async () => {
    shop = await startCommerce({ isTold: false });
    behind = new Client({ connectionString: shop.ownerUrl });
    await behind.connect();
    const workshop = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    const { revisionId } = await releaseBracket(owner);
    await openShop(owner);
    line = { listingId: await publish(owner, { kind: 'bracket', revisionId }), finishId: 'bare', quantity: 2 };
    totalMinor = (await offerFor(owner, [line])).total.amountMinor;
  });
  afterEach(async () => {
    expect(shop.loggedErrors.filter((text) => text.includes('unforeseen'))).toEqual([]);
    await expectBalance(owner);
  });
  afterAll(async () => {
    await behind.end();
    await shop.closeAll();
  });

  async function order(): Promise<Placed> {
    const { database, queue, publicUrl } = shop;
    const { offerHash } = await offerFor(owner, [line]);
    const wish = { lines: [line], offerHash, email: 'ravi@example.test', address: ADDRESS };
    const tools = { database, queue, publicUrl, now: () => minute(0) };
    const { link, number } = await placeSale(tools, NOBODY, 'larkfield', wish, randomUUID());
    const { rows } = await behind.query(`UPDATE sales SET checkout_id = 'cs_' || id WHERE link = $1 RETURNING id`, [
      link,
    ]);
    return { id: String(rows[0].id), link, number };
  }

  const paid = ({ id }: Placed, payment: string, at: number, amount = totalMinor) =>
    paymentMessage({
      id: `evt_${payment}_${id}`,
      type: 'checkout.session.completed',
      at: minute(at),
      object: {
        ...{ id: `cs_${id}`, payment_status: 'paid', payment_intent: `${payment}_${id}` },
        ...{ amount_total: amount, currency: 'eur', metadata: { orderId: id } },
      },
    });
  const MESSAGES = {
    ended: ({ id }: Placed) =>
      paymentMessage({
        ...{ id: `evt_ended_${id}`, type: 'checkout.session.expired', at: minute(6) },
        object: { id: `cs_${id}`, metadata: { orderId: id } },
      }),
    declined: ({ id }: Placed) =>
      paymentMessage({
        ...{ id: `evt_declined_${id}`, type: 'payment_intent.payment_failed', at: minute(2) },
        object: {
          ...{ id: `pi_1_${id}`, metadata: { orderId: id } },
          last_payment_error: { message: 'The card was declined.' },
        },
      }),
    paid: (sale: Placed) => paid(sale, 'pi_1', 3),
    'paid again': (sale: Placed) => paid(sale, 'pi_2', 4),
    // Of money that nobody here has sent yet: it can only have come too early, and says nothing by itself.
    refunded: ({ id }: Placed) =>
      paymentMessage({
        ...{ id: `evt_refunded_${id}`, type: 'charge.refunded', at: minute(9) },
        object: {
          ...{ id: `ch_${id}`, payment_intent: `pi_2_${id}`, amount_refunded: totalMinor },
          metadata: { orderId: id },
        },
      }),
  } as const;
  type Name = keyof typeof MESSAGES;

  async function tell(sale: Placed, names: readonly Name[]): Promise<void> {
    for (const name of names) {
      const { status } = await deliver(shop, MESSAGES[name](sale));
      if (status !== 204) throw new Error(`${name} was answered with ${status}`);
    }
  }

  /** Everything stored about a sale, without what has to differ between two of them: ids, numbers, our own clock. */
  async function rowsOf({ id, link, number }: Placed): Promise<object> {
    const { rows } = await behind.query(
      `SELECT jsonb_build_object(
         'sale', (SELECT to_jsonb(s) - 'number' - 'idempotency_key' FROM sales s WHERE id = $1),
         'facts', (SELECT jsonb_agg(to_jsonb(f) - 'id' ORDER BY key) FROM sale_facts f WHERE sale_id = $1),
         'mails', (SELECT jsonb_agg(to_jsonb(m) - 'id' - 'message_id' - 'created_at' ORDER BY key)
                   FROM mails m WHERE sale_id = $1),
         'messages', (SELECT jsonb_agg(to_jsonb(w) - 'id' - 'received_at' ORDER BY event_id)
                      FROM webhook_events w WHERE sale_id = $1),
         'refunds', (SELECT jsonb_agg(to_jsonb(r) - 'id' - 'asked_at' ORDER BY key) FROM refunds r WHERE sale_id = $1),
         'entries', (SELECT jsonb_agg(to_jsonb(e) - 'id' ORDER BY key) FROM ledger_entries e WHERE sale_id = $1),
         'postings', (SELECT jsonb_agg(jsonb_build_array(e.key, p.account, p.amount_minor) ORDER BY e.key, p.account)
                      FROM ledger_postings p JOIN ledger_entries e ON e.id = p.entry_id WHERE e.sale_id = $1),
         'jobs', (SELECT jsonb_agg(name || (data->>'task') ORDER BY name, data->>'task') FROM pgboss.job
                  WHERE name = 'sale' AND (data->>'saleId' = $1::text OR data->>'refundId' IN
                    (SELECT id::text FROM refunds WHERE sale_id = $1)))) AS rows`,
      [id],
    );
    const text = JSON.stringify(rows[0].rows).replaceAll(id, 'SALE').replaceAll(link, 'LINK');
    return JSON.parse(text.replace(new RegExp(`(order|sale) ${number}\\b`, 'gi'), '$1 0'));
  }

  function permute<T>(items: readonly T[]): T[][] {
    if (items.length === 0) return [[]];
    return items.flatMap((item) => permute(items.filter((other) => other !== item)).map((rest) => [item, ...rest]));
  }

  it('end in the same rows in each of their 24 orders, every one told twice', async () => {
    const names: Name[] = ['declined', 'paid', 'paid again', 'ended'];
    const first = await order();
    await tell(first, names);
    const expected = await rowsOf(first);
    expect(await readLink(owner, first.link)).toMatchObject({ state: 'paid', paymentState: 'paid', revision: 4 });
    expect(expected).toMatchObject({
      sale: { checkout_id: null, checkout_round: 1 },
      refunds: [{ key: 'twice:pi_2_SALE', payment_id: 'pi_2_SALE', amount_minor: totalMinor, state: 'asked' }],
      jobs: ['saleexpire', 'salerefund'],
    });
    const orders = permute(names);
    expect(orders).toHaveLength(24);
    for (const told of orders) {
      const sale = await order();
      await tell(sale, [...told, ...told.toReversed()]);
      expect({ told, rows: await rowsOf(sale) }).toEqual({ told, rows: expected });
    }
  });

  it('end in the same rows whatever was told of, told in any order and any number of times', async () => {
    const all = Object.keys(MESSAGES) as Name[];
    const told = fc.uniqueArray(fc.constantFrom(...all), { minLength: 1 }).chain((names) =>
      fc.record({
        names: fc.constant(names),
        shuffled: fc.shuffledSubarray([...names, ...names, ...names], { minLength: names.length }),
      }),
    );
    await fc.assert(
      fc.asyncProperty(told, async ({ names, shuffled }) => {
        const [one, other] = [await order(), await order()];
        await tell(one, names);
        await tell(other, [...shuffled, ...names]);
        expect(await rowsOf(other)).toEqual(await rowsOf(one));
      }),
      { numRuns: 12, endOnFailure: true },
    );
  });

  it('end in the same rows when all come at once, thrice each', async () => {
    const names = Object.keys(MESSAGES) as Name[];
    const [one, other] = [await order(), await order()];
    await tell(one, names);
    const answers = await Promise.all(
      [...names, ...names.toReversed(), ...names].map((name) => deliver(shop, MESSAGES[name](other))),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([204]));
    expect(await rowsOf(other)).toEqual(await rowsOf(one));
  });

  it('send every payment of a cancelled sale back whole, whether it came before or after', async () => {
    const guest = await new TestBrowser(shop.app).open();
    for (const told of permute(['cancel', 'paid', 'paid again'] as const)) {
      const sale = await order();
      for (const what of told) {
        if (what === 'cancel') {
          const { revision } = await readLink(guest, sale.link);
          await guest.post(`/api/sale-links/${sale.link}/cancel`).set('if-match', `"${revision}"`).expect(200);
        } else await tell(sale, [what]);
      }
      expect(await readLink(guest, sale.link)).toMatchObject({
        state: 'cancelled',
        items: [{ cancelled: 2, short: 0 }],
      });
      const { rows } = await behind.query(
        'SELECT payment_id, amount_minor FROM refunds WHERE sale_id = $1 ORDER BY payment_id',
        [sale.id],
      );
      expect({ told, rows }).toEqual({
        told,
        rows: ['pi_1', 'pi_2'].map((payment) => ({ payment_id: `${payment}_${sale.id}`, amount_minor: totalMinor })),
      });
    }
  });

  it('send money of another sum back without counting it as paid, in the books neither', async () => {
    const sale = await order();
    expect((await deliver(shop, paid(sale, 'pi_odd', 3, totalMinor - 100))).status).toBe(204);
    expect(await readLink(owner, sale.link)).toMatchObject({ state: 'placed', paymentState: 'failed' });
    const { rows } = await behind.query(
      `SELECT r.payment_id, r.amount_minor, (SELECT count(*)::int FROM ledger_entries WHERE sale_id = $1) AS entries
       FROM refunds r WHERE sale_id = $1`,
      [sale.id],
    );
    expect(rows).toEqual([{ payment_id: `pi_odd_${sale.id}`, amount_minor: totalMinor - 100, entries: 0 }]);
    // What the host says when it has sent it back.
    await behind.query("UPDATE refunds SET state = 'sent' WHERE sale_id = $1", [sale.id]);
    const { id } = sale;
    const object = {
      ...{ id: `ch_${id}`, payment_intent: `pi_odd_${id}`, amount_refunded: totalMinor - 100 },
      metadata: { orderId: id },
    };
    const event = { id: `evt_odd_back_${id}`, type: 'charge.refunded', at: minute(5), object };
    expect((await deliver(shop, paymentMessage(event))).status).toBe(204);
    const after = await readLink(owner, sale.link);
    expect(after).toMatchObject({ state: 'placed', paymentState: 'failed', totals: { refunded: { amountMinor: 0 } } });
    expect(after.events.map(({ kind }) => kind)).toContain('refunded');
  });

  it('about a refund on its way finish it once, by the sum that went back in all', async () => {
    const sale = await order();
    await tell(sale, ['paid']);
    const refunds = [1000, 500, 700];
    for (const [at, amountMinor] of refunds.entries()) {
      await owner
        .post(`/api/sales/${sale.id}/refunds`)
        .set('idempotency-key', randomUUID())
        .send({ amountMinor, reason: `Refund ${at}` })
        .expect(201);
    }
    await behind.query("UPDATE refunds SET state = 'sent' WHERE sale_id = $1", [sale.id]);
    const backInAll = (amount: number) => {
      const object = {
        ...{ id: `ch_${sale.id}`, payment_intent: `pi_1_${sale.id}`, amount_refunded: amount },
        metadata: { orderId: sale.id },
      };
      return paymentMessage({ id: `evt_${amount}_${sale.id}`, type: 'charge.refunded', at: minute(9), object });
    };
    // The last word first, then older ones, then all of it again.
    for (const amount of [1500, 1000, 1500, 2200, 1000]) {
      expect((await deliver(shop, backInAll(amount))).status).toBe(204);
      await expectBalance(owner);
    }
    expect(await readLink(owner, sale.link)).toMatchObject({
      paymentState: 'partly-refunded',
      totals: { refunded: { amountMinor: 2200 } },
    });
    const { rows } = await behind.query('SELECT DISTINCT state FROM refunds WHERE sale_id = $1', [sale.id]);
    expect(rows).toEqual([{ state: 'done' }]);
  });
});
