// The one process that outlives a supervisor which was killed outright, just long enough to stop what it had started.
// It is told what that is through its standard input; when the input ends without a farewell, it acts.
import { createInterface } from 'node:readline';
import { stopCluster } from './cluster.mjs';
import { isRunning, pause, signalGroup } from './processes.mjs';
import { releaseTestCluster } from './test-cluster.mjs';

const GRACE_MS = 4000;
const LATE_START_MS = 2000;

const groups = new Set();
const clusters = new Set();
const testClusterUses = [];
let isDismissed = false;

function take(message) {
  if (message.watch !== undefined) groups.add(message.watch);
  if (message.forget !== undefined) groups.delete(message.forget);
  if (message.cluster !== undefined) clusters.add(message.cluster);
  if (message.testCluster !== undefined) testClusterUses.push(message.testCluster);
  if (message.farewell === true) isDismissed = true;
}

async function stopEverything() {
  for (const group of groups) signalGroup(group, 'SIGTERM');
  const deadline = Date.now() + GRACE_MS;
  while (Date.now() < deadline && [...groups].some(isRunning)) await pause(100);
  for (const group of groups) signalGroup(group, 'SIGKILL');
  for (const home of clusters) {
    if (await stopCluster({ home })) continue;
    // The supervisor may have been killed while it was starting this one, which then comes up a moment later.
    await pause(LATE_START_MS);
    await stopCluster({ home });
  }
  for (const use of testClusterUses) await releaseTestCluster(use);
}

// Signals meant for the supervisor's terminal are not meant for this process: it goes when its input ends.
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => undefined);

const lines = createInterface({ input: process.stdin });
lines.on('line', (line) => take(JSON.parse(line)));
lines.on('close', async () => {
  if (!isDismissed) await stopEverything();
  process.exit(0);
});
