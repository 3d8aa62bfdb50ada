import { SMTPServer } from 'smtp-server';
import { pauseAfter, sendMail } from '@foldwright/server/services/send-mail';
import { SmtpMailer } from '@foldwright/server/mail/smtp-mailer';
import type { Mailer } from '@foldwright/server/mail/mailer';
import type { Mail } from '@foldwright/shared/contracts/office';
import type { Quote } from '@foldwright/shared/contracts/orders';
import type { Commerce } from '../support/commerce';
import { orderFor, quoteFor, readOrder, releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';

// The outside parties are real servers, and a release writes real documents.
jest.setTimeout(60_000);

describe('outgoing mail', () => {
  let shop: Commerce;
  let owner: TestBrowser;
  let quote: Quote;
  let workshopId: string;

  const mails = async (): Promise<Mail[]> => (await owner.get('/api/office/mails').expect(200)).body.mails;
  const mailOf = async (orderNumber: number): Promise<Mail> => {
    const mail = (await mails()).find(({ subject }) => subject.startsWith(`Order ${orderNumber}:`));
    if (mail === undefined) throw new Error(`no mail about order ${orderNumber}`);
    return mail;
  };
  const arrived = (orderNumber: number) =>
    shop.mail.messages().filter(({ subject }) => subject.startsWith(`Order ${orderNumber}:`));
  const toolsWith = (mailer: Mailer) => ({
    database: shop.database,
    queue: shop.queue,
    publicUrl: shop.publicUrl,
    now: () => new Date(),
    mailer,
  });

  beforeAll(async () => {
    shop = await startCommerce({ isTold: false });
    workshopId = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(shop.app).signIn(
      await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshopId]: 'owner' }),
    );
    quote = await quoteFor(owner, (await releaseBracket(owner)).revisionId);
  });
  afterEach(() => expect(shop.loggedErrors.filter((line) => line.includes('unforeseen'))).toEqual([]));
  afterAll(() => shop.closeAll());

  it('waits in the outbox while the mail server is away, says why, and goes out once when it is back', async () => {
    await shop.stopMail();
    const orders = await Promise.all([1, 2, 3].map(() => orderFor(owner, quote.id, 1)));
    await shop.runWork();
    for (let round = 0; round < 3; round += 1) {
      await shop.forgetPauses();
      await shop.runWork();
    }
    for (const { number } of orders) {
      const mail = await mailOf(number);
      expect(mail).toMatchObject({ state: 'waiting', attempts: 4, sentAt: null });
      expect(mail.lastError).toMatch(/ECONNREFUSED|refused/i);
    }
    await shop.startMail();
    for (let round = 0; round < 3; round += 1) {
      await shop.forgetPauses();
      await shop.runWork();
    }
    for (const { number, id } of orders) {
      expect(arrived(number)).toHaveLength(1);
      expect(await mailOf(number)).toMatchObject({ state: 'sent', attempts: 5, lastError: null });
      const { events, revision } = await readOrder(owner, id);
      expect(events.map(({ kind }) => kind)).toEqual(['placed', 'mail-sent']);
      // A mail that went out is no reason to refuse what a person decided on the page they see.
      expect(revision).toBe(1);
    }
  });

  it('goes out once when two workers take it at the same time', async () => {
    const { number } = await orderFor(owner, quote.id, 1);
    const mail = await mailOf(number);
    let sendings = 0;
    let goOn = (): void => undefined;
    const isSlow = new Promise<void>((resolve) => (goOn = resolve));
    const mailer: Mailer = {
      send: async () => {
        sendings += 1;
        await isSlow;
      },
      close: () => undefined,
    };
    const work = { workshopId, mailId: mail.id };
    const first = sendMail(toolsWith(mailer), work);
    while (sendings === 0) await new Promise((done) => setTimeout(done, 5));
    await sendMail(toolsWith(mailer), work);
    expect((await mailOf(number)).state).toBe('waiting');
    goOn();
    await first;
    await sendMail(toolsWith(mailer), work);
    expect(sendings).toBe(1);
    expect(await mailOf(number)).toMatchObject({ state: 'sent', attempts: 1 });
  });

  it('stays whole when a worker dies while it sends, and keeps its message id', async () => {
    const { number } = await orderFor(owner, quote.id, 1);
    const mail = await mailOf(number);
    const ids: string[] = [];
    const work = { workshopId, mailId: mail.id };
    const dying: Mailer = {
      send: ({ messageId }) => {
        ids.push(messageId);
        return Promise.reject(new Error('the worker died'));
      },
      close: () => undefined,
    };
    await expect(sendMail(toolsWith(dying), work)).rejects.toThrow('the worker died');
    expect(await mailOf(number)).toMatchObject({ state: 'waiting', attempts: 0 });
    const living: Mailer = {
      send: ({ messageId }) => Promise.resolve(void ids.push(messageId)),
      close: () => undefined,
    };
    await sendMail(toolsWith(living), work);
    expect(ids).toHaveLength(2);
    expect(new Set(ids)).toHaveProperty('size', 1);
  });

  it('gives up at once on an address that the mail server refuses for good', async () => {
    const picky = new SMTPServer({
      disabledCommands: ['STARTTLS', 'AUTH'],
      onRcptTo: (_address, _session, done) => done(Object.assign(new Error('no such person'), { responseCode: 550 })),
    });
    const port = await new Promise<number>((resolve) => {
      picky.listen(0, '127.0.0.1', () => {
        const address = picky.server.address();
        resolve(typeof address === 'object' && address !== null ? address.port : 0);
      });
    });
    const { number } = await orderFor(owner, quote.id, 1);
    const mail = await mailOf(number);
    const mailer = new SmtpMailer({ smtpUrl: `smtp://127.0.0.1:${port}`, from: 'a@example.test' });
    await sendMail(toolsWith(mailer), { workshopId, mailId: mail.id });
    expect(await mailOf(number)).toMatchObject({ state: 'failed', attempts: 1 });
    expect((await mailOf(number)).lastError).toContain('no such person');
    mailer.close();
    await new Promise<void>((done) => picky.close(() => done()));
  });

  it('pauses longer and longer between tries, up to five minutes', () => {
    expect([1, 2, 3, 8, 9, 100].map(pauseAfter)).toEqual([2, 4, 8, 256, 300, 300]);
  });

  it('is not written when the order is not placed after all', async () => {
    const count = () =>
      asOwner(shop.ownerUrl, async (client) => (await client.query('SELECT COUNT(*)::int AS n FROM mails')).rows[0].n);
    const before = await count();
    await owner.post('/api/orders').set('idempotency-key', 'none').send({ quoteId: quote.id, quantity: 7 }).expect(400);
    expect(await count()).toBe(before);
  });
});
