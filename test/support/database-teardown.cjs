// Runs once per call of jest, after the tests that needed a database.
const path = require('node:path');

module.exports = async function releaseDatabase() {
  const { Client } = require('pg');
  const prepared = globalThis.foldwrightTestDatabase;
  if (prepared === undefined) return;
  const client = new Client({ connectionString: process.env.TEST_DATABASE_OWNER_URL });
  await client.connect();
  // What a failing test left open is dropped with it.
  const { rows } = await client.query('SELECT datname FROM pg_database WHERE starts_with(datname, $1)', [
    prepared.template,
  ]);
  for (const { datname } of rows) await client.query(`DROP DATABASE IF EXISTS ${datname} WITH (FORCE)`);
  await client.end();
  const { releaseTestCluster } = await import(path.resolve(__dirname, '../../server/src/setup/test-cluster.mjs'));
  await releaseTestCluster(prepared.use);
  await prepared.watchdog.dismiss();
};
