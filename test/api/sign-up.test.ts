import { Client } from 'pg';
import { NEW_PASSWORD, TestCrew } from '../support/crew';
import { asOwner } from '../support/people';

const NOOR = {
  ...{ name: 'Noor Vale', email: 'Noor@vale.example.test', password: NEW_PASSWORD },
  ...{ workshopName: 'Vale Brackets', numberPrefix: 'VB' },
};
const STARTER = { shape: 'flat-plate', widthMm: 80, heightMm: 60 };

describe('signing up', () => {
  let crew: TestCrew;

  beforeEach(async () => {
    crew = await TestCrew.start();
  });
  afterEach(() => crew.test.close());

  const counts = () =>
    asOwner(crew.test.ownerUrl, async (client) => {
      const { rows } = await client.query(
        'SELECT (SELECT count(*) FROM users)::int AS users, (SELECT count(*) FROM workshops)::int AS workshops',
      );
      return rows[0];
    });

  it('makes an account, a workshop it owns, and a session that works in it', async () => {
    const noor = await crew.stranger();
    const { body } = await noor.post('/api/sign-up').send(NOOR).expect(201);
    expect(body).toMatchObject({
      user: { name: 'Noor Vale', email: 'noor@vale.example.test', isOperator: false },
      current: { workshopName: 'Vale Brackets', role: 'owner' },
    });
    // Signing in gave the session a new id and token, so one that somebody else set is worthless.
    expect(body.csrfToken).not.toBe(noor.csrfToken);
    noor.csrfToken = body.csrfToken;
    const part = await noor
      .post('/api/parts')
      .set('idempotency-key', 'first-part')
      .send({ name: 'Tray', starter: STARTER })
      .expect(201);
    expect(part.body.number).toBe('VB-01');
    expect((await crew.owner.get('/api/parts').expect(200)).body.parts).toEqual([]);
    const { body: audit } = await noor.get('/api/office/audit').expect(200);
    expect(audit.entries.at(-1)).toMatchObject({ by: 'Noor Vale', what: 'Started the workshop' });
  });

  it('names what can’t be used, field by field', async () => {
    const sent = { ...NOOR, password: 'nine char', numberPrefix: 'v', email: 'no address', name: ' ' };
    const { body } = await (await crew.stranger()).post('/api/sign-up').send(sent).expect(400);
    expect(body.errors.map(({ pointer }: { pointer: string }) => pointer).sort()).toEqual([
      ...['/email', '/name', '/numberPrefix', '/password'],
    ]);
  });

  it('makes all or nothing: a known address gets no second account and no workshop', async () => {
    const before = await counts();
    const sent = { ...NOOR, email: crew.imogen.email.toUpperCase() };
    const { body } = await (await crew.stranger()).post('/api/sign-up').send(sent).expect(409);
    expect(body).toMatchObject({ type: '/problems/already-exists', errors: [{ pointer: '/email' }] });
    expect(body.next).toContain('Sign in');
    expect(await counts()).toEqual(before);
    const twice = await Promise.all(
      [await crew.stranger(), await crew.stranger()].map((browser) => browser.post('/api/sign-up').send(NOOR)),
    );
    expect(twice.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(await counts()).toEqual({ users: before.users + 1, workshops: before.workshops + 1 });
  });

  it('gives another workshop to somebody who is signed in, and works there from then on', async () => {
    const second = { workshopName: 'Harrow Two', numberPrefix: 'HT' };
    await (await crew.stranger()).post('/api/workshops').send(second).expect(401);
    const start = (sent: object) => crew.owner.post('/api/workshops').set('idempotency-key', 'pressed-once').send(sent);
    const [{ status, body }] = await Promise.all([start(second), start(second)]);
    expect(status).toBe(201);
    expect((await crew.owner.get('/api/session').expect(200)).body.memberships).toHaveLength(2);
    await start({ ...second, workshopName: 'Harrow Three' }).expect(409);
    expect(body.current).toMatchObject({ workshopName: 'Harrow Two', role: 'owner' });
    expect(await crew.members()).toMatchObject([{ name: 'Imogen Harrow', role: 'owner' }]);
  });

  it('is held up when many come from one address', async () => {
    const stranger = await crew.stranger();
    const again = () => stranger.post('/api/sign-up').send({ ...NOOR, email: crew.imogen.email });
    await again().expect(409);
    await asOwner(crew.test.ownerUrl, (client) =>
      client.query("UPDATE rate_limits SET points = 20 WHERE key LIKE 'sign-up:%'"),
    );
    await again().expect(429);
  });

  it('opens no wall: the application’s role makes the workshop it has named, and belongs to no other', async () => {
    const app = new Client({ connectionString: crew.test.applicationUrl });
    await app.connect();
    const mine = '11111111-1111-4111-8111-111111111111';
    const tries: [string, unknown[]][] = [
      ["INSERT INTO workshops (id, name, number_prefix) VALUES (gen_random_uuid(), 'X', 'X')", []],
      [
        "INSERT INTO memberships (id, workshop_id, user_id, role) VALUES (gen_random_uuid(), $1, $2, 'owner')",
        [crew.workshop, crew.imogen.id],
      ],
    ];
    try {
      for (const workshop of [null, mine]) {
        for (const [statement, values] of tries) {
          await app.query('BEGIN');
          if (workshop !== null) await app.query("SELECT set_config('foldwright.workshop', $1, true)", [workshop]);
          await expect(app.query(statement, values)).rejects.toThrow(/row-level security/);
          await app.query('ROLLBACK');
        }
      }
      await app.query('BEGIN');
      await app.query("SELECT set_config('foldwright.workshop', $1, true)", [mine]);
      expect((await app.query("UPDATE workshops SET name = 'taken'")).rowCount).toBe(0);
      expect((await app.query("UPDATE memberships SET role = 'owner'")).rowCount).toBe(0);
      expect((await app.query('SELECT * FROM invitations')).rows).toEqual([]);
      await app.query('ROLLBACK');
      await app.query('BEGIN');
      await app.query("SELECT set_config('foldwright.user', $1, true)", [crew.imogen.id]);
      // Seeing one's own memberships is reading only.
      expect((await app.query('SELECT * FROM memberships')).rows).toHaveLength(1);
      expect((await app.query("UPDATE memberships SET role = 'viewer'")).rowCount).toBe(0);
    } finally {
      await app.end();
    }
  });
});
