// `npm run database`: the database of this checkout alone, for looking into it while the product is down.
import path from 'node:path';
import { startCluster } from './cluster.mjs';
import { ensureDebianPackages, MissingPackagesError } from './debian.mjs';
import { DATABASE, portsOfLastStart } from './installation.mjs';
import { places, readSettings, SettingsError } from './settings.mjs';
import { startWatchdog } from './watchdog.mjs';

async function open() {
  ensureDebianPackages();
  const where = places(readSettings());
  const home = path.join(where.dataDir, 'postgres');
  const watchdog = startWatchdog();
  const cluster = await startCluster({ home, port: portsOfLastStart(where).database });
  cluster.ensureDatabase(DATABASE);
  process.stdout.write(`${cluster.ownerUrl(DATABASE)}\n`);
  if (cluster.wasRunning) {
    // Somebody else started it and will stop it.
    await watchdog.dismiss();
    return;
  }
  watchdog.tell({ cluster: home });
  process.stdout.write('Ctrl-C stops it.\n');
  const timer = setInterval(() => undefined, 60_000);
  const close = async () => {
    clearInterval(timer);
    await cluster.stop();
    await watchdog.dismiss();
  };
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.once(signal, () => void close());
}

await open().catch((error) => {
  const isPlain = error instanceof SettingsError || error instanceof MissingPackagesError;
  process.stderr.write(`${isPlain ? error.message : error.stack}\n`);
  process.exit(1);
});
