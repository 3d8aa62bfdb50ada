import type { Logger } from 'pino';
import { HttpCuttingService } from './cutting/http-cutting-service';
import { connectDatabase } from './database/database';
import type { Environment } from './env';
import { openFileStore } from './files/file-store';
import { commerceWork } from './jobs/commerce-work';
import type { ReadsPhotos } from './jobs/photo-reader-port';
import { openQueue } from './jobs/queue';
import { runWorker } from './jobs/run-worker';
import { traceHandler } from './jobs/trace-photo';
import { SmtpMailer } from './mail/smtp-mailer';
import { StripePaymentHost } from './payments/stripe-payment-host';

/** Take work from every queue, and answer how to end it. */
export async function startWorkerProcess(
  env: Environment,
  logger: Logger,
  reader: ReadsPhotos,
): Promise<{ stop: () => Promise<void> }> {
  const now = (): Date => new Date();
  const database = connectDatabase({ url: env.databaseUrl, poolSize: 6 });
  const onError = (error: Error): void => logger.warn({ err: error }, 'queue');
  const queue = await openQueue({ pool: database.pool, isWorker: true, onError });
  const files = await openFileStore(env.filesDirectory);
  const commerce = commerceWork({
    database,
    queue,
    publicUrl: env.publicUrl,
    files,
    now,
    mailer: new SmtpMailer({ smtpUrl: env.mail.smtpUrl, from: env.mail.from }),
    cutting: new HttpCuttingService({ ...env.cutting, now }),
    payments: new StripePaymentHost(env.payment),
  });
  const worker = await runWorker({
    database,
    queue,
    logger,
    handlers: [
      traceHandler({ database, files, reader, logger, now }),
      { queue: 'mail', handle: ({ data }) => commerce.mail(data) },
      { queue: 'cutting-order', handle: ({ data }) => commerce['cutting-order'](data) },
      { queue: 'payment', handle: ({ data }) => commerce.payment(data) },
      { queue: 'sale', handle: ({ data }) => commerce.sale(data) },
      { queue: 'solid', handle: ({ data }) => commerce.solid(data) },
    ],
  });
  logger.info({ workerId: worker.workerId }, 'worker waits for work');
  return {
    async stop() {
      await worker.stop();
      await database.close();
    },
  };
}
