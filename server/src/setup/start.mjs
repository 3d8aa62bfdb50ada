// `npm start`: from a fresh clone to a running product, and from Ctrl-C to nothing left running.
import fs from 'node:fs';
import path from 'node:path';
import { buildServer, buildWeb, programPath } from './bundle.mjs';
import { startCluster } from './cluster.mjs';
import { ensureDebianPackages, MissingPackagesError } from './debian.mjs';
import { choosePorts, DATABASE, ownAddress, productEnvironment, standIns } from './installation.mjs';
import { ensurePackages } from './packages.mjs';
import { ensureDirectory, readJson, ROOT, writeJson } from './places.mjs';
import { isRunning, pause, processIdentity } from './processes.mjs';
import { places, readSettings, SettingsError } from './settings.mjs';
import { CommandError, createSupervisor, StoppedError } from './supervisor.mjs';
import { startWatchdog } from './watchdog.mjs';

const HEALTH_PATIENCE_MS = 60_000;
const PARENT_LOOK_MS = 500;

const say = (line = '') => process.stdout.write(`${line}\n`);

/** Everything that must be undone at the end, in the order in which it came about. */
const undo = [];
let supervisor;
let isEnding = false;

async function phase(name, work) {
  if (isEnding) throw new StoppedError();
  const began = performance.now();
  const outcome = await work();
  if (isEnding) throw new StoppedError();
  say(
    `  ${name.padEnd(18)} ${((performance.now() - began) / 1000).toFixed(1).padStart(6)} s${outcome ? `  ${outcome}` : ''}`,
  );
}

/** Only one start per data folder: two supervisors over one database would each end the other's processes. */
function claim({ dataDir }) {
  const file = path.join(dataDir, 'running.json');
  const running = readJson(file);
  if (running?.process !== undefined && isRunning(running.process)) {
    const at = running.url === undefined ? 'It is still starting.' : `It answers at ${running.url}.`;
    throw new SettingsError([`Foldwright already runs from ${dataDir} (process ${running.pid}). ${at}`]);
  }
  const mine = { pid: process.pid, process: processIdentity(process.pid) };
  writeJson(file, mine);
  undo.push(() => {
    if (readJson(file)?.process === mine.process) fs.rmSync(file, { force: true });
  });
  return (more) => writeJson(file, { ...mine, ...more });
}

async function openDatabase(given, where, ports, watchdog) {
  if (given.DATABASE_URL !== undefined) {
    return { owner: given.DATABASE_OWNER_URL, application: given.DATABASE_URL };
  }
  const home = path.join(where.dataDir, 'postgres');
  // Told before it starts: a kill in between must not leave it running. Stopping what does not run does nothing.
  watchdog.tell({ cluster: home });
  const cluster = await startCluster({ home, port: ports.database });
  undo.push(() => cluster.stop());
  cluster.ensureDatabase(DATABASE);
  return { owner: cluster.ownerUrl(DATABASE), application: cluster.applicationUrl(DATABASE) };
}

async function untilHealthy(url, web) {
  const deadline = Date.now() + HEALTH_PATIENCE_MS;
  let last = 'nothing answers';
  while (Date.now() < deadline && !isEnding) {
    try {
      const answer = await fetch(`${url}/api/health`, { signal: AbortSignal.timeout(5000) });
      if (answer.status === 200) return;
      last = `${answer.status} ${await answer.text()}`;
    } catch (error) {
      // Not listening yet, or restarting: the next look tells.
      last = error.cause?.message ?? error.message;
    }
    if (web.falls > 2) break;
    await pause(100);
  }
  if (isEnding) throw new StoppedError();
  throw new CommandError(`The product does not answer at ${url}/api/health (${last}).\n${web.lastWords()}`);
}

function saySignIns() {
  const { people } = JSON.parse(fs.readFileSync(path.join(import.meta.dirname, 'demo/people.json'), 'utf8'));
  const width = (key) => Math.max(...people.map((person) => person[key].length));
  say('\n  Sign in as');
  for (const { role, name, email, password } of people) {
    say(
      `    ${role.padEnd(width('role'))}  ${name.padEnd(width('name'))}  ${email.padEnd(width('email'))}  ${password}`,
    );
  }
}

async function start() {
  const given = readSettings();
  const where = places(given);
  const publish = claim(where);
  const ports = await choosePorts(given, where);

  const watchdog = startWatchdog();
  undo.push(() => watchdog.dismiss());
  supervisor = createSupervisor({ logs: where.logs, watchdog, report: say });
  undo.push(() => supervisor.stop());
  const run = (command, args, options) =>
    supervisor.run(path.basename(command), command, args, { cwd: ROOT, ...options });
  // Only the migration may know how to sign in as the owner of the tables, so that address is not simply passed on.
  const { DATABASE_OWNER_URL: _, ...inherited } = process.env;
  const node = (program, env) => {
    const file = programPath(program);
    if (file === undefined) throw new Error(`The program ${program} is missing from dist/server.`);
    return [process.execPath, [file], { env: { ...inherited, ...env }, cwd: ROOT }];
  };

  say('Foldwright');
  await phase('Debian packages', () => {
    const added = ensureDebianPackages({ needsDatabase: given.DATABASE_URL === undefined });
    return added.length > 0 ? `installed ${added.join(', ')}` : 'present';
  });
  await phase('npm packages', async () => ((await ensurePackages(run)) ? 'installed' : 'present'));
  await phase('server', async () => ((await buildServer(run)) ? 'built' : 'up to date'));
  await phase('web application', async () => {
    if (given.WEB_DIST !== undefined) return 'from WEB_DIST';
    return (await buildWeb(run)) ? 'built' : 'up to date';
  });

  let database;
  await phase('database', async () => {
    database = await openDatabase(given, where, ports, watchdog);
  });
  const env = productEnvironment(given, where, ports, database);
  await phase('migrations', async () => {
    await supervisor.run('migrate', ...node('migrate', { ...env, DATABASE_OWNER_URL: database.owner }));
  });
  await phase('processes', async () => {
    for (const { program, env: fake } of standIns(given, where, ports, env)) {
      ensureDirectory(fake.FAKE_STATE_DIR, 0o700);
      supervisor.keep(program, ...node(program, fake));
    }
    const worker = supervisor.keep('worker', ...node('worker', env));
    const web = supervisor.keep('web', ...node('main', env));
    await untilHealthy(ownAddress(given, ports), web);
    publish({ url: env.FOLDWRIGHT_PUBLIC_URL, ports, processes: { web: web.pid, worker: worker.pid } });
  });

  say(`\nFoldwright runs at ${env.FOLDWRIGHT_PUBLIC_URL}`);
  saySignIns();
  const near = path.relative(process.cwd(), where.logs);
  say(`\nCtrl-C ends it. Logs: ${near.startsWith('..') ? where.logs : near}`);
}

/** Undo everything once, and leave. */
async function end(code) {
  if (isEnding) {
    // Asked twice: leave at once. The watchdog sees this process gone and stops the rest.
    process.exit(1);
  }
  isEnding = true;
  await supervisor?.stop();
  await started;
  for (const step of undo.reverse()) {
    try {
      await step();
    } catch (error) {
      // The other steps must still be taken.
      process.stderr.write(`${error.message}\n`);
    }
  }
  process.exit(code);
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void end(0));
// A closed terminal or a reader that went away must not keep the end from being reached.
for (const stream of [process.stdout, process.stderr]) stream.on('error', () => undefined);

const parent = process.ppid;
setInterval(() => {
  if (process.ppid !== parent && !isEnding) void end(0);
}, PARENT_LOOK_MS);

const started = start().catch((error) => {
  if (error instanceof StoppedError) return;
  const isPlain = error instanceof SettingsError || error instanceof MissingPackagesError;
  const words = error instanceof CommandError ? error.message : error.stack;
  process.stderr.write(isPlain ? `${error.message}\n` : `\nFoldwright could not start: ${words}\n`);
  setImmediate(() => void end(1));
});
