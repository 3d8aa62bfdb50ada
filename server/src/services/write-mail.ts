import { randomUUID } from 'node:crypto';
import type { WorkshopScope } from '../database/workshop-scope';
import { recordEvent } from '../events/record-event';
import type { Queue } from '../jobs/queue';
import type { Letter } from './order-letters';

export interface NewMail extends Letter {
  /** What the mail is about: a second mail of the same key is not written. */
  readonly key: string;
  readonly orderId: string | null;
  readonly saleId?: string | null;
  readonly recipient: string;
}

/** Part of a message id after the @: nothing that can be reached, only ours. Source: RFC 5322, 3.6.4. */
const MESSAGE_ID_DOMAIN = 'foldwright.example.test';

/**
 * Put a mail into the outbox, in the transaction that makes it necessary. It is sent after commit, or never.
 */
export async function writeMail(scope: WorkshopScope, queue: Queue, mail: NewMail, now: Date): Promise<void> {
  const { key, orderId, saleId = null, recipient, subject, body } = mail;
  const id = randomUUID();
  // The unique key decides between two transactions that want to write the same mail.
  const written = await scope.sql(
    `INSERT INTO mails (id, workshop_id, key, order_id, sale_id, recipient, subject, body, message_id, created_at)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10) ON CONFLICT (workshop_id, key) DO NOTHING RETURNING id`,
    [id, scope.workshopId, key, orderId, saleId, recipient, subject, body, `<${id}@${MESSAGE_ID_DOMAIN}>`, now],
  );
  if (written.length === 0) return;
  await queue.enqueue(scope.transaction, 'mail', { workshopId: scope.workshopId, mailId: id });
  recordEvent(scope, { kind: 'mail-changed', mailId: id });
}
