// Telling processes apart: a number alone is not enough, since the system gives numbers out again.
import fs from 'node:fs';
import path from 'node:path';

/**
 * A name for a running process that no later process can bear: its number and the moment it began.
 * @returns {string | undefined} undefined when there is no such process, or only its remains (a zombie).
 */
export function processIdentity(pid) {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The second field is the name in brackets and may itself hold brackets and blanks.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    const state = fields[0];
    const began = fields[19];
    return state === 'Z' || state === 'X' ? undefined : `${pid}:${began}`;
  } catch {
    // No /proc entry: the process is gone.
    return undefined;
  }
}

/** Whether the process that bore this identity is still running. */
export function isRunning(identity) {
  const pid = Number(String(identity).split(':')[0]);
  return Number.isInteger(pid) && pid > 0 && processIdentity(pid) === identity;
}

/**
 * Send a signal to a process and to all that share its group, provided it still is the process meant.
 * @returns {boolean} whether there was anything to send it to
 */
export function signalGroup(identity, signal) {
  const pid = Number(String(identity).split(':')[0]);
  // A group outlives its leader while members remain; a leader that was replaced must not be touched.
  const leader = processIdentity(pid);
  if (leader !== undefined && leader !== identity) return false;
  try {
    process.kill(-pid, signal);
    return true;
  } catch {
    // ESRCH: the group is empty.
    return false;
  }
}

/** Wait without doing anything. */
export const pause = (milliseconds) => new Promise((resolve) => setTimeout(resolve, milliseconds));

/**
 * Run something while no other process does: the lock is a symbolic link whose target names its holder, so that taking
 * it is one step and a lock left behind by a killed process is recognised.
 * @template T
 * @param {string} lock path of the lock
 * @param {() => Promise<T>} action
 * @returns {Promise<T>}
 */
export async function whileLocked(lock, action, { patienceMs = 600_000 } = {}) {
  fs.mkdirSync(path.dirname(lock), { recursive: true });
  const mine = processIdentity(process.pid);
  const deadline = Date.now() + patienceMs;
  for (;;) {
    try {
      fs.symlinkSync(mine, lock);
      break;
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
      const holder = readLink(lock);
      if (holder !== undefined && !isRunning(holder)) fs.rmSync(lock, { force: true });
      else if (Date.now() > deadline)
        throw new Error(`Another process (${holder}) has held ${lock} for too long.`, { cause: error });
      else await pause(100);
    }
  }
  try {
    return await action();
  } finally {
    if (readLink(lock) === mine) fs.rmSync(lock, { force: true });
  }
}

function readLink(lock) {
  try {
    return fs.readlinkSync(lock);
  } catch {
    // Released between two looks.
    return undefined;
  }
}
