import { randomUUID } from 'node:crypto';
import type { TestPerson } from '../support/people';
import { TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

const PASSWORD = 'a long enough secret';

describe('members of a workshop', () => {
  let test: TestApp;
  let workshop: string;
  let owner: TestBrowser;
  let imogen: TestPerson;

  beforeEach(async () => {
    test = await startTestApp();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    imogen = await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' });
    owner = await new TestBrowser(test.app).signIn(imogen);
  });
  afterEach(() => test.close());

  const invite = (email: string, role = 'viewer', key = randomUUID()) =>
    owner.post('/api/office/invitations').set('idempotency-key', key).send({ email, role });

  /** The link of the newest mail to an address, as the person finds it there. */
  async function linkTo(email: string): Promise<string> {
    const { body } = await owner.get('/api/office/mails').expect(200);
    const mail = body.mails.find(({ to }: { to: string }) => to === email);
    return /\/invitation\/(\S+)/.exec(String(mail?.text))?.[1] ?? '';
  }
  const accept = (browser: TestBrowser, link: string, account: object | null = null) =>
    browser.post(`/api/invitation-links/${link}/acceptance`).send({ account });
  async function members(): Promise<{ userId: string; name: string; role: string; revision: number }[]> {
    return (await owner.get('/api/office/members').expect(200)).body.members;
  }

  it('are invited by mail, join with a new account, and the link works once', async () => {
    await invite('Ada@Quill.example.test').expect(201);
    const link = await linkTo('ada@quill.example.test');
    const ada = await new TestBrowser(test.app).open();
    const seen = await ada.get(`/api/invitation-links/${link}`).expect(200);
    expect(seen.body).toMatchObject({ workshopName: 'Larkfield Cartworks', role: 'viewer', hasAccount: false });
    await accept(ada, link).expect(400);
    const joined = await accept(ada, link, { name: 'Ada Quill', password: PASSWORD }).expect(200);
    expect(joined.body.current).toMatchObject({ workshopId: workshop, role: 'viewer' });
    await ada.get('/api/parts').expect(200);
    await accept(await new TestBrowser(test.app).open(), link, { name: 'Eve', password: PASSWORD }).expect(404);
    expect((await owner.get('/api/office/invitations').expect(200)).body.invitations).toEqual([]);
    expect((await members()).map(({ name }) => name)).toEqual(['Ada Quill', 'Imogen Harrow']);
  });

  it('join as the address that was invited and as nobody else, once however often they press', async () => {
    const tomasz = await addPerson(test.ownerUrl, 'Tomasz Wren', {});
    await invite(tomasz.email, 'fabricator').expect(201);
    const link = await linkTo(tomasz.email);
    const stranger = await new TestBrowser(test.app).open();
    const unsigned = await accept(stranger, link, { name: 'Eve', password: PASSWORD });
    expect(unsigned.body.type).toBe('/problems/not-signed-in');
    const other = await new TestBrowser(test.app).signIn(await addPerson(test.ownerUrl, 'Petra Lowe', {}));
    expect((await accept(other, link)).body.type).toBe('/problems/wrong-state');
    const browser = await new TestBrowser(test.app).signIn(tomasz);
    const answers = await Promise.all([accept(browser, link), accept(browser, link)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 404]);
    expect((await members()).filter(({ name }) => name === 'Tomasz Wren')).toHaveLength(1);
    const again = await invite(tomasz.email);
    expect(again.body.type).toBe('/problems/already-exists');
  });

  it('can’t join with a link that was withdrawn, replaced or is too old', async () => {
    const first = await invite('ada@quill.example.test').expect(201);
    const withdrawn = await linkTo('ada@quill.example.test');
    await owner.delete(`/api/office/invitations/${first.body.id}`).expect(204);
    const guest = await new TestBrowser(test.app).open();
    await guest.get(`/api/invitation-links/${withdrawn}`).expect(404);
    await invite('ada@quill.example.test').expect(201);
    const replaced = await linkTo('ada@quill.example.test');
    await invite('ada@quill.example.test', 'fabricator').expect(201);
    await guest.get(`/api/invitation-links/${replaced}`).expect(404);
    const current = await linkTo('ada@quill.example.test');
    await guest.get(`/api/invitation-links/${current}`).expect(200);
    await asOwner(test.ownerUrl, (client) =>
      client.query(
        "UPDATE invitations SET sent_at = sent_at - interval '8 days', expires_at = expires_at - interval '8 days'",
      ),
    );
    await guest.get(`/api/invitation-links/${current}`).expect(404);
  });

  it('keep at least one owner, also when two demote each other at once', async () => {
    const alone = (await members())[0];
    const change = (browser: TestBrowser, userId: string | undefined, revision: number | undefined) =>
      browser.put(`/api/office/members/${userId}/role`).set('if-match', `"${revision}"`).send({ role: 'viewer' });
    expect((await change(owner, alone?.userId, alone?.revision)).body.type).toBe('/problems/wrong-state');
    const second = await addPerson(test.ownerUrl, 'Second Owner', { [workshop]: 'owner' });
    const other = await new TestBrowser(test.app).signIn(second);
    const answers = await Promise.all([change(owner, second.id, 1), change(other, imogen.id, 1)]);
    expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    const left = await new TestBrowser(test.app).signIn(answers[0]?.status === 204 ? imogen : second);
    const { body } = await left.get('/api/office/members').expect(200);
    expect(body.members.filter(({ role }: { role: string }) => role === 'owner')).toHaveLength(1);
  });

  it('lose the workshop with their next request when they are removed, and are told', async () => {
    const tomasz = await addPerson(test.ownerUrl, 'Tomasz Wren', { [workshop]: 'fabricator' });
    const browser = await new TestBrowser(test.app).signIn(tomasz);
    await browser.get('/api/parts').expect(200);
    await owner.delete(`/api/office/members/${tomasz.id}`).set('if-match', '"9"').expect(412);
    await owner.delete(`/api/office/members/${tomasz.id}`).set('if-match', '"1"').expect(204);
    await browser.get('/api/parts').expect(403);
    const { body } = await owner.get('/api/office/mails').expect(200);
    expect(body.mails[0]).toMatchObject({ to: tomasz.email, subject: 'Larkfield Cartworks: your membership' });
    const audit = await owner.get('/api/office/audit').expect(200);
    expect(audit.body.entries[0]).toMatchObject({ by: 'Imogen Harrow', what: 'Removed Tomasz Wren' });
  });

  it('begin with whoever signs up with a workshop, behind walls of its own', async () => {
    const noor = await new TestBrowser(test.app).open();
    const account = { name: 'Noor Vale', email: 'noor@vale.example.test', password: PASSWORD };
    const weak = await noor
      .post('/api/sign-up')
      .send({ ...account, password: 'short', workshopName: 'Vale', numberPrefix: 'v' });
    expect(weak.body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      '/numberPrefix',
      '/password',
    ]);
    const sent = { ...account, workshopName: 'Vale Brackets', numberPrefix: 'VB' };
    const { body } = await noor.post('/api/sign-up').send(sent).expect(201);
    expect(body.current).toMatchObject({ workshopName: 'Vale Brackets', role: 'owner' });
    noor.csrfToken = body.csrfToken;
    expect((await noor.get('/api/parts').expect(200)).body.parts).toEqual([]);
    const taken = await (await new TestBrowser(test.app).open()).post('/api/sign-up').send(sent);
    expect(taken.body.type).toBe('/problems/already-exists');
    const second = await noor.post('/api/workshops').send({ workshopName: 'Vale Two', numberPrefix: 'VT' }).expect(201);
    expect(second.body.memberships).toHaveLength(2);
    expect(second.body.current.workshopName).toBe('Vale Two');
  });
});
