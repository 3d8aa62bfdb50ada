import { randomUUID } from 'node:crypto';
import type { Commerce } from '../support/commerce';
import {
  checkoutFor,
  eventually,
  orderFor,
  quoteFor,
  readOrder,
  releaseBracket,
  startCommerce,
} from '../support/commerce';
import type { TestPerson } from '../support/people';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';

// The outside parties are real servers, and a release writes real documents.
jest.setTimeout(60_000);

describe('orders', () => {
  let shop: Commerce;
  let workshopId: string;
  let imogen: TestPerson;
  let owner: TestBrowser;
  let revisionId: string;

  const kinds = async (orderId: string) => (await readOrder(owner, orderId)).events.map((event) => event.kind);
  const rowsOf = <Row>(sql: string, values: unknown[] = []) =>
    asOwner(shop.ownerUrl, async (client) => (await client.query(sql, values)).rows as Row[]);

  beforeAll(async () => {
    shop = await startCommerce({ cuttingTimeoutMs: 1500 });
    workshopId = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    imogen = await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshopId]: 'owner' });
    owner = await new TestBrowser(shop.app).signIn(imogen);
    ({ revisionId } = await releaseBracket(owner));
  });
  afterEach(async () => {
    await shop.setMood({});
    // A service that is away is logged as a failed request; a fault of ours as unforeseen.
    expect(shop.loggedErrors.filter((line) => line.includes('unforeseen'))).toEqual([]);
  });
  afterAll(() => shop.closeAll());

  describe('placing', () => {
    it('freezes revision, hash, prices and one statement', async () => {
      const quote = await quoteFor(owner, revisionId);
      const order = await orderFor(owner, quote.id);
      const priced = quote.breaks[1];
      expect(order).toMatchObject({
        partName: 'Regulator bracket',
        revisionLetter: 'A',
        revisionHash: quote.revisionHash,
        quantity: 10,
        total: priced?.total,
        lines: priced?.lines,
        state: 'placed',
        paymentState: 'open',
        placedBy: 'Imogen Harrow',
        revision: 1,
      });
      expect(['cut-and-bend-to-our-flat', 'formed-sizes-rule']).toContain(order.statement);
      expect(order.events.map((event) => event.kind)).toEqual(['placed']);
      expect(order.events[0]?.text).toMatch(/^Imogen Harrow ordered 10 pieces of revision A for €/);
    });

    it('makes one order of one key, however often and however fast it is clicked', async () => {
      const quote = await quoteFor(owner, revisionId);
      const key = randomUUID();
      const place = (quantity = 10) =>
        owner.post('/api/orders').set('idempotency-key', key).send({ quoteId: quote.id, quantity });
      const before = await rowsOf('SELECT id FROM orders');
      const answers = await Promise.all([place(), place(), place(), place(), place()]);
      expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201, 201]);
      expect(new Set(answers.map(({ body }) => body.id))).toHaveProperty('size', 1);
      expect(await rowsOf('SELECT id FROM orders')).toHaveLength(before.length + 1);
      expect((await place(50).expect(409)).body.type).toBe('/problems/already-exists');
    });

    it('numbers orders without gaps when many are placed at once', async () => {
      const quote = await quoteFor(owner, revisionId);
      const orders = await Promise.all(Array.from({ length: 6 }, () => orderFor(owner, quote.id)));
      const numbers = orders.map((order) => order.number).sort((a, b) => a - b);
      expect(numbers).toEqual(numbers.map((_, index) => (numbers[0] ?? 0) + index));
    });

    it('refuses quantities that were not quoted and prices that have run out', async () => {
      const quote = await quoteFor(owner, revisionId);
      const place = (quantity: number) =>
        owner.post('/api/orders').set('idempotency-key', randomUUID()).send({ quoteId: quote.id, quantity });
      expect((await place(11).expect(400)).body.errors).toEqual([
        { pointer: '/quantity', detail: 'Choose one of the quoted quantities.' },
      ]);
      await rowsOf("UPDATE quotes SET valid_until = now() - interval '1 minute' WHERE id = $1", [quote.id]);
      expect((await place(10).expect(409)).body.detail).toContain('run out');
      const { body } = await owner.get(`/api/revisions/${revisionId}/quotes`).expect(200);
      expect(body.quotes[0].state).toBe('expired');
    });

    it('shows nothing of another workshop', async () => {
      const other = await addWorkshop(shop.ownerUrl, 'Orchard Street Welding', 'OS');
      const stranger = await new TestBrowser(shop.app).signIn(
        await addPerson(shop.ownerUrl, 'Ravi Sandle', { [other]: 'owner' }),
      );
      const quote = await quoteFor(owner, revisionId);
      const order = await orderFor(owner, quote.id);
      const missing = await stranger.get(`/api/orders/${randomUUID()}`).expect(404);
      const foreign = await stranger.get(`/api/orders/${order.id}`).expect(404);
      expect({ ...foreign.body, instance: '', requestId: '' }).toEqual({
        ...missing.body,
        instance: '',
        requestId: '',
      });
      expect((await stranger.get('/api/orders').expect(200)).body.orders).toEqual([]);
      expect((await stranger.get('/api/office/mails').expect(200)).body.mails).toEqual([]);
      const place = stranger.post('/api/orders').set('idempotency-key', randomUUID());
      await place.send({ quoteId: quote.id, quantity: 10 }).expect(404);
      await stranger.post(`/api/orders/${order.id}/checkout`).set('idempotency-key', 'k').expect(404);
      await stranger.post(`/api/orders/${order.id}/cancel`).set('if-match', '1').expect(404);
    });

    it('lets a viewer look and nothing else', async () => {
      const ada = await addPerson(shop.ownerUrl, 'Ada Quill', { [workshopId]: 'viewer' });
      const viewer = await new TestBrowser(shop.app).signIn(ada);
      const quote = await quoteFor(owner, revisionId);
      const order = await orderFor(owner, quote.id);
      await viewer.get('/api/orders').expect(200);
      await viewer.get(`/api/orders/${order.id}`).expect(200);
      await viewer.get('/api/office/mails').expect(403);
      const place = viewer.post('/api/orders').set('idempotency-key', randomUUID());
      await place.send({ quoteId: quote.id, quantity: 1 }).expect(403);
      await viewer.post(`/api/orders/${order.id}/checkout`).set('idempotency-key', randomUUID()).expect(403);
      await viewer.post(`/api/orders/${order.id}/cancel`).set('if-match', '1').expect(403);
    });
  });

  describe('the whole road', () => {
    it('goes from a quote to a parcel, with a mail at each turn', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id);
      const url = await checkoutFor(owner, order.id);
      const page = await (await fetch(url)).text();
      expect(page).toContain(`Order ${order.number}: 10 × Regulator bracket, revision A`);
      expect((await shop.pay(url)).headers.get('location')).toMatch(new RegExp(`/orders/${order.id}\\?payment=done$`));
      await eventually('paid', async () => (await readOrder(owner, order.id)).state === 'paid');
      await eventually('shipped, all told', async () => {
        await shop.runWork();
        const { state, events } = await readOrder(owner, order.id);
        return state === 'shipped' && events.filter(({ kind }) => kind === 'mail-sent').length === 4;
      });
      const done = await readOrder(owner, order.id);
      expect(done).toMatchObject({ state: 'shipped', paymentState: 'paid' });
      expect(done.trackingCode).toMatch(/^AM /);
      expect(done.events.map(({ kind }) => kind).filter((kind) => kind !== 'mail-sent')).toEqual([
        'placed',
        'checkout-opened',
        'paid',
        'sent-to-cutter',
        'accepted',
        'cutting',
        'bending',
        'shipped',
      ]);
      const subjects = ['placed', 'paid', 'accepted by the cutting service', 'shipped'];
      const arrived = shop.mail.messages().filter((mail) => mail.subject.startsWith(`Order ${order.number}:`));
      expect(arrived.map((mail) => mail.subject).sort()).toEqual(
        subjects.map((words) => `Order ${order.number}: ${words}`).sort(),
      );
      expect(arrived.every((mail) => mail.to === imogen.email)).toBe(true);
      expect(arrived.find((mail) => mail.subject.endsWith('shipped'))?.text).toContain(done.trackingCode);
      const { body } = await owner.get('/api/office/mails').expect(200);
      const office = body.mails.filter((mail: { subject: string }) =>
        mail.subject.startsWith(`Order ${order.number}:`),
      );
      expect(office.map((mail: { state: string }) => mail.state)).toEqual(['sent', 'sent', 'sent', 'sent']);
    });

    it('tells of a declined card, and takes the next one', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      const url = await checkoutFor(owner, order.id);
      expect((await shop.pay(url, '4000 0000 0000 0002')).status).toBe(402);
      await eventually('declined', async () => (await readOrder(owner, order.id)).paymentState === 'failed');
      const declined = await readOrder(owner, order.id);
      expect(declined.state).toBe('placed');
      expect(declined.events.at(-1)?.text).toContain('The card was declined.');
      expect(await checkoutFor(owner, order.id)).toBe(url);
      await shop.pay(url);
      await eventually('paid', async () => (await readOrder(owner, order.id)).paymentState === 'paid');
      const again = await owner
        .post(`/api/orders/${order.id}/checkout`)
        .set('idempotency-key', randomUUID())
        .expect(409);
      expect(again.body.detail).toContain('paid');
    });

    it('opens one page for an order, however often it is asked, and a new one once that has run out', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      const urls = await Promise.all([1, 2, 3].map(() => checkoutFor(owner, order.id)));
      urls.push(await checkoutFor(owner, order.id));
      expect(new Set(urls)).toHaveProperty('size', 1);
      const session = urls[0]?.split('/').at(-1);
      await fetch(`${shop.payments.url}/v1/checkout/sessions/${session}/expire`, {
        method: 'POST',
        headers: { authorization: 'Bearer sk_test_commerce' },
      });
      const next = await Promise.all([1, 2, 3].map(() => checkoutFor(owner, order.id)));
      expect(new Set(next)).toHaveProperty('size', 1);
      expect(next[0]).not.toBe(urls[0]);
      await shop.pay(next[0] ?? '');
      await eventually('paid', async () => (await readOrder(owner, order.id)).paymentState === 'paid');
    });

    it('opens a new page when the payment host has forgotten the old one', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      const url = await checkoutFor(owner, order.id);
      await rowsOf("UPDATE orders SET checkout_id = 'cs_forgotten' WHERE id = $1", [order.id]);
      const next = await checkoutFor(owner, order.id);
      expect(next).not.toBe(url);
      expect(await checkoutFor(owner, order.id)).toBe(next);
    });

    it('keeps the order when the payment host is down, and opens the page when it is back', async () => {
      await shop.stopPayments();
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      const answer = await owner
        .post(`/api/orders/${order.id}/checkout`)
        .set('idempotency-key', randomUUID())
        .expect(503);
      expect(answer.body).toMatchObject({ type: '/problems/service-unreachable' });
      expect(answer.body.kept).toContain('Nothing was charged');
      await shop.startPayments();
      await shop.pay(await checkoutFor(owner, order.id));
      await eventually('paid', async () => (await readOrder(owner, order.id)).paymentState === 'paid');
    });

    it('hands the order over once the shop is back, and only once', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      await shop.pay(await checkoutFor(owner, order.id));
      await eventually('paid', async () => (await readOrder(owner, order.id)).state === 'paid');
      await shop.setMood({ failEveryRequest: true });
      expect(await shop.runWork()).toBeGreaterThan(0);
      expect((await readOrder(owner, order.id)).state).toBe('paid');
      await shop.setMood({ answerDelayMs: 2500 });
      await shop.forgetPauses();
      // The shop takes the order and answers too late: nobody knows, so it is handed over again.
      expect(await shop.runWork()).toBeGreaterThan(0);
      await shop.setMood({});
      await eventually('shipped', async () => {
        await shop.forgetPauses();
        await shop.runWork();
        return (await readOrder(owner, order.id)).state === 'shipped';
      });
      const board = await (await fetch(shop.cutting.url)).text();
      expect(board.split(order.id)).toHaveLength(2);
    });

    it('sends the money back when the shop hands the order back, once', async () => {
      await shop.setMood({ refuseOrders: true });
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      await shop.pay(await checkoutFor(owner, order.id));
      await eventually('money sent back and told', async () => {
        await shop.forgetPauses();
        await shop.runWork();
        const { paymentState, events } = await readOrder(owner, order.id);
        return paymentState === 'refunded' && events.filter(({ kind }) => kind === 'mail-sent').length === 4;
      });
      const done = await readOrder(owner, order.id);
      expect(done.state).toBe('refused');
      expect(done.events.find(({ kind }) => kind === 'refused')?.text).toContain('came in scratched');
      expect(done.events.filter(({ kind }) => kind === 'refunded')).toHaveLength(1);
    });
  });

  describe('cancelling', () => {
    const cancel = (orderId: string, revision: number) =>
      owner.post(`/api/orders/${orderId}/cancel`).set('if-match', String(revision));

    it('cancels what is not paid, and closes its payment page', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      const url = await checkoutFor(owner, order.id);
      const stale = await cancel(order.id, order.revision).expect(412);
      expect(stale.body.type).toBe('/problems/stale-row');
      await owner.post(`/api/orders/${order.id}/cancel`).expect(428);
      const { revision } = await readOrder(owner, order.id);
      const { body } = await cancel(order.id, revision).expect(200);
      expect(body).toMatchObject({ state: 'cancelled', paymentState: 'open' });
      await shop.runWork();
      expect((await shop.pay(url)).status).toBe(410);
      expect((await cancel(order.id, revision).expect(200)).body.state).toBe('cancelled');
      await owner.post(`/api/orders/${order.id}/checkout`).set('idempotency-key', randomUUID()).expect(409);
    });

    it('sends money back that comes in after all, and says so', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      const url = await checkoutFor(owner, order.id);
      await cancel(order.id, (await readOrder(owner, order.id)).revision).expect(200);
      // Paid on a page that was still open in another tab, before the work that closes it was done.
      await shop.pay(url);
      await eventually('money sent back', async () => {
        await shop.forgetPauses();
        await shop.runWork();
        return (await readOrder(owner, order.id)).paymentState === 'refunded';
      });
      const done = await readOrder(owner, order.id);
      expect(done.state).toBe('cancelled');
      expect(done.events.find(({ kind }) => kind === 'paid')?.text).toMatch(
        /after the order was cancelled\. It goes back/,
      );
      expect(await kinds(order.id)).not.toContain('sent-to-cutter');
    });

    it('does not cancel what is paid', async () => {
      const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id, 1);
      await shop.pay(await checkoutFor(owner, order.id));
      await eventually('paid', async () => (await readOrder(owner, order.id)).state === 'paid');
      expect((await cancel(order.id, 3).expect(409)).body.type).toBe('/problems/wrong-state');
    });
  });
});
