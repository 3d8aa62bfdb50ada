import { randomUUID } from 'node:crypto';
import { quoteSchema } from '@foldwright/shared/contracts/orders';
import type { Commerce } from '../support/commerce';
import { quoteFor, releaseBracket, startCommerce } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';

// The outside parties are real servers, and a release writes real documents.
jest.setTimeout(60_000);

describe('quotes', () => {
  let shop: Commerce;
  let owner: TestBrowser;
  let revisionId: string;

  beforeAll(async () => {
    shop = await startCommerce({ cuttingTimeoutMs: 1500 });
    const workshopId = await addWorkshop(shop.ownerUrl, 'Larkfield Cartworks');
    const imogen = await addPerson(shop.ownerUrl, 'Imogen Harrow', { [workshopId]: 'owner' });
    owner = await new TestBrowser(shop.app).signIn(imogen);
    ({ revisionId } = await releaseBracket(owner));
  });
  afterEach(async () => {
    await shop.setMood({});
    // A service that is away is logged as a failed request; a fault of ours as unforeseen.
    expect(shop.loggedErrors.filter((line) => line.includes('unforeseen'))).toEqual([]);
  });
  afterAll(() => shop.closeAll());

  it('asks for a price at 1, 10 and 50, broken down, and keeps it', async () => {
    const quote = await quoteFor(owner, revisionId, [50, 1, 10, 10]);
    expect(quote).toMatchObject({ state: 'priced', revisionId, revisionLetter: 'A', stock: 'production' });
    expect(quote.breaks.map((row) => row.quantity)).toEqual([1, 10, 50]);
    for (const { lines, total, each, quantity } of quote.breaks) {
      expect(lines.length).toBeGreaterThan(4);
      expect(lines.reduce((sum, line) => sum + line.amount.amountMinor, 0)).toBe(total.amountMinor);
      expect(each.amountMinor).toBe(Math.ceil(total.amountMinor / quantity));
    }
    expect(quote.breaks[0]?.lines.map((line) => line.label)).toContain('Bending, 1 each');
    const { body } = await owner.get(`/api/revisions/${revisionId}/quotes`).expect(200);
    expect(body.quotes[0]).toEqual(quote);
  });

  it('answers the same question under the same key with the same quote, even at once', async () => {
    const key = randomUUID();
    const ask = () =>
      owner
        .post(`/api/revisions/${revisionId}/quotes`)
        .set('idempotency-key', key)
        .send({ stock: 'trial', quantities: [5] });
    const answers = await Promise.all([ask(), ask(), ask()]);
    answers.push(await ask());
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    expect(new Set(answers.map(({ body }) => JSON.stringify(body)))).toHaveProperty('size', 1);
    const other = await owner
      .post(`/api/revisions/${revisionId}/quotes`)
      .set('idempotency-key', key)
      .send({ stock: 'trial', quantities: [6] })
      .expect(409);
    expect(other.body.type).toBe('/problems/already-exists');
  });

  it('keeps the opinion of a shop that will not make it, in its own words', async () => {
    const quote = await quoteFor(owner, revisionId, [2001]);
    expect(quote).toMatchObject({ state: 'refused', breaks: [], validUntil: null });
    expect(quote.refusal).toContain('2001 pieces are more than we take');
    const answer = await owner
      .post('/api/orders')
      .set('idempotency-key', randomUUID())
      .send({ quoteId: quote.id, quantity: 2001 });
    expect([answer.status, answer.body.type]).toEqual([409, '/problems/wrong-state']);
  });

  it.each([
    ['closed', { failEveryRequest: true }, /doesn’t answer/],
    ['slow', { answerDelayMs: 20_000 }, /did not answer in time/],
    ['unclear', { answerNonsense: true }, /can’t be understood/],
  ])('says what was kept when the shop is %s, and asks again under the same key', async (_name, mood, words) => {
    await shop.setMood(mood);
    const key = randomUUID();
    const ask = () =>
      owner
        .post(`/api/revisions/${revisionId}/quotes`)
        .set('idempotency-key', key)
        .send({ stock: 'production', quantities: [1] });
    const begun = Date.now();
    const { body } = await ask().expect(503);
    expect(Date.now() - begun).toBeLessThan(8000);
    expect(body).toMatchObject({ type: '/problems/service-unreachable', next: 'Ask again in a few minutes.' });
    expect(body.detail).toMatch(words);
    expect(body.kept).toContain('question is kept');
    const list = await owner.get(`/api/revisions/${revisionId}/quotes`).expect(200);
    const unanswered = quoteSchema.parse(list.body.quotes[0]);
    expect(unanswered.state).toBe('unreachable');
    await shop.setMood({});
    const { body: priced } = await ask().expect(201);
    expect(priced).toMatchObject({ id: unanswered.id, state: 'priced' });
  });

  it('says so when nobody is there at all', async () => {
    await shop.stopCutting();
    const answer = await owner
      .post(`/api/revisions/${revisionId}/quotes`)
      .set('idempotency-key', randomUUID())
      .send({ stock: 'production', quantities: [1] })
      .expect(503);
    expect(answer.body.detail).toContain('can’t be reached');
    await shop.startCutting();
  });

  it('refuses what is no question', async () => {
    const ask = (body: object, id = revisionId) =>
      owner.post(`/api/revisions/${id}/quotes`).set('idempotency-key', randomUUID()).send(body);
    await ask({ stock: 'production', quantities: [0] }).expect(400);
    await ask({ stock: 'production', quantities: [] }).expect(400);
    await ask({ stock: 'gold', quantities: [1] }).expect(400);
    await ask({ stock: 'production', quantities: [1] }, randomUUID()).expect(404);
    await owner
      .post(`/api/revisions/${revisionId}/quotes`)
      .send({ stock: 'production', quantities: [1] })
      .expect(428);
  });
});
