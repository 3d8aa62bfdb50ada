import * as contracts from '@foldwright/shared/contracts/session';
import { sessionRoutes } from '@foldwright/server/routes/session';
import type { TestPerson } from '../support/people';
import { TEST_PASSWORD, TestBrowser, addPerson, addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

const SESSION_CONTRACTS = [
  contracts.readSession,
  contracts.signIn,
  contracts.signOut,
  contracts.switchWorkshop,
  contracts.changeOwnName,
];

describe('signing in', () => {
  let test: TestApp;
  let imogen: TestPerson;
  let first: string;
  let second: string;

  beforeAll(async () => {
    test = await startTestApp({ routes: sessionRoutes, contracts: SESSION_CONTRACTS });
    first = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    second = await addWorkshop(test.ownerUrl, 'Orchard Street Welding');
    imogen = await addPerson(test.ownerUrl, 'Imogen Harrow', { [first]: 'owner', [second]: 'viewer' });
  });
  afterAll(() => test.close());

  it('tells nobody anything before signing in, and a token for the sign-in', async () => {
    const browser = await new TestBrowser(test.app).open();
    const { body } = await browser.get('/api/session').expect(200);
    expect(body).toEqual({ user: null, memberships: [], current: null, csrfToken: browser.csrfToken });
    expect(browser.csrfToken.length).toBeGreaterThan(30);
  });

  it('signs in with another session id and another token than before', async () => {
    const browser = await new TestBrowser(test.app).open();
    const before = browser.csrfToken;
    const answer = await browser
      .post('/api/session')
      .send({ email: imogen.email.toUpperCase(), password: TEST_PASSWORD })
      .expect(200);
    expect(answer.body).toMatchObject({
      user: { name: 'Imogen Harrow' },
      current: { workshopId: first, role: 'owner' },
    });
    expect(answer.body.csrfToken).not.toBe(before);
    const cookie = String(answer.headers['set-cookie']);
    expect(cookie).toMatch(/foldwright\.sid=.*HttpOnly/);
    expect(cookie).toMatch(/SameSite=Lax/);
    await browser.post('/api/session').send({ email: imogen.email, password: TEST_PASSWORD }).expect(403);
  });

  it('answers a wrong password and an unknown account alike', async () => {
    const browser = await new TestBrowser(test.app).open();
    const wrong = await browser.post('/api/session').send({ email: imogen.email, password: 'x' }).expect(401);
    const unknown = await browser.post('/api/session').send({ email: 'no@example.test', password: 'x' }).expect(401);
    const { requestId: _a, ...first_ } = wrong.body;
    const { requestId: _b, ...second_ } = unknown.body;
    expect(first_).toEqual(second_);
    expect(first_.type).toBe('/problems/wrong-sign-in');
    expect(wrong.headers['content-type']).toMatch(/^application\/problem\+json/);
  });

  it('lists everything that is wrong with the form', async () => {
    const browser = await new TestBrowser(test.app).open();
    const { body } = await browser.post('/api/session').send({ email: 'nobody', password: '', colour: 1 }).expect(400);
    expect(body.errors).toEqual([
      { pointer: '/email', detail: 'This is not an e-mail address.' },
      { pointer: '/password', detail: 'This can’t be empty.' },
      { pointer: '/colour', detail: 'This isn’t known here.' },
    ]);
  });

  it('refuses malformed JSON as a problem', async () => {
    const browser = await new TestBrowser(test.app).open();
    const answer = await browser
      .post('/api/session')
      .set('content-type', 'application/json')
      .send('{"email":')
      .expect(400);
    expect(answer.body.type).toBe('/problems/invalid-input');
  });

  it('refuses a change without the token, with a foreign origin, and takes one with our own', async () => {
    const browser = await new TestBrowser(test.app).signIn(imogen);
    const rename = () => browser.patch('/api/session/user').send({ name: 'Imogen Harrow' });
    await rename().set('x-csrf-token', '').expect(403);
    await rename().set('x-csrf-token', 'A'.repeat(43)).expect(403);
    const refused = await rename().set('origin', 'https://elsewhere.example.test').expect(403);
    expect(refused.body.type).toBe('/problems/bad-csrf-token');
    await rename().set('origin', 'http://127.0.0.1:4310').expect(200);
  });

  it('works in another workshop, only in one’s own', async () => {
    const browser = await new TestBrowser(test.app).signIn(imogen);
    const { body } = await browser.put('/api/session/workshop').send({ workshopId: second }).expect(200);
    expect(body.current).toEqual({ workshopId: second, workshopName: 'Orchard Street Welding', role: 'viewer' });
    const foreign = await addWorkshop(test.ownerUrl, 'Hill Road Sheet');
    await browser.put('/api/session/workshop').send({ workshopId: foreign }).expect(404);
  });

  it('leaves nothing of a session that ended', async () => {
    const browser = await new TestBrowser(test.app).signIn(imogen);
    await browser.delete('/api/session').expect(204);
    const { body } = await browser.get('/api/session').expect(200);
    expect(body.user).toBeNull();
    await browser.open();
    await browser.patch('/api/session/user').send({ name: 'X' }).expect(401);
  });

  it('stops guessing after ten tries, for that account alone, and keeps the tries in the database', async () => {
    const tomasz = await addPerson(test.ownerUrl, 'Tomasz Wren', { [first]: 'fabricator' });
    const browser = await new TestBrowser(test.app).open();
    const guess = (email: string) => browser.post('/api/session').send({ email, password: 'wrong' });
    for (let tries = 0; tries < 10; tries += 1) await guess(tomasz.email).expect(401);
    const refused = await browser
      .post('/api/session')
      .send({ email: tomasz.email, password: TEST_PASSWORD })
      .expect(429);
    expect(refused.body.type).toBe('/problems/too-many-requests');
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    await guess(imogen.email).expect(401);
    const { rows } = await asOwner(test.ownerUrl, (client) =>
      client.query('SELECT points FROM rate_limits WHERE key LIKE $1', [`sign-in:%${tomasz.email}`]),
    );
    expect(rows).toEqual([{ points: 11 }]);
  });

  it('keeps passwords only as salted scrypt hashes', async () => {
    const { rows } = await asOwner(test.ownerUrl, (client) => client.query('SELECT password_hash FROM users'));
    for (const { password_hash } of rows) expect(password_hash).toMatch(/^scrypt\$32768\$8\$3\$[\w-]{22}\$[\w-]{43}$/);
  });

  it('knows no other address, and nothing was logged as unforeseen', async () => {
    const browser = new TestBrowser(test.app);
    const { body } = await browser.get('/api/nowhere').expect(404);
    expect(body.type).toBe('/problems/not-found');
    expect(test.loggedErrors).toEqual([]);
  });
});
