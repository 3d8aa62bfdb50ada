// Runs once per call of jest, before the journeys: the whole product as `npm start` brings it up, with the demo in it, on
// a data folder of its own. It ends with the process that runs the tests, however that ends.
const { spawn } = require('node:child_process');
const { chmodSync, mkdtempSync, readFileSync, rmSync } = require('node:fs');
const os = require('node:os');
const path = require('node:path');

const ROOT = path.resolve(__dirname, '../..');
const START = path.join(ROOT, 'server/src/setup/start.mjs');
/** Building what changed is part of a start. */
const STARTED_WITHIN_MS = 240_000;
/** The stand-ins hurry, so that an order is through in seconds. */
const PACE_MS = '300';

/** The address that the product says it runs at; fails when it ends before, or takes too long. */
function addressOf(child) {
  return new Promise((resolve, reject) => {
    let said = '';
    const limit = setTimeout(() => reject(new Error(`It has not started in time:\n${said}`)), STARTED_WITHIN_MS);
    const listen = (chunk) => {
      said += chunk;
      const address = /^Foldwright runs at (\S+)$/m.exec(said)?.[1];
      if (address === undefined) return;
      clearTimeout(limit);
      resolve(address);
    };
    child.stdout.on('data', listen);
    child.stderr.on('data', listen);
    child.once('exit', (code, signal) => {
      clearTimeout(limit);
      reject(new Error(`The product ended with ${signal ?? code}:\n${said}`));
    });
  });
}

module.exports = async function startProduct() {
  const dataDir = mkdtempSync(path.join(os.tmpdir(), 'journeys-'));
  // The database's account has to get in.
  chmodSync(dataDir, 0o755);
  const env = { ...process.env, FOLDWRIGHT_DATA_DIR: dataDir, FAKE_PACE_MS: PACE_MS, NODE_ENV: 'production' };
  const child = spawn(process.execPath, [START], { cwd: ROOT, env, stdio: ['ignore', 'pipe', 'pipe'] });
  globalThis.foldwrightProduct = { child, dataDir };
  try {
    process.env.TEST_PRODUCT_URL = await addressOf(child);
    process.env.TEST_MAIL_LIST_PORT = String(
      JSON.parse(readFileSync(path.join(dataDir, 'running.json'), 'utf8')).ports.mailList,
    );
  } catch (error) {
    // Without a set-up there is no teardown either.
    child.kill('SIGKILL');
    rmSync(dataDir, { recursive: true, force: true });
    throw error;
  }
};
