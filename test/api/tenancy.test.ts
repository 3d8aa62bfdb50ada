import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { Client } from 'pg';
import * as z from 'zod/mini';
import { addWorkshop, asOwner } from '../support/people';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

/** The database holds the walls between workshops by itself; here it is asked in plain SQL, past all of our code. */
describe('walls between workshops in the database', () => {
  let test: TestApp;
  let app: Client;
  let here: string;
  let there: string;

  beforeAll(async () => {
    test = await startTestApp({ poolSize: 1 });
    here = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    there = await addWorkshop(test.ownerUrl, 'Orchard Street Welding');
    for (const workshop of [here, there]) {
      await test.database.inWorkshop(workshop, (scope) => scope.rows.parts.add({ number: 'LC-01', name: 'Pump tray' }));
    }
    app = new Client({ connectionString: test.applicationUrl });
    await app.connect();
  });
  afterAll(async () => {
    await app.end();
    await test.close();
  });
  afterEach(() => app.query('ROLLBACK'));

  const enter = async (workshop: string): Promise<void> => {
    await app.query('BEGIN');
    await app.query("SELECT set_config('foldwright.workshop', $1, true)", [workshop]);
  };

  it('stand on every table that has a workshop', async () => {
    const { rows } = await asOwner(test.ownerUrl, (client) =>
      client.query(`
        SELECT c.relname AS name, c.relrowsecurity AS guarded,
          (SELECT array_agg(p.polcmd::text ORDER BY p.polname) FROM pg_policy p WHERE p.polrelid = c.oid) AS commands
        FROM pg_class c JOIN pg_namespace n ON n.oid = c.relnamespace AND n.nspname = 'public'
        WHERE c.relkind = 'r' AND EXISTS (
          SELECT 1 FROM pg_attribute a WHERE a.attrelid = c.oid AND a.attname = 'workshop_id' AND NOT a.attisdropped)`),
    );
    expect(rows.length).toBeGreaterThan(10);
    for (const row of rows) expect(row).toMatchObject({ guarded: true });
    const composite = await asOwner(test.ownerUrl, (client) =>
      client.query(`
        SELECT conname FROM pg_constraint f JOIN pg_class target ON target.oid = f.confrelid
        WHERE f.contype = 'f' AND target.relname NOT IN ('workshops', 'users', 'queue') AND array_length(f.conkey, 1) < 2
          AND f.connamespace = 'public'::regnamespace`),
    );
    expect(composite.rows).toEqual([]);
  });

  it('hold for a role that owns nothing and may nothing else', async () => {
    const { rows } = await app.query(
      'SELECT rolsuper, rolbypassrls, rolcreatedb, rolcreaterole FROM pg_roles WHERE rolname = current_user',
    );
    expect(rows).toEqual([{ rolsuper: false, rolbypassrls: false, rolcreatedb: false, rolcreaterole: false }]);
    const owned = await app.query(
      'SELECT relname FROM pg_class WHERE relowner = (SELECT oid FROM pg_roles WHERE rolname = current_user)',
    );
    expect(owned.rows).toEqual([]);
    await expect(app.query('ALTER TABLE parts DISABLE ROW LEVEL SECURITY')).rejects.toThrow(/must be owner/);
    await expect(app.query('SELECT * FROM installation_facts')).rejects.toThrow(/permission denied/);
  });

  it('show nothing without a workshop, and only its own rows with one', async () => {
    expect((await app.query('SELECT * FROM parts')).rows).toEqual([]);
    expect((await app.query('SELECT * FROM workshops')).rows).toEqual([]);
    await enter(here);
    expect((await app.query('SELECT workshop_id FROM parts')).rows).toEqual([{ workshop_id: here }]);
    await app.query('COMMIT');
    // The setting ends with its transaction: the next user of the connection starts with nothing.
    expect((await app.query('SELECT * FROM parts')).rows).toEqual([]);
  });

  it('let nobody write into another workshop', async () => {
    await enter(here);
    const changed = await app.query("UPDATE parts SET name = 'taken' WHERE workshop_id = $1", [there]);
    expect(changed.rowCount).toBe(0);
    expect((await app.query('DELETE FROM parts WHERE workshop_id = $1', [there])).rowCount).toBe(0);
    await expect(
      app.query("INSERT INTO parts (id, workshop_id, number, name) VALUES (gen_random_uuid(), $1, 'X', 'Y')", [there]),
    ).rejects.toThrow(/row-level security/);
    await app.query('ROLLBACK');
    await enter(here);
    await expect(app.query('UPDATE parts SET workshop_id = $1', [there])).rejects.toThrow(/row-level security/);
  });

  it('let no row point into another workshop', async () => {
    const foreign = await test.database.inWorkshop(there, (scope) => scope.rows.parts.list());
    await expect(
      test.database.inWorkshop(here, (scope) =>
        scope.rows.jobs.add({
          kind: 'trace',
          state: 'waiting',
          stages: [],
          photoId: null,
          partId: foreign[0]?.id ?? null,
        }),
      ),
    ).rejects.toThrow(/foreign key/);
  });

  it('let the system path read across them and write nowhere', async () => {
    const names = await test.database.asSystem('show the installation to its operator', ({ select }) =>
      select('SELECT workshop_id FROM parts'),
    );
    expect(names).toHaveLength(2);
    await app.query('BEGIN');
    await app.query("SELECT set_config('foldwright.system', 'read', true)");
    expect((await app.query("UPDATE parts SET name = 'taken'")).rowCount).toBe(0);
    expect((await app.query('DELETE FROM parts')).rowCount).toBe(0);
  });

  it('are passed by few, each for a stated reason', () => {
    const callers = sources().filter(([, text]) => /\.asSystem\(/.test(text));
    expect(callers.map(([file]) => file).sort()).toEqual([
      'services/members/accept-invitation.ts',
      'services/operator/troubles.ts',
      'services/read-installation.ts',
      'services/reviews/review-links.ts',
      'services/sales/find-by-link.ts',
      'services/take-message.ts',
    ]);
  });

  it('leave what was released or logged as it is', async () => {
    await enter(here);
    for (const table of [
      ...['revisions', 'revision_files', 'command_batches', 'audit_entries'],
      ...['stock_moves', 'ledger_entries', 'ledger_postings', 'shipment_items', 'question_messages'],
    ]) {
      await app.query('SAVEPOINT before');
      await expect(app.query(`DELETE FROM ${table}`)).rejects.toThrow(/permission denied/);
      await app.query('ROLLBACK TO SAVEPOINT before');
      await expect(app.query(`UPDATE ${table} SET id = id`)).rejects.toThrow(/permission denied/);
      await app.query('ROLLBACK TO SAVEPOINT before');
    }
  });

  it('are reached in services only through the scoped repository', () => {
    const offenders = sources().filter(
      ([file, text]) => file.startsWith('services/') && /models\.(?!users\b|sequelize\b|jobs\.findAll)\w+\./.test(text),
    );
    expect(offenders.map(([file]) => file)).toEqual([]);
  });

  it('make a statement that was not handed its transaction fail instead of passing', async () => {
    const forgetful = test.database.inWorkshop(here, (scope) => scope.models.parts.findAll());
    await expect(forgetful).rejects.toThrow(/acquire|timeout/i);
  });

  it('answer a foreign row as a missing one in the repository', async () => {
    const foreign = await test.database.inWorkshop(there, (scope) => scope.rows.parts.list());
    const id = z.uuid().parse(foreign[0]?.id);
    await expect(test.database.inWorkshop(here, (scope) => scope.rows.parts.get(id))).rejects.toMatchObject({
      slug: 'not-found',
    });
  });
});

/** Every source file of the server with its text, by path below server/src. */
function sources(): [string, string][] {
  const root = path.resolve(__dirname, '../../server/src');
  return readdirSync(root, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && entry.name.endsWith('.ts') && !entry.name.endsWith('.test.ts'))
    .map((entry) => {
      const file = path.join(entry.parentPath, entry.name);
      return [path.relative(root, file), readFileSync(file, 'utf8')];
    });
}
