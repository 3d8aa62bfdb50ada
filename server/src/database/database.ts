import { Pool } from 'pg';
import type { Transaction } from 'sequelize';
import { QueryTypes, Sequelize, Transaction as SequelizeTransaction } from 'sequelize';
import type { Models } from '../models/all-models';
import { defineModels } from '../models/all-models';
import { retryOnConflict } from './retry-on-conflict';
import type { WorkshopScope } from './workshop-scope';
import { workInScope } from './workshop-scope';

/**
 * Why code may look across workshops. Reading only: the policies let nobody write outside a workshop. Each reason has
 * one caller, and a test holds the list of callers.
 */
export type SystemReason =
  | 'find the workshop of a payment event'
  | 'find the workshop of a cutting callback'
  | 'find the workshop of an invitation'
  | 'find the revision behind a review link'
  | 'find the workshop of a shop address'
  | 'find the sale behind a link'
  | 'find the question behind a link'
  | 'list mails that wait'
  | 'show the installation to its operator';

export interface SystemScope {
  readonly transaction: Transaction;
  readonly models: Models;
  /** Runs one reading statement and answers its rows, still unparsed. */
  select(sql: string, bind?: readonly unknown[]): Promise<unknown[]>;
}

/** The application's way to PostgreSQL, as the plain role that row-level security holds. */
export interface Database {
  readonly models: Models;
  /** Plain connections for sessions, rate limits and the queue, which belong to no workshop. */
  readonly pool: Pool;
  readonly url: string;
  /** One transaction in one workshop; run again as a whole when the database asks for it. */
  inWorkshop<T>(workshopId: string, work: (scope: WorkshopScope) => Promise<T>): Promise<T>;
  /** The same for reading several tables that have to fit together: all of them as they were at one moment. */
  viewWorkshop<T>(workshopId: string, work: (scope: WorkshopScope) => Promise<T>): Promise<T>;
  /** One transaction that sees one person and the workshops that person belongs to. */
  forUser<T>(userId: string, work: (transaction: Transaction) => Promise<T>): Promise<T>;
  /** One transaction that may read, never write, across workshops. */
  asSystem<T>(reason: SystemReason, work: (scope: SystemScope) => Promise<T>): Promise<T>;
  close(): Promise<void>;
}

export interface DatabaseOptions {
  readonly url: string;
  /** Most connections for transactions; another few serve sessions, limits and the queue. */
  readonly poolSize?: number;
  /** How long a transaction waits for a connection. */
  readonly acquireMs?: number;
}

const STATEMENT_TIMEOUT_MS = 20_000;

export function connectDatabase(options: DatabaseOptions): Database {
  const sequelize = new Sequelize(options.url, {
    dialect: 'postgres',
    logging: false,
    pool: { max: options.poolSize ?? 8, min: 0, idle: 10_000, acquire: options.acquireMs ?? 15_000 },
    dialectOptions: { statement_timeout: STATEMENT_TIMEOUT_MS, application_name: 'foldwright' },
  });
  const pool = new Pool({ connectionString: options.url, max: 6, application_name: 'foldwright-plain' });
  // A dropped idle connection is replaced at the next use; without a listener it would end the process.
  pool.on('error', () => undefined);
  const models = defineModels(sequelize);

  const inTransaction = <T>(
    settings: Readonly<Record<string, string>>,
    work: (tx: Transaction) => Promise<T>,
    isolationLevel?: SequelizeTransaction.ISOLATION_LEVELS,
  ) =>
    retryOnConflict(() =>
      sequelize.transaction(isolationLevel === undefined ? {} : { isolationLevel }, async (transaction) => {
        const bind = Object.entries(settings).flat();
        const calls = Object.keys(settings).map((_, at) => `set_config($${2 * at + 1}, $${2 * at + 2}, true)`);
        await sequelize.query(`SELECT ${calls.join(', ')}`, { bind, transaction, type: QueryTypes.SELECT });
        return work(transaction);
      }),
    );

  return {
    models,
    pool,
    url: options.url,
    inWorkshop: (workshopId, work) =>
      inTransaction({ 'foldwright.workshop': workshopId }, (transaction) =>
        workInScope(models, workshopId, transaction, work),
      ),
    viewWorkshop: (workshopId, work) =>
      inTransaction(
        { 'foldwright.workshop': workshopId },
        (transaction) => workInScope(models, workshopId, transaction, work),
        SequelizeTransaction.ISOLATION_LEVELS.REPEATABLE_READ,
      ),
    forUser: (userId, work) => inTransaction({ 'foldwright.user': userId }, work),
    asSystem: (_reason, work) =>
      inTransaction({ 'foldwright.system': 'read' }, (transaction) =>
        work({
          transaction,
          models,
          select: (sql, bind = []) => sequelize.query(sql, { bind: [...bind], transaction, type: QueryTypes.SELECT }),
        }),
      ),
    close: async () => {
      await Promise.all([sequelize.close(), pool.end()]);
    },
  };
}
