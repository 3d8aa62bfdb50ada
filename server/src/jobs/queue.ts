import { Client } from 'pg';
import type { Pool } from 'pg';
import PgBoss from 'pg-boss';
import type { Transaction } from 'sequelize';

/** Queues that migrations have made. A new kind of work adds its name here and its queue in a migration. */
export type QueueName = 'trace' | 'mail' | 'cutting-order' | 'payment' | 'sale' | 'solid';

/** Channel on which workers hear that there is something to do, so that they need not wait for their next look. */
export const WORK_CHANNEL = 'foldwright_work';

export interface EnqueueOptions {
  /** Do it no sooner than this. */
  readonly startAfterSeconds?: number;
  /** How often it is tried again after a failure; the queue's own setting otherwise. */
  readonly retryLimit?: number;
  readonly retryDelaySeconds?: number;
  readonly retryBackoff?: boolean;
}

/** Work after commit: enqueued inside the transaction that makes it necessary, so both happen or neither. */
export interface Queue {
  /** The queue's own id for the work. */
  enqueue(transaction: Transaction, name: QueueName, data: object, options?: EnqueueOptions): Promise<string>;
  /** Take work back that has not begun. */
  cancel(transaction: Transaction, name: QueueName, queueJobId: string): Promise<void>;
  readonly boss: PgBoss;
  stop(): Promise<void>;
}

/** The connection a transaction runs on. Sequelize keeps it to itself in its types. */
function connectionOf(transaction: Transaction): Client {
  const connection: unknown = 'connection' in transaction ? transaction.connection : undefined;
  if (!(connection instanceof Client)) throw new Error('The transaction has no connection; it has ended.');
  return connection;
}

const dbOf = (transaction: Transaction): PgBoss.Db => ({
  executeSql: (text, values) => connectionOf(transaction).query(text, values),
});

/**
 * @param options.isWorker whether this process also looks after the queue: expiry, retries and removal of old work
 */
export async function openQueue(options: {
  pool: Pool;
  isWorker: boolean;
  onError: (error: Error) => void;
}): Promise<Queue> {
  const boss = new PgBoss({
    db: { executeSql: (text: string, values: unknown[]) => options.pool.query(text, values) },
    schema: 'pgboss',
    migrate: false,
    schedule: false,
    supervise: options.isWorker,
    // Work of a worker that fell silent comes back after this plus the work's own time limit; our own heartbeat is
    // quicker, this is the net below it.
    maintenanceIntervalSeconds: 2,
    ...(options.isWorker ? { monitorStateIntervalSeconds: 2 } : {}),
    deleteAfterDays: 14,
  });
  boss.on('error', options.onError);
  await boss.start();
  return {
    boss,
    async enqueue(transaction, name, data, { startAfterSeconds, retryLimit, retryDelaySeconds, retryBackoff } = {}) {
      const db = dbOf(transaction);
      const id = await boss.send(name, data, {
        db,
        ...(startAfterSeconds === undefined ? {} : { startAfter: startAfterSeconds }),
        ...(retryLimit === undefined ? {} : { retryLimit }),
        ...(retryDelaySeconds === undefined ? {} : { retryDelay: retryDelaySeconds }),
        ...(retryBackoff === undefined ? {} : { retryBackoff }),
      });
      if (id === null) throw new Error(`The queue “${name}” did not take the work.`);
      await db.executeSql('SELECT pg_notify($1, $2)', [WORK_CHANNEL, name]);
      return id;
    },
    cancel: (transaction, name, queueJobId) => boss.cancel(name, queueJobId, { db: dbOf(transaction) }),
    stop: () => boss.stop({ graceful: true, wait: true, timeout: 10_000, close: false }),
  };
}
