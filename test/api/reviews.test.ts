import { randomUUID } from 'node:crypto';
import { releaseBracket } from '../support/commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

describe('what people say of a part', () => {
  let test: TestApp;
  let owner: TestBrowser;
  let viewer: TestBrowser;
  let partId: string;
  let revisionId: string;

  beforeEach(async () => {
    test = await startTestApp();
    const workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    viewer = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Ada Quill', { [workshop]: 'viewer' }),
    );
    ({ partId, revisionId } = await releaseBracket(owner));
  });
  afterEach(() => test.close());

  const send = (browser: TestBrowser, address: string, body: object, key = randomUUID()) =>
    browser.post(address).set('idempotency-key', key).send(body);
  const reviews = async (browser: TestBrowser) => (await browser.get(`/api/parts/${partId}/reviews`).expect(200)).body;
  async function makeLink(changes: object = {}): Promise<string> {
    const body = { guestName: 'Noor Vale', guestEmail: null, days: 14, ...changes };
    const made = await send(owner, `/api/revisions/${revisionId}/review-links`, body).expect(201);
    return String(made.body.link).split('/review/')[1] ?? '';
  }

  it('a viewer comments on a place and agrees, once however often they press', async () => {
    const key = randomUUID();
    const said = { revisionId, place: { x: 12.5, y: 30 }, text: 'This hole sits too near the edge.' };
    const twice = await Promise.all([1, 2].map(() => send(viewer, `/api/parts/${partId}/comments`, said, key)));
    expect(twice.map(({ status }) => status)).toContain(201);
    await send(viewer, `/api/parts/${partId}/comments`, said, key).expect(201);
    await send(viewer, `/api/revisions/${revisionId}/opinions`, { verdict: 'agreed', note: 'Go on.' }).expect(201);
    const { comments, opinions } = await reviews(owner);
    expect(comments).toMatchObject([{ by: 'Ada Quill', place: { x: 12.5, y: 30 }, letter: 'A', isResolved: false }]);
    expect(opinions).toMatchObject([
      { verdict: 'agreed', by: 'Ada Quill', hash: expect.stringMatching(/^[0-9a-f]{64}$/) },
    ]);
    const address = `/api/comments/${comments[0].id}/resolution`;
    await viewer.put(address).send({ isResolved: true }).expect(403);
    await owner.put(address).send({ isResolved: true }).expect(200);
    expect((await reviews(viewer)).comments[0].isResolved).toBe(true);
  });

  it('a guest does the same behind a private link, sees one revision and nothing else, and is told of', async () => {
    const link = await makeLink({ guestEmail: 'noor@vale.example.test' });
    const guest = await new TestBrowser(test.app).open();
    const seen = await guest.get(`/api/reviews/${link}`).expect(200);
    expect(seen.body).toMatchObject({ partName: 'Regulator bracket', letter: 'A', guestName: 'Noor Vale' });
    await send(guest, `/api/reviews/${link}/comments`, { place: null, text: 'Can it be moss?' }).expect(201);
    const key = randomUUID();
    const wish = { verdict: 'changes-wanted', note: 'Two millimetres wider.' };
    await send(guest, `/api/reviews/${link}/opinions`, wish, key).expect(201);
    await send(guest, `/api/reviews/${link}/opinions`, wish, key).expect(201);
    await guest.get(`/api/parts/${partId}/reviews`).expect(401);
    const { comments, opinions } = await reviews(owner);
    expect(comments).toMatchObject([{ by: 'Noor Vale', isGuest: true }]);
    expect(opinions).toHaveLength(1);
    const { body } = await owner.get('/api/office/mails').expect(200);
    const subjects = body.mails.map(({ subject }: { subject: string }) => subject);
    expect(subjects.filter((subject: string) => subject.startsWith('Noor Vale asks for changes'))).toHaveLength(1);
    expect(subjects.filter((subject: string) => subject.includes('please look at'))).toHaveLength(1);
  });

  it('a link that was withdrawn, is too old or unknown opens nothing, all alike', async () => {
    const guest = await new TestBrowser(test.app).open();
    const withdrawn = await makeLink();
    const [open] = (await reviews(owner)).links;
    expect((await reviews(viewer)).links).toEqual([]);
    await owner.delete(`/api/review-links/${open.id}`).expect(204);
    const old = await makeLink();
    await asOwner(test.ownerUrl, (client) =>
      client.query("UPDATE review_links SET expires_at = now() - interval '1 second' WHERE withdrawn_at IS NULL"),
    );
    const answers = [];
    for (const link of [withdrawn, old, 'x'.repeat(43)]) answers.push(await guest.get(`/api/reviews/${link}`));
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404]);
    expect(new Set(answers.map(({ body }) => body.detail)).size).toBe(1);
    await send(guest, `/api/reviews/${old}/comments`, { place: null, text: 'Late' }).expect(404);
  });
});
