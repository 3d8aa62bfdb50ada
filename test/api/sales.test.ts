import { randomUUID } from 'node:crypto';
import type { Commerce } from '../support/commerce';
import { checkoutFor, eventually, readOrder, releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import {
  ADDRESS,
  act,
  addHardware,
  addKit,
  checkoutOf,
  expectBalance,
  offerFor,
  openShop,
  place,
  publish,
  readBooks,
  readLink,
  readSale,
  receive,
} from '../support/shop';

jest.setTimeout(90_000);

describe('a sale to a customer', () => {
  let test: Commerce;
  let owner: TestBrowser;
  let guest: TestBrowser;
  let workshop: string;
  let revisionId: string;
  let listingId: string;
  let hardwareId: string;
  const moss = () => ({ kind: 'bracket' as const, revisionId, finishId: 'powder-moss' });
  const line = (quantity = 1, finishId = 'powder-moss') => ({ listingId, finishId, quantity });

  beforeEach(async () => {
    test = await startCommerce();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    guest = await new TestBrowser(test.app).open();
    ({ revisionId } = await releaseBracket(owner));
    await openShop(owner);
    hardwareId = await addHardware(owner);
    listingId = await publish(owner, { kind: 'bracket', revisionId });
  });
  afterEach(() => test.closeAll());

  async function pay(link: string): Promise<string> {
    await test.pay(await checkoutOf(guest, link));
    await eventually('the sale is paid', async () => (await readLink(guest, link)).paymentState === 'paid');
    return (await readLink(guest, link)).id;
  }

  it('goes from the cart to two parcels, a return and books that balance', async () => {
    const { revisionId: trayId } = await releaseBracket(owner, 'Pump tray');
    const kitId = await addKit(owner, [
      { kind: 'bracket', revisionId: trayId, finishId: null, quantity: 1 },
      { kind: 'bracket', revisionId, finishId: null, quantity: 1 },
      { kind: 'hardware', hardwareId, quantity: 3 },
    ]);
    const kit = await publish(owner, { kind: 'kit', kitId }, { title: 'Two-pump water kit', priceMinor: 14800 });
    await receive(owner, { kind: 'bracket', revisionId: trayId, finishId: 'powder-moss' }, 2);
    await receive(owner, { kind: 'hardware', hardwareId }, 50);

    const lines = [{ listingId: kit, finishId: 'powder-moss', quantity: 1 }];
    const offer = await offerFor(guest, lines);
    expect(offer.lines[0]).toMatchObject({ fromShelf: 0, leavesInDays: 10 });
    expect(offer).toMatchObject({ total: { amountMinor: 15490 }, tax: { amountMinor: 2767 + 129 } });

    const link = await place(guest, lines);
    const saleId = await pay(link);
    const paid = await readSale(owner, saleId);
    expect(paid).toMatchObject({ state: 'paid', can: { ship: true, cut: true, cancel: true, refundMinor: 15490 } });
    const byName = (name: string) => {
      const item = paid.items.find(({ what }) => what.kind === 'bracket' && what.partName === name);
      if (item === undefined) throw new Error(`no ${name}`);
      return item;
    };
    expect(byName('Pump tray')).toMatchObject({ reserved: 1, short: 0 });
    expect(byName('Regulator bracket')).toMatchObject({ reserved: 0, short: 1, beingCut: 0 });

    // What is there goes at once.
    const ready = paid.items.filter(({ reserved }) => reserved > 0);
    const first = await act(owner, saleId, 'shipments', {
      items: ready.map(({ id, reserved }) => ({ itemId: id, quantity: reserved })),
      carrier: 'Post',
      trackingCode: 'PP 1',
    });
    expect(first.status).toBe(201);
    expect((await readSale(owner, saleId)).state).toBe('partly-shipped');

    // What is missing is cut, paid, received, and goes in a second parcel.
    const cut = await act(owner, saleId, 'cut-orders');
    expect(cut.status).toBe(201);
    expect(cut.body.refused).toEqual([]);
    const [ordered] = (await readSale(owner, saleId)).cutOrders;
    expect(ordered).toMatchObject({ quantity: 1, state: 'placed' });
    const again = await act(owner, saleId, 'cut-orders');
    expect(again.status).toBe(409);
    const orderId = ordered?.orderId ?? '';
    const early = await owner
      .post('/api/stock/receipts')
      .set('idempotency-key', randomUUID())
      .send({ what: moss(), quantity: 1, orderId, reason: '' });
    expect(early.body.type).toBe('/problems/wrong-state');
    await test.pay(await checkoutFor(owner, orderId));
    await eventually('the order is shipped', async () => {
      await test.runWork();
      return (await readOrder(owner, orderId)).state === 'shipped';
    });
    expect(await receive(owner, moss(), 1, orderId)).toMatchObject({ onHand: 1, reserved: 1 });
    const arrived = await readSale(owner, saleId);
    expect(arrived.items.every(({ short }) => short === 0)).toBe(true);
    const second = await act(owner, saleId, 'shipments', {
      items: [{ itemId: byName('Regulator bracket').id, quantity: 1 }],
      carrier: 'Post',
      trackingCode: null,
    });
    expect(second.body).toMatchObject({ state: 'shipped', shipments: [{ number: 1 }, { number: 2 }] });

    // One part comes back.
    const returned = await act(owner, saleId, 'returns', {
      itemId: byName('Regulator bracket').id,
      quantity: 1,
      isBackOnShelf: true,
      refundMinor: 3400,
      reason: 'Wrong hand',
    });
    expect(returned.status).toBe(201);
    await test.runWork();
    await eventually(
      'the money is back',
      async () => (await readSale(owner, saleId)).paymentState === 'partly-refunded',
    );
    const done = await readSale(owner, saleId);
    expect(done.totals.refunded.amountMinor).toBe(3400);
    expect(done.refunds).toMatchObject([{ state: 'done', amount: { amountMinor: 3400 } }]);
    await expectBalance(owner);
    const { money } = await readBooks(owner);
    const balance = (account: string) => money.accounts.find((one) => one.account === account)?.balance.amountMinor;
    expect(balance('payment-host')).toBe(15490 - 3400);
    expect(balance('tax')).toBe(-(2896 - Math.round((2896 * 3400) / 15490)));

    // Which revision did they get?
    const buyers = await owner.get(`/api/revisions/${revisionId}/buyers`).expect(200);
    expect(buyers.body.buyers).toMatchObject([
      { saleNumber: done.number, inKit: 'Two-pump water kit', bought: 1, shipped: 1, returned: 1 },
    ]);
    expect(buyers.body.buyers[0].hash).toMatch(/^[0-9a-f]{64}$/);
    const kinds = (await readLink(guest, link)).events.map(({ kind }) => kind);
    for (const kind of ['placed', 'paid', 'shipped', 'cut-ordered', 'stock-arrived', 'returned', 'refunded']) {
      expect(kinds).toContain(kind);
    }
    await test.runWork();
    const subjects = test.mail.messages().map(({ subject }) => subject);
    for (const words of ['noted', 'paid', 'parcel 1', 'being cut', 'parcel 2', 'money sent back']) {
      expect(subjects.filter((subject) => subject.includes(words))).not.toEqual([]);
    }
    expect(new Set(test.mail.messages().map(({ messageId }) => messageId)).size).toBe(test.mail.messages().length);
  });

  it('gives the last bracket to whoever came first and asks the other', async () => {
    await receive(owner, moss(), 1);
    const other = await new TestBrowser(test.app).open();
    const seen = await offerFor(guest, [line()]);
    expect(seen.lines[0]?.fromShelf).toBe(1);
    const order = (browser: TestBrowser) =>
      browser
        .post('/api/shops/larkfield/sales')
        .set('idempotency-key', randomUUID())
        .send({ lines: [line()], offerHash: seen.offerHash, email: 'ravi@example.test', address: ADDRESS });
    const answers = await Promise.all([order(guest), order(other)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    const refused = answers.find(({ status }) => status === 409);
    expect(refused?.body.type).toBe('/problems/offer-changed');
    expect(refused?.body.extra.offer.lines[0]).toMatchObject({ fromShelf: 0, leavesInDays: 10 });
    const stock = await owner.get('/api/stock').expect(200);
    expect(stock.body.brackets[0]).toMatchObject({ onHand: 1, reserved: 1, free: 0 });
  });

  it('asks again when the price changed between cart and paying, and orders once however often one presses', async () => {
    const seen = await offerFor(guest, [line()]);
    const { body: listing } = await owner.get(`/api/shop/listings/${listingId}`).expect(200);
    const { what, slug, title, summary, fits, doesNotFit, fittingSteps, finishes, leadTimeDays } = listing;
    const changed = {
      ...{ slug, title, summary, fits, doesNotFit, fittingSteps, finishes, leadTimeDays, priceMinor: 3600 },
      what: { kind: 'bracket', revisionId: what.bracket.revisionId },
    };
    await owner
      .put(`/api/shop/listings/${listingId}`)
      .set('if-match', `"${listing.revision}"`)
      .send(changed)
      .expect(200);
    const wish = { lines: [line()], offerHash: seen.offerHash, email: 'ravi@example.test', address: ADDRESS };
    const key = randomUUID();
    const order = (offerHash: string) =>
      guest
        .post('/api/shops/larkfield/sales')
        .set('idempotency-key', key)
        .send({ ...wish, offerHash });
    const refused = await order(seen.offerHash);
    expect(refused.body).toMatchObject({ type: '/problems/offer-changed', status: 409 });
    const now = refused.body.extra.offer;
    expect(now.lines[0].each.amountMinor).toBe(3600);
    const [first, second] = await Promise.all([order(now.offerHash), order(now.offerHash)]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(first.body).toEqual(second.body);
    expect((await owner.get('/api/sales').expect(200)).body.sales).toHaveLength(1);
  });

  it('frees what was kept when nobody paid in time, for whoever waits', async () => {
    await receive(owner, moss(), 1);
    const late = await place(guest, [line()]);
    const waiting = await place(guest, [line()]);
    const { id } = await readLink(guest, late);
    await test.forgetPauses();
    // Only the first has run out; the second is paid before its time.
    const paidId = await pay(waiting);
    await test.runWork();
    expect((await readSale(owner, id)).state).toBe('cancelled');
    expect(await readSale(owner, paidId)).toMatchObject({ state: 'paid', items: [{ reserved: 1, short: 0 }] });
    await expectBalance(owner);
  });

  it('is cancelled by the customer before anything is shipped, and the money goes back whole', async () => {
    await receive(owner, moss(), 2);
    const link = await place(guest, [line(2)]);
    const saleId = await pay(link);
    const { revision } = await readLink(guest, link);
    const stale = await guest.post(`/api/sale-links/${link}/cancel`).set('if-match', `"${revision - 1}"`);
    expect(stale.status).toBe(412);
    await guest.post(`/api/sale-links/${link}/cancel`).set('if-match', `"${revision}"`).expect(200);
    await test.runWork();
    await eventually('all of it is back', async () => (await readSale(owner, saleId)).paymentState === 'refunded');
    const stock = await owner.get('/api/stock').expect(200);
    expect(stock.body.brackets[0]).toMatchObject({ onHand: 2, reserved: 0, free: 2 });
    await expectBalance(owner);
    const { money } = await readBooks(owner);
    expect(money.accounts.find(({ account }) => account === 'payment-host')?.balance.amountMinor).toBe(0);
    expect(money.accounts.find(({ account }) => account === 'tax')?.balance.amountMinor).toBe(0);
  });

  it('cancels some of a line, never what is shipped, and sends that much back', async () => {
    await receive(owner, moss(), 2);
    const saleId = await pay(await place(guest, [line(3)]));
    const [item] = (await readSale(owner, saleId)).items;
    const [bought] = (await readSale(owner, saleId)).lines;
    const items = [{ itemId: item?.id, quantity: 2 }];
    expect((await act(owner, saleId, 'shipments', { items, carrier: 'Post', trackingCode: null })).status).toBe(201);
    const cancel = (quantity: number) =>
      act(owner, saleId, 'cancellations', { lines: [{ lineId: bought?.id, quantity }], reason: 'Out of sheet' });
    expect((await cancel(2)).body.type).toBe('/problems/wrong-state');
    const done = await cancel(1);
    expect(done.body).toMatchObject({ state: 'shipped', lines: [{ cancelled: 1 }], refunds: [{ state: 'asked' }] });
    await test.runWork();
    await eventually('it went back', async () => (await readSale(owner, saleId)).totals.refunded.amountMinor === 3400);
    await expectBalance(owner);
  });

  it('keeps a refund that the payment host refused, with its words, until somebody tries again', async () => {
    await receive(owner, moss(), 1);
    const saleId = await pay(await place(guest, [line()]));
    await test.setPaymentMood({ refunds: 'refused' });
    expect((await act(owner, saleId, 'refunds', { amountMinor: 1000, reason: 'A scratch' })).status).toBe(201);
    await test.runWork();
    const failed = await readSale(owner, saleId);
    expect(failed.refunds).toMatchObject([{ state: 'failed', problem: expect.stringContaining('balance') }]);
    expect(failed.can.refundMinor).toBe(4090);
    await expectBalance(owner);
    await test.setPaymentMood({});
    await owner.post(`/api/sales/${saleId}/refunds/${failed.refunds[0]?.id}/retry`).expect(202);
    await test.runWork();
    expect((await readSale(owner, saleId)).refunds).toMatchObject([{ state: 'done' }]);
    const tooMuch = await act(owner, saleId, 'refunds', { amountMinor: 3091, reason: 'More' });
    expect(tooMuch.body.type).toBe('/problems/wrong-state');
    await expectBalance(owner);
  });

  it('sends nothing back twice when the answer to a refund gets lost', async () => {
    await receive(owner, moss(), 1);
    const saleId = await pay(await place(guest, [line()]));
    await test.setPaymentMood({ refunds: 'lost' });
    await act(owner, saleId, 'refunds', { amountMinor: 1000, reason: 'A scratch' });
    // The SDK itself asks once more after a connection that broke; whoever does, the key is the same.
    await test.runWork();
    await test.setPaymentMood({});
    await test.forgetPauses();
    await test.runWork();
    await eventually('it is told', async () => (await readSale(owner, saleId)).totals.refunded.amountMinor === 1000);
    expect((await readSale(owner, saleId)).events.filter(({ kind }) => kind === 'refunded')).toHaveLength(1);
    await expectBalance(owner);
  });

  it('hears questions about fit, on the order and before it, and answers them by mail', async () => {
    const link = await place(guest, [line()]);
    const send = (address: string, body: object) => guest.post(address).set('idempotency-key', randomUUID()).send(body);
    await send(`/api/sale-links/${link}/messages`, { text: 'My rails are 28 mm. Will it sit?' }).expect(201);
    const asked = { name: 'Ada', email: 'ada@example.test', listingSlug: null, text: 'Do you ship?' };
    const thread = await send('/api/shops/larkfield/questions', asked).expect(201);
    const { body } = await owner.get('/api/questions').expect(200);
    expect(body.questions).toHaveLength(2);
    for (const { id } of body.questions) {
      await owner
        .post(`/api/questions/${id}/messages`)
        .set('idempotency-key', randomUUID())
        .send({ text: 'It will, with a packer.' })
        .expect(201);
    }
    const read = await guest.get(`/api/question-links/${thread.body.link}`).expect(200);
    expect(read.body.question.messages.map(({ side }: { side: string }) => side)).toEqual(['customer', 'workshop']);
    expect((await readLink(guest, link)).questions[0]?.isAnswered).toBe(true);
    await test.runWork();
    const recipients = test.mail.messages().map(({ to }) => String(to));
    expect(recipients.filter((to) => to.includes('fit@larkfield.example.test'))).toHaveLength(2);
    expect(recipients.filter((to) => to.includes('ada@example.test'))).toHaveLength(1);
  });

  it('writes packing slip, invoice and fitting sheet', async () => {
    await receive(owner, moss(), 1);
    const link = await place(guest, [line()]);
    await guest.get(`/api/sale-links/${link}/invoice`).expect(409);
    const saleId = await pay(link);
    const [item] = (await readSale(owner, saleId)).items;
    const parcel = { items: [{ itemId: item?.id, quantity: 1 }], carrier: 'Post', trackingCode: null };
    const shipped = await act(owner, saleId, 'shipments', parcel);
    const [shipment] = shipped.body.shipments;
    for (const address of [
      `/api/sales/${saleId}/shipments/${shipment.id}/packing-slip`,
      `/api/sales/${saleId}/invoice`,
      `/api/sale-links/${link}/invoice`,
      `/api/sale-links/${link}/fitting-sheet`,
    ]) {
      const file = await owner.get(address).buffer(true).expect(200);
      expect(file.headers['content-type']).toBe('application/pdf');
      expect(Buffer.from(file.body).subarray(0, 5).toString()).toBe('%PDF-');
    }
  });
});
