import { spawn } from 'node:child_process';
import path from 'node:path';

/**
 * Start the process that stops everything should this one be killed outright, and keep it running.
 * @returns an object whose `tell` passes on what there is to stop, and whose `dismiss` ends it without any act
 */
export function startWatchdog() {
  const told = [];
  let child;
  let isDismissed = false;

  const send = (message) => {
    // A pipe that broke a moment ago is found out by the exit handler, which starts anew and repeats everything.
    if (child.stdin.writable) child.stdin.write(`${JSON.stringify(message)}\n`);
  };
  const begin = () => {
    // A session of its own: a signal to the terminal, or to the supervisor's group, must not reach it.
    child = spawn(process.execPath, [path.join(import.meta.dirname, 'watch-parent.mjs')], {
      detached: true,
      stdio: ['pipe', 'ignore', 'ignore'],
    });
    child.stdin.on('error', () => undefined);
    child.on('exit', () => {
      if (!isDismissed) begin();
    });
    // The watchdog must not keep this process alive: it is the other way round.
    child.unref();
    child.stdin.unref();
    told.forEach(send);
  };
  begin();

  return {
    pid: () => child.pid,
    tell(message) {
      told.push(message);
      send(message);
    },
    dismiss() {
      if (isDismissed) return Promise.resolve();
      isDismissed = true;
      const gone = new Promise((resolve) => child.once('exit', resolve));
      send({ farewell: true });
      child.stdin.end();
      child.ref();
      return gone;
    },
  };
}
