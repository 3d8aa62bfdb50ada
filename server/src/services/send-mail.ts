import type { Database } from '../database/database';
import { recordEvent } from '../events/record-event';
import type { Queue } from '../jobs/queue';
import type { Mailer } from '../mail/mailer';
import { MailNotTaken } from '../mail/mailer';
import type { Mail } from '../models/mail';
import type { TellOrderTools } from './tell-order';
import { tellSale } from './sales/tell-sale';
import { tellOrder } from './tell-order';

export interface MailWork {
  readonly workshopId: string;
  readonly mailId: string;
}

export interface SendMailTools extends TellOrderTools {
  readonly database: Database;
  readonly mailer: Mailer;
}

/** About a day and a half with the pauses below; then a person has to look. */
const MOST_ATTEMPTS = 440;
const LONGEST_PAUSE_S = 300;

/** Pause before the next try, seconds: 2, 4, 8, ... up to five minutes. */
export const pauseAfter = (attempts: number): number => Math.min(2 ** Math.min(attempts, 12), LONGEST_PAUSE_S);

/**
 * Send a mail from the outbox. Its row is held while the mail server has it, and whoever finds it held leaves it alone:
 * two workers never send the same mail. A worker that dies between the server's yes and the commit leaves it to be sent
 * again, under the same message id; SMTP can't do better.
 */
export async function sendMail(tools: SendMailTools, { workshopId, mailId }: MailWork): Promise<void> {
  const sent = await tools.database.inWorkshop(workshopId, async (scope) => {
    const held = await scope.sql(
      "SELECT id FROM mails WHERE workshop_id = $1 AND id = $2 AND state = 'waiting' FOR UPDATE SKIP LOCKED",
      [workshopId, mailId],
    );
    const mail = await scope.rows.mails.get(mailId);
    if (held.length === 0) return mail.state === 'sent' ? mail : null;

    const attempts = mail.attempts + 1;
    const failure = await tryToSend(tools.mailer, mail);
    if (failure === null) {
      await scope.rows.mails.change(mail, { attempts, state: 'sent', sentAt: tools.now(), lastError: null });
    } else {
      const isOver = failure.isFinal || attempts >= MOST_ATTEMPTS;
      await scope.rows.mails.change(mail, {
        attempts,
        lastError: failure.message,
        state: isOver ? 'failed' : 'waiting',
      });
      if (!isOver) await sendLater(scope.transaction, tools.queue, { workshopId, mailId }, attempts);
    }
    recordEvent(scope, { kind: 'mail-changed', mailId });
    return failure === null ? mail : null;
  });
  if (sent !== null) await tellOrderOfMail(tools, sent);
}

async function sendLater(
  transaction: Parameters<Queue['enqueue']>[0],
  queue: Queue,
  work: MailWork,
  attempts: number,
): Promise<void> {
  await queue.enqueue(transaction, 'mail', work, { startAfterSeconds: pauseAfter(attempts) });
}

async function tryToSend(mailer: Mailer, { recipient, subject, body, messageId }: Mail): Promise<MailNotTaken | null> {
  try {
    await mailer.send({ to: recipient, subject, text: body, messageId });
    return null;
  } catch (error) {
    // A mail server that is away or unwilling is the ordinary case here; anything else is a fault of ours.
    if (error instanceof MailNotTaken) return error;
    throw error;
  }
}

/** In a transaction of its own: the one that held the mail must not be run again for the sake of a timeline. */
async function tellOrderOfMail(tools: SendMailTools, mail: Mail): Promise<void> {
  const { orderId, saleId, sentAt } = mail;
  if (sentAt === null) return;
  const details = { subject: mail.subject };
  const fact = {
    key: `mail-sent:${mail.key}`,
    kind: 'mail-sent',
    at: sentAt,
    source: mail.messageId,
    details,
  } as const;
  await tools.database.inWorkshop(mail.workshopId, async (scope) => {
    if (orderId !== null) {
      await tellOrder(scope, await scope.rows.orders.get(orderId, { lock: true }), [fact], tools);
    }
    // What the workshop is told itself stands in the sale already.
    if (saleId !== null && !mail.key.endsWith(':workshop')) {
      await tellSale(scope, await scope.rows.sales.get(saleId, { lock: true }), [fact], tools);
    }
  });
}
