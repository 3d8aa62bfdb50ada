import { randomUUID } from 'node:crypto';
import type { MoneyEvent } from '@foldwright/server/payments/payment-host';
import { keepingFailures } from '@foldwright/server/services/operator/failed-messages';
import type { Commerce } from '../support/commerce';
import { checkoutFor, orderFor, quoteFor, readOrder, releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';

jest.setTimeout(60_000);

describe('the operator', () => {
  let test: Commerce;
  let owner: TestBrowser;
  let operator: TestBrowser;
  let workshop: string;

  beforeEach(async () => {
    test = await startCommerce({ isTold: false });
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    operator = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Mira Oakes', {}, { isOperator: true }),
    );
  });
  afterEach(() => test.closeAll());

  const troubles = async () => (await operator.get('/api/operator/troubles').expect(200)).body;

  it('sees a mail that could not be sent, sends it again, and the workshop sees who did', async () => {
    await owner
      .post('/api/office/invitations')
      .set('idempotency-key', randomUUID())
      .send({ email: 'ada@quill.example.test', role: 'viewer' })
      .expect(201);
    await asOwner(test.ownerUrl, (client) =>
      client.query("UPDATE mails SET state = 'failed', attempts = 440, last_error = 'mailbox is full'"),
    );
    const [mail] = (await troubles()).mails;
    expect(mail).toMatchObject({ to: 'ada@quill.example.test', lastError: 'mailbox is full', attempts: 440 });
    await operator.post(`/api/operator/mails/${mail.id}/send`).expect(204);
    await operator.post(`/api/operator/mails/${mail.id}/send`).expect(409);
    await test.runWork();
    expect((await troubles()).mails).toEqual([]);
    expect(test.mail.messages()).toHaveLength(1);
    const audit = await owner.get('/api/office/audit').expect(200);
    expect(audit.body.entries[0]).toMatchObject({ by: 'Mira Oakes (operator)', what: 'Sent a mail again' });
  });

  it('sees work that failed for good and has it tried again', async () => {
    const { revisionId } = await releaseBracket(owner);
    const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id);
    await asOwner(test.ownerUrl, (client) =>
      client.query(
        `INSERT INTO pgboss.job (id, name, data, state, retry_limit, retry_count, output, completed_on)
         VALUES (gen_random_uuid(), 'payment', $1, 'failed', 3, 3, '{"message": "no way"}', now())`,
        [JSON.stringify({ task: 'close-checkout', workshopId: workshop, orderId: order.id })],
      ),
    );
    const [work] = (await troubles()).work;
    expect(work).toMatchObject({ queue: 'payment', what: 'close-checkout', error: 'no way', state: 'failed' });
    expect(work.workshopName).toBe('Larkfield Cartworks');
    await operator.post(`/api/operator/work/payment/${work.id}/retry`).expect(204);
    await test.runWork();
    expect((await troubles()).work).toEqual([]);
    await operator.post(`/api/operator/work/payment/${work.id}/retry`).expect(409);
    await operator.post(`/api/operator/work/payment/${randomUUID()}/retry`).expect(404);
  });

  it('has a message handled again that broke on our side, once', async () => {
    const { revisionId } = await releaseBracket(owner);
    const order = await orderFor(owner, (await quoteFor(owner, revisionId)).id);
    const sessionId = (await checkoutFor(owner, order.id)).split('/').at(-1) ?? '';
    const told: MoneyEvent = {
      ...{ id: 'evt_1', at: new Date(), kind: 'paid', orderId: order.id, sessionId, paymentId: 'pi_1' },
      amount: { amountMinor: order.total.amountMinor, currency: order.total.currency },
    };
    const message = { provider: 'payments', told, body: Buffer.from('{}') } as const;
    const breaks = () => Promise.reject(new Error('a table is missing'));
    for (let time = 1; time <= 2; time += 1) {
      await expect(keepingFailures(test.database, message, () => new Date(), breaks)).rejects.toThrow('a table');
    }
    const [failed] = (await troubles()).messages;
    expect(failed).toMatchObject({ provider: 'payments', kind: 'paid', error: 'a table is missing', times: 2 });
    await operator.post(`/api/operator/messages/${failed.id}/replay`).expect(204);
    expect((await readOrder(owner, order.id)).paymentState).toBe('paid');
    expect((await troubles()).messages).toEqual([]);
    await operator.post(`/api/operator/messages/${failed.id}/replay`).expect(204);
    const { events } = await readOrder(owner, order.id);
    expect(events.filter(({ kind }) => kind === 'paid')).toHaveLength(1);
  });
});
