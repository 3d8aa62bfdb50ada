import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { until, watchProcess } from '../setup/watched-process';

const ROOT = path.resolve(__dirname, '../..');
const START = path.join(ROOT, 'server/src/setup/start.mjs');
const STARTED_WITHIN_MS = 240_000;
/** The stand-ins hurry, so that an order is through in seconds. */
const PACE_MS = '300';

export interface RunningProduct {
  readonly url: string;
  stop(): Promise<void>;
}

/** Starts the whole product as `npm start` does, on a data folder of its own with the demo in it. */
export async function startProduct(): Promise<RunningProduct> {
  const dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'journey-'));
  // The database's account has to get in.
  fs.chmodSync(dataDir, 0o755);
  const env = { ...process.env, FOLDWRIGHT_DATA_DIR: dataDir, FAKE_PACE_MS: PACE_MS, NODE_ENV: 'production' };
  const start = watchProcess(process.execPath, [START], { env, cwd: ROOT });
  let end: number | NodeJS.Signals | undefined;
  void start.ended.then((code) => (end = code));
  const stop = async (): Promise<void> => {
    if (end === undefined) start.child.kill('SIGTERM');
    await start.ended;
    fs.rmSync(dataDir, { recursive: true, force: true });
  };
  try {
    const line = await until(
      'the address of the product',
      () => {
        if (end !== undefined)
          throw new Error(`It ended with ${end}:\n${start.lines.join('\n')}\n${start.errors.join('\n')}`);
        return start.lines.find((each) => each.startsWith('Foldwright runs at '));
      },
      STARTED_WITHIN_MS,
    );
    return { url: line.replace('Foldwright runs at ', '').trim(), stop };
  } catch (error) {
    await stop();
    throw error;
  }
}
