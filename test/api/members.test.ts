import type { Listening } from '../support/event-stream';
import { EventStream, listenTo } from '../support/event-stream';
import { TestCrew } from '../support/crew';
import { addWorkshop, asOwner } from '../support/people';
import { until } from '../support/until';

describe('members of a workshop', () => {
  let crew: TestCrew;
  let site: Listening | null;

  beforeEach(async () => {
    site = null;
    crew = await TestCrew.start();
  });
  afterEach(async () => {
    await site?.stop();
    await crew.test.close();
  });

  const trail = async (): Promise<string[]> => {
    const { body } = await crew.owner.get('/api/office/audit').expect(200);
    return body.entries.map(({ by, what }: { by: string; what: string }) => `${by}: ${what}`);
  };

  it('get another role, which counts from their next request on, and are told', async () => {
    const { person, browser } = await crew.add('Tomasz Wren', 'viewer');
    await browser.get('/api/office/mails').expect(403);
    await crew.change(browser, crew.imogen.id, 1).expect(403);
    await crew.change(crew.owner, person.id, 1, 'fabricator').expect(204);
    await browser.get('/api/office/mails').expect(200);
    await crew.change(crew.owner, person.id, 2, 'customer').expect(400);
    // Another owner had an older list before their eyes.
    await crew.change(crew.owner, person.id, 1, 'owner').expect(412);
    // What they are already is no change, and no mail.
    await crew.change(crew.owner, person.id, 2, 'fabricator').expect(204);
    expect(await crew.mails()).toMatchObject([
      {
        to: person.email,
        subject: 'Larkfield Cartworks: your membership',
        text: expect.stringContaining('Imogen Harrow has made you fabricator of Larkfield Cartworks.'),
      },
    ]);
    expect(await trail()).toEqual(['Imogen Harrow: Made Tomasz Wren fabricator']);
  });

  it('keep an owner, whoever asks for it', async () => {
    const last = { type: '/problems/wrong-state', next: 'Make somebody else an owner first.' };
    expect((await crew.change(crew.owner, crew.imogen.id, 1)).body).toMatchObject(last);
    expect((await crew.remove(crew.owner, crew.imogen.id)).body).toMatchObject(last);
    await crew.add('Noor Vale', 'owner');
    await crew.remove(crew.owner, crew.imogen.id).expect(204);
    await crew.owner.get('/api/parts').expect(403);
  });

  it.each(['demote', 'remove'] as const)('keep an owner when two %s each other at once', async (how) => {
    for (let round = 0; round < 4; round += 1) {
      const [one, two] = [await crew.add(`One ${round}`, 'owner'), await crew.add(`Two ${round}`, 'owner')];
      const act = (by: typeof one, to: typeof two) =>
        how === 'demote' ? crew.change(by.browser, to.person.id, 1) : crew.remove(by.browser, to.person.id);
      const before = (await crew.members()).find(({ userId }) => userId === crew.imogen.id);
      // The third owner is out of the way, so that only the two are left.
      await crew.change(one.browser, crew.imogen.id, before?.revision ?? 0).expect(204);
      const answers = await Promise.all([act(one, two), act(two, one)]);
      expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
      const winner = answers[0]?.status === 204 ? one : two;
      const owners = (await crew.members(winner.browser)).filter(({ role }) => role === 'owner');
      expect(owners.map(({ userId }) => userId)).toEqual([winner.person.id]);
      const imogen = (await crew.members(winner.browser)).find(({ userId }) => userId === crew.imogen.id);
      await crew.change(winner.browser, crew.imogen.id, imogen?.revision ?? 0, 'owner').expect(204);
      await crew.remove(crew.owner, winner.person.id).expect(204);
    }
  });

  it('hold the last owner by a lock: a transaction waits for another that is under way', async () => {
    const { person } = await crew.add('Noor Vale', 'owner');
    let isDone = false;
    const waiting = await asOwner(crew.test.ownerUrl, async (client) => {
      await client.query('BEGIN');
      await client.query("SELECT pg_advisory_xact_lock(hashtextextended('members:' || $1, 0))", [crew.workshop]);
      await client.query("UPDATE memberships SET role = 'viewer' WHERE user_id = $1", [person.id]);
      const demotion = crew.change(crew.owner, crew.imogen.id, 1).then((answer) => {
        isDone = true;
        return answer;
      });
      await new Promise((resolve) => setTimeout(resolve, 300));
      expect(isDone).toBe(false);
      await client.query('COMMIT');
      return demotion;
    });
    expect(waiting.body.type).toBe('/problems/wrong-state');
  });

  it('lose the workshop with their next request when they are removed, and are told', async () => {
    const { person, browser } = await crew.add('Tomasz Wren', 'fabricator');
    await browser.get('/api/parts').expect(200);
    await crew.remove(crew.owner, person.id, 9).expect(412);
    await crew.remove(crew.owner, person.id).expect(204);
    const refused = await browser.get('/api/parts').expect(403);
    expect(refused.body.detail).toBe('You belong to no workshop here, or not any more.');
    const [mail] = await crew.mails();
    expect(mail).toMatchObject({ to: person.email, text: expect.stringContaining('taken you off the members') });
    expect(await trail()).toEqual(['Imogen Harrow: Removed Tomasz Wren']);
    await crew.remove(crew.owner, person.id).expect(404);
  });

  it('do nothing in another workshop that they meant for the one they lost', async () => {
    const { person, browser } = await crew.add('Tomasz Wren', 'fabricator');
    const other = await addWorkshop(crew.test.ownerUrl, 'Orchard Street Welding');
    await browser.get('/api/session').expect(200);
    await asOwner(crew.test.ownerUrl, (client) =>
      client.query(
        "INSERT INTO memberships (id, workshop_id, user_id, role) VALUES (gen_random_uuid(), $1, $2, 'owner')",
        [other, person.id],
      ),
    );
    await crew.remove(crew.owner, person.id).expect(204);
    const starter = { shape: 'flat-plate', widthMm: 80, heightMm: 60 };
    const create = () =>
      browser.post('/api/parts').set('idempotency-key', 'meant-for-larkfield').send({ name: 'Tray', starter });
    await create().expect(403);
    const { body } = await browser.get('/api/session').expect(200);
    expect(body.current).toMatchObject({ workshopId: other, role: 'owner' });
    await create().expect(201);
  });

  it('hear nothing more from the moment they are removed', async () => {
    site = await listenTo(crew.test.app);
    const { person, browser } = await crew.add('Tomasz Wren', 'fabricator');
    const [gone, stays] = [
      await EventStream.open(site.url, { cookie: browser.cookie }),
      await EventStream.open(site.url, { cookie: crew.owner.cookie }),
    ];
    await crew.remove(crew.owner, person.id).expect(204);
    // At once, long before the next heartbeat.
    await until(async () => (gone.hasEnded ? true : undefined));
    expect(gone.events).toEqual([]);
    await stays.waitFor(2);
    expect(new Set(stays.events.map(({ kind }) => kind))).toEqual(new Set(['mail-changed', 'members-changed']));
    stays.close();
  });

  it('are the crew: customers come and go through the shop', async () => {
    const { person } = await crew.add('Ravi Sandle', 'customer');
    expect((await crew.members()).map(({ name }) => name)).toEqual(['Imogen Harrow']);
    await crew.change(crew.owner, person.id, 1, 'owner').expect(404);
    await crew.remove(crew.owner, person.id).expect(404);
  });
});
