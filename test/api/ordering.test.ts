import { randomUUID } from 'node:crypto';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { releaseBracket } from '../support/commerce';
import type { OpenShop } from '../support/open-shop';
import { sendOnce, sendOrder, startOpenShop } from '../support/open-shop';
import type { TestBrowser } from '../support/people';
import { asOwner } from '../support/people';
import { ADDRESS, addKit, offerFor, openShop, place, publish, readLink, receive } from '../support/shop';

describe('ordering without an account', () => {
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
  const withdraw = () =>
    owner.put(`/api/shop/listings/${listingId}/state`).set('if-match', '"2"').send({ state: 'withdrawn' }).expect(200);

  it('gives one order for one key, and none of somebody else’s for the same key', async () => {
    const { offerHash } = await offerFor(guest, [line()]);
    const key = randomUUID();
    const { body: first } = await sendOrder(guest, wish(offerHash), key).expect(201);
    expect(first.link).toMatch(/^[A-Za-z0-9_-]{43}$/);
    expect((await sendOrder(guest, wish(offerHash), key)).body).toEqual(first);
    const other = await sendOrder(guest, wish(offerHash, [line()], { email: 'ada@example.test' }), key);
    expect(other.body.type).toBe('/problems/already-exists');
    expect(JSON.stringify(other.body)).not.toContain(first.link);
    // The shop closes: who has ordered and lost the answer still gets it, and nobody orders anew.
    await openShop(owner, { isOpen: false });
    expect((await sendOrder(guest, wish(offerHash), key)).body).toEqual(first);
    await sendOrder(guest, wish(offerHash)).expect(404);
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
    const { body: part } = await owner.get(`/api/parts/${test.partId}`).expect(200);
    await owner
      .patch(`/api/parts/${test.partId}`)
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
    const refused = await sendOrder(guest, wish(offerHash));
    expect(refused.body).toMatchObject({
      ...{ type: '/problems/offer-changed', status: 409 },
      extra: {
        offer: { lines: [], gone: [{ listingId, reason: 'This is no longer sold.' }], total: { amountMinor: 0 } },
      },
    });
    // Nor does it sell what is gone to somebody who says yes to that.
    expect((await sendOrder(guest, wish(refused.body.extra.offer.offerHash))).status).toBe(409);
    expect((await owner.get('/api/sales').expect(200)).body.sales).toEqual([]);
    expect(await test.mails()).toEqual([]);
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
      expect((await sendOrder(guest, wish(offerHash))).body.type).toBe('/problems/offer-changed');
    }
  });

  it('asks before selling another revision than the one that was looked at', async () => {
    const seen = await offerFor(guest, [line()]);
    const next = await releaseBracket(owner, 'Other bracket');
    await asOwner(test.ownerUrl, (client) =>
      client.query('UPDATE listings SET revision_id = $1 WHERE id = $2', [next.revisionId, listingId]),
    );
    const refused = await sendOrder(guest, wish(seen.offerHash));
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
    expect((await sendOrder(guest, wish(offerHash, lines))).body).toMatchObject({
      type: '/problems/wrong-state',
      status: 409,
    });
    expect((await owner.get('/api/sales').expect(200)).body.sales).toEqual([]);
  });

  it('takes nothing that another page sends in a visitor’s name', async () => {
    const { offerHash } = await offerFor(guest, [line()]);
    const link = await place(guest, [line()]);
    guest.csrfToken = 'forged';
    const forged = [
      sendOrder(guest, wish(offerHash)),
      guest.post('/api/shops/larkfield/offers').send({ lines: [line()] }),
      guest.post(`/api/sale-links/${link}/cancel`).set('if-match', '"1"'),
      sendOnce(guest, `/api/sale-links/${link}/checkout`, {}),
      sendOnce(guest, `/api/sale-links/${link}/messages`, { text: 'x' }),
    ];
    for (const sent of forged) expect((await sent).body.type).toBe('/problems/bad-csrf-token');
  });

  it('has an end to what one address may write, and says when to try again', async () => {
    const question = { name: 'Ada', email: 'ada@example.test', listingSlug: null, text: 'Does it fit?' };
    const statuses: number[] = [];
    for (let count = 0; count < 60; count += 1) {
      statuses.push((await sendOnce(guest, '/api/shops/larkfield/questions', question)).status);
    }
    expect(new Set(statuses)).toEqual(new Set([201]));
    const { offerHash } = await offerFor(guest, [line()]);
    const refused = await sendOrder(guest, wish(offerHash));
    expect(refused.body.type).toBe('/problems/too-many-requests');
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    // Looking is free.
    await guest.get('/api/shops/larkfield/listings').expect(200);
  });
});
