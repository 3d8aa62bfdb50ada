import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { answersOn } from '@foldwright/server/setup/ports.mjs';
import { isAlive, until, type WatchedProcess, watchProcess } from './watched-process';

const ROOT = path.resolve(__dirname, '../..');
const START = path.join(ROOT, 'server/src/setup/start.mjs');
/** A second start may take this long. */
const SECOND_START_MS = 20_000;

jest.setTimeout(180_000);

interface Running {
  readonly pid: number;
  readonly url: string;
  readonly ports: Readonly<Record<string, number>>;
  readonly processes: { readonly web: number; readonly worker: number };
}

describe('npm start', () => {
  let dataDir: string;
  let others: WatchedProcess[];

  // One data folder for all: what the first test leaves is what a second start finds.
  beforeAll(() => {
    dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'start-'));
    fs.chmodSync(dataDir, 0o755);
  });
  afterAll(() => fs.rmSync(dataDir, { recursive: true, force: true }));

  beforeEach(() => {
    others = [];
  });
  afterEach(async () => {
    for (const { child } of others) if (child.exitCode === null && child.signalCode === null) child.kill('SIGTERM');
    await Promise.all(others.map(({ ended }) => ended));
  });

  const watch = (command: string, args: readonly string[]): WatchedProcess => {
    const env = { ...process.env, FOLDWRIGHT_DATA_DIR: dataDir, NODE_ENV: 'production' };
    const watched = watchProcess(command, args, { env, cwd: ROOT });
    others.push(watched);
    return watched;
  };

  const untilRunning = async (watched: WatchedProcess): Promise<Running> => {
    let end: number | NodeJS.Signals | undefined;
    void watched.ended.then((code) => (end = code));
    const line = await until(
      'an address',
      () => {
        if (end !== undefined)
          throw new Error(`It ended with ${end}:\n${watched.lines.join('\n')}\n${watched.errors.join('\n')}`);
        return watched.lines.find((each) => each.startsWith('Foldwright runs at '));
      },
      120_000,
    );
    const running = JSON.parse(fs.readFileSync(path.join(dataDir, 'running.json'), 'utf8')) as Running;
    expect(line).toBe(`Foldwright runs at ${running.url}`);
    return running;
  };

  const nothingIsLeft = async ({ ports, processes }: Running): Promise<boolean> => {
    const answers = await Promise.all(Object.values(ports).map((port) => answersOn(port)));
    return answers.every((isAnswering) => !isAnswering) && !isAlive(processes.web) && !isAlive(processes.worker);
  };

  it('brings the product up, tells how to sign in, ends on Ctrl-C, and is back within 20 s', async () => {
    const first = watch(process.execPath, [START]);
    const running = await untilRunning(first);
    const health = await fetch(`${running.url}/api/health`);
    expect(health.status).toBe(200);
    const page = await fetch(running.url);
    expect(page.headers.get('content-type')).toMatch(/html/);
    for (const email of ['imogen', 'tomasz', 'ada']) {
      await until(
        `${email} among the sign-ins`,
        () => first.lines.some((line) => line.includes(`${email}@larkfield.example.test`)),
        2000,
      );
    }

    const rival = watch(process.execPath, [START]);
    expect(await rival.ended).toBe(1);
    expect(rival.errors.join('\n')).toContain(`It answers at ${running.url}.`);
    expect((await fetch(`${running.url}/api/health`)).status).toBe(200);

    first.child.kill('SIGINT');
    expect(await first.ended).toBe(0);
    expect(await nothingIsLeft(running)).toBe(true);
    expect(fs.existsSync(path.join(dataDir, 'running.json'))).toBe(false);

    const began = performance.now();
    const second = watch(process.execPath, [START]);
    const again = await untilRunning(second);
    expect(performance.now() - began).toBeLessThan(SECOND_START_MS);
    // The web process goes back to its usual port as soon as that is free; the services stay where they were.
    expect({ ...again.ports, web: 0 }).toEqual({ ...running.ports, web: 0 });
    second.child.kill('SIGTERM');
    expect(await second.ended).toBe(0);
    expect(await nothingIsLeft(again)).toBe(true);
  });

  it('ends when its parent is killed', async () => {
    // The shell stays between the test and the start, as npm does: the second command keeps it from stepping aside.
    const shell = watch('/bin/sh', ['-c', `'${process.execPath}' '${START}'; true`]);
    const running = await untilRunning(shell);
    expect(running.pid).not.toBe(shell.child.pid);
    shell.child.kill('SIGKILL');
    await until('the end of everything', () => nothingIsLeft(running), 20_000);
    await until('the end of the start itself', () => !isAlive(running.pid), 5000);
  });

  it('brings a fallen worker back at once', async () => {
    const start = watch(process.execPath, [START]);
    const running = await untilRunning(start);
    process.kill(running.processes.worker, 'SIGKILL');
    await until('a line about it', () => start.lines.find((line) => line.startsWith('worker ended (SIGKILL)')), 3000);
    const children = () =>
      spawnSync('pgrep', ['-f', 'dist/server/worker.cjs', '-P', String(running.pid)], { encoding: 'utf8' });
    await until('a new worker', () => children().stdout.trim() !== '', 3000);
    start.child.kill('SIGTERM');
    expect(await start.ended).toBe(0);
    expect(await nothingIsLeft(running)).toBe(true);
  });
});
