import { randomUUID } from 'node:crypto';
import type { Order, Quote } from '@foldwright/shared/contracts/orders';
import fc from 'fast-check';
import { Client } from 'pg';
import type { Commerce } from '../support/commerce';
import { checkoutFor, orderFor, quoteFor, readOrder, releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import type { SignedMessage } from '../support/signed-messages';
import { cuttingMessage, deliver, paymentMessage } from '../support/signed-messages';

// The outside parties are real servers, and a release writes real documents.
jest.setTimeout(240_000);

describe('messages of the outside services', () => {
  let shop: Commerce;
  let owner: TestBrowser;
  let quote: Quote;
  /** Provider time of everything told here: the same for every order, so that rows can be compared. */
  const start = Date.now() + 60_000;
  const minute = (count: number) => new Date(start + count * 60_000);

  /** One connection for all looks behind the scenes, which are many here. */
  let behind: Client;
  const query = async <Row>(sql: string, values: unknown[] = []) => (await behind.query(sql, values)).rows as Row[];

  const amountOf = (order: Order) => ({ amount_total: order.total.amountMinor, currency: 'eur' });
  const metadata = (order: Order) => ({ metadata: { orderId: order.id } });
  const paid = (order: Order, payment = `pi_${order.id}`, at = 3) =>
    paymentMessage({
      id: `evt_paid_${payment}`,
      type: 'checkout.session.completed',
      at: minute(at),
      object: {
        id: `cs_${order.id}`,
        payment_status: 'paid',
        payment_intent: payment,
        ...amountOf(order),
        ...metadata(order),
      },
    });
  const declined = (order: Order) =>
    paymentMessage({
      id: `evt_declined_${order.id}`,
      type: 'payment_intent.payment_failed',
      at: minute(2),
      object: { id: `pi_${order.id}`, last_payment_error: { message: 'The card was declined.' }, ...metadata(order) },
    });
  const refunded = (order: Order) =>
    paymentMessage({
      id: `evt_refunded_${order.id}`,
      type: 'charge.refunded',
      at: minute(9),
      object: {
        id: `ch_${order.id}`,
        payment_intent: `pi_${order.id}`,
        amount_refunded: order.total.amountMinor,
        ...metadata(order),
      },
    });
  const progress = (order: Order, state: string, at: number) =>
    cuttingMessage({
      id: `cb_${state}_${order.id}`,
      at: minute(at),
      reference: order.id,
      state,
      ...(state === 'shipped' ? { trackingCode: 'AM 0123' } : {}),
      ...(state === 'refused' ? { reason: 'No sheet left.' } : {}),
    });
  const MESSAGES: Readonly<Record<string, (order: Order) => SignedMessage>> = {
    declined,
    paid,
    accepted: (order) => progress(order, 'accepted', 5),
    cutting: (order) => progress(order, 'cutting', 6),
    bending: (order) => progress(order, 'bending', 7),
    shipped: (order) => progress(order, 'shipped', 8),
    refused: (order) => progress(order, 'refused', 8.5),
    refunded,
  };
  const messageOf = (name: string, order: Order) => {
    const make = MESSAGES[name];
    if (make === undefined) throw new Error(name);
    return make(order);
  };

  /** Everything stored about an order, without what has to differ between two orders: ids, numbers, our own clock. */
  async function rowsOf(order: Order): Promise<{ jobs: readonly unknown[] }> {
    const told = await query<{ rows: object }>(
      `SELECT jsonb_build_object(
         'orders', (SELECT jsonb_agg(o) FROM orders o WHERE id = $1),
         'events', (SELECT jsonb_agg(to_jsonb(e) - 'id' - 'order_id' ORDER BY key) FROM order_events e WHERE order_id = $1),
         'mails', (SELECT jsonb_agg(to_jsonb(m) - 'id' - 'message_id' - 'created_at' ORDER BY key)
                   FROM mails m WHERE order_id = $1),
         'messages', (SELECT jsonb_agg(to_jsonb(w) - 'id' - 'received_at' ORDER BY event_id)
                      FROM webhook_events w WHERE order_id = $1),
         'jobs', (SELECT COALESCE(jsonb_agg(name || data::text ORDER BY name, data::text), '[]')
                  FROM pgboss.job WHERE data->>'orderId' = $1::text)) AS rows`,
      [order.id],
    );
    // PostgreSQL writes a moment without its trailing zeros.
    const placedAt = new RegExp(`${order.placedAt.slice(0, 19)}[.\\d]*\\+00:00`, 'g');
    return JSON.parse(
      JSON.stringify(told[0]?.rows)
        .replaceAll(order.id, 'ORDER')
        .replaceAll(`"number":${order.number}`, '"number":0')
        .replaceAll(`Order ${order.number}:`, 'Order 0:')
        .replace(placedAt, 'PLACED'),
    );
  }

  async function tell(order: Order, names: readonly string[]): Promise<void> {
    for (const name of names) {
      const { status } = await deliver(shop, messageOf(name, order));
      if (status !== 204) throw new Error(`${name} was answered with ${status}`);
    }
  }

  beforeAll(async () => {
    shop = await startCommerce({ isTold: false });
    behind = new Client({ connectionString: shop.ownerUrl });
    await behind.connect();
    const workshopId = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshopId]: 'owner' }),
    );
    quote = await quoteFor(owner, (await releaseBracket(owner)).revisionId);
  });
  afterEach(() => expect(shop.loggedErrors.filter((line) => line.includes('unforeseen'))).toEqual([]));
  afterAll(async () => {
    await behind.end();
    await shop.closeAll();
  });

  it('end in the same rows in each of their 120 orders, every one told twice', async () => {
    const names = ['declined', 'paid', 'accepted', 'cutting', 'shipped'];
    const first = await orderFor(owner, quote.id);
    await tell(first, names);
    const expected = await rowsOf(first);
    expect(await readOrder(owner, first.id)).toMatchObject({
      state: 'shipped',
      paymentState: 'paid',
      trackingCode: 'AM 0123',
      revision: 6,
    });

    const permute = (items: readonly string[]): string[][] =>
      items.length === 0
        ? [[]]
        : items.flatMap((item) => permute(items.filter((other) => other !== item)).map((rest) => [item, ...rest]));
    const permutations = permute(names);
    expect(permutations).toHaveLength(120);
    const tryOne = async (told: readonly string[]) => {
      const order = await orderFor(owner, quote.id);
      await tell(order, [...told, ...told.toReversed()]);
      expect({ told, rows: await rowsOf(order) }).toEqual({ told, rows: expected });
    };
    while (permutations.length > 0) await Promise.all(permutations.splice(0, 6).map(tryOne));
  });

  it('end in the same rows whatever was told of, told in any order and any number of times', async () => {
    const some = fc.uniqueArray(fc.constantFrom(...Object.keys(MESSAGES)), { minLength: 1 });
    const told = some.chain((names) =>
      fc.record({
        names: fc.constant(names),
        shuffled: fc.shuffledSubarray([...names, ...names, ...names], { minLength: names.length }),
      }),
    );
    await fc.assert(
      fc.asyncProperty(told, async ({ names, shuffled }) => {
        const [one, other] = [await orderFor(owner, quote.id), await orderFor(owner, quote.id)];
        await tell(one, names);
        await tell(other, [...shuffled, ...names]);
        // Work is not state: money that went back before it was known to have come in leaves nothing to send back.
        const [{ jobs, ...rows }, { jobs: _, ...expected }] = [await rowsOf(other), await rowsOf(one)];
        expect(rows).toEqual(expected);
        expect(new Set(jobs).size).toBe(jobs.length);
      }),
      { numRuns: 12, endOnFailure: true },
    );
  });

  it('end in the same rows when all come at once, thrice each', async () => {
    const names = ['declined', 'paid', 'accepted', 'cutting', 'bending', 'shipped'];
    const [one, other] = [await orderFor(owner, quote.id), await orderFor(owner, quote.id)];
    await tell(one, names);
    const answers = await Promise.all(
      [...names, ...names.toReversed(), ...names].map((name) => deliver(shop, messageOf(name, other))),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([204]));
    expect(await rowsOf(other)).toEqual(await rowsOf(one));
  });

  it('have the order handed over once and each letter written once', async () => {
    const order = await orderFor(owner, quote.id);
    await tell(order, ['paid', 'paid', 'accepted', 'accepted']);
    const jobs = await query("SELECT name FROM pgboss.job WHERE data->>'orderId' = $1", [order.id]);
    expect(jobs).toEqual([{ name: 'cutting-order' }]);
    const mails = await query<{ subject: string }>('SELECT subject FROM mails WHERE order_id = $1', [order.id]);
    expect(mails.map(({ subject }) => subject.split(': ')[1]).sort()).toEqual([
      'accepted by the cutting service',
      'paid',
      'placed',
    ]);
  });

  it('reach every open page of the workshop', async () => {
    const order = await orderFor(owner, quote.id);
    const [before] = await query<{ seq: number }>('SELECT MAX(seq) AS seq FROM live_events');
    await tell(order, ['paid']);
    const events = await query<{ payload: { kind: string; orderId?: string } }>(
      'SELECT payload FROM live_events WHERE seq > $1 ORDER BY seq',
      [before?.seq],
    );
    expect(events.map(({ payload }) => payload.kind)).toEqual(['mail-changed', 'order-changed']);
    expect(events[1]?.payload.orderId).toBe(order.id);
  });

  describe('that prove nothing', () => {
    const counts = async () => {
      const [events] = await query<{ n: number }>('SELECT COUNT(*)::int AS n FROM webhook_events');
      const refusals = await query<{ provider: string; refused: number }>(
        'SELECT provider, refused FROM webhook_refusals',
      );
      const of = (provider: string) => refusals.find((row) => row.provider === provider)?.refused ?? 0;
      return { events: events?.n, payments: of('payments'), cutting: of('cutting') };
    };
    const changed = (message: SignedMessage): SignedMessage => ({ ...message, body: message.body.replace('AM', 'XX') });

    it.each([
      ['payments', 'another secret', (order: Order) => paymentMessage(eventFor(order), { secret: 'whsec_other' })],
      ['payments', 'an old date', (order: Order) => paymentMessage(eventFor(order), { ageS: 3600 })],
      ['payments', 'another body', (order: Order) => ({ ...paid(order), body: '{"id":"evt_1"}' })],
      ['payments', 'no signature', (order: Order) => ({ ...paid(order), headers: {} })],
      ['cutting', 'another secret', (order: Order) => cuttingMessage(stepFor(order), { secret: 'other' })],
      ['cutting', 'an old date', (order: Order) => cuttingMessage(stepFor(order), { ageS: 3600 })],
      ['cutting', 'another body', (order: Order) => changed(progress(order, 'shipped', 8))],
      ['cutting', 'no signature', (order: Order) => ({ ...progress(order, 'shipped', 8), headers: {} })],
    ] as const)('%s, %s: refused, counted, nothing stored', async (provider, _name, make) => {
      const order = await orderFor(owner, quote.id);
      const before = await counts();
      const answer = await deliver(shop, make(order));
      expect(answer.status).toBe(400);
      expect(await answer.json()).toMatchObject({ type: '/problems/invalid-input', kept: 'Nothing was stored.' });
      expect(await counts()).toEqual({ ...before, [provider]: before[provider] + 1 });
      expect(await readOrder(owner, order.id)).toMatchObject({ state: 'placed', paymentState: 'open', revision: 1 });
    });

    const eventFor = (order: Order) => ({
      id: `evt_x_${order.id}`,
      type: 'checkout.session.completed',
      at: minute(3),
      object: { id: 'cs', payment_status: 'paid', payment_intent: 'pi', ...amountOf(order), ...metadata(order) },
    });
    const stepFor = (order: Order) => ({
      id: `cb_x_${order.id}`,
      at: minute(5),
      reference: order.id,
      state: 'accepted',
    });
  });

  it('about other things or other installations are answered and let go', async () => {
    const [before] = await query<{ n: number }>('SELECT COUNT(*)::int AS n FROM webhook_events');
    const at = minute(1);
    const messages = [
      paymentMessage({ id: 'evt_a', type: 'customer.created', at, object: { id: 'cus_1' } }),
      paymentMessage({
        id: 'evt_b',
        type: 'charge.refunded',
        at,
        object: { id: 'ch_1', metadata: {}, amount_refunded: 1 },
      }),
      paymentMessage({
        id: 'evt_c',
        type: 'payment_intent.payment_failed',
        at,
        object: { id: 'pi_1', metadata: { orderId: randomUUID() } },
      }),
      paymentMessage({
        id: 'evt_d',
        type: 'payment_intent.payment_failed',
        at,
        object: { id: 'pi_1', metadata: { orderId: "1' OR '1'='1" } },
      }),
      cuttingMessage({ id: 'cb_a', at, reference: randomUUID(), state: 'shipped' }),
      cuttingMessage({ id: 'cb_b', at, reference: randomUUID(), state: 'received' }),
    ];
    for (const message of messages) expect((await deliver(shop, message)).status).toBe(204);
    expect(await query('SELECT COUNT(*)::int AS n FROM webhook_events')).toEqual([before]);
  });

  it('of another sum than the order’s do not count as payment, and the money goes back', async () => {
    const order = await orderFor(owner, quote.id);
    const object = {
      id: `cs_${order.id}`,
      payment_status: 'paid',
      payment_intent: 'pi_short',
      amount_total: 1,
      currency: 'eur',
      ...metadata(order),
    };
    await deliver(shop, paymentMessage({ id: 'evt_short', type: 'checkout.session.completed', at: minute(3), object }));
    const after = await readOrder(owner, order.id);
    expect(after).toMatchObject({ state: 'placed', paymentState: 'failed' });
    expect(after.events.at(-1)?.text).toContain('another sum');
    const jobs = await query("SELECT name, data->>'paymentId' AS payment FROM pgboss.job WHERE data->>'orderId' = $1", [
      order.id,
    ]);
    expect(jobs).toEqual([{ name: 'payment', payment: 'pi_short' }]);
  });

  it('of a second payment send that one back and keep the first', async () => {
    const order = await orderFor(owner, quote.id);
    await deliver(shop, paid(order, 'pi_second', 4));
    await deliver(shop, paid(order, `pi_${order.id}`, 3));
    const { events, paymentState } = await readOrder(owner, order.id);
    expect(paymentState).toBe('paid');
    expect(events.filter(({ kind }) => kind === 'paid').map(({ text }) => text)).toEqual([
      expect.stringMatching(/ paid\.$/),
      expect.stringMatching(/came in a second time\. It goes back/),
    ]);
    const jobs = await query(
      "SELECT data->>'paymentId' AS payment FROM pgboss.job WHERE name = 'payment' AND data->>'orderId' = $1",
      [order.id],
    );
    expect(jobs).toEqual([{ payment: 'pi_second' }]);
  });

  it('of a page that ran out let the next one be opened', async () => {
    const order = await orderFor(owner, quote.id);
    const url = await checkoutFor(owner, order.id);
    const session = url.split('/').at(-1) ?? '';
    const object = { id: session, ...metadata(order) };
    const ended = paymentMessage({
      id: `evt_ended_${session}`,
      type: 'checkout.session.expired',
      at: minute(2),
      object,
    });
    for (let times = 0; times < 3; times += 1) expect((await deliver(shop, ended)).status).toBe(204);
    const next = await checkoutFor(owner, order.id);
    expect(next).not.toBe(url);
    expect(await checkoutFor(owner, order.id)).toBe(next);
    const [row] = await query<{ checkout_round: number }>('SELECT checkout_round FROM orders WHERE id = $1', [
      order.id,
    ]);
    expect(row?.checkout_round).toBe(1);
  });
});

describe('the road of an order over one connection', () => {
  it('does nothing outside of its transactions', async () => {
    const shop = await startCommerce({ poolSize: 1, isTold: false });
    try {
      const workshopId = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
      const owner = await new TestBrowser(shop.app).signIn(
        await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshopId]: 'owner' }),
      );
      const quote = await quoteFor(owner, (await releaseBracket(owner)).revisionId);
      const order = await orderFor(owner, quote.id, 1);
      await shop.pay(await checkoutFor(owner, order.id));
      const body = { id: 'cs', payment_status: 'paid', payment_intent: 'pi', currency: 'eur' };
      const object = { ...body, amount_total: order.total.amountMinor, metadata: { orderId: order.id } };
      const message = paymentMessage({ id: 'evt_1', type: 'checkout.session.completed', at: new Date(), object });
      expect((await deliver(shop, message)).status).toBe(204);
      expect(await shop.runWork()).toBe(0);
      const { events } = await readOrder(owner, order.id);
      expect(events.map(({ kind }) => kind)).toContain('sent-to-cutter');
      const cancelled = await orderFor(owner, quote.id, 1);
      await checkoutFor(owner, cancelled.id);
      await owner.post(`/api/orders/${cancelled.id}/cancel`).set('if-match', '2').expect(200);
      expect(await shop.runWork()).toBe(0);
    } finally {
      await shop.closeAll();
    }
  });
});
