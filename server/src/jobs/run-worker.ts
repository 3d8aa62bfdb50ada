import { randomUUID } from 'node:crypto';
import type { Logger } from 'pino';
import type { Database } from '../database/database';
import { listen } from '../database/listen';
import type { Queue } from './queue';
import { WORK_CHANNEL } from './queue';
import { returnAbandonedWork } from './return-abandoned-work';
import type { WorkHandler } from './work-handler';

const BEAT_MS = 1000;
const PRUNE_MS = 10 * 60 * 1000;
/** How often a worker looks by itself; normally it is told. */
const LOOK_SECONDS = 2;

export interface RunningWorker {
  readonly workerId: string;
  stop(): Promise<void>;
}

/**
 * Take work from the queues until stopped. A heartbeat says that this process lives; work of one that fell silent is
 * handed back by any other.
 */
export async function runWorker(options: {
  database: Database;
  queue: Queue;
  handlers: readonly WorkHandler[];
  logger: Logger;
}): Promise<RunningWorker> {
  const { database, queue, handlers, logger } = options;
  const { pool } = database;
  const workerId = randomUUID();
  const ending = new AbortController();
  const takers = new Map<string, string[]>();

  const beat = async (): Promise<void> => {
    await pool.query(
      'INSERT INTO worker_heartbeats (worker_id) VALUES ($1) ON CONFLICT (worker_id) DO UPDATE SET beat_at = now()',
      [workerId],
    );
    const returned = await returnAbandonedWork(pool, queue);
    if (returned > 0) logger.warn({ returned }, 'work of a silent worker was given back');
  };
  const every = (ms: number, what: string, work: () => Promise<void>): NodeJS.Timeout => {
    let isBusy = false;
    return setInterval(() => {
      if (isBusy) return;
      isBusy = true;
      work()
        .catch((error: unknown) => logger.error({ err: error }, what))
        .finally(() => (isBusy = false));
    }, ms);
  };

  await beat();
  const timers = [
    every(BEAT_MS, 'heartbeat', beat),
    every(PRUNE_MS, 'prune', async () => void (await pool.query('SELECT foldwright_prune()'))),
  ];

  for (const handler of handlers) {
    const ids: string[] = [];
    for (let taker = 0; taker < (handler.atOnce ?? 1); taker += 1) {
      ids.push(
        await queue.boss.work<object>(
          handler.queue,
          { batchSize: 1, pollingIntervalSeconds: LOOK_SECONDS },
          async ([job]) => {
            if (job === undefined) return;
            await pool.query(
              `INSERT INTO work_in_hand (queue_job_id, queue, worker_id) VALUES ($1, $2, $3)
               ON CONFLICT (queue_job_id) DO UPDATE SET worker_id = $3, taken_at = now()`,
              [job.id, handler.queue, workerId],
            );
            try {
              await handler.handle({ data: job.data, queueJobId: job.id, workerId, signal: ending.signal });
            } catch (error) {
              logger.warn({ err: error, queue: handler.queue, queueJobId: job.id }, 'work failed');
              throw error;
            } finally {
              await pool.query('DELETE FROM work_in_hand WHERE queue_job_id = $1 AND worker_id = $2', [
                job.id,
                workerId,
              ]);
            }
          },
        ),
      );
    }
    takers.set(handler.queue, ids);
  }

  const wake = (name: string): void => takers.get(name)?.forEach((id) => queue.boss.notifyWorker(id));
  const listener = await listen({
    url: database.url,
    channel: WORK_CHANNEL,
    onNotice: wake,
    onConnected: () => [...takers.keys()].forEach(wake),
    onError: (error) => logger.warn({ err: error }, 'listening for work'),
  });

  return {
    workerId,
    async stop() {
      ending.abort(new Error('The worker is ending.'));
      timers.forEach(clearInterval);
      await listener.stop();
      await queue.stop();
      await pool.query('DELETE FROM worker_heartbeats WHERE worker_id = $1', [workerId]);
    },
  };
}
