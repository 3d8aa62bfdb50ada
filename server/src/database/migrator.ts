import { Client } from 'pg';
import { Umzug } from 'umzug';
import { ALL_MIGRATIONS } from '../migrations/all-migrations';
import type { MigrationContext } from '../migrations/migration';

/** The role the application connects as. The migrations grant to it by this name. */
export const APPLICATION_ROLE = 'foldwright_app';
const ROLE_TRIES = 10;

/**
 * Make the application's role, or give it this password: plain, owner of nothing, held by row-level security. Roles
 * belong to the whole cluster, so two databases prepared at once may trip over each other; then it is tried again.
 */
async function ensureApplicationRole(client: Client, password: string): Promise<void> {
  const rights = 'LOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE NOREPLICATION NOBYPASSRLS';
  const secret = client.escapeLiteral(password);
  for (let attempt = 1; ; attempt += 1) {
    try {
      const { rowCount } = await client.query('SELECT 1 FROM pg_roles WHERE rolname = $1', [APPLICATION_ROLE]);
      await client.query(`${rowCount ? 'ALTER' : 'CREATE'} ROLE ${APPLICATION_ROLE} ${rights} PASSWORD ${secret}`);
      return;
    } catch (error) {
      if (attempt === ROLE_TRIES) throw error;
      await new Promise((resolve) => setTimeout(resolve, 20 * attempt));
    }
  }
}

async function prepare(client: Client, password: string): Promise<void> {
  await ensureApplicationRole(client, password);
  await client.query(`
    GRANT USAGE ON SCHEMA public TO ${APPLICATION_ROLE};
    CREATE TABLE IF NOT EXISTS schema_migrations (name text PRIMARY KEY, ran_at timestamptz NOT NULL DEFAULT now());
    ALTER DEFAULT PRIVILEGES IN SCHEMA public GRANT SELECT, INSERT, UPDATE, DELETE ON TABLES TO ${APPLICATION_ROLE};
    ALTER DEFAULT PRIVILEGES IN SCHEMA public GRANT USAGE, SELECT ON SEQUENCES TO ${APPLICATION_ROLE};
  `);
}

function umzugOf(client: Client): Umzug<MigrationContext> {
  const inOwnTransaction = (run: (context: MigrationContext) => Promise<void>) => async () => {
    await client.query('BEGIN');
    try {
      await run({ query: async (sql) => void (await client.query(sql)) });
      await client.query('COMMIT');
    } catch (error) {
      await client.query('ROLLBACK');
      throw error;
    }
  };
  return new Umzug<MigrationContext>({
    migrations: ALL_MIGRATIONS.map((migration) => ({
      name: migration.name,
      up: inOwnTransaction((context) => migration.up(context)),
      down: inOwnTransaction((context) => migration.down(context)),
    })),
    context: { query: async (sql) => void (await client.query(sql)) },
    storage: {
      logMigration: async ({ name }) => void (await client.query('INSERT INTO schema_migrations VALUES ($1)', [name])),
      unlogMigration: async ({ name }) =>
        void (await client.query('DELETE FROM schema_migrations WHERE name = $1', [name])),
      executed: async () => {
        const { rows } = await client.query<{ name: string }>('SELECT name FROM schema_migrations ORDER BY name');
        return rows.map((row) => row.name);
      },
    },
    logger: undefined,
  });
}

/**
 * Run something with the migrations of one database, alone: two programs that start at once take turns.
 * @param ownerUrl address of the database for the role that owns its tables
 */
export async function withMigrator<T>(
  ownerUrl: string,
  applicationPassword: string,
  work: (umzug: Umzug<MigrationContext>) => Promise<T>,
): Promise<T> {
  const client = new Client({ connectionString: ownerUrl, application_name: 'foldwright-migrate' });
  await client.connect();
  try {
    await client.query("SELECT pg_advisory_lock(hashtext('foldwright-migrate'))");
    await prepare(client, applicationPassword);
    return await work(umzugOf(client));
  } finally {
    await client.end();
  }
}
