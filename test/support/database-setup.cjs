// Runs once per call of jest, before the tests that need a database: a running cluster and one migrated template, from
// which every test file copies its own database.
const { buildSync } = require('esbuild');
const { existsSync } = require('node:fs');
const { createRequire } = require('node:module');
const path = require('node:path');

const ROOT = path.resolve(__dirname, '../..');
const SETUP = path.join(ROOT, 'server/src/setup');

/** The migrations are TypeScript, and jest translates only tests: bundle them and load the bundle. */
function loadMigration() {
  const source = path.join(ROOT, 'server/src/database/migrate.ts');
  if (!existsSync(source)) throw new Error('There are no migrations to make a test database from.');
  const outfile = path.join(ROOT, 'dist/test', `migrate-${process.pid}.cjs`);
  buildSync({
    absWorkingDir: ROOT,
    entryPoints: [source],
    outfile,
    bundle: true,
    packages: 'external',
    platform: 'node',
    target: 'node20',
    format: 'cjs',
    tsconfig: path.join(ROOT, 'server/tsconfig.json'),
    logLevel: 'warning',
  });
  try {
    return createRequire(__filename)(outfile).migrateDatabase;
  } finally {
    require('node:fs').rmSync(outfile, { force: true });
  }
}

module.exports = async function prepareDatabase() {
  const { Client } = require('pg');
  const { startWatchdog } = await import(path.join(SETUP, 'watchdog.mjs'));
  const { useTestCluster } = await import(path.join(SETUP, 'test-cluster.mjs'));
  // Joined even when the caller already runs it, so that neither stops it under the other.
  const { cluster, use } = await useTestCluster();
  const watchdog = startWatchdog();
  watchdog.tell({ testCluster: use });

  const template = `fw_template_${process.pid}_${Date.now().toString(36)}`;
  const client = new Client({ connectionString: cluster.ownerUrl() });
  await client.connect();
  await client.query(`CREATE DATABASE ${template}`);
  await client.end();
  await loadMigration()({
    ownerUrl: cluster.ownerUrl(template),
    applicationPassword: cluster.applicationPassword,
  });

  process.env.TEST_DATABASE_OWNER_URL = cluster.ownerUrl();
  process.env.TEST_DATABASE_APPLICATION_URL = cluster.applicationUrl('postgres');
  process.env.TEST_DATABASE_TEMPLATE = template;
  globalThis.foldwrightTestDatabase = { use, watchdog, template };
};
