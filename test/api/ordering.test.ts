import { randomUUID } from 'node:crypto';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { Client } from 'pg';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';
import { releaseBracket } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import { ADDRESS, SHOP, addKit, offerFor, openShop, place, publish, readLink, receive } from '../support/shop';

interface Mail {
  readonly key: string;
  readonly recipient: string;
  readonly subject: string;
  readonly body: string;
}

describe('ordering without an account', () => {
  let test: TestApp;
  let workshop: string;
  let owner: TestBrowser;
  let guest: TestBrowser;
  let partId: string;
  let revisionId: string;
  let listingId: string;
  const line = (changes: Partial<CartLine> = {}) => ({ listingId, finishId: 'powder-moss', quantity: 1, ...changes });

  beforeEach(async () => {
    test = await startTestApp();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    guest = await new TestBrowser(test.app).open();
    ({ partId, revisionId } = await releaseBracket(owner));
    await openShop(owner);
    listingId = await publish(owner, { kind: 'bracket', revisionId }, { slug: 'regulator' });
  });
  afterEach(async () => {
    expect(test.loggedErrors).toEqual([]);
    await test.close();
  });

  const wish = (offerHash: string, lines: readonly CartLine[] = [line()], changes: object = {}) => ({
    ...{ lines, offerHash, email: 'Ravi@Example.test', address: ADDRESS },
    ...changes,
  });
  const order = (body: object, key: string = randomUUID(), shop = 'larkfield') =>
    guest.post(`/api/shops/${shop}/sales`).set('idempotency-key', key).send(body);
  const send = (browser: TestBrowser, address: string, body: object, key: string = randomUUID()) =>
    browser.post(address).set('idempotency-key', key).send(body);
  const mails = () =>
    asOwner(test.ownerUrl, async (client) => {
      const { rows } = await client.query<Mail>(
        'SELECT key, recipient, subject, body FROM mails ORDER BY created_at, key',
      );
      return rows;
    });
  const withdraw = () =>
    owner.put(`/api/shop/listings/${listingId}/state`).set('if-match', '"2"').send({ state: 'withdrawn' }).expect(200);

  it('gives one order for one key, and none of somebody else’s for the same key', async () => {
    const { offerHash } = await offerFor(guest, [line()]);
    const key = randomUUID();
    const { body: first } = await order(wish(offerHash), key).expect(201);
    expect(first.link).toMatch(/^[A-Za-z0-9_-]{43}$/);
    expect((await order(wish(offerHash), key)).body).toEqual(first);
    const other = await order(wish(offerHash, [line()], { email: 'ada@example.test' }), key);
    expect(other.body.type).toBe('/problems/already-exists');
    expect(JSON.stringify(other.body)).not.toContain(first.link);
    // The shop closes: who has ordered and lost the answer still gets it, and nobody orders anew.
    await openShop(owner, { isOpen: false });
    expect((await order(wish(offerHash), key)).body).toEqual(first);
    await order(wish(offerHash)).expect(404);
    await guest.get('/api/shops/larkfield/listings/regulator').expect(404);
    await guest
      .post('/api/shops/larkfield/offers')
      .send({ lines: [line()] })
      .expect(404);
    // The order itself stays where it was.
    expect((await readLink(guest, first.link)).canPay).toBe(true);
    expect((await owner.get('/api/sales').expect(200)).body.sales).toHaveLength(1);
  });

  it('freezes what was sold: names, letter, hash, hand and finish, whatever is renamed afterwards', async () => {
    const link = await place(guest, [line({ quantity: 2 })]);
    const { body: part } = await owner.get(`/api/parts/${partId}`).expect(200);
    await owner
      .patch(`/api/parts/${partId}`)
      .set('if-match', `"${part.revision}"`)
      .send({ name: 'Renamed', number: 'LC-99' })
      .expect(200);
    await withdraw();
    const sold = await readLink(guest, link);
    const { body: revision } = await owner.get(`/api/revisions/${revisionId}`).expect(200);
    expect(sold).toMatchObject({
      ...{ number: 1001, state: 'placed', canPay: true, canCancel: true, customerEmail: 'ravi@example.test' },
      lines: [{ title: 'Regulator bracket', quantity: 2, total: { amountMinor: 6800 } }],
      items: [
        {
          what: {
            partName: 'Regulator bracket',
            letter: 'A',
            hash: revision.hash,
            hand: 'either',
            finishId: 'powder-moss',
          },
          ...{ quantity: 2, reserved: 0, short: 2, shipped: 0 },
        },
      ],
      totals: { items: { amountMinor: 6800 }, postage: { amountMinor: 690 }, tax: { amountMinor: 1272 + 129 } },
      address: ADDRESS,
    });
  });

  it('asks when a listing was withdrawn while it lay in the cart, and orders nothing', async () => {
    const { offerHash } = await offerFor(guest, [line()]);
    await withdraw();
    const refused = await order(wish(offerHash));
    expect(refused.body).toMatchObject({
      ...{ type: '/problems/offer-changed', status: 409 },
      extra: {
        offer: { lines: [], gone: [{ listingId, reason: 'This is no longer sold.' }], total: { amountMinor: 0 } },
      },
    });
    // Nor does it sell what is gone to somebody who says yes to that.
    expect((await order(wish(refused.body.extra.offer.offerHash))).status).toBe(409);
    expect((await owner.get('/api/sales').expect(200)).body.sales).toEqual([]);
    expect(await mails()).toEqual([]);
  });

  it('asks when a finish is no longer offered, or postage, tax or time changed', async () => {
    const bare = line({ finishId: 'powder-ember' });
    expect((await offerFor(guest, [bare])).gone).toMatchObject([
      { finishId: 'powder-ember', reason: 'Regulator bracket no longer comes in this finish.' },
    ]);
    for (const changes of [{ postageMinor: 790 }, { taxBasisPoints: 1900 }, { packingDays: 3 }]) {
      await openShop(owner);
      const { offerHash } = await offerFor(guest, [line()]);
      await openShop(owner, changes);
      expect((await order(wish(offerHash))).body.type).toBe('/problems/offer-changed');
    }
  });

  it('asks before selling another revision than the one that was looked at', async () => {
    const seen = await offerFor(guest, [line()]);
    const next = await releaseBracket(owner, 'Other bracket');
    await asOwner(test.ownerUrl, (client) =>
      client.query('UPDATE listings SET revision_id = $1 WHERE id = $2', [next.revisionId, listingId]),
    );
    const refused = await order(wish(seen.offerHash));
    expect(refused.body.type).toBe('/problems/offer-changed');
    expect(refused.body.extra.offer).toMatchObject({ total: seen.total, lines: [{ title: 'Regulator bracket' }] });
    expect(refused.body.extra.offer.lines[0].contents).toEqual([expect.stringContaining('Other bracket, revision A')]);
  });

  it('keeps what it promised from the shelf for the line it was promised to', async () => {
    const { revisionId: trayId } = await releaseBracket(owner, 'Pump tray');
    const kitId = await addKit(owner, [
      { kind: 'bracket', revisionId, finishId: null, quantity: 1 },
      { kind: 'bracket', revisionId: trayId, finishId: null, quantity: 1 },
    ]);
    const kit = await publish(owner, { kind: 'kit', kitId });
    await receive(owner, { kind: 'bracket', revisionId, finishId: 'powder-moss' }, 2);
    // The kit has to wait for its tray; the bracket that is sold alone has not. What is left is kept for the kit.
    const lines = [line({ listingId: kit, quantity: 2 }), line()];
    const offer = await offerFor(guest, lines);
    expect(offer.lines.map(({ fromShelf }) => fromShelf)).toEqual([0, 1]);
    const sold = await readLink(guest, await place(guest, lines));
    expect(sold.items.map(({ quantity, reserved, short }) => [quantity, reserved, short])).toEqual([
      [2, 1, 1],
      [2, 0, 2],
      [1, 1, 0],
    ]);
  });

  it('says so when a cart is dearer than any payment page takes', async () => {
    const dear = await publish(owner, { kind: 'bracket', revisionId }, { priceMinor: 10_000_000, slug: 'dear' });
    const lines = [line({ listingId: dear, quantity: 500 })];
    const { offerHash, total } = await offerFor(guest, lines);
    expect(total.amountMinor).toBe(5_000_000_690);
    expect((await order(wish(offerHash, lines))).body).toMatchObject({ type: '/problems/wrong-state', status: 409 });
    expect((await owner.get('/api/sales').expect(200)).body.sales).toEqual([]);
  });

  it('takes nothing that another page sends in a visitor’s name', async () => {
    const { offerHash } = await offerFor(guest, [line()]);
    const link = await place(guest, [line()]);
    guest.csrfToken = 'forged';
    const forged = [
      order(wish(offerHash)),
      guest.post('/api/shops/larkfield/offers').send({ lines: [line()] }),
      guest.post(`/api/sale-links/${link}/cancel`).set('if-match', '"1"'),
      send(guest, `/api/sale-links/${link}/checkout`, {}),
      send(guest, `/api/sale-links/${link}/messages`, { text: 'x' }),
    ];
    for (const sent of forged) expect((await sent).body.type).toBe('/problems/bad-csrf-token');
  });

  it('has an end to what one address may write, and says when to try again', async () => {
    const question = { name: 'Ada', email: 'ada@example.test', listingSlug: null, text: 'Does it fit?' };
    const statuses: number[] = [];
    for (let count = 0; count < 60; count += 1) {
      statuses.push((await send(guest, '/api/shops/larkfield/questions', question)).status);
    }
    expect(new Set(statuses)).toEqual(new Set([201]));
    const { offerHash } = await offerFor(guest, [line()]);
    const refused = await order(wish(offerHash));
    expect(refused.body.type).toBe('/problems/too-many-requests');
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    // Looking is free.
    await guest.get('/api/shops/larkfield/listings').expect(200);
  });

  it('shows an order to whoever has its link, and says the same of every link that leads nowhere', async () => {
    const [mine, yours] = [await place(guest, [line()]), await place(guest, [line({ quantity: 3 })])];
    expect((await readLink(guest, mine)).items[0]?.quantity).toBe(1);
    expect((await readLink(guest, yours)).items[0]?.quantity).toBe(3);
    const question = { name: 'Ada', email: 'ada@example.test', listingSlug: 'regulator', text: 'Does it fit?' };
    const thread = String((await send(guest, '/api/shops/larkfield/questions', question).expect(201)).body.link);
    const bare = async (address: string) => {
      const { requestId: _id, instance: _instance, ...rest } = (await guest.get(address).expect(404)).body;
      return rest;
    };
    const unknown = await bare(`/api/sale-links/${'x'.repeat(43)}`);
    const sale = await readLink(guest, mine);
    for (const address of [
      // A link of another kind, an id instead of a link, one letter off.
      `/api/sale-links/${thread}`,
      `/api/question-links/${mine}`,
      `/api/sale-links/${sale.id}`,
      `/api/sale-links/${mine.slice(0, -1)}${mine.endsWith('A') ? 'B' : 'A'}`,
      `/api/sale-links/${thread}/invoice`,
      `/api/sale-links/${thread}/fitting-sheet`,
    ]) {
      expect({ address, ...(await bare(address)) }).toEqual({ address, ...unknown });
    }
    // What the workshop sees stays with the workshop.
    await guest.get(`/api/sales/${sale.id}`).expect(401);
    expect(JSON.stringify(sale)).not.toContain('"refunds"');
  });

  it('never sells what another workshop lists', async () => {
    const other = await addWorkshop(test.ownerUrl, 'Orchard Street Welding', 'OS');
    const neighbour = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Petra Lowe', { [other]: 'owner' }),
    );
    await neighbour.get('/api/shop/settings').expect(200);
    await neighbour
      .put('/api/shop/settings')
      .set('if-match', '"1"')
      .send({ ...SHOP, slug: 'orchard' })
      .expect(200);
    const offer = await guest
      .post('/api/shops/orchard/offers')
      .send({ lines: [line()] })
      .expect(200);
    expect(offer.body).toMatchObject({ lines: [], gone: [{ listingId, reason: 'This is no longer sold.' }] });
    expect((await order(wish(offer.body.offerHash), randomUUID(), 'orchard')).status).toBe(409);
    await guest.get('/api/shops/orchard/listings/regulator').expect(404);
    const link = await place(guest, [line()]);
    await neighbour.get(`/api/sales/${(await readLink(guest, link)).id}`).expect(404);
    // Nor does its owner answer other people's customers.
    await send(guest, `/api/sale-links/${link}/messages`, { text: 'Does it fit?' }).expect(201);
    const { body } = await owner.get('/api/questions').expect(200);
    await send(neighbour, `/api/questions/${body.questions[0].id}/messages`, { text: 'No.' }).expect(404);
  });

  it('is found by whoever was signed in, across shops, and only by them', async () => {
    const person = await addPerson(test.ownerUrl, 'Ravi Sandle', {});
    const ravi = await new TestBrowser(test.app).signIn(person);
    const ada = await new TestBrowser(test.app).signIn(await addPerson(test.ownerUrl, 'Ada Brook', {}));
    await place(guest, [line()]);
    const link = await place(ravi, [line({ quantity: 2 })]);
    const { body } = await ravi.get('/api/purchases').expect(200);
    expect(body.purchases).toMatchObject([
      { link, number: 1002, shopSlug: 'larkfield', what: '2 × Regulator bracket', state: 'placed' },
    ]);
    expect((await ada.get('/api/purchases').expect(200)).body.purchases).toEqual([]);
    const { body: sales } = await owner.get('/api/sales').expect(200);
    expect(sales.sales).toHaveLength(2);
    expect((await owner.get('/api/purchases').expect(200)).body.purchases).toEqual([]);

    // The database itself shows a person their own sales and nothing more, past all of our code.
    const app = new Client({ connectionString: test.applicationUrl });
    await app.connect();
    try {
      await app.query("SELECT set_config('foldwright.user', $1, false)", [person.id]);
      expect((await app.query('SELECT link FROM sales')).rows).toEqual([{ link }]);
      for (const table of ['sale_lines', 'sale_items', 'sale_facts', 'refunds', 'questions', 'shops']) {
        expect((await app.query(`SELECT * FROM ${table}`)).rows).toEqual([]);
      }
      expect((await app.query("UPDATE sales SET customer_name = 'x'")).rowCount).toBe(0);
      await app.query("SELECT set_config('foldwright.user', '', false)");
      expect((await app.query('SELECT link FROM sales')).rows).toEqual([]);
    } finally {
      await app.end();
    }
  });

  it('tells the customer that the order is noted, with its link, and what is said when it is cancelled unpaid', async () => {
    await receive(owner, { kind: 'bracket', revisionId, finishId: 'powder-moss' }, 1);
    const link = await place(guest, [line()]);
    await guest.post(`/api/sale-links/${link}/cancel`).set('if-match', '"1"').expect(200);
    // Pressed again it stays cancelled.
    await guest.post(`/api/sale-links/${link}/cancel`).set('if-match', '"1"').expect(200);
    const written = await mails();
    expect(written.map(({ recipient, subject }) => [recipient, subject])).toEqual([
      ['ravi@example.test', 'Larkfield Cartworks, order 1001: noted'],
      ['ravi@example.test', 'Larkfield Cartworks, order 1001: cancelled'],
    ]);
    const [noted, cancelled] = written;
    expect(noted?.body).toContain(`http://127.0.0.1:4310/shop/order/${link}`);
    expect(noted?.body).toContain('1 × Regulator bracket, powder coat, moss\nTotal €40.90');
    expect(cancelled?.body).toContain('You cancelled it.\nNothing was charged.');
    const { body } = await owner.get('/api/stock').expect(200);
    expect(body.brackets).toMatchObject([{ onHand: 1, reserved: 0, free: 1 }]);
  });

  it('carries a question on the order both ways, each message once and each by mail', async () => {
    const link = await place(guest, [line()]);
    const key = randomUUID();
    const ask = (text: string, idempotencyKey = key) =>
      send(guest, `/api/sale-links/${link}/messages`, { text }, idempotencyKey);
    await ask('My rails are 28 mm. Will it sit?').expect(201);
    await ask('My rails are 28 mm. Will it sit?').expect(201);
    expect((await ask('Something else')).body.type).toBe('/problems/already-exists');
    const { body: open } = await owner.get('/api/questions').expect(200);
    expect(open.questions).toMatchObject([{ about: 'order 1001', saleNumber: 1001, isAnswered: false }]);
    const [{ id }] = open.questions;
    const answer = (idempotencyKey: string, text = 'It will, with a packer of 2 mm.') =>
      send(owner, `/api/questions/${id}/messages`, { text }, idempotencyKey);
    const answerKey = randomUUID();
    await answer(answerKey).expect(201);
    await answer(answerKey).expect(201);
    expect((await answer(answerKey, 'Other words')).body.type).toBe('/problems/already-exists');
    // A second question joins the first one's thread and has to be answered again.
    await ask('And round rails?', randomUUID()).expect(201);
    const { questions } = await readLink(guest, link);
    expect(questions).toHaveLength(1);
    expect(questions[0]).toMatchObject({
      isAnswered: false,
      messages: [
        { side: 'customer', by: 'Ravi Sandle', text: 'My rails are 28 mm. Will it sit?' },
        { side: 'workshop', by: 'Imogen Harrow', text: 'It will, with a packer of 2 mm.' },
        { side: 'customer', by: 'Ravi Sandle', text: 'And round rails?' },
      ],
    });
    const about = (await mails()).filter(({ key: of }) => of.startsWith('question:'));
    expect(about.map(({ recipient }) => recipient)).toEqual([
      ...['fit@larkfield.example.test', 'ravi@example.test', 'fit@larkfield.example.test'],
    ]);
    expect(about[0]?.body).toContain('Ravi Sandle asks about order 1001:\n\nMy rails are 28 mm. Will it sit?');
    expect(about[1]?.body).toContain(`It will, with a packer of 2 mm.\n\nhttp://127.0.0.1:4310/shop/order/${link}`);
  });

  it('carries a question before buying both ways, and never hands a thread to another for its key', async () => {
    const question = { name: 'Ada Brook', email: 'Ada@example.test', listingSlug: 'regulator', text: 'Does it fit?' };
    const key = randomUUID();
    const ask = (changes: object = {}) =>
      send(guest, '/api/shops/larkfield/questions', { ...question, ...changes }, key);
    const thread = String((await ask().expect(201)).body.link);
    expect((await ask().expect(201)).body.link).toBe(thread);
    for (const changes of [{ email: 'eve@example.test' }, { text: 'Other words' }]) {
      const refused = await ask(changes);
      expect(refused.body.type).toBe('/problems/already-exists');
      expect(JSON.stringify(refused.body)).not.toContain(thread);
    }
    const { body: open } = await owner.get('/api/questions').expect(200);
    expect(open.questions).toMatchObject([{ about: 'Regulator bracket', listingSlug: 'regulator', saleId: null }]);
    await send(owner, `/api/questions/${open.questions[0].id}/messages`, { text: 'On 30 mm rails.' }).expect(201);
    await send(guest, `/api/question-links/${thread}/messages`, { text: 'Thank you.' }).expect(201);
    const { body } = await guest.get(`/api/question-links/${thread}`).expect(200);
    expect(body.question.messages.map(({ text }: { text: string }) => text)).toEqual([
      ...['Does it fit?', 'On 30 mm rails.', 'Thank you.'],
    ]);
    const written = await mails();
    expect(written.map(({ recipient }) => recipient)).toEqual([
      ...['fit@larkfield.example.test', 'ada@example.test', 'fit@larkfield.example.test'],
    ]);
    expect(written[1]?.body).toContain(`http://127.0.0.1:4310/shop/question/${thread}`);
  });
});
