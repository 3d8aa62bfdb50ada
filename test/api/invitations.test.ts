import { createHash, randomUUID } from 'node:crypto';
import { NEW_PASSWORD, TestCrew } from '../support/crew';
import { addPerson, addWorkshop, asOwner } from '../support/people';

const ADA = 'ada@quill.example.test';
const ACCOUNT = { name: 'Ada Quill', password: NEW_PASSWORD };
const DAY_MS = 24 * 3600 * 1000;

describe('invitations', () => {
  let crew: TestCrew;
  let clock: Date | null;

  beforeEach(async () => {
    clock = null;
    crew = await TestCrew.start({ now: () => clock ?? new Date() });
  });
  afterEach(() => crew.test.close());

  const reasonOf = async (link: string): Promise<unknown> => {
    const { status, body } = await (await crew.stranger()).get(`/api/invitation-links/${link}`);
    return status === 410 ? body.extra.reason : status;
  };
  const waiting = async (): Promise<{ id: string; email: string }[]> =>
    (await crew.owner.get('/api/office/invitations').expect(200)).body.invitations;

  it('go out by mail and let somebody in with a new account, once', async () => {
    await crew.invite('Ada@Quill.example.test').expect(201);
    const [mail] = await crew.mails();
    expect(mail?.subject).toBe('Imogen Harrow invites you to Larkfield Cartworks');
    expect(mail?.text).toMatch(
      /as viewer\.\n\nOpen this within seven days; it works once: http:\/\/127\.0\.0\.1:4310\/inv/,
    );
    const link = await crew.linkTo(ADA);
    expect(Buffer.from(link, 'base64url')).toHaveLength(32);
    const ada = await crew.stranger();
    const seen = await ada.get(`/api/invitation-links/${link}`).expect(200);
    const invitedBy = 'Imogen Harrow';
    const workshopName = 'Larkfield Cartworks';
    expect(seen.body).toEqual({ workshopName, role: 'viewer', invitedBy, email: ADA, hasAccount: false });
    await crew.accept(ada, link).expect(400);
    await crew.accept(ada, link, { ...ACCOUNT, password: 'short' }).expect(400);
    const joined = await crew.accept(ada, link, ACCOUNT).expect(200);
    expect(joined.body).toMatchObject({ user: { email: ADA }, current: { workshopId: crew.workshop, role: 'viewer' } });
    await ada.get('/api/parts').expect(200);
    await ada.get('/api/office/invitations').expect(403);
    expect((await crew.accept(await crew.stranger(), link, { ...ACCOUNT, name: 'Eve' })).body).toMatchObject({
      type: '/problems/invitation-ended',
      extra: { reason: 'used' },
    });
    expect(await waiting()).toEqual([]);
    expect((await crew.members()).map(({ name }) => name)).toEqual(['Ada Quill', 'Imogen Harrow']);
    const { body } = await crew.owner.get('/api/office/audit').expect(200);
    expect(body.entries.map(({ by, what }: { by: string; what: string }) => `${by}: ${what}`)).toEqual([
      'Ada Quill: Joined as viewer',
      `Imogen Harrow: Invited ${ADA} as viewer`,
    ]);
  });

  it('keep of the link no more than its hash', async () => {
    await crew.invite(ADA).expect(201);
    const link = await crew.linkTo(ADA);
    const rows = await asOwner(
      crew.test.ownerUrl,
      async (client) => (await client.query('SELECT * FROM invitations')).rows,
    );
    expect(JSON.stringify(rows)).not.toContain(link);
    expect(rows).toMatchObject([{ link_hash: createHash('sha256').update(link).digest('hex') }]);
  });

  it('let in whoever owns the address and nobody else, once however often they press', async () => {
    const tomasz = await addPerson(crew.test.ownerUrl, 'Tomasz Wren', {});
    await crew.invite(tomasz.email, 'fabricator').expect(201);
    const link = await crew.linkTo(tomasz.email);
    const unsigned = await crew.accept(await crew.stranger(), link, { ...ACCOUNT, name: 'Eve' });
    expect(unsigned.body.type).toBe('/problems/not-signed-in');
    const petra = await crew.signIn(await addPerson(crew.test.ownerUrl, 'Petra Lowe', {}));
    const other = await crew.accept(petra, link, ACCOUNT);
    expect(other.body).toMatchObject({ type: '/problems/wrong-state', next: expect.stringContaining(tomasz.email) });
    expect(await crew.members()).toHaveLength(1);
    const browser = await crew.signIn(tomasz);
    const answers = await Promise.all([1, 2, 3].map(() => crew.accept(browser, link)));
    expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
    expect((await crew.members()).filter(({ name }) => name === 'Tomasz Wren')).toMatchObject([
      { role: 'fabricator', revision: 1 },
    ]);
    expect((await crew.invite(tomasz.email)).body.type).toBe('/problems/already-exists');
    // A second press is forgiven; coming back by it is not.
    await crew.remove(crew.owner, tomasz.id).expect(204);
    await crew.accept(browser, link).expect(410);
  });

  it('make one account of two presses at once', async () => {
    await crew.invite(ADA).expect(201);
    const link = await crew.linkTo(ADA);
    const browsers = [await crew.stranger(), await crew.stranger()];
    const answers = await Promise.all(browsers.map((browser) => crew.accept(browser, link, ACCOUNT)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 410]);
    expect(await crew.members()).toHaveLength(2);
  });

  it('say why they can’t be accepted any more, and nothing of the workshop', async () => {
    const { body: first } = await crew.invite(ADA).expect(201);
    const withdrawn = await crew.linkTo(ADA);
    await crew.owner.delete(`/api/office/invitations/${first.id}`).expect(204);
    await crew.owner.delete(`/api/office/invitations/${first.id}`).expect(204);
    expect(await reasonOf(withdrawn)).toBe('withdrawn');
    expect(await waiting()).toEqual([]);

    await crew.invite(ADA).expect(201);
    const replaced = await crew.linkTo(ADA);
    await crew.invite(ADA, 'fabricator').expect(201);
    expect(await reasonOf(replaced)).toBe('replaced');
    expect(await waiting()).toMatchObject([{ email: ADA, role: 'fabricator' }]);

    const current = await crew.linkTo(ADA);
    clock = new Date(Date.now() + 7 * DAY_MS - 60_000);
    expect(await reasonOf(current)).toBe(200);
    clock = new Date(Date.now() + 7 * DAY_MS + 60_000);
    expect(await reasonOf(current)).toBe('expired');
    const late = await crew.accept(await crew.stranger(), current, ACCOUNT).expect(410);
    expect(late.body).toMatchObject({ detail: 'It is older than seven days.', kept: 'Nothing was changed.' });
    expect(late.text).not.toContain('Larkfield');
    // The owner sees it still, and sends it again.
    expect(await waiting()).toMatchObject([{ email: ADA, role: 'fabricator' }]);
    await crew.invite(ADA, 'fabricator').expect(201);
    expect(await reasonOf(await crew.linkTo(ADA))).toBe(200);
    expect(await reasonOf(randomUUID())).toBe(404);
  });

  it('go out once under one key, and not to the whole world', async () => {
    const key = randomUUID();
    const answers = await Promise.all([crew.invite(ADA, 'viewer', key), crew.invite(ADA, 'viewer', key)]);
    expect(answers.map(({ status }) => status)).toEqual([201, 201]);
    expect(answers[0]?.body).toEqual(answers[1]?.body);
    expect(await crew.mails()).toHaveLength(1);
    await crew.invite(ADA, 'owner', key).expect(409);
    await asOwner(crew.test.ownerUrl, (client) =>
      client.query("UPDATE rate_limits SET points = 60 WHERE key LIKE 'invitations:%'"),
    );
    expect((await crew.invite('more@example.test')).body.type).toBe('/problems/too-many-requests');
  });

  it('are read by owners alone: whoever reads the link could join in somebody’s place', async () => {
    await crew.invite(ADA, 'owner').expect(201);
    const { browser, person } = await crew.add('Tomasz Wren', 'fabricator');
    await crew.change(crew.owner, person.id, 1, 'viewer').expect(204);
    await crew.change(crew.owner, person.id, 2, 'fabricator').expect(204);
    expect((await crew.mails(browser)).map(({ to }) => to)).toEqual([person.email, person.email]);
    expect(await crew.mails()).toHaveLength(3);
  });

  it('make a customer one of the crew', async () => {
    const { person, browser } = await crew.add('Ravi Sandle', 'customer');
    await crew.invite(person.email, 'fabricator').expect(201);
    await crew.accept(browser, await crew.linkTo(person.email)).expect(200);
    expect((await crew.members()).find(({ userId }) => userId === person.id)).toMatchObject({
      role: 'fabricator',
      revision: 2,
    });
  });

  it('stay inside their workshop', async () => {
    const { body } = await crew.invite(ADA).expect(201);
    const elsewhere = await addWorkshop(crew.test.ownerUrl, 'Orchard Street Welding');
    const petra = await crew.signIn(await addPerson(crew.test.ownerUrl, 'Petra Lowe', { [elsewhere]: 'owner' }));
    expect((await petra.get('/api/office/invitations').expect(200)).body.invitations).toEqual([]);
    await petra.delete(`/api/office/invitations/${body.id}`).expect(404);
    expect(await waiting()).toHaveLength(1);
  });
});
