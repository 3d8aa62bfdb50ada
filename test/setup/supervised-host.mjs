// A small supervisor for the tests: a cluster, a well-behaved process, one with a child of its own, and one that will
// not listen. Says what it started in one line of JSON, then waits. An empty line on its input asks it to end in order.
import path from 'node:path';
import { startCluster } from '../../server/src/setup/cluster.mjs';
import { createSupervisor } from '../../server/src/setup/supervisor.mjs';
import { startWatchdog } from '../../server/src/setup/watchdog.mjs';

const folder = process.argv[2];
const node = (code) => [process.execPath, ['-e', code]];
const forever = 'setInterval(() => undefined, 1000);';

const watchdog = startWatchdog();
const report = (line) => process.stdout.write(`${JSON.stringify({ report: line })}\n`);
const supervisor = createSupervisor({ logs: folder, watchdog, report, graceMs: 1000 });
const home = path.join(folder, 'postgres');
watchdog.tell({ cluster: home });
const cluster = await startCluster({ home, isDisposable: true });

const plain = supervisor.keep('plain', ...node(forever));
const parent = supervisor.keep(
  'parent',
  ...node(
    `const { spawn } = require('node:child_process'); const { writeFileSync } = require('node:fs');
     const child = spawn(process.execPath, ['-e', ${JSON.stringify(forever)}]);
     writeFileSync(${JSON.stringify(path.join(folder, 'grandchild'))}, String(child.pid)); ${forever}`,
  ),
);
const deaf = supervisor.keep('deaf', ...node(`process.on('SIGTERM', () => undefined); ${forever}`));

process.stdout.write(
  `${JSON.stringify({
    plain: plain.pid,
    parent: parent.pid,
    deaf: deaf.pid,
    watchdog: watchdog.pid(),
    databasePort: cluster.port,
    databaseUrl: cluster.ownerUrl(),
  })}\n`,
);
const again = setInterval(() => process.stdout.write(`${JSON.stringify({ plain: plain.pid })}\n`), 100);

process.stdin.once('data', async () => {
  clearInterval(again);
  await supervisor.stop();
  await cluster.stop();
  await watchdog.dismiss();
  process.exit(0);
});
