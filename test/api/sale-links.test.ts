import { randomUUID } from 'node:crypto';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { Client } from 'pg';
import type { OpenShop } from '../support/open-shop';
import { sendOnce, sendOrder, startOpenShop } from '../support/open-shop';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import { ADDRESS, SHOP, place, readLink, receive } from '../support/shop';

describe('private links of orders and questions', () => {
  let test: OpenShop;
  let owner: TestBrowser;
  let guest: TestBrowser;
  let revisionId: string;
  let listingId: string;
  const line = (changes: Partial<CartLine> = {}) => test.line(changes);

  beforeEach(async () => {
    test = await startOpenShop();
    ({ owner, guest, revisionId, listingId } = test);
  });
  afterEach(async () => {
    expect(test.loggedErrors).toEqual([]);
    await test.close();
  });

  const wish = (offerHash: string, lines: readonly CartLine[] = [line()], changes: object = {}) => ({
    ...{ lines, offerHash, email: 'Ravi@Example.test', address: ADDRESS },
    ...changes,
  });

  it('shows an order to whoever has its link, and says the same of every link that leads nowhere', async () => {
    const [mine, yours] = [await place(guest, [line()]), await place(guest, [line({ quantity: 3 })])];
    expect((await readLink(guest, mine)).items[0]?.quantity).toBe(1);
    expect((await readLink(guest, yours)).items[0]?.quantity).toBe(3);
    const question = { name: 'Ada', email: 'ada@example.test', listingSlug: 'regulator', text: 'Does it fit?' };
    const thread = String((await sendOnce(guest, '/api/shops/larkfield/questions', question).expect(201)).body.link);
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
    expect((await sendOrder(guest, wish(offer.body.offerHash), randomUUID(), 'orchard')).status).toBe(409);
    await guest.get('/api/shops/orchard/listings/regulator').expect(404);
    const link = await place(guest, [line()]);
    await neighbour.get(`/api/sales/${(await readLink(guest, link)).id}`).expect(404);
    // Nor does its owner answer other people's customers.
    await sendOnce(guest, `/api/sale-links/${link}/messages`, { text: 'Does it fit?' }).expect(201);
    const { body } = await owner.get('/api/questions').expect(200);
    await sendOnce(neighbour, `/api/questions/${body.questions[0].id}/messages`, { text: 'No.' }).expect(404);
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
    const written = await test.mails();
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
      sendOnce(guest, `/api/sale-links/${link}/messages`, { text }, idempotencyKey);
    await ask('My rails are 28 mm. Will it sit?').expect(201);
    await ask('My rails are 28 mm. Will it sit?').expect(201);
    expect((await ask('Something else')).body.type).toBe('/problems/already-exists');
    const { body: open } = await owner.get('/api/questions').expect(200);
    expect(open.questions).toMatchObject([{ about: 'order 1001', saleNumber: 1001, isAnswered: false }]);
    const [{ id }] = open.questions;
    const answer = (idempotencyKey: string, text = 'It will, with a packer of 2 mm.') =>
      sendOnce(owner, `/api/questions/${id}/messages`, { text }, idempotencyKey);
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
    const about = (await test.mails()).filter(({ key: of }) => of.startsWith('question:'));
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
      sendOnce(guest, '/api/shops/larkfield/questions', { ...question, ...changes }, key);
    const thread = String((await ask().expect(201)).body.link);
    expect((await ask().expect(201)).body.link).toBe(thread);
    for (const changes of [{ email: 'eve@example.test' }, { text: 'Other words' }]) {
      const refused = await ask(changes);
      expect(refused.body.type).toBe('/problems/already-exists');
      expect(JSON.stringify(refused.body)).not.toContain(thread);
    }
    const { body: open } = await owner.get('/api/questions').expect(200);
    expect(open.questions).toMatchObject([{ about: 'Regulator bracket', listingSlug: 'regulator', saleId: null }]);
    await sendOnce(owner, `/api/questions/${open.questions[0].id}/messages`, { text: 'On 30 mm rails.' }).expect(201);
    await sendOnce(guest, `/api/question-links/${thread}/messages`, { text: 'Thank you.' }).expect(201);
    const { body } = await guest.get(`/api/question-links/${thread}`).expect(200);
    expect(body.question.messages.map(({ text }: { text: string }) => text)).toEqual([
      ...['Does it fit?', 'On 30 mm rails.', 'Thank you.'],
    ]);
    const written = await test.mails();
    expect(written.map(({ recipient }) => recipient)).toEqual([
      ...['fit@larkfield.example.test', 'ada@example.test', 'fit@larkfield.example.test'],
    ]);
    expect(written[1]?.body).toContain(`http://127.0.0.1:4310/shop/question/${thread}`);
  });
});
