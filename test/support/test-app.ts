import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Express } from 'express';
import pino from 'pino';
import type { AppOptions } from '@foldwright/server/app';
import { buildApp } from '@foldwright/server/app';
import { HttpCuttingService } from '@foldwright/server/cutting/http-cutting-service';
import type { Database } from '@foldwright/server/database/database';
import { connectDatabase } from '@foldwright/server/database/database';
import { openLiveHub } from '@foldwright/server/events/live-hub';
import type { FileStore } from '@foldwright/server/files/file-store';
import { openFileStore } from '@foldwright/server/files/file-store';
import type { Queue } from '@foldwright/server/jobs/queue';
import { openQueue } from '@foldwright/server/jobs/queue';
import { StripePaymentHost } from '@foldwright/server/payments/stripe-payment-host';
import { createTestDatabase } from './database';

// Copying a database and hashing passwords takes seconds on a machine that is busy with other tests.
jest.setTimeout(60_000);

export const TEST_SESSION_SECRET = 'a secret that only tests use, long enough';

/** An address where nothing listens: outside services are away unless a test brings its own. */
const NOBODY_THERE = 'http://127.0.0.1:1';

/** The web application on a database and a folder of its own, ready for supertest. */
export interface TestApp {
  readonly app: Express;
  readonly database: Database;
  readonly queue: Queue;
  readonly files: FileStore;
  readonly filesDirectory: string;
  readonly ownerUrl: string;
  readonly applicationUrl: string;
  /** What was logged at level error or above. */
  readonly loggedErrors: string[];
  close(): Promise<void>;
}

/**
 * @param overrides.poolSize connections for transactions; one makes a statement outside of its transaction wait for
 *   ever, so that forgetting to hand the transaction on fails a test
 */
export async function startTestApp(overrides: Partial<AppOptions> & { poolSize?: number } = {}): Promise<TestApp> {
  const testDatabase = await createTestDatabase();
  const filesDirectory = await mkdtemp(path.join(tmpdir(), 'foldwright-test-'));
  const { poolSize, ...options } = overrides;
  const database = connectDatabase({
    url: testDatabase.applicationUrl,
    ...(poolSize === undefined ? {} : { poolSize, acquireMs: 2000 }),
  });
  const loggedErrors: string[] = [];
  const logger = pino({ level: 'error' }, { write: (line: string) => void loggedErrors.push(line) });
  const onError = (error: Error): void => void loggedErrors.push(error.message);
  const queue = await openQueue({ pool: database.pool, isWorker: false, onError });
  const files = await openFileStore(filesDirectory);
  const hub = await openLiveHub({ url: testDatabase.applicationUrl, onError });
  const app = buildApp({
    database,
    queue,
    files,
    hub,
    payments: new StripePaymentHost({ apiKey: 'sk_test', hostUrl: NOBODY_THERE, webhookSecret: 'secret', retries: 0 }),
    cutting: new HttpCuttingService({ url: NOBODY_THERE, key: 'key', callbackSecret: 'secret', now: () => new Date() }),
    logger,
    publicUrl: 'http://127.0.0.1:4310',
    now: () => new Date(),
    sessionSecret: TEST_SESSION_SECRET,
    requestsPerMinute: 100_000,
    webDirectory: null,
    ...options,
  });
  return {
    app,
    database,
    queue,
    files,
    filesDirectory,
    loggedErrors,
    ownerUrl: testDatabase.ownerUrl,
    applicationUrl: testDatabase.applicationUrl,
    async close() {
      await hub.stop();
      await queue.stop();
      await database.close();
      await testDatabase.drop();
      await rm(filesDirectory, { recursive: true, force: true });
    },
  };
}
