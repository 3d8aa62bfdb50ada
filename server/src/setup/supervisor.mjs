// Starts processes, keeps them running, and ends all of them and nothing else.
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { pause, processIdentity, signalGroup } from './processes.mjs';

/** How long a process may take to end in order. */
const GRACE_MS = 8000;
const FIRST_PAUSE_MS = 200;
const LONGEST_PAUSE_MS = 10_000;
/** A process that ran this long before it fell is taken to have been well. */
const STEADY_MS = 20_000;
const LOG_LIMIT = 5_000_000;

/**
 * @param {object} options
 * @param {string} options.logs folder for one log per process
 * @param {{tell(message: object): void}} options.watchdog told of every process, for the case that this one is killed
 * @param {(line: string) => void} options.report told when a kept process fell
 * @param {number} [options.graceMs] how long a process may take to end in order
 */
export function createSupervisor({ logs, watchdog, report, graceMs = GRACE_MS }) {
  /** Identities of the groups that are running. */
  const groups = new Map();
  let isStopping = false;

  function openLog(name) {
    const file = path.join(logs, `${name}.log`);
    if (fs.existsSync(file) && fs.statSync(file).size > LOG_LIMIT) fs.renameSync(file, `${file}.old`);
    return { file, descriptor: fs.openSync(file, 'a', 0o600) };
  }

  function launch(name, command, args, { env = process.env, cwd }) {
    if (isStopping) throw new StoppedError();
    const { file, descriptor } = openLog(name);
    const from = fs.statSync(file).size;
    // A group of its own, so that its own children end with it, and so that Ctrl-C reaches only the supervisor, which
    // then ends everything in order.
    const child = spawn(command, args, { detached: true, cwd, env, stdio: ['ignore', descriptor, descriptor] });
    fs.closeSync(descriptor);
    const identity = child.pid === undefined ? undefined : processIdentity(child.pid);
    const ended = new Promise((resolve) => {
      child.once('error', (error) => resolve({ reason: error.message, code: 1 }));
      child.once('exit', (code, signal) => resolve({ reason: signal ?? `exit ${code}`, code: code ?? 1 }));
    }).then((end) => {
      if (identity !== undefined) {
        // Members of its group that it left behind end with it.
        signalGroup(identity, 'SIGKILL');
        groups.delete(identity);
        watchdog.tell({ forget: identity });
      }
      return end;
    });
    if (identity !== undefined) {
      groups.set(identity, ended);
      watchdog.tell({ watch: identity });
    }
    const tail = (lines = 25) =>
      fs.readFileSync(file).subarray(from).toString('utf8').trim().split('\n').slice(-lines).join('\n');
    return { child, ended, tail };
  }

  /** Run a command to its end; what it says goes to the log, and into the error when it fails. */
  async function run(name, command, args, options = {}) {
    const { ended, tail } = launch(name, command, args, options);
    const { code, reason } = await ended;
    if (isStopping) throw new StoppedError();
    if (code !== 0) throw new CommandError(`${name} failed (${reason}):\n${tail()}`);
    return tail(10_000);
  }

  /** Start a process and start it again whenever it falls, at once the first time, then ever more slowly. */
  function keep(name, command, args, options = {}) {
    const kept = { name, pid: undefined, falls: 0, lastWords: () => '' };
    const begin = () => {
      const began = Date.now();
      const { child, ended, tail } = launch(name, command, args, options);
      kept.pid = child.pid;
      kept.lastWords = tail;
      void ended.then(async ({ reason }) => {
        if (isStopping) return;
        kept.falls = Date.now() - began > STEADY_MS ? 1 : kept.falls + 1;
        const wait = Math.min(LONGEST_PAUSE_MS, FIRST_PAUSE_MS * 2 ** (kept.falls - 1));
        report(
          `${name} ended (${reason}); starting it again in ${wait / 1000} s. Its log: ${path.join(logs, `${name}.log`)}`,
        );
        await pause(wait);
        if (!isStopping) begin();
      });
    };
    begin();
    return kept;
  }

  /** End every process started here and wait until they are gone. */
  async function stop() {
    isStopping = true;
    for (const identity of groups.keys()) signalGroup(identity, 'SIGTERM');
    const gone = Promise.all(groups.values());
    await Promise.race([gone, pause(graceMs)]);
    for (const identity of groups.keys()) signalGroup(identity, 'SIGKILL');
    await gone;
  }

  return { run, keep, stop };
}

/** A command failed; the message holds what it said last, which tells more than where it was called from. */
export class CommandError extends Error {}

/** Something was asked for after the stop had begun. */
export class StoppedError extends Error {
  constructor() {
    super('Stopped.');
    this.name = 'StoppedError';
  }
}
