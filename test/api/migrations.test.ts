import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { migrateDatabase } from '@foldwright/server/database/migrate';
import { withMigrator } from '@foldwright/server/database/migrator';
import { ALL_MIGRATIONS } from '@foldwright/server/migrations/all-migrations';
import { asOwner } from '../support/people';

jest.setTimeout(60_000);

const setting = (name: string): string => {
  const value = process.env[name];
  if (value === undefined) throw new Error(`${name} is not set: run this test through its jest project.`);
  return value;
};

/** Everything in a schema that a migration can make, spelled out so that two states can be compared. */
const SCHEMA = `
  SELECT 'column' AS kind, table_schema || '.' || table_name || '.' || column_name || ' ' || data_type || ' ' || is_nullable AS what
    FROM information_schema.columns WHERE table_schema IN ('public', 'pgboss')
  UNION ALL SELECT 'index', indexdef FROM pg_indexes WHERE schemaname IN ('public', 'pgboss')
  UNION ALL SELECT 'policy', tablename || ' ' || policyname || ' ' || COALESCE(qual, '') FROM pg_policies
  UNION ALL SELECT 'constraint', conname || ' ' || pg_get_constraintdef(oid) FROM pg_constraint
    WHERE connamespace IN (SELECT oid FROM pg_namespace WHERE nspname IN ('public', 'pgboss'))
  UNION ALL SELECT 'function', proname FROM pg_proc
    WHERE pronamespace IN (SELECT oid FROM pg_namespace WHERE nspname IN ('public', 'pgboss'))
  UNION ALL SELECT 'right', table_name || ' ' || privilege_type FROM information_schema.role_table_grants
    WHERE grantee = 'foldwright_app'
  ORDER BY 1, 2`;

describe('migrations', () => {
  const name = `fw_migrations_${randomUUID().replaceAll('-', '').slice(0, 12)}`;
  let url: string;
  let password: string;

  const describeSchema = (): Promise<unknown[]> => asOwner(url, async (client) => (await client.query(SCHEMA)).rows);

  beforeAll(async () => {
    await asOwner(setting('TEST_DATABASE_OWNER_URL'), (client) => client.query(`CREATE DATABASE ${name}`));
    const address = new URL(setting('TEST_DATABASE_OWNER_URL'));
    address.pathname = `/${name}`;
    url = address.href;
    password = decodeURIComponent(new URL(setting('TEST_DATABASE_APPLICATION_URL')).password);
  });
  afterAll(() =>
    asOwner(setting('TEST_DATABASE_OWNER_URL'), (client) => client.query(`DROP DATABASE ${name} WITH (FORCE)`)),
  );

  it('go up from nothing, down to nothing, and up to the same again', async () => {
    const empty = await describeSchema();
    const steps = await migrateDatabase({ ownerUrl: url, applicationPassword: password });
    expect(steps).toEqual(ALL_MIGRATIONS.map((migration) => migration.name));
    const first = await describeSchema();
    await withMigrator(url, password, (umzug) => umzug.down({ to: 0 }));
    const down = await describeSchema();
    const left = down.filter((row) => !JSON.stringify(row).includes('schema_migrations'));
    expect(left).toEqual(empty);
    await migrateDatabase({ ownerUrl: url, applicationPassword: password });
    expect(await describeSchema()).toEqual(first);
  });

  it('do nothing the second time, even when two programs start at once', async () => {
    const runs = await Promise.all([
      migrateDatabase({ ownerUrl: url, applicationPassword: password }),
      migrateDatabase({ ownerUrl: url, applicationPassword: password }),
    ]);
    expect(runs).toEqual([[], []]);
  });

  it('undo a step that fails, whole', async () => {
    await withMigrator(url, password, async (umzug) => {
      // Whichever step makes the table that is in the way: it has to leave nothing of itself behind.
      await umzug.down({ to: '20261201-0300-orders-and-mail' });
      await asOwner(url, (client) => client.query('CREATE TABLE mails (id integer)'));
      await expect(umzug.up()).rejects.toThrow(/already exists/);
      const { rows } = await asOwner(url, (client) => client.query("SELECT to_regclass('orders') AS orders"));
      expect(rows).toEqual([{ orders: null }]);
      await asOwner(url, (client) => client.query('DROP TABLE mails'));
      await umzug.up();
    });
  });

  it('have names in the order they run in', () => {
    const names = ALL_MIGRATIONS.map((migration) => migration.name);
    expect(names).toEqual([...names].sort());
  });

  it('give the application’s role its password', async () => {
    const address = new URL(setting('TEST_DATABASE_APPLICATION_URL'));
    address.pathname = `/${name}`;
    const client = new Client({ connectionString: address.href });
    await client.connect();
    expect((await client.query('SELECT current_user AS role')).rows).toEqual([{ role: 'foldwright_app' }]);
    await client.end();
  });
});
