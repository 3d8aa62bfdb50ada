// `npm test`: the same set-up as a start, then every check and every test; the last line sums them up.
// `npm test -- --only node,database [part of a path …]` runs some of it.
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { buildServer, buildWeb } from './bundle.mjs';
import { ensureDebianPackages, MissingPackagesError } from './debian.mjs';
import { ensurePackages } from './packages.mjs';
import { dataDirectory, ensureDirectory, readJson, ROOT } from './places.mjs';
import { processIdentity, signalGroup } from './processes.mjs';
import { quietRun } from './quiet-run.mjs';
import { readSettings, SettingsError } from './settings.mjs';
import { releaseTestCluster, useTestCluster } from './test-cluster.mjs';
import { startWatchdog } from './watchdog.mjs';

/** A part that takes longer than this hangs. */
const PATIENCE_MS = 30 * 60_000;

const bin = (name) => path.join('node_modules/.bin', name);

/** Parts in the order in which they run; those of one group run side by side. */
const CHECKS = [
  [
    { name: 'lint', check: () => quietRun(bin('eslint'), ['.', '--max-warnings=0'], { cwd: ROOT }) },
    { name: 'types', check: () => quietRun(bin('tsc'), ['-b'], { cwd: ROOT }) },
  ],
  [
    {
      name: 'web-types',
      check: () => quietRun(bin('tsc'), ['--noEmit', '-p', 'projects/foldwright/tsconfig.spec.json'], { cwd: ROOT }),
    },
    { name: 'build', check: () => buildServer(quietRun).then(() => buildWeb(quietRun)) },
  ],
];
const PROJECTS = [
  { name: 'node', workers: 2 },
  { name: 'database', workers: 2, usesDatabase: true },
  { name: 'web', workers: 2 },
  { name: 'e2e', workers: 2, usesDatabase: true, usesBuild: true },
];

const NAMES = [...CHECKS.flat(), ...PROJECTS].map(({ name }) => name);

const say = (line) => process.stdout.write(`${line}\n`);
const results = [];
let running;

function record(name, began, { passed, failed, note = '' }) {
  results.push({ name, passed, failed, note, seconds: (performance.now() - began) / 1000 });
}

async function runCheck({ name, check }) {
  const began = performance.now();
  say(`\n▸ ${name}`);
  try {
    await check();
    record(name, began, { passed: 1, failed: 0 });
  } catch (error) {
    say(`\n${name} failed:\n${error.message}`);
    record(name, began, { passed: 0, failed: 1 });
  }
}

/** Run a command that speaks to the terminal itself. */
function runVisibly(command, args, watchdog) {
  return new Promise((resolve) => {
    const child = spawn(command, args, { cwd: ROOT, detached: true, stdio: ['ignore', 'inherit', 'inherit'] });
    running = processIdentity(child.pid);
    watchdog.tell({ watch: running });
    const limit = setTimeout(() => signalGroup(running, 'SIGKILL'), PATIENCE_MS);
    child.once('exit', (code, signal) => {
      clearTimeout(limit);
      watchdog.tell({ forget: running });
      running = undefined;
      resolve(signal ?? code);
    });
  });
}

async function runProject({ name, workers }, patterns, watchdog) {
  const began = performance.now();
  say(`\n▸ ${name}`);
  const report = path.join(ensureDirectory(path.join(dataDirectory(), 'test')), `${name}.json`);
  fs.rmSync(report, { force: true });
  const options = ['--selectProjects', name, `--maxWorkers=${workers}`, '--json', `--outputFile=${report}`];
  const end = await runVisibly(bin('jest'), [...options, ...patterns], watchdog);
  const outcome = readJson(report);
  if (outcome === undefined) {
    // Nothing was counted: preparing failed, or it hung and was ended.
    record(name, began, { passed: 0, failed: 1, note: `ended without a report (${end})` });
    return;
  }
  const skipped = outcome.numPendingTests + outcome.numTodoTests;
  // A file that could not be loaded has no tests to count, yet it failed; and a skipped test passes nothing.
  const failed = outcome.numFailedTests + outcome.numRuntimeErrorTestSuites + skipped;
  const notes = [skipped > 0 ? `${skipped} skipped, counted as failed` : '', end !== 0 ? `jest ended with ${end}` : ''];
  record(name, began, {
    passed: outcome.numPassedTests,
    // jest can fail for other reasons than a test: a global teardown, an open project without tests.
    failed: failed === 0 && end !== 0 ? 1 : failed,
    note: notes.filter(Boolean).join('; '),
  });
}

function readArguments(args) {
  const at = args.indexOf('--only');
  if (at === -1) return { chosen: NAMES, patterns: args };
  const chosen = (args[at + 1] ?? '').split(',').filter(Boolean);
  const unknown = chosen.filter((name) => !NAMES.includes(name));
  if (chosen.length === 0 || unknown.length > 0) {
    throw new SettingsError([`--only takes names out of ${NAMES.join(', ')}, parted by commas.`]);
  }
  return { chosen, patterns: args.filter((_, index) => index !== at && index !== at + 1) };
}

async function prepare() {
  readSettings();
  const added = ensureDebianPackages({ forTests: true });
  if (added.length > 0) say(`Debian packages installed: ${added.join(', ')}`);
  if (await ensurePackages((command, args) => quietRun(command, args, { cwd: ROOT }))) say('npm packages installed');
}

async function test() {
  const { chosen, patterns } = readArguments(process.argv.slice(2));
  await prepare();
  const wanted = ({ name }) => chosen.includes(name);
  const projects = PROJECTS.filter(wanted);
  const watchdog = startWatchdog();
  const databaseUse = projects.some(({ usesDatabase }) => usesDatabase) ? (await useTestCluster()).use : undefined;
  if (databaseUse !== undefined) watchdog.tell({ testCluster: databaseUse });

  for (const group of CHECKS) {
    const isNeeded = (part) => wanted(part) || (part.name === 'build' && projects.some(({ usesBuild }) => usesBuild));
    await Promise.all(group.filter(isNeeded).map(runCheck));
  }
  for (const project of projects) await runProject(project, patterns, watchdog);

  if (databaseUse !== undefined) await releaseTestCluster(databaseUse);
  await watchdog.dismiss();
}

function summarise() {
  say('');
  for (const { name, passed, failed, seconds, note } of results) {
    const counts = `${String(passed).padStart(6)} passed ${String(failed).padStart(4)} failed`;
    say(`${name.padEnd(10)} ${counts} ${seconds.toFixed(1).padStart(7)} s${note ? `  ${note}` : ''}`);
  }
  const sum = (key) => results.reduce((total, result) => total + result[key], 0);
  say(`\n${sum('passed')} passed, ${sum('failed')} failed`);
  return sum('failed') === 0 && sum('passed') > 0;
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(signal, () => {
    // The watchdog sees this process gone and stops what is left, the database included.
    if (running !== undefined) signalGroup(running, 'SIGTERM');
    process.exit(130);
  });
}

try {
  await test();
  process.exitCode = summarise() ? 0 : 1;
} catch (error) {
  const isPlain = error instanceof SettingsError || error instanceof MissingPackagesError;
  process.stderr.write(`${isPlain ? error.message : error.stack}\n`);
  say('0 passed, 1 failed');
  process.exit(1);
}
