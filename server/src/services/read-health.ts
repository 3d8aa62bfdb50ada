import type { healthSchema } from '@foldwright/shared/contracts/system';
import * as z from 'zod/mini';
import type { Database } from '../database/database';
import type { FileStore } from '../files/file-store';

export type Health = z.output<typeof healthSchema>;
type Check = Health['checks'][number];

const WORKER_SILENCE_S = 10;
const QUEUE_WAIT_S = 60;
const LEAST_FREE_BYTES = 500 * 1024 * 1024;
const PATIENCE_MS = 3000;

const ageRow = z.tuple([z.object({ seconds: z.nullable(z.number()) })]);

/** Details are for everybody, so they name neither addresses nor errors. */
async function check(name: Check['name'], work: () => Promise<{ ok: boolean; detail: string }>): Promise<Check> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(new Error('late')), PATIENCE_MS);
  });
  try {
    return { name, ...(await Promise.race([work(), late])) };
  } catch {
    // Whatever broke, the answer is the same: it doesn't work; the log of the part itself says why.
    return { name, ok: false, detail: 'no answer' };
  } finally {
    clearTimeout(timer);
  }
}

/** Whether everything that work depends on answers: database, queue, a living worker, room on the disk. */
export async function readHealth({ pool }: Database, files: FileStore): Promise<Health> {
  const age = async (statement: string): Promise<number | null> => {
    const { rows } = await pool.query(statement);
    return ageRow.parse(rows)[0].seconds;
  };
  const checks = await Promise.all([
    check('database', async () => {
      await pool.query('SELECT 1');
      return { ok: true, detail: 'answers' };
    }),
    check('queue', async () => {
      const waiting = await age(
        `SELECT EXTRACT(EPOCH FROM now() - MIN(start_after))::float8 AS seconds
         FROM pgboss.job WHERE state = 'created' AND start_after <= now()`,
      );
      const seconds = Math.round(waiting ?? 0);
      return { ok: seconds < QUEUE_WAIT_S, detail: seconds < 1 ? 'nothing waits' : `longest wait ${seconds} s` };
    }),
    check('worker', async () => {
      const silence = await age(
        'SELECT EXTRACT(EPOCH FROM now() - MAX(beat_at))::float8 AS seconds FROM worker_heartbeats',
      );
      if (silence === null) return { ok: false, detail: 'none has started' };
      return { ok: silence < WORKER_SILENCE_S, detail: `last heard of ${Math.round(silence)} s ago` };
    }),
    check('disk', async () => {
      const free = await files.freeBytes();
      return { ok: free >= LEAST_FREE_BYTES, detail: `${Math.floor(free / 1024 ** 3)} GB free` };
    }),
  ]);
  return { ok: checks.every(({ ok }) => ok), checks };
}
