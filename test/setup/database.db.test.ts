import { Client } from 'pg';
import { createTestDatabase } from '../support/database';

async function ask(url: string, statement: string): Promise<unknown> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    const { rows } = await client.query<{ answer: unknown }>(statement);
    return rows[0]?.answer;
  } finally {
    await client.end();
  }
}

describe('createTestDatabase', () => {
  it('gives each caller a migrated database of its own', async () => {
    const [one, other] = await Promise.all([createTestDatabase(), createTestDatabase()]);
    const tables = `SELECT count(*)::int AS answer FROM pg_tables WHERE schemaname = 'public'`;
    expect(await ask(one.ownerUrl, tables)).toBeGreaterThan(5);

    await ask(one.ownerUrl, 'CREATE TABLE only_here (id int)');
    const isThere = `SELECT to_regclass('only_here') IS NOT NULL AS answer`;
    expect(await ask(one.ownerUrl, isThere)).toBe(true);
    expect(await ask(other.ownerUrl, isThere)).toBe(false);
    await Promise.all([one.drop(), other.drop()]);
  });

  it('lets the application in under a role that owns nothing and passes no policy', async () => {
    const database = await createTestDatabase();
    const role = (column: string) => `SELECT ${column} AS answer FROM pg_roles WHERE rolname = current_user`;
    expect(await ask(database.applicationUrl, role('rolsuper'))).toBe(false);
    expect(await ask(database.applicationUrl, role('rolbypassrls'))).toBe(false);
    expect(
      await ask(
        database.applicationUrl,
        `SELECT count(*)::int AS answer FROM pg_tables WHERE tableowner = current_user`,
      ),
    ).toBe(0);
    await database.drop();
  });

  it('removes a database that is still in use', async () => {
    const database = await createTestDatabase();
    const left = new Client({ connectionString: database.ownerUrl });
    left.on('error', () => undefined);
    await left.connect();
    await database.drop();
    await expect(ask(database.ownerUrl, 'SELECT 1 AS answer')).rejects.toThrow(/does not exist/);
  });
});
