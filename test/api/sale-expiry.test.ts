import { randomUUID } from 'node:crypto';
import * as z from 'zod/mini';
import type { Commerce } from '../support/commerce';
import { PAYMENT_KEY, releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import { checkoutOf, expectBalance, openShop, place, publish, readLink, readSale, receive } from '../support/shop';
import { deliver, paymentMessage } from '../support/signed-messages';

jest.setTimeout(90_000);

/** The payment host tells nothing by itself here: what it would say is said when a test wants it. */
describe('an order that nobody pays in time', () => {
  let shop: Commerce;
  let owner: TestBrowser;
  let guest: TestBrowser;
  let link: string;
  let revisionId: string;

  beforeEach(async () => {
    shop = await startCommerce({ isTold: false });
    const workshop = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    guest = await new TestBrowser(shop.app).open();
    ({ revisionId } = await releaseBracket(owner));
    await openShop(owner);
    const listingId = await publish(owner, { kind: 'bracket', revisionId });
    await receive(owner, { kind: 'bracket', revisionId, finishId: 'bare' }, 1);
    link = await place(guest, [{ listingId, finishId: 'bare', quantity: 1 }]);
  });
  afterEach(async () => {
    await expectBalance(owner);
    await shop.closeAll();
  });

  const open = () => guest.post(`/api/sale-links/${link}/checkout`).set('idempotency-key', randomUUID());
  const stock = async () => (await owner.get('/api/stock').expect(200)).body.brackets[0];
  async function runOut(): Promise<number> {
    await shop.forgetPauses();
    return shop.runWork();
  }

  it('is cancelled after an hour, its bracket is free again and its payment page closed', async () => {
    const url = await checkoutOf(guest, link);
    // Before the hour is over nothing happens to it.
    await shop.runWork();
    expect(await readLink(guest, link)).toMatchObject({ state: 'placed', items: [{ reserved: 1 }] });
    expect(await runOut()).toBe(0);
    expect(await readLink(guest, link)).toMatchObject({
      ...{ state: 'cancelled', canPay: false, canCancel: false, hasInvoice: false, hasFittingSheet: false },
      items: [{ reserved: 0, cancelled: 1, short: 0 }],
    });
    expect(await stock()).toMatchObject({ onHand: 1, reserved: 0, free: 1 });
    await shop.runWork();
    const letter = shop.mail.messages().find(({ subject }) => subject.includes('cancelled'));
    expect(letter?.subject).toBe('Larkfield Cartworks, order 1001: cancelled');
    // Whoever still has the page open can’t pay on it.
    expect((await shop.pay(url)).status).toBe(410);
    expect((await open()).body).toMatchObject({ type: '/problems/wrong-state', kept: 'Nothing was charged.' });
  });

  it('sends money back whole that was paid in the very last moment', async () => {
    const url = await checkoutOf(guest, link);
    expect((await shop.pay(url)).status).toBe(303);
    expect(await runOut()).toBe(0);
    const { id, totals } = await readLink(guest, link);
    expect(await readLink(guest, link)).toMatchObject({ state: 'cancelled', paymentState: 'open' });
    const session = await fetch(`${shop.payments.url}/v1/checkout/sessions/${url.split('/').at(-1)}`, {
      headers: { authorization: `Bearer ${PAYMENT_KEY}` },
    });
    const object = z.looseObject({ payment_status: z.literal('paid') }).parse(await session.json());
    const event = { id: 'evt_late', type: 'checkout.session.completed', at: new Date(), object };
    expect((await deliver(shop, paymentMessage(event))).status).toBe(204);
    expect(await shop.runWork()).toBe(0);
    const sale = await readSale(owner, id);
    expect(sale).toMatchObject({
      ...{ state: 'cancelled', paymentState: 'refunded' },
      refunds: [{ state: 'done', amount: totals.total, reason: 'It was not paid in time.' }],
    });
    await shop.runWork();
    const subjects = shop.mail.messages().map(({ subject }) => subject.replace(/^.*: /, ''));
    // Nobody is thanked for money that goes back.
    expect(subjects.sort()).toEqual(['cancelled', 'money sent back', 'noted']);
  });

  it('stays when it was paid, though the hour is over', async () => {
    const { id, totals } = await readLink(guest, link);
    const object = {
      ...{ id: 'cs_1', payment_status: 'paid', payment_intent: 'pi_1', amount_total: totals.total.amountMinor },
      ...{ currency: 'eur', metadata: { orderId: id } },
    };
    await deliver(shop, paymentMessage({ id: 'evt_1', type: 'checkout.session.completed', at: new Date(), object }));
    await runOut();
    expect(await readLink(guest, link)).toMatchObject({ state: 'paid', items: [{ reserved: 1 }] });
    expect((await open()).body.type).toBe('/problems/wrong-state');
  });

  it('can be paid again and again until then: one page at a time, and none while the payment host is away', async () => {
    const first = await checkoutOf(guest, link);
    expect(await checkoutOf(guest, link)).toBe(first);
    await shop.stopPayments();
    expect((await open()).body).toMatchObject({ type: '/problems/service-unreachable', status: 503 });
    // Its page can’t be closed either while the host is away: that is tried until it is back.
    expect(await runOut()).toBe(1);
    expect(await readLink(guest, link)).toMatchObject({ state: 'cancelled' });
    await shop.startPayments();
    expect(await runOut()).toBe(0);
  });
});
