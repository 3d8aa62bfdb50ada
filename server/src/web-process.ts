import { once } from 'node:events';
import { createServer } from 'node:http';
import type { Logger } from 'pino';
import { buildApp } from './app';
import { HttpCuttingService } from './cutting/http-cutting-service';
import { connectDatabase } from './database/database';
import type { Environment } from './env';
import { openLiveHub } from './events/live-hub';
import { openFileStore } from './files/file-store';
import { openQueue } from './jobs/queue';
import { StripePaymentHost } from './payments/stripe-payment-host';

const PATIENCE_MS = 3000;

/** Connect everything, listen, and answer how to end it. */
export async function startWebProcess(env: Environment, logger: Logger): Promise<{ stop: () => Promise<void> }> {
  const now = (): Date => new Date();
  const onError = (error: Error): void => logger.warn({ err: error }, 'background');
  const database = connectDatabase({ url: env.databaseUrl });
  const queue = await openQueue({ pool: database.pool, isWorker: false, onError });
  const hub = await openLiveHub({ url: env.databaseUrl, onError });
  const app = buildApp({
    database,
    queue,
    hub,
    logger,
    now,
    files: await openFileStore(env.filesDirectory),
    payments: new StripePaymentHost(env.payment),
    cutting: new HttpCuttingService({ ...env.cutting, now }),
    publicUrl: env.publicUrl,
    sessionSecret: env.sessionSecret,
    requestsPerMinute: env.requestsPerMinute,
    webDirectory: env.webDirectory,
  });

  const server = createServer(app);
  // An upload over a slow line may take its time; headers may not.
  server.requestTimeout = 5 * 60_000;
  server.headersTimeout = 15_000;
  server.listen(env.port, env.host);
  await once(server, 'listening');
  logger.info({ host: env.host, port: env.port, url: env.publicUrl }, 'web process listens');

  return {
    async stop() {
      const closed = new Promise<void>((resolve) => server.close(() => resolve()));
      // Live streams never end by themselves; what is being answered gets a moment.
      const force = setTimeout(() => server.closeAllConnections(), PATIENCE_MS);
      server.closeIdleConnections();
      await hub.stop();
      await closed;
      clearTimeout(force);
      await queue.stop();
      await database.close();
    },
  };
}
