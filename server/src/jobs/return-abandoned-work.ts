import type { Pool } from 'pg';
import type { Queue } from './queue';
import { WORK_CHANNEL } from './queue';

/** A worker that has not said for this long that it lives is taken for dead. Seconds. */
export const SILENCE_SECONDS = 5;

/**
 * Give the queue back what dead workers had in hand, so that somebody takes it at once. Answers how much it was.
 * A worker that was only slow may then do the same work twice; handlers bear that.
 */
export async function returnAbandonedWork(pool: Pool, queue: Queue): Promise<number> {
  const client = await pool.connect();
  try {
    await client.query('BEGIN');
    const { rows } = await client.query<{ queue: string; queue_job_id: string }>(
      `DELETE FROM work_in_hand w WHERE NOT EXISTS (
         SELECT 1 FROM worker_heartbeats b
         WHERE b.worker_id = w.worker_id AND b.beat_at > now() - make_interval(secs => $1))
       RETURNING queue, queue_job_id`,
      [SILENCE_SECONDS],
    );
    const db = { executeSql: (text: string, values: unknown[]) => client.query(text, values) };
    for (const { queue: name, queue_job_id: id } of rows) {
      await queue.boss.fail(name, id, { reason: 'its worker fell silent' }, { db });
      await client.query('SELECT pg_notify($1, $2)', [WORK_CHANNEL, name]);
    }
    await client.query('COMMIT');
    return rows.length;
  } catch (error) {
    await client.query('ROLLBACK');
    throw error;
  } finally {
    client.release();
  }
}
