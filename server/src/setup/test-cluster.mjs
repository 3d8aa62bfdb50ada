// The cluster the tests use: shared by all runs that happen at the same time, thrown away by the first run of the next.
import fs from 'node:fs';
import path from 'node:path';
import { startCluster, stopCluster } from './cluster.mjs';
import { dataDirectory, ensureDirectory } from './places.mjs';
import { isRunning, processIdentity, whileLocked } from './processes.mjs';

const folderOf = (dataDir) => path.join(dataDir, 'test');
const homeOf = (dataDir) => path.join(folderOf(dataDir), 'postgres');
const usersOf = (dataDir) => path.join(folderOf(dataDir), 'users');
const lockOf = (dataDir) => path.join(folderOf(dataDir), 'lock');
const markOf = (dataDir, user) => path.join(usersOf(dataDir), user.replace(':', '-'));

/**
 * Start the test cluster, or join the run that already did.
 * @returns the cluster, and the use to hand to `releaseTestCluster` (also by somebody else, once this process is dead)
 */
export async function useTestCluster({ dataDir = dataDirectory() } = {}) {
  const user = processIdentity(process.pid);
  ensureDirectory(dataDir);
  return whileLocked(lockOf(dataDir), async () => {
    const cluster = await startCluster({ home: homeOf(dataDir), isDisposable: true });
    ensureDirectory(usersOf(dataDir));
    fs.writeFileSync(markOf(dataDir, user), user);
    return { cluster, use: { dataDir, user } };
  });
}

/** End one run's use of the test cluster; the last one to leave stops it. */
export async function releaseTestCluster({ dataDir, user }) {
  await whileLocked(lockOf(dataDir), async () => {
    fs.rmSync(markOf(dataDir, user), { force: true });
    const marks = fs.readdirSync(usersOf(dataDir)).map((name) => path.join(usersOf(dataDir), name));
    for (const mark of marks) if (!isRunning(fs.readFileSync(mark, 'utf8'))) fs.rmSync(mark);
    if (fs.readdirSync(usersOf(dataDir)).length === 0) await stopCluster({ home: homeOf(dataDir), mode: 'immediate' });
  });
}
