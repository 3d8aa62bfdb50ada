// Runs once per call of jest, after the journeys: stops the product and takes its data away.
const { rmSync } = require('node:fs');

/** A stop that takes longer is ended by force; the product's own watchdog clears up after it. */
const STOPPED_WITHIN_MS = 30_000;

module.exports = async function stopProduct() {
  const { child, dataDir } = globalThis.foldwrightProduct;
  if (child.exitCode === null && child.signalCode === null) {
    const ended = new Promise((resolve) => child.once('exit', resolve));
    const limit = setTimeout(() => child.kill('SIGKILL'), STOPPED_WITHIN_MS);
    child.kill('SIGTERM');
    await ended;
    clearTimeout(limit);
  }
  rmSync(dataDir, { recursive: true, force: true, maxRetries: 20, retryDelay: 100 });
};
