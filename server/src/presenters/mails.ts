import type { Mail as MailContract } from '@foldwright/shared/contracts/office';
import type { Mail } from '../models/mail';

export function presentMail(mail: Mail): MailContract {
  return {
    id: mail.id,
    to: mail.recipient,
    subject: mail.subject,
    text: mail.body,
    state: mail.state,
    attempts: mail.attempts,
    lastError: mail.lastError,
    createdAt: mail.createdAt.toISOString(),
    sentAt: mail.sentAt?.toISOString() ?? null,
  };
}
