import { type ChildProcess, spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { processIdentity } from '@foldwright/server/setup/processes.mjs';

/** A process of the set-up under test, and what it has said so far, line by line. */
export interface WatchedProcess {
  readonly child: ChildProcess;
  readonly lines: readonly string[];
  readonly errors: readonly string[];
  /** The code it ended with, or the signal that ended it. */
  readonly ended: Promise<number | NodeJS.Signals>;
}

/** Start a process and listen to it. */
export function watchProcess(
  command: string,
  args: readonly string[],
  options: { readonly env?: NodeJS.ProcessEnv; readonly cwd?: string; readonly detached?: boolean } = {},
): WatchedProcess {
  const child = spawn(command, args, { ...options, stdio: ['pipe', 'pipe', 'pipe'] });
  const lines: string[] = [];
  const errors: string[] = [];
  createInterface({ input: child.stdout }).on('line', (line) => lines.push(line));
  createInterface({ input: child.stderr }).on('line', (line) => errors.push(line));
  const ended = new Promise<number | NodeJS.Signals>((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code, signal) => resolve(signal ?? code ?? 0));
  });
  return { child, lines, errors, ended };
}

/**
 * Look again and again until something is there.
 * @throws when it is not there in time, with the words that say what was awaited
 */
export async function until<T>(
  what: string,
  look: () => T | undefined | Promise<T | undefined>,
  patienceMs: number,
): Promise<T> {
  const deadline = Date.now() + patienceMs;
  while (Date.now() < deadline) {
    const found = await look();
    if (found !== undefined && found !== false) return found;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error(`In ${patienceMs} ms there was not: ${what}`);
}

/** Whether a process is running; one that has ended and waits to be buried is not. */
export function isAlive(pid: number): boolean {
  return processIdentity(pid) !== undefined;
}
