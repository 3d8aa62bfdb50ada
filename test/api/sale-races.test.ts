import { randomUUID } from 'node:crypto';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { Client } from 'pg';
import type { Commerce } from '../support/commerce';
import { releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import { ADDRESS, expectBalance, offerFor, openShop, place, publish, readLink, receive } from '../support/shop';
import { deliver, paymentMessage } from '../support/signed-messages';

// Releases write real documents, and everything here happens at once on two processors.
jest.setTimeout(120_000);

describe('many at once at one shelf', () => {
  let shop: Commerce;
  let owner: TestBrowser;
  let behind: Client;
  let revisionId: string;
  let line: CartLine;
  const moss = () => ({ kind: 'bracket' as const, revisionId, finishId: 'powder-moss' });
  const guests = (count: number) => Promise.all(Array.from({ length: count }, () => new TestBrowser(shop.app).open()));

  beforeEach(async () => {
    shop = await startCommerce({ isTold: false });
    behind = new Client({ connectionString: shop.ownerUrl });
    await behind.connect();
    const workshop = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    ({ revisionId } = await releaseBracket(owner));
    await openShop(owner);
    line = { listingId: await publish(owner, { kind: 'bracket', revisionId }), finishId: 'powder-moss', quantity: 1 };
  });
  afterEach(async () => {
    expect(shop.loggedErrors.filter((text) => text.includes('unforeseen'))).toEqual([]);
    await behind.end();
    await shop.closeAll();
  });

  async function deadlocks(): Promise<number> {
    await behind.query('SELECT pg_stat_clear_snapshot()');
    const { rows } = await behind.query(
      'SELECT deadlocks::int AS count FROM pg_stat_database WHERE datname = current_database()',
    );
    return Number(rows[0].count);
  }

  const pay = async (saleId: string, totalMinor: number) => {
    const object = {
      ...{ id: `cs_${saleId}`, payment_status: 'paid', payment_intent: `pi_${saleId}` },
      ...{ amount_total: totalMinor, currency: 'eur', metadata: { orderId: saleId } },
    };
    const event = { id: `evt_${saleId}`, type: 'checkout.session.completed', at: new Date(), object };
    return (await deliver(shop, paymentMessage(event))).status;
  };

  it('sells three brackets to three of eight, and asks the other five', async () => {
    await receive(owner, moss(), 3);
    const crowd = await guests(8);
    const { offerHash } = await offerFor(owner, [line]);
    const answers = await Promise.all(
      crowd.map((guest, at) =>
        guest
          .post('/api/shops/larkfield/sales')
          .set('idempotency-key', randomUUID())
          .send({ lines: [line], offerHash, email: `guest-${at}@example.test`, address: ADDRESS }),
      ),
    );
    const placed = answers.filter(({ status }) => status === 201);
    const asked = answers.filter(({ status }) => status === 409);
    expect([placed.length, asked.length]).toEqual([3, 5]);
    expect(new Set(placed.map(({ body }) => body.number))).toEqual(new Set([1001, 1002, 1003]));
    expect(new Set(placed.map(({ body }) => body.link)).size).toBe(3);
    for (const { body } of asked) {
      expect(body).toMatchObject({ type: '/problems/offer-changed', extra: { offer: { lines: [{ fromShelf: 0 }] } } });
    }
    const { body } = await owner.get('/api/stock').expect(200);
    expect(body.brackets).toMatchObject([{ onHand: 3, reserved: 3, free: 0 }]);
    await expectBalance(owner);
  });

  it('pays, cancels and receives without one waiting for the other for ever', async () => {
    const [guest] = await guests(1);
    if (guest === undefined) throw new Error('nobody came');
    const before = await deadlocks();
    for (let round = 0; round < 4; round += 1) {
      // None lies there, so all of them wait; what comes in goes to the oldest while they are paid for and cancelled.
      const links: string[] = [];
      for (let count = 0; count < 6; count += 1) links.push(await place(guest, [line]));
      const orders = await Promise.all(links.map((link) => readLink(guest, link)));
      const leaves = orders.slice(0, 2);
      const stays = orders.slice(2);
      const answers = await Promise.all([
        receive(owner, moss(), 5).then(() => 204),
        ...stays.map(({ id, totals }) => pay(id, totals.total.amountMinor)),
        ...leaves.map(async (_order, at) => {
          const { revision } = await readLink(guest, links[at] ?? '');
          const sent = guest.post(`/api/sale-links/${links[at]}/cancel`).set('if-match', `"${revision}"`);
          return (await sent).status;
        }),
      ]);
      expect(answers.filter((status) => ![200, 204, 412].includes(status))).toEqual([]);
      for (const link of links.slice(2)) {
        expect(await readLink(guest, link)).toMatchObject({ state: 'paid', items: [{ quantity: 1 }] });
      }
      await expectBalance(owner);
    }
    // Counters of a process are told late.
    await new Promise((done) => setTimeout(done, 1200));
    expect((await deadlocks()) - before).toBe(0);
  });
});
