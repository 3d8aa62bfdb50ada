import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { answersOn } from '@foldwright/server/setup/ports.mjs';
import { isAlive, until, type WatchedProcess, watchProcess } from './watched-process';

jest.setTimeout(60_000);

interface Started {
  readonly plain: number;
  readonly parent: number;
  readonly deaf: number;
  readonly watchdog: number;
  readonly databasePort: number;
}

describe('a supervisor', () => {
  let folder: string;
  let host: WatchedProcess;
  let started: Started;
  let grandchild: number;
  let bystander: WatchedProcess;

  beforeEach(async () => {
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'supervised-'));
    fs.chmodSync(folder, 0o755);
    bystander = watchProcess(process.execPath, ['-e', 'setInterval(() => undefined, 1000)']);
    host = watchProcess(process.execPath, [path.join(__dirname, 'supervised-host.mjs'), folder]);
    const first = await until('a word from the supervisor', () => host.lines[0] ?? host.errors[0], 40_000);
    started = JSON.parse(first) as Started;
    const note = path.join(folder, 'grandchild');
    grandchild = await until(
      'a grandchild',
      () => (fs.existsSync(note) && Number(fs.readFileSync(note))) || undefined,
      10_000,
    );
  });

  afterEach(async () => {
    host.child.kill('SIGKILL');
    bystander.child.kill('SIGKILL');
    await until('the end of the database', async () => !(await answersOn(started.databasePort)), 15_000);
    fs.rmSync(folder, { recursive: true, force: true });
  });

  const processes = () => [started.plain, started.parent, started.deaf, grandchild];
  const allGone = async () => processes().every((pid) => !isAlive(pid)) && !(await answersOn(started.databasePort));

  it('ends in order what it started, a process that will not listen included, and nothing else', async () => {
    expect(processes().every(isAlive)).toBe(true);
    host.child.stdin?.write('\n');
    expect(await host.ended).toBe(0);
    expect(await allGone()).toBe(true);
    expect(isAlive(started.watchdog)).toBe(false);
    expect(bystander.child.pid !== undefined && isAlive(bystander.child.pid)).toBe(true);
  });

  it('is followed by what it started when it is killed outright', async () => {
    expect(await answersOn(started.databasePort)).toBe(true);
    host.child.kill('SIGKILL');
    expect(await host.ended).toBe('SIGKILL');
    await until('the end of everything', allGone, 20_000);
    await until('the end of the watchdog', () => !isAlive(started.watchdog), 5000);
    expect(bystander.child.pid !== undefined && isAlive(bystander.child.pid)).toBe(true);
  });

  it('is watched over again when its watchdog is killed first', async () => {
    process.kill(started.watchdog, 'SIGKILL');
    await until('the end of the watchdog', () => !isAlive(started.watchdog), 5000);
    // The new one needs a moment to begin listening; what it is told waits in the pipe.
    await new Promise((resolve) => setTimeout(resolve, 300));
    host.child.kill('SIGKILL');
    await until('the end of everything', allGone, 20_000);
  });

  it('starts a fallen process again at once', async () => {
    process.kill(started.plain, 'SIGKILL');
    const successor = await until(
      'a new process',
      () => {
        const last = JSON.parse(host.lines.at(-1) ?? '{}') as { plain?: number };
        return last.plain !== undefined && last.plain !== started.plain ? last.plain : undefined;
      },
      3000,
    );
    expect(isAlive(successor)).toBe(true);
    expect(host.lines.some((line) => line.includes('plain ended (SIGKILL)'))).toBe(true);
  });
});
